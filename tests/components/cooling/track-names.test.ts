import { describe, expect, it } from 'vitest';
import { placeNames, type Track } from '@/components/charts/track-chart';

const ageMyr = Float64Array.of(10, 100, 1000);
const track = (massMjup: number, ...values: number[]): Track => ({
  massMjup,
  values: Float64Array.from(values),
});
const x = (age: number) => 100 * Math.log10(age);
const y = (value: number) => 100 * value;

describe('names of tracks', () => {
  it('stand at the ends where those are apart', () => {
    const names = placeNames([track(1, 3, 3, 3), track(5, 0, 1, Number.NaN)], ageMyr, x, y);
    expect(names).toEqual([
      { massMjup: 5, isOnLine: false, x: 200, y: 100 },
      { massMjup: 1, isOnLine: false, x: 300, y: 300 },
    ]);
  });

  it('stand where the lines are apart if all ends meet', () => {
    const tracks = [track(1, 0, 3, 0), track(2, 0.1, 2, 0), track(5, 0.2, 1, 0)];
    const names = placeNames(tracks, ageMyr, x, y);
    expect(names.map(({ massMjup }) => massMjup)).toEqual([5, 2, 1]);
    expect(names.every((name) => name.isOnLine && name.x === 200)).toBe(true);
  });
});
