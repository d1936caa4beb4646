import {
  computeCompletenessMap,
  type MapGrid,
  type SensitivitySettings,
  type StarInputs,
} from '@/lib/sensitivity';
import { readChecks } from './check-file';
import {
  type CurveInputs,
  contrastCurve,
  type LawInputs,
  type StarCheckInputs,
  sensitivitySettings,
  starInputs,
} from './check-inputs';

interface Survey {
  masses_mjup: number[];
  axes_au: number[];
  stars: (StarCheckInputs & { curve: string; offset_mag?: number })[];
  curves: Record<string, CurveInputs>;
  options: Record<
    string,
    {
      rule: 'hard' | 'smooth';
      n_sigma: number;
      /** The values of the file carry the error of so many age nodes; 0 for exact ages. */
      age_nodes_per_half: number;
      eccentricity: LawInputs;
    }
  >;
}

const checks = readChecks('survey-maps');
const setup = checks[0].inputs as unknown as Survey;

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

/** Stars and settings of one option, as the engine takes them. */
export function surveyInputs(optionName: string): {
  stars: StarInputs[];
  settings: SensitivitySettings;
} {
  const { eccentricity, rule, n_sigma, age_nodes_per_half } = setup.options[optionName];
  const stars = setup.stars.map((star) => {
    const { curve: curveName, offset_mag: offset = 0, band } = star;
    const curve = contrastCurve(setup.curves[curveName], band, n_sigma, offset);
    return starInputs(star, [curve], age_nodes_per_half === 0);
  });
  return { stars, settings: sensitivitySettings(eccentricity, rule, age_nodes_per_half) };
}

/** The map of one star by our own engine, from curve, age and distance. */
export const computedMap = (star: StarInputs, settings: SensitivitySettings): Float64Array =>
  computeCompletenessMap(star, { kind: 'built-in' }, surveyGrid, settings).map.completeness;

/** The maps of an option's stars, in order; what is asked changes them before. */
export function computedMaps(
  optionName: string,
  change: (star: StarInputs) => StarInputs = (star) => star,
  others: Partial<SensitivitySettings> = {},
): Float64Array {
  const { stars, settings } = surveyInputs(optionName);
  const maps = stars.map((star) => computedMap(change(star), { ...settings, ...others }));
  return Float64Array.from(maps.flatMap((map) => Array.from(map)));
}
