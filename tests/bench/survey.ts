import type { Detection } from '@/lib/inference';
import { intervalIndex, logSpacedAxis } from '@/lib/numerics/grid';
import { createRandom, deriveSeed } from '@/lib/numerics/random';
import {
  drawCompanions,
  isInside,
  meanCompleteness,
  type PowerLawPopulation,
  populationWeights,
  toLogIndex,
} from '@/lib/population';
import { distanceModulus } from '@/lib/quantities/magnitudes';
import {
  type AgeLaw,
  type ContrastCurve,
  type CoolingRelation,
  computeCompletenessMap,
  encodeMap,
  type SensitivitySettings,
  type StarInputs,
} from '@/lib/sensitivity';
import { builtInMagnitudes } from '@/lib/sensitivity/built-in-law';
import { GRID } from './grid';
import type { Survey } from './survey-file';

export { GRID };

export const SEED = 'invented survey 1';
export const BAND = 'H';
export const COOLING: CoolingRelation = { kind: 'built-in' };
export const POPULATION: PowerLawPopulation = {
  form: 'power-law',
  massMinMjup: 2,
  massMaxMjup: 70,
  semiMajorAxisMinAu: 5,
  semiMajorAxisMaxAu: 500,
  massIndex: toLogIndex(-1.3, 'linear'),
  semiMajorAxisIndex: toLogIndex(-0.6, 'linear'),
};
const HOST_FRACTION = 0.05;

export function settings(threshold: 'hard' | 'smooth'): SensitivitySettings {
  return {
    eccentricity: { law: 'beta', alpha: 0.867, beta: 3.03 },
    threshold,
    massOutsideTable: 'undetectable',
    ageOutsideTable: 'refuse',
  };
}

/** Star number `index` is the same in every survey: the smaller ones begin the larger ones. */
export function inventStar(index: number): StarInputs {
  const { uniform, normal } = createRandom(deriveSeed(SEED, index));
  const between = (low: number, high: number) => low + (high - low) * uniform();
  const logBetween = (low: number, high: number) => low * (high / low) ** uniform();
  const distancePc = logBetween(8, 150);
  const medianMyr = logBetween(10, 1000);
  const spread = 10 ** between(0.03, 0.35);
  const age: AgeLaw = {
    medianMyr,
    lowerMyr: medianMyr / spread,
    upperMyr: medianMyr * spread,
    minMyr: 1.5,
    maxMyr: 9000,
  };
  return {
    name: `Star ${index + 1}`,
    hostMag: between(2, 6) + distanceModulus(distancePc),
    age,
    distance: { distancePc, errorPc: distancePc * logBetween(0.001, 0.03) },
    curves: [inventCurve(between, normal)],
  };
}

/** Steep, then level; four in ten have exactly flat outer parts, three in ten lose coverage there. */
function inventCurve(between: (low: number, high: number) => number, normal: () => number) {
  const points = Math.round(between(20, 80));
  const separationArcsec = logSpacedAxis(between(0.1, 0.3), between(3, 9), points);
  const inner = between(5, 8);
  const outer = between(12, 16);
  const scale = between(0.3, 0.9);
  const isFlat = between(0, 1) < 0.4;
  const losesCoverage = between(0, 1) < 0.3;
  const contrastMag = separationArcsec.map((theta) => {
    const smooth = outer - (outer - inner) * Math.exp(-((theta / scale) ** 0.8));
    return isFlat ? Math.min(smooth, outer - 0.5) : smooth + 0.03 * normal();
  });
  const curve: ContrastCurve = { separationArcsec, contrastMag, nSigma: 5, band: BAND };
  if (losesCoverage) {
    curve.coverage = separationArcsec.map((_, i) => Math.min(1, 1.6 - (1.2 * i) / (points - 1)));
  }
  return curve;
}

export function inventStars(count: number): StarInputs[] {
  return Array.from({ length: count }, (_, index) => inventStar(index));
}

/**
 * An invented survey as a file holds it: with its cooling relation as a table, so that another
 * engine needs no other input.
 */
export function inventSurvey(count: number, threshold: 'hard' | 'smooth'): Survey {
  const ageMyr = logSpacedAxis(1, 10_000, 241);
  const { magnitudes } = builtInMagnitudes(GRID.massMjup, ageMyr, BAND);
  const table = { name: 'built-in law', massMjup: GRID.massMjup, ageMyr, magnitudes };
  return {
    grid: GRID,
    settings: settings(threshold),
    cooling: { kind: 'table', table: { ...table, magnitudes: { [BAND]: magnitudes } } },
    stars: inventStars(count),
  };
}

/** Smooth maps of a survey as they are stored, with what was found in them. */
export interface MappedSurvey {
  stars: number;
  /** Shape [star, mass, semi-major axis]. */
  maps: Uint16Array;
  /** Under POPULATION, from the maps before they were stored; shape [star]. */
  completeness: Float64Array;
  detections: Detection[];
}

let largest: MappedSurvey | null = null;

/** @param stars at most 5000 in sensible time: one map costs about 0.5 ms */
export function mapSurvey(stars: number): MappedSurvey {
  if (!largest || largest.stars < stars) largest = computeSurvey(stars);
  const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
  return {
    stars,
    maps: largest.maps.subarray(0, stars * size),
    completeness: largest.completeness.slice(0, stars),
    detections: largest.detections.filter(({ star }) => star < stars),
  };
}

function computeSurvey(stars: number): MappedSurvey {
  const size = GRID.massMjup.length * GRID.semiMajorAxisAu.length;
  const maps = new Uint16Array(stars * size);
  const weights = populationWeights(GRID, POPULATION);
  const detections: Detection[] = [];
  const { uniform } = createRandom(deriveSeed(SEED, 'companions'));
  const drawn = drawCompanions(POPULATION, stars, deriveSeed(SEED, 'places'));
  const completeness = new Float64Array(stars);
  for (let star = 0; star < stars; star++) {
    const inputs = inventStar(star);
    const { map } = computeCompletenessMap(inputs, COOLING, GRID, settings('smooth'));
    maps.set(encodeMap(map.completeness), star * size);
    completeness[star] = meanCompleteness(map.completeness, weights);
    const [massMjup, semiMajorAxisAu] = [drawn.massMjup[star], drawn.semiMajorAxisAu[star]];
    const row = intervalIndex(GRID.massMjup, massMjup);
    const column = intervalIndex(GRID.semiMajorAxisAu, semiMajorAxisAu);
    const chance = map.completeness[row * GRID.semiMajorAxisAu.length + column];
    const isHost = uniform() < HOST_FRACTION;
    const isFound = uniform() < chance && isInside(POPULATION, massMjup, semiMajorAxisAu);
    if (isHost && isFound) detections.push({ star, massMjup, semiMajorAxisAu, name: inputs.name });
  }
  return { stars, maps, completeness, detections };
}
