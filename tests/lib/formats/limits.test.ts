import { describe, expect, it } from 'vitest';
import { type ReadContext, readUploadedFile, uploadLimits } from '@/lib/formats';
import { bytesOf, faultsOf } from './read-text';

const BLOCK = 2880;

/** A header unit of FITS from its cards, filled up to whole blocks. */
function unit(cards: string[]): string {
  const text = [...cards, 'END'].map((card) => card.padEnd(80)).join('');
  return text.padEnd(Math.ceil(text.length / BLOCK) * BLOCK);
}

const empty = (first: string) => [first, 'BITPIX  = 8', 'NAXIS   = 0'];
const primary = empty('SIMPLE  = T');
const extension = empty("XTENSION= 'IMAGE   '");

async function codesOf(text: string, context: Partial<ReadContext> = {}): Promise<string[]> {
  const kind = context.kind ?? 'targets';
  const result = await readUploadedFile(bytesOf(text), { fileName: 'file', kind, ...context });
  if (result.ok) throw new Error('the file was accepted');
  return result.faults.map((fault) => fault.code);
}

describe('a file beyond what one may hold', () => {
  it('of HDUs is refused, and one at the limit is looked at', async () => {
    const of = (count: number) => unit(primary) + unit(extension).repeat(count - 1);
    expect(await codesOf(of(uploadLimits.fitsHdus + 1))).toEqual(['too-many']);
    expect(await codesOf(of(uploadLimits.fitsHdus))).toEqual(['no-table']);
  });

  it('of header cards is refused', async () => {
    const cards = new Array<string>(uploadLimits.fitsCardsPerHdu).fill('COMMENT');
    expect(await codesOf(unit([...primary, ...cards]))).toEqual(['too-many']);
  });

  it('of lines before an ECSV table is refused', async () => {
    const line = `# - ${'x'.repeat(1000)}\n`;
    const count = Math.ceil(uploadLimits.ecsvHeaderBytes / line.length) + 1;
    const text = `# %ECSV 1.0\n# ---\n${line.repeat(count)}name\nA\n`;
    expect(await codesOf(text)).toEqual(['too-large']);
  });

  it('of stars with maps is refused', () => {
    const rows = Array.from({ length: uploadLimits.mapTargets + 1 }, (_, i) =>
      [1, 2].flatMap((mass) => [1, 2].map((axis) => `S${i},${mass},${axis},0.5`)).join('\n'),
    );
    const text = `target,mass,semi_major_axis,completeness\n${rows.join('\n')}\n`;
    expect(faultsOf('completeness-maps', text)[0]).toMatch(/^too-many/);
  });

  it('of JSON is refused before it is parsed', async () => {
    const text = `[${' '.repeat(uploadLimits.jsonBytes)}]`;
    expect(await codesOf(text)).toEqual(['too-large']);
  });
});
