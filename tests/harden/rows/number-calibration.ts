import {
  type CalibrationSetup,
  calibrationPart,
  kolmogorovP,
  type Likelihood,
  type RatePrior,
} from '@/lib/inference';
import { createRandom } from '@/lib/numerics/random';
import type { Bench, Measured, Row } from '../row';

const ENTRIES = 60;
const LEAST_P = 1e-3;
const ERRORS = 3;
const LEVELS = [0.68, 0.95];
const drawCount = () => Number(process.env.HARDEN_DRAWS ?? 10_000);

const CASES: [Likelihood, RatePrior][] = [
  ['host-fraction', { law: 'uniform', max: 1 }],
  ['host-fraction', { law: 'log-uniform', min: 1e-3, max: 1 }],
  ['host-fraction', { law: 'jeffreys' }],
  ['host-fraction', { law: 'beta', a: 0.8, b: 3 }],
  ['host-fraction', { law: 'tabulated', value: [0, 0.2, 0.9], density: [0, 1, 0.2] }],
  ['mean-number', { law: 'uniform', max: 2 }],
  ['mean-number', { law: 'log-uniform', min: 1e-3, max: 2 }],
  ['mean-number', { law: 'jeffreys', max: 2 }],
  ['mean-number', { law: 'gamma', shape: 2, rate: 4 }],
];

interface Judged {
  name: string;
  /** Kolmogorov-Smirnov p of the ranks. */
  p: number;
  /** Coverage of each level's upper limit less the level, in binomial standard errors. */
  off: number[];
}

const passes = ({ p, off }: Judged) => p > LEAST_P && off.every((one) => Math.abs(one) <= ERRORS);

/** Holds the places of the truths in their posteriors against the uniform law. */
function judge(name: string, setup: CalibrationSetup): Judged {
  const below = calibrationPart(setup, 0)
    .below.slice()
    .sort((a, b) => a - b);
  const n = below.length;
  const distance = Math.max(...below.map((u, i) => Math.max(u - i / n, (i + 1) / n - u)));
  const off = LEVELS.map((level) => {
    const covered = below.filter((u) => u <= level).length / n;
    return (covered - level) / Math.sqrt((level * (1 - level)) / n);
  });
  return { name, p: kolmogorovP(distance, n), off };
}

function setupOf(likelihood: Likelihood, prior: RatePrior): CalibrationSetup {
  const { uniform } = createRandom('completeness of stars');
  const completeness = Float64Array.from({ length: ENTRIES }, () => 0.05 + 0.8 * uniform());
  const seed = `${likelihood} ${prior.law}`;
  return { likelihood, completeness, prior, rates: [], surveys: drawCount(), parts: 1, seed };
}

/** Analyses that are wrong on purpose: one that passes would show that the row sees nothing. */
function plantedErrors(likelihood: Likelihood): [string, CalibrationSetup][] {
  const right = setupOf(likelihood, { law: 'uniform', max: 1 });
  const { completeness } = right;
  // The only star of its survey: one among sixty weighs less than the noise of the draws.
  const one = { completeness: Float64Array.of(0.7, 0.7), truth: { star: Int32Array.of(0, 0) } };
  return [
    ['wrong prior', { ...right, truth: { prior: { law: 'uniform', max: 0.8 } } }],
    ['completeness × 1.3', { ...right, truth: { completeness: completeness.map((c) => c / 1.3) } }],
    ['a star counted twice', { ...right, ...one }],
    [
      'every star counted twice',
      {
        ...right,
        completeness: Float64Array.of(...completeness, ...completeness),
        truth: { star: Int32Array.from({ length: 2 * ENTRIES }, (_, i) => i % ENTRIES) },
      },
    ],
  ];
}

async function measure({ say }: Bench): Promise<Measured> {
  const judged = CASES.map(([likelihood, prior]) => {
    const one = judge(`${likelihood} ${prior.law}`, setupOf(likelihood, prior));
    say(
      `${one.name}: p ${one.p.toPrecision(2)}, off by ${one.off.map((x) => x.toFixed(1))} errors`,
    );
    return one;
  });
  const planted = (['host-fraction', 'mean-number'] as const).flatMap((likelihood) =>
    plantedErrors(likelihood).map(([what, setup]) => judge(`${likelihood}, ${what}`, setup)),
  );
  for (const one of planted)
    say(
      `${one.name}: ${passes(one) ? 'not seen' : 'caught'}, p ${one.p.toPrecision(2)}, off ${one.off.map((x) => x.toFixed(1))}`,
    );
  const wrong = judged.filter((one) => !passes(one));
  const unseen = planted.filter(passes);
  const least = Math.min(...judged.map(({ p }) => p));
  const most = Math.max(...judged.flatMap(({ off }) => off.map(Math.abs)));
  return {
    isMet: wrong.length === 0 && unseen.length === 0,
    figure:
      `${judged.length - wrong.length} of ${judged.length} likelihoods and priors pass with ` +
      `${drawCount()} draws (least p ${least.toPrecision(2)}, coverage off by at most ` +
      `${most.toFixed(1)} standard errors); ${planted.length - unseen.length} of ${planted.length} planted errors caught`,
    details: { draws: drawCount(), judged, planted },
    notes: [...wrong, ...unseen].map(({ name, p }) => `${name}: p ${p.toPrecision(2)}`),
  };
}

export const row: Row = {
  name: 'number-calibration',
  what: 'N1, N2, N3: truths drawn from each prior, found again by each likelihood',
  goal: `p > ${LEAST_P}, coverage of 68 and 95 % limits within ${ERRORS} standard errors, every planted error caught`,
  measure,
};
