import type { LiveSample } from '@/components/runs/live-sample';
import { orNull } from '@/components/runs/or-null';
import { answerFromView, completenessWhileMoving } from '@/lib/inference';
import { marginalWeights, rateScales, toLogIndex } from '@/lib/population';
import { definitionOf, type LawDefinition, partsOf } from './law-parts';
import type { Asked } from './preview-figures';
import { hostMassesOf } from './spread';

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
  asked: Asked & { definition: LawDefinition },
  ends: { massIndex: [number, number]; semiMajorAxisIndex: [number, number] },
): PlaneOfLimits | null {
  const { definition, prior, credibleLevel } = asked;
  const parts = partsOf(definition);
  const spreadOver = ([from, to]: [number, number], n: number) =>
    Float64Array.from({ length: n }, (_, i) => from + (i * (to - from)) / (n - 1));
  const massIndex = spreadOver(ends.massIndex, ROWS);
  const semiMajorAxisIndex = spreadOver(ends.semiMajorAxisIndex, COLUMNS);
  const question = {
    likelihood: 'host-fraction' as const,
    prior,
    level: credibleLevel,
    detections: sample.companions,
  };
  const masses = hostMassesOf(sample);
  const stars = sample.stars.length;
  const hostOf = (star: number) => (parts.isRatio ? masses[star] : undefined);
  const at = (alpha: number, beta: number) =>
    definitionOf({
      ...parts,
      mass: { ...parts.mass, shape: { shape: 'power-law', index: toLogIndex(alpha, 'linear') } },
      semiMajorAxis: {
        ...parts.semiMajorAxis,
        shape: { shape: 'power-law', index: toLogIndex(beta, 'linear') },
      },
    });
  return orNull(() => {
    const rateScale = rateScales(definition, masses, stars);
    const limit = new Float64Array(ROWS * COLUMNS);
    const axisWeights = Array.from(
      semiMajorAxisIndex,
      (beta) => marginalWeights(sample.grid, at(massIndex[0], beta), hostOf(0)).semiMajorAxis,
    );
    massIndex.forEach((alpha, row) => {
      const known = new Map<number | undefined, Float64Array>();
      const contracted = contractMass(sample, (star) => {
        const host = hostOf(star);
        const own =
          known.get(host) ??
          marginalWeights(sample.grid, at(alpha, semiMajorAxisIndex[0]), host).mass;
        known.set(host, own);
        return own;
      });
      axisWeights.forEach((weights, column) => {
        const completenessPerStar = completenessWhileMoving(contracted, weights);
        const view = {
          population: at(alpha, semiMajorAxisIndex[column]),
          completenessPerStar,
          numberSeenPerStar: null,
          rateScale,
          hostMassMsun: masses,
          exposure: completenessPerStar.reduce((sum, c, j) => sum + c * (rateScale?.[j] ?? 1), 0),
          stars,
          shareOutsideMap: 0,
        };
        limit[row * COLUMNS + column] = answerFromView(view, question).limit;
      });
    });
    return { massIndex, semiMajorAxisIndex, limit };
  });
}

/** Maps summed over each star's own law of masses, shape [star, semi-major axis]. */
function contractMass(sample: LiveSample, weightsOf: (star: number) => Float64Array) {
  const rows = sample.grid.massMjup.length;
  const columns = sample.grid.semiMajorAxisAu.length;
  const contracted = new Float64Array(sample.stars.length * columns);
  for (let star = 0; star < sample.stars.length; star++) {
    const weights = weightsOf(star);
    for (let row = 0; row < rows; row++) {
      const weight = weights[row] / 65_535;
      if (weight === 0) continue;
      const start = (star * rows + row) * columns;
      for (let column = 0; column < columns; column++) {
        contracted[star * columns + column] += sample.maps[start + column] * weight;
      }
    }
  }
  return { moving: 'semiMajorAxis' as const, stars: sample.stars.length, values: contracted };
}
