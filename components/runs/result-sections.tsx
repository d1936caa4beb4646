'use client';

import { memo } from 'react';
import type { DepthSeries } from '@/components/charts/depth-chart';
import type { MapData } from '@/components/charts/map-contours';
import { AxisRange, MassRange } from '@/components/populations/law-notation';
import { documentOfShown } from '@/components/statement/document-of-shown';
import { ShownStatementCopy } from '@/components/statement/statement-copy';
import { FoldSection } from '@/components/ui/fold-section';
import { describeLevel, describePrior } from '@/lib/inference';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { RunInputs, RunResult, RunView } from '@/lib/schemas/runs';
import { BesideTable } from './beside-table';
import { DetectionsSection } from './detections-section';
import { LevelTable, percentBelow } from './level-table';
import type { LiveSample } from './live-sample';
import { SensitivitySection } from './sensitivity-section';
import type { ShownResult } from './shown-result';
import { StarsSection } from './stars-section';

interface ResultSectionsProps {
  inputs: RunInputs;
  result: RunResult;
  run: RunView;
  sample?: LiveSample;
  shown: ShownResult;
  map: MapData;
  depth: DepthSeries[];
  /** The ranges as they are now, in the map's box. */
  definition: PowerLawDefinition;
  onDefinition(definition: PowerLawDefinition): void;
}

/**
 * Sections 2 to 5. They hold thousands of marks, so they follow a drag with lower priority than
 * the number and its curve.
 */
export const ResultSections = memo(function ResultSections(props: ResultSectionsProps) {
  const { inputs, result, run, sample, shown, map, depth, definition } = props;
  const { quantity, setting } = shown;
  const beside = shown.beside();
  const ofRun = shown.isLive ? run.number : undefined;
  return (
    <>
      <div className="grid min-w-0 gap-x-[60px] md:gap-y-8 xl:grid-cols-[minmax(0,780fr)_minmax(0,520fr)]">
        <SensitivitySection
          map={map}
          stars={result.stars}
          exposure={shown.exposure}
          depth={depth}
          range={definition}
          companions={inputs.companions}
          onRange={(range) => props.onDefinition({ ...definition, ...range })}
        />
        <div className="grid min-w-0 content-start md:gap-y-8">
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
            ofRun={ofRun}
          />
        </div>
      </div>
      <div className="md:mt-8">
        <StarsSection
          inputs={inputs}
          result={result}
          sample={sample}
          view={shown.view}
          setting={setting}
          limit={shown.answer.limit}
          quantity={quantity}
          counted={shown.counted}
        />
      </div>
    </>
  );
});

function levelsInWords({ levels, quantity }: ShownResult): string {
  const rows = levels();
  return [0.9, 0.99]
    .flatMap((level) => {
      const row = rows.find((one) => Math.abs(one.level - level) < 1e-9);
      const limit = quantity === 'host_fraction' ? row?.hostFraction : row?.meanNumber;
      return row ? [`${percentBelow(limit ?? null)}\u2009% at ${describeLevel(level)}`] : [];
    })
    .join(', ');
}
