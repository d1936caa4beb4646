import {
  type CoolingRelation,
  type CoolingReport,
  computeCompletenessMap,
  type MapGrid,
  type SensitivitySettings,
  type StarInputs,
} from '@/lib/sensitivity';
import { moved } from '../transfer';

export interface CompleteMapsInput {
  stars: StarInputs[];
  cooling: CoolingRelation;
  grid: MapGrid;
  settings: SensitivitySettings;
}

/** One answer per star, in order: its map, or the sentence that says why there is none. */
export type CompletedMap =
  | { completeness: Float64Array; report: CoolingReport }
  | { fault: string };

export default function completeMaps(input: CompleteMapsInput): CompletedMap[] {
  const { stars, cooling, grid, settings } = input;
  const buffers: ArrayBufferLike[] = [];
  const answers = stars.map((star): CompletedMap => {
    try {
      const { map, report } = computeCompletenessMap(star, cooling, grid, settings);
      buffers.push(map.completeness.buffer);
      return { completeness: map.completeness, report };
    } catch (error) {
      return { fault: error instanceof Error ? error.message : String(error) };
    }
  });
  return moved(answers, buffers);
}
