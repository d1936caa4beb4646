import PDFDocument from 'pdfkit';
import type { Stroke, TextMark, TextRun } from './drawing';
import { type FontFile, piecesOf } from './typefaces';

/** pdfkit's document, its present font and the list form of dashes included. */
export type FigureDocument = Omit<InstanceType<typeof PDFDocument>, 'dash'> & {
  readonly _font: { font: FontFile };
  dash(lengths: number[]): FigureDocument;
};

/** A page of a size in points, without margins. */
export function openDocument(
  size: [number, number],
  info: { Title: string; Subject: string; CreationDate: Date },
): FigureDocument {
  // The types leave out the present font, and dashes as a list.
  return new PDFDocument({ size, margin: 0, info }) as unknown as FigureDocument;
}

interface Placed {
  run: TextRun;
  text: string;
  file: string;
  x: number;
  y: number;
}

/** One line of text, anchored as a whole; halos lie under all of it. */
export function drawText(document: FigureDocument, mark: TextMark): void {
  const placed: Placed[] = [];
  let width = 0;
  let lowered = 0;
  for (const run of mark.runs) {
    width += run.dx;
    lowered += run.dy;
    for (const piece of piecesOf(document, run.text, run)) {
      placed.push({ ...piece, run, x: width, y: mark.y + lowered });
      document.font(piece.file).fontSize(run.size);
      width += document.widthOfString(piece.text);
    }
  }
  const share = { start: 0, middle: 0.5, end: 1 }[mark.anchor];
  const from = mark.x - share * width;
  for (const { run, ...piece } of placed) {
    if (run.halo) drawHalo(document, { ...piece, x: from + piece.x }, run.size, run.halo);
  }
  for (const { run, text, file, x, y } of placed) {
    document.font(file).fontSize(run.size).fillColor(run.colour, run.opacity);
    document.text(text, from + x, y, { lineBreak: false, baseline: 'alphabetic' });
  }
}

/** Outlines behind the characters, as paths: as text they would be read twice. */
function drawHalo(
  document: FigureDocument,
  { text, file, x, y }: Omit<Placed, 'run'>,
  size: number,
  halo: Stroke,
): void {
  document.font(file);
  const { font } = document._font;
  const scale = size / font.unitsPerEm;
  const { glyphs, positions } = font.layout(text);
  document.save();
  document.translate(x, y).scale(scale, -scale);
  document
    .lineWidth(halo.width / scale)
    .lineJoin(halo.join)
    .undash();
  document.strokeColor(halo.colour, halo.opacity);
  for (const [index, { path }] of glyphs.entries()) {
    const outline = path.toSVG();
    if (outline !== '') document.path(outline).stroke();
    document.translate(positions[index].xAdvance, 0);
  }
  document.restore();
}
