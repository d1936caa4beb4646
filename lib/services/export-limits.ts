import {
  type CsvColumn,
  type LatexStyle,
  type LatexTable,
  writeCsv,
  writeLatexTable,
} from '@/lib/formats';
import {
  describeCandidates,
  describeLevel,
  describePopulation,
  describePrior,
  type RatePrior,
} from '@/lib/inference';
import { priorFor } from '@/lib/inference/prior-for';
import { type Population, type PopulationBox, populationBox } from '@/lib/population';
import { formatSignificant } from '@/lib/quantities/display';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { RunInputs, RunResult } from '@/lib/schemas/runs';

/** A finished run with what its files need beside it. */
export interface FinishedRun {
  analysis: string;
  number: number;
  recipe: AnalysisRecipe;
  population: Population;
  inputs: RunInputs;
  result: RunResult;
  resultDigest: string;
  engineVersion: string;
}

/** Every file of a run that is not frozen says so. */
export const STATE = 'draft';

type Quantity = RunResult['quantity'];

type StatedRange = { [Edge in keyof PopulationBox]: number | null };

/** The ranges of a run's population; those of masses stay empty where they differ from star to star. */
function statedRange(population: Population): StatedRange {
  if (population.form !== 'mass-ratio') return populationBox(population);
  const { semiMajorAxisMinAu, semiMajorAxisMaxAu } = population;
  return { massMinMjup: null, massMaxMjup: null, semiMajorAxisMinAu, semiMajorAxisMaxAu };
}

/** How detections enter, in words. */
export function countingRule(run: FinishedRun, isZero: boolean, quantity: Quantity): string {
  if (isZero || run.recipe.detections === 'none') return 'all detections set aside';
  const confirmed =
    quantity === 'host_fraction'
      ? 'confirmed companions inside the ranges, one per star'
      : 'confirmed companions inside the ranges, every one';
  return run.result.candidates
    ? `${confirmed}; candidates without an answer by their probability`
    : confirmed;
}

/** What became of candidates without an answer, where candidates can count at all. */
function candidateWords({ result }: FinishedRun, isZero: boolean): string {
  const { candidates } = result;
  return isZero || candidates === null ? 'set aside' : describeCandidates(candidates);
}

export function countedDetections(run: FinishedRun, isZero: boolean, quantity: Quantity): number {
  if (isZero) return 0;
  const { counted } = run.result;
  return quantity === 'host_fraction'
    ? new Set(counted.map(({ starId }) => starId)).size
    : counted.length;
}

interface Row {
  quantity: Quantity;
  isZero: boolean;
  interval: 'upper_limit' | 'central' | 'highest_density';
  level: number;
  lower: number | null;
  estimate: number | null;
  upper: number;
}

/** The recipe's prior as it stands for a quantity; the other one has it cut at 1 or not at all. */
function priorText(run: FinishedRun, quantity: Quantity): string {
  const likelihood = quantity === 'host_fraction' ? 'host-fraction' : 'mean-number';
  const prior: RatePrior | null = priorFor(run.recipe.prior, likelihood);
  return prior ? describePrior(prior, quantity) : '';
}

function limitRows(run: FinishedRun): Row[] {
  const { result } = run;
  const columns = [
    ['host_fraction', false, 'hostFraction'],
    ['companions_per_star', false, 'meanNumber'],
    ['host_fraction', true, 'hostFractionZero'],
    ['companions_per_star', true, 'meanNumberZero'],
  ] as const;
  return columns.flatMap(([quantity, isZero, field]) => {
    const answer = isZero ? result.zero : result.answer;
    const estimate = quantity === result.quantity ? answer.median : null;
    return result.levels.flatMap((row): Row[] => {
      const upper = row[field];
      if (upper === null) return [];
      const { level } = row;
      return [{ quantity, isZero, interval: 'upper_limit', level, lower: null, estimate, upper }];
    });
  });
}

function intervalRows({ result }: FinishedRun): Row[] {
  return [false, true].flatMap((isZero) => {
    const answer = isZero ? result.zero : result.answer;
    const row = (
      interval: Row['interval'],
      level: number,
      [lower, upper]: [number, number],
    ): Row => ({
      quantity: result.quantity,
      isZero,
      interval,
      level,
      lower,
      estimate: answer.median,
      upper,
    });
    return [
      row('central', 0.68, answer.interval68),
      row('highest_density', 0.68, answer.highestDensity68),
      row('central', result.credibleLevel, answer.intervalAtLevel),
    ];
  });
}

/** Limits and intervals, one row per quantity, counting rule and level. */
export function writeLimitsCsv(run: FinishedRun): string {
  const rows = [...limitRows(run), ...intervalRows(run)];
  const { result, inputs, population, recipe } = run;
  const range = statedRange(population);
  const same = (name: string, value: string | number | null): CsvColumn => ({
    name,
    values: rows.map(() => value),
  });
  const each = (name: string, value: (row: Row) => string | number | null): CsvColumn => ({
    name,
    values: rows.map(value),
  });
  return writeCsv([
    same('analysis', run.analysis),
    same('subset', inputs.surveys.map(({ slug }) => slug).join(' + ')),
    each('likelihood', ({ quantity }) =>
      quantity === 'host_fraction' ? 'host-fraction' : 'mean-number',
    ),
    same('population', `${inputs.population.key} version ${inputs.population.version}`),
    each('rate_prior', ({ quantity }) => priorText(run, quantity)),
    same('mass_min', range.massMinMjup),
    same('mass_max', range.massMaxMjup),
    same('semi_major_axis_min', range.semiMajorAxisMinAu),
    same('semi_major_axis_max', range.semiMajorAxisMaxAu),
    each('quantity', ({ quantity }) => quantity),
    each('interval', ({ interval }) => interval),
    each('credible_level', ({ level }) => level),
    each('lower', ({ lower }) => lower),
    each('estimate', ({ estimate }) => estimate),
    each('upper', ({ upper }) => upper),
    // Every number is an integral: there is no Monte Carlo error.
    each('mcse', () => null),
    same('n_targets', result.stars),
    each('n_companions', ({ isZero, quantity }) => countedDetections(run, isZero, quantity)),
    same('effective_targets', result.exposure),
    same('run', run.number),
    same('engine_version', run.engineVersion),
    each('counting_rule', ({ isZero, quantity }) => countingRule(run, isZero, quantity)),
    each('candidates', ({ isZero }) => candidateWords(run, isZero)),
    same('background', result.background),
    each('prior_cut_at', ({ quantity }) =>
      quantity === result.quantity ? result.priorCutAt : null,
    ),
    same('combination', inputs.combination),
    same('credible_level_of_run', recipe.credibleLevel),
    same('run_digest', run.resultDigest),
    same('state', STATE),
  ]);
}

/** Posterior of the run's quantity on a grid; what it rests on stands in every row. */
export function writePosteriorCsv(run: FinishedRun): string {
  const { result, inputs, population } = run;
  const range = statedRange(population);
  const { value, density, cumulative } = result.answer.curve;
  const same = (name: string, text: string | number | null): CsvColumn => ({
    name,
    values: value.map(() => text),
  });
  return writeCsv([
    same('quantity', result.quantity),
    { name: 'value', values: value },
    { name: 'density', values: density },
    { name: 'cumulative', values: cumulative },
    same('credible_level', result.credibleLevel),
    same('upper_limit', result.answer.limit),
    same('rate_prior', priorText(run, result.quantity)),
    same('mass_min', range.massMinMjup),
    same('mass_max', range.massMaxMjup),
    same('semi_major_axis_min', range.semiMajorAxisMinAu),
    same('semi_major_axis_max', range.semiMajorAxisMaxAu),
    same('population', `${inputs.population.key} version ${inputs.population.version}`),
    same('n_targets', result.stars),
    same('n_companions', countedDetections(run, false, result.quantity)),
    same('counting_rule', countingRule(run, false, result.quantity)),
    same('candidates', candidateWords(run, false)),
    same('background', result.background),
    same('prior_cut_at', result.priorCutAt),
    same('combination', inputs.combination),
    same('analysis', run.analysis),
    same('run', run.number),
    same('run_digest', run.resultDigest),
    same('state', STATE),
  ]);
}

const percent = (limit: number | null) =>
  limit === null ? null : { below: formatSignificant(100 * limit, 2) };

/** Limits by level for a paper, rounded to two digits; the note carries every condition. */
export function writeLimitsTable(run: FinishedRun, style: LatexStyle): string {
  const { result, inputs, population } = run;
  const found = countedDetections(run, false, 'companions_per_star');
  const table: LatexTable = {
    caption: `Upper limits by credible level (${STATE}, ${run.analysis} run ${run.number})`,
    label: `tab:${run.analysis.toLowerCase()}-run-${run.number}`,
    columns: [
      { heading: 'Credible level', align: 'l' },
      { heading: 'Host fraction', unit: '% of stars', align: 'r' },
      { heading: 'Planets', unit: 'per 100 stars', align: 'r' },
      { heading: 'Host fraction, zero detections', unit: '% of stars', align: 'r' },
      { heading: 'Planets, zero detections', unit: 'per 100 stars', align: 'r' },
    ],
    rows: result.levels.map((row) => [
      describeLevel(row.level),
      percent(row.hostFraction),
      percent(row.meanNumber),
      percent(row.hostFractionZero),
      percent(row.meanNumberZero),
    ]),
    notes: [
      `${STATE[0].toUpperCase()}${STATE.slice(1)}, not frozen.`,
      `${describePopulation(population)}.`,
      `${result.stars} stars, ${found} companions counted (${countingRule(run, false, result.quantity)}).`,
      `Surveys: ${inputs.surveys.map(({ name }) => name).join(', ')}.`,
      ...result.statement.conditions.map((condition) => `${condition}.`),
      'Limits rounded to two digits.',
      `Fingerprint of the result (SHA-256): ${run.resultDigest}.`,
    ],
  };
  return writeLatexTable(table, style);
}
