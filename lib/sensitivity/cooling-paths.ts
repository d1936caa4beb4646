import { bracket } from '@/lib/numerics/interpolate';
import { BUILT_IN_LAW_RANGE, builtInMagnitudes } from './built-in-law';
import type { CoolingRelation, CoolingTable, SensitivitySettings } from './types';

/**
 * How every mass node fades, cut where its magnitude crosses a lattice of equal cells: on each
 * stretch the magnitude is a straight line in ln t within one cell. Independent of any star's age.
 */
export interface CoolingPaths {
  /** Width of the lattice's cells, [mag]; cell c begins at (c - CELLS_BELOW_ZERO) × cellMag. */
  cellMag: number;
  /** Stretches of mass i are begins[i] … begins[i + 1] - 1. */
  begins: Int32Array;
  /** ln t at the beginning and end of each stretch, [ln Myr]; the outermost reach to infinity. */
  fromLogAge: Float64Array;
  toLogAge: Float64Array;
  /** Cell of each stretch; UNDETECTABLE where the relation has no magnitude. */
  cell: Int32Array;
  /** Place within the cell at both ends, 0 to 1. */
  fromShare: Float64Array;
  toShare: Float64Array;
  /** Whether a mass has a magnitude at every age and never brightens, shape [mass]: 1 or 0. */
  fades: Uint8Array;
}

export const UNDETECTABLE = -1;
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
      isSame(entry.massMjup, massMjup),
  );
  if (known) return known.paths;
  const lines = table ? tableLines(table, band, massMjup, policy) : lawLines(band, massMjup);
  const paths = cutIntoCells(lines, cellMag);
  if (kept.length >= KEPT_PATHS) kept.shift();
  kept.push({ table, band, massMjup: massMjup.slice(), policy, paths });
  return paths;
}

function isSame(a: Float64Array, b: Float64Array): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
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

const newDoubles = (length: number): Float64Array => new Float64Array(length);

function cutIntoCells({ logAge, fromMag, toMag }: Lines, cellMag: number): CoolingPaths {
  const stretches = logAge.length - 1;
  const masses = fromMag.length / stretches;
  const begins = new Int32Array(masses + 1);
  let count = 0;
  let [fromLogAge, toLogAge, fromShare, toShare] = [0, 1, 2, 3].map(() => newDoubles(4096));
  let cell = new Int32Array(4096);
  const grow = () => {
    const longer = (values: Float64Array) => {
      const copy = newDoubles(2 * values.length);
      copy.set(values);
      return copy;
    };
    [fromLogAge, toLogAge] = [longer(fromLogAge), longer(toLogAge)];
    [fromShare, toShare] = [longer(fromShare), longer(toShare)];
    const cells = new Int32Array(2 * cell.length);
    cells.set(cell);
    cell = cells;
  };
  const zero = cellOfZero(cellMag);
  const last = Math.round((FAINTEST_MAG - BRIGHTEST_MAG) / cellMag) - 1;
  const placeOf = (mag: number) => Math.min(last + 0.5, Math.max(0, mag / cellMag + zero));

  /** Follows a line through the cells; one that stays in the last line's cell goes on with it. */
  const addLine = (xA: number, xB: number, magA: number, magB: number, first: number) => {
    if (Number.isNaN(magA) || Number.isNaN(magB)) {
      addStretch(xA, xB, UNDETECTABLE, 0, 0, first);
      return;
    }
    const [a, b] = [placeOf(magA), placeOf(magB)];
    const perPlace = a === b ? 0 : (xB - xA) / (b - a);
    const end = Math.floor(b);
    let [x, place, c] = [xA, a, Math.floor(a)];
    while (c !== end) {
      const edge = b > a ? c + 1 : c;
      const cut = xA + (edge - a) * perPlace;
      if (cut > x) addStretch(x, cut, c, place - c, edge - c, first);
      [x, place] = [Math.max(x, cut), edge];
      c += b > a ? 1 : -1;
    }
    if (xB > x) addStretch(x, xB, c, place - c, b - c, first);
  };
  const addStretch = (xA: number, xB: number, c: number, a: number, b: number, first: number) => {
    const before = count - 1;
    const goesOn = before >= first && cell[before] === c && toLogAge[before] === xA;
    const isBounded = Number.isFinite(xA) && Number.isFinite(xB);
    if (goesOn && isBounded && Number.isFinite(fromLogAge[before]) && isOneLine(before, xB, a, b)) {
      toLogAge[before] = xB;
      toShare[before] = b;
      return;
    }
    if (count === cell.length) grow();
    fromLogAge[count] = xA;
    toLogAge[count] = xB;
    cell[count] = c;
    fromShare[count] = a;
    toShare[count] = b;
    count++;
  };
  const isOneLine = (before: number, xB: number, a: number, b: number) => {
    if (cell[before] === UNDETECTABLE) return true;
    if (Math.abs(toShare[before] - a) > 1e-12) return false;
    const xA = toLogAge[before];
    const rise = (xA - fromLogAge[before]) / (xB - fromLogAge[before]);
    const expected = fromShare[before] + rise * (b - fromShare[before]);
    return Math.abs(expected - a) < STRAIGHT_SHARE;
  };

  for (let i = 0; i < masses; i++) {
    const first = count;
    begins[i] = first;
    const row = i * stretches;
    addLine(-Infinity, logAge[0], fromMag[row], fromMag[row], first);
    for (let k = 0; k < stretches; k++) {
      addLine(logAge[k], logAge[k + 1], fromMag[row + k], toMag[row + k], first);
    }
    const end = toMag[row + stretches - 1];
    addLine(logAge[stretches], Infinity, end, end, first);
  }
  begins[masses] = count;
  const fades = new Uint8Array(masses).fill(1);
  for (let i = 0; i < masses; i++) {
    for (let s = begins[i]; s < begins[i + 1]; s++) {
      const isFainter = s === begins[i] || cell[s] >= cell[s - 1];
      if (cell[s] === UNDETECTABLE || !isFainter) fades[i] = 0;
    }
  }
  return {
    fades,
    cellMag,
    begins,
    fromLogAge: fromLogAge.slice(0, count),
    toLogAge: toLogAge.slice(0, count),
    cell: cell.slice(0, count),
    fromShare: fromShare.slice(0, count),
    toShare: toShare.slice(0, count),
  };
}

/** Lines that bend by less than this share of a cell are one. */
const STRAIGHT_SHARE = 0.02;
