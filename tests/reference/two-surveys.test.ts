import {
  type RateQuestion,
  ratePosterior,
  surveyInfluence,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
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
import { checkedPopulation, type PopulationInputs } from './support/check-populations';

type Entry = StarCheckInputs & { curve: string; offset_mag: number };

interface TwoSurveys {
  masses_mjup: number[];
  axes_au: number[];
  curves: Record<string, CurveInputs>;
  surveys: { name: string; stars: Entry[] }[];
  population: PopulationInputs;
  option: {
    rule: 'hard' | 'smooth';
    n_sigma: number;
    /** The values of this file carry the error of so many age nodes. */
    age_nodes_per_half: number;
    eccentricity: LawInputs;
  };
}

const setup = readChecks('two-surveys')[0].inputs as unknown as TwoSurveys;

const population = checkedPopulation(setup.population);
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
  const { eccentricity, rule, age_nodes_per_half } = setup.option;
  const settings = sensitivitySettings(eccentricity, rule, age_nodes_per_half);
  return computeCompletenessMap(star, { kind: 'built-in' }, grid, settings).map;
}

function rows(map: CompletenessMap): number[][] {
  const columns = map.semiMajorAxisAu.length;
  return Array.from(map.massMjup, (_, i) =>
    Array.from(map.completeness.subarray(i * columns, (i + 1) * columns)),
  );
}

const oneByOne = (star: string) => entriesOf(star).map((entry) => mapOf([entry]));

interface FlatInputs {
  max: number;
  level: number;
}

const starNames = [...new Set(entries.map((entry) => entry.name))];
const isAny = () => true;
const isOf = (survey: string) => {
  const own = new Set(setup.surveys.find(({ name }) => name === survey)?.stars);
  return (entry: Entry) => own.has(entry);
};

/** One map a star, from the entries that are kept. */
function mapsOf(
  isKept: (entry: Entry) => boolean,
  combine: (maps: CompletenessMap[]) => CompletenessMap,
): CompletenessMap[] {
  return starNames.flatMap((name) => {
    const maps = entriesOf(name)
      .filter(isKept)
      .map((entry) => mapOf([entry]));
    if (maps.length === 0) return [];
    return maps.length === 1 ? maps : combine(maps);
  });
}

function questionOf(maps: CompletenessMap[], { max }: FlatInputs): RateQuestion {
  const stacked = Float64Array.from(maps.flatMap(({ completeness }) => Array.from(completeness)));
  const { completenessPerStar } = viewPopulation(stacked, maps[0], population);
  return {
    likelihood: 'mean-number',
    completeness: completenessPerStar as Float64Array,
    detectedStars: [],
    prior: { law: 'uniform', max },
  };
}

function limitOf(maps: CompletenessMap[], inputs: FlatInputs) {
  const posterior = ratePosterior(questionOf(maps, inputs));
  return {
    exposure: posterior.exposure,
    upper_limit_95: upperLimit(posterior, inputs.level),
  };
}

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
    'exposures and limits by rule': (inputs: FlatInputs) => ({
      'only first': limitOf(mapsOf(isOf('first'), combineIndependent), inputs),
      'only second': limitOf(mapsOf(isOf('second'), combineIndependent), inputs),
      independent: limitOf(mapsOf(isAny, combineIndependent), inputs),
      deepest: limitOf(mapsOf(isAny, combineDeepest), inputs),
      'same position': limitOf(
        starNames.map((name) => mapOf(entriesOf(name))),
        inputs,
      ),
      'stars counted twice (wrong)': limitOf(
        entries.map((entry) => mapOf([entry])),
        inputs,
      ),
    }),
    'leave one survey out': (inputs: FlatInputs) => {
      const without = (name: string) => {
        const left = (entry: Entry) => !isOf(name)(entry);
        const question = questionOf(mapsOf(isAny, combineIndependent), inputs);
        const rest = new Map(
          starNames
            .filter((star) => entriesOf(star).some(left))
            .map((star, i) => [star, i] as const),
        );
        const seen = questionOf(mapsOf(left, combineIndependent), inputs).completeness;
        const completenessWithout = Float64Array.from(starNames, (star) => {
          const place = rest.get(star);
          return place === undefined ? 0 : seen[place];
        });
        const [survey] = surveyInfluence(
          question,
          [{ name, completenessWithout, detectedWithout: [] }],
          inputs.level,
        );
        return { exposure: survey.without?.exposure, upper_limit_95: survey.without?.limit };
      };
      return { 'without first': without('first'), 'without second': without('second') };
    },
    'map same position': ({ star }) => rows(mapOf(entriesOf(star))),
  },
});
