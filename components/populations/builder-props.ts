import type { Query } from '@/components/runs/live-setting';
import type { PackedRun } from '@/lib/schemas/packed-run';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { AskedSetting } from './asked-setting';

export interface PopulationBuilderProps {
  collaboration: string;
  /** All versions, newest first; empty for a new population. */
  versions: ListedPopulation[];
  /** The version that is shown. */
  version?: ListedPopulation;
  /** Finished run with the most stars: its maps carry the preview. */
  previewRun: PackedRun | null;
  canShare: boolean;
  query: Query;
  /** What the address asks for. */
  asked: AskedSetting;
}
