import { describe, expect, test } from 'vitest';
import { logNoDetection } from '@/lib/inference';
import { fractionRates, type NodeRates, numberRates } from '@/lib/inference/node-rates';
import { buildCompleteness } from './build-question';

const STARS = 150;
const NODES = 6;
const FOUND = [0, 70, 149];

/** Nodes whose largest completeness lies low, high and at 1. */
function buildNodes(top: number): Float64Array {
  const completeness = new Float64Array(NODES * STARS);
  for (let node = 0; node < NODES; node++) {
    const own = buildCompleteness(STARS, `node ${node}`, 0, (top * (node + 1)) / NODES);
    completeness.set(own, node * STARS);
  }
  completeness[NODES * STARS - 2] = top;
  return completeness;
}

function direct(completeness: Float64Array, node: number, x: number): number {
  const others = completeness
    .subarray(node * STARS, (node + 1) * STARS)
    .filter((_, star) => !FOUND.includes(star));
  return logNoDetection(x, others);
}

function largestError(rates: NodeRates, completeness: Float64Array): number {
  const out = new Float64Array(NODES);
  let worst = 0;
  for (let i = 1; i < 400; i++) {
    const x = i / 400;
    rates.fill(x, 1 - x, out);
    for (let node = 0; node < NODES; node++) {
      const exact = direct(completeness, node, x);
      worst = Math.max(
        worst,
        Math.abs(out[node] - exact),
        Math.abs(rates.logRegular(node, x, 1 - x) - exact),
      );
    }
  }
  return worst;
}

describe('fractionRates', () => {
  test.each([0.02, 0.6, 0.97, 1])(
    'the series keep ln of the product, detected stars left out: largest completeness %s',
    (top) => {
      const completeness = buildNodes(top);
      const rates = fractionRates(completeness, STARS, FOUND);
      expect(rates.powerOfRate).toBe(3);
      expect(largestError(rates, completeness)).toBeLessThan(1e-9);
      expect(largestError(rates, completeness)).toBeLessThan(1e-9);
    },
  );

  test('at 1 a star that would certainly have shown a companion leaves nothing', () => {
    const completeness = buildNodes(1);
    const out = new Float64Array(NODES);
    fractionRates(completeness, STARS, FOUND).fill(1, 0, out);
    expect(out[NODES - 1]).toBe(Number.NEGATIVE_INFINITY);
    expect(out[0]).toBeCloseTo(direct(completeness, 0, 1), 9);
  });
});

test('numberRates fall as exp(-F S) at each node, the slowest setting the decay', () => {
  const rates = numberRates(Float64Array.of(12, 3, 50), 2);
  const out = new Float64Array(3);
  rates.fill(0.5, 0.5, out);
  expect(Array.from(out)).toEqual([-6, -1.5, -25]);
  expect(rates.logRegular(2, 0.1, 0.9)).toBe(-5);
  expect(rates.decay).toBe(3);
});
