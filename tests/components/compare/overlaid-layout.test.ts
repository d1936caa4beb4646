import { describe, expect, it } from 'vitest';
import { boxesMeet } from '@/components/charts/map-contours';
import { overlaidTop, placeNames } from '@/components/charts/overlaid-layout';
import { valueAt } from '@/components/charts/paths';
import { scaleLinear } from '@/components/charts/scales';

const rate = Float64Array.from({ length: 321 }, (_, i) => i / 320);
/** A gamma density of the given shape and rate. */
const curveOf = (shape: number, per: number) => {
  const raw = rate.map((at) => (Math.max(at, 1e-3) * per) ** (shape - 1) * Math.exp(-at * per));
  const sum = raw.reduce((all, one) => all + one, 0) / 320;
  const density = raw.map((one) => one / sum);
  return { rate, density, cumulative: rate };
};
const flat = curveOf(3, 9);
const tall = curveOf(1, 34);
const peak = (curve: typeof flat) => Math.max(...curve.density);

describe('overlaidTop', () => {
  it('keeps the flatter curve readable beside a tall one, and room above two alike', () => {
    expect(peak(flat) / overlaidTop([flat, tall])).toBeGreaterThan(0.6);
    expect(overlaidTop([flat, flat])).toBeGreaterThan(peak(flat));
  });
});

describe('placeNames', () => {
  const frame = { left: 8, right: 800, top: 24, bottom: 350 };
  const x = scaleLinear([0, 1], [frame.left, frame.right]);
  const y = scaleLinear([0, overlaidTop([flat, tall])], [frame.bottom, frame.top]);
  const taken = [{ left: 90, right: 200, top: 30, bottom: 56 }];
  const named = [
    { words: ['A: A-1, 2 detections', 'A'], curve: flat },
    { words: ['B: A-2, zero detections', 'B'], curve: tall },
  ];

  it('names each curve in words, off every curve, flag and other name', () => {
    const places = placeNames(named, { x, y, frame }, taken);
    expect(places.map(({ words }) => words)).toEqual(named.map(({ words }) => words[0]));
    const [a, b] = places.map(({ box }) => box);
    expect(boxesMeet(a, b)).toBe(false);
    for (const { box } of places) {
      expect(boxesMeet(box, taken[0])).toBe(false);
      for (const { density } of [flat, tall]) {
        for (let at = box.left; at <= box.right; at += 1) {
          const height = y(valueAt(rate, density, x.invert(at)));
          expect(height > box.top + 2 && height < box.bottom - 2).toBe(false);
        }
      }
    }
  });

  it('falls back to the letter, and to nothing, where there is no room', () => {
    const small = { ...frame, right: 150 };
    const narrow = { x: scaleLinear([0, 1], [8, 150]), y, frame: small };
    expect(placeNames(named, narrow, []).map(({ words }) => words)).toEqual(['A', 'B']);
    expect(placeNames(named, narrow, [small])).toEqual([]);
  });
});
