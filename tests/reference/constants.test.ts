import * as constants from '@/lib/quantities/constants';
import { periodDays } from '@/lib/quantities/periods';
import { convert } from '@/lib/quantities/units';
import { runCheckFile } from './support/check-file';

const value = (constant: constants.Constant) => () => constant.value;

runCheckFile('constants', {
  runners: {
    'constant au_m': value(constants.ASTRONOMICAL_UNIT),
    'constant pc_m': value(constants.PARSEC),
    'constant GM_sun_m3_s2': value(constants.GM_SUN),
    'constant GM_jup_m3_s2': value(constants.GM_JUPITER),
    'constant R_jup_equatorial_m': value(constants.RADIUS_JUPITER),
    'constant R_sun_m': value(constants.RADIUS_SUN),
    'constant L_sun_W': value(constants.LUMINOSITY_SUN),
    'constant L_bol_zero_W': value(constants.LUMINOSITY_AT_ZERO_BOLOMETRIC),
    'constant stefan_boltzmann_W_m2_K4': value(constants.STEFAN_BOLTZMANN),
    'constant h_J_s': value(constants.PLANCK_CONSTANT),
    'constant c_m_s': value(constants.SPEED_OF_LIGHT),
    'constant k_B_J_K': value(constants.BOLTZMANN_CONSTANT),
    'constant sun_mass_in_jupiter_masses': () => convert(1, 'solMass', 'companion mass'),
    'constant jupiter_mass_in_sun_masses': () => convert(1, 'Mjup', 'companion mass', 'solMass'),
    'constant pc_in_au': () => convert(1, 'pc', 'distance', 'AU'),
    'constant sun_M_bol': () => constants.SUN_BOLOMETRIC_MAG,
    'constant period_days_at_1_au_1_Msun': () => periodDays(1, 1),
  },
});
