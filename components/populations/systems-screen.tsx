'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAddressQuery } from '@/components/hooks/use-address-query';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import type { Query } from '@/components/runs/live-setting';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import type { SystemsSummary } from '@/lib/population';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { ListedPopulation } from '@/lib/schemas/populations';
import { DEFAULT_GRID } from '@/lib/sensitivity';
import { AgainstVersion } from './against-version';
import type { AskedSetting } from './asked-setting';
import { FIRST_PREVIEW, previewToQuery } from './builder-setting';
import { CopyWords, OnGrid } from './in-words';
import { orbitWords } from './orbit-words';
import { PopulationAlone } from './population-alone';
import { PopulationPreview } from './population-preview';
import { SharedMark } from './shared-mark';
import { SystemsParts } from './systems-parts';
import { SystemsUpload } from './systems-upload';
import { usePreview } from './use-preview';
import { useWholeDefinition } from './use-whole-definition';
import { VersionList } from './version-list';

interface SystemsScreenProps {
  collaboration: string;
  versions: ListedPopulation[];
  version: ListedPopulation;
  summary: SystemsSummary;
  previewRun: PackedRun | null;
  query: Query;
  /** What the address asks for. */
  asked: AskedSetting;
}

const noGrid = DEFAULT_GRID();
const conventions = { mass: 'linear', semiMajorAxis: 'linear' } as const;

/** Systems from a table: what they are, what the surveys would see of them, what a run asks. */
export function SystemsScreen(props: SystemsScreenProps) {
  const { collaboration, versions, version, summary, query } = props;
  const previewRun = useUnpackedRun(props.previewRun);
  const { definition, fault } = useWholeDefinition(collaboration, version);
  const { preview, reason, isFetchingMasses } = usePreview(collaboration, previewRun, false);
  const [setting, setSetting] = useState(props.asked.preview);
  useAddressQuery({
    ...(query.version === undefined ? {} : { version: query.version }),
    ...previewToQuery(setting, FIRST_PREVIEW),
  });
  const grid = preview?.sample.grid ?? noGrid;
  return (
    <>
      <PageTitle
        title={version.name}
        crumbs={[
          { href: `/${collaboration}/populations`, label: 'Populations' },
          { label: `${version.key}, version ${version.version}` },
        ]}
        state={<SharedMark isShared={version.isShared} />}
        actions={
          <LinkButton
            href={`/${collaboration}/analyses/new?population=${version.id}`}
            icon="forward"
          >
            Use in an analysis
          </LinkButton>
        }
      />
      {definition?.form === 'systems' ? (
        <div className="grid gap-x-[48px] gap-y-8 pb-10 xl:grid-cols-[454px_minmax(0,1fr)]">
          <div className="min-w-0">
            <SystemsParts
              population={definition}
              range={summary}
              orbits={orbitWords(previewRun)}
              setting={setting}
              onSetting={setSetting}
            />
            <section className="mt-7">
              <SectionOpener title="In words" />
              <p className="text-body leading-normal">{version.words}.</p>
              <CopyWords definition={summary} />
              {preview && (
                <div className="mt-3 grid gap-1">
                  <OnGrid definition={summary} grid={grid} />
                </div>
              )}
            </section>
          </div>
          <div className="min-w-0">
            {preview ? (
              <PopulationPreview
                population={definition}
                setting={setting}
                settled={setting}
                preview={preview}
                isFetchingMasses={isFetchingMasses}
              />
            ) : (
              <PopulationAlone definition={definition} grid={grid} reason={reason} />
            )}
            <div className="mt-7 grid gap-x-9 gap-y-7 lg:grid-cols-2">
              <AgainstVersion
                collaboration={collaboration}
                versions={versions}
                shown={version}
                isChanged={false}
                now={definition}
                conventions={conventions}
                setting={setting}
                sample={preview?.sample}
              />
              <VersionList collaboration={collaboration} versions={versions} shown={version} />
            </div>
            {version.can.saveVersion && (
              <div className="mt-7">
                <SystemsUpload collaboration={collaboration} version={version} />
              </div>
            )}
          </div>
        </div>
      ) : fault === undefined ? (
        <p className="pb-10 text-ink2 text-note" role="status">
          Fetching {version.words}.
        </p>
      ) : (
        <Notice tone="bad" title="The table could not be fetched." isAnnounced>
          {sentenceOf(fault)}
        </Notice>
      )}
    </>
  );
}
