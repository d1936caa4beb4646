import type {
  CompletenessMap,
  CoolingRelation,
  CoolingReport,
  MapGrid,
  SensitivitySettings,
  StarInputs,
} from './types';

/** Changes whenever the same inputs would give other numbers, so that stored maps are not reused. */
export const ENGINE_VERSION: string = '1';

export function computeCompletenessMap(
  star: StarInputs,
  _cooling: CoolingRelation,
  _grid: MapGrid,
  _settings: SensitivitySettings,
): { map: CompletenessMap; report: CoolingReport } {
  throw new Error(`the engine is not in place yet, asked for ${star.name}`);
}
