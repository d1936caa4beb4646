import { describe, expect, it } from 'vitest';
import { interpolateMap } from '@/components/populations/interpolate-map';
import {
  betterStart,
  drawSeen,
  limitPlane,
  PLANETS,
  previewAnswer,
  shareHardlySeen,
} from '@/components/populations/preview-figures';
import { meanCompleteness, populationWeights, toLogIndex } from '@/lib/population';
import { buildSample, definition } from '../runs/sample';

const sample = buildSample();
const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
const map = {
  ...sample.grid,
  completeness: Float64Array.from({ length: size }, (_, node) => {
    let sum = 0;
    for (let star = 0; star < sample.stars.length; star++) sum += sample.maps[star * size + node];
    return sum / (65_535 * sample.stars.length);
  }),
};
const asked = { definition, prior: { law: 'uniform', max: 1 } as const, credibleLevel: 0.95 };

describe('drawSeen', () => {
  it('sees the share of planets that the mean detection probability promises', () => {
    const { isSeen } = drawSeen(definition, map);
    const seen = isSeen.reduce((sum, value) => sum + value, 0);
    const expected = meanCompleteness(map.completeness, populationWeights(map, definition));
    expect(Math.abs(seen / PLANETS - expected)).toBeLessThan(4 * Math.sqrt(0.25 / PLANETS));
  });

  it('sees nothing without a map', () => {
    expect(drawSeen(definition, undefined).isSeen.every((value) => value === 0)).toBe(true);
  });
});

describe('interpolateMap', () => {
  it('gives the value of a node at the node, and 0 outside', () => {
    const columns = map.semiMajorAxisAu.length;
    const at = interpolateMap(map, map.massMjup[30], map.semiMajorAxisAu[40]);
    expect(at).toBeCloseTo(map.completeness[30 * columns + 40], 12);
    expect(interpolateMap(map, 200, 60)).toBe(0);
  });
});

describe('what hardly anybody sees', () => {
  const low = { ...definition, massMinMjup: 0.6 };

  it('is a larger share the lower the masses begin', () => {
    const share = (of: typeof definition) => shareHardlySeen(map, populationWeights(map, of));
    expect(share(low)).toBeGreaterThan(share(definition));
  });

  it('betterStart begins where the share is under 1 %', () => {
    const dull = { ...map, completeness: map.completeness.map((seen) => (seen < 0.08 ? 0 : 1)) };
    const start = betterStart(dull, { ...low, semiMajorAxisMinAu: 50, semiMajorAxisMaxAu: 70 });
    expect(start?.share).toBeLessThan(0.01);
    expect(start?.massMinMjup).toBeGreaterThan(0.6);
  });
});

describe('limitPlane', () => {
  it('holds the limit that each pair of indices gives on its own', () => {
    const ends = { massIndex: [-2, 0], semiMajorAxisIndex: [-1, 0.5] } as const;
    const plane = limitPlane(sample, asked, {
      massIndex: [...ends.massIndex],
      semiMajorAxisIndex: [...ends.semiMajorAxisIndex],
    });
    const corner = previewAnswer(sample, {
      ...asked,
      definition: {
        ...definition,
        massIndex: toLogIndex(-2, 'linear'),
        semiMajorAxisIndex: toLogIndex(0.5, 'linear'),
      },
    })?.withDetections;
    const columns = plane?.semiMajorAxisIndex.length ?? 0;
    expect((plane?.limit[columns - 1] ?? 0) / (corner?.limit ?? 1)).toBeCloseTo(1, 9);
  });
});
