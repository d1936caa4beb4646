import type { MarginCurve } from '@/components/charts/companion-scatter';
import type { MapData } from '@/components/charts/map-contours';
import type { LiveSample } from '@/components/runs/live-sample';
import {
  axisLaw,
  axisShapes,
  type MassRatioPopulation,
  massOfRatioMjup,
  type Population,
  type SystemsPopulation,
} from '@/lib/population';
import { interpolateMap } from './interpolate-map';
import type { LawAxis } from './law-parts';
import { hostMassesOf, type Spread } from './spread';

const POINTS = 60;
const BINS = 24;

export type Margins = Record<LawAxis, MarginCurve>;

/** Density per logarithm along both axes: of all companions, and of those that would be seen. */
export function marginsOf(sample: LiveSample, population: Population, spread: Spread): Margins {
  if (population.form === 'systems') {
    return {
      mass: systemsMargin(population, spread, 'mass'),
      semiMajorAxis: systemsMargin(population, spread, 'semiMajorAxis'),
    };
  }
  const { box, map } = spread;
  const { mass, semiMajorAxis } = axisShapes(population);
  const axisAt = geometric(box.semiMajorAxisMinAu, box.semiMajorAxisMaxAu);
  const axisAll = axisAt.map(axisLaw(semiMajorAxis).shape);
  const massAt = geometric(box.massMinMjup, box.massMaxMjup);
  if (population.form === 'mass-ratio') {
    const axisSeen = seenAlongAxis(sample, spread);
    return {
      mass: ratioMargin(sample, population, spread, massAt),
      semiMajorAxis: seenOf(axisAt, axisAll, map.semiMajorAxisAu, axisSeen),
    };
  }
  const massAll = massAt.map(axisLaw(mass).shape);
  const along = seenAlong(map, spread.weights);
  return {
    mass: seenOf(massAt, massAll, map.massMjup, along.mass),
    semiMajorAxis: seenOf(axisAt, axisAll, map.semiMajorAxisAu, along.semiMajorAxis),
  };
}

function geometric(min: number, max: number): Float64Array {
  return Float64Array.from({ length: POINTS }, (_, i) => min * (max / min) ** (i / (POINTS - 1)));
}

function seenOf(
  at: Float64Array,
  all: Float64Array,
  nodes: Float64Array,
  seenAt: Float64Array,
): MarginCurve {
  return { at, all, seen: all.map((density, i) => density * valueOn(nodes, seenAt, at[i])) };
}

/** The mean map averaged over the law of the other axis. */
function seenAlong(map: MapData, { mass, semiMajorAxis }: Spread['weights']) {
  const columns = semiMajorAxis.length;
  const along = { mass: mass.map(() => 0), semiMajorAxis: semiMajorAxis.map(() => 0) };
  for (let row = 0; row < mass.length; row++) {
    for (let column = 0; column < columns; column++) {
      const seen = map.completeness[row * columns + column];
      along.mass[row] += semiMajorAxis[column] * seen;
      along.semiMajorAxis[column] += mass[row] * seen;
    }
  }
  return along;
}

/** Mass ratio: each star's own map averaged over its own range of masses, then over the stars. */
function seenAlongAxis(sample: LiveSample, { star, share, massOf }: Spread): Float64Array {
  const columns = sample.grid.semiMajorAxisAu.length;
  const rows = sample.grid.massMjup.length;
  const along = new Float64Array(columns);
  star.forEach((j, i) => {
    const own = massOf?.[i];
    for (let row = 0; row < rows; row++) {
      const weight = ((own?.[row] ?? 0) * share[i]) / 65_535;
      if (weight === 0) continue;
      const start = (j * rows + row) * columns;
      for (let column = 0; column < columns; column++) {
        along[column] += weight * sample.maps[start + column];
      }
    }
  });
  return along;
}

/** Mass ratio: densities in mass of all stars, each over its own range and seen by its own map. */
function ratioMargin(
  sample: LiveSample,
  population: MassRatioPopulation,
  { star, share, weights }: Spread,
  at: Float64Array,
): MarginCurve {
  const { massMjup } = sample.grid;
  const columns = weights.semiMajorAxis.length;
  const masses = hostMassesOf(sample);
  const all = new Float64Array(at.length);
  const seen = new Float64Array(at.length);
  const own = new Float64Array(massMjup.length);
  star.forEach((j, i) => {
    const host = masses[j];
    const [min, max] = [population.massRatioMin, population.massRatioMax].map((ratio) =>
      massOfRatioMjup(ratio, host),
    );
    for (let row = 0; row < own.length; row++) {
      const start = (j * own.length + row) * columns;
      let sum = 0;
      for (let column = 0; column < columns; column++) {
        sum += sample.maps[start + column] * weights.semiMajorAxis[column];
      }
      own[row] = sum / 65_535;
    }
    const slack = 1e-9;
    at.forEach((mass, k) => {
      if (mass < min * (1 - slack) || mass > max * (1 + slack)) return;
      const density = share[i] * (mass / host) ** population.massRatioIndex;
      all[k] += density;
      seen[k] += density * valueOn(massMjup, own, mass);
    });
  });
  return { at, all, seen };
}

/** Tabulated systems: companions by their systems' weight, in steps even in the logarithm. */
function systemsMargin(
  population: SystemsPopulation,
  { box, map }: Spread,
  axis: LawAxis,
): MarginCurve {
  const [low, high] =
    axis === 'mass'
      ? [box.massMinMjup, box.massMaxMjup]
      : [box.semiMajorAxisMinAu, box.semiMajorAxisMaxAu];
  const [min, max] = high > low * 1.02 ? [low, high] : [low / 1.05, high * 1.05];
  const all = new Float64Array(BINS);
  const seen = new Float64Array(BINS);
  population.companionSystem.forEach((system, k) => {
    const [mass, semiMajorAxis] = [population.massMjup[k], population.semiMajorAxisAu[k]];
    const x = axis === 'mass' ? mass : semiMajorAxis;
    const place = (BINS * Math.log(x / min)) / Math.log(max / min);
    const bin = Math.min(BINS - 1, Math.max(0, Math.floor(place)));
    all[bin] += population.weight[system];
    seen[bin] += population.weight[system] * interpolateMap(map, mass, semiMajorAxis);
  });
  const edge = (i: number) => min * (max / min) ** (i / BINS);
  const steps = (values: Float64Array) =>
    Float64Array.from({ length: 2 * BINS }, (_, i) => values[i >> 1]);
  return {
    at: Float64Array.from({ length: 2 * BINS }, (_, i) => edge((i + 1) >> 1)),
    all: steps(all),
    seen: steps(seen),
  };
}

function valueOn(nodes: Float64Array, values: Float64Array, x: number): number {
  if (x < nodes[0] || x > nodes[nodes.length - 1]) return 0;
  let above = 1;
  while (above < nodes.length - 1 && nodes[above] < x) above++;
  const step = Math.log(nodes[above] / nodes[above - 1]);
  const share = Math.log(x / nodes[above - 1]) / step;
  return values[above - 1] + share * (values[above] - values[above - 1]);
}
