import {
  type CompletenessMap,
  combineDeepest,
  combineIndependent,
  computeCompletenessMap,
} from '@/lib/sensitivity';
import { readChecks, runCheckFile } from './support/check-file';
import {
  type CurveInputs,
  contrastCurve,
  type LawInputs,
  type StarCheckInputs,
  sensitivitySettings,
  starInputs,
} from './support/check-inputs';

type Entry = StarCheckInputs & { curve: string; offset_mag: number };

interface TwoSurveys {
  masses_mjup: number[];
  axes_au: number[];
  curves: Record<string, CurveInputs>;
  surveys: { name: string; stars: Entry[] }[];
  option: { rule: 'hard' | 'smooth'; n_sigma: number; eccentricity: LawInputs };
}

const setup = readChecks('two-surveys')[0].inputs as unknown as TwoSurveys;

const entries = setup.surveys.flatMap((survey) => survey.stars);
const entriesOf = (name: string) => entries.filter((entry) => entry.name === name);
const curveOf = (entry: Entry) =>
  contrastCurve(setup.curves[entry.curve], entry.band, setup.option.n_sigma, entry.offset_mag);

/** The star seen with all given entries' curves at one position. */
function mapOf(seen: Entry[]): CompletenessMap {
  const star = {
    ...starInputs(seen[0], seen.map(curveOf), false),
    hostMags: seen.map((entry) => entry.magnitude),
  };
  const grid = {
    massMjup: Float64Array.from(setup.masses_mjup),
    semiMajorAxisAu: Float64Array.from(setup.axes_au),
  };
  const settings = sensitivitySettings(setup.option.eccentricity, setup.option.rule);
  return computeCompletenessMap(star, { kind: 'built-in' }, grid, settings).map;
}

function rows(map: CompletenessMap): number[][] {
  const columns = map.semiMajorAxisAu.length;
  return Array.from(map.massMjup, (_, i) =>
    Array.from(map.completeness.subarray(i * columns, (i + 1) * columns)),
  );
}

const oneByOne = (star: string) => entriesOf(star).map((entry) => mapOf([entry]));

runCheckFile('two-surveys', {
  runners: {
    setup: () => {
      const names = [...new Set(entries.map((entry) => entry.name))];
      return {
        unique_stars: names.length,
        entries: entries.length,
        stars_in_several_surveys: names.filter((name) => entriesOf(name).length > 1),
      };
    },
    'map independent': ({ star }) => rows(combineIndependent(oneByOne(star))),
    'map deepest': ({ star }) => rows(combineDeepest(oneByOne(star))),
    'map same position': ({ star }) => rows(mapOf(entriesOf(star))),
  },
  later: {
    'exposures and limits by rule': 'combining surveys in an analysis comes with another part',
    'leave one survey out': 'influence of a survey comes with another part',
  },
});
