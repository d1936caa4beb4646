import * as d3 from 'd3';
import { describe, expect, it } from 'vitest';
import { scaleLinear, scaleLog } from '@/components/charts/scales';

const values = [0.001, 0.3, 1, 2, 7.25, 30, 300, 4000];
const places = [-40, 0, 12.5, 46, 200, 439, 600];

// Against the scales of d3 7.9, which draw the same axes.
describe.each(['straight', 'logarithmic'])('a %s axis', (kind) => {
  it.each([
    [46, 439],
    [439, 46],
  ])('from %d to %d px', (...range) => {
    const isStraight = kind === 'straight';
    const domain = isStraight ? [-1.5, 300] : [0.3, 300];
    for (const isClamped of [false, true]) {
      const scale = (isStraight ? scaleLinear : scaleLog)(domain, range).clamp(isClamped);
      const outside = isStraight
        ? d3.scaleLinear(domain, range).clamp(isClamped)
        : d3.scaleLog(domain, range).clamp(isClamped);
      for (const value of values) expect(scale(value)).toBeCloseTo(outside(value), 9);
      for (const px of places) expect(scale.invert(px) / outside.invert(px)).toBeCloseTo(1, 9);
      expect(scale.domain()).toEqual(outside.domain());
      expect(scale.range()).toEqual(outside.range());
    }
  });
});

it('an axis of no length puts all values at its middle', () => {
  expect(scaleLinear([2, 2], [0, 10])(2)).toBe(d3.scaleLinear([2, 2], [0, 10])(2));
});
