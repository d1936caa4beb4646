import {
  type AxisShape,
  axisShapes,
  fromLogIndex,
  type HostScaling,
  hostScalingOf,
  type Population,
  type PopulationBox,
  populationBox,
  populationWarnings,
  type SystemsSummary,
  summariseSystems,
} from '@/lib/population';
import { formatPlain, formatRange } from '@/lib/quantities/display';

const MASS_UNIT = 'MJ';
const AXIS_UNIT = 'AU';

/** What words can be found for: of tabulated systems a summary is enough. */
export type DescribedPopulation = Population | SystemsSummary;

const summaryOf = (population: Extract<DescribedPopulation, { form: 'systems' }>) =>
  'weight' in population ? summariseSystems(population) : population;

const describeBox = (box: PopulationBox) =>
  `${formatRange(box.massMinMjup, box.massMaxMjup, MASS_UNIT)} at ` +
  formatRange(box.semiMajorAxisMinAu, box.semiMajorAxisMaxAu, AXIS_UNIT);

/** 'planets of 2–30 MJ at 20–300 AU'; of a table its systems, of mass ratios their range. */
export function describePlanets(population: DescribedPopulation): string {
  if (population.form === 'systems') {
    return `tabulated systems with planets of ${describeBox(summaryOf(population))}`;
  }
  if (population.form === 'mass-ratio') {
    const ratio = formatRange(population.massRatioMin, population.massRatioMax, '');
    const { semiMajorAxisMinAu: near, semiMajorAxisMaxAu: far } = population;
    return `planets of ${ratio} times the star's mass at ${formatRange(near, far, AXIS_UNIT)}`;
  }
  return `planets of ${describeBox(populationBox(population))}`;
}

/** The same of a single one: 'planet of 2–30 MJ at 20–300 AU'. */
export function describePlanet(population: DescribedPopulation): string {
  const words = describePlanets(population);
  return population.form === 'systems'
    ? words.replace('tabulated systems', 'tabulated system')
    : words.replace('planets', 'planet');
}

/** Stars that a rate is quoted for: 'stars', or 'stars of 1 solar mass' where it scales. */
export function describeStars(population: DescribedPopulation): string {
  const scaling = hostScalingOf(population);
  return scaling === null ? 'stars' : `stars of ${solarMasses(scaling.referenceMsun)}`;
}

const solarMasses = (massMsun: number) =>
  `${formatPlain(massMsun)} solar mass${massMsun === 1 ? '' : 'es'}`;

interface AxisWords {
  symbol: 'M' | 'a' | 'q';
  min: number;
  max: number;
  unit: string;
}

function describeAxis(shape: AxisShape, { symbol, min, max, unit }: AxisWords): string {
  const between = `between ${formatPlain(min)} and ${formatPlain(max)} ${unit}`.trimEnd();
  const power = (index: number) => `${symbol}^${formatPlain(fromLogIndex(index, 'linear'))}`;
  const at = (x: number) => `${formatPlain(x)} ${unit}`.trimEnd();
  switch (shape.shape) {
    case 'power-law':
      return `dN/d${symbol} ∝ ${power(shape.index)} ${between}`;
    case 'broken-power-law':
      return (
        `dN/d${symbol} ∝ ${power(shape.innerIndex)} below ${at(shape.breakAt)} and ` +
        `${power(shape.outerIndex)} above, ${between}`
      );
    case 'log-normal':
      return `${symbol} log-normal around ${at(shape.median)}, σ ${formatPlain(shape.sigmaDex)} dex, ${between}`;
    case 'tabulated':
      return `${symbol} from a table of ${shape.at.length} places, ${between}`;
  }
}

function describeSystems(summary: SystemsSummary): string {
  const count = (n: number, noun: string) => `${n} ${noun}${n === 1 ? '' : 's'}`;
  return (
    `${count(summary.systems, 'tabulated system')} with ${count(summary.companions, 'companion')} ` +
    `of ${describeBox(summary)}`
  );
}

/**
 * The shape of a population, indices in the linear convention.
 *
 * @example describePopulation(population)
 * // 'dN/dM ∝ M^−1.3 between 2 and 30 MJ, dN/da ∝ a^−0.6 between 20 and 300 AU'
 */
export function describePopulation(population: DescribedPopulation): string {
  if (population.form === 'systems') return describeSystems(summaryOf(population));
  const { mass, semiMajorAxis } = axisShapes(population);
  const { semiMajorAxisMinAu: near, semiMajorAxisMaxAu: far } = population;
  const ofAxis = describeAxis(semiMajorAxis, { symbol: 'a', min: near, max: far, unit: AXIS_UNIT });
  const ofMass =
    population.form === 'mass-ratio'
      ? describeAxis(mass, {
          symbol: 'q',
          min: population.massRatioMin,
          max: population.massRatioMax,
          unit: "of the star's mass",
        })
      : describeAxis(mass, {
          symbol: 'M',
          min: population.massMinMjup,
          max: population.massMaxMjup,
          unit: MASS_UNIT,
        });
  const scaling = hostScalingOf(population);
  return [ofMass, ofAxis, ...(scaling === null ? [] : [describeScaling(scaling)])].join(', ');
}

function describeScaling({ index, referenceMsun }: HostScaling): string {
  return `rate ∝ (host mass/${solarMasses(referenceMsun)})^${formatPlain(index)}`;
}

/** A condition that a population brings with it. */
interface PopulationCondition {
  label: string;
  text: string;
}

/**
 * What a limit under a population rests on besides its shape.
 *
 * @param isHostFraction whether the rate is a fraction of stars
 * @param cutAt where the prior of the fraction ends so that no star's own exceeds 1, or null
 */
export function populationConditions(
  population: Population,
  isHostFraction: boolean,
  cutAt: number | null,
): PopulationCondition[] {
  const conditions: PopulationCondition[] = [];
  if (hostScalingOf(population) !== null) {
    const text = `the rate is that of ${describeStars(population)}, each star's follows from its mass`;
    conditions.push({ label: 'Host mass', text });
  }
  if (isHostFraction && cutAt !== null) {
    const text = `prior cut at ${formatPlain(cutAt, 3)}, above which one star's own fraction would exceed 1`;
    conditions.push({ label: 'Largest rate', text });
  }
  if (population.form === 'mass-ratio') {
    const text = "the range of masses is each star's own: mass ratio times host mass";
    conditions.push({ label: 'Host mass', text });
  }
  if (population.form === 'systems') {
    const text = isHostFraction
      ? 'a star counts as a host when any companion of its system is seen; orbit planes independent'
      : 'approximate: detections in one system go together, so that counts are wider than Poisson';
    conditions.push({ label: 'Systems', text });
  }
  for (const text of populationWarnings(population)) conditions.push({ label: 'Range', text });
  return conditions;
}
