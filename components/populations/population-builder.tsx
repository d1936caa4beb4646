'use client';

import { useMemo, useState } from 'react';
import type { MapData } from '@/components/charts/map-contours';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAddressQuery } from '@/components/hooks/use-address-query';
import { useRunMaps } from '@/components/hooks/use-run-maps';
import { orNull } from '@/components/runs/live-answer';
import { type LiveSample, sampleOf } from '@/components/runs/live-sample';
import type { LiveSetting, Query } from '@/components/runs/live-setting';
import { profileAlong } from '@/components/runs/survey-sums';
import { useLiveTask } from '@/components/runs/use-live-task';
import { Button } from '@/components/ui/button';
import { LinkButton } from '@/components/ui/link-button';
import { PageTitle } from '@/components/ui/page-title';
import { StateMark } from '@/components/ui/state-mark';
import { populationWeights } from '@/lib/population';
import {
  isPlainPowerLaw,
  type ListedPopulation,
  type PowerLawDefinition,
} from '@/lib/schemas/populations';
import type { RunView } from '@/lib/schemas/runs';
import { DEFAULT_GRID } from '@/lib/sensitivity';
import { AgainstVersion } from './against-version';
import { BuilderControls } from './builder-controls';
import { BuilderPreview } from './builder-preview';
import {
  type BuilderSetting,
  builderFromQuery,
  builderToQuery,
  defaultSetting,
  FIRST_DEFINITION,
  isSameDefinition,
} from './builder-setting';
import { InWords } from './in-words';
import { PopulationAlone } from './population-alone';
import { SavePopulation } from './save-population';
import { StoredPopulation } from './stored-population';
import { VersionList } from './version-list';

interface PopulationBuilderProps {
  collaboration: string;
  /** All versions, newest first; empty for a new population. */
  versions: ListedPopulation[];
  /** The version that is shown. */
  version?: ListedPopulation;
  /** Newest finished run: its maps carry the preview. */
  previewRun: RunView | null;
  canShare: boolean;
  query: Query;
}

/** A population: under its controls where it is a plain power law, else in words. */
export function PopulationBuilder(props: PopulationBuilderProps) {
  const { collaboration, versions, version } = props;
  const start = version?.definition ?? FIRST_DEFINITION;
  if (isPlainPowerLaw(start)) return <LiveBuilder {...props} start={start} />;
  return version ? (
    <StoredPopulation collaboration={collaboration} versions={versions} version={version} />
  ) : null;
}

/** A power law under its controls, and at once what the surveys would see of it. */
function LiveBuilder(props: PopulationBuilderProps & { start: PowerLawDefinition }) {
  const { collaboration, versions, version, previewRun, canShare, query, start } = props;
  const saved = useMemo(() => defaultSetting(start), [start]);
  const [setting, setSetting] = useState(() => builderFromQuery(query, saved));
  const [settled, setSettled] = useState(setting);
  const change = (next: BuilderSetting, isSettled: boolean) => {
    setSetting(next);
    if (isSettled) setSettled(next);
  };
  const redefine = (definition: PowerLawDefinition, isSettled: boolean) =>
    change({ ...setting, definition }, isSettled);
  const isChanged = !isSameDefinition(setting.definition, saved.definition);
  useAddressQuery({
    ...(query.version === undefined ? {} : { version: query.version }),
    ...builderToQuery(setting, saved),
  });

  const { preview, reason } = usePreview(collaboration, previewRun);
  const grid = preview?.map ?? noGrid;
  const weights = useMemo(
    () => preview && orNull(() => populationWeights(preview.map, setting.definition)),
    [preview, setting.definition],
  );
  const profiles = useMemo(
    () =>
      preview && weights
        ? {
            mass: profileAlong(preview.map.completeness, weights, 'mass'),
            semiMajorAxis: profileAlong(preview.map.completeness, weights, 'semiMajorAxis'),
          }
        : undefined,
    [preview, weights],
  );
  const traces = useTraces(preview?.sample, settled);

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
              definition={setting.definition}
              version={version}
              isChanged={isChanged}
              canShare={canShare}
            />
          </>
        }
      />
      <div className="grid gap-x-[48px] gap-y-8 pb-10 xl:grid-cols-[454px_minmax(0,1fr)]">
        <div className="min-w-0">
          <BuilderControls
            setting={setting}
            saved={version && start}
            grid={grid}
            orbits={orbitWords(previewRun)}
            profiles={profiles}
            traces={traces}
            onSetting={change}
          />
          <InWords setting={setting} grid={grid} hasMaps={preview !== undefined} />
        </div>
        <div className="min-w-0">
          {preview ? (
            <BuilderPreview
              setting={setting}
              settled={settled}
              sample={preview.sample}
              map={preview.map}
              weights={weights ?? null}
              source={preview.source}
              onDefinition={redefine}
            />
          ) : (
            <PopulationAlone definition={setting.definition} grid={grid} reason={reason} />
          )}
          {version && (
            <div className="mt-7 grid gap-x-9 gap-y-7 lg:grid-cols-2">
              <AgainstVersion
                version={version.version}
                before={start}
                usedBy={version.usedBy}
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

const noGrid = DEFAULT_GRID();

/** Maps of the newest run, or the sentence that says why there are none. */
function usePreview(collaboration: string, run: RunView | null) {
  const { data: maps, error } = useRunMaps(collaboration, run ?? undefined);
  const preview = useMemo(() => {
    if (!maps || !run?.inputs || !run.result) return undefined;
    const map: MapData = {
      massMjup: maps.massMjup,
      semiMajorAxisAu: maps.semiMajorAxisAu,
      completeness: Float64Array.from(run.result.meanMap.completeness.flat()),
    };
    return {
      sample: sampleOf(run.inputs, maps),
      map,
      source: `${run.analysis.key}, run ${run.number}`,
    };
  }, [maps, run]);
  const reason =
    error !== undefined
      ? sentenceOf(error)
      : run === null
        ? 'No run has finished in this collaboration, so nothing says which of these planets would be seen. The first finished run brings its maps here.'
        : `Fetching the maps of ${run.analysis.key}, run ${run.number}.`;
  return { preview, reason };
}

/** Limits against each index: they follow once a drag has ended. */
function useTraces(
  sample: LiveSample | undefined,
  { definition, prior, credibleLevel }: BuilderSetting,
) {
  const asked: LiveSetting = {
    definition,
    prior,
    credibleLevel,
    detections: 'counted',
    likelihood: 'host-fraction',
  };
  const mass = useLiveTask(sample, 'linearTrace', asked, asked, 'massIndex');
  const axis = useLiveTask(sample, 'linearTrace', asked, asked, 'semiMajorAxisIndex');
  return sample && { massIndex: mass.answer, semiMajorAxisIndex: axis.answer };
}

function orbitWords(run: RunView | null): string {
  const origin = 'Orbits belong to the maps: they are set with each survey.';
  if (!run?.inputs) return `Isotropic. ${origin}`;
  return `Isotropic; ${run.inputs.eccentricity}, in ${run.analysis.key}, run ${run.number}. ${origin}`;
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
  return <StateMark kind="draft">{version.isShared ? 'Shared with all' : 'Draft'}</StateMark>;
}
