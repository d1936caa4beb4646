import {
  type LatexStyle,
  type LatexTable,
  limitColumns,
  posteriorColumns,
  tableOfRows,
  type WrittenTable,
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

/** What a release adds to the files of the runs that it froze. */
export interface ReleaseFacts {
  title: string;
  version: number;
  /** SPDX name. */
  licence: string;
  /** Where it stands. */
  address: string;
  year: number;
  authors: { name: string; orcid?: string | undefined }[];
  /** SHA-256 of its bundle, where there is one. */
  checksum?: string | undefined;
}

/** A finished run with what its files need beside it. */
export interface FinishedRun {
  id: string;
  collaborationId: string;
  /** "A-31". */
  analysis: string;
  analysisName: string;
  number: number;
  seed: string;
  finishedAt: string | null;
  inputsDigest: string | null;
  /** Something of the surveys came after the run read them. */
  hasOlderInputs: boolean;
  /** The newest release that holds it; absent before it is published. */
  release?: ReleaseFacts | undefined;
  isFrozen?: boolean | undefined;
  recipe: AnalysisRecipe;
  population: Population;
  inputs: RunInputs;
  result: RunResult;
  resultDigest: string;
  engineVersion: string;
}

/** Whether a run may still change, as each of its files says it. */
export function stateOf({ release, isFrozen }: Pick<FinishedRun, 'release' | 'isFrozen'>): string {
  if (release) return `release ${release.version}: ${release.title}`;
  return isFrozen ? 'frozen' : 'draft';
}

/** The same with the run's number, "draft, run 18", where the release does not name it. */
export function standingOf(run: Pick<FinishedRun, 'release' | 'isFrozen' | 'number'>): string {
  return run.release ? stateOf(run) : `${stateOf(run)}, run ${run.number}`;
}

type Quantity = RunResult['quantity'];

export type StatedRange = { [Edge in keyof PopulationBox]: number | null };

/** The ranges of a run's population; those of masses stay empty where they differ from star to star. */
export function statedRange(population: Population): StatedRange {
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

type Head = Pick<WrittenTable, 'provenance'>;

/** Limits and intervals, one row per quantity, counting rule, interval and level. */
export function limitsTable(run: FinishedRun, head: Head): WrittenTable {
  const { result, inputs, population, recipe } = run;
  const range = statedRange(population);
  const same = {
    analysis: run.analysis,
    subset: inputs.surveys.map(({ slug }) => slug).join(' + '),
    population: `${inputs.population.key} version ${inputs.population.version}`,
    mass_min: range.massMinMjup,
    mass_max: range.massMaxMjup,
    semi_major_axis_min: range.semiMajorAxisMinAu,
    semi_major_axis_max: range.semiMajorAxisMaxAu,
    // Every number is an integral: there is no Monte Carlo error.
    mcse: null,
    n_targets: result.stars,
    effective_targets: result.exposure,
    run: run.number,
    engine_version: run.engineVersion,
    background: result.background,
    combination: inputs.combination,
    credible_level_of_run: recipe.credibleLevel,
    run_digest: run.resultDigest,
    state: stateOf(run),
  };
  const rows = [...limitRows(run), ...intervalRows(run)].map((row) => ({
    ...same,
    likelihood: row.quantity === 'host_fraction' ? 'host-fraction' : 'mean-number',
    rate_prior: priorText(run, row.quantity),
    quantity: row.quantity,
    interval: row.interval,
    credible_level: row.level,
    lower: row.lower,
    estimate: row.estimate,
    upper: row.upper,
    n_companions: countedDetections(run, row.isZero, row.quantity),
    counting_rule: countingRule(run, row.isZero, row.quantity),
    candidates: candidateWords(run, row.isZero),
    prior_cut_at: row.quantity === result.quantity ? result.priorCutAt : null,
  }));
  const title = `Limits and intervals of ${run.analysis}, run ${run.number}`;
  return tableOfRows({ name: 'limits', title, ...head }, limitColumns, rows);
}

/** Posterior of the run's quantity on a grid. */
export function posteriorTable(run: FinishedRun, head: Head): WrittenTable {
  const { quantity, answer } = run.result;
  const { value, density, cumulative } = answer.curve;
  const rows = value.map((_, i) => ({
    quantity,
    value: value[i],
    density: density[i],
    cumulative: cumulative[i],
  }));
  const title = `Posterior of ${run.analysis}, run ${run.number}`;
  return tableOfRows({ name: 'posterior', title, ...head }, posteriorColumns, rows);
}

const percent = (limit: number | null) =>
  limit === null ? null : { below: formatSignificant(100 * limit, 2) };

const intervalNames: Record<Row['interval'], string> = {
  upper_limit: 'Upper limit',
  central: 'Equal-tailed',
  highest_density: 'Highest density',
};

/** Medians and intervals of the run's quantity for a paper, with and without the detections. */
export function writeIntervalsTable(run: FinishedRun, style: LatexStyle): string {
  const { result } = run;
  const isFraction = result.quantity === 'host_fraction';
  const unit = isFraction ? '% of stars' : 'per 100 stars';
  const rounded = (rate: number | null) =>
    rate === null ? null : formatSignificant(100 * rate, 2);
  const table: LatexTable = {
    caption:
      `Credible intervals of ${isFraction ? 'the host fraction' : 'the number of planets'} ` +
      `(${stateOf(run)}, ${run.analysis} run ${run.number})`,
    label: `tab:${run.analysis.toLowerCase()}-run-${run.number}-intervals`,
    columns: [
      { heading: 'Interval', align: 'l' },
      { heading: 'Detections', align: 'l' },
      { heading: 'Credible level', align: 'l' },
      { heading: 'Lower', unit, align: 'r' },
      { heading: 'Median', unit, align: 'r' },
      { heading: 'Upper', unit, align: 'r' },
    ],
    rows: intervalRows(run).map((row) => {
      const { isConstrained } = row.isZero ? result.zero : result.answer;
      const cell = (rate: number | null) => (isConstrained ? rounded(rate) : null);
      return [
        intervalNames[row.interval],
        countingRule(run, row.isZero, row.quantity),
        describeLevel(row.level),
        cell(row.lower),
        cell(row.estimate),
        cell(row.upper),
      ];
    }),
    notes: [
      `Prior: ${priorText(run, result.quantity)}.`,
      'Conditions as in the table of upper limits; numbers rounded to two digits.',
      `Fingerprint of the result (SHA-256): ${run.resultDigest}.`,
    ],
  };
  return writeLatexTable(table, style);
}

/** Limits by level for a paper, rounded to two digits; the note carries every condition. */
export function writeLimitsTable(run: FinishedRun, style: LatexStyle): string {
  const { result, inputs, population } = run;
  const found = countedDetections(run, false, 'companions_per_star');
  const table: LatexTable = {
    caption: `Upper limits by credible level (${stateOf(run)}, ${run.analysis} run ${run.number})`,
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
      run.release
        ? `${run.release.title}, version ${run.release.version}, ${run.release.licence}, ${run.release.address}.`
        : `${run.isFrozen ? 'Frozen' : 'Draft'}, run ${run.number}: ${run.isFrozen ? 'not published' : 'not frozen'}.`,
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
