import type { ColumnSpec } from './columns';
import type { ReadContext } from './kinds';
import { type Cell, refused, type TableReading } from './reading';
import { quoteFound } from './reports';

const bandForm = /^[A-Za-z][A-Za-z0-9_'.+-]{0,19}$/;

/** The band's name as the cooling relation spells it; capitals count only where both g and G exist. */
export function canonicalBand(written: string, bands: readonly string[] | undefined): string {
  if (bands === undefined || bands.includes(written)) return written;
  const folded = bands.filter((band) => band.toLowerCase() === written.toLowerCase());
  return folded.length === 1 ? folded[0] : written;
}

/** Reads `mag_<band>` and `mag_<band>_error` as columns. */
export function magnitudeFamily(bands: readonly string[] | undefined) {
  return (name: string): ColumnSpec | null => {
    const match = /^mag[\s_-]+(.+?)([\s_-]+error)?$/i.exec(name.trim());
    if (match === null || !bandForm.test(match[1]) || match[1].toLowerCase() === 'error')
      return null;
    const main = `mag_${canonicalBand(match[1], bands)}`;
    return match[2] === undefined
      ? { name: main, unit: 'magnitude' }
      : { name: `${main}_error`, unit: 'magnitude', errorOf: main };
  };
}

/** The bands among bound column names. */
export function bandsOf(columnNames: string[]): string[] {
  return columnNames
    .filter((name) => name.startsWith('mag_') && !name.endsWith('_error'))
    .map((name) => name.slice('mag_'.length));
}

/** The `band` column of a curve or companion file, checked against the bands that can be used. */
export interface BandColumn {
  /** False where neither the file nor the form names a band. */
  isKnown: boolean;
  read(row: number): Cell<string>;
  reportMissing(): void;
}

export function bandColumn(reading: TableReading, context: ReadContext): BandColumn {
  const { bands, defaultBand } = context;
  const isColumn = reading.has('band');
  if (!isColumn && defaultBand !== undefined) {
    const message = `The file names no band; all rows are in ${quoteFound(defaultBand)}`;
    reading.notes.inform('default-used', message, reading.table.headingPlace);
  }
  return {
    isKnown: isColumn || defaultBand !== undefined,
    read: (row) => {
      const written = isColumn ? reading.text('band', row) : (defaultBand ?? null);
      if (written === refused) return refused;
      if (written === null) {
        if (isColumn) reading.missing('band', row, 'the band of the observation');
        return isColumn ? refused : null;
      }
      return checkBand(reading, row, written, bands);
    },
    reportMissing: () =>
      reading.fault(reading.table.headingPlace, {
        code: 'column-missing',
        message: 'column "band" is missing',
        hint: 'Add it, or choose the band on the form',
      }),
  };
}

/** The band as the cooling relation spells it, or a fault where it holds no such band. */
export function checkBand(
  reading: TableReading,
  row: number,
  written: string,
  bands: readonly string[] | undefined,
): Cell<string> {
  const band = canonicalBand(written, bands);
  if ((bands === undefined && bandForm.test(band)) || bands?.includes(band)) return band;
  const listed =
    bands === undefined
      ? 'a name such as K'
      : `one that the cooling relation holds (${bands.join(', ')})`;
  reading.fault(reading.place(row, 'band'), {
    code: 'choice-unknown',
    found: `the band ${quoteFound(written)}`,
    expected: listed,
  });
  return refused;
}
