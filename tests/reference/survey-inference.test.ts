import { expect, test } from 'vitest';
import {
  comparePopulations,
  equalTailedInterval,
  freeIndices,
  highestDensityInterval,
  type Likelihood,
  type PopulationView,
  type RatePrior,
  ratePosterior,
  summariseIndices,
  upperLimit,
  viewPopulation,
} from '@/lib/inference';
import { type DetectionInputs, measuredDetection } from './support/check-detection';
import { differences, readChecks, runCheckFile } from './support/check-file';
import { checkedPopulation, type PopulationInputs } from './support/check-populations';
import {
  computedMaps,
  publishedMaps,
  publishedSum,
  surveyGrid,
  surveyStars,
} from './support/check-survey';

function meanCompleteness(maps: Float64Array, population: PopulationInputs) {
  const view = viewPopulation(maps, surveyGrid, checkedPopulation(population));
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

interface BayesFactorInputs {
  populations: string[];
  prior: { law: 'uniform'; max: number };
  completeness_per_star: number[][];
  detections: DetectionInputs[];
}

/** A population with the completeness that the check itself carries. */
function givenView(name: string, completeness: number[]): PopulationView {
  const { population } = checkCalled(`mean completeness ${name} full`).inputs as {
    population: PopulationInputs;
  };
  return {
    population: checkedPopulation(population),
    completenessPerStar: Float64Array.from(completeness),
    numberSeenPerStar: null,
    rateScale: null,
    hostMassMsun: null,
    exposure: completeness.reduce((a, b) => a + b),
    stars: completeness.length,
    shareOutsideMap: 0,
  };
}

const bayesFactor =
  (likelihood: Likelihood) =>
  ({ populations, prior, completeness_per_star: given, detections }: BayesFactorInputs) => {
    const { rows } = comparePopulations(
      populations.map((name, i) => ({ name, view: givenView(name, given[i]) })),
      {
        likelihood,
        prior,
        detections: detections.map((one) => measuredDetection(one, surveyStars)),
      },
    );
    // The file holds the first over the second, the table every row over the first.
    const logFactor = -(rows[1].logBayesFactor ?? Number.NaN);
    return {
      log_evidence: rows.map(({ logEvidence }) => logEvidence),
      log_bayes_factor_first_over_second: logFactor,
      bayes_factor: Math.exp(logFactor),
    };
  };

interface FreeInputs {
  detections: DetectionInputs[];
  free: {
    mass_range_mjup: [number, number];
    axis_range_au: [number, number];
    alpha_range: [number, number];
    beta_range: [number, number];
    rate_max: number;
  };
}

function freeIndexSummary({ detections, free }: FreeInputs) {
  const { posterior, limit } = freeIndices(
    {
      maps: publishedSum('full'),
      grid: surveyGrid,
      box: {
        massMinMjup: free.mass_range_mjup[0],
        massMaxMjup: free.mass_range_mjup[1],
        semiMajorAxisMinAu: free.axis_range_au[0],
        semiMajorAxisMaxAu: free.axis_range_au[1],
      },
      indices: {
        massIndex: { min: free.alpha_range[0], max: free.alpha_range[1] },
        semiMajorAxisIndex: { min: free.beta_range[0], max: free.beta_range[1] },
      },
      likelihood: 'mean-number',
      prior: { law: 'uniform', max: free.rate_max },
      detections: detections.map((one) => measuredDetection(one, surveyStars)),
    },
    0.95,
  );
  const { rate, massIndex, semiMajorAxisIndex, correlations } = summariseIndices(posterior);
  return {
    rate_mean: rate.mean,
    rate_sd: rate.standardDeviation,
    rate_upper_95: limit,
    alpha_mean: massIndex.mean,
    alpha_sd: massIndex.standardDeviation,
    beta_mean: semiMajorAxisIndex.mean,
    beta_sd: semiMajorAxisIndex.standardDeviation,
    alpha_beta_covariance:
      correlations.indices * massIndex.standardDeviation * semiMajorAxisIndex.standardDeviation,
    log_evidence: posterior.rate.logEvidence,
  };
}

runCheckFile('survey-inference', {
  runners: {
    'mean completeness ': ({ option, population }) =>
      meanCompleteness(computedMaps(option), population),
    'poisson ': summarise,
    'bernoulli ': summarise,
    'Bayes factor poisson': bayesFactor('mean-number'),
    'Bayes factor bernoulli': bayesFactor('host-fraction'),
    'free indices': freeIndexSummary,
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
