import { formatPercent, formatRate, type RateQuantity } from '@/lib/quantities/display';
import { areaPath, linePath, valueAt } from '../paths';
import { densityTop } from '../posterior-layout';
import { limitWithLevel, type OtherPosterior } from '../posterior-words';
import type { RateCurve } from '../rate-curve';
import { textWidth } from '../text-width';
import { linearTicks, withRateUnit } from '../ticks';
import { type Scene, type Shape, sceneToSvg } from './scene';

export interface PosteriorFigureInputs {
  curve: RateCurve;
  limit: number;
  /** Fraction, such as 0.95. */
  credibleLevel: number;
  quantity: RateQuantity;
  median?: number;
  interval68?: [number, number];
  prior: { label: string; density?: Float64Array };
  /** The same question with zero detections. */
  alternative?: OtherPosterior;
  /** Everything the number rests on: ranges, population, sample, counting rule, digest. */
  caption: string;
  title: string;
  description: string;
  /** One column or two. */
  widthMm: 88 | 180;
  /** Prints the word draft into the drawing: "draft, run 18". */
  standing?: string;
}

/** Light tokens, written out: a figure lives outside the product. */
const colours = {
  page: '#ffffff',
  ink: '#0b2326',
  ink2: '#344d4f',
  ink3: '#4a6164',
  data: '#117878',
  bound: '#c2390d',
};

const textPt = 7.5;
const linePt = 9.6;
const pointsPerMm = 72 / 25.4;

/** Posterior with its bound, as shapes in points. */
export function posteriorScene(inputs: PosteriorFigureInputs): Scene {
  const { curve, limit, credibleLevel, quantity, prior, alternative, widthMm } = inputs;
  const widthPt = widthMm * pointsPerMm;
  const plotHeight = widthMm === 88 ? 128 : 190;
  const frame = { left: 6, right: widthPt - 10, top: 20, bottom: 20 + plotHeight };
  const max = curve.rate[curve.rate.length - 1];
  const top = densityTop(inputs);
  const x = (rate: number) => frame.left + (rate / max) * (frame.right - frame.left);
  // Higher than the frame is cut there: a figure holds no clip paths.
  const y = (density: number) =>
    frame.bottom - (Math.min(density, top) / top) * (frame.bottom - frame.top);
  const shapes: Shape[] = [];
  const text = (at: number, row: number, words: string, more: Partial<Shape> = {}) =>
    shapes.push({
      kind: 'text',
      x: at,
      y: row,
      text: words,
      size: textPt,
      fill: colours.ink2,
      ...more,
    } as Shape);
  const area = (from: number, to: number) =>
    areaPath(curve.rate, curve.density, x, y, frame.bottom, from, to);

  shapes.push({ kind: 'path', d: area(0, limit), fill: colours.data, fillOpacity: 0.2 });
  if (inputs.interval68) {
    shapes.push({
      kind: 'path',
      d: area(...inputs.interval68),
      fill: colours.data,
      fillOpacity: 0.32,
    });
  }
  shapes.push({
    kind: 'path',
    d: hatch(curve, limit, x, y, frame),
    stroke: { colour: colours.bound, width: 0.7 },
  });
  if (prior.density) {
    shapes.push({
      kind: 'path',
      d: linePath(curve.rate, prior.density, x, y),
      stroke: { colour: colours.ink3, width: 0.8, dash: '0.8 2.4' },
    });
  }
  shapes.push({
    kind: 'path',
    d: linePath(curve.rate, curve.density, x, y),
    stroke: { colour: colours.data, width: 1.4 },
  });
  if (alternative) {
    shapes.push({
      kind: 'path',
      d: visiblePart(alternative.curve, top, x, y),
      stroke: { colour: colours.ink2, width: 0.9, dash: '3 2.4' },
    });
  }
  if (inputs.median !== undefined) {
    const at = x(inputs.median);
    shapes.push({
      kind: 'line',
      x1: at,
      x2: at,
      y1: y(valueAt(curve.rate, curve.density, inputs.median)),
      y2: frame.bottom,
      stroke: { colour: colours.data, width: 0.9, dash: '1.2 1.8' },
    });
  }
  drawAxis(shapes, text, inputs, frame, x, max);

  text(frame.left, 10, 'posterior density', { fill: colours.ink3 });
  if (inputs.standing) {
    text(frame.right, 10, inputs.standing, { anchor: 'end', weight: 600, fill: colours.ink });
  }
  drawBound(shapes, text, inputs, frame, x);
  const beside = x(limit) + 6;
  if (frame.right - beside > 96) {
    text(
      beside,
      frame.bottom - 34,
      `${formatPercent(1 - credibleLevel).replace('.0', '')} of the probability`,
    );
    text(beside, frame.bottom - 24, 'lies above the limit');
  }
  const said = [
    `Upper limit ${limitWithLevel(limit, credibleLevel, quantity)}`,
    `prior: ${prior.label}`,
    inputs.median === undefined ? '' : `median ${formatRate(inputs.median, quantity)} (dotted)`,
    alternative
      ? `dashed: ${alternative.label}, ${limitWithLevel(alternative.limit, credibleLevel, quantity)}`
      : '',
  ]
    .filter(Boolean)
    .join('; ');
  const caption = /[.]$/.test(inputs.caption) ? inputs.caption : `${inputs.caption}.`;
  const lines = wrap(`${said}. ${caption}`, widthPt - 12);
  lines.forEach((line, index) => {
    text(frame.left, frame.bottom + 38 + index * linePt, line, { fill: colours.ink });
  });

  return {
    title: inputs.title,
    description: inputs.description,
    widthMm,
    widthPt,
    heightPt: frame.bottom + 38 + lines.length * linePt,
    shapes: [
      {
        kind: 'rect',
        x: 0,
        y: 0,
        width: widthPt,
        height: frame.bottom + 38 + lines.length * linePt,
        fill: colours.page,
      },
      ...shapes,
    ],
  };
}

/** The figure of one run as a file of its own. */
export function posteriorFigureSvg(inputs: PosteriorFigureInputs): string {
  return sceneToSvg(posteriorScene(inputs));
}

interface Frame {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

type TextOf = (at: number, row: number, words: string, more?: Partial<Shape>) => void;

function drawAxis(
  shapes: Shape[],
  text: TextOf,
  { quantity }: PosteriorFigureInputs,
  frame: Frame,
  x: (rate: number) => number,
  max: number,
): void {
  const stroke = { colour: colours.ink2, width: 0.6 };
  shapes.push({
    kind: 'line',
    x1: frame.left,
    x2: frame.right,
    y1: frame.bottom,
    y2: frame.bottom,
    stroke,
  });
  const ticks = withRateUnit(linearTicks(0, 100 * max, frame.right - frame.left, 40), quantity);
  for (const tick of ticks) {
    const at = x(tick.value / 100);
    shapes.push({
      kind: 'line',
      x1: at,
      x2: at,
      y1: frame.bottom,
      y2: frame.bottom + (tick.isMajor ? 4 : 2.4),
      stroke,
    });
    if (tick.label === undefined) continue;
    const anchor = tick.value === 0 ? 'start' : at > frame.right - 10 ? 'end' : 'middle';
    text(at, frame.bottom + 13, tick.label, { anchor });
  }
  const name =
    quantity === 'host_fraction'
      ? 'host fraction, stars with at least one such planet'
      : 'planets per 100 stars';
  text(frame.right, frame.bottom + 24, name, { anchor: 'end', fill: colours.ink3 });
}

function drawBound(
  shapes: Shape[],
  text: TextOf,
  { limit, credibleLevel, quantity }: PosteriorFigureInputs,
  frame: Frame,
  x: (rate: number) => number,
): void {
  const words = limitWithLevel(limit, credibleLevel, quantity);
  const wide = textWidth(words, 8.5) + 12;
  const at = x(limit);
  const top = frame.top + 16;
  const left = at + wide > frame.right ? at + 0.9 - wide : at - 0.9;
  shapes.push(
    {
      kind: 'rect',
      x: at - 0.9,
      y: top,
      width: 1.8,
      height: frame.bottom - top,
      fill: colours.bound,
    },
    { kind: 'rect', x: left, y: top, width: wide, height: 15, fill: colours.bound },
  );
  text(left + wide / 2, top + 10.4, words, {
    anchor: 'middle',
    size: 8.5,
    weight: 600,
    fill: colours.page,
  });
}

/** Lines at 45° under the curve beyond the limit, drawn one by one. */
function hatch(
  curve: RateCurve,
  limit: number,
  x: (rate: number) => number,
  y: (density: number) => number,
  frame: Frame,
): string {
  const rates = Float64Array.from(curve.rate, x);
  const heights = Float64Array.from(curve.density, y);
  const start = x(limit);
  const rise = 0.25;
  let path = '';
  for (let foot = start - 60; foot < frame.right; foot += 2.6) {
    let from = Math.max(0, start - foot);
    let to = from;
    const isUnder = (t: number) =>
      foot + t <= frame.right && frame.bottom - t > valueAt(rates, heights, foot + t);
    while (isUnder(to + rise)) to += rise;
    if (to <= from) continue;
    from = Math.max(from, 0);
    path += `M${(foot + from).toFixed(2)},${(frame.bottom - from).toFixed(2)}L${(foot + to).toFixed(2)},${(frame.bottom - to).toFixed(2)}`;
  }
  return path;
}

/** The part of another curve that stays inside the frame; the rest is left out, not flattened. */
function visiblePart(
  curve: RateCurve,
  top: number,
  x: (rate: number) => number,
  y: (density: number) => number,
): string {
  const densities = curve.density.map((density) => (density > top ? Number.NaN : density));
  return linePath(curve.rate, densities, x, y);
}

function wrap(text: string, widthPt: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (textWidth(longer, textPt) * 0.97 > widthPt && line !== '') {
      lines.push(line);
      line = word;
    } else {
      line = longer;
    }
  }
  return line === '' ? lines : [...lines, line];
}
