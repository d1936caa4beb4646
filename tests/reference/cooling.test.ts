import {
  BUILT_IN_LAW_BANDS,
  builtInMagnitude,
  cooledBody,
  planckRadiance,
  tableLookup,
} from '@/lib/sensitivity';
import { runCheckFile } from './support/check-file';

runCheckFile('cooling', {
  runners: {
    'built-in law': ({ mass_mjup: mass, age_myr: age }) => {
      const body = cooledBody(mass, age);
      const bands = BUILT_IN_LAW_BANDS.map((band) => [
        `M_${band}`,
        builtInMagnitude(mass, age, band),
      ]);
      return {
        teff_k: body.teffK,
        radius_rjup: body.radiusRjup,
        log10_L_Lsun: Math.log10(body.luminosityLsun),
        M_bol: body.bolometricMag,
        ...Object.fromEntries(bands),
      };
    },
    Planck: (inputs) => planckRadiance(inputs.wavelength_um, inputs.temperature_k),
    'cooling table': ({ table, mass_mjup: mass, age_myr: age }) =>
      tableLookup(
        {
          name: 'check',
          massMjup: Float64Array.from(table.mass_mjup),
          ageMyr: Float64Array.from(table.age_myr),
          magnitudes: { X: Float64Array.from(table.magnitude.flat()) },
        },
        'X',
      ).magnitude(mass, age),
  },
});
