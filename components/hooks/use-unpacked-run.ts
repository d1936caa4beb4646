import { useMemo } from 'react';
import { type PackedRun, unpackRun } from '@/lib/schemas/packed-run';
import type { DrawnRun } from '@/lib/schemas/runs';

/** The run that came with the page, the same object as long as the page is given the same. */
export function useUnpackedRun(packed: PackedRun | null): DrawnRun | null {
  return useMemo(() => packed && unpackRun(packed), [packed]);
}
