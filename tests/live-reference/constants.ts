import {
  ASTRONOMICAL_UNIT,
  BOLTZMANN_CONSTANT,
  GM_EARTH,
  GM_JUPITER,
  GM_SUN,
  LIGHT_YEAR_M,
  LUMINOSITY_AT_ZERO_BOLOMETRIC,
  LUMINOSITY_SUN,
  PARSEC,
  PLANCK_CONSTANT,
  RADIUS_JUPITER,
  RADIUS_SUN,
  SPEED_OF_LIGHT,
  STEFAN_BOLTZMANN,
} from '@/lib/quantities/constants';
import { distanceModulus, distancePcFromParallax, fluxRatio } from '@/lib/quantities/magnitudes';
import { periodDays, semiMajorAxisAuOfPeriod } from '@/lib/quantities/periods';
import { builtInMagnitude, cooledBody, planckRadiance } from '@/lib/sensitivity/built-in-law';
import { draw, type LiveCheck, liveCheck, type Tolerance } from './check';

const arithmetic: Tolerance = {
  rel: 1e-12,
  abs: 1e-13,
  because: 'the same constants through a few products and powers',
};
const constants: Tolerance = { rel: 1e-15, because: 'the last bit of a product' };

/** In the order in which the script answers them. */
const CONSTANTS = [
  ASTRONOMICAL_UNIT,
  PARSEC,
  LUMINOSITY_AT_ZERO_BOLOMETRIC,
  GM_SUN,
  GM_JUPITER,
  GM_EARTH,
  RADIUS_JUPITER,
  RADIUS_SUN,
  LUMINOSITY_SUN,
  PLANCK_CONSTANT,
  SPEED_OF_LIGHT,
  BOLTZMANN_CONSTANT,
  STEFAN_BOLTZMANN,
];

type Pair = [number, number];

const stars = draw<Pair>('stars', 30, ({ logBetween }) => [
  logBetween(1, 500),
  logBetween(0.01, 20),
]);
const bodies = draw<Pair>('bodies', 30, ({ logBetween }) => [
  logBetween(0.5, 80),
  logBetween(1, 10_000),
]);
const orbits = draw<Pair>('orbits', 30, ({ logBetween }) => [
  logBetween(0.01, 1000),
  logBetween(0.1, 3),
]);
const radiances = draw<Pair>('radiances', 30, ({ logBetween }) => [
  logBetween(0.5, 20),
  logBetween(100, 10_000),
]);

export const constantChecks: LiveCheck[] = [
  liveCheck<null>({
    program: 'SciPy',
    what: 'constants',
    name: 'constants of Astropy',
    rows: [null],
    ours: () => [...CONSTANTS.map(({ value }) => value), LIGHT_YEAR_M],
    tolerance: constants,
  }),
  liveCheck<Pair>({
    program: 'SciPy',
    what: 'photometry',
    name: 'distance modulus, parallax and flux ratio',
    rows: stars,
    ours: ([parallaxMas, contrastMag]) => {
      const distancePc = distancePcFromParallax(parallaxMas);
      return [distancePc, distanceModulus(distancePc), fluxRatio(contrastMag)];
    },
    tolerance: arithmetic,
  }),
  liveCheck<Pair>({
    program: 'SciPy',
    what: 'period',
    name: 'period of an orbit and back',
    rows: orbits,
    ours: ([axisAu, massMsun]) => [
      periodDays(axisAu, massMsun),
      semiMajorAxisAuOfPeriod(periodDays(axisAu, massMsun), massMsun),
    ],
    tolerance: arithmetic,
  }),
  liveCheck<Pair>({
    program: 'SciPy',
    what: 'planck',
    name: "Planck's law",
    rows: radiances,
    ours: ([wavelengthUm, temperatureK]) => planckRadiance(wavelengthUm, temperatureK),
    tolerance: { ...arithmetic, abs: 0 },
  }),
  liveCheck<Pair>({
    program: 'SciPy',
    what: 'cooled-body',
    name: 'built-in cooling law: temperature, radius, luminosity, bolometric and H magnitude',
    rows: bodies,
    ours: ([massMjup, ageMyr]) => {
      const { teffK, radiusM, luminosityLsun, bolometricMag } = cooledBody(massMjup, ageMyr);
      const hMag = builtInMagnitude(massMjup, ageMyr, 'H');
      return [teffK, radiusM, luminosityLsun, bolometricMag, hMag];
    },
    tolerance: arithmetic,
  }),
];
