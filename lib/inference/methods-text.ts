import type { Population } from '@/lib/population';
import {
  formatInterval,
  formatRate,
  formatSignificant,
  type RateQuantity,
} from '@/lib/quantities/display';
import type { RatePrior } from './contract';
import {
  countsAnything,
  describeBackground,
  describeCandidates,
  type StatedCandidates,
} from './open-candidates';
import { describePlanets, describePopulation } from './population-words';
import type { ReferenceKey } from './references';
import { describeLevel, describePrior } from './statement';

/** A piece of a paragraph: words, or papers to be cited at that place. */
export type MethodsPart = string | { cite: ReferenceKey[] };

/** Everything that the paragraph says of a run; words without a full stop. */
export interface MethodsFacts {
  name: string;
  surveys: { name: string; entries: number }[];
  stars: number;
  leftOut: number;
  /** As the run keeps them. */
  combination: string;
  cooling: string;
  eccentricity: string;
  threshold: string;
  sample: string | null;
  population: Population;
  prior: RatePrior;
  quantity: RateQuantity;
  credibleLevel: number;
  counted: string[];
  countingRule: string;
  candidates: StatedCandidates | null;
  background: number | null;
  exposure: number;
  answer: {
    limit: number;
    median: number;
    interval68: readonly [number, number];
    isConstrained: boolean;
    isSetByPrior: boolean;
  };
  /** Limit with all detections set aside; null where none counts anyway. */
  zeroLimit: number | null;
  beside: { name: string; upper: number; level: number; source: string }[];
  software: string;
  engineVersion: string;
  resultDigest: string;
}

/** Papers behind the words in which a run keeps how its maps were made. */
const behindMaps: readonly (readonly [RegExp, ReferenceKey[]])[] = [
  [/approximate cooling law/, ['Burrows2001', 'Tokunaga2005']],
  [/Beta\(0\.867, 3\.03\)/, ['Kipping2013']],
  [/Beta\(30, 200\)/, ['Bowler2020']],
  [/Gaussian noise/, ['JensenClem2018']],
  [/Mawet et al\. 2014/, ['Mawet2014']],
  [/Holman & Wiegert 1999/, ['Holman1999']],
];

const behindLimits: readonly (readonly [RegExp, ReferenceKey[]])[] = [
  [/^Garwood 1936/, ['Garwood1936', 'Gehrels1986']],
  [/^Feldman & Cousins 1998/, ['Feldman1998']],
  [/^Clopper & Pearson 1934/, ['Clopper1934']],
  [/^Wilson 1927/, ['Wilson1927']],
];

function cited(words: string, table: typeof behindMaps): MethodsPart[] {
  const cite = table.flatMap(([pattern, keys]) => (pattern.test(words) ? keys : []));
  return cite.length === 0 ? [] : [' ', { cite }];
}

/** Words of a run without the citations that stand in them as text. */
const uncited = (words: string) =>
  words.replace(/ \((?:Mawet et al\. 2014|Holman & Wiegert 1999)\)/g, '');

const count = (n: number, noun: string) => `${n} ${noun}${n === 1 ? '' : 's'}`;

function sampleSentences(facts: MethodsFacts): MethodsPart[] {
  const surveys = facts.surveys.map(({ name, entries }) => `${name} (${count(entries, 'star')})`);
  const left =
    facts.leftOut === 0
      ? ''
      : ` ${count(facts.leftOut, 'further entry').replace('entrys', 'entries')} of these surveys ${facts.leftOut === 1 ? 'was' : 'were'} left out, each for a stated reason.`;
  const chosen = facts.sample === null ? '' : ` The sample is selected by: ${facts.sample}.`;
  const shared = surveys.length === 1 ? '' : ` Stars in several surveys: ${facts.combination}.`;
  return [
    `The sample holds ${count(facts.stars, 'star')}, each counted once, from ${surveys.join(', ')}.`,
    `${chosen}${left}${shared}`,
  ];
}

function mapSentences({ cooling, eccentricity, threshold }: MethodsFacts): MethodsPart[] {
  return [
    ' For each star the probability to detect a companion was taken as a function of its mass and',
    ` semi-major axis, averaged over orbits and over the errors of age and distance. Cooling: ${cooling}`,
    ...cited(cooling, behindMaps),
    `. Orbits: ${eccentricity}`,
    ...cited(eccentricity, behindMaps),
    `. Detection: ${uncited(threshold)}`,
    ...cited(threshold, behindMaps),
    '.',
  ];
}

function detectionWords(facts: MethodsFacts): string {
  const { counted, countingRule } = facts;
  if (counted.length === 0) return `No companion counts (${countingRule})`;
  const verb = counted.length === 1 ? 'counts' : 'count';
  return `${count(counted.length, 'companion')} ${verb} (${counted.join(', ')}; ${countingRule})`;
}

function modelSentences(facts: MethodsFacts): MethodsPart[] {
  const { quantity, prior, population, exposure, stars, background } = facts;
  const likelihood: MethodsPart[] =
    quantity === 'host_fraction'
      ? [
          ' The rate is the fraction of stars that host at least one such companion, with one Bernoulli trial for each star',
          ' ',
          { cite: ['Lafreniere2007'] },
        ]
      : [' The rate is the mean number of such companions per star, with a Poisson likelihood'];
  return [
    ` We ask about ${describePlanets(population)}, distributed as ${describePopulation(population)}.`,
    ` Averaged over this population, the detection probabilities sum to ${formatSignificant(exposure, 3)} of ${count(stars, 'star')}.`,
    ` ${detectionWords(facts)}.`,
    ...(facts.candidates === null
      ? []
      : [` Candidates without an answer: ${describeCandidates(facts.candidates)}.`]),
    ...(background
      ? [
          ` Background: ${describeBackground(background)}`,
          ' ',
          { cite: ['Kraft1991' as const] },
          '.',
        ]
      : []),
    ...likelihood,
    `; the prior is ${describePrior(prior, quantity)}.`,
  ];
}

function answerSentences(facts: MethodsFacts): MethodsPart[] {
  const { answer, quantity, credibleLevel, zeroLimit, beside, counted, candidates } = facts;
  const level = describeLevel(credibleLevel);
  if (!answer.isConstrained)
    return [' The data do not constrain the rate: the posterior is the prior.'];
  const [low, high] = answer.interval68;
  const interval = countsAnything(counted, candidates)
    ? `, equal-tailed 68\u2009% interval ${formatInterval(low, high, quantity)}`
    : '';
  const parts: MethodsPart[] = [
    ` The ${level} credible upper limit is ${formatRate(answer.limit, quantity)}`,
    ` (posterior median ${formatRate(answer.median, quantity)}${interval}).`,
  ];
  if (answer.isSetByPrior) parts.push(' This limit is set by the prior and not by the data.');
  if (zeroLimit !== null) {
    parts.push(
      ` With all detections set aside it would be ${formatRate(zeroLimit, quantity)} at the same level.`,
    );
  }
  for (const { name, upper, level: confidence, source } of beside) {
    const papers = cited(source, behindLimits);
    parts.push(
      ` Without a prior, the upper end at ${describeLevel(confidence)} confidence is ${formatRate(upper, quantity)}`,
      ...(papers.length > 0 ? papers : [` (${name})`]),
      '.',
    );
  }
  return parts;
}

/**
 * A paragraph for the methods section of a paper: what was counted, how, under which assumptions,
 * and the answer. Every number is the run's own.
 *
 * @returns words and the places of citations, in order
 * Edges: where the data constrain nothing no limit is named.
 */
export function methodsParagraph(facts: MethodsFacts): MethodsPart[] {
  return [
    ...sampleSentences(facts),
    ...mapSentences(facts),
    ...modelSentences(facts),
    ...answerSentences(facts),
    ` All numbers are integrals without Monte Carlo error, computed with ${facts.software} (engine ${facts.engineVersion}; ${facts.name}, SHA-256 of the result ${facts.resultDigest}).`,
  ];
}

/** The papers that a paragraph cites, each once, by key. */
export function citedReferences(parts: readonly MethodsPart[]): ReferenceKey[] {
  const keys = parts.flatMap((part) => (typeof part === 'string' ? [] : part.cite));
  return [...new Set(keys)].sort();
}
