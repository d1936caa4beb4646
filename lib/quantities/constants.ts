/** A physical constant with what is needed to judge it. */
export interface Constant {
  readonly value: number;
  readonly unit: string;
  /** Standard uncertainty in the same unit; 0 for a value fixed by definition. */
  readonly uncertainty: number;
  readonly reference: string;
}

const exact = (value: number, unit: string, reference: string): Constant => ({
  value,
  unit,
  uncertainty: 0,
  reference,
});

const B2_2012 = 'IAU 2012 Resolution B2';
const B2_2015 = 'IAU 2015 Resolution B2';
const B3_2015 = 'IAU 2015 Resolution B3, nominal';
const SI_2019 = 'SI 2019, exact';

const PLANCK_J_S = 6.62607015e-34;
const LIGHT_M_S = 299_792_458;
const BOLTZMANN_J_K = 1.380649e-23;

export const ASTRONOMICAL_UNIT = exact(149_597_870_700, 'm', B2_2012);
export const PARSEC = exact((648_000 / Math.PI) * ASTRONOMICAL_UNIT.value, 'm', B2_2015);
export const LUMINOSITY_AT_ZERO_BOLOMETRIC = exact(3.0128e28, 'W', B2_2015);
export const GM_SUN = exact(1.3271244e20, 'm^3 s^-2', B3_2015);
export const GM_JUPITER = exact(1.2668653e17, 'm^3 s^-2', B3_2015);
export const GM_EARTH = exact(3.986004e14, 'm^3 s^-2', B3_2015);
export const RADIUS_JUPITER = exact(7.1492e7, 'm', `${B3_2015}, equatorial`);
export const RADIUS_SUN = exact(6.957e8, 'm', B3_2015);
export const LUMINOSITY_SUN = exact(3.828e26, 'W', B3_2015);
export const PLANCK_CONSTANT = exact(PLANCK_J_S, 'J s', SI_2019);
export const SPEED_OF_LIGHT = exact(LIGHT_M_S, 'm s^-1', SI_2019);
export const BOLTZMANN_CONSTANT = exact(BOLTZMANN_J_K, 'J K^-1', SI_2019);
export const STEFAN_BOLTZMANN = exact(
  (2 * Math.PI ** 5 * BOLTZMANN_J_K ** 4) / (15 * PLANCK_J_S ** 3 * LIGHT_M_S ** 2),
  'W m^-2 K^-4',
  'SI 2019, 2 pi^5 k^4 / (15 h^3 c^2)',
);

/** Jupiter masses in a solar mass: Jupiter alone, not the Jupiter system (1047.3486). */
export const JUPITER_MASSES_PER_SUN = GM_SUN.value / GM_JUPITER.value;
/** Earth masses in a Jupiter mass. */
export const EARTH_MASSES_PER_JUPITER = GM_JUPITER.value / GM_EARTH.value;
export const AU_PER_PARSEC = 648_000 / Math.PI;
/** Julian year. */
export const DAYS_PER_YEAR = 365.25;
export const SECONDS_PER_DAY = 86_400;
/** Julian light year in metres. */
export const LIGHT_YEAR_M = LIGHT_M_S * DAYS_PER_YEAR * SECONDS_PER_DAY;
/** Bolometric magnitude of the nominal Sun. */
export const SUN_BOLOMETRIC_MAG =
  -2.5 * Math.log10(LUMINOSITY_SUN.value / LUMINOSITY_AT_ZERO_BOLOMETRIC.value);
