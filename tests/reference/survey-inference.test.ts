import { expect, test } from 'vitest';
import {
  equalTailedInterval,
  highestDensityInterval,
  type Likelihood,
  type RatePrior,
  ratePosterior,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
import { computeCompletenessMap, type MapGrid } from '@/lib/sensitivity';
import { differences, readChecks, runCheckFile } from './support/check-file';
import {
  type CurveInputs,
  contrastCurve,
  type LawInputs,
  type StarCheckInputs,
  sensitivitySettings,
  starInputs,
} from './support/check-inputs';
import { checkedPopulation, type PopulationInputs } from './support/check-populations';

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
      age_nodes_per_half: number;
      eccentricity: LawInputs;
    }
  >;
}

const mapChecks = readChecks('survey-maps');
const survey = mapChecks[0].inputs as unknown as Survey;
const grid: MapGrid = {
  massMjup: Float64Array.from(survey.masses_mjup),
  semiMajorAxisAu: Float64Array.from(survey.axes_au),
};

/** The maps of the check file, all stars of one option in order. */
function publishedMaps(option: string): Float64Array {
  const maps = mapChecks.filter(({ name }) => name.startsWith(`map ${option} `));
  return Float64Array.from((maps.map(({ expected }) => expected) as number[][][]).flat(2));
}

/** The same maps by our own engine, from curves, ages and distances. */
function computedMaps(optionName: string): Float64Array {
  const option = survey.options[optionName];
  const maps = survey.stars.map((star) => {
    const { curve: curveName, offset_mag: offset = 0, band } = star;
    const curve = contrastCurve(survey.curves[curveName], band, option.n_sigma, offset);
    const inputs = starInputs(star, [curve], option.age_nodes_per_half === 0);
    const settings = sensitivitySettings(option.eccentricity, option.rule);
    return computeCompletenessMap(inputs, { kind: 'built-in' }, grid, settings).map.completeness;
  });
  return Float64Array.from(maps.flatMap((map) => Array.from(map)));
}

function meanCompleteness(maps: Float64Array, population: PopulationInputs) {
  const view = viewPopulation(maps, grid, checkedPopulation(population));
  return { per_star: view.completenessPerStar, exposure: view.exposure };
}

const likelihoods: Record<string, Likelihood> = {
  poisson: 'mean-number',
  bernoulli: 'host-fraction',
};

interface PosteriorInputs {
  likelihood: string;
  prior: { law: 'uniform' | 'log-uniform' | 'jeffreys'; max: number; floor: number };
  completeness_per_star: number[];
  detected_star_indices: number[];
  detection_density: number[];
}

function buildPrior({ law, max, floor }: PosteriorInputs['prior']): RatePrior {
  return law === 'log-uniform' ? { law, min: floor, max } : { law, max };
}

function summarise(inputs: PosteriorInputs) {
  const posterior = ratePosterior({
    likelihood: likelihoods[inputs.likelihood],
    completeness: Float64Array.from(inputs.completeness_per_star),
    detectedStars: inputs.detected_star_indices,
    prior: buildPrior(inputs.prior),
  });
  const logShapes = inputs.detection_density.reduce((sum, shape) => sum + Math.log(shape), 0);
  return {
    mean: posterior.mean,
    sd: posterior.standardDeviation,
    median: posterior.median,
    upper_limit_68: upperLimit(posterior, 0.68),
    upper_limit_90: upperLimit(posterior, 0.9),
    upper_limit_95: upperLimit(posterior, 0.95),
    upper_limit_99: upperLimit(posterior, 0.99),
    equal_tailed_68: equalTailedInterval(posterior, 0.68),
    equal_tailed_95: equalTailedInterval(posterior, 0.95),
    hdi_68: highestDensityInterval(posterior, 0.68),
    hdi_95: highestDensityInterval(posterior, 0.95),
    log_evidence: posterior.logEvidence + logShapes,
  };
}

runCheckFile('survey-inference', {
  runners: {
    'mean completeness ': ({ option, population }) =>
      meanCompleteness(computedMaps(option), population),
    'poisson ': summarise,
    'bernoulli ': summarise,
  },
  later: {
    'Bayes factor': 'Bayes factors between populations (10) come with evidence',
    'free indices': 'free indices (8.3) come with their likelihood',
  },
});

function checkCalled(name: string) {
  const check = readChecks('survey-inference').find((one) => one.name === name);
  if (check === undefined) throw new Error(`no check called ${name}`);
  return check;
}

test.each(['power-law A plain', 'power-law A full', 'log-normal B plain', 'log-normal B full'])(
  'given the maps of the set, mean completeness holds to 1e-5: %s',
  (name) => {
    const { inputs, expected } = checkCalled(`mean completeness ${name}`);
    const { population } = inputs as { population: PopulationInputs };
    const actual = meanCompleteness(publishedMaps(name.split(' ')[2]), population);
    expect(differences(actual, expected, { rel: 1e-5 })).toEqual([]);
  },
);

test('the completeness that the posteriors use follows from the maps of the set', () => {
  const posterior = checkCalled('poisson power-law A 0 detections uniform');
  const { completeness_per_star: used } = posterior.inputs as unknown as PosteriorInputs;
  const mean = checkCalled('mean completeness power-law A full');
  const { population } = mean.inputs as { population: PopulationInputs };
  const { per_star: actual } = meanCompleteness(publishedMaps('full'), population);
  expect(differences(actual, used, { rel: 1e-5 })).toEqual([]);
});
