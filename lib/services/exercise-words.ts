import { describeLevel, describePopulation, describePrior } from '@/lib/inference';
import type { Population } from '@/lib/population';
import { formatRate, type RateQuantity } from '@/lib/quantities/display';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { ChangeablePart, StatedLimit } from '@/lib/schemas/exercises';
import { canonicalJson } from '@/models/digest';

/** A run's recipe with the population that it names. */
export interface WordedRecipe {
  recipe: AnalysisRecipe;
  population: Population;
}

export interface RecipeDifference {
  part: ChangeablePart;
  /** 'detections: counted → none' without the arrow: 'detections set aside'. */
  words: string;
}

const quantityOf = ({ likelihood }: AnalysisRecipe): RateQuantity =>
  likelihood === 'host-fraction' ? 'host_fraction' : 'companions_per_star';

const isSame = (a: unknown, b: unknown) => canonicalJson(a ?? null) === canonicalJson(b ?? null);

const priorOf = (recipe: AnalysisRecipe) => describePrior(recipe.prior, quantityOf(recipe));

const starsOf = ({ surveyIds, combination, combinationId, sampleId }: AnalysisRecipe) => ({
  surveyIds: [...surveyIds].sort(),
  combination,
  combinationId,
  sampleId,
});

function candidateWords({ candidates }: AnalysisRecipe): string {
  if (!candidates) return 'candidates set aside';
  return candidates.treatment === 'fixed'
    ? 'candidates counted with their probability'
    : 'candidates counted with a probability that follows the rate';
}

/**
 * What a recipe changed against another, a part at a time, in words.
 *
 * @returns nothing for recipes that ask the same
 */
export function recipeDifferences(from: WordedRecipe, to: WordedRecipe): RecipeDifference[] {
  const [a, b] = [from.recipe, to.recipe];
  const differences: RecipeDifference[] = [];
  const add = (part: ChangeablePart, words: string) => differences.push({ part, words });
  if (a.detections !== b.detections) {
    add('detections', b.detections === 'none' ? 'all detections set aside' : 'detections counted');
  }
  if (a.likelihood !== b.likelihood) {
    add(
      'likelihood',
      `likelihood: ${b.likelihood === 'host-fraction' ? 'host fraction' : 'mean number, Poisson'}`,
    );
  }
  if (!isSame(a.prior, b.prior)) add('prior', `prior: ${priorOf(b)} instead of ${priorOf(a)}`);
  if (a.credibleLevel !== b.credibleLevel) {
    add(
      'level',
      `level: ${describeLevel(b.credibleLevel)} instead of ${describeLevel(a.credibleLevel)}`,
    );
  }
  const isSamePopulation = isSame(from.population, to.population);
  if (!isSamePopulation || a.zeroOutsideMaps !== b.zeroOutsideMaps) {
    add('population', `population: ${describePopulation(to.population)}`);
  }
  if (!isSame(starsOf(a), starsOf(b))) {
    const surveys = b.surveyIds.length === 1 ? '1 survey' : `${b.surveyIds.length} surveys`;
    const sample = isSame(a.sampleId, b.sampleId) ? '' : ', another sample';
    add('stars', `stars: ${surveys} instead of ${a.surveyIds.length}${sample}`);
  }
  if (!isSame(a.candidates, b.candidates)) add('candidates', candidateWords(b));
  if (a.background !== b.background) {
    add(
      'candidates',
      `expected false detections: ${b.background ?? 0} instead of ${a.background ?? 0}`,
    );
  }
  return differences;
}

/** A limit as screens show it, at two digits [%, or planets per 100 stars], and its decimals. */
function shownLimit({ limit }: StatedLimit) {
  const value = Number((100 * limit).toPrecision(2));
  return { value, decimals: Math.max(0, 1 - Math.floor(Math.log10(value) + 1e-12)) };
}

/**
 * How far a limit lies from the reference, or why the two are not compared. The difference is that
 * of the shown numbers, so that whoever subtracts them finds it.
 */
export function limitDifferenceWords(reference: StatedLimit, other: StatedLimit): string {
  if (!reference.isConstrained || !other.isConstrained) return 'one of the two has no limit';
  if (reference.quantity !== other.quantity) return 'another quantity: not compared';
  if (reference.credibleLevel !== other.credibleLevel) return 'another level: not compared';
  const { quantity } = reference;
  if (formatRate(other.limit, quantity) === formatRate(reference.limit, quantity)) {
    return 'no change at 2 digits';
  }
  const [from, to] = [shownLimit(reference), shownLimit(other)];
  const sign = to.value > from.value ? '+' : '−';
  const size = Math.abs(to.value - from.value).toFixed(Math.max(from.decimals, to.decimals));
  return `${sign}${size} ${quantity === 'host_fraction' ? 'points' : 'per 100 stars'}`;
}
