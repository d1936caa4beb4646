import { isSameAxis } from '@/lib/numerics/grid';
import { bracket } from '@/lib/numerics/interpolate';
import { BUILT_IN_LAW_RANGE, builtInMagnitudes } from './built-in-law';
import { STRETCH } from './kernels/steps/age-spread';
import type { CoolingRelation, CoolingTable, SensitivitySettings } from './types';

/**
 * How every mass node fades, cut where its magnitude crosses a lattice of equal cells: on each
 * stretch the magnitude is a straight line in ln t within one cell. Independent of any star's age.
 */
export interface CoolingPaths {
  /** Width of the lattice's cells, [mag]; cell c begins at (c - cellOfZero) × cellMag. */
  cellMag: number;
  masses: number;
  /**
   * Shape [stretch, 4]: ln t where it begins, [ln Myr]; its cell, UNDETECTABLE where the relation has
   * no magnitude; its places within the cell at both ends, 0 to 1. A stretch ends where the next
   * begins; the outermost reach to infinity, and a record with nothing else tells each mass's end.
   */
  stretches: Float64Array;
  /** Records of mass i are begins[i] … begins[i + 1] - 1. */
  begins: Float64Array;
  /** Whether a mass has a magnitude at every age and never brightens, shape [mass]: 1 or 0. */
  fades: Float64Array;
}

const UNDETECTABLE = -1;
/** Magnitudes from -20 to 60 have cells of their own; what lies beyond counts at the ends. */
const BRIGHTEST_MAG = -20;
const FAINTEST_MAG = 60;
/** The built-in law bends: a straight line over this many steps of its ages misses 5e-5 mag. */
const LAW_STEPS = 1200;

/** Index of the cell that begins at magnitude 0. */
export function cellOfZero(cellMag: number): number {
  return Math.round(-BRIGHTEST_MAG / cellMag);
}

interface Kept {
  table: CoolingTable | null;
  band: string;
  massMjup: Float64Array;
  policy: SensitivitySettings['massOutsideTable'];
  paths: CoolingPaths;
}

const kept: Kept[] = [];
const KEPT_PATHS = 8;

/**
 * Paths of a grid's masses through a relation, worked out once and kept.
 *
 * @param relation built-in law, or a table as checkCoolingTable accepts it
 * @param band one of its bands
 * @param massMjup mass nodes, [M_Jup], not modified
 * @param policy what a mass outside the table means
 * @param cellMag width of the lattice's cells, [mag]
 * @throws RangeError for an unknown band or a mass outside the built-in law's range
 * Accuracy: bends within one cell are straightened by up to 2 % of a cell.
 */
export function coolingPaths(
  relation: CoolingRelation,
  band: string,
  massMjup: Float64Array,
  policy: SensitivitySettings['massOutsideTable'],
  cellMag: number,
): CoolingPaths {
  const table = relation.kind === 'table' ? relation.table : null;
  const known = kept.find(
    (entry) =>
      entry.paths.cellMag === cellMag &&
      entry.band === band &&
      entry.table === table &&
      entry.policy === policy &&
      isSameAxis(entry.massMjup, massMjup),
  );
  if (known) return known.paths;
  const lines = table ? tableLines(table, band, massMjup, policy) : lawLines(band, massMjup);
  const paths = cutIntoCells(lines, cellMag);
  if (kept.length >= KEPT_PATHS) kept.shift();
  kept.push({ table, band, massMjup: massMjup.slice(), policy, paths });
  return paths;
}

/** Magnitudes at both ends of every stretch of ages, shape [mass, stretch]; NaN has none. */
interface Lines {
  logAge: Float64Array;
  fromMag: Float64Array;
  toMag: Float64Array;
}

function lawLines(band: string, massMjup: Float64Array): Lines {
  const { ageMinMyr, ageMaxMyr } = BUILT_IN_LAW_RANGE;
  const ages = new Float64Array(LAW_STEPS + 1).map(
    (_, k) => ageMinMyr * (ageMaxMyr / ageMinMyr) ** (k / LAW_STEPS),
  );
  ages[LAW_STEPS] = ageMaxMyr;
  const { magnitudes } = builtInMagnitudes(massMjup, ages, band);
  const fromMag = new Float64Array(massMjup.length * LAW_STEPS);
  const toMag = new Float64Array(massMjup.length * LAW_STEPS);
  for (let i = 0; i < massMjup.length; i++) {
    const row = magnitudes.subarray(i * ages.length, (i + 1) * ages.length);
    fromMag.set(row.subarray(0, LAW_STEPS), i * LAW_STEPS);
    toMag.set(row.subarray(1), i * LAW_STEPS);
  }
  return { logAge: ages.map(Math.log), fromMag, toMag };
}

/** Between two tabulated ages a mass needs all the corners that carry weight. */
function tableLines(
  table: CoolingTable,
  band: string,
  massMjup: Float64Array,
  policy: SensitivitySettings['massOutsideTable'],
): Lines {
  const values = table.magnitudes[band];
  const ages = table.ageMyr.length;
  const logMass = table.massMjup.map(Math.log);
  const stretches = ages - 1;
  const fromMag = new Float64Array(massMjup.length * stretches).fill(Number.NaN);
  const toMag = fromMag.slice();
  for (let k = 0; k < stretches; k++) {
    const isCovered = (row: number) =>
      !Number.isNaN(values[row * ages + k]) && !Number.isNaN(values[row * ages + k + 1]);
    let heaviest = table.massMjup.length - 1;
    while (heaviest >= 0 && !isCovered(heaviest)) heaviest--;
    for (let i = 0; i < massMjup.length; i++) {
      const at = i * stretches + k;
      const place = bracket(logMass, Math.log(massMjup[i]));
      const magAt = (age: number) => {
        if (place === null) return Number.NaN;
        const corner = place.index * ages + age;
        const low = place.share === 1 ? 0 : (1 - place.share) * values[corner];
        const high = place.share === 0 ? 0 : place.share * values[corner + ages];
        return low + high;
      };
      fromMag[at] = magAt(k);
      toMag[at] = magAt(k + 1);
      if (!Number.isNaN(fromMag[at]) && !Number.isNaN(toMag[at])) continue;
      const takesEdge =
        policy === 'edge' && heaviest >= 0 && massMjup[i] > table.massMjup[heaviest];
      fromMag[at] = takesEdge ? values[heaviest * ages + k] : Number.NaN;
      toMag[at] = takesEdge ? values[heaviest * ages + k + 1] : Number.NaN;
    }
  }
  return { logAge: table.ageMyr.map(Math.log), fromMag, toMag };
}

/** Lines that bend by less than this share of a cell are one. */
const STRAIGHT_SHARE = 0.02;

function cutIntoCells({ logAge, fromMag, toMag }: Lines, cellMag: number): CoolingPaths {
  const lines = logAge.length - 1;
  const masses = fromMag.length / lines;
  const begins = new Float64Array(masses + 1);
  let records = new Float64Array(1 << 14);
  // Where the next record goes, and the first of the mass.
  let [end, first] = [0, 0];
  const zero = cellOfZero(cellMag);
  const last = Math.round((FAINTEST_MAG - BRIGHTEST_MAG) / cellMag) - 1;
  const placeOf = (mag: number) => Math.min(last + 0.5, Math.max(0, mag / cellMag + zero));

  const addRecord = (x: number, cell: number, a: number, b: number) => {
    if (end === records.length) {
      const longer = new Float64Array(2 * end);
      longer.set(records);
      records = longer;
    }
    records[end] = x;
    records[end + 1] = cell;
    records[end + 2] = a;
    records[end + 3] = b;
    end += STRETCH;
  };
  /** Whether a stretch goes on in the same cell, on one line with the last. */
  const goesOn = (xA: number, xB: number, cell: number, a: number, b: number) => {
    const before = end - STRETCH;
    if (before < first || records[before + 1] !== cell) return false;
    const from = records[before];
    if (!Number.isFinite(from) || !Number.isFinite(xB)) return false;
    if (cell === UNDETECTABLE) return true;
    if (Math.abs(records[before + 3] - a) > 1e-12) return false;
    const share = records[before + 2];
    const expected = share + ((xA - from) / (xB - from)) * (b - share);
    return Math.abs(expected - a) < STRAIGHT_SHARE;
  };
  const addStretch = (xA: number, xB: number, cell: number, a: number, b: number) => {
    if (goesOn(xA, xB, cell, a, b)) records[end - 1] = b;
    else addRecord(xA, cell, a, b);
  };
  /** Follows a line through the cells. */
  const addLine = (xA: number, xB: number, magA: number, magB: number) => {
    if (Number.isNaN(magA) || Number.isNaN(magB)) {
      addStretch(xA, xB, UNDETECTABLE, 0, 0);
      return;
    }
    const [a, b] = [placeOf(magA), placeOf(magB)];
    const perPlace = a === b ? 0 : (xB - xA) / (b - a);
    const lastCell = Math.floor(b);
    let [x, place, c] = [xA, a, Math.floor(a)];
    while (c !== lastCell) {
      const edge = b > a ? c + 1 : c;
      const cut = xA + (edge - a) * perPlace;
      if (cut > x) addStretch(x, cut, c, place - c, edge - c);
      [x, place] = [Math.max(x, cut), edge];
      c += b > a ? 1 : -1;
    }
    if (xB > x) addStretch(x, xB, c, place - c, b - c);
  };

  for (let i = 0; i < masses; i++) {
    first = end;
    begins[i] = end / STRETCH;
    const row = i * lines;
    addLine(-Infinity, logAge[0], fromMag[row], fromMag[row]);
    for (let k = 0; k < lines; k++) {
      addLine(logAge[k], logAge[k + 1], fromMag[row + k], toMag[row + k]);
    }
    const oldest = toMag[row + lines - 1];
    addLine(logAge[lines], Infinity, oldest, oldest);
    addRecord(Infinity, 0, 0, 0);
  }
  begins[masses] = end / STRETCH;
  const stretches = records.slice(0, end);
  return { cellMag, masses, stretches, begins, fades: fadingMasses(stretches, begins) };
}

function fadingMasses(stretches: Float64Array, begins: Float64Array): Float64Array {
  const fades = new Float64Array(begins.length - 1).fill(1);
  for (let i = 0; i < fades.length; i++) {
    const last = begins[i + 1] - 2;
    for (let s = begins[i]; s <= last; s++) {
      const cell = stretches[STRETCH * s + 1];
      const isBrighter = s < last && stretches[STRETCH * (s + 1) + 1] < cell;
      if (cell === UNDETECTABLE || isBrighter) fades[i] = 0;
    }
  }
  return fades;
}
