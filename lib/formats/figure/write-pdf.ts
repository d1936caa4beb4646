import { drawText, type FigureDocument, openDocument } from './draw-text';
import type { Drawing, Hatch, Mark, ShapeMark, Stroke } from './drawing';

const POINTS_PER_MM = 72 / 25.4;

/**
 * A figure as one page of PDF: lines as lines, text as text, fonts embedded as subsets.
 *
 * The same drawing gives the same bytes: the file says no date of its own.
 *
 * @throws RangeError for path data that cannot be drawn
 */
export async function writePdf(drawing: Drawing): Promise<Uint8Array> {
  const scale = (drawing.widthMm * POINTS_PER_MM) / drawing.width;
  const document = openDocument([drawing.width * scale, drawing.height * scale], {
    Title: drawing.title,
    Subject: drawing.description,
    CreationDate: new Date(0),
  });
  const parts: Uint8Array[] = [];
  const ended = new Promise<void>((resolve, reject) => {
    document.on('data', (part: Uint8Array) => parts.push(part));
    document.on('end', resolve);
    document.on('error', reject);
  });
  document.scale(scale);
  for (const mark of drawing.marks) drawMark(document, drawing, mark);
  document.end();
  await ended;
  return Buffer.concat(parts);
}

function drawMark(document: FigureDocument, drawing: Drawing, mark: Mark): void {
  document.save();
  const clip = mark.clip === undefined ? undefined : drawing.clips.get(mark.clip);
  document.transform(...mark.matrix);
  if (clip !== undefined) document.path(clip).clip();
  if (mark.kind === 'text') drawText(document, mark);
  else drawShape(document, drawing, mark);
  document.restore();
}

function drawShape(document: FigureDocument, drawing: Drawing, mark: ShapeMark): void {
  const { fill, stroke, path, rule } = mark;
  const ruleName = rule === 'evenodd' ? 'even-odd' : 'non-zero';
  if (fill && 'hatch' in fill) {
    const hatch = drawing.hatches.get(fill.hatch);
    if (hatch) drawHatch(document, drawing, path, ruleName, hatch);
  } else if (fill) {
    document.fillColor(fill.colour, mark.fillOpacity);
    document.path(path).fill(ruleName);
  }
  if (!stroke) return;
  setStroke(document, stroke);
  document.path(path).stroke();
}

export function setStroke(document: FigureDocument, stroke: Stroke): void {
  document.lineWidth(stroke.width).lineJoin(stroke.join).lineCap(stroke.cap);
  document.strokeColor(stroke.colour, stroke.opacity);
  if (stroke.dash.length === 0) document.undash();
  else document.dash(stroke.dash);
}

/** The lines of a hatch over the whole drawing, cut to the shape. */
function drawHatch(
  document: FigureDocument,
  drawing: Drawing,
  path: string,
  rule: 'even-odd' | 'non-zero',
  { step, matrix, stroke }: Hatch,
): void {
  const reach = drawing.width + drawing.height;
  document.save();
  document.path(path).clip(rule);
  document.transform(...matrix);
  setStroke(document, stroke);
  for (let x = -Math.ceil(reach / step) * step; x <= reach; x += step) {
    document.moveTo(x, -reach).lineTo(x, reach);
  }
  document.stroke().restore();
}
