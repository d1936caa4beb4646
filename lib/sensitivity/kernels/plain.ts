import type { Kernels } from './kernels';

/** The kernels in plain TypeScript, for machines without WebAssembly SIMD. */
export function plainKernels(): Kernels {
  let memory = new Float64Array(1 << 17);
  return {
    name: 'plain',
    reserve: (doubles) => {
      if (doubles > memory.length) {
        const larger = new Float64Array(Math.ceil(doubles * 1.25));
        larger.set(memory);
        memory = larger;
      }
      return memory;
    },
    addRow: (target, source, slice, plane, perDrop, perF, perG, count) => {
      const m = memory;
      const atF = slice + plane;
      const atG = atF + plane;
      for (let i = 0; i < count; i++) {
        const v = perDrop * m[slice + i] + perF * m[atF + i] + perG * m[atG + i];
        m[target + i] += v;
        m[source + i] -= v;
      }
    },
    addLongRow: (target, source, slice, plane, perDrop, perF, perG, perG2, count) => {
      const m = memory;
      const atF = slice + plane;
      const atG = atF + plane;
      const atG2 = atG + plane;
      for (let i = 0; i < count; i++) {
        const v =
          perDrop * m[slice + i] + perF * m[atF + i] + perG * m[atG + i] + perG2 * m[atG2 + i];
        m[target + i] += v;
        m[source + i] -= v;
      }
    },
    convolve: (out, weights, count, taps, tapCount) => {
      const m = memory;
      for (let i = 0; i < count; i++) {
        const weight = m[weights + i];
        for (let k = 0; k < tapCount; k++) m[out + i + k] += weight * m[taps + k];
      }
    },
    multiplyPair: (out, outNext, weights, weightsNext, rows, stride, first, end, count) => {
      const m = memory;
      for (let i = 0; i < count; i += 4) {
        let at = rows + i;
        let [w, v] = [m[weights], m[weightsNext]];
        let a0 = w * m[at];
        let a1 = w * m[at + 1];
        let a2 = w * m[at + 2];
        let a3 = w * m[at + 3];
        let b0 = v * m[at];
        let b1 = v * m[at + 1];
        let b2 = v * m[at + 2];
        let b3 = v * m[at + 3];
        at += first * stride;
        for (let c = first; c < end; c++, at += stride) {
          w = m[weights + c];
          v = m[weightsNext + c];
          a0 += w * m[at];
          a1 += w * m[at + 1];
          a2 += w * m[at + 2];
          a3 += w * m[at + 3];
          b0 += v * m[at];
          b1 += v * m[at + 1];
          b2 += v * m[at + 2];
          b3 += v * m[at + 3];
        }
        m[out + i] = a0;
        m[out + i + 1] = a1;
        m[out + i + 2] = a2;
        m[out + i + 3] = a3;
        m[outNext + i] = b0;
        m[outNext + i + 1] = b1;
        m[outNext + i + 2] = b2;
        m[outNext + i + 3] = b3;
      }
    },
  };
}
