/** What a figure is made of: the same scene is written as SVG here and drawn into a PDF elsewhere. */
export type Shape =
  | { kind: 'path'; d: string; fill?: string; fillOpacity?: number; stroke?: Stroke }
  | { kind: 'rect'; x: number; y: number; width: number; height: number; fill: string }
  | { kind: 'line'; x1: number; y1: number; x2: number; y2: number; stroke: Stroke }
  | {
      kind: 'text';
      x: number;
      y: number;
      text: string;
      size: number;
      fill: string;
      weight?: 400 | 600;
      anchor?: 'start' | 'middle' | 'end';
    };

export interface Stroke {
  colour: string;
  width: number;
  dash?: string;
}

export interface Scene {
  title: string;
  description: string;
  widthMm: number;
  /** Points: 1 pt = 1/72 inch. */
  widthPt: number;
  heightPt: number;
  shapes: Shape[];
}

const fonts = "'Source Sans 3', 'Source Sans Pro', 'Helvetica Neue', Arial, sans-serif";

export function escapeXml(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;');
}

const number = (value: number) => String(Math.round(value * 100) / 100);

function strokeAttributes({ colour, width, dash }: Stroke): string {
  const dashes = dash === undefined ? '' : ` stroke-dasharray="${dash}"`;
  return ` stroke="${colour}" stroke-width="${number(width)}"${dashes}`;
}

function shapeToSvg(shape: Shape): string {
  switch (shape.kind) {
    case 'path': {
      const opacity =
        shape.fillOpacity === undefined ? '' : ` fill-opacity="${number(shape.fillOpacity)}"`;
      const stroke = shape.stroke ? strokeAttributes(shape.stroke) : '';
      return `<path d="${shape.d}" fill="${shape.fill ?? 'none'}"${opacity}${stroke}/>`;
    }
    case 'rect':
      return `<rect x="${number(shape.x)}" y="${number(shape.y)}" width="${number(shape.width)}" height="${number(shape.height)}" fill="${shape.fill}"/>`;
    case 'line':
      return `<line x1="${number(shape.x1)}" y1="${number(shape.y1)}" x2="${number(shape.x2)}" y2="${number(shape.y2)}"${strokeAttributes(shape.stroke)}/>`;
    case 'text':
      return `<text x="${number(shape.x)}" y="${number(shape.y)}" font-size="${number(shape.size)}" font-weight="${shape.weight ?? 400}" fill="${shape.fill}" text-anchor="${shape.anchor ?? 'start'}">${escapeXml(shape.text)}</text>`;
  }
}

/** Stands alone: literal colours, text as text, nothing that a viewer has to fetch or run. */
export function sceneToSvg(scene: Scene): string {
  const heightMm = (scene.heightPt * 25.4) / 72;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${number(scene.widthMm)}mm" height="${number(heightMm)}mm" viewBox="0 0 ${number(scene.widthPt)} ${number(scene.heightPt)}" font-family="${fonts}" role="img">`,
    `<title>${escapeXml(scene.title)}</title>`,
    `<desc>${escapeXml(scene.description)}</desc>`,
    ...scene.shapes.map(shapeToSvg),
    '</svg>',
    '',
  ].join('\n');
}
