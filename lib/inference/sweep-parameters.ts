import { fromLogIndex } from '@/lib/population';

interface Parameter {
  /** "largest semi-major axis". */
  name: string;
  unit: 'AU' | 'MJ' | 'index';
}

/** What a limit is asked against, as it is called. */
export const sweepParameters = {
  'semi-major-axis-max': { name: 'largest semi-major axis', unit: 'AU' },
  'semi-major-axis-min': { name: 'smallest semi-major axis', unit: 'AU' },
  'mass-min': { name: 'smallest planet mass', unit: 'MJ' },
  'mass-max': { name: 'largest planet mass', unit: 'MJ' },
  'mass-index': { name: 'mass index', unit: 'index' },
  'semi-major-axis-index': { name: 'semi-major-axis index', unit: 'index' },
  'both-indices': { name: 'both indices', unit: 'index' },
} as const satisfies Record<string, Parameter>;

export type SweepParameter = keyof typeof sweepParameters;

/** "largest semi-major axis, AU"; an index has no unit. */
export function parameterWithUnit(over: SweepParameter): string {
  const { name, unit } = sweepParameters[over];
  return unit === 'index' ? name : `${name}, ${unit}`;
}

/** Indices are stored per natural logarithm and quoted as dN/dM and dN/da. */
export function quotedValue(over: SweepParameter, stored: number): number {
  return sweepParameters[over].unit === 'index'
    ? Number(fromLogIndex(stored, 'linear').toFixed(9))
    : stored;
}
