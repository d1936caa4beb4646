import { bandsOf, magnitudeFamily } from './bands';
import type { ColumnSpec } from './columns';
import type { CoolingTableRecord } from './kinds';
import { positive, type TableReading } from './reading';

export const coolingColumns: readonly ColumnSpec[] = [
  { name: 'age', required: true, unit: 'age' },
  { name: 'mass', required: true, unit: 'companion mass' },
  { name: 'log_luminosity', unit: 'log luminosity' },
  { name: 'temperature', unit: 'temperature' },
];

/** `mag_<band>` without errors: a cooling relation has none. */
export function coolingFamily(name: string): ColumnSpec | null {
  const spec = magnitudeFamily(undefined)(name);
  return spec?.errorOf === undefined ? spec : null;
}

interface Entry {
  row: number;
  ageMyr: number;
  massMjup: number;
}

const fewest = 2;

/** Reads a cooling table: one row per age and mass, one column per band. */
export function readCoolingTable(reading: TableReading): CoolingTableRecord[] {
  const bands = bandsOf(reading.names());
  if (bands.length === 0) {
    reading.fault(reading.table.headingPlace, {
      code: 'column-missing',
      found: 'no magnitude column',
      expected: 'at least one such as "mag_K [mag]"',
    });
    return [];
  }
  const entries = readEntries(reading);
  const byAge = groupByAge(entries);
  const ageMyr = [...byAge.keys()].sort((a, b) => a - b);
  const massMjup = [...new Set(entries.map((entry) => entry.massMjup))].sort((a, b) => a - b);
  const grid = (name: string) => readGrid(reading, entries, name, massMjup, ageMyr);
  const magnitudes: CoolingTableRecord['magnitudes'] = {};
  for (const band of bands) magnitudes[band] = grid(`mag_${band}`);
  const record: CoolingTableRecord = {
    massMjup,
    ageMyr,
    magnitudes,
    logLuminosity: reading.has('log_luminosity') ? grid('log_luminosity') : null,
    temperatureK: reading.has('temperature') ? grid('temperature') : null,
  };
  // Counts say something about the file only once every row was understood.
  if (reading.faults.count > 0) return [];
  checkCounts(reading, byAge);
  for (const band of bands) warnOfBrightening(reading, byAge, band);
  tellRagged(reading, entries.length, massMjup.length * ageMyr.length);
  return [record];
}

function tellRagged(reading: TableReading, present: number, points: number): void {
  if (present === points) return;
  const message = `${points - present} of ${points} points of mass and age are not in the table; nothing is extrapolated`;
  reading.notes.inform('grid-ragged', message);
}

function readEntries(reading: TableReading): Entry[] {
  const entries: Entry[] = [];
  const rowByPoint = new Map<string, number>();
  for (let row = 0; row < reading.table.rowCount; row += 1) {
    const ageMyr = reading.number('age', row, positive);
    const massMjup = reading.number('mass', row, positive);
    if (ageMyr === null) reading.missing('age', row, 'an age in Myr');
    if (massMjup === null) reading.missing('mass', row, 'a mass in Mjup');
    if (typeof ageMyr !== 'number' || typeof massMjup !== 'number') continue;
    const key = `${ageMyr} ${massMjup}`;
    const first = rowByPoint.get(key);
    if (first === undefined) {
      rowByPoint.set(key, row);
      entries.push({ row, ageMyr, massMjup });
      continue;
    }
    const { line } = reading.place(first);
    reading.fault(reading.place(row), {
      code: 'grid-repeat',
      message: `the point age ${ageMyr} Myr, mass ${massMjup} Mjup is already on line ${line ?? first + 1}`,
    });
  }
  return entries;
}

/** Entries per age, masses increasing. */
function groupByAge(entries: Entry[]): Map<number, Entry[]> {
  const byAge = new Map<number, Entry[]>();
  for (const entry of entries) {
    const group = byAge.get(entry.ageMyr);
    if (group === undefined) byAge.set(entry.ageMyr, [entry]);
    else group.push(entry);
  }
  for (const group of byAge.values()) group.sort((a, b) => a.massMjup - b.massMjup);
  return byAge;
}

function checkCounts(reading: TableReading, byAge: ReadonlyMap<number, Entry[]>): void {
  if (byAge.size < fewest) {
    const column = reading.column('age')?.label ?? 'age';
    reading.fault({ column }, { code: 'too-few', found: '1 age', expected: `at least ${fewest}` });
    return;
  }
  for (const [ageMyr, [first, ...others]] of byAge) {
    if (others.length + 1 >= fewest) continue;
    reading.fault(reading.place(first.row), {
      code: 'too-few',
      found: `1 mass at ${ageMyr} Myr`,
      expected: `at least ${fewest}`,
    });
  }
}

/** A column on the grid, shape [mass, age], null where the table has no entry. */
function readGrid(
  reading: TableReading,
  entries: Entry[],
  name: string,
  massMjup: number[],
  ageMyr: number[],
): (number | null)[] {
  const massIndex = new Map(massMjup.map((mass, i) => [mass, i]));
  const ageIndex = new Map(ageMyr.map((age, j) => [age, j]));
  const grid = new Array<number | null>(massMjup.length * ageMyr.length).fill(null);
  for (const entry of entries) {
    const i = massIndex.get(entry.massMjup) ?? 0;
    const j = ageIndex.get(entry.ageMyr) ?? 0;
    grid[i * ageMyr.length + j] = reading.number(name, entry.row) ?? null;
  }
  return grid;
}

function warnOfBrightening(
  reading: TableReading,
  byAge: ReadonlyMap<number, Entry[]>,
  band: string,
): void {
  const column = reading.column(`mag_${band}`);
  const magnitude = (entry: Entry) => {
    const cell = column?.raw.cells[entry.row];
    return cell === null || cell === undefined || cell === '' ? Number.NaN : Number(cell);
  };
  for (const [ageMyr, group] of byAge) {
    for (let i = 1; i < group.length; i += 1) {
      const [light, heavy] = [group[i - 1], group[i]];
      if (!(magnitude(heavy) > magnitude(light))) continue;
      const lines = [light, heavy]
        .map((e) => reading.place(e.row).line ?? e.row + 1)
        .sort((a, b) => a - b);
      const message = `At ${ageMyr} Myr ${heavy.massMjup} Mjup is fainter in ${band} (${magnitude(heavy)}) than ${light.massMjup} Mjup (${magnitude(light)}): a magnitude then belongs to two masses, and the fainter branch is ignored`;
      reading.notes.warn('not-monotonic', message, { item: `lines ${lines[0]} and ${lines[1]}` });
    }
  }
}
