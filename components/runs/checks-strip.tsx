import { memo, type ReactNode, useMemo } from 'react';
import type { MapData } from '@/components/charts/map-contours';
import { HARDLY_ANY, hardlySeenWords, shareOnMeanMap } from '@/components/populations/hardly-seen';
import { StateMark } from '@/components/ui/state-mark';
import { describeCandidates, type StatedCandidates } from '@/lib/inference';
import { formatPercent } from '@/lib/quantities/display';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs } from '@/lib/schemas/runs';

interface ChecksStripProps {
  inputs: DrawnInputs;
  /** The mean map of the stars, and the population whose share out of sight on it is named. */
  map: MapData;
  definition: ListedDefinition;
  shareOutsideMaps: number;
  shareFlaggedCooling: number;
  /** Candidates without an answer that may lie in the ranges now, and what is done with them. */
  candidates: StatedCandidates | undefined;
  /** Set while the setting is another: what was judged for the run's own ranges says so. */
  ofRun?: number;
  /** Whether the run is calibrated. */
  calibration: ReactNode;
}

/** What a reader should know before the number is used, in one line. */
export const ChecksStrip = memo(function ChecksStrip(props: ChecksStripProps) {
  const { inputs, map, definition, shareOutsideMaps, shareFlaggedCooling, candidates, ofRun } =
    props;
  const inRun = ofRun === undefined ? '' : `, run ${ofRun}`;
  const hardlySeen = useMemo(() => shareOnMeanMap(map, definition), [map, definition]);
  const words = hardlySeenWords(hardlySeen ?? 0);
  const olderEngines = (inputs.mapEngines ?? []).filter((made) => made !== inputs.engineVersion);
  const entries = inputs.surveys.reduce((sum, survey) => sum + survey.entries, 0);
  const overlapping = entries - inputs.stars.length;
  return (
    <div className="flex flex-wrap gap-x-[30px] gap-y-2 px-0.5 pt-3.5 pb-[26px]">
      {props.calibration}
      <StateMark kind="ok">
        {overlapping > 0
          ? `${entries} entries, ${inputs.stars.length} stars: no star counted twice`
          : `${inputs.stars.length} stars, none in two surveys`}
      </StateMark>
      {candidates && candidates.entries.length > 0 ? (
        <StateMark kind="warn">
          {candidates.entries.length === 1 ? 'Unvetted candidate: ' : 'Unvetted candidates: '}
          {describeCandidates(candidates)}
        </StateMark>
      ) : (
        <StateMark kind="ok">No unvetted candidate inside the ranges</StateMark>
      )}
      {shareOutsideMaps > 0.0005 ? (
        <StateMark kind="warn">
          {formatPercent(shareOutsideMaps)} of the population outside the maps
        </StateMark>
      ) : (
        <StateMark kind="ok">The whole population lies inside the maps</StateMark>
      )}
      {hardlySeen !== null && hardlySeen >= HARDLY_ANY && (
        <StateMark kind="warn">
          {words.fact}. {words.meaning}.
        </StateMark>
      )}
      {olderEngines.length > 0 && (
        <StateMark kind="warn">
          Maps of engine {olderEngines.join(' and ')}, not of {inputs.engineVersion}: refresh them
          and run again
        </StateMark>
      )}
      {shareFlaggedCooling > 0.0005 && (
        <StateMark kind="warn">
          {formatPercent(shareFlaggedCooling)} of it where the cooling model is beyond its validity
          {inRun}
        </StateMark>
      )}
    </div>
  );
});
