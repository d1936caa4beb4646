import { describe, expect, test } from 'vitest';
import { gaussHermite, gaussLegendre, integrate } from '@/lib/numerics/quadrature';

const weighted = (rule: { nodes: Float64Array; weights: Float64Array }, f: (x: number) => number) =>
  rule.nodes.reduce((sum, x, i) => sum + rule.weights[i] * f(x), 0);

describe('gaussLegendre(n)', () => {
  test.each([1, 2, 3, 5, 24, 32, 64, 200])('n = %i is exact to degree 2n - 1', (n) => {
    const rule = gaussLegendre(n);
    const degree = 2 * n - 2;
    expect(weighted(rule, (x) => x ** degree)).toBeCloseTo(2 / (degree + 1), 13);
    expect(weighted(rule, (x) => x)).toBeCloseTo(0, 14);
    expect(weighted(rule, () => 1)).toBeCloseTo(2, 13);
  });

  test('nodes are symmetric to the last bit', () => {
    const { nodes } = gaussLegendre(17);
    expect(Array.from(nodes, (x, i) => x + nodes[16 - i])).toEqual(new Array(17).fill(0));
  });

  test('refuses n outside 1 to 512', () => {
    expect(() => gaussLegendre(0)).toThrow('n must be an integer between 1 and 512, got 0');
  });
});

describe('gaussHermite(n)', () => {
  test('3 nodes are 0 and ±√3 with weights 2/3 and 1/6', () => {
    const { nodes, weights } = gaussHermite(3);
    expect(nodes[2]).toBeCloseTo(Math.sqrt(3), 14);
    expect(weights[1]).toBeCloseTo(2 / 3, 14);
    expect(weights[0]).toBeCloseTo(1 / 6, 14);
  });

  test.each([1, 2, 7, 20, 41])('n = %i has the moments of the normal law', (n) => {
    const rule = gaussHermite(n);
    expect(weighted(rule, () => 1)).toBeCloseTo(1, 12);
    if (n > 1) expect(weighted(rule, (z) => z * z)).toBeCloseTo(1, 11);
    if (n > 4) expect(weighted(rule, (z) => z ** 8)).toBeCloseTo(105, 8);
  });
});

describe('integrate(f, a, b)', () => {
  test('known integrals', () => {
    expect(integrate(Math.exp, 0, 1)).toBeCloseTo(Math.E - 1, 14);
    expect(integrate(Math.exp, 1, 0)).toBeCloseTo(1 - Math.E, 14);
    expect(integrate((x) => 1 / x, 1, 1000, 100)).toBeCloseTo(Math.log(1000), 10);
  });

  test('refuses ends that are not finite', () => {
    expect(() => integrate(Math.exp, 0, Infinity)).toThrow('the ends must be finite');
  });
});
