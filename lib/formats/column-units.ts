import { contrastMagFromFluxRatio } from '@/lib/quantities/magnitudes';
import {
  defaultUnit,
  parseUnit,
  UNIT_KINDS,
  type UnitKind,
  unitNames,
} from '@/lib/quantities/units';
import { quoteFound } from './reports';

/** Units of columns that are never converted: the first is ours, the others are spellings. */
const fixedUnits = {
  'Julian year': ['yr', 'Jyear', 'year'],
  temperature: ['K'],
  'log luminosity': ['', 'dex', 'log(Lsun)', 'solLum'],
  'plain number': ['', '1'],
} as const;

type FixedUnit = keyof typeof fixedUnits;
export type ColumnUnit = UnitKind | FixedUnit;

export interface UnitReading {
  /** The unit of the file's numbers. */
  unit: string;
  toOurUnit: ((value: number) => number) | null;
  isFluxRatio: boolean;
}

export interface UnitProblem {
  code: 'unit-unknown' | 'unit-mismatch';
  found: string;
  expected: string;
}

function isFixed(kind: ColumnUnit): kind is FixedUnit {
  return kind in fixedUnits;
}

export function ourUnit(kind: ColumnUnit): string {
  return isFixed(kind) ? fixedUnits[kind][0] : defaultUnit(kind);
}

const allKinds = Object.keys(UNIT_KINDS) as UnitKind[];

function problem(kind: ColumnUnit, text: string): UnitProblem {
  const names = (isFixed(kind) ? [...fixedUnits[kind]] : unitNames(kind)).filter(Boolean);
  const other = allKinds.find((each) => parseUnit(text, each) !== null);
  const expected =
    names.length === 0
      ? 'no unit'
      : names.length === 1
        ? names[0]
        : `${names[0]}, or one of ${names.slice(1).join(', ')}`;
  const found = `the unit ${quoteFound(text)}`;
  return other === undefined
    ? { code: 'unit-unknown', found, expected }
    : { code: 'unit-mismatch', found: `${found}, which measures ${other}`, expected };
}

/** A flux ratio as magnitudes, NaN outside 0 to 1; as bright as the star is 0 mag. */
function contrastOrNaN(ratio: number): number {
  if (ratio === 1) return 0;
  return ratio > 0 && ratio < 1 ? contrastMagFromFluxRatio(ratio) : Number.NaN;
}

/**
 * Settles what the numbers of a column are in.
 *
 * @param kind what the column measures
 * @param text the unit as the file states it, or null for our default
 */
export function readColumnUnit(kind: ColumnUnit, text: string | null): UnitReading | UnitProblem {
  if (text === null) return { unit: ourUnit(kind), toOurUnit: null, isFluxRatio: false };
  if (isFixed(kind)) {
    const isKnown = (fixedUnits[kind] as readonly string[]).includes(text);
    return isKnown ? { unit: text, toOurUnit: null, isFluxRatio: false } : problem(kind, text);
  }
  const known = parseUnit(text, kind);
  if (known !== null) {
    const isFluxRatio = known.isFluxRatio ?? false;
    const { factor, name } = known;
    if (isFluxRatio) return { unit: name, toOurUnit: contrastOrNaN, isFluxRatio };
    const toOurUnit = factor === 1 ? null : (value: number) => value * factor;
    return { unit: name, toOurUnit, isFluxRatio };
  }
  return kind === 'stellar mass' ? readAsCompanionMass(text) : problem(kind, text);
}

/** A star's mass in a unit that is usual for planets. */
function readAsCompanionMass(text: string): UnitReading | UnitProblem {
  const known = parseUnit(text, 'companion mass');
  const sun = parseUnit('solMass', 'companion mass');
  if (known === null || sun === null) return problem('stellar mass', text);
  const toOurUnit = (value: number) => (value * known.factor) / sun.factor;
  return { unit: known.name, toOurUnit, isFluxRatio: false };
}
