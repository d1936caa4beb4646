import type { Population } from '@/lib/population';
import { SHARE_OUTSIDE_WARNING } from '@/lib/population';
import {
  formatInterval,
  formatPercent,
  formatPlain,
  formatRate,
  formatSignificant,
  type RateQuantity,
  THIN_SPACE,
} from '@/lib/quantities/display';
import type { RatePrior } from './contract';
import { describeBackground, describeCandidates, type StatedCandidates } from './open-candidates';
import {
  describePlanet,
  describePlanets,
  describePopulation,
  describeStars,
  populationConditions,
} from './population-words';

/** Everything that a limit rests on; texts in plain words, without a full stop. */
export interface StatementInputs {
  quantity: RateQuantity;
  limit: number;
  /** [fraction]. */
  credibleLevel: number;
  population: Population;
  prior: RatePrior;
  /** Detections that count. */
  detections: number;
  stars: number;
  /** S [stars]. */
  exposure: number;
  /** How a star in several surveys enters. */
  combinationRule: string;
  cooling: string;
  eccentricity: string;
  threshold: string;
  /** Share of the population outside the maps or the cooling tables [fraction]. */
  shareOutside: number;
  constrained: boolean;
  setByPrior: boolean;
  interval?: StatedInterval;
  /** Where the prior of f ends because the rate scales with the host's mass; null or left out: nowhere. */
  cutAt?: number | null;
  /** Candidates without an answer; left out: there are none, or they are not known. */
  candidates?: StatedCandidates;
  /** b, expected number of false detections among those counted. */
  background?: number | null;
}

/** An interval quoted beside the limit once something was detected. */
export interface StatedInterval {
  kind: 'equal-tailed' | 'highest-density';
  low: number;
  high: number;
  /** [fraction]. */
  level: number;
}

/** One condition of a limit, its label apart for lists in two columns. */
export interface Condition {
  label: string;
  text: string;
}

export interface Statement {
  sentence: string;
  /** The conditions as sentences: 'label: text'. */
  conditions: string[];
  entries: Condition[];
}

/** A level as people write it: 95 %, 99.7 %. */
export function describeLevel(level: number): string {
  return `${formatPlain(100 * level, 6)}${THIN_SPACE}%`;
}

const rateName = (quantity: RateQuantity): string =>
  quantity === 'host_fraction' ? 'host fraction f' : 'mean number of planets per star F';

/** A prior with its range, in words. */
export function describePrior(prior: RatePrior, quantity: RateQuantity): string {
  const rate = rateName(quantity);
  switch (prior.law) {
    case 'uniform':
      return `uniform in ${rate}, 0 to ${formatPlain(prior.max)}`;
    case 'log-uniform':
      return `uniform in the logarithm of ${rate}, ${formatPlain(prior.min)} to ${formatPlain(prior.max)}`;
    case 'jeffreys': {
      const top = prior.max ?? (quantity === 'host_fraction' ? 1 : undefined);
      const range = top === undefined ? 'no upper end' : `0 to ${formatPlain(top)}`;
      return `Jeffreys for ${rate}, ${range}`;
    }
    case 'gamma':
      return `gamma for ${rate}, shape ${formatPlain(prior.shape)}, rate ${formatPlain(prior.rate)} stars`;
    case 'beta':
      return `beta for ${rate}, a = ${formatPlain(prior.a)}, b = ${formatPlain(prior.b)}`;
    case 'tabulated': {
      const [low, top] = [prior.value[0], prior.value[prior.value.length - 1]];
      const from = prior.source === undefined ? '' : ` (${prior.source})`;
      return (
        `tabulated for ${rate}${from}, straight between ${prior.value.length} points, ` +
        `${formatPlain(low)} to ${formatPlain(top)}`
      );
    }
  }
}

/** The range of a prior alone, for heads of tables; its largest rate, or Infinity. */
export function priorTop(prior: RatePrior, quantity: RateQuantity): number {
  if (prior.law === 'uniform' || prior.law === 'log-uniform') return prior.max;
  if (prior.law === 'jeffreys' && prior.max !== undefined) return prior.max;
  if (prior.law === 'tabulated') return prior.value[prior.value.length - 1];
  return quantity === 'host_fraction' ? 1 : Number.POSITIVE_INFINITY;
}

/** The sentence that a result is read as: the number, what it counts, the level in brackets. */
function describeNumber(inputs: StatementInputs): string {
  const { quantity, limit, credibleLevel, population } = inputs;
  const planets = describePlanets(population);
  if (!inputs.constrained) return `These data do not constrain ${planets}`;
  const level = describeLevel(credibleLevel);
  const stars = describeStars(population);
  if (quantity === 'host_fraction') {
    const share = formatRate(limit, quantity);
    const one = population.form === 'systems' ? 'one' : 'at least one';
    return `<${share} of ${stars} host ${one} ${describePlanet(population)} (${level})`;
  }
  return `<${formatSignificant(100 * limit, 2)} ${planets} per 100 ${stars} (${level})`;
}

function describeInterval(interval: StatedInterval, quantity: RateQuantity): string {
  const range = formatInterval(interval.low, interval.high, quantity);
  const kind =
    interval.kind === 'equal-tailed'
      ? 'equal probability on each side'
      : `shortest in the ${rateName(quantity)}, not in its logarithm`;
  return `${range} (${describeLevel(interval.level)}, ${kind})`;
}

function describeShareOutside(share: number): string {
  const lies = `${formatPercent(share)} of this population lies outside the maps or tables`;
  const counts = 'where nothing counts as detectable';
  return share > SHARE_OUTSIDE_WARNING
    ? `${lies}, ${counts}: a large part of the limit rests on that`
    : `${lies}, ${counts}`;
}

function describeSetByPrior(inputs: StatementInputs): string {
  const top = priorTop(inputs.prior, inputs.quantity);
  const alone = formatRate(inputs.credibleLevel * top, inputs.quantity);
  return (
    `set by the prior, not by the data: ${describeLevel(inputs.credibleLevel)} of the prior's ` +
    `upper end is ${alone}`
  );
}

/** What stands beside the detections: candidates without an answer, and a known background. */
function companionConditions({ candidates, background }: StatementInputs): Condition[] {
  const entries: Condition[] = [];
  if (candidates !== undefined) {
    entries.push({ label: 'Candidates', text: describeCandidates(candidates) });
  }
  if (background) entries.push({ label: 'Background', text: describeBackground(background) });
  return entries;
}

function listConditions(inputs: StatementInputs): Condition[] {
  const { quantity, stars, detections } = inputs;
  const likelihood =
    quantity === 'host_fraction'
      ? `host fraction, one trial for each of ${stars} stars, a star counts once`
      : `mean number of planets per star, Poisson over ${stars} stars`;
  const found = detections === 0 ? 'none' : `${detections} inside the ranges`;
  const entries: Condition[] = [
    { label: 'Credible level', text: describeLevel(inputs.credibleLevel) },
    { label: 'Prior', text: describePrior(inputs.prior, quantity) },
    { label: 'Population', text: describePopulation(inputs.population) },
    ...populationConditions(inputs.population, quantity === 'host_fraction', inputs.cutAt ?? null),
    { label: 'Likelihood', text: likelihood },
    { label: 'Detections', text: found },
    ...companionConditions(inputs),
    {
      label: 'Exposure',
      text: `${formatSignificant(inputs.exposure, 3)} of ${stars} stars, the sum of mean detection probabilities`,
    },
    { label: 'Stars in several surveys', text: inputs.combinationRule },
    { label: 'Cooling', text: inputs.cooling },
    { label: 'Eccentricity', text: inputs.eccentricity },
    { label: 'Threshold', text: inputs.threshold },
  ];
  if (inputs.interval !== undefined && inputs.constrained) {
    entries.push({ label: 'Interval', text: describeInterval(inputs.interval, quantity) });
  }
  if (inputs.shareOutside > 0) {
    entries.push({ label: 'Outside', text: describeShareOutside(inputs.shareOutside) });
  }
  if (!inputs.constrained) {
    entries.push({ label: 'Limit', text: 'none: the posterior is the prior' });
  } else if (inputs.setByPrior) {
    entries.push({ label: 'Limit', text: describeSetByPrior(inputs) });
  }
  return entries;
}

/**
 * A result in words, with everything that it rests on.
 *
 * @returns the sentence, and the conditions one by one
 * Edges: where the data constrain nothing the sentence says so and names no number.
 * @example describeLimit(inputs).sentence
 * // '<5.8 % of stars host at least one planet of 2–30 MJ at 20–300 AU (95 %)'
 */
export function describeLimit(inputs: StatementInputs): Statement {
  const entries = listConditions(inputs);
  return {
    sentence: describeNumber(inputs),
    conditions: entries.map(({ label, text }) => `${label}: ${text}`),
    entries,
  };
}
