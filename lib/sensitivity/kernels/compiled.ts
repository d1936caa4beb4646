import { COMPILED_KERNELS } from './compiled-bytes';
import type { Kernels, Steps } from './kernels';

/** The part of WebAssembly that is used: this room knows no platform. */
interface WasmMemory {
  readonly buffer: ArrayBuffer;
  grow(pages: number): number;
}

interface Wasm {
  validate(bytes: Uint8Array): boolean;
  Memory: new (size: { initial: number }) => WasmMemory;
  Module: new (bytes: Uint8Array) => object;
  Instance: new (module: object, imports: { env: { memory: WasmMemory } }) => { exports: Steps };
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
  const { exports } = new wasm.Instance(module, { env: { memory } });
  let view = new Float64Array(memory.buffer);
  return {
    ...exports,
    name: 'compiled',
    reserve: (doubles) => {
      if (doubles > view.length) {
        memory.grow(Math.ceil((1.25 * doubles - view.length) / PAGE_DOUBLES));
        view = new Float64Array(memory.buffer);
      }
      return view;
    },
  };
}
