// AssemblyScript: the loops of ../plain.ts on two doubles at a time, adding in the same order.
// Places are byte offsets; `npm run kernels` compiles this file into ../compiled.ts.

export function addRow(
  target: usize,
  source: usize,
  slice: usize,
  plane: usize,
  perDrop: f64,
  perF: f64,
  perG: f64,
  count: i32,
): void {
  const drop = f64x2.splat(perDrop);
  const f = f64x2.splat(perF);
  const g = f64x2.splat(perG);
  const atF = slice + plane;
  const atG = atF + plane;
  const end = (<usize>count) << 3;
  for (let i: usize = 0; i < end; i += 16) {
    const value = f64x2.add(
      f64x2.add(f64x2.mul(drop, v128.load(slice + i)), f64x2.mul(f, v128.load(atF + i))),
      f64x2.mul(g, v128.load(atG + i)),
    );
    v128.store(target + i, f64x2.add(v128.load(target + i), value));
    v128.store(source + i, f64x2.sub(v128.load(source + i), value));
  }
}

export function addLongRow(
  target: usize,
  source: usize,
  slice: usize,
  plane: usize,
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
  const atF = slice + plane;
  const atG = atF + plane;
  const atG2 = atG + plane;
  const end = (<usize>count) << 3;
  for (let i: usize = 0; i < end; i += 16) {
    const short = f64x2.add(
      f64x2.add(f64x2.mul(drop, v128.load(slice + i)), f64x2.mul(f, v128.load(atF + i))),
      f64x2.mul(g, v128.load(atG + i)),
    );
    const value = f64x2.add(short, f64x2.mul(g2, v128.load(atG2 + i)));
    v128.store(target + i, f64x2.add(v128.load(target + i), value));
    v128.store(source + i, f64x2.sub(v128.load(source + i), value));
  }
}

export function convolve(out: usize, weights: usize, count: i32, taps: usize, tapCount: i32): void {
  const end = (<usize>tapCount) << 3;
  for (let i = 0; i < count; i++, weights += 8, out += 8) {
    const weight = v128.load64_splat(weights);
    for (let k: usize = 0; k < end; k += 16) {
      const sum = f64x2.add(v128.load(out + k), f64x2.mul(weight, v128.load(taps + k)));
      v128.store(out + k, sum);
    }
  }
}

export function multiplyPair(
  out: usize,
  outNext: usize,
  weights: usize,
  weightsNext: usize,
  rows: usize,
  stride: usize,
  first: i32,
  end: i32,
  count: i32,
): void {
  const skip = stride * <usize>first;
  const start = (<usize>first) << 3;
  for (let i: usize = 0; i < (<usize>count) << 3; i += 64) {
    let at = rows + i;
    let w = v128.load64_splat(weights);
    let v = v128.load64_splat(weightsNext);
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
    let here = weights + start;
    let next = weightsNext + start;
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
      at += stride;
      here += 8;
      next += 8;
    }
    v128.store(out + i, a0);
    v128.store(out + i, a1, 16);
    v128.store(out + i, a2, 32);
    v128.store(out + i, a3, 48);
    v128.store(outNext + i, b0);
    v128.store(outNext + i, b1, 16);
    v128.store(outNext + i, b2, 32);
    v128.store(outNext + i, b3, 48);
  }
}
