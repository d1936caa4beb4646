import type { MapData } from '@/components/charts/map-contours';
import type { LiveSample } from '@/components/runs/live-sample';
import { orNull } from '@/components/runs/or-null';
import { type Answer, answerFromView, type PopulationView, viewPopulation } from '@/lib/inference';
import { type Population, requireHostMasses } from '@/lib/population';
import type { PreviewSetting } from './builder-setting';
import { HARDLY_ANY, shareHardlySeen } from './hardly-seen';
import {
  definitionOf,
  type LawDefinition,
  type LawParameter,
  partsOf,
  withParameter,
} from './law-parts';
import { hostMassesOf, spreadOf } from './spread';

export interface PreviewAnswer {
  view: PopulationView;
  withDetections: Answer | null;
  zero: Answer | null;
}

/** What is asked of a population. */
export interface Asked extends Pick<PreviewSetting, 'prior' | 'credibleLevel'> {
  definition: Population;
}

function askedOf({ prior, credibleLevel }: Asked) {
  return { likelihood: 'host-fraction' as const, prior, level: credibleLevel };
}

export function previewAnswer(sample: LiveSample, asked: Asked): PreviewAnswer | null {
  return orNull(() => {
    const view = viewPopulation(sample.maps, sample.grid, asked.definition, hostMassesOf(sample));
    const answer = (detections: LiveSample['companions']) =>
      orNull(() => answerFromView(view, { ...askedOf(asked), detections }));
    return { view, withDetections: answer(sample.companions), zero: answer([]) };
  });
}

/** Why a population has no answer on a sample. */
export function faultOnSample(sample: LiveSample, population: Population): string | null {
  try {
    const masses = hostMassesOf(sample);
    const names = sample.stars.map(({ name }) => name);
    requireHostMasses(population, masses, names.length, names);
    viewPopulation(sample.maps, sample.grid, population, masses);
    return null;
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return error.message;
  }
}

/** The limit against one number of a law, all others standing still; NaN where there is none. */
export function parameterTrace(
  sample: LiveSample,
  asked: Asked & { definition: LawDefinition },
  parameter: LawParameter,
  values: number[],
): { values: number[]; limits: number[] } {
  const parts = partsOf(asked.definition);
  const masses = hostMassesOf(sample);
  const limits = values.map((value) => {
    const limit = orNull(() => {
      const definition = definitionOf(withParameter(parts, parameter, value));
      const view = viewPopulation(sample.maps, sample.grid, definition, masses);
      return answerFromView(view, { ...askedOf(asked), detections: sample.companions }).limit;
    });
    return limit ?? Number.NaN;
  });
  return { values, limits };
}

const roundStarts = {
  mass: [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40],
  ratio: [0.0005, 0.001, 0.0015, 0.002, 0.003, 0.004, 0.005, 0.007, 0.01, 0.015, 0.02, 0.03, 0.05],
};

export interface BetterStart {
  start: number;
  isRatio: boolean;
  definition: LawDefinition;
  share: number;
}

/** The smallest round mass, or mass ratio, from which on hardly anything is out of sight. */
export function betterStart(
  sample: LiveSample,
  meanMap: MapData,
  definition: LawDefinition,
): BetterStart | null {
  const parts = partsOf(definition);
  const [min, max] = parts.mass.range;
  for (const start of roundStarts[parts.isRatio ? 'ratio' : 'mass']) {
    if (start <= min || start >= max) continue;
    const moved = definitionOf({ ...parts, mass: { ...parts.mass, range: [start, max] } });
    const spread = orNull(() => spreadOf(sample, meanMap, moved));
    if (spread === null) continue;
    const share = shareHardlySeen(spread.map, moved, spread.weights);
    if (share < HARDLY_ANY) return { start, isRatio: parts.isRatio, definition: moved, share };
  }
  return null;
}
