import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { describe, expect, test, vi } from 'vitest';
import { logSpacedAxis } from '@/lib/numerics/grid';
import { createRandom } from '@/lib/numerics/random';
import { type CoolingRelation, encodeMap, type MapGrid, type StarInputs } from '@/lib/sensitivity';
import { compiledKernels } from '@/lib/sensitivity/kernels/compiled';
import type { Kernels } from '@/lib/sensitivity/kernels/kernels';
import { plainKernels } from '@/lib/sensitivity/kernels/plain';
import { newShelf } from '@/lib/sensitivity/kernels/shelf';
import { buildCurve, buildSettings, buildStar } from './build-star';

const MEMORY = 4000;

function compiledHere(): Kernels {
  const compiled = compiledKernels();
  if (compiled === null) throw new Error('this Node.js has no WebAssembly SIMD');
  return compiled;
}

function filled(kernels: Kernels): Float64Array {
  const { uniform } = createRandom('kernels');
  const memory = kernels.reserve(MEMORY);
  for (let i = 0; i < MEMORY; i++) memory[i] = uniform() - 0.5;
  return memory;
}

describe('the compiled kernels give the bits of the plain ones', () => {
  const wide = { medianMyr: 120, lowerMyr: 55, upperMyr: 270, minMyr: 5, maxMyr: 5000 };
  const flat = buildCurve({
    separationArcsec: Float64Array.of(0.15, 0.4, 1.5, 3),
    contrastMag: Float64Array.of(9, 12.6, 12.6, 11.8),
  });
  const covered = buildCurve({ coverage: Float64Array.of(1, 1, 0.9, 0.9, 0.8, 0.3) });
  const bounds = { medianMyr: 1000, minMyr: 200, maxMyr: 5000 };
  const stars: [string, StarInputs][] = [
    ['a wide age', buildStar({ age: wide })],
    ['an age between bounds, flat', buildStar({ age: bounds, curves: [flat] })],
    ['a coverage that varies', buildStar({ age: wide, curves: [covered] })],
    ['an age without error', buildStar({ age: { medianMyr: 24 }, curves: [flat] })],
    ['a star far away', buildStar({ distance: { distancePc: 900, errorPc: 40 } })],
  ];
  const even: MapGrid = {
    massMjup: logSpacedAxis(1, 70, 9),
    semiMajorAxisAu: logSpacedAxis(0.5, 3000, 21),
  };
  const uneven: MapGrid = {
    massMjup: even.massMjup,
    semiMajorAxisAu: Float64Array.of(0.5, 2, 3, 10, 11, 40, 300, 900, 5000),
  };
  const ages = [5, 20, 60, 200, 900];
  const table: CoolingRelation = {
    kind: 'table',
    table: {
      name: 'one mass brightens for a while, one is missing when old',
      massMjup: Float64Array.of(1, 5, 15, 70),
      ageMyr: Float64Array.from(ages),
      magnitudes: {
        H: Float64Array.of(
          ...[16, 17.5, 19, 21, Number.NaN],
          ...[13.5, 15, 14.4, 17, 20],
          ...[10.5, 12, 13.4, 15.5, 17.8],
          ...[7.5, 8.2, 9.5, 11, 13],
        ),
      },
    },
  };

  /** A map by kernels chosen anew: without a compiler the engine takes the plain ones. */
  async function newEngine(isCompiled: boolean) {
    vi.resetModules();
    vi.doMock('@/lib/sensitivity/kernels/compiled', () => ({
      compiledKernels: isCompiled ? compiledHere : () => null,
    }));
    const engine = await import('@/lib/sensitivity/completeness');
    vi.doUnmock('@/lib/sensitivity/kernels/compiled');
    return engine;
  }

  test('in every map of stars of all kinds', { timeout: 120_000 }, async () => {
    const [compiled, plain] = [await newEngine(true), await newEngine(false)];
    let seen = 0;
    for (const [name, star] of stars) {
      for (const grid of [even, uneven]) {
        for (const cooling of [{ kind: 'built-in' } as const, table]) {
          for (const threshold of ['smooth', 'hard'] as const) {
            const settings = buildSettings({ threshold, ageOutsideTable: 'edge' });
            const given = [star, cooling, grid, settings] as const;
            const label = `${name}, ${cooling.kind}, ${threshold}`;
            const fast = compiled.computeCompletenessMap(...given).map.completeness;
            const slow = plain.computeCompletenessMap(...given).map.completeness;
            expect(fast, label).toEqual(slow);
            const stored = encodeMap(slow);
            expect(compiled.computeEncodedMap(...given).encoded, label).toEqual(stored);
            expect(plain.computeEncodedMap(...given).encoded, label).toEqual(stored);
            seen += fast.reduce((sum, value) => sum + (value > 0.01 && value < 0.99 ? 1 : 0), 0);
          }
        }
      }
    }
    expect(seen).toBeGreaterThan(500);
  });
});

test('rows are written as they are stored, cut to 0 to 1, and tell what is no number', () => {
  const [masses, columns, stride] = [3, 19, 24];
  const [rows, to] = [100, 4000];
  for (const kernels of [compiledHere(), plainKernels]) {
    const memory = kernels.reserve(MEMORY);
    const { uniform } = createRandom('stored');
    for (let i = 0; i < masses * stride; i++) memory[rows + i] = 1.4 * uniform() - 0.2;
    const wanted = encodeMap(
      Float64Array.from({ length: masses * columns }, (_, i) => {
        const column = i % columns;
        const value = memory[rows + Math.floor(i / columns) * stride + column];
        return column < 8 ? 0 : Math.min(1, Math.max(0, value));
      }),
    );
    expect(kernels.encodeRows(to, rows, masses, columns, stride, 8)).toBe(1);
    const stored = new Uint16Array(memory.buffer, 2 * to, masses * columns);
    expect(stored.slice(), kernels.name).toEqual(wanted);
    for (const strange of [rows + 9, rows + stride + 18]) {
      const before = memory[strange];
      memory[strange] = Number.NaN;
      expect(kernels.encodeRows(to, rows, masses, columns, stride, 8), kernels.name).toBe(0);
      memory[strange] = before;
    }
  }
});

describe('the memory of the kernels', () => {
  test('keeps what it held when it grows', () => {
    for (const kernels of [compiledHere(), plainKernels]) {
      const held = filled(kernels).slice(0, MEMORY);
      const larger = kernels.reserve(3_000_000);
      expect(larger.length).toBeGreaterThanOrEqual(3_000_000);
      expect(larger.slice(0, MEMORY)).toEqual(held);
    }
  });

  test('keeps tables in their places until they are too many, and then those wanted', () => {
    const kernels = compiledHere();
    const shelve = newShelf(kernels);
    const small = Float64Array.of(1, 2, 3);
    const first = shelve([small]);
    const again = shelve([small]);
    expect(again).toEqual(first);
    const large = [4, 5, 6].map((value) => new Float64Array(3_000_000).fill(value));
    for (const table of large) {
      const { places, end } = shelve([small, table]);
      const memory = kernels.reserve(end);
      expect(memory.slice(places[0], places[0] + 3)).toEqual(small);
      expect(memory[places[1]]).toBe(table[0]);
      expect(memory[places[1] + table.length - 1]).toBe(table[0]);
    }
    expect(shelve([small]).end).toBeLessThan(7_000_000);
  });
});

test('compiling again gives the bytes that are kept', { timeout: 240_000 }, () => {
  const again = execFileSync(process.execPath, ['lib/local/compile-kernels.mjs', '--print'], {
    encoding: 'utf8',
  });
  expect(again).toBe(readFileSync('lib/sensitivity/kernels/compiled-bytes.ts', 'utf8'));
});
