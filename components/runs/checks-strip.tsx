import type { ReactNode } from 'react';
import { StateMark } from '@/components/ui/state-mark';
import { formatPercent } from '@/lib/quantities/display';
import type { RunInputs } from '@/lib/schemas/runs';

interface ChecksStripProps {
  inputs: RunInputs;
  shareOutsideMaps: number;
  shareFlaggedCooling: number;
  /** Undecided candidates whose best values lie in the ranges now. */
  undecidedInside: string[];
  /** Set while the setting is another: what was judged for the run's own ranges says so. */
  ofRun?: number;
  /** Whether the run is calibrated. */
  calibration: ReactNode;
}

/** What a reader should know before the number is used, in one line. */
export function ChecksStrip(props: ChecksStripProps) {
  const { inputs, shareOutsideMaps, shareFlaggedCooling, undecidedInside, ofRun } = props;
  const inRun = ofRun === undefined ? '' : `, run ${ofRun}`;
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
      {undecidedInside.length > 0 ? (
        <StateMark kind="warn">
          {undecidedInside.length === 1
            ? '1 candidate inside the ranges still unvetted: '
            : `${undecidedInside.length} candidates inside the ranges still unvetted: `}
          {undecidedInside.join(', ')}
          {inRun}
        </StateMark>
      ) : (
        <StateMark kind="ok">No unvetted candidate inside the ranges{inRun}</StateMark>
      )}
      {shareOutsideMaps > 0.0005 ? (
        <StateMark kind="warn">
          {formatPercent(shareOutsideMaps)} of the population outside the maps
        </StateMark>
      ) : (
        <StateMark kind="ok">The whole population lies inside the maps</StateMark>
      )}
      {shareFlaggedCooling > 0.0005 && (
        <StateMark kind="warn">
          {formatPercent(shareFlaggedCooling)} of it where the cooling model is beyond its validity
          {inRun}
        </StateMark>
      )}
    </div>
  );
}
