import type { Fault } from '@/lib/errors';
import { uploadLimits } from './limits';

const { mapSideMin, mapSideMax } = uploadLimits;

/** The fault of a map that is too small or too large, or null. */
export function mapShapeFault(masses: number, semiMajorAxes: number): Fault | null {
  const sides = [masses, semiMajorAxes];
  const found = `${masses} x ${semiMajorAxes} (masses x semi-major axes)`;
  if (sides.some((side) => side < mapSideMin)) {
    return { code: 'map-shape', found, expected: `at least ${mapSideMin} x ${mapSideMin}` };
  }
  if (sides.some((side) => side > mapSideMax)) {
    return { code: 'map-shape', found, expected: `at most ${mapSideMax} x ${mapSideMax}` };
  }
  return null;
}

/** The rule of both axes: physical values, never logarithms. */
export function axisRule(what: string, unit: string) {
  return {
    above: 0,
    expected: `${what} greater than 0 ${unit}`,
    hint: 'Are these logarithms?',
  };
}

/**
 * The fault of a converted axis value that no longer increases or is no number above 0: units can
 * carry a value beyond what can be stored.
 *
 * @param before the converted value before it, 0 for the first
 */
export function convertedFault(value: number, written: number, before: number): Fault | null {
  if (Number.isFinite(value) && value > before) return null;
  return {
    code: 'out-of-range',
    found: String(written),
    expected: 'a value that can be stored after conversion of its unit',
  };
}
