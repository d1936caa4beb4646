'use client';

import dynamic from 'next/dynamic';
import { type ReactNode, useDeferredValue, useMemo, useState } from 'react';
import { useAddressQuery } from '@/components/hooks/use-address-query';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import { orNull } from '@/components/runs/or-null';
import { profileAlong } from '@/components/runs/survey-sums';
import { Button } from '@/components/ui/button';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { StateMark } from '@/components/ui/state-mark';
import { needsHostMass } from '@/lib/population';
import type { ListedPopulation } from '@/lib/schemas/populations';
import { DEFAULT_GRID } from '@/lib/sensitivity';
import type { PopulationBuilderProps } from './builder-props';
import { type BuilderSetting, builderToQuery, defaultSetting } from './builder-setting';
import { InWords } from './in-words';
import { faultOf, hasIndexPlane, isSameLaw, type LawDefinition } from './law-parts';
import { orbitWords } from './orbit-words';
import { PopulationAlone } from './population-alone';
import { SavePopulation } from './save-population';
import { SharedMark } from './shared-mark';
import { spreadOf } from './spread';
import { type Preview, usePreview } from './use-preview';

/** These wait for the maps of a run, or stand below what does. */
const PopulationPreview = dynamic(
  async () => (await import('./population-preview')).PopulationPreview,
  { loading: PreviewWaits },
);
const PlaneSection = dynamic(async () => (await import('./plane-section')).PlaneSection);
const AgainstVersion = dynamic(async () => (await import('./against-version')).AgainstVersion);
const VersionList = dynamic(async () => (await import('./version-list')).VersionList);

function PreviewWaits() {
  return (
    <p className="text-ink3 text-note" role="status">
      Drawing what the surveys would see.
    </p>
  );
}

/** Drawn by the server, and made live after the rest. */
const BuilderControls = dynamic(async () => (await import('./builder-controls')).BuilderControls);

interface LawBuilderProps extends PopulationBuilderProps {
  start: LawDefinition;
  /** Above the controls of a new population. */
  choice?: ReactNode;
}

const noGrid = DEFAULT_GRID();

/** Laws under their controls, and at once what the surveys would see of them. */
export function LawBuilder(props: LawBuilderProps) {
  const { collaboration, versions, version, canShare, query, start, choice } = props;
  const previewRun = useUnpackedRun(props.previewRun);
  const saved = useMemo(() => defaultSetting(start), [start]);
  const [setting, setSetting] = useState(props.asked.laws ?? saved);
  const [settled, setSettled] = useState(setting);
  const change = (next: BuilderSetting, isSettled: boolean) => {
    setSetting(next);
    if (isSettled) setSettled(next);
  };
  const { definition } = setting;
  const isChanged = !isSameLaw(definition, saved.definition);
  const fault = useMemo(() => faultOf(definition), [definition]);
  useAddressQuery({
    ...(query.version === undefined ? {} : { version: query.version }),
    ...builderToQuery(setting, saved),
  });
  const { preview, reason, isFetchingMasses } = usePreview(
    collaboration,
    previewRun,
    needsHostMass(definition),
  );
  const grid = preview?.sample.grid ?? noGrid;
  const profiles = useProfiles(preview, definition);
  // Controls follow a finger at once; what costs more than a frame may come one frame later.
  const shown = useDeferredValue(setting);

  return (
    <>
      <PageTitle
        title={version?.name ?? 'New population'}
        crumbs={[
          { href: `/${collaboration}/populations`, label: 'Populations' },
          { label: version ? `${version.key}, version ${version.version}` : 'New' },
        ]}
        state={<BuilderState version={version} isChanged={isChanged} />}
        actions={
          <>
            {isChanged && (
              <Button variant="quiet" onClick={() => change(saved, true)}>
                Discard
              </Button>
            )}
            {version && (
              <LinkButton
                href={`/${collaboration}/analyses/new?population=${version.id}`}
                icon="forward"
              >
                Use {isChanged ? `version ${version.version} ` : ''}in an analysis
              </LinkButton>
            )}
            <SavePopulation
              collaboration={collaboration}
              definition={definition}
              fault={fault}
              version={version}
              isChanged={isChanged}
              canShare={canShare}
            />
          </>
        }
      />
      {choice}
      <div className="grid gap-x-[48px] gap-y-8 pb-10 xl:grid-cols-[454px_minmax(0,1fr)]">
        <div className="min-w-0">
          <BuilderControls
            setting={setting}
            settled={settled}
            saved={version && start}
            grid={grid}
            sample={preview?.sample}
            orbits={orbitWords(previewRun)}
            profiles={profiles}
            onSetting={change}
          />
          <InWords setting={setting} fault={fault} grid={grid} hasMaps={preview !== undefined} />
        </div>
        <div className="min-w-0">
          {preview ? (
            <>
              <PopulationPreview
                population={shown.definition}
                setting={shown}
                settled={settled}
                preview={preview}
                isFetchingMasses={isFetchingMasses}
                onDefinition={(next, isSettled) =>
                  change({ ...setting, definition: next }, isSettled)
                }
              />
              {hasIndexPlane(settled.definition) && hasIndexPlane(shown.definition) && (
                <PlaneSection sample={preview.sample} settled={settled} here={shown} />
              )}
            </>
          ) : (
            <PopulationAlone definition={definition} grid={grid} reason={reason} />
          )}
          {version && (
            <div className="mt-7 grid gap-x-9 gap-y-7 lg:grid-cols-2">
              <AgainstVersion
                collaboration={collaboration}
                versions={versions}
                shown={version}
                isChanged={isChanged}
                now={settled.definition}
                conventions={settled.conventions}
                setting={settled}
                sample={preview?.sample}
              />
              <VersionList collaboration={collaboration} versions={versions} shown={version} />
            </div>
          )}
        </div>
      </div>
    </>
  );
}

/** What could be seen along each axis, averaged over the law of the other one. */
function useProfiles(preview: Preview | undefined, definition: LawDefinition) {
  const deferred = useDeferredValue(definition);
  return useMemo(() => {
    const spread = preview && orNull(() => spreadOf(preview.sample, preview.map, deferred));
    if (!spread) return undefined;
    return {
      mass: profileAlong(spread.map.completeness, spread.weights, 'mass'),
      semiMajorAxis: profileAlong(spread.map.completeness, spread.weights, 'semiMajorAxis'),
    };
  }, [preview, deferred]);
}

function BuilderState({
  version,
  isChanged,
}: {
  version: ListedPopulation | undefined;
  isChanged: boolean;
}) {
  if (!version) return <StateMark kind="unsaved">Not saved yet</StateMark>;
  if (isChanged) return <StateMark kind="unsaved">Unsaved change</StateMark>;
  return <SharedMark isShared={version.isShared} />;
}
