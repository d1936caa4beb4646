import type { DrawnCompanions, MarginCurve } from '@/components/charts/companion-scatter';
import type { MapData } from '@/components/charts/map-contours';
import { contract, weighContracted } from '@/components/runs/contracted';
import { orNull } from '@/components/runs/live-answer';
import type { LiveSample } from '@/components/runs/live-sample';
import { type Answer, answerFromView, type PopulationView, viewPopulation } from '@/lib/inference';
import {
  drawCompanions,
  type PopulationWeights,
  populationLaws,
  populationWeights,
  toLogIndex,
} from '@/lib/population';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { BuilderSetting } from './builder-setting';
import { interpolateMap } from './interpolate-map';

export const PLANETS = 240;
/** Below this mean detection probability a limit rests on the indices and not on data. */
export const HARDLY_SEEN = 0.05;

/** One number between 0 and 1 a planet, always the same: a dragged range must not flicker. */
const chances = Float64Array.from(
  { length: PLANETS },
  (_, i) => ((i + 1) * 0.6180339887498949) % 1,
);

/** Planets drawn from the population; each is seen with the mean completeness at its place. */
export function drawSeen(
  definition: PowerLawDefinition,
  map: MapData | undefined,
): DrawnCompanions {
  const drawn = drawCompanions(definition, PLANETS, 'preview');
  const isSeen = new Uint8Array(PLANETS);
  if (map) {
    for (let i = 0; i < PLANETS; i++) {
      const seen = interpolateMap(map, drawn.massMjup[i], drawn.semiMajorAxisAu[i]);
      isSeen[i] = chances[i] < seen ? 1 : 0;
    }
  }
  return { ...drawn, isSeen };
}

const MARGIN_POINTS = 60;

/** Density per logarithm along one axis: all planets, and those that would be seen. */
export function marginOf(
  definition: PowerLawDefinition,
  map: MapData,
  weights: PopulationWeights,
  axis: 'mass' | 'semiMajorAxis',
): MarginCurve {
  const { law, min, max } = populationLaws(definition)[axis];
  const nodes = axis === 'mass' ? map.massMjup : map.semiMajorAxisAu;
  const columns = map.semiMajorAxisAu.length;
  const seenAt = Float64Array.from(nodes, (_, node) => {
    let sum = 0;
    const other = axis === 'mass' ? weights.semiMajorAxis : weights.mass;
    for (let j = 0; j < other.length; j++) {
      const index = axis === 'mass' ? node * columns + j : j * columns + node;
      sum += other[j] * map.completeness[index];
    }
    return sum;
  });
  const at = Float64Array.from(
    { length: MARGIN_POINTS },
    (_, i) => min * (max / min) ** (i / (MARGIN_POINTS - 1)),
  );
  const all = at.map((x) => law.shape(x));
  const seen = all.map((density, i) => density * valueOn(nodes, seenAt, at[i]));
  return { at, all, seen };
}

function valueOn(nodes: Float64Array, values: Float64Array, x: number): number {
  if (x < nodes[0] || x > nodes[nodes.length - 1]) return 0;
  let above = 1;
  while (above < nodes.length - 1 && nodes[above] < x) above++;
  const step = Math.log(nodes[above] / nodes[above - 1]);
  const share = Math.log(x / nodes[above - 1]) / step;
  return values[above - 1] + share * (values[above] - values[above - 1]);
}

/** Share of the population where the mean detection probability is under 5 %, outside included. */
export function shareHardlySeen(map: MapData, weights: PopulationWeights): number {
  const columns = map.semiMajorAxisAu.length;
  let share = weights.shareOutsideMap;
  weights.mass.forEach((mass, row) => {
    for (let column = 0; column < columns; column++) {
      if (map.completeness[row * columns + column] < HARDLY_SEEN) {
        share += mass * weights.semiMajorAxis[column];
      }
    }
  });
  return Math.min(1, share);
}

export interface PreviewAnswer {
  view: PopulationView;
  withDetections: Answer | null;
  zero: Answer | null;
}

export function previewAnswer(
  sample: LiveSample,
  setting: Omit<BuilderSetting, 'convention' | 'statedFraction'>,
): PreviewAnswer | null {
  return orNull(() => {
    const view = viewPopulation(sample.maps, sample.grid, setting.definition);
    const asked = {
      likelihood: 'host-fraction' as const,
      prior: setting.prior,
      level: setting.credibleLevel,
    };
    return {
      view,
      withDetections: orNull(() =>
        answerFromView(view, { ...asked, detections: sample.companions }),
      ),
      zero: orNull(() => answerFromView(view, { ...asked, detections: [] })),
    };
  });
}

const firstMasses = [1, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40];

/** The smallest round mass from which on hardly anything is out of sight. */
export function betterStart(
  map: MapData,
  definition: PowerLawDefinition,
): { massMinMjup: number; share: number } | null {
  for (const massMinMjup of firstMasses) {
    if (massMinMjup <= definition.massMinMjup || massMinMjup >= definition.massMaxMjup) continue;
    const weights = orNull(() => populationWeights(map, { ...definition, massMinMjup }));
    if (weights === null) continue;
    const share = shareHardlySeen(map, weights);
    if (share < 0.01) return { massMinMjup, share };
  }
  return null;
}

export interface PlaneOfLimits {
  massIndex: Float64Array;
  semiMajorAxisIndex: Float64Array;
  limit: Float64Array;
}

const ROWS = 10;
const COLUMNS = 10;

/** The limit over both linear indices, around the present ones. */
export function limitPlane(
  sample: LiveSample,
  setting: Omit<BuilderSetting, 'convention' | 'statedFraction'>,
  ends: { massIndex: [number, number]; semiMajorAxisIndex: [number, number] },
): PlaneOfLimits | null {
  const axis = ([from, to]: [number, number], n: number) =>
    Float64Array.from({ length: n }, (_, i) => from + (i * (to - from)) / (n - 1));
  const massIndex = axis(ends.massIndex, ROWS);
  const semiMajorAxisIndex = axis(ends.semiMajorAxisIndex, COLUMNS);
  const asked = {
    likelihood: 'host-fraction' as const,
    prior: setting.prior,
    level: setting.credibleLevel,
    detections: sample.companions,
  };
  return orNull(() => {
    const limit = new Float64Array(ROWS * COLUMNS);
    const populations = Array.from(semiMajorAxisIndex, (beta) => {
      const population = {
        ...setting.definition,
        semiMajorAxisIndex: toLogIndex(beta, 'linear'),
      };
      return { population, weights: populationWeights(sample.grid, population) };
    });
    massIndex.forEach((alpha, row) => {
      const law = { ...setting.definition, massIndex: toLogIndex(alpha, 'linear') };
      const contracted = contract(sample, populationWeights(sample.grid, law), 'semiMajorAxis');
      populations.forEach(({ population, weights }, column) => {
        const completenessPerStar = weighContracted(contracted, weights.semiMajorAxis);
        const view = {
          population,
          completenessPerStar,
          numberSeenPerStar: null,
          rateScale: null,
          hostMassMsun: null,
          exposure: completenessPerStar.reduce((sum, c) => sum + c, 0),
          stars: sample.stars.length,
          shareOutsideMap: weights.shareOutsideMap,
        };
        limit[row * COLUMNS + column] = answerFromView(view, asked).limit;
      });
    });
    return { massIndex, semiMajorAxisIndex, limit };
  });
}
