/**
 * The memory that the steps work on and their innermost loops, in plain TypeScript: for machines
 * without WebAssembly SIMD. Places are counted in doubles. Its twin is assembly/machine.ts, which
 * adds in the same order.
 */
let memory = new Float64Array(1 << 17);
let shorts = new Uint16Array(memory.buffer);

/** Memory of at least so many doubles; what it held stays, older views of it end. */
export function reserve(doubles: i32): Float64Array {
  if (doubles > memory.length) {
    const larger = new Float64Array(Math.ceil(doubles * 1.25));
    larger.set(memory);
    memory = larger;
    shorts = new Uint16Array(larger.buffer);
  }
  return memory;
}

export function real(at: i32): f64 {
  return memory[at];
}

export function put(at: i32, value: f64): void {
  memory[at] = value;
}

/** The whole part of a number whose size is below 2³¹. */
export function whole(x: f64): i32 {
  return x | 0;
}

export function clear(at: i32, count: i32): void {
  memory.fill(0, at, at + count);
}

export function move(to: i32, from: i32, count: i32): void {
  memory.copyWithin(to, from, from + count);
}

/**
 * row[i] += perDrop · D[i] + perF · F[i] + perG · G[i] for i < count, which is even; D, F, G are the
 * slices at `slice` and one and two `plane` further.
 */
export function addSlices(
  row: i32,
  slice: i32,
  plane: i32,
  perDrop: f64,
  perF: f64,
  perG: f64,
  count: i32,
): void {
  const m = memory;
  const atF = slice + plane;
  const atG = atF + plane;
  for (let i = 0; i < count; i++) {
    m[row + i] += perDrop * m[slice + i] + perF * m[atF + i] + perG * m[atG + i];
  }
}

/** The same with perG2 times the slice three planes further. */
export function addLongSlices(
  row: i32,
  slice: i32,
  plane: i32,
  perDrop: f64,
  perF: f64,
  perG: f64,
  perG2: f64,
  count: i32,
): void {
  const m = memory;
  const atF = slice + plane;
  const atG = atF + plane;
  const atG2 = atG + plane;
  for (let i = 0; i < count; i++) {
    m[row + i] +=
      perDrop * m[slice + i] + perF * m[atF + i] + perG * m[atG + i] + perG2 * m[atG2 + i];
  }
}

/** out[i] += values[i] for i < count, which is even. */
export function addTo(out: i32, values: i32, count: i32): void {
  const m = memory;
  for (let i = 0; i < count; i++) m[out + i] += m[values + i];
}

/** out[i] = own[i] + (edge[i] - edgeAbove[i]) + sum[i] for i < count, which is even. */
export function foldRow(out: i32, own: i32, edge: i32, edgeAbove: i32, sum: i32, count: i32): void {
  const m = memory;
  for (let i = 0; i < count; i++) {
    m[out + i] = m[own + i] + (m[edge + i] - m[edgeAbove + i]) + m[sum + i];
  }
}

/**
 * out[i + k] += weights[i] · taps[k] for i < count and k < tapCount; both are even, and a tap of 0
 * stands before the first and after the last.
 */
export function convolve(out: i32, weights: i32, count: i32, taps: i32, tapCount: i32): void {
  const m = memory;
  for (let i = 0; i < count; i += 2) {
    const weight = m[weights + i];
    const next = m[weights + i + 1];
    for (let k = 0; k < tapCount + 2; k++) {
      m[out + i + k] = m[out + i + k] + weight * m[taps + k] + next * m[taps + k - 1];
    }
  }
}

/**
 * Two masses at once: out[i] = w[0] · rows[0][i] + Σ w[c] · rows[c][i] over first <= c < end, for
 * i < count; `stride` is the distance of rows. `count` is a multiple of 8, first >= 1.
 */
export function multiplyPair(
  out: i32,
  outNext: i32,
  weights: i32,
  weightsNext: i32,
  rows: i32,
  stride: i32,
  first: i32,
  end: i32,
  count: i32,
): void {
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
}

/** Cuts `count` numbers to 0…1; one that is none stays so. */
export function clip(at: i32, count: i32): void {
  const m = memory;
  for (let i = at; i < at + count; i++) m[i] = Math.min(1, Math.max(0, m[i]));
}

/** Sets `count` 16-bit numbers to 0; `at` counts such numbers, four to a double. */
export function clearShorts(at: i32, count: i32): void {
  shorts.fill(0, at, at + count);
}

/**
 * Writes `count` numbers, cut to 0…1, as 16-bit numbers of 0 to 65535, rounded half up; `to` counts
 * such numbers, four to a double.
 *
 * @returns 1, or 0 where one of them is no number
 */
export function encode(to: i32, from: i32, count: i32): i32 {
  let isWhole = 1;
  for (let i = 0; i < count; i++) {
    const value = Math.min(1, Math.max(0, memory[from + i]));
    if (Number.isNaN(value)) isWhole = 0;
    shorts[to + i] = Math.floor(65535 * value + 0.5);
  }
  return isWhole;
}
