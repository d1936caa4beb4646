import { describe, expect, it } from 'vitest';
import { massLimits } from '@/lib/sensitivity/mass-limits';

describe('massLimits', () => {
  it('lies where the map crosses the share, linearly in log mass', () => {
    const mass = Float64Array.of(1, 10, 100);
    const map = Float64Array.of(0, 0.2, 0.5, 0.6, 1, 0.7);
    const half = massLimits(mass, 2, map, 0.5);
    expect(half[0]).toBeCloseTo(10, 12);
    // 0.5 lies 3/4 of the way from 0.2 to 0.6: 10 ** 0.75.
    expect(half[1]).toBeCloseTo(10 ** 0.75, 12);
    const most = massLimits(mass, 2, map, 0.9);
    expect(most[0]).toBeCloseTo(10 * 10 ** 0.8, 12);
    expect(most[1]).toBeNaN();
  });

  it('is the lowest mass where everything is seen, and lies above a fall of the map', () => {
    const mass = Float64Array.of(1, 10, 100);
    expect([...massLimits(mass, 1, Float64Array.of(0.9, 0.95, 1), 0.5)]).toEqual([1]);
    const fallen = massLimits(mass, 1, Float64Array.of(0.8, 0.2, 0.8), 0.5);
    expect(fallen[0]).toBeCloseTo(10 * Math.sqrt(10), 12);
  });

  it('refuses a share of nothing and a map of another shape', () => {
    expect(() => massLimits([1, 2], 1, [0, 1], 0)).toThrow(RangeError);
    expect(() => massLimits([1, 2], 2, [0, 1], 0.5)).toThrow(/4 values/);
  });
});
