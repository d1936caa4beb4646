import type { MapGrid } from '@/lib/sensitivity';
import { readChecks } from './check-file';

const checks = readChecks('survey-maps');
const setup = checks[0].inputs as unknown as {
  masses_mjup: number[];
  axes_au: number[];
  stars: { name: string }[];
};

/** The grid of the twelve invented stars' maps. */
export const surveyGrid: MapGrid = {
  massMjup: Float64Array.from(setup.masses_mjup),
  semiMajorAxisAu: Float64Array.from(setup.axes_au),
};

/** Their names, in the order of the maps. */
export const surveyStars = setup.stars.map(({ name }) => name);

/** The maps of the check file, all stars of one option in order. */
export function publishedMaps(option: string): Float64Array {
  const maps = checks.filter(({ name }) => name.startsWith(`map ${option} `));
  return Float64Array.from((maps.map(({ expected }) => expected) as number[][][]).flat(2));
}

/** The same, summed over the stars. */
export function publishedSum(option: string): { summed: Float64Array; stars: number } {
  const maps = publishedMaps(option);
  const summed = new Float64Array(surveyGrid.massMjup.length * surveyGrid.semiMajorAxisAu.length);
  for (let at = 0; at < maps.length; at++) summed[at % summed.length] += maps[at];
  return { summed, stars: surveyStars.length };
}
