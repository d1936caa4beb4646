import {
  displayRange,
  equalTailedInterval,
  frequentistBeside,
  highestDensityInterval,
  isSetByPrior,
  type Likelihood,
  limitAtLowerFloor,
  type PopulationView,
  type PosteriorCurve,
  posteriorCurve,
  type RatePosterior,
  type RatePrior,
  type RateQuestion,
  ratePosterior,
  sayMissingColumn,
  seenBy,
  TABLE_LEVELS,
  upperLimit,
  viewPopulation,
  whyNoColumn,
} from '@/lib/inference';
import { priorFor } from '@/lib/inference/prior-for';
import { marginalWeights, type Population } from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';

export interface AnswerRunInput {
  /** Shape [star, mass, semiMajorAxis], round(65535 C), in the order of the stars. */
  maps: Uint16Array;
  grid: MapGrid;
  population: Population;
  /** Shape [star] [M_Sun], where the population depends on it. */
  hostMassMsun?: Float64Array;
  likelihood: Likelihood;
  prior: RatePrior;
  credibleLevel: number;
  /** Counted detections, each with the index of its star. */
  detections: { name: string; star: number }[];
  /** Candidates without an answer that count with their probability, and their names. */
  candidates?: RateQuestion['candidates'];
  candidateNames?: string[];
  /** Expected number of false detections among those counted. */
  background?: number;
  /** Per star, the surveys that list it, as indices. */
  surveysOfStar: number[][];
  surveys: number;
}

export interface RateSummary {
  limit: number;
  median: number;
  mean: number;
  interval68: [number, number];
  highestDensity68: [number, number];
  intervalAtLevel: [number, number];
  isSetByPrior: boolean;
  isConstrained: boolean;
  curve: { value: number[]; density: number[]; cumulative: number[]; prior: number[] };
}

export interface LevelRow {
  level: number;
  hostFraction: number | null;
  meanNumber: number | null;
  hostFractionZero: number | null;
  meanNumberZero: number | null;
}

export interface AnswerRunOutput {
  /** Of tabulated systems the probability that any companion is seen, or their mean number. */
  completenessPerStar: number[];
  exposure: number;
  answer: RateSummary;
  zero: RateSummary;
  atTenthOfFloor: number | null;
  /** Where the prior of the fraction ends so that no star's own exceeds 1; null: nowhere. */
  cutAt: number | null;
  levels: LevelRow[];
  /** Why the table has no column for the other quantity; null: it has one. */
  missingColumn: string | null;
  /** Limits without a prior, of the counted detections. */
  beside: {
    rows: {
      name: string;
      /** Null: an upper limit alone. */
      lower: number | null;
      upper: number;
      level: number;
      isApproximate: boolean;
      source: string;
    }[];
    sentence: string;
  };
  /** Averages over the stars, rows of mass. */
  meanMap: number[][];
  /** Per survey: stars for which this population's masses are seen at each semi-major axis. */
  depth: number[][];
}

/** Everything that follows from the maps of a run and its question; sums run in the stars' order. */
export default function answerRun(input: AnswerRunInput): AnswerRunOutput {
  const { maps, grid, population, likelihood, prior, credibleLevel: level } = input;
  const view = viewPopulation(maps, grid, population, input.hostMassMsun);
  const { completeness, exposure } = seenPerStar(view, likelihood);
  refuseUnseen(input, completeness);
  const question = askOf(input, view, likelihood, prior, false);
  const posterior = ratePosterior(question);
  const none = ratePosterior(askOf(input, view, likelihood, prior, true));
  const ranges = [displayRange(posterior), displayRange(none)];
  const range: [number, number] = [
    Math.min(...ranges.map(([from]) => from)),
    Math.max(...ranges.map(([, to]) => to)),
  ];
  return {
    completenessPerStar: [...completeness],
    exposure,
    answer: summarise(posterior, level, range),
    zero: summarise(none, level, range),
    atTenthOfFloor: limitAtLowerFloor(question, level),
    cutAt: posterior.cutAt,
    levels: tabulateLevels(input, view),
    missingColumn: sayMissingColumn(question),
    beside: standBeside(question, level, posterior),
    meanMap: averageMaps(input),
    depth: stackDepth(input),
  };
}

/** What a likelihood works with: of stacked maps it is always known star by star. */
function seenPerStar(view: PopulationView, likelihood: Likelihood) {
  const { completeness, exposure } = seenBy(view, likelihood);
  if (completeness === null) throw new RangeError("a run needs each star's own map");
  return { completeness, exposure };
}

/** The question of a likelihood; with all set aside neither companions nor candidates count. */
function askOf(
  input: AnswerRunInput,
  view: PopulationView,
  likelihood: Likelihood,
  prior: RatePrior,
  isAllSetAside: boolean,
): RateQuestion {
  const { detections, candidates, background } = input;
  const { completeness } = seenPerStar(view, likelihood);
  return {
    likelihood,
    prior,
    completeness,
    detectedStars: isAllSetAside ? [] : detections.map(({ star }) => star),
    ...(view.rateScale !== null && { rateScale: view.rateScale }),
    ...(background !== undefined && { background }),
    ...(candidates && !isAllSetAside && { candidates }),
  };
}

function refuseUnseen(input: AnswerRunInput, completeness: Float64Array): void {
  const { detections, candidates, candidateNames = [] } = input;
  const unseen = detections.find(({ star }) => completeness[star] === 0);
  const check = 'check the map, the ranges or the companion';
  if (unseen) {
    throw new RangeError(
      `${unseen.name} was detected where the map of its star says nothing can be seen: ${check}`,
    );
  }
  const lost = candidates?.entries.findIndex(
    ({ star, probability }) => probability > 0 && completeness[star] === 0,
  );
  if (lost === undefined || lost < 0) return;
  throw new RangeError(
    `The candidate ${candidateNames[lost]} was found where the map of its star says nothing can be ` +
      `seen: ${check}, or set candidates aside`,
  );
}

function standBeside(
  question: RateQuestion,
  level: number,
  posterior: RatePosterior,
): AnswerRunOutput['beside'] {
  const { rows, sentence } = frequentistBeside(question, level, posterior);
  return {
    rows: rows.map(({ sides, lower, name, upper, isApproximate, source }) => ({
      name,
      lower: sides === 'one-sided' ? null : lower,
      upper,
      level,
      isApproximate,
      source,
    })),
    sentence,
  };
}

const CURVE_POINTS = 400;

function summarise(posterior: RatePosterior, level: number, range: [number, number]): RateSummary {
  return {
    limit: upperLimit(posterior, level),
    median: posterior.median,
    mean: posterior.mean,
    interval68: equalTailedInterval(posterior, 0.68),
    highestDensity68: highestDensityInterval(posterior, 0.68),
    intervalAtLevel: equalTailedInterval(posterior, level),
    isSetByPrior: isSetByPrior(posterior, level),
    isConstrained: posterior.constrained,
    curve: drawable(posteriorCurve(posterior, CURVE_POINTS, range), posterior),
  };
}

/** As JSON can hold it: an improper prior has no curve, an infinite end is drawn from inside it. */
function drawable(curve: PosteriorCurve, posterior: RatePosterior): RateSummary['curve'] {
  const { value, density, cumulative, priorDensity } = curve;
  const step = value[2] - value[1];
  const isImproper = priorDensity.every(Number.isNaN);
  const inside = (x: number, i: number) =>
    posterior.priorDensity(i === 0 ? x + 0.25 * step : x - 0.25 * step);
  return {
    value: [...value],
    density: [...density],
    cumulative: [...cumulative],
    prior: isImproper
      ? []
      : [...priorDensity].map((p, i) => (Number.isNaN(p) ? inside(value[i], i) : p)),
  };
}

function tabulateLevels(input: AnswerRunInput, view: PopulationView): LevelRow[] {
  const { prior, credibleLevel } = input;
  const posteriorOf = (likelihood: Likelihood, isAllSetAside: boolean) => {
    const own = priorFor(prior, likelihood);
    if (own === null) return null;
    const question = askOf(input, view, likelihood, own, isAllSetAside);
    const isOther = likelihood !== input.likelihood;
    if (isOther && whyNoColumn(question, likelihood) !== null) return null;
    return ratePosterior(question);
  };
  const fraction = posteriorOf('host-fraction', false);
  const fractionZero = posteriorOf('host-fraction', true);
  const number = posteriorOf('mean-number', false);
  const numberZero = posteriorOf('mean-number', true);
  const limit = (posterior: RatePosterior | null, level: number) =>
    posterior && upperLimit(posterior, level);
  return [...new Set([...TABLE_LEVELS, credibleLevel])]
    .sort((a, b) => a - b)
    .map((level) => ({
      level,
      hostFraction: limit(fraction, level),
      meanNumber: limit(number, level),
      hostFractionZero: limit(fractionZero, level),
      meanNumberZero: limit(numberZero, level),
    }));
}

function averageMaps({ maps, grid }: AnswerRunInput): number[][] {
  const rows = grid.massMjup.length;
  const columns = grid.semiMajorAxisAu.length;
  const size = rows * columns;
  const stars = maps.length / size;
  // Whole numbers: the sum is exact, whatever its order.
  const sum = new Float64Array(size);
  for (let i = 0; i < maps.length; i++) sum[i % size] += maps[i];
  return Array.from({ length: rows }, (_, row) =>
    Array.from(sum.subarray(row * columns, (row + 1) * columns), (s) => s / (65_535 * stars)),
  );
}

/** A star that several surveys list is shared out among them, so that the stack counts it once. */
function stackDepth(input: AnswerRunInput): number[][] {
  const { maps, grid, population, hostMassMsun, surveysOfStar, surveys } = input;
  const perHost = population.form === 'mass-ratio' ? hostMassMsun : undefined;
  const massesFor = massWeights(grid, population);
  const rows = grid.massMjup.length;
  const columns = grid.semiMajorAxisAu.length;
  const depth = Array.from({ length: surveys }, () => new Array<number>(columns).fill(0));
  surveysOfStar.forEach((own, star) => {
    const { mass, whole } = massesFor(perHost?.[star]);
    if (whole === 0) return;
    for (let column = 0; column < columns; column++) {
      let seen = 0;
      for (let row = 0; row < rows; row++) {
        seen += mass[row] * maps[(star * rows + row) * columns + column];
      }
      const share = seen / (65_535 * whole * own.length);
      for (const survey of own) depth[survey][column] += share;
    }
  });
  return depth;
}

/** How the population's masses lie on the grid, for each host mass once. */
function massWeights(grid: MapGrid, population: Population) {
  const known = new Map<number | undefined, { mass: Float64Array; whole: number }>();
  return (host: number | undefined) => {
    const found = known.get(host);
    if (found) return found;
    const { mass } = marginalWeights(grid, population, host);
    const made = { mass, whole: mass.reduce((a, b) => a + b, 0) };
    known.set(host, made);
    return made;
  };
}
