import { linearAxis, logSpacedAxis } from '@/lib/numerics/grid';

export interface HelpAxis {
  name: string;
  scale: 'linear' | 'log';
  domain: readonly [number, number];
  ticks: readonly number[];
  /** Multiplies what is written at a tick, 100 for per cent. */
  times?: number;
}

export interface HelpCurve {
  x: readonly number[];
  y: readonly number[];
  look: 'data' | 'bound' | 'quiet' | 'dashed';
  /** Written on the curve at this point of it. */
  label?: { text: string; at: number; side: 'above' | 'below' };
}

export interface HelpDrawing {
  /** What is seen, with every number it was drawn from. */
  caption: string;
  x: HelpAxis;
  y: HelpAxis;
  curves: readonly HelpCurve[];
  /** The bound flag at a value of x. */
  flag?: { at: number; text: string };
}

const POINTS = 121;
export const along = (from: number, to: number, isLog = false) =>
  Array.from(isLog ? logSpacedAxis(from, to, POINTS) : linearAxis(from, to, POINTS));
export const draw = (
  x: number[],
  f: (x: number) => number,
  look: HelpCurve['look'],
): HelpCurve => ({
  x,
  y: x.map(f),
  look,
});
export const named = (
  curve: HelpCurve,
  text: string,
  share: number,
  side: 'above' | 'below' = 'above',
): HelpCurve => ({
  ...curve,
  label: { text, at: Math.round(share * (curve.x.length - 1)), side },
});
export const share: Pick<HelpAxis, 'scale' | 'domain' | 'ticks'> = {
  scale: 'linear',
  domain: [0, 1],
  ticks: [0, 0.25, 0.5, 0.75, 1],
};
