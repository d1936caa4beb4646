import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { FoldSection } from '@/components/ui/fold-section';
import { describeLevel, describePrior } from '@/lib/inference';
import type { ListedDefinition } from '@/lib/schemas/populations';
import type { DrawnInputs, DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import { BesideTable } from './beside-table';
import { DetectionsSection } from './detections-section';
import { LevelTable } from './level-table';
import { recipeOfRun } from './run-recipe';
import { SensitivitySection } from './sensitivity-section';
import { storedCandidates } from './shown-result';
import { StarsSection } from './stars-section';
import { useStoredMap } from './use-map-figures';

interface StoredSectionsProps {
  collaboration: string;
  run: DrawnRun;
  definition: ListedDefinition;
  inputs: DrawnInputs;
  result: DrawnResult;
}

/** Sections 2 to 5 of a recorded result, from what its run stored. */
export function StoredSections(props: StoredSectionsProps) {
  const { collaboration, run, definition, inputs, result } = props;
  const { quantity, credibleLevel, counted, answer } = result;
  const { map, depth } = useStoredMap(result, inputs);
  const prior = recipeOfRun(run)?.prior;
  const outside = result.outside.map(({ name }) => name);
  return (
    <>
      <div className="grid min-w-0 gap-x-[60px] md:gap-y-8 xl:grid-cols-[minmax(0,780fr)_minmax(0,520fr)]">
        <SensitivitySection
          map={map}
          stars={result.stars}
          exposure={result.exposure}
          depth={depth}
          range={rangeOf(definition)}
          companions={inputs.companions}
          counted={counted}
        />
        <div className="grid min-w-0 content-start md:gap-y-8">
          <FoldSection
            number={3}
            title="Limits by credible level"
            help="credible-level"
            answer={`recorded by run ${run.number}, with ${describeLevel(credibleLevel)} on the plate`}
          >
            <LevelTable
              levels={result.levels}
              credibleLevel={credibleLevel}
              quantity={quantity}
              detections={counted.length}
              copyOf={(level) => (
                <RecordedStatementCopy
                  label="Copy"
                  align="right"
                  of={`the ${describeLevel(level)} limit`}
                  collaboration={collaboration}
                  runId={run.id}
                  choice={{ level }}
                />
              )}
              foot={
                <>
                  Population and ranges as on the plate
                  {prior && `; ${describePrior(prior, quantity)}`}.
                </>
              }
            />
            {result.beside && <BesideTable beside={result.beside} quantity={quantity} />}
          </FoldSection>
          <DetectionsSection
            companions={inputs.companions}
            undecided={inputs.undecided}
            counted={counted.map(({ name }) => name)}
            outside={outside}
            candidates={storedCandidates(inputs, result)}
          />
        </div>
      </div>
      <div className="md:mt-8">
        <StarsSection
          inputs={inputs}
          result={result}
          limit={answer.limit}
          quantity={quantity}
          counted={counted}
        />
      </div>
    </>
  );
}

/** The box of masses and axes; none where the masses depend on the star. */
function rangeOf(definition: ListedDefinition) {
  if (definition.form === 'mass-ratio') return undefined;
  const { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu } = definition;
  return { massMinMjup, massMaxMjup, semiMajorAxisMinAu, semiMajorAxisMaxAu };
}
