/** What stands after a whole number of px, by hundredths. */
const HUNDREDTHS = Array.from({ length: 100 }, (_, n) => String(n / 100).slice(1));

/**
 * A number for a path: two decimals of a px are more than a screen shows. Written from whole
 * numbers, a quarter of the time that a fraction takes: charts are written anew as a hand moves.
 */
function px(value: number): string {
  const hundredths = Math.round(value * 100);
  const size = Math.abs(hundredths);
  const rest = size % 100;
  return `${hundredths < 0 ? '-' : ''}${(size - rest) / 100}${HUNDREDTHS[rest] ?? ''}`;
}

/** Polyline through points; a gap wherever a coordinate is not finite. */
export function linePath(
  xs: ArrayLike<number>,
  ys: ArrayLike<number>,
  x: (value: number) => number,
  y: (value: number) => number,
): string {
  let path = '';
  let isDrawing = false;
  for (let index = 0; index < xs.length; index += 1) {
    const at = [x(xs[index]), y(ys[index])];
    if (!Number.isFinite(at[0]) || !Number.isFinite(at[1])) {
      isDrawing = false;
      continue;
    }
    path += `${isDrawing ? 'L' : 'M'}${px(at[0])},${px(at[1])}`;
    isDrawing = true;
  }
  return path;
}

/**
 * Area between a curve and another (or a level line), over part of the axis.
 *
 * @param from lower end of the part, in axis units; the curve is interpolated there
 * @param to upper end of the part
 * @param base px of the other edge: a number, or one value per point
 */
export function areaPath(
  xs: ArrayLike<number>,
  ys: ArrayLike<number>,
  x: (value: number) => number,
  y: (value: number) => number,
  base: number,
  from = -Infinity,
  to = Infinity,
): string {
  const points: [number, number][] = [];
  for (let index = 0; index < xs.length; index += 1) {
    if (xs[index] > from && xs[index] < to) points.push([xs[index], ys[index]]);
  }
  const first = xs[0];
  const last = xs[xs.length - 1];
  if (Number.isFinite(from) && from >= first && from <= last) {
    points.unshift([from, valueAt(xs, ys, from)]);
  }
  if (Number.isFinite(to) && to <= last && to >= first) points.push([to, valueAt(xs, ys, to)]);
  if (points.length < 2) return '';
  const top = points.map(([px0, py0]) => `${px(x(px0))},${px(y(py0))}`).join('L');
  return `M${px(x(points[0][0]))},${px(base)}L${top}L${px(x(points[points.length - 1][0]))},${px(base)}Z`;
}

/** Band between two curves on the same points. */
export function bandPath(
  xs: ArrayLike<number>,
  lower: ArrayLike<number>,
  upper: ArrayLike<number>,
  x: (value: number) => number,
  y: (value: number) => number,
): string {
  const there: string[] = [];
  const back: string[] = [];
  for (let index = 0; index < xs.length; index += 1) {
    const at = px(x(xs[index]));
    const [low, high] = [y(lower[index]), y(upper[index])];
    if (!Number.isFinite(low) || !Number.isFinite(high)) continue;
    there.push(`${at},${px(high)}`);
    back.push(`${at},${px(low)}`);
  }
  return there.length < 2 ? '' : `M${[...there, ...back.reverse()].join('L')}Z`;
}

/**
 * Linear interpolation on increasing points; the end values beyond the ends.
 *
 * @param xs increasing, shape [point]
 * @param ys shape [point]
 */
export function valueAt(xs: ArrayLike<number>, ys: ArrayLike<number>, at: number): number {
  const last = xs.length - 1;
  if (at <= xs[0]) return ys[0];
  if (at >= xs[last]) return ys[last];
  let low = 0;
  let high = last;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (xs[middle] <= at) low = middle;
    else high = middle;
  }
  const share = (at - xs[low]) / (xs[high] - xs[low]);
  return ys[low] + share * (ys[high] - ys[low]);
}

/** Discs of one radius as one path. */
export function dotsPath(centres: readonly { x: number; y: number }[], radius: number): string {
  const r = px(radius);
  const half = (across: number) => `a${r},${r} 0 1 0 ${px(across)},0`;
  return centres
    .map(({ x, y }) => `M${px(x - radius)},${px(y)}${half(2 * radius)}${half(-2 * radius)}Z`)
    .join('');
}
