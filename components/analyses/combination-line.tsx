import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { CombinationView } from '@/lib/schemas/combinations';

/** Whether surveys and rule are still those of the stored combination. */
export function isSameCombination(
  { definition }: CombinationView,
  surveyIds: string[],
  rule: AnalysisRecipe['combination'],
): boolean {
  return (
    definition.rule === rule &&
    [...definition.surveyIds].sort().join() === [...surveyIds].sort().join()
  );
}

interface CombinationLineProps {
  stored: CombinationView;
  isUsed: boolean;
}

/** The stored combination that the analysis rests on, or that it no longer does. */
export function CombinationLine({ stored, isUsed }: CombinationLineProps) {
  const { key, version, name, words } = stored;
  return (
    <p className="mt-3 max-w-[40rem] text-note" aria-live="polite">
      {isUsed ? (
        <>
          <b>
            {key} version {version}, {name}
          </b>
          : {words}.
        </>
      ) : (
        <span className="text-warn">
          Surveys or rule differ from {key} version {version}: the analysis goes without it, and
          without rules of single stars.
        </span>
      )}
    </p>
  );
}
