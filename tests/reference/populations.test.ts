import { ratePosterior, upperLimit } from '@/lib/inference';
import {
  AXIS_PER_PERIOD_FACTOR,
  axisIndexFromPeriodIndex,
  fromLogIndex,
  LOG10_DENSITY_FACTOR,
  largestReferenceFraction,
  type MassRatioPopulation,
  type Population,
  type PowerLawPopulation,
  populationBox,
  populationDensity,
  populationLaws,
  powerLaw,
  rateScales,
  type SystemsPopulation,
  sampleCompleteness,
  seeSystems,
  systemsOnGrid,
} from '@/lib/population';
import { semiMajorAxisAuOfPeriod } from '@/lib/quantities/periods';
import { runCheckFile } from './support/check-file';
import { checkedPopulation, type PopulationInputs } from './support/check-populations';

type Range = [number, number];

/** Rate per d ln M d ln a of a law with 10.5 % of stars in 0.3-10 M_Jup and 2-2000 d. */
const published = { massIndex: -0.31, periodIndex: 0.26, fraction: 0.105, periodsDays: [2, 2000] };
const massIntegral = powerLaw(published.massIndex).integral(0.3, 10);
const axisIndex = axisIndexFromPeriodIndex(published.periodIndex);
const axisRange = published.periodsDays.map((days) => semiMajorAxisAuOfPeriod(days, 1)) as Range;
const perLnMassLnAxis =
  published.fraction / (massIntegral * powerLaw(axisIndex).integral(...axisRange));

interface DensityInputs {
  population: PopulationInputs;
  points_mjup_au: Range[];
}

interface SystemsInputs {
  masses_mjup: number[];
  axes_au: number[];
  completeness: number[][];
  /** Per system its companions: mass and semi-major axis. */
  systems: Range[][];
  weights: number[];
}

function systemsOf(systems: Range[][], weight: number[]): SystemsPopulation {
  const companions = systems.flatMap((system, y) => system.map(([m, a]) => ({ y, m, a })));
  return {
    form: 'systems',
    weight,
    companionSystem: companions.map(({ y }) => y),
    massMjup: companions.map(({ m }) => m),
    semiMajorAxisAu: companions.map(({ a }) => a),
  };
}

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
    'density of ': ({ population: inputs, points_mjup_au: points }: DensityInputs) => {
      const population: Population = checkedPopulation(inputs);
      const { mass, semiMajorAxis } = populationLaws(population);
      return {
        normalisation_mass: mass.law.integral(mass.min, mass.max),
        normalisation_axis: semiMajorAxis.law.integral(semiMajorAxis.min, semiMajorAxis.max),
        density_dlnm_dlna: points.map(([m, a]: Range) => populationDensity(population, m, a)),
      };
    },
    'mass ratio law': ({ index_dN_dlnq: index, range_q: range, host_mass_sun: host }) => {
      const population: MassRatioPopulation = {
        form: 'mass-ratio',
        massRatioMin: range[0],
        massRatioMax: range[1],
        massRatioIndex: index,
        semiMajorAxisMinAu: 10,
        semiMajorAxisMaxAu: 200,
        semiMajorAxis: { shape: 'power-law', index: 0 },
      };
      const box = populationBox(population, host);
      const middle = Math.sqrt(box.massMinMjup * box.massMaxMjup);
      const { law } = populationLaws(population, host).mass;
      return {
        mass_range_mjup: [box.massMinMjup, box.massMaxMjup],
        index_dN_dlnm: Math.log(law.shape(middle * Math.E) / law.shape(middle)),
        integral_dlnq: powerLaw(population.massRatioIndex).integral(range[0], range[1]),
      };
    },
    'host mass scaling': ({ gamma, reference_mass_sun: reference, ...sample }) => {
      const population: PowerLawPopulation = {
        form: 'power-law',
        massMinMjup: 1,
        massMaxMjup: 10,
        semiMajorAxisMinAu: 10,
        semiMajorAxisMaxAu: 100,
        massIndex: 0,
        semiMajorAxisIndex: 0,
        hostScaling: { index: gamma, referenceMsun: reference },
      };
      const masses = Float64Array.from(sample.host_masses_sun as number[]);
      const scales = rateScales(population, masses, masses.length) as Float64Array;
      const scaled = scales.map((scale, star) => scale * sample.completeness[star]);
      const exposure = scaled.reduce((a, b) => a + b);
      const posterior = ratePosterior({
        likelihood: 'mean-number',
        completeness: scaled,
        detectedStars: [],
        prior: { law: 'gamma', shape: 1, rate: 0 },
      });
      return {
        weights: scales,
        exposure,
        largest_fraction_at_reference: largestReferenceFraction(scales),
        upper_limit_95_mean_number_no_detection: upperLimit(posterior, 0.95),
      };
    },
    'tabulated systems': (inputs: SystemsInputs) => {
      const grid = {
        massMjup: Float64Array.from(inputs.masses_mjup),
        semiMajorAxisAu: Float64Array.from(inputs.axes_au),
      };
      const map = Float64Array.from(inputs.completeness.flat());
      const whole = systemsOf(inputs.systems, inputs.weights);
      const seen = sampleCompleteness(map, grid, whole);
      const alone = inputs.systems.map((system) => {
        if (system.length === 0) return { anySeen: 0, numberSeen: 0 };
        return seeSystems(map, 0, systemsOnGrid(grid, systemsOf([system], [1])));
      });
      return {
        any_seen: alone.map(({ anySeen }) => anySeen),
        number_seen: alone.map(({ numberSeen }) => numberSeen),
        mean_any_seen: seen.perStar[0],
        mean_number_seen: seen.numberSeenPerStar?.[0],
      };
    },
  },
});
