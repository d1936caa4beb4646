import { requirePositiveAxis } from '@/lib/numerics/grid';
import { bracket } from '@/lib/numerics/interpolate';
import type { CoolingTable } from './types';

/** A place where a heavier companion is fainter: worth showing, not an error. */
export interface FainterWhenHeavier {
  band: string;
  ageMyr: number;
  lighterMjup: number;
  heavierMjup: number;
}

/** Every star of a survey asks about the same table. */
const checked = new WeakMap<CoolingTable, FainterWhenHeavier[]>();

/**
 * Refuses a table that cannot be interpolated, and lists where magnitude rises with mass.
 *
 * @param table not modified afterwards: what was found is kept; axes strictly increasing, at least 2 each; magnitudes [mass, age], NaN = missing
 * @returns places that deserve a warning, in the table's order
 * @throws RangeError for short or disordered axes, no band, a wrong number of entries or an infinite one
 */
export function checkCoolingTable(table: CoolingTable): FainterWhenHeavier[] {
  const known = checked.get(table);
  if (known) return known;
  requirePositiveAxis(table.massMjup, `massMjup of ${table.name}`);
  requirePositiveAxis(table.ageMyr, `ageMyr of ${table.name}`);
  const bands = Object.keys(table.magnitudes);
  if (bands.length === 0)
    throw new RangeError(`${table.name} must have at least one band, got none`);
  const places = bands.flatMap((band) => checkBand(table, band));
  checked.set(table, places);
  return places;
}

function checkBand(table: CoolingTable, band: string): FainterWhenHeavier[] {
  const values = table.magnitudes[band];
  const ages = table.ageMyr.length;
  const expected = table.massMjup.length * ages;
  if (values.length !== expected) {
    throw new RangeError(
      `${band} of ${table.name} must have ${expected} entries, got ${values.length}`,
    );
  }
  const places: FainterWhenHeavier[] = [];
  for (let i = 0; i < values.length; i++) {
    if (Math.abs(values[i]) === Infinity) {
      throw new RangeError(`${band} of ${table.name} must be finite, got ${values[i]} at ${i}`);
    }
    if (i >= ages && values[i] > values[i - ages]) {
      const mass = Math.floor(i / ages);
      places.push({
        band,
        ageMyr: table.ageMyr[i % ages],
        lighterMjup: table.massMjup[mass - 1],
        heavierMjup: table.massMjup[mass],
      });
    }
  }
  return places;
}

/** Bilinear look-ups in ln m and ln t for one band. */
export interface TableLookup {
  /** Absolute magnitude, or NaN outside the table or beside a missing entry. */
  magnitude(massMjup: number, ageMyr: number): number;
}

const prepared = new WeakMap<CoolingTable, Map<string, TableLookup>>();

/**
 * Prepares a table for interpolation, bilinear in (ln m, ln t) on the magnitude.
 *
 * A corner that carries no weight, because the point lies on a node, may be missing.
 *
 * @param table as checkCoolingTable accepts it
 * @param band one of its columns
 * @throws RangeError for an unknown band
 */
export function tableLookup(table: CoolingTable, band: string): TableLookup {
  const bands = prepared.get(table) ?? new Map<string, TableLookup>();
  prepared.set(table, bands);
  const lookup = bands.get(band) ?? newLookup(table, band);
  bands.set(band, lookup);
  return lookup;
}

function newLookup(table: CoolingTable, band: string): TableLookup {
  if (!Object.hasOwn(table.magnitudes, band)) {
    const known = Object.keys(table.magnitudes).join(', ');
    throw new RangeError(`band must be one of ${known} for ${table.name}, got ${band}`);
  }
  const values = table.magnitudes[band];
  const logMass = table.massMjup.map(Math.log);
  const logAge = table.ageMyr.map(Math.log);
  const ages = logAge.length;
  const magnitude = (massMjup: number, ageMyr: number) => {
    const m = bracket(logMass, Math.log(massMjup));
    const t = bracket(logAge, Math.log(ageMyr));
    if (m === null || t === null) return Number.NaN;
    const corner = m.index * ages + t.index;
    const weighted = (weight: number, index: number) => (weight === 0 ? 0 : weight * values[index]);
    return (
      weighted((1 - m.share) * (1 - t.share), corner) +
      weighted((1 - m.share) * t.share, corner + 1) +
      weighted(m.share * (1 - t.share), corner + ages) +
      weighted(m.share * t.share, corner + ages + 1)
    );
  };
  return { magnitude };
}
