import type { PopulationBox } from '@/lib/population';
import type { MapGrid } from '@/lib/sensitivity';
import {
  countDetections,
  type DetectionSetAside,
  type StackedMaps,
  type SummedMap,
} from './answer';
import type { Likelihood, RatePosterior, RatePrior } from './contract';
import { logDetectionShapes } from './detection-shape';
import { INDEX_NODES, type IndexRanges, type IndexTable, indexTable } from './index-table';
import { sumMaps } from './limit-map';
import type { MeasuredDetection } from './measured-places';
import { fractionRates, numberRates } from './node-rates';
import type { PriorLaw } from './prior-law';
import { priorLaw } from './priors';
import { mixturePosterior, type RateMixture, rateRule } from './rate-mixture';

/** What is asked when the two indices of a power law are free beside the rate. */
export interface FreeIndexQuestion {
  /** A summed map answers the mean number only. */
  maps: StackedMaps | SummedMap;
  grid: MapGrid;
  /** Ranges of the population in mass and semi-major axis. */
  box: PopulationBox;
  /** The indices are uniform on these, per natural logarithm. */
  indices: IndexRanges;
  likelihood: Likelihood;
  prior: RatePrior;
  /** Vetted companions, to be counted where they lie in the box. */
  detections: readonly MeasuredDetection[];
  /** s_j = (M_j/M0)^gamma, shape [star]: each star's rate over the one asked for. */
  rateScale?: Float64Array;
}

/** Posterior of the rate and of both indices, at nodes of the indices. */
export interface FreeIndexPosterior {
  /** The rate with the indices summed out; its log evidence holds the shapes of the detections. */
  rate: RatePosterior;
  mixture: RateMixture;
  table: IndexTable;
  counted: MeasuredDetection[];
  setAside: DetectionSetAside[];
  /** ln of each node's share of the posterior, shape [mass index, axis index]; shares sum to 1. */
  logShare: Float64Array;
  /** Mean rate at each node, shape [mass index, axis index]. */
  rateMean: Float64Array;
}

/**
 * What each pair of indices would show, with each star's own rate in it: f s_j C_j is f times an
 * entry. The mean number needs no more of the maps than their sum.
 */
function tableOf(question: FreeIndexQuestion, nodes: number): IndexTable {
  const { maps, grid, box, indices, likelihood, rateScale } = question;
  if ('summed' in maps || likelihood === 'mean-number') {
    if (likelihood === 'host-fraction') {
      throw new RangeError("the host fraction needs each star's map, not only their sum");
    }
    const summed = sumMaps(maps, grid, rateScale);
    const stars = 'summed' in maps ? maps.stars : maps.length / summed.length;
    return indexTable({ summed, stars }, grid, box, indices, nodes);
  }
  const table = indexTable(maps, grid, box, indices, nodes);
  const { completeness, stars } = table;
  if (rateScale === undefined || completeness === null) return table;
  if (rateScale.length !== stars) {
    throw new RangeError(`a scale for each of ${stars} stars is needed, got ${rateScale.length}`);
  }
  const exposure = new Float64Array(table.exposure.length);
  const scaled = completeness.map((c, at) => {
    const own = c * rateScale[at % stars];
    exposure[Math.floor(at / stars)] += own;
    return own;
  });
  return { ...table, completeness: scaled, exposure };
}

function lawOf(question: FreeIndexQuestion): PriorLaw {
  const { prior, likelihood, rateScale } = question;
  if (prior.law === 'jeffreys' && likelihood === 'host-fraction') {
    throw new RangeError(
      'the Jeffreys prior of a host fraction follows the completeness, which changes with the ' +
        'indices: choose another prior where they are free',
    );
  }
  const law = priorLaw(prior, likelihood, new Float64Array(0));
  if (likelihood === 'mean-number' || rateScale === undefined) return law;
  const cut = rateScale.reduce((least, s) => Math.min(least, 1 / s), Number.POSITIVE_INFINITY);
  const [low, top] = law.support;
  if (cut >= top) return law;
  if (cut <= low) throw new RangeError(`the prior begins at ${low}, above the largest rate ${cut}`);
  return { ...law, support: [low, cut], logNorm: 'numerical' };
}

/** For the host fraction the star of a detection must be able to show something. */
function requireSeen(detections: readonly MeasuredDetection[], table: IndexTable): void {
  const { completeness, stars } = table;
  for (const { name, star } of detections) {
    if (!(Number.isInteger(star) && star >= 0 && star < stars)) {
      throw new RangeError(`${name} belongs to star ${star}, which the sample does not hold`);
    }
    let largest = 0;
    for (let at = star; completeness !== null && at < completeness.length; at += stars) {
      largest = Math.max(largest, completeness[at]);
    }
    if (completeness !== null && largest === 0) {
      throw new RangeError(
        `${name} was detected where the map of its star says nothing can be seen: check the map, ` +
          'the ranges or the companion',
      );
    }
  }
}

/** ln of prior weight and shapes of the detections at each node. */
function logNodeWeights(
  { box, rateScale }: FreeIndexQuestion,
  { massIndex, semiMajorAxisIndex }: IndexTable,
  counted: readonly MeasuredDetection[],
): Float64Array {
  const columns = semiMajorAxisIndex.at.length;
  const logs = new Float64Array(massIndex.at.length * columns).map((_, node) =>
    Math.log(
      massIndex.weight[Math.floor(node / columns)] * semiMajorAxisIndex.weight[node % columns],
    ),
  );
  for (const detection of counted) {
    const shapes = logDetectionShapes(box, detection, massIndex.at, semiMajorAxisIndex.at);
    if (shapes[0] === Number.NEGATIVE_INFINITY) {
      throw new RangeError(
        `nothing of the measurement of ${detection.name} lies in the ranges: check its values`,
      );
    }
    const logScale = rateScale === undefined ? 0 : Math.log(rateScale[detection.star]);
    for (let node = 0; node < logs.length; node++) logs[node] += shapes[node] + logScale;
  }
  return logs;
}

/** Shares of the nodes, and the mean rate at each, from places of the rate that serve all. */
function sumOverRate(mixture: RateMixture, rate: RatePosterior) {
  const { rates, logWeight, constrained } = mixture;
  const rule = rateRule(mixture, rate);
  const { nodes } = rates;
  const places = rule.x.length;
  const logs = new Float64Array(nodes);
  const all = new Float64Array(places * nodes);
  const peaks = new Float64Array(nodes).fill(Number.NEGATIVE_INFINITY);
  for (let i = 0; i < places; i++) {
    if (constrained) rates.fill(rule.x[i], 1 - rule.x[i], logs);
    for (let node = 0; node < nodes; node++) {
      const value = logs[node] + rule.logWeight[i];
      all[i * nodes + node] = value;
      if (value > peaks[node]) peaks[node] = value;
    }
  }
  const mass = new Float64Array(nodes);
  const moment = new Float64Array(nodes);
  for (let i = 0; i < places; i++) {
    for (let node = 0; node < nodes; node++) {
      const share = Math.exp(all[i * nodes + node] - peaks[node]);
      mass[node] += share;
      moment[node] += share * rule.x[i];
    }
  }
  const logShare = mass.map((m, node) => Math.log(m) + peaks[node] + logWeight[node]);
  const peak = logShare.reduce((a, b) => Math.max(a, b));
  const total = peak + Math.log(logShare.reduce((sum, one) => sum + Math.exp(one - peak), 0));
  return {
    logShare: logShare.map((one) => one - total),
    rateMean: moment.map((one, node) => one / mass[node]),
  };
}

/**
 * Posterior of the rate and of both indices of a power law, at one number of nodes.
 *
 * Mean number: exp(-F S(alpha, beta)) times F <pi>_i for every detection; host fraction: f <pi>_i
 * for every star with one, 1 - f C_j(alpha, beta) for the others. The indices are uniform on their
 * ranges and summed by Gauss-Legendre nodes; the rate is integrated as with fixed indices.
 *
 * @param question maps, box, ranges of the indices, likelihood, prior of the rate, detections
 * @param nodes a side, default 12; `freeIndices` doubles them until the answer stands still
 * @returns the posterior at the nodes; `summariseIndices` turns it into numbers and curves
 * @throws RangeError for ranges, maps or a prior that cannot be used, for the host fraction of a
 *   summed map or under its Jeffreys prior, for a star detected where its map shows nothing, and
 *   for a detection none of whose measurement lies in the box
 * Edges: no detection is legal; the indices then only say where companions would have been seen.
 * Accuracy: limits 1e-4 relative with 12 nodes on ranges 3 wide; a range counted at its ends moved
 *   the limit by 2 %, which Gauss-Legendre nodes do not.
 * @source Loredo 2004, AIP Conf. Proc. 735, 195; Mandel, Farr & Gair 2019, MNRAS 486, 1086
 */
export function freeIndexPosterior(
  question: FreeIndexQuestion,
  nodes = INDEX_NODES,
): FreeIndexPosterior {
  const { box, likelihood, prior } = question;
  const law = lawOf(question);
  const table = tableOf(question, nodes);
  const shape = { ...box, massIndex: 0, semiMajorAxisIndex: 0 };
  const { counted, setAside } = countDetections(
    question.detections,
    { form: 'power-law', ...shape },
    likelihood,
  ) as { counted: MeasuredDetection[]; setAside: DetectionSetAside[] };
  requireSeen(counted, table);
  const rates =
    table.completeness === null
      ? numberRates(table.exposure, counted.length)
      : fractionRates(
          table.completeness,
          table.stars,
          counted.map(({ star }) => star),
        );
  const weightOf = (node: number) =>
    table.massIndex.weight[Math.floor(node / nodes)] *
    table.semiMajorAxisIndex.weight[node % nodes];
  const largest = table.exposure.reduce((a, b) => Math.max(a, b));
  if (counted.length > 0 && largest === 0) {
    throw new RangeError(
      `${counted.length} detections, but no star shows anything: check the maps`,
    );
  }
  const mixture: RateMixture = {
    quantity: likelihood === 'mean-number' ? 'companions_per_star' : 'host_fraction',
    exposure: table.exposure.reduce((sum, s, node) => sum + weightOf(node) * s, 0),
    prior,
    law,
    rates,
    logWeight: logNodeWeights(question, table, counted),
    cutAt: law.logNorm === 'numerical' && question.rateScale !== undefined ? law.support[1] : null,
    constrained: counted.length > 0 || (largest > 0 && largest * law.support[1] >= 1e-9),
  };
  const rate = mixturePosterior(mixture);
  return { rate, mixture, table, counted, setAside, ...sumOverRate(mixture, rate) };
}
