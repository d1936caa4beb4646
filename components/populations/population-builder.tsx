'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { PageTitle } from '@/components/ui/page-title';
import type { PopulationBuilderProps } from './builder-props';
import { FIRST_DEFINITION } from './builder-setting';
import { LawBuilder } from './law-builder';

const SystemsScreen = dynamic(async () => (await import('./systems-screen')).SystemsScreen);
const SystemsUpload = dynamic(async () => (await import('./systems-upload')).SystemsUpload);

/** A population of any form: laws under their controls, systems as their table has them. */
export function PopulationBuilder(props: PopulationBuilderProps) {
  const { version } = props;
  if (!version) return <NewPopulation {...props} />;
  const { definition } = version;
  return definition.form === 'systems' ? (
    <SystemsScreen {...props} version={version} summary={definition} />
  ) : (
    <LawBuilder {...props} start={definition} />
  );
}

type Origin = 'laws' | 'systems';

/** A new one is described by laws, or comes as a table of systems. */
function NewPopulation(props: PopulationBuilderProps) {
  const { collaboration } = props;
  const [origin, setOrigin] = useState<Origin>(props.query.from === 'systems' ? 'systems' : 'laws');
  const choice = (
    <div className="mb-5">
      <ConsequenceSwitch<Origin>
        label="What it is made of"
        isLabelHidden
        value={origin}
        onChange={setOrigin}
        options={[
          { value: 'laws', label: 'Laws along both axes' },
          { value: 'systems', label: 'Systems from a table' },
        ]}
      />
    </div>
  );
  if (origin === 'laws') return <LawBuilder {...props} start={FIRST_DEFINITION} choice={choice} />;
  return (
    <>
      <PageTitle
        title="New population"
        crumbs={[{ href: `/${collaboration}/populations`, label: 'Populations' }, { label: 'New' }]}
      />
      {choice}
      <div className="pb-10">
        <SystemsUpload collaboration={collaboration} />
      </div>
    </>
  );
}
