import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { integrate } from '@/lib/numerics/quadrature';
import {
  type AxisLaw,
  type AxisShape,
  axisLaw,
  brokenPowerLaw,
  fromLogIndex,
  logNormal,
  tabulatedLaw,
  toLogIndex,
} from '@/lib/population';

const index = fc.double({ min: -4, max: 4, noNaN: true });
const place = fc.double({ min: 0.1, max: 500, noNaN: true });
const shapes: fc.Arbitrary<AxisShape> = fc.oneof(
  fc.record({ shape: fc.constant('power-law' as const), index }),
  fc.record({
    shape: fc.constant('broken-power-law' as const),
    breakAt: place,
    innerIndex: index,
    outerIndex: index,
  }),
  fc.record({
    shape: fc.constant('log-normal' as const),
    median: place,
    sigmaDex: fc.double({ min: 0.1, max: 3, noNaN: true }),
  }),
  fc
    .array(fc.double({ min: 0.01, max: 5, noNaN: true }), { minLength: 2, maxLength: 6 })
    .map((perLog) => ({
      shape: 'tabulated' as const,
      at: perLog.map((_, i) => 0.3 * 4 ** i),
      perLog,
    })),
);

/** The integral over d ln x by quadrature, cut at the law's kinks. */
function byQuadrature(law: AxisLaw, from: number, to: number): number {
  const cuts = [from, ...law.breaks.filter((at) => at > from && at < to), to];
  let sum = 0;
  for (let i = 0; i + 1 < cuts.length; i++) {
    sum += integrate((y) => law.shape(Math.exp(y)), Math.log(cuts[i]), Math.log(cuts[i + 1]));
  }
  return sum;
}

describe('every law along an axis', () => {
  it('has an integral that quadrature of its shape confirms', () => {
    fc.assert(
      fc.property(shapes, (shape) => {
        const law = axisLaw(shape);
        const exact = law.integral(0.5, 80);
        expect(Math.abs(byQuadrature(law, 0.5, 80) - exact)).toBeLessThan(1e-7 * exact + 1e-9);
      }),
      { numRuns: 60 },
    );
  });

  it('adds up: the whole is the sum of its parts', () => {
    fc.assert(
      fc.property(shapes, fc.double({ min: 0.6, max: 79, noNaN: true }), (shape, middle) => {
        const law = axisLaw(shape);
        const whole = law.integral(0.5, 80);
        const parts = law.integral(0.5, middle) + law.integral(middle, 80);
        expect(Math.abs(parts - whole)).toBeLessThan(1e-11 * whole + 1e-300);
      }),
    );
  });

  it('has quantiles that its integral inverts', () => {
    fc.assert(
      fc.property(shapes, fc.double({ min: 0, max: 1, noNaN: true }), (shape, p) => {
        const law = axisLaw(shape);
        const x = Math.min(80, Math.max(0.5, law.quantile(p, 0.5, 80)));
        expect(law.integral(0.5, x) / law.integral(0.5, 80)).toBeCloseTo(p, 8);
      }),
    );
  });
});

describe('brokenPowerLaw', () => {
  it('is continuous, and one power law where its break lies outside the range', () => {
    const law = brokenPowerLaw(30, 0.8, -1.2);
    expect(law.shape(30 * (1 - 1e-12))).toBeCloseTo(law.shape(30), 10);
    const inner = axisLaw({ shape: 'power-law', index: 0.8 });
    const share = (one: AxisLaw) => one.integral(1, 5) / one.integral(1, 20);
    expect(share(law)).toBeCloseTo(share(inner), 13);
  });

  it('refuses a break that is not positive', () => {
    expect(() => brokenPowerLaw(0, 1, 1)).toThrow(/breakAt/);
  });
});

describe('logNormal', () => {
  it('keeps its digits far out in both tails and in narrow ranges', () => {
    const law = logNormal(1, 1);
    const lower = law.integral(Math.exp(-21), Math.exp(-20));
    const upper = law.integral(Math.exp(20), Math.exp(21));
    expect(upper / lower).toBeCloseTo(1, 12);
    // Tail of the normal law, Abramowitz & Stegun 26.2.12: exp(-z²/2)/z (1 - 1/z² + 3/z⁴ - 15/z⁶).
    const leading = (Math.exp(-200) / 20) * (1 - 1 / 400 + 3 / 160_000 - 15 / 64e6);
    expect(upper / leading).toBeCloseTo(1, 6);
    const step = 1e-8;
    expect(law.integral(2, 2 * (1 + step)) / (step * law.shape(2))).toBeCloseTo(1, 6);
  });

  it('is symmetric in ln x about its median', () => {
    const law = logNormal(30, 1.1);
    expect(law.integral(3, 30)).toBeCloseTo(law.integral(30, 300), 13);
    expect(law.quantile(0.5, 3, 300)).toBeCloseTo(30, 9);
  });

  it('refuses a width or a median that is not positive', () => {
    expect(() => logNormal(30, 0)).toThrow(/width/);
    expect(() => logNormal(-1, 1)).toThrow(/median/);
  });
});

describe('tabulatedLaw', () => {
  it('is linear in ln x between its places and nothing outside them', () => {
    const law = tabulatedLaw([1, Math.E], [0, 2]);
    expect(law.integral(1, Math.E)).toBeCloseTo(1, 14);
    expect(law.integral(0.01, 100)).toBeCloseTo(1, 14);
    expect(law.shape(Math.sqrt(Math.E))).toBeCloseTo(1, 14);
    expect([law.shape(0.9), law.shape(3)]).toEqual([0, 0]);
    expect(Math.log(law.quantile(0.25, 1, Math.E))).toBeCloseTo(0.5, 12);
  });

  it.each([
    [[1], [1], /two or more/],
    [[2, 1], [1, 1], /increase/],
    [[1, 2], [1, -1], /0 or more/],
    [[1, 2], [0, 0], /above 0/],
  ])('refuses %o', (at, perLog, message) => {
    expect(() => tabulatedLaw(at, perLog)).toThrow(message);
  });
});

describe('index conventions', () => {
  it('come back from every convention', () => {
    const conventions = fc.constantFrom(
      'linear' as const,
      'log' as const,
      'log10' as const,
      'period' as const,
      'linear-period' as const,
    );
    fc.assert(
      fc.property(index, conventions, (stated, convention) => {
        expect(fromLogIndex(toLogIndex(stated, convention), convention)).toBeCloseTo(stated, 12);
      }),
    );
  });

  it('count an index of the period three halves in the semi-major axis', () => {
    expect(toLogIndex(0.26, 'period')).toBeCloseTo(0.39, 14);
    expect(toLogIndex(-0.74, 'linear-period')).toBeCloseTo(0.39, 14);
  });
});
