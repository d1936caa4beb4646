import { isSameAxis } from '@/lib/numerics/grid';
import {
  BOLTZMANN_CONSTANT,
  GM_JUPITER,
  GM_SUN,
  LUMINOSITY_AT_ZERO_BOLOMETRIC,
  LUMINOSITY_SUN,
  PARSEC,
  PLANCK_CONSTANT,
  RADIUS_JUPITER,
  SPEED_OF_LIGHT,
  STEFAN_BOLTZMANN,
} from '@/lib/quantities/constants';

/** Printed wherever a result rests on the law. */
export const BUILT_IN_LAW_NAME = 'approximate cooling law';
export const BUILT_IN_LAW_SOURCE =
  'Burrows, Hubbard, Lunine & Liebert 2001, Reviews of Modern Physics 73, 719; zero points of Tokunaga & Vacca 2005';

/** Range in which the law is evaluated at all; elsewhere it is an error. */
export const BUILT_IN_LAW_RANGE = {
  massMinMjup: 0.5,
  massMaxMjup: 80,
  ageMinMyr: 1,
  ageMaxMyr: 10_000,
} as const;

/** Below this mass, and outside this range of temperatures, a result is flagged (our rule). */
const VALID_MASS_MIN_MJUP = 5;
const VALID_TEFF_K: readonly [number, number] = [200, 3000];

interface Band {
  wavelengthUm: number;
  /** Flux of magnitude 0, [W m^-2 µm^-1]. */
  zeroFlux: number;
}

/** Tokunaga & Vacca 2005, MKO system, Vega = 0. */
const BANDS: Readonly<Record<string, Band>> = {
  J: { wavelengthUm: 1.25, zeroFlux: 3.01e-9 },
  H: { wavelengthUm: 1.644, zeroFlux: 1.18e-9 },
  Ks: { wavelengthUm: 2.149, zeroFlux: 4.35e-10 },
  Lp: { wavelengthUm: 3.754, zeroFlux: 5.31e-11 },
  Mp: { wavelengthUm: 4.702, zeroFlux: 2.22e-11 },
};

/** The same bands as papers print them; nothing else is taken for one of them. */
const BAND_SPELLINGS: Readonly<Record<string, string>> = {
  "L'": 'Lp',
  'L′': 'Lp',
  "M'": 'Mp',
  'M′': 'Mp',
  K_s: 'Ks',
};

export const BUILT_IN_LAW_BANDS: readonly string[] = Object.keys(BANDS);

const CM_PER_M = 100;
/** G M of the Sun in cm³ s⁻². */
const GM_SUN_CGS = GM_SUN.value * CM_PER_M ** 3;
const SUN_PER_JUPITER = GM_JUPITER.value / GM_SUN.value;
const TEN_PARSECS_M = 10 * PARSEC.value;
const SQUARE_METRES_UM = 1e-6;
/** The law's reference age and its powers: T ∝ t^-0.32, R ∝ T^(0.11/0.64) at one mass. */
const REFERENCE_AGE_MYR = 1000;
const AGE_POWER = 0.32;
const RADIUS_POWER = 0.11 / 0.64;

/** What the law says of one companion at one age. */
export interface CooledBody {
  teffK: number;
  radiusM: number;
  radiusRjup: number;
  /** [L_Sun]. */
  luminosityLsun: number;
  bolometricMag: number;
}

/**
 * Temperature, radius and luminosity of the built-in cooling law.
 *
 * T = 1550 K (1000 Myr/t)^0.32 (m/0.05 M_Sun)^0.83;
 * R = [6.7e9 (1e5/(GM))^0.18 (T/1000 K)^0.11]^(1/0.64) cm; L = 4π R² σ T⁴.
 *
 * @param massMjup m, [M_Jup], 0.5 to 80
 * @param ageMyr t, [Myr], 1 to 10 000
 * @throws RangeError outside the law's range
 * Accuracy: the law's own, 1 to 3 mag in one band below 1000 K; see the help.
 * @source Burrows, Hubbard, Lunine & Liebert 2001, Reviews of Modern Physics 73, 719
 * @example cooledBody(5, 10).teffK // 962.9003
 */
export function cooledBody(massMjup: number, ageMyr: number): CooledBody {
  requireLawRange(massMjup, ageMyr);
  const massMsun = massMjup * SUN_PER_JUPITER;
  const teffK = 1550 * (REFERENCE_AGE_MYR / ageMyr) ** AGE_POWER * (massMsun / 0.05) ** 0.83;
  const gravity = (1e5 / (GM_SUN_CGS * massMsun)) ** 0.18;
  const radiusM = (6.7e9 * gravity * (teffK / 1000) ** 0.11) ** (1 / 0.64) / CM_PER_M;
  const luminosityW = 4 * Math.PI * radiusM ** 2 * STEFAN_BOLTZMANN.value * teffK ** 4;
  return {
    teffK,
    radiusM,
    radiusRjup: radiusM / RADIUS_JUPITER.value,
    luminosityLsun: luminosityW / LUMINOSITY_SUN.value,
    bolometricMag: -2.5 * Math.log10(luminosityW / LUMINOSITY_AT_ZERO_BOLOMETRIC.value),
  };
}

/**
 * Planck's law per steradian, B_λ(λ, T).
 *
 * @param wavelengthUm λ, [µm], > 0
 * @param temperatureK T, [K], > 0
 * @returns [W m^-2 µm^-1 sr^-1]
 * @throws RangeError for an argument that is not > 0
 * @example planckRadiance(1.644, 1000) // 1569.2023
 */
export function planckRadiance(wavelengthUm: number, temperatureK: number): number {
  if (!(wavelengthUm > 0)) throw new RangeError(`wavelengthUm must be > 0, got ${wavelengthUm}`);
  if (!(temperatureK > 0)) throw new RangeError(`temperatureK must be > 0, got ${temperatureK}`);
  const { scale, temperatureK: characteristicK } = planckFactors(wavelengthUm);
  return scale / Math.expm1(characteristicK / temperatureK);
}

/** Planck's law at one wavelength is scale / (exp(temperatureK / T) - 1). */
function planckFactors(wavelengthUm: number): { scale: number; temperatureK: number } {
  const lambda = wavelengthUm * 1e-6;
  const { value: h } = PLANCK_CONSTANT;
  const { value: c } = SPEED_OF_LIGHT;
  return {
    scale: ((2 * h * c * c) / lambda ** 5) * SQUARE_METRES_UM,
    temperatureK: (h * c) / (lambda * BOLTZMANN_CONSTANT.value),
  };
}

/**
 * Absolute magnitude of the built-in law, -2.5 log10[π B_λ (R/10 pc)² / F_0].
 *
 * @param massMjup m, [M_Jup], 0.5 to 80
 * @param ageMyr t, [Myr], 1 to 10 000
 * @param band one of BUILT_IN_LAW_BANDS, or L' and M' as papers print them
 * @returns [mag], Vega = 0
 * @throws RangeError outside the law's range, or for an unknown band
 * @example builtInMagnitude(5, 10, 'H') // 15.9483
 */
export function builtInMagnitude(massMjup: number, ageMyr: number, band: string): number {
  const { wavelengthUm, zeroFlux } = requireBand(band);
  const { teffK, radiusM } = cooledBody(massMjup, ageMyr);
  const flux = Math.PI * planckRadiance(wavelengthUm, teffK) * (radiusM / TEN_PARSECS_M) ** 2;
  return -2.5 * Math.log10(flux / zeroFlux);
}

/**
 * Magnitudes of many masses at many ages: builtInMagnitude and isInsideLawValidity for a grid.
 *
 * Temperature and radius are powers of mass times powers of age, so each is worked out once a mass.
 *
 * @param massMjup masses, [M_Jup], not modified
 * @param agesMyr ages, [Myr], not modified
 * @param band see builtInMagnitude
 * @returns magnitudes of shape [mass, age], row-major, and the masses that leave the law's validity
 *   at one age or more
 * @throws RangeError outside the law's range, or for an unknown band
 */
export function builtInMagnitudes(
  massMjup: Float64Array,
  agesMyr: Float64Array,
  band: string,
): { magnitudes: Float64Array; outsideValidity: number[] } {
  const { wavelengthUm, zeroFlux } = requireBand(band);
  const planck = planckFactors(wavelengthUm);
  const cooling = agesMyr.map((age) => (REFERENCE_AGE_MYR / age) ** AGE_POWER);
  const swelling = cooling.map((factor) => factor ** (2 * RADIUS_POWER));
  const magnitudes = new Float64Array(massMjup.length * agesMyr.length);
  const outsideValidity: number[] = [];
  for (const age of agesMyr) requireLawRange(BUILT_IN_LAW_RANGE.massMinMjup, age);
  const bodies = referenceBodies(massMjup);
  for (let i = 0; i < massMjup.length; i++) {
    const { teffK, radiusM } = bodies[i];
    const scale = (Math.PI * planck.scale * (radiusM / TEN_PARSECS_M) ** 2) / zeroFlux;
    let isValid = true;
    for (let k = 0; k < agesMyr.length; k++) {
      const temperature = teffK * cooling[k];
      const flux = (scale * swelling[k]) / Math.expm1(planck.temperatureK / temperature);
      magnitudes[i * agesMyr.length + k] = -2.5 * Math.log10(flux);
      isValid &&= isTrusted(massMjup[i], temperature);
    }
    if (!isValid) outsideValidity.push(i);
  }
  return { magnitudes, outsideValidity };
}

/**
 * The masses that leave the law's validity at one of the ages or more, as builtInMagnitudes tells.
 *
 * @throws RangeError outside the law's range, or for an unknown band
 */
export function massesOutsideValidity(
  massMjup: Float64Array,
  agesMyr: Float64Array,
  band: string,
): number[] {
  requireBand(band);
  const cooling = agesMyr.map((age) => {
    requireLawRange(BUILT_IN_LAW_RANGE.massMinMjup, age);
    return (REFERENCE_AGE_MYR / age) ** AGE_POWER;
  });
  const bodies = referenceBodies(massMjup);
  const outside: number[] = [];
  for (let i = 0; i < bodies.length; i++) {
    for (let k = 0; k < cooling.length; k++) {
      if (isTrusted(massMjup[i], bodies[i].teffK * cooling[k])) continue;
      outside.push(i);
      break;
    }
  }
  return outside;
}

let kept: { massMjup: Float64Array; bodies: CooledBody[] } | null = null;

/** The masses at the law's reference age; kept, because every star of a survey asks for the same. */
function referenceBodies(massMjup: Float64Array): CooledBody[] {
  if (kept && isSameAxis(kept.massMjup, massMjup)) return kept.bodies;
  const bodies = Array.from(massMjup, (mass) => cooledBody(mass, REFERENCE_AGE_MYR));
  kept = { massMjup: massMjup.slice(), bodies };
  return bodies;
}

/**
 * Whether the law is trusted at this mass and age: m >= 5 M_Jup and 200 K <= T <= 3000 K (our rule).
 *
 * @throws RangeError outside the law's range
 */
export function isInsideLawValidity(massMjup: number, ageMyr: number): boolean {
  return isTrusted(massMjup, cooledBody(massMjup, ageMyr).teffK);
}

function isTrusted(massMjup: number, teffK: number): boolean {
  return massMjup >= VALID_MASS_MIN_MJUP && teffK >= VALID_TEFF_K[0] && teffK <= VALID_TEFF_K[1];
}

/** Whether the law has a magnitude in this band. */
export function hasBuiltInBand(band: string): boolean {
  return Object.hasOwn(BANDS, BAND_SPELLINGS[band] ?? band);
}

function requireBand(band: string): Band {
  if (!hasBuiltInBand(band)) {
    throw new RangeError(`band must be one of ${BUILT_IN_LAW_BANDS.join(', ')}, got ${band}`);
  }
  return BANDS[BAND_SPELLINGS[band] ?? band];
}

function requireLawRange(massMjup: number, ageMyr: number): void {
  const { massMinMjup, massMaxMjup, ageMinMyr, ageMaxMyr } = BUILT_IN_LAW_RANGE;
  if (!(massMjup >= massMinMjup && massMjup <= massMaxMjup)) {
    throw new RangeError(
      `massMjup must be between ${massMinMjup} and ${massMaxMjup} for the ${BUILT_IN_LAW_NAME}, got ${massMjup}`,
    );
  }
  if (!(ageMyr >= ageMinMyr && ageMyr <= ageMaxMyr)) {
    throw new RangeError(
      `ageMyr must be between ${ageMinMyr} and ${ageMaxMyr} for the ${BUILT_IN_LAW_NAME}, got ${ageMyr}`,
    );
  }
}
