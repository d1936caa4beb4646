'use client';

import { memo, useCallback, useMemo, useRef } from 'react';
import type { DepthSeries } from '@/components/charts/depth-chart';
import type { MapData } from '@/components/charts/map-contours';
import type { MapRange } from '@/components/charts/range-box';
import { useCalm } from '@/components/hooks/use-calm';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { documentOfShown } from '@/components/statement/document-of-shown';
import { ShownStatementCopy } from '@/components/statement/statement-copy';
import { FoldSection } from '@/components/ui/fold-section';
import { describeLevel, describePrior } from '@/lib/inference';
import { formatLimit } from '@/lib/quantities/display';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import { BesideTable } from './beside-table';
import { DetectionsSection } from './detections-section';
import { LevelTable } from './level-table';
import type { LiveSample } from './live-sample';
import { SensitivitySection } from './sensitivity-section';
import type { ShownResult } from './shown-result';
import { StarsSection } from './stars-section';

interface ResultSectionsProps {
  inputs: DrawnInputs;
  result: DrawnResult;
  run: DrawnRun;
  sample?: LiveSample;
  map: MapData;
  followed: Followed;
  onDefinition(definition: PowerLawDefinition): void;
}

/** Drawn anew at the pace of what they are given, however often the hand moves. */
const CalmSensitivity = memo(SensitivitySection);
const CalmStars = memo(StarsSection);

/** What follows a drag. */
interface Followed {
  shown: ShownResult;
  depth: DepthSeries[];
  /** The ranges as they are now, in the map's box. */
  definition: PowerLawDefinition;
}

const PACE_MS = 400;

/** Sections 2 to 5: they hold thousands of marks, so each follows a drag at its own pace. */
export const ResultSections = memo(function ResultSections(props: ResultSectionsProps) {
  return (
    <>
      <div className="grid min-w-0 gap-x-[60px] md:gap-y-8 xl:grid-cols-[minmax(0,780fr)_minmax(0,520fr)]">
        <Sensitivity {...props} />
        <LimitsAndDetections {...props} />
      </div>
      <Stars {...props} />
    </>
  );
});

const Sensitivity = memo(function Sensitivity(props: ResultSectionsProps) {
  const { map, result, inputs, followed, onDefinition } = props;
  const place = useRef<HTMLDivElement>(null);
  const { shown, depth } = useCalm(followed, { paceMs: PACE_MS, seen: place });
  const range = useCalm(useRange(followed.definition), { paceMs: 0, seen: place });
  const latest = useRef(followed.definition);
  latest.current = followed.definition;
  const onRange = useCallback(
    (next: MapRange) => onDefinition({ ...latest.current, ...next }),
    [onDefinition],
  );
  return (
    <div ref={place} className="min-w-0">
      <CalmSensitivity
        map={map}
        stars={result.stars}
        exposure={shown.exposure}
        depth={depth}
        range={range}
        companions={inputs.companions}
        counted={shown.counted}
        onRange={onRange}
      />
    </div>
  );
});

/** The ranges of a population, the same object until one of them changes. */
function useRange(definition: PowerLawDefinition): MapRange {
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } = definition;
  return useMemo(
    () => ({ massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu }),
    [massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu],
  );
}

const LimitsAndDetections = memo(function LimitsAndDetections(props: ResultSectionsProps) {
  const { inputs, result, run } = props;
  const place = useRef<HTMLDivElement>(null);
  const { shown } = useCalm(props.followed, { paceMs: PACE_MS, seen: place });
  return (
    <div ref={place} className="grid min-w-0 content-start md:gap-y-8">
      <CalmLimits {...{ inputs, result, run, shown }} />
    </div>
  );
});

type CalmLimitsProps = Pick<ResultSectionsProps, 'inputs' | 'result' | 'run'> & {
  shown: ShownResult;
};

const CalmLimits = memo(function CalmLimits({ inputs, result, run, shown }: CalmLimitsProps) {
  const { quantity, setting } = shown;
  const beside = shown.beside();
  return (
    <>
      <FoldSection
        number={3}
        title="Limits by credible level"
        help="credible-level"
        answer={levelsInWords(shown)}
      >
        <LevelTable
          levels={shown.levels()}
          credibleLevel={setting.credibleLevel}
          quantity={quantity}
          detections={shown.counted.length}
          copyOf={(level, limit) => (
            <ShownStatementCopy
              label="Copy"
              align="right"
              of={`the ${describeLevel(level)} limit`}
              make={async () =>
                documentOfShown({ run, inputs, result, shown, row: { level, limit } })
              }
            />
          )}
          foot={
            <>
              <MassRange definition={setting.definition} />,{' '}
              <AxisRange definition={setting.definition} />;{' '}
              {describePrior(setting.prior, quantity)}.
              {shown.missingColumn !== null && ` There is ${shown.missingColumn}.`}
            </>
          }
        />
        {beside && <BesideTable beside={beside} quantity={quantity} />}
      </FoldSection>
      <DetectionsSection
        companions={inputs.companions}
        undecided={inputs.undecided}
        counted={shown.counted.map(({ name }) => name)}
        outside={shown.outside}
        candidates={shown.candidates}
        ofRun={shown.isLive ? run.number : undefined}
      />
    </>
  );
});

const Stars = memo(function Stars(props: ResultSectionsProps) {
  const { inputs, result, run, sample, followed } = props;
  const place = useRef<HTMLDivElement>(null);
  const { shown } = useCalm(followed, { paceMs: PACE_MS, seen: place });
  return (
    <div ref={place} className="md:mt-8">
      <CalmStars
        inputs={inputs}
        runNumber={run.number}
        result={result}
        sample={sample}
        view={shown.view}
        setting={shown.setting}
        limit={shown.answer.limit}
        quantity={shown.quantity}
        counted={shown.counted}
      />
    </div>
  );
});

function levelsInWords({ levels, quantity }: ShownResult): string {
  const rows = levels();
  return [0.9, 0.99]
    .flatMap((level) => {
      const row = rows.find((one) => Math.abs(one.level - level) < 1e-9);
      const limit = quantity === 'host_fraction' ? row?.hostFraction : row?.meanNumber;
      return limit == null ? [] : [`${formatLimit(limit, quantity)} at ${describeLevel(level)}`];
    })
    .join(', ');
}
