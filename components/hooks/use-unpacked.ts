import { useMemo } from 'react';
import { type Packed, unpack } from '@/lib/schemas/packed';
import { type PackedRun, unpackRun } from '@/lib/schemas/packed-run';
import type { DrawnRun } from '@/lib/schemas/runs';

/** What came packed with the page, the same object as long as the page is given the same. */
export function useUnpacked<Value>(packed: Packed<Value>): Value {
  return useMemo(() => unpack(packed), [packed]);
}

/** The run that came with the page. */
export function useUnpackedRun(packed: PackedRun | null): DrawnRun | null {
  return useMemo(() => packed && unpackRun(packed), [packed]);
}
