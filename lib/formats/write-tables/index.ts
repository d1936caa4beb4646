export { companionRow, type WrittenCompanion } from './companion-rows';
export { writeLatex } from './latex-table';
export {
  levelColumns,
  limitColumns,
  populationColumns,
  posteriorColumns,
} from './limit-columns';
export { writeMachineReadableTable } from './machine-readable';
export {
  bandDefinitions,
  companionDefinitions,
  starDefinitions,
  surveyDefinition,
  targetDefinitions,
  targetEndDefinitions,
  useDefinitions,
} from './sky-columns';
export { writeCsvTable, writeEcsvTable, writeJsonTable } from './text-tables';
export { writeVotable } from './votable';
export {
  type ColumnDefinition,
  tableOfRows,
  type WrittenCell,
  type WrittenColumn,
  type WrittenTable,
} from './written-table';
