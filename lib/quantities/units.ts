import { contrastMagFromFluxRatio } from './magnitudes';
import { UNIT_KINDS, type UnitDefinition, type UnitKind } from './unit-table';

export { UNIT_KINDS, type UnitDefinition, type UnitKind } from './unit-table';

/** The unit in which a kind is stored and which a file may leave out; '' for a plain number. */
export function defaultUnit(kind: UnitKind): string {
  return UNIT_KINDS[kind].units[0].name;
}

/** Every unit name of a kind, the default first, for messages ("expected one of …"). */
export function unitNames(kind: UnitKind): string[] {
  return UNIT_KINDS[kind].units.map((unit) => unit.name);
}

/**
 * The unit that a text names, or null when the kind does not know it.
 *
 * Spellings are exact save for surrounding space; where capitals cannot mean another unit they are
 * folded.
 *
 * @param text as a file's metadata, a bracket or a form gives it
 * @param kind what is measured
 * @example parseUnit('M_jup', 'companion mass')?.name // 'Mjup'
 */
export function parseUnit(text: string, kind: UnitKind): UnitDefinition | null {
  const wanted = text.trim();
  const { units } = UNIT_KINDS[kind];
  const spelled = (unit: UnitDefinition) => [unit.name, ...unit.spellings];
  const exact = units.find((unit) => spelled(unit).includes(wanted));
  if (exact) return exact;
  const folded = wanted.toLowerCase();
  const matches = units.filter((unit) =>
    spelled(unit).some((spelling) => spelling.toLowerCase() === folded),
  );
  return matches.length === 1 ? matches[0] : null;
}

/**
 * A value from one unit of a kind to another.
 *
 * @param value finite number
 * @param from unit or spelling it is in
 * @param to unit or spelling that is wanted; default: the kind's stored unit
 * @param kind what is measured
 * @returns the same quantity in the other unit
 * @throws RangeError for an unknown unit, and for a flux ratio outside 0 to 1 read as a contrast
 * @example convert(1, 'solMass', 'companion mass') // 1047.5655 Mjup
 */
export function convert(
  value: number,
  from: string,
  kind: UnitKind,
  to: string = defaultUnit(kind),
): number {
  const source = requireUnit(from, kind);
  const target = requireUnit(to, kind);
  if (source === target) return value;
  const stored = source.isFluxRatio ? contrastMagFromFluxRatio(value) : value * source.factor;
  return target.isFluxRatio ? 10 ** (-0.4 * stored) : stored / target.factor;
}

function requireUnit(text: string, kind: UnitKind): UnitDefinition {
  const unit = parseUnit(text, kind);
  if (unit === null) {
    const known = unitNames(kind)
      .map((name) => name || 'no unit')
      .join(', ');
    throw new RangeError(`unit of ${kind} must be one of ${known}, got ${text}`);
  }
  return unit;
}
