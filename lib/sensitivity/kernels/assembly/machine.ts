// AssemblyScript: ../machine.ts on two doubles at a time, adding in the same order. Places are
// counted in doubles; `npm run kernels` compiles the steps with this file into ../compiled-bytes.ts.

function bytes(doubles: i32): usize {
  return (<usize>doubles) << 3;
}

export function real(at: i32): f64 {
  return load<f64>(bytes(at));
}

export function put(at: i32, value: f64): void {
  store<f64>(bytes(at), value);
}

export function whole(x: f64): i32 {
  return <i32>x;
}

export function clear(at: i32, count: i32): void {
  memory.fill(bytes(at), 0, bytes(count));
}

export function move(to: i32, from: i32, count: i32): void {
  memory.copy(bytes(to), bytes(from), bytes(count));
}

export function addSlices(
  row: i32,
  slice: i32,
  plane: i32,
  perDrop: f64,
  perF: f64,
  perG: f64,
  count: i32,
): void {
  const drop = f64x2.splat(perDrop);
  const f = f64x2.splat(perF);
  const g = f64x2.splat(perG);
  const end = bytes(row + count);
  let atD = bytes(slice);
  let atF = bytes(slice + plane);
  let atG = bytes(slice + 2 * plane);
  for (let at = bytes(row); at < end; at += 16) {
    const value = f64x2.add(
      f64x2.add(f64x2.mul(drop, v128.load(atD)), f64x2.mul(f, v128.load(atF))),
      f64x2.mul(g, v128.load(atG)),
    );
    v128.store(at, f64x2.add(v128.load(at), value));
    atD += 16;
    atF += 16;
    atG += 16;
  }
}

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
  const drop = f64x2.splat(perDrop);
  const f = f64x2.splat(perF);
  const g = f64x2.splat(perG);
  const g2 = f64x2.splat(perG2);
  const end = bytes(row + count);
  const step = bytes(plane);
  let atD = bytes(slice);
  for (let at = bytes(row); at < end; at += 16) {
    const atF = atD + step;
    const atG = atF + step;
    const short = f64x2.add(
      f64x2.add(f64x2.mul(drop, v128.load(atD)), f64x2.mul(f, v128.load(atF))),
      f64x2.mul(g, v128.load(atG)),
    );
    const value = f64x2.add(short, f64x2.mul(g2, v128.load(atG + step)));
    v128.store(at, f64x2.add(v128.load(at), value));
    atD += 16;
  }
}

export function addTo(out: i32, values: i32, count: i32): void {
  const shift = bytes(values) - bytes(out);
  const end = bytes(out + count);
  for (let at = bytes(out); at < end; at += 16) {
    v128.store(at, f64x2.add(v128.load(at), v128.load(at + shift)));
  }
}

export function foldRow(out: i32, own: i32, edge: i32, edgeAbove: i32, sum: i32, count: i32): void {
  const end = bytes(count);
  for (let i: usize = 0; i < end; i += 16) {
    const step = f64x2.sub(v128.load(bytes(edge) + i), v128.load(bytes(edgeAbove) + i));
    const value = f64x2.add(f64x2.add(v128.load(bytes(own) + i), step), v128.load(bytes(sum) + i));
    v128.store(bytes(out) + i, value);
  }
}

export function convolve(out: i32, weights: i32, count: i32, taps: i32, tapCount: i32): void {
  const end = bytes(tapCount + 2);
  const last = bytes(weights + count);
  const firstTap = bytes(taps);
  let atOut = bytes(out);
  for (let at = bytes(weights); at < last; at += 16) {
    const weight = v128.load64_splat(at);
    const next = v128.load64_splat(at, 8);
    for (let k: usize = 0; k < end; k += 16) {
      const once = f64x2.add(v128.load(atOut + k), f64x2.mul(weight, v128.load(firstTap + k)));
      const twice = f64x2.add(once, f64x2.mul(next, v128.load(firstTap + k - 8)));
      v128.store(atOut + k, twice);
    }
    atOut += 16;
  }
}

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
  const step = bytes(stride);
  const skip = bytes(stride * first);
  const atWeights = bytes(weights);
  const atNext = bytes(weightsNext);
  const start = bytes(first);
  for (let i: usize = 0; i < bytes(count); i += 64) {
    let at = bytes(rows) + i;
    let w = v128.load64_splat(atWeights);
    let v = v128.load64_splat(atNext);
    let row = v128.load(at);
    let a0 = f64x2.mul(w, row);
    let b0 = f64x2.mul(v, row);
    row = v128.load(at, 16);
    let a1 = f64x2.mul(w, row);
    let b1 = f64x2.mul(v, row);
    row = v128.load(at, 32);
    let a2 = f64x2.mul(w, row);
    let b2 = f64x2.mul(v, row);
    row = v128.load(at, 48);
    let a3 = f64x2.mul(w, row);
    let b3 = f64x2.mul(v, row);
    at += skip;
    let here = atWeights + start;
    let next = atNext + start;
    for (let c = first; c < end; c++) {
      w = v128.load64_splat(here);
      v = v128.load64_splat(next);
      row = v128.load(at);
      a0 = f64x2.add(a0, f64x2.mul(w, row));
      b0 = f64x2.add(b0, f64x2.mul(v, row));
      row = v128.load(at, 16);
      a1 = f64x2.add(a1, f64x2.mul(w, row));
      b1 = f64x2.add(b1, f64x2.mul(v, row));
      row = v128.load(at, 32);
      a2 = f64x2.add(a2, f64x2.mul(w, row));
      b2 = f64x2.add(b2, f64x2.mul(v, row));
      row = v128.load(at, 48);
      a3 = f64x2.add(a3, f64x2.mul(w, row));
      b3 = f64x2.add(b3, f64x2.mul(v, row));
      at += step;
      here += 8;
      next += 8;
    }
    v128.store(bytes(out) + i, a0);
    v128.store(bytes(out) + i, a1, 16);
    v128.store(bytes(out) + i, a2, 32);
    v128.store(bytes(out) + i, a3, 48);
    v128.store(bytes(outNext) + i, b0);
    v128.store(bytes(outNext) + i, b1, 16);
    v128.store(bytes(outNext) + i, b2, 32);
    v128.store(bytes(outNext) + i, b3, 48);
  }
}

export function clip(at: i32, count: i32): void {
  const zero = f64x2.splat(0);
  const one = f64x2.splat(1);
  const end = bytes(at + count);
  let place = bytes(at);
  for (; place + 16 <= end; place += 16) {
    // Adding 0 makes a -0 a 0.
    const value = f64x2.pmin(f64x2.pmax(v128.load(place), zero), one);
    v128.store(place, f64x2.add(value, zero));
  }
  if (place < end) store<f64>(place, Math.min(1, Math.max(0, load<f64>(place))));
}

export function clearShorts(at: i32, count: i32): void {
  memory.fill((<usize>at) << 1, 0, (<usize>count) << 1);
}

/** Beyond 2⁵² a double's last bits are a whole number. */
const WHOLE_BITS: f64 = 4503599627370496;

function cutPair(at: usize): v128 {
  return f64x2.pmin(f64x2.pmax(v128.load(at), f64x2.splat(0)), f64x2.splat(1));
}

function wholePair(value: v128): v128 {
  const scaled = f64x2.add(f64x2.mul(f64x2.splat(65535), value), f64x2.splat(0.5));
  return f64x2.add(f64x2.floor(scaled), f64x2.splat(WHOLE_BITS));
}

export function encode(to: i32, from: i32, count: i32): i32 {
  let target = (<usize>to) << 1;
  let at = bytes(from);
  const end = bytes(from + count);
  // One that is no number makes the sum none.
  let sum = f64x2.splat(0);
  for (; at + 64 <= end; at += 64) {
    const a = cutPair(at);
    const b = cutPair(at + 16);
    const c = cutPair(at + 32);
    const d = cutPair(at + 48);
    sum = f64x2.add(sum, f64x2.add(f64x2.add(a, b), f64x2.add(c, d)));
    const low = v128.shuffle<i32>(wholePair(a), wholePair(b), 0, 2, 4, 6);
    const high = v128.shuffle<i32>(wholePair(c), wholePair(d), 0, 2, 4, 6);
    v128.store(target, i16x8.narrow_i32x4_u(low, high));
    target += 16;
  }
  let isWhole: i32 = v128.any_true(f64x2.ne(sum, sum)) ? 0 : 1;
  for (; at < end; at += 8) {
    const value = load<f64>(at);
    if (!(value <= Infinity)) isWhole = 0;
    const cut = Math.min(1, Math.max(0, value));
    store<u16>(target, <u16>Math.floor(65535 * cut + 0.5));
    target += 2;
  }
  return isWhole;
}
