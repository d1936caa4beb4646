import { type EccentricityLaw, eccentricAnomaly, trueAnomaly } from '@/lib/sensitivity';
import { separationCumulative } from '@/lib/sensitivity/orbits';
import { draw, type Inputs, type LiveCheck, liveCheck } from './check';

interface SeparationRow {
  x: number;
  law: EccentricityLaw;
}

const LAWS: ((inputs: Inputs) => EccentricityLaw)[] = [
  () => ({ law: 'circular' }),
  ({ between }) => ({ law: 'fixed', eccentricity: between(0.01, 0.95) }),
  ({ between }) => ({ law: 'uniform', max: between(0.2, 0.95) }),
  ({ between }) => ({ law: 'beta', alpha: between(0.8, 3), beta: between(2, 8) }),
  ({ between }) => ({ law: 'rayleigh', sigma: between(0.1, 0.6) }),
];

const kepler = draw<[number, number]>('kepler', 200, ({ between, logBetween, pick }) => [
  pick([between(-20, 20), logBetween(1e-8, 1)]),
  pick([between(0, 0.999), 0.9999]),
]);

export const orbitChecks: LiveCheck[] = [
  liveCheck<[number, number]>({
    program: 'SciPy',
    what: 'kepler',
    name: "Kepler's equation, eccentric and true anomaly",
    rows: kepler,
    ours: ([mean, e]) => {
      const anomaly = eccentricAnomaly(mean, e);
      const angle = trueAnomaly(anomaly, e);
      return [anomaly, Math.cos(angle), Math.sin(angle)];
    },
    tolerance: {
      abs: 1e-11,
      because: 'E is promised to 1e-12, and close to e = 1 the true anomaly turns faster than E',
    },
  }),
  liveCheck<SeparationRow>({
    program: 'SciPy',
    what: 'separation',
    name: 'cumulative distribution of the projected separation',
    rows: LAWS.flatMap((law, which) =>
      draw(`separation ${which}`, 8, (inputs) => ({
        x: inputs.between(0.02, 1.6),
        law: law(inputs),
      })),
    ),
    ours: ({ x, law }) => separationCumulative(x, law),
    tolerance: {
      abs: 1e-10,
      because: 'adaptive quadrature over E and e is asked for 1e-10',
    },
  }),
];
