import { InputError } from '@/lib/errors';
import type { Matrix, Stroke } from './drawing';

export type Attributes = Record<string, string>;

/** A figure that cannot be drawn, with the place at fault in words. */
export function figureFault(item: string, found: string, expected: string): InputError {
  return new InputError({ code: 'figure', item, found: found.slice(0, 40), expected });
}

export function readNumber(attributes: Attributes, name: string, otherwise?: number): number {
  const text = attributes[name];
  if (text === undefined && otherwise !== undefined) return otherwise;
  const value = Number.parseFloat(text ?? '');
  if (!Number.isFinite(value) || Math.abs(value) > 1e6) {
    throw figureFault(name, text ?? 'nothing', 'a number');
  }
  return value;
}

/** #rrggbb of a literal colour; undefined for none. */
export function readColour(text: string): string | undefined {
  if (text === 'none' || text === 'transparent') return undefined;
  if (/^#[0-9a-f]{6}$/i.test(text)) return text.toLowerCase();
  const short = /^#([0-9a-f])([0-9a-f])([0-9a-f])$/i.exec(text);
  if (short)
    return `#${short
      .slice(1)
      .map((digit) => digit.repeat(2))
      .join('')}`.toLowerCase();
  throw figureFault('colour', text, 'none or #rrggbb');
}

const joins = ['miter', 'round', 'bevel'] as const;
const caps = ['butt', 'round', 'square'] as const;

/** The line of a mark; undefined where it has none. */
export function readStroke(style: Attributes): Stroke | undefined {
  const colour = readColour(style.stroke ?? 'none');
  const width = readNumber(style, 'stroke-width', 1);
  if (colour === undefined || width <= 0) return undefined;
  const dashText = style['stroke-dasharray'] ?? 'none';
  const dash = dashText === 'none' ? [] : dashText.split(/[\s,]+/).map(Number.parseFloat);
  if (dash.some((length) => !(length >= 0 && length < 1e4)) || dash.length > 16) {
    throw figureFault('stroke-dasharray', dashText, 'up to 16 lengths');
  }
  return {
    colour,
    width,
    opacity: readNumber(style, 'stroke-opacity', 1) * readNumber(style, 'opacity', 1),
    dash: dash.some((length) => length > 0) ? dash : [],
    join: joins.find((name) => name === style['stroke-linejoin']) ?? 'miter',
    cap: caps.find((name) => name === style['stroke-linecap']) ?? 'butt',
  };
}

/** The name in url(#name); undefined for anything else. */
export function referenceOf(text: string | undefined): string | undefined {
  return /^url\(["']?#([^"')]+)["']?\)$/.exec(text ?? '')?.[1];
}

export const identity: Matrix = [1, 0, 0, 1, 0, 0];

/** First `inner`, then `outer`. */
export function compose(outer: Matrix, inner: Matrix): Matrix {
  const [a, b, c, d, e, f] = outer;
  const [p, q, r, s, t, u] = inner;
  return [
    a * p + c * q,
    b * p + d * q,
    a * r + c * s,
    b * r + d * s,
    a * t + c * u + e,
    b * t + d * u + f,
  ];
}

/** A list of translate, scale and rotate as one matrix. */
export function readTransform(text: string | undefined): Matrix {
  let result = identity;
  let rest = (text ?? '').trim();
  while (rest !== '') {
    const step = /^(translate|scale|rotate|matrix)\(([^)]*)\)[\s,]*/.exec(rest);
    if (!step) throw figureFault('transform', rest, 'translate, scale, rotate or matrix');
    const numbers = step[2]
      .trim()
      .split(/[\s,]+/)
      .map(Number);
    if (numbers.some((value) => !Number.isFinite(value))) {
      throw figureFault('transform', step[0], 'numbers');
    }
    result = compose(result, matrixOf(step[1], numbers));
    rest = rest.slice(step[0].length);
  }
  return result;
}

function matrixOf(name: string, [x, y, ...more]: number[]): Matrix {
  if (name === 'translate') return [1, 0, 0, 1, x, y ?? 0];
  if (name === 'scale') return [x, 0, 0, y ?? x, 0, 0];
  if (name === 'matrix') return [x, y, ...more].slice(0, 6) as Matrix;
  const [cos, sin] = [Math.cos((x * Math.PI) / 180), Math.sin((x * Math.PI) / 180)];
  const turn: Matrix = [cos, sin, -sin, cos, 0, 0];
  if (y === undefined) return turn;
  const [cx, cy] = [y, more[0] ?? 0];
  return compose(compose([1, 0, 0, 1, cx, cy], turn), [1, 0, 0, 1, -cx, -cy]);
}
