// Workbooks in a few lines: a sheet as rows of cells.

import type { Cell, CellValue, Sheet, Workbook } from '../../src/host/port';

/** A value, a formula (text that begins with "="), or a whole cell; null leaves the cell out. */
export type Given = Exclude<CellValue, null> | Cell | null;

/** @param rows of the one sheet, called Plan */
export const planOf = (rows: Given[][], names: Record<string, string> = {}): Workbook => ({ sheets: [sheetOf('Plan', rows)], names });

export function sheetOf(name: string, rows: Given[][]): Sheet {
  const cells: Sheet['cells'] = {};
  rows.forEach((row, r) => row.forEach((given, c) => {
    if (given !== null) (cells[r] ??= {})[c] = cellOf(given);
  }));
  return { name, cells, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } };
}

function cellOf(given: Exclude<Given, null>): Cell {
  if (typeof given === 'object') return 'error' in given ? { value: given } : given;
  return typeof given === 'string' && given.startsWith('=') ? { value: null, formula: given } : { value: given };
}

/** Values of a sheet's cells, row by row up to the last that holds something; null where there is none. */
export function valuesOf(sheet: Sheet): CellValue[][] {
  const lines = Object.entries(sheet.cells);
  const height = Math.max(0, ...lines.map(([row]) => Number(row) + 1));
  const width = Math.max(0, ...lines.flatMap(([, line]) => Object.keys(line).map((column) => Number(column) + 1)));
  return Array.from({ length: height }, (_r, row) => Array.from({ length: width }, (_c, column) => sheet.cells[row]?.[column]?.value ?? null));
}
