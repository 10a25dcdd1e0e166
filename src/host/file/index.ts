// The .xlsx host's door.

export { type ReadWorkbook, readWorkbook } from './read-workbook';
export type { Calculator, Recalculated } from './recalculation';
export type { FormulaSource, Replacement } from './replace-formulas';
export { WorkbookFile } from './workbook-file';
export { writeWorkbook } from './write-workbook';
