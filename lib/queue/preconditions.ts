import type { Fault } from '@/lib/errors';
import type { PopulationBox } from '@/lib/population';
import { formatPlain } from '@/lib/quantities/display';

/** How far the maps of a sample go. */
export interface MapReach {
  massMinMjup: number;
  massMaxMjup: number;
  semiMajorAxisMinAu: number;
  semiMajorAxisMaxAu: number;
}

/** Relative slack for axes that were rounded in a file. */
const SLACK = 1e-9;

const edges = [
  { field: 'massMinMjup', column: 'mass_min', isLower: true, unit: 'MJ' },
  { field: 'massMaxMjup', column: 'mass_max', isLower: false, unit: 'MJ' },
  { field: 'semiMajorAxisMinAu', column: 'semi_major_axis_min', isLower: true, unit: 'AU' },
  { field: 'semiMajorAxisMaxAu', column: 'semi_major_axis_max', isLower: false, unit: 'AU' },
] as const;

/** The first edge of a population's box that lies beyond the maps, if there is one. */
export function findEdgeOutside(box: PopulationBox, reach: MapReach): Fault | null {
  for (const { field, column, isLower, unit } of edges) {
    const edge = box[field];
    const limit = reach[field];
    const isOutside = isLower ? edge < limit * (1 - SLACK) : edge > limit * (1 + SLACK);
    if (!isOutside) continue;
    return {
      code: 'outside-map',
      column,
      message:
        `Found ${formatPlain(edge)} ${unit}; the maps ${isLower ? 'begin at' : 'reach'} ` +
        `${formatPlain(limit)} ${unit}. Choose "completeness is zero outside the maps" to go on`,
    };
  }
  return null;
}

/** A sample without a single star answers nothing. */
export function findEmptySelection(left: number, all: number): Fault | null {
  if (left > 0) return null;
  return {
    code: 'empty-selection',
    item: 'targets',
    message: `0 of ${all} targets are left; expected at least 1`,
  };
}

/** 'A, B, C, D, E and 12 more'. */
export function listFirst(names: string[], most = 5): string {
  const shown = names.slice(0, most).join(', ');
  return names.length > most ? `${shown} and ${names.length - most} more` : shown;
}
