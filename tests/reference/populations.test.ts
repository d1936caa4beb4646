import {
  AXIS_PER_PERIOD_FACTOR,
  axisIndexFromPeriodIndex,
  fromLogIndex,
  LOG10_DENSITY_FACTOR,
  type Population,
  populationDensity,
  populationLaws,
  powerLaw,
} from '@/lib/population';
import { semiMajorAxisAuOfPeriod } from '@/lib/quantities/periods';
import { runCheckFile } from './support/check-file';

type Range = [number, number];

/** Rate per d ln M d ln a of a law with 10.5 % of stars in 0.3-10 M_Jup and 2-2000 d. */
const published = { massIndex: -0.31, periodIndex: 0.26, fraction: 0.105, periodsDays: [2, 2000] };
const massIntegral = powerLaw(published.massIndex).integral(0.3, 10);
const axisIndex = axisIndexFromPeriodIndex(published.periodIndex);
const axisRange = published.periodsDays.map((days) => semiMajorAxisAuOfPeriod(days, 1)) as Range;
const perLnMassLnAxis =
  published.fraction / (massIntegral * powerLaw(axisIndex).integral(...axisRange));

runCheckFile('populations', {
  runners: {
    'power law index': ({ index_per_ln: index, range }: { index_per_ln: number; range: Range }) => {
      const integral = powerLaw(index).integral(...range);
      return {
        integral_dlnx: integral,
        normalisation: 1 / integral,
        mean_x: powerLaw(index + 1).integral(...range) / integral,
      };
    },
    'mass index forms': ({ index_dN_dlnm: index }) => ({
      index_dN_dm: fromLogIndex(index, 'linear'),
      index_dN_dlog10m: fromLogIndex(index, 'log'),
      factor_dlog10m_over_dlnm: LOG10_DENSITY_FACTOR,
    }),
    'period index': ({ index_dN_dlnP: index }) => ({
      index_dN_dlna: axisIndexFromPeriodIndex(index),
      index_dN_da: fromLogIndex(axisIndexFromPeriodIndex(index), 'linear'),
      factor_dlna_over_dlnP: AXIS_PER_PERIOD_FACTOR,
    }),
    'RV power law in the published box': () => ({
      axis_index_dN_dlna: axisIndex,
      axis_index_dN_da: fromLogIndex(axisIndex, 'linear'),
      axis_range_au: axisRange,
      C_per_dlnM_dlnP:
        published.fraction /
        (massIntegral *
          powerLaw(published.periodIndex).integral(...(published.periodsDays as Range))),
      C_per_dlnM_dlna: perLnMassLnAxis,
    }),
    'RV power law carried to': ({
      mass_range_mjup: masses,
      axis_range_au: axes,
    }: {
      mass_range_mjup: Range;
      axis_range_au: Range;
    }) =>
      perLnMassLnAxis *
      powerLaw(published.massIndex).integral(...masses) *
      powerLaw(axisIndex).integral(...axes),
    'density of power-law': ({ population: inputs, points_mjup_au: points }) => {
      const population: Population = {
        form: 'power-law',
        massMinMjup: inputs.mass_range_mjup[0],
        massMaxMjup: inputs.mass_range_mjup[1],
        semiMajorAxisMinAu: inputs.axis_range_au[0],
        semiMajorAxisMaxAu: inputs.axis_range_au[1],
        massIndex: inputs.mass.p.index,
        semiMajorAxisIndex: inputs.axis.p.index,
      };
      const { mass, semiMajorAxis } = populationLaws(population);
      return {
        normalisation_mass: mass.law.integral(mass.min, mass.max),
        normalisation_axis: semiMajorAxis.law.integral(semiMajorAxis.min, semiMajorAxis.max),
        density_dlnm_dlna: points.map(([m, a]: Range) => populationDensity(population, m, a)),
      };
    },
  },
  later: {
    'density of log-normal': 'log-normal laws (7.3) come with the wider populations',
    'density of broken': 'broken power laws (7.3) come with the wider populations',
    'mass ratio law': 'laws in the mass ratio (7.4) come with the wider populations',
    'host mass scaling': 'scaling with the host mass (7.5) comes with the wider populations',
    'tabulated systems': 'tabulated systems (7.6) come with the wider populations',
  },
});
