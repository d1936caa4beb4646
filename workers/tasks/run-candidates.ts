import { InputError } from '@/lib/errors';
import {
  type CountedCandidate,
  candidateTreatment,
  countCandidates,
  type OpenCandidate,
  type RateQuestion,
  type StatedCandidates,
  setAside,
} from '@/lib/inference';
import type { Population } from '@/lib/population';
import { listFirst } from '@/lib/queue/preconditions';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunInputs, RunResult } from '@/lib/schemas/runs';
import type { Sample } from './run-sample';

/** The candidates without an answer as a run treats them. */
export interface RunCandidates {
  /** As the posterior takes them; undefined: none counts. */
  treatment: RateQuestion['candidates'];
  counted: CountedCandidate[];
  /** As the result keeps them; null: set aside. */
  kept: RunResult['candidates'];
  /** For the conditions; undefined where the sample has none at all. */
  stated: StatedCandidates | undefined;
}

/** Candidates of stored inputs, each with the index of its star; older runs kept no star. */
export function openCandidatesOf(inputs: Pick<RunInputs, 'stars' | 'undecided'>): OpenCandidate[] {
  const starOf = new Map(inputs.stars.map(({ starId }, star) => [starId, star]));
  return inputs.undecided.flatMap((one): OpenCandidate[] => {
    const star = starOf.get(one.starId ?? '');
    if (star === undefined) return [];
    const { name, probability = null, massMjup = null, semiMajorAxisAu = null } = one;
    return [{ name, star, probability, massMjup, semiMajorAxisAu }];
  });
}

function refused(reason: unknown): unknown {
  return reason instanceof RangeError
    ? new InputError({ code: 'candidate-incomplete', message: reason.message })
    : reason;
}

/**
 * Which candidates count, by the recipe.
 *
 * @throws InputError that names a candidate of which mass, semi-major axis or probability is missing
 */
export function treatCandidates(
  inputs: RunInputs,
  population: Population,
  recipe: AnalysisRecipe,
  hostMassMsun: Float64Array | undefined,
): RunCandidates {
  const { candidates, detections } = recipe;
  if (!candidates || detections === 'none') {
    return { treatment: undefined, counted: [], kept: null, stated: setAside(inputs.undecided) };
  }
  const open = openCandidatesOf(inputs);
  let counted: CountedCandidate[];
  try {
    counted = countCandidates(open, population, hostMassMsun);
  } catch (reason) {
    throw refused(reason);
  }
  const referenceRate = candidates.treatment === 'fixed' ? null : candidates.referenceRate;
  return {
    treatment: candidateTreatment({ ...candidates, open }, counted),
    counted,
    kept: {
      treatment: candidates.treatment,
      referenceRate,
      entries: counted.map(({ name, star, probability }) => ({
        name,
        star: inputs.stars[star].name,
        probability,
      })),
    },
    stated: { treatment: candidates.treatment, referenceRate, entries: counted },
  };
}

/** Says so where maps are cut at candidates that the limit counts as well; null where not. */
export function warnCutAndCounted(sample: Sample, { counted }: RunCandidates): string | null {
  if (counted.length === 0) return null;
  const starIds = new Set(counted.map(({ star }) => sample.stars[star].starId));
  const cutting = sample.surveys.filter(
    (survey) =>
      survey.recipe.settings.candidates &&
      sample.stars.some(
        ({ starId, entries }) =>
          starIds.has(starId) &&
          entries.some((entry) => entry.survey === survey && entry.map.origin === 'computed'),
      ),
  );
  if (cutting.length === 0) return null;
  const names = listFirst(cutting.map(({ row }) => row.name));
  return (
    `Candidates cut and counted: the maps of ${names} are cut where candidates without an answer lie, ` +
    'and this limit counts them too; use one of the two'
  );
}
