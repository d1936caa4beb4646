import { SaxesParser, type SaxesTagPlain } from 'saxes';
import type { Drawing, Matrix, ShapeMark, TextMark, TextRun } from './drawing';
import { pathOf } from './read-shapes';
import {
  type Attributes,
  compose,
  figureFault,
  identity,
  readColour,
  readNumber,
  readStroke,
  readTransform,
  referenceOf,
} from './read-style';

/** What a figure file may hold at most. */
export const figureLimits = { bytes: 4 * 2 ** 20, elements: 40_000, depth: 24 } as const;

/** Properties that an element hands down to what it holds. */
const inherited = [
  'fill',
  'fill-opacity',
  'fill-rule',
  'stroke',
  'stroke-opacity',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linejoin',
  'stroke-linecap',
  'paint-order',
  'font-size',
  'font-weight',
  'font-style',
  'text-anchor',
];

interface Level {
  name: string;
  attributes: Attributes;
  style: Attributes;
  matrix: Matrix;
  clip?: string;
}

const containers = ['svg', 'g', 'defs'];
const silent = ['title', 'desc', 'style', 'metadata'];

/**
 * Reads a figure that the product drew: literal colours, no script, nothing to fetch.
 *
 * @throws InputError for anything that such a figure does not hold, naming what was found
 */
export function readDrawing(svg: string): Drawing {
  if (Buffer.byteLength(svg) > figureLimits.bytes) {
    throw figureFault('figure', `${svg.length} characters`, `at most ${figureLimits.bytes} bytes`);
  }
  const reader = new DrawingReader();
  const parser = new SaxesParser();
  parser.on('doctype', () => {
    throw figureFault('figure', 'a document type', 'none');
  });
  parser.on('error', (fault) => {
    throw figureFault('figure', fault.message, 'well-formed XML');
  });
  parser.on('opentag', (tag: SaxesTagPlain) => reader.open(tag.name, tag.attributes));
  parser.on('text', (text) => reader.text(text));
  parser.on('closetag', () => reader.close());
  parser.write(svg).close();
  return reader.finish();
}

class DrawingReader {
  private readonly levels: Level[] = [];
  private readonly drawing: Drawing = {
    ...{ title: '', description: '', widthMm: 0, width: 0, height: 0, marks: [] },
    hatches: new Map(),
    clips: new Map(),
  };
  private elements = 0;
  private line: TextMark | undefined;
  /** A shift that the next characters begin with. */
  private shift = { dx: 0, dy: 0 };

  open(name: string, attributes: Attributes): void {
    this.elements += 1;
    const above = this.levels.at(-1);
    if (this.elements > figureLimits.elements || this.levels.length >= figureLimits.depth) {
      throw figureFault('figure', `${this.elements} elements`, 'fewer or flatter ones');
    }
    if (above === undefined) this.start(name, attributes);
    const level = this.levelOf(name, attributes, above);
    this.levels.push(level);
    if (above === undefined || containers.includes(name) || silent.includes(name)) return;
    if (name === 'clipPath') return;
    if (name === 'pattern') return;
    if (name === 'text' || name === 'tspan') this.openText(level);
    else this.addShape(level, above);
  }

  text(text: string): void {
    const level = this.levels.at(-1);
    if (level?.name === 'title' && this.levels.length === 2) this.drawing.title += text;
    if (level?.name === 'desc' && this.levels.length === 2) this.drawing.description += text;
    if (this.line && (level?.name === 'text' || level?.name === 'tspan') && text !== '') {
      this.line.runs.push({
        ...runOf(level.style, text.replaceAll(/\s*\n\s*/g, ' ')),
        ...this.shift,
      });
      this.shift = { dx: 0, dy: 0 };
    }
  }

  close(): void {
    const level = this.levels.pop();
    if (level?.name !== 'text' || !this.line) return;
    if (this.line.runs.length > 0) this.drawing.marks.push(this.line);
    this.line = undefined;
  }

  finish(): Drawing {
    const { drawing } = this;
    for (const { clip } of drawing.marks) {
      if (clip !== undefined && !drawing.clips.has(clip))
        throw figureFault('clip', clip, 'its path');
    }
    for (const mark of drawing.marks) {
      if (mark.kind !== 'shape' || !mark.fill || !('hatch' in mark.fill)) continue;
      if (!drawing.hatches.has(mark.fill.hatch)) {
        throw figureFault('hatch', mark.fill.hatch, 'its pattern');
      }
    }
    return drawing;
  }

  private start(name: string, attributes: Attributes): void {
    const [x, y, width, height] = (attributes.viewBox ?? '').split(/[\s,]+/).map(Number);
    if (name !== 'svg' || x !== 0 || y !== 0 || !(width > 0 && height > 0 && width < 1e5)) {
      throw figureFault('figure', name, 'an svg whose viewBox starts at 0 0');
    }
    const widthMm = readNumber(attributes, 'width');
    if (!/mm$/.test(attributes.width) || !(widthMm > 0 && widthMm <= 1000) || height > 20 * width) {
      throw figureFault('width', attributes.width, 'a width in mm');
    }
    Object.assign(this.drawing, { width, height, widthMm });
  }

  private levelOf(name: string, attributes: Attributes, above: Level | undefined): Level {
    const style: Attributes = { ...above?.style };
    for (const property of inherited) {
      if (attributes[property] !== undefined) style[property] = attributes[property];
    }
    if (attributes.opacity !== undefined) {
      const of = readNumber(style, 'opacity', 1) * readNumber(attributes, 'opacity', 1);
      style.opacity = String(of);
    }
    return {
      ...{ name, attributes, style },
      matrix: compose(above?.matrix ?? identity, readTransform(attributes.transform)),
      clip: referenceOf(attributes['clip-path']) ?? above?.clip,
    };
  }

  private openText(level: Level): void {
    const { attributes, style, matrix, clip } = level;
    if (level.name === 'text' || attributes.x !== undefined || attributes.y !== undefined) {
      const before = this.line;
      if (before && before.runs.length > 0) this.drawing.marks.push(before);
      const { anchor } = { anchor: style['text-anchor'] };
      this.line = {
        ...{ kind: 'text', matrix, clip, runs: [] },
        x: readNumber(attributes, 'x', before?.x ?? 0),
        y: readNumber(attributes, 'y', before?.y ?? 0),
        anchor: anchor === 'middle' || anchor === 'end' ? anchor : 'start',
      };
    }
    this.shift.dx += inEms(attributes.dx, style);
    this.shift.dy += inEms(attributes.dy, style);
  }

  private addShape(level: Level, above: Level): void {
    const { name, attributes, style, matrix, clip } = level;
    const path = pathOf(name, attributes);
    if (path === undefined || path.trim() === '') return;
    if (above.name === 'clipPath') {
      const known = this.drawing.clips.get(above.attributes.id) ?? '';
      this.drawing.clips.set(above.attributes.id, known + path);
      return;
    }
    if (above.name === 'pattern') {
      const stroke = readStroke(style);
      const isUpright = attributes.x1 === attributes.x2;
      if (name !== 'line' || !stroke || !isUpright) {
        throw figureFault('pattern', name, 'one upright line');
      }
      this.drawing.hatches.set(above.attributes.id, {
        step: Math.max(0.5, readNumber(above.attributes, 'width')),
        matrix: readTransform(above.attributes.patternTransform),
        stroke,
      });
      return;
    }
    this.drawing.marks.push(shapeOf(path, name, { style, matrix, clip }));
  }
}

function shapeOf(
  path: string,
  name: string,
  at: Pick<Level, 'style' | 'matrix' | 'clip'>,
): ShapeMark {
  const { style, matrix, clip } = at;
  const fillText = style.fill ?? '#000000';
  const hatch = referenceOf(fillText);
  const colour = hatch === undefined && name !== 'line' ? readColour(fillText) : undefined;
  return {
    ...{ kind: 'shape', path, matrix, clip },
    fill: hatch !== undefined ? { hatch } : colour === undefined ? undefined : { colour },
    fillOpacity: readNumber(style, 'fill-opacity', 1) * readNumber(style, 'opacity', 1),
    rule: style['fill-rule'] === 'evenodd' ? 'evenodd' : 'nonzero',
    stroke: readStroke(style),
  };
}

function runOf(style: Attributes, text: string): TextRun {
  const weight = style['font-weight'] === 'bold' ? 700 : readNumber(style, 'font-weight', 400);
  return {
    ...{ text, dx: 0, dy: 0 },
    size: readNumber(style, 'font-size', 13),
    isBold: weight >= 550,
    isItalic: style['font-style'] === 'italic',
    colour: readColour(style.fill ?? '#000000') ?? '#000000',
    opacity: readNumber(style, 'fill-opacity', 1) * readNumber(style, 'opacity', 1),
    halo: style['paint-order']?.startsWith('stroke') ? readStroke(style) : undefined,
  };
}

/** A shift in units of the drawing, given in them or in em. */
function inEms(text: string | undefined, style: Attributes): number {
  if (text === undefined) return 0;
  const value = readNumber({ shift: text }, 'shift');
  return text.endsWith('em') ? value * readNumber(style, 'font-size', 13) : value;
}
