import { fromLogIndex } from '@/lib/population';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { SweepParameter } from './sweep';

/** What a sweep may go along: one choice, or the plane of both indices. */
export type SweptParameter = SweepParameter | 'both-indices';

interface SweptWords {
  /** "largest semi-major axis". */
  name: string;
  unit: 'AU' | 'MJ' | 'index';
}

export const sweptParameters: Record<SweptParameter, SweptWords> = {
  'semi-major-axis-max': { name: 'largest semi-major axis', unit: 'AU' },
  'semi-major-axis-min': { name: 'smallest semi-major axis', unit: 'AU' },
  'mass-min': { name: 'smallest planet mass', unit: 'MJ' },
  'mass-max': { name: 'largest planet mass', unit: 'MJ' },
  'mass-index': { name: 'mass index', unit: 'index' },
  'semi-major-axis-index': { name: 'semi-major-axis index', unit: 'index' },
  'both-indices': { name: 'both indices', unit: 'index' },
};

/** "largest semi-major axis, AU"; an index has no unit. */
export function parameterWithUnit(over: SweptParameter): string {
  const { name, unit } = sweptParameters[over];
  return unit === 'index' ? name : `${name}, ${unit}`;
}

/** Indices are stored per natural logarithm and quoted as dN/dM and dN/da. */
export function quotedSweepValue(over: SweptParameter, stored: number): number {
  return sweptParameters[over].unit === 'index'
    ? Number(fromLogIndex(stored, 'linear').toFixed(9))
    : stored;
}

/** A value with its unit: "60 AU", "12 MJ", "α −1.31 of dN/dM". */
export function describeSweepValue(over: SweptParameter, stored: number): string {
  const { unit } = sweptParameters[over];
  const value = quotedSweepValue(over, stored);
  if (unit !== 'index') return `${formatPlain(value, 3)}${THIN_SPACE}${unit}`;
  const text = formatPlain(value, 3);
  return over === 'mass-index' ? `α = ${text} of dN/dM` : `β = ${text} of dN/da`;
}
