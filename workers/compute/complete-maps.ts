import {
  type CoolingRelation,
  type CoolingReport,
  computeEncodedMap,
  type MapGrid,
  type SensitivitySettings,
  type StarInputs,
  warmUpMaps,
} from '@/lib/sensitivity';
import { moved } from '../transfer';

// A thread loads this file when it starts, see the pool: the first survey then finds it warm.
warmUpMaps();

export interface CompleteMapsInput {
  stars: StarInputs[];
  cooling: CoolingRelation;
  grid: MapGrid;
  settings: SensitivitySettings;
}

/** One answer per star, in order: its map as it is stored, or the sentence that says why there is none. */
export type CompletedMap = { encoded: Uint16Array; report: CoolingReport } | { fault: string };

export default function completeMaps(input: CompleteMapsInput): CompletedMap[] {
  const { stars, cooling, grid, settings } = input;
  const buffers: ArrayBufferLike[] = [];
  const answers = stars.map((star): CompletedMap => {
    try {
      const made = computeEncodedMap(star, cooling, grid, settings);
      buffers.push(made.encoded.buffer);
      return made;
    } catch (error) {
      return { fault: error instanceof Error ? error.message : String(error) };
    }
  });
  return moved(answers, buffers);
}
