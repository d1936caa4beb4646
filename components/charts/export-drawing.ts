'use client';

import { escapeXml } from './figure/scene';
import { textWidth } from './text-width';

/** What a drawing carries once it has left its page. */
export interface DrawingWords {
  title: string;
  /** The sentence that the drawing says to readers. */
  description: string;
  /** Everything that the numbers rest on, below the drawing. */
  caption: string[];
  /** "draft, run 18", above it. */
  label: string;
}

const SVG = 'http://www.w3.org/2000/svg';
const fonts = "'Source Sans 3', 'Source Sans Pro', 'Helvetica Neue', Arial, sans-serif";
const padding = 14;
const headPx = 22;
const linePx = 17;
const captionPx = 13;
const DOTS_PER_INCH = 300;
const POINTS_PER_INCH = 72;
/** Size that the text of a chart has in a column. */
const textPt = 7.5;

/** One column of a journal or two. */
export type FigureColumn = 'single' | 'double';
const inches: Record<FigureColumn, number> = { single: 88 / 25.4, double: 180 / 25.4 };

/** Width at which a chart is drawn so that its text has its size in print [px]. */
export function figureContentPx(column: FigureColumn): number {
  const total = (inches[column] * POINTS_PER_INCH * captionPx) / textPt;
  return Math.floor(total - 2 * padding);
}

/** What a stylesheet says of a mark; written into the file, where there is none. */
const kept = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-opacity',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linejoin',
  'paint-order',
  'font-size',
  'font-weight',
  'font-style',
  'text-anchor',
  'opacity',
];

const marks = ['path', 'line', 'rect', 'circle', 'ellipse', 'text', 'tspan'];

/** What a mark has without being told. */
const usual: Record<string, string> = {
  'fill-opacity': '1',
  stroke: 'none',
  'stroke-opacity': '1',
  'stroke-dasharray': 'none',
  'stroke-linejoin': 'miter',
  opacity: '1',
};

/** Tokens of the light theme, whichever theme the page shows: figures are always light. */
function lightTokens(): [name: string, value: string][] {
  for (const sheet of document.styleSheets) {
    for (const rule of rulesWithin(sheet.cssRules)) {
      if (rule.selectorText === ':root' && rule.style.getPropertyValue('--page') !== '') {
        return [...rule.style]
          .filter((name) => name.startsWith('--'))
          .map((name) => [name, rule.style.getPropertyValue(name)]);
      }
    }
  }
  throw new Error('The tokens of the light theme were not found, so no figure was made.');
}

/** Style rules in order, those inside layers too; dark ones stand inside conditions, left out here. */
function* rulesWithin(rules: CSSRuleList): Generator<CSSStyleRule> {
  for (const rule of rules) {
    if (rule instanceof CSSStyleRule) yield rule;
    else if (rule instanceof CSSLayerBlockRule) yield* rulesWithin(rule.cssRules);
  }
}

/**
 * A drawing of the page as a file that stands alone: light tokens written out, caption below.
 *
 * @param drawing the SVG of a ChartFigure; marks with `data-screen-only` stay behind, those with
 *   `data-file-only` show, such as a name that stands beside the drawing on its page
 * @throws Error where the page's tokens cannot be read
 */
export function drawingToSvg(
  drawing: SVGSVGElement,
  words: DrawingWords,
  column: FigureColumn = 'double',
): string {
  const [, , width, height] = (drawing.getAttribute('viewBox') ?? '0 0 0 0').split(' ').map(Number);
  const content = withLightStyles(drawing, width);
  const said = words.caption.filter((line) => line.trim() !== '');
  const lines = (said.length > 0 ? said : [`${words.description}.`]).flatMap((line) =>
    wrapLine(line, width, captionPx),
  );
  const total = {
    width: width + 2 * padding,
    height: height + headPx + 2 * padding + lines.length * linePx,
  };
  const millimetres = inches[column] * 25.4;
  return [
    `<svg xmlns="${SVG}" width="${millimetres.toFixed(1)}mm" height="${((millimetres * total.height) / total.width).toFixed(1)}mm" viewBox="0 0 ${total.width} ${total.height}" font-family="${fonts}" role="img">`,
    `<title>${escapeXml(words.title)}</title>`,
    `<desc>${escapeXml(words.description)}</desc>`,
    `<rect width="${total.width}" height="${total.height}" fill="#ffffff"/>`,
    `<text x="${total.width - padding}" y="${padding + 8}" font-size="${captionPx}" font-weight="600" fill="#0b2326" text-anchor="end">${escapeXml(words.label)}</text>`,
    `<g transform="translate(${padding} ${padding + headPx})">${content}</g>`,
    ...lines.map(
      (line, index) =>
        `<text x="${padding}" y="${padding + headPx + height + (index + 1) * linePx}" font-size="${captionPx}" fill="#344d4f">${escapeXml(line)}</text>`,
    ),
    '</svg>',
    '',
  ].join('\n');
}

/** The marks with what the stylesheet gives them, measured in a light copy outside the screen. */
function withLightStyles(drawing: SVGSVGElement, width: number): string {
  const host = document.createElement('div');
  host.style.cssText = `position:absolute;left:-99999px;top:0;width:${width}px`;
  for (const [name, value] of lightTokens()) host.style.setProperty(name, value);
  const copy = drawing.cloneNode(true) as SVGSVGElement;
  for (const element of copy.querySelectorAll('[data-screen-only]')) element.remove();
  for (const element of copy.querySelectorAll('[data-file-only]')) {
    element.removeAttribute('visibility');
  }
  host.append(copy);
  document.body.append(host);
  try {
    for (const element of copy.querySelectorAll<SVGElement>('*')) {
      if (marks.includes(element.localName)) writeStyle(element);
    }
    for (const element of copy.querySelectorAll('[class]')) element.removeAttribute('class');
    return [...copy.childNodes].map((node) => new XMLSerializer().serializeToString(node)).join('');
  } finally {
    host.remove();
  }
}

function writeStyle(element: SVGElement): void {
  const style = getComputedStyle(element);
  const found = kept.map((name) => [name, style.getPropertyValue(name)] as const);
  element.removeAttribute('style');
  for (const [name, value] of found) {
    const isText = name.startsWith('font') || name === 'text-anchor';
    if (isText && element.localName !== 'text' && element.localName !== 'tspan') continue;
    if (value === '' || value === 'normal' || value === usual[name]) element.removeAttribute(name);
    else element.setAttribute(name, hexColour(value));
  }
}

/** "rgb(11, 35, 38)" as #0b2326, which every reader of figures knows. */
function hexColour(value: string): string {
  const parts = /^rgb\((\d+), (\d+), (\d+)\)$/.exec(value);
  if (!parts) return value;
  return `#${parts
    .slice(1)
    .map((part) => Number(part).toString(16).padStart(2, '0'))
    .join('')}`;
}

/** Words of a line in as many lines as the width asks for. */
export function wrapLine(text: string, widthPx: number, fontSizePx: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (line !== '' && textWidth(longer, fontSizePx) > widthPx) {
      lines.push(line);
      line = word;
    } else {
      line = longer;
    }
  }
  return line === '' ? lines : [...lines, line];
}

/** The same file as an image of 300 dots per inch, in the typeface of the page. */
export async function svgToPng(svg: string, column: FigureColumn = 'double'): Promise<Blob> {
  const withFonts = svg.replace('<title>', `<style>${await embeddedFonts()}</style><title>`);
  const address = URL.createObjectURL(new Blob([withFonts], { type: 'image/svg+xml' }));
  try {
    const image = new Image();
    image.src = address;
    await image.decode();
    const canvas = document.createElement('canvas');
    canvas.width = Math.round(inches[column] * DOTS_PER_INCH);
    canvas.height = Math.round((canvas.width * image.naturalHeight) / image.naturalWidth);
    canvas.getContext('2d')?.drawImage(image, 0, 0, canvas.width, canvas.height);
    return await new Promise((resolve, reject) => {
      canvas.toBlob((blob) => {
        if (blob) resolve(blob);
        else reject(new Error('The browser made no image of this figure.'));
      }, 'image/png');
    });
  } finally {
    URL.revokeObjectURL(address);
  }
}

/** 400, its italic, and 600 of the page's typeface: an image reads no file beside itself. */
async function embeddedFonts(): Promise<string> {
  const rules: string[] = [];
  for (const sheet of document.styleSheets) {
    for (const rule of sheet.cssRules) {
      if (!(rule instanceof CSSFontFaceRule)) continue;
      const { style } = rule;
      const weight = style.getPropertyValue('font-weight');
      const isNeeded =
        style.getPropertyValue('font-family').includes('Source Sans 3') &&
        (weight === '400' ||
          (weight === '600' && style.getPropertyValue('font-style') !== 'italic'));
      const file = /url\("?([^")]+\.woff2)"?\)/.exec(style.getPropertyValue('src'))?.[1];
      if (!isNeeded || file === undefined) continue;
      const address = new URL(file, sheet.href ?? document.baseURI);
      const bytes = new Uint8Array(await (await fetch(address)).arrayBuffer());
      let text = '';
      for (const byte of bytes) text += String.fromCharCode(byte);
      rules.push(
        `@font-face{font-family:'Source Sans 3';font-style:${style.getPropertyValue('font-style') || 'normal'};font-weight:${weight};unicode-range:${style.getPropertyValue('unicode-range') || 'U+0-10FFFF'};src:url(data:font/woff2;base64,${btoa(text)})}`,
      );
    }
  }
  return rules.join('');
}
