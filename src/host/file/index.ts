// The .xlsx host's door.

export { type ReadWorkbook, readWorkbook } from './read-workbook';
export type { Calculator, Recalculated } from './recalculation';
export { WorkbookFile } from './workbook-file';
export { writeWorkbook } from './write-workbook';
