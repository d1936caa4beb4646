import { execFileSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { createRandom } from '@/lib/numerics/random';
import { compiledKernels } from '@/lib/sensitivity/kernels/compiled';
import type { Kernels } from '@/lib/sensitivity/kernels/kernels';
import { plainKernels } from '@/lib/sensitivity/kernels/plain';

const MEMORY = 4000;

function filled(kernels: Kernels): Float64Array {
  const { uniform } = createRandom('kernels');
  const memory = kernels.reserve(MEMORY);
  for (let i = 0; i < MEMORY; i++) memory[i] = uniform() - 0.5;
  return memory;
}

describe('the compiled kernels', () => {
  const runs: [string, (kernels: Kernels) => void][] = [
    ['addRow', (k) => k.addRow(0, 100, 1001, 301, 0.3, -1.2, 7.5, 38)],
    ['addLongRow', (k) => k.addLongRow(2, 64, 1001, 301, 0.3, -1.2, 7.5, 0.01, 40)],
    ['convolve', (k) => k.convolve(10, 500, 17, 900, 12)],
    ['multiplyPair', (k) => k.multiplyPair(0, 64, 200, 300, 400, 64, 3, 11, 40)],
    ['multiplyPair without a band', (k) => k.multiplyPair(0, 64, 200, 300, 400, 64, 12, 0, 40)],
  ];

  test.each(runs)('%s gives the bits of the plain one', (_, run) => {
    const compiled = compiledKernels();
    if (compiled === null) throw new Error('this Node.js has no WebAssembly SIMD');
    const plain = plainKernels();
    const [fast, slow] = [filled(compiled), filled(plain)];
    const before = slow.slice();
    run(compiled);
    run(plain);
    expect(fast.slice(0, MEMORY)).toEqual(slow.slice(0, MEMORY));
    expect(slow).not.toEqual(before);
  });

  test('memory that grows keeps what it held', () => {
    for (const kernels of [compiledKernels(), plainKernels()]) {
      if (kernels === null) throw new Error('this Node.js has no WebAssembly SIMD');
      const held = filled(kernels).slice(0, MEMORY);
      const larger = kernels.reserve(3_000_000);
      expect(larger.length).toBeGreaterThanOrEqual(3_000_000);
      expect(larger.slice(0, MEMORY)).toEqual(held);
    }
  });

  test('compiling again gives the bytes that are kept', { timeout: 240_000 }, () => {
    const again = execFileSync(process.execPath, ['lib/local/compile-kernels.mjs', '--print'], {
      encoding: 'utf8',
    });
    expect(again).toBe(readFileSync('lib/sensitivity/kernels/compiled-bytes.ts', 'utf8'));
  });
});
