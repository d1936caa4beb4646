import { COMPILED_KERNELS } from './compiled-bytes';
import type { Kernels } from './kernels';

/** The part of WebAssembly that is used: this room knows no platform. */
interface WasmMemory {
  readonly buffer: ArrayBuffer;
  grow(pages: number): number;
}

interface Wasm {
  validate(bytes: Uint8Array): boolean;
  Memory: new (size: { initial: number }) => WasmMemory;
  Module: new (bytes: Uint8Array) => object;
  Instance: new (
    module: object,
    imports: { env: { memory: WasmMemory } },
  ) => { exports: Pick<Kernels, 'addRow' | 'addLongRow' | 'convolve' | 'multiplyPair'> };
}

const PAGE_DOUBLES = 8192;
const FIRST_PAGES = 32;
const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

function bytesOf(base64: string): Uint8Array {
  const text = base64.replace(/=+$/, '');
  const bytes = new Uint8Array((text.length * 3) >> 2);
  let [bits, held, at] = [0, 0, 0];
  for (const letter of text) {
    held = (held << 6) | ALPHABET.indexOf(letter);
    bits += 6;
    if (bits >= 8) {
      bits -= 8;
      bytes[at++] = (held >> bits) & 255;
    }
  }
  return bytes;
}

/** The module, or null where a page's content security policy lets nothing be compiled. */
function compile(wasm: Wasm, bytes: Uint8Array): object | null {
  try {
    return new wasm.Module(bytes);
  } catch {
    // The bytes are valid: what is left is the page's refusal, and the plain kernels give the same.
    return null;
  }
}

/**
 * The kernels as compiled, on two doubles at a time; null where the machine has no such orders or
 * the page lets nothing be compiled.
 */
export function compiledKernels(): Kernels | null {
  const wasm = (globalThis as unknown as { WebAssembly?: Wasm }).WebAssembly;
  const bytes = bytesOf(COMPILED_KERNELS);
  const module = wasm?.validate(bytes) ? compile(wasm, bytes) : null;
  if (!wasm || module === null) return null;
  const memory = new wasm.Memory({ initial: FIRST_PAGES });
  const instance = new wasm.Instance(module, { env: { memory } });
  const { addRow, addLongRow, convolve, multiplyPair } = instance.exports;
  let view = new Float64Array(memory.buffer);
  return {
    name: 'compiled',
    reserve: (doubles) => {
      if (doubles > view.length) {
        memory.grow(Math.ceil((1.25 * doubles - view.length) / PAGE_DOUBLES));
        view = new Float64Array(memory.buffer);
      }
      return view;
    },
    addRow: (target, source, slice, plane, perDrop, perF, perG, count) =>
      addRow(8 * target, 8 * source, 8 * slice, 8 * plane, perDrop, perF, perG, count),
    addLongRow: (target, source, slice, plane, perDrop, perF, perG, perG2, count) =>
      addLongRow(8 * target, 8 * source, 8 * slice, 8 * plane, perDrop, perF, perG, perG2, count),
    convolve: (out, weights, count, taps, tapCount) =>
      convolve(8 * out, 8 * weights, count, 8 * taps, tapCount),
    multiplyPair: (out, outNext, weights, weightsNext, rows, stride, first, end, count) =>
      multiplyPair(
        8 * out,
        8 * outNext,
        8 * weights,
        8 * weightsNext,
        8 * rows,
        8 * stride,
        first,
        end,
        count,
      ),
  };
}
