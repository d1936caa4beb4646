export { addFormulaGuard } from './formula-guard';
export * from './kinds';
export {
  escapeLatex,
  type LatexCell,
  type LatexStyle,
  type LatexTable,
  latexMeasurement,
  latexProse,
  writeLatexTable,
} from './latex';
export { uploadLimits } from './limits';
export { foldName } from './names';
export {
  readCompanionSamples,
  readUpload,
  readUploadedFile,
  type SamplesResult,
} from './read-upload';
export { placeOf } from './reports';
export * from './write-arrays';
export { type CsvCell, type CsvColumn, writeCsv } from './write-csv';
export { writeFitsTable } from './write-fits/table';
export * from './write-tables';
export { bandsOfTargets, targetRow, type WrittenTarget, writeTargets } from './write-targets';
