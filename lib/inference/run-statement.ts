import type { Population } from '@/lib/population';
import type { RateQuantity } from '@/lib/quantities/display';
import type { RatePrior } from './contract';
import { type KeptCandidate, type StatedCandidates, setAside } from './open-candidates';
import { priorFor } from './prior-for';
import { type Condition, priorTop } from './statement';
import type { DocumentInputs, StatedRun } from './statement-document';

interface StatedAnswer {
  limit: number;
  interval68: [number, number];
  isSetByPrior: boolean;
  isConstrained: boolean;
}

/** What a finished run holds that its statements are made from. */
export interface RunToState {
  run: StatedRun;
  population: Population;
  recipe: { prior: RatePrior; detections: 'counted' | 'none' };
  inputs: {
    combination: string;
    cooling: string;
    eccentricity: string;
    threshold: string;
    surveys: readonly { name: string }[];
    undecided: readonly KeptCandidate[];
  };
  result: {
    quantity: RateQuantity;
    credibleLevel: number;
    stars: number;
    entries: number;
    exposure: number;
    answer: StatedAnswer;
    zero: StatedAnswer;
    counted: readonly { starId: string }[];
    candidates: StatedCandidates | null;
    background: number | null;
    priorCutAt: number | null;
    shareOutsideMaps: number;
    levels: readonly {
      level: number;
      hostFraction: number | null;
      meanNumber: number | null;
      hostFractionZero: number | null;
      meanNumberZero: number | null;
    }[];
    statement: { conditions: readonly string[] };
  };
}

/** Which of a run's limits is stated; what is left out is the run's own. */
export interface StatedChoice {
  /** [fraction], one of those that the run recorded. */
  level?: number;
  quantity?: RateQuantity;
  /** 'none': the same sample with all detections set aside. */
  detections?: 'counted' | 'none';
}

const SAME_LEVEL = 1e-9;
const columns = {
  host_fraction: { counted: 'hostFraction', none: 'hostFractionZero' },
  companions_per_star: { counted: 'meanNumber', none: 'meanNumberZero' },
} as const;

/** How detections enter, in words. */
export function countingWords(
  {
    recipe,
    result,
  }: Pick<RunToState, 'recipe'> & { result: Pick<RunToState['result'], 'candidates'> },
  isZero: boolean,
  quantity: RateQuantity,
): string {
  if (isZero || recipe.detections === 'none') return 'all detections set aside';
  const confirmed =
    quantity === 'host_fraction'
      ? 'confirmed companions inside the ranges, one per star'
      : 'confirmed companions inside the ranges, every one';
  return result.candidates
    ? `${confirmed}; candidates without an answer by their probability`
    : confirmed;
}

const conditionOf = (text: string): Condition => {
  const at = text.indexOf(': ');
  return at < 0 ? { label: 'Note', text } : { label: text.slice(0, at), text: text.slice(at + 2) };
};

/**
 * One of a finished run's recorded limits, ready to be stated.
 *
 * @returns null where the run recorded no such limit: another level, or no prior for the quantity
 * Edges: a run that constrains nothing has a statement without a number.
 */
export function stateRun(stated: RunToState, choice: StatedChoice = {}): DocumentInputs | null {
  const { result, recipe, inputs, population, run } = stated;
  const quantity = choice.quantity ?? result.quantity;
  const level = choice.level ?? result.credibleLevel;
  const isZero = choice.detections === 'none' && recipe.detections !== 'none';
  const isOwn = quantity === result.quantity && Math.abs(level - result.credibleLevel) < SAME_LEVEL;
  const answer = isZero ? result.zero : result.answer;
  const row = result.levels.find((one) => Math.abs(one.level - level) < SAME_LEVEL);
  const limit = isOwn ? answer.limit : row?.[columns[quantity][isZero ? 'none' : 'counted']];
  const prior =
    quantity === result.quantity
      ? recipe.prior
      : priorFor(recipe.prior, quantity === 'host_fraction' ? 'host-fraction' : 'mean-number');
  if (limit === undefined || limit === null || prior === null) return null;
  const hosts = new Set(result.counted.map(({ starId }) => starId)).size;
  const found = quantity === 'host_fraction' ? hosts : result.counted.length;
  const detections = isZero || recipe.detections === 'none' ? 0 : found;
  const candidates = (isZero ? null : result.candidates) ?? setAside(inputs.undecided);
  const hasInterval = quantity === result.quantity && detections > 0;
  return {
    state: 'recorded',
    run,
    surveys: inputs.surveys.map(({ name }) => name),
    entries: result.entries,
    countingRule: countingWords(stated, isZero, quantity),
    further: result.statement.conditions.map(conditionOf).filter(({ label }) => !OWN.has(label)),
    quantity,
    limit,
    credibleLevel: level,
    population,
    prior,
    detections,
    stars: result.stars,
    exposure: result.exposure,
    combinationRule: inputs.combination,
    cooling: inputs.cooling,
    eccentricity: inputs.eccentricity,
    threshold: inputs.threshold,
    shareOutside: Math.max(result.shareOutsideMaps, 0),
    constrained: answer.isConstrained,
    setByPrior: isOwn ? answer.isSetByPrior : limit > 0.9 * level * priorTop(prior, quantity),
    cutAt: quantity === result.quantity ? result.priorCutAt : null,
    ...(candidates && { candidates }),
    background: quantity === 'companions_per_star' ? result.background : null,
    ...(hasInterval && {
      interval: {
        kind: 'equal-tailed' as const,
        low: answer.interval68[0],
        high: answer.interval68[1],
        level: 0.68,
      },
    }),
  };
}

/** Conditions of the run's own limit, which another level or quantity words anew. */
const OWN = new Set(['Interval', 'Limit', 'Table of limits', 'Largest rate', 'Candidates']);
