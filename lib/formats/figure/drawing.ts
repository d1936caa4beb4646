/** A colour of ink as #rrggbb, or the name of a hatch. */
export type Ink = { colour: string } | { hatch: string };

/** [a, b, c, d, e, f] of a transform, as SVG and PDF write it. */
export type Matrix = [number, number, number, number, number, number];

export interface Stroke {
  colour: string;
  /** In units of the drawing, like every length here. */
  width: number;
  opacity: number;
  dash: number[];
  join: 'miter' | 'round' | 'bevel';
  cap: 'butt' | 'round' | 'square';
}

interface Placed {
  matrix: Matrix;
  /** Name of what cuts it. */
  clip?: string;
}

export interface ShapeMark extends Placed {
  kind: 'shape';
  /** SVG path data. */
  path: string;
  fill?: Ink;
  fillOpacity: number;
  rule: 'nonzero' | 'evenodd';
  stroke?: Stroke;
}

/** Characters of one look; `dy` lowers them and what follows. */
export interface TextRun {
  text: string;
  dx: number;
  dy: number;
  size: number;
  isBold: boolean;
  isItalic: boolean;
  colour: string;
  opacity: number;
  /** Drawn behind the characters. */
  halo?: Stroke;
}

export interface TextMark extends Placed {
  kind: 'text';
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
  runs: TextRun[];
}

export type Mark = ShapeMark | TextMark;

/** Parallel lines, one each `step` units, turned by `matrix`. */
export interface Hatch {
  step: number;
  matrix: Matrix;
  stroke: Stroke;
}

/** What a figure file holds: marks in the order in which they cover each other. */
export interface Drawing {
  title: string;
  description: string;
  widthMm: number;
  /** Extent in units of the drawing. */
  width: number;
  height: number;
  marks: Mark[];
  hatches: Map<string, Hatch>;
  /** Path data by name. */
  clips: Map<string, string>;
}
