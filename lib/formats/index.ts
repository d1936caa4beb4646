export { addFormulaGuard } from './formula-guard';
export * from './kinds';
export { uploadLimits } from './limits';
export { foldName } from './names';
export { readCompanionSamples, readUpload, type SamplesResult } from './read-upload';
export { placeOf } from './reports';
