import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { stepsOverOrders } from '@/lib/inference/order-steps';

describe('stepsOverOrders', () => {
  it('gives the shares of the glove game: 1/6, 1/6 and 2/3', () => {
    // Two left gloves, one right; a pair is worth 1. Shapley value worked by hand over the 6 orders.
    const worth = (made: number) => ((made & 0b011) > 0 && (made & 0b100) > 0 ? 1 : 0);
    const steps = stepsOverOrders(['left', 'other left', 'right'], worth);
    expect(steps.map(({ averaged }) => averaged)).toEqual([
      expect.closeTo(1 / 6, 14),
      expect.closeTo(1 / 6, 14),
      expect.closeTo(2 / 3, 14),
    ]);
    expect(steps.map(({ inOrder }) => inOrder)).toEqual([0, 0, 1]);
  });

  it('adds up to the whole way, averaged and in order', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 6 }).chain((count) =>
          fc.tuple(
            fc.constant(count),
            fc.array(fc.double({ min: -1, max: 1, noNaN: true }), {
              minLength: 2 ** count,
              maxLength: 2 ** count,
            }),
          ),
        ),
        ([count, values]) => {
          const names = Array.from({ length: count }, (_, i) => String(i));
          const steps = stepsOverOrders(names, (made) => values[made]);
          const whole = values[values.length - 1] - values[0];
          const sum = (of: 'averaged' | 'inOrder') => steps.reduce((all, one) => all + one[of], 0);
          expect(sum('averaged')).toBeCloseTo(whole, 10);
          expect(sum('inOrder')).toBeCloseTo(whole, 10);
        },
      ),
    );
  });

  it('asks for each set once, and refuses more than 10 changes', () => {
    const asked: number[] = [];
    stepsOverOrders(['a', 'b', 'c'], (made) => asked.push(made));
    expect(asked).toHaveLength(8);
    expect(() => stepsOverOrders(Array(11).fill('x'), () => 0)).toThrow(RangeError);
  });
});
