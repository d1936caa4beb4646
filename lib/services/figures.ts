import { figureLimits, readDrawing } from '@/lib/formats/figure/read-drawing';
import { writePdf } from '@/lib/formats/figure/write-pdf';

/** Largest figure that is read [bytes]. */
export const longestFigureBytes = figureLimits.bytes;

/**
 * A figure of the product as PDF; nothing is stored, and nothing but the figure is read.
 *
 * @throws InputError for a file that is no such figure
 */
export function figureAsPdf(svg: string): Promise<Uint8Array> {
  return writePdf(readDrawing(svg));
}
