import { axisShapes, fromLogIndex, type Population, populationBox } from '@/lib/population';
import type { RatePrior } from './contract';
import { describePopulation } from './population-words';
import { type Condition, describeLimit, describePrior, type StatementInputs } from './statement';

/** The run that a limit was recorded in; files name it so that a reader can find it again. */
export interface StatedRun {
  id: string;
  /** "A-31". */
  analysis: string;
  number: number;
  engineVersion: string;
  resultDigest: string | null;
  population: { key: string; version: number; digest: string };
}

export interface DocumentInputs extends StatementInputs {
  /** 'live': the limit follows a control and belongs to no run. */
  state: 'recorded' | 'live';
  run: StatedRun | null;
  surveys: readonly string[];
  /** Pairs of star and survey. */
  entries: number;
  /** How detections count, in words. */
  countingRule: string;
  /** Conditions that the run stored beside those of the likelihood. */
  further?: readonly Condition[];
}

interface IndexPair {
  /** dN/dx ∝ x^index. */
  linear: number;
  /** dN/d ln x ∝ x^index. */
  perLogarithm: number;
}

/** A limit with everything that it rests on; levels, shares and rates are fractions. */
export interface LimitDocument {
  format: 'rarebound/limit-statement';
  version: 1;
  state: 'recorded' | 'live';
  sentence: string;
  conditions: Condition[];
  quantity: StatementInputs['quantity'];
  /** Fraction of stars or planets per star; null where the data constrain nothing. */
  upperLimit: number | null;
  credibleLevel: number;
  interval: { kind: string; level: number; low: number; high: number } | null;
  isSetByPrior: boolean;
  prior: RatePrior;
  priorInWords: string;
  population: {
    key: string | null;
    version: number | null;
    digest: string | null;
    inWords: string;
    /** null where the law along an axis is no single power law. */
    massIndex: IndexPair | null;
    semiMajorAxisIndex: IndexPair | null;
  };
  /** Of masses null where they differ from star to star. */
  ranges: { massMjup: [number, number] | null; semiMajorAxisAu: [number, number] };
  counts: { stars: number; entries: number; detections: number; countingRule: string };
  exposureStars: number;
  expectedFalseDetections: number | null;
  shareOutside: number;
  combinationRule: string;
  cooling: string;
  eccentricity: string;
  threshold: string;
  surveys: string[];
  run: StatedRun | null;
}

function indexOf(population: Population, axis: 'mass' | 'semiMajorAxis'): IndexPair | null {
  if (population.form === 'systems') return null;
  const shape = axisShapes(population)[axis];
  return shape.shape === 'power-law'
    ? { linear: fromLogIndex(shape.index, 'linear'), perLogarithm: shape.index }
    : null;
}

function rangesOf(population: Population): LimitDocument['ranges'] {
  if (population.form === 'mass-ratio') {
    const { semiMajorAxisMinAu, semiMajorAxisMaxAu } = population;
    return { massMjup: null, semiMajorAxisAu: [semiMajorAxisMinAu, semiMajorAxisMaxAu] };
  }
  const box = populationBox(population);
  return {
    massMjup: [box.massMinMjup, box.massMaxMjup],
    semiMajorAxisAu: [box.semiMajorAxisMinAu, box.semiMajorAxisMaxAu],
  };
}

/**
 * A limit with its conditions as plain data, from which its text, its LaTeX and its JSON are made.
 *
 * @param inputs as describeLimit takes them, with counts, surveys and the run
 */
export function limitDocument(inputs: DocumentInputs): LimitDocument {
  const { population, run, interval } = inputs;
  const { sentence, entries } = describeLimit(inputs);
  const sample: Condition = {
    label: 'Sample',
    text: `${inputs.surveys.join(', ')}: ${inputs.stars} stars of ${inputs.entries} entries`,
  };
  const counting: Condition = { label: 'Counting', text: inputs.countingRule };
  const said = new Set(entries.map(({ label }) => label));
  const further = (inputs.further ?? []).filter(({ label }) => !said.has(label));
  return {
    format: 'rarebound/limit-statement',
    version: 1,
    state: inputs.state,
    sentence,
    conditions: [...entries, counting, sample, ...further],
    quantity: inputs.quantity,
    upperLimit: inputs.constrained ? inputs.limit : null,
    credibleLevel: inputs.credibleLevel,
    interval: interval && inputs.constrained ? { ...interval } : null,
    isSetByPrior: inputs.constrained && inputs.setByPrior,
    prior: inputs.prior,
    priorInWords: describePrior(inputs.prior, inputs.quantity),
    population: {
      key: run?.population.key ?? null,
      version: run?.population.version ?? null,
      digest: run?.population.digest ?? null,
      inWords: describePopulation(population),
      massIndex: indexOf(population, 'mass'),
      semiMajorAxisIndex: indexOf(population, 'semiMajorAxis'),
    },
    ranges: rangesOf(population),
    counts: {
      stars: inputs.stars,
      entries: inputs.entries,
      detections: inputs.detections,
      countingRule: inputs.countingRule,
    },
    exposureStars: inputs.exposure,
    expectedFalseDetections: inputs.background ?? null,
    shareOutside: inputs.shareOutside,
    combinationRule: inputs.combinationRule,
    cooling: inputs.cooling,
    eccentricity: inputs.eccentricity,
    threshold: inputs.threshold,
    surveys: [...inputs.surveys],
    run,
  };
}
