import type { LiveSample } from '@/components/runs/live-sample';
import type { BuilderSetting } from './builder-setting';
import type { LawAxis, LawParts } from './law-parts';

export interface LawPartProps {
  number: number;
  axis: LawAxis;
  setting: BuilderSetting;
  parts: LawParts;
  /** The saved parts, where the population is stored. */
  saved?: LawParts;
  settled: BuilderSetting;
  sample: LiveSample | undefined;
  /** Nodes of the maps along this axis. */
  nodes: Float64Array;
  /** What could be seen at each of them, averaged over the other axis. */
  profile?: Float64Array;
  /** `isSettled` is false while something is being dragged. */
  onSetting(setting: BuilderSetting, isSettled: boolean): void;
}
