'use client';

import { type DataTable, dataCsv } from './data-table';
import { drawingToSvg, type FigureColumn, figureContentPx, svgToPng } from './export-drawing';
import type { FigureSettings } from './figure-context';
import { saveFile } from './save-file';

export type { FigureColumn };
export type FigureType = 'svg' | 'pdf' | 'png';

export interface FigureWords extends Pick<FigureSettings, 'title' | 'caption' | 'label' | 'file'> {
  name: string;
  description: string;
}

/** Frames that a chart may take to follow its width. */
const MOST_FRAMES = 60;

/**
 * Draws a figure anew at the width of its column and hands it to the browser's downloads.
 *
 * @throws Error where there is no drawing, or the server made no PDF of it
 */
export async function saveFigure(
  figure: HTMLElement | null,
  words: FigureWords & Pick<FigureSettings, 'toPdf'>,
  type: FigureType,
  column: FigureColumn,
): Promise<void> {
  if (!figure) throw new Error('There is no drawing.');
  const svg = await atWidth(figure, figureContentPx(column), (drawing) =>
    drawingToSvg(drawing, words, column),
  );
  const file = `${words.file}-${words.name}-${column === 'single' ? 88 : 180}mm.${type}`;
  if (type === 'svg') saveFile(file, svg, 'image/svg+xml');
  else if (type === 'png') saveFile(file, await svgToPng(svg, column), 'image/png');
  else saveFile(file, await words.toPdf(svg), 'application/pdf');
}

/** One file a table: a CSV file has one header. */
export function saveTables(file: string, tables: DataTable[]): void {
  if (tables.length === 0) throw new Error('This figure has no numbers.');
  for (const table of tables) {
    saveFile(`${file}-${fileWord(table.name)}.csv`, dataCsv(table), 'text/csv');
  }
}

const fileWord = (name: string) =>
  name
    .toLowerCase()
    .replaceAll(/[^a-z0-9.+]+/g, '-')
    .replaceAll(/^-|-$/g, '');

/** What stands beside the numbers, which a CSV file cannot hold. */
export function saveConditions({ file, name, title, label, description, caption }: FigureWords) {
  const content = { title, state: label, description, conditions: caption };
  saveFile(`${file}-${name}.json`, `${JSON.stringify(content, null, 1)}\n`, 'application/json');
}

/** The chart follows its width, so it is made wider or narrower out of sight; a copy stands in. */
async function atWidth<Result>(
  figure: HTMLElement,
  widthPx: number,
  work: (drawing: SVGSVGElement) => Result,
): Promise<Result> {
  const standIn = figure.cloneNode(true) as HTMLElement;
  standIn.inert = true;
  const before = figure.style.cssText;
  figure.after(standIn);
  figure.style.cssText = `position:fixed;left:-20000px;top:0;width:${widthPx}px;max-width:none`;
  try {
    for (let frame = 0; frame < MOST_FRAMES; frame += 1) {
      await new Promise(requestAnimationFrame);
      const drawing = figure.querySelector<SVGSVGElement>('svg.chart');
      if (!drawing) throw new Error('There is no drawing.');
      if (Math.abs(drawing.viewBox.baseVal.width - widthPx) <= 1) return work(drawing);
    }
    throw new Error('The drawing did not take the width of a column.');
  } finally {
    figure.style.cssText = before;
    standIn.remove();
  }
}
