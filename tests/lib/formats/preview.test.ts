import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { type ReadContext, readUploadedFile, type UploadKind } from '@/lib/formats';

const folder = path.resolve(import.meta.dirname, '../../fixtures/samples');

async function readText(kind: UploadKind, text: string, context: Partial<ReadContext> = {}) {
  const bytes = new TextEncoder().encode(text);
  return readUploadedFile(bytes, { fileName: 'file.csv', kind, ...context });
}

async function readSample(kind: UploadKind, name: string) {
  const bytes = new Uint8Array(readFileSync(path.join(folder, name)));
  const result = await readUploadedFile(bytes, { fileName: name, kind });
  if (!result.ok) throw new Error(JSON.stringify(result.faults));
  return result;
}

describe('the preview of a file', () => {
  it('holds the first eight rows in our columns and units, whatever the file calls them', async () => {
    const rows = Array.from({ length: 10 }, (_, i) => `S${i},0.04,0.03,x\n`).join('');
    const result = await readText('targets', `Star,distance [kpc],age (Gyr),mood\n${rows}`, {
      columnMap: { Star: 'name' },
    });
    if (!result.ok) throw new Error(JSON.stringify(result.faults));
    expect(result.preview.table?.columns).toEqual([
      { name: 'name', unit: null },
      { name: 'distance', unit: 'pc' },
      { name: 'age', unit: 'Myr' },
    ]);
    expect(result.preview.table?.rows).toHaveLength(8);
    expect(result.preview.table?.rows[0]).toEqual(['S0', 40, 30]);
  });

  it('holds five curves with their own points', async () => {
    const { preview, records } = await readSample('contrast-curves', 'contrast.csv');
    expect(preview.curves).toHaveLength(5);
    expect(preview.curves[0]).toMatchObject({
      target: (records[0] as { target: string }).target,
      separationArcsec: (records[0] as { separationArcsec: number[] }).separationArcsec,
    });
    expect(preview.maps).toEqual([]);
  });

  it('holds three maps of at most 40 nodes a side, values at the nodes that it names', async () => {
    const result = await readSample('completeness-maps', 'maps-cube.fits');
    expect(result.part).toMatch(/^HDU \d+ COMPLETENESS$/);
    const { maps } = result.preview;
    expect(maps).toHaveLength(3);
    const whole = result.records[2] as {
      massMjup: number[];
      semiMajorAxisAu: number[];
      completeness: number[];
    };
    const [small, columns] = [maps[2], whole.semiMajorAxisAu.length];
    expect([small.massMjup.length, small.semiMajorAxisAu.length]).toEqual([40, 40]);
    expect(small.semiMajorAxisAu.at(-1)).toBe(whole.semiMajorAxisAu.at(-1));
    for (const [row, column] of [
      [0, 0],
      [17, 23],
      [39, 39],
    ]) {
      const from =
        whole.massMjup.indexOf(small.massMjup[row]) * columns +
        whole.semiMajorAxisAu.indexOf(small.semiMajorAxisAu[column]);
      expect(small.completeness[row * 40 + column]).toBeCloseTo(whole.completeness[from], 4);
    }
  });
});

describe('a refused file', () => {
  const head = 'name,distance,age\r\n';

  it('shows each line at fault between its neighbours, and the columns that were found', async () => {
    const result = await readText('targets', `${head}A,40,30\r\nB,forty,30\r\nC,40,30`);
    if (result.ok) throw new Error('expected a refusal');
    expect(result.excerpts).toEqual([
      { line: 3, before: 'A,40,30', text: 'B,forty,30', after: 'C,40,30' },
    ]);
    expect(result.columns.map(({ readAs }) => readAs)).toEqual(['name', 'distance', 'age']);
    expect(result.offending?.rows).toEqual([
      expect.objectContaining({
        place: 'line 3',
        cells: ['B', 'forty', '30'],
        column: 'distance',
        code: 'not-a-number',
      }),
    ]);
  });

  it('lists every row at fault, also those beyond the five that are told, and rows of another length', async () => {
    const rows = Array.from({ length: 30 }, (_, i) => `S${i},${i === 4 ? '40,30,9' : 'x,30'}\n`);
    const result = await readText('targets', head + rows.join(''));
    if (result.ok) throw new Error('expected a refusal');
    expect(result.offending?.count).toBe(30);
    const long = result.offending?.rows.find(({ code }) => code === 'row-length');
    expect([long?.place, long?.cells]).toEqual(['line 6', ['S4', '40', '30,9']]);
    expect(result.excerpts.length).toBeLessThanOrEqual(20);
  });

  it('quotes at most 200 characters, controls as U+xxxx, and nothing of a file that is no text', async () => {
    const result = await readText('targets', `${head}A\u202e,x,${'9'.repeat(500)}\n`);
    if (result.ok) throw new Error('expected a refusal');
    expect(result.excerpts[0].text).toContain('U+202E');
    expect(result.excerpts[0].text.length).toBeLessThan(210);
    const bytes = new Uint8Array(readFileSync(path.join(folder, 'maps.npz')));
    const refused = await readUploadedFile(bytes, { fileName: 'maps.npz', kind: 'targets' });
    expect(refused).toMatchObject({ ok: false, excerpts: [], offending: null });
  });
});
