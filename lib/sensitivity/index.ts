export { computeCompletenessMap, ENGINE_VERSION } from './completeness';
export { decodeMap, encodeMap } from './encoding';
export { DEFAULT_GRID } from './map-grid';
export type {
  AgeLaw,
  CompletenessMap,
  ContrastCurve,
  CoolingRelation,
  CoolingReport,
  CoolingTable,
  DistanceLaw,
  EccentricityLaw,
  MapGrid,
  SensitivitySettings,
  StarInputs,
} from './types';
