// Which cells hold something, so that nothing is written over them.

import type { CellValue, LiveHost } from '../host/port';
import { type Box, addressOf, cellBox, parseAddress, referenceTo } from './address';

/** Addresses of the cells of a box that hold a value or a formula. */
export async function filledCells(host: LiveHost, sheet: string, box: Box): Promise<string[]> {
  const reference = referenceTo(sheet, box);
  const [block, formulas] = await Promise.all([host.read(reference), host.formulas(reference)]);
  const filled: string[] = [];
  for (let r = 0; r < box.rows; r++) {
    for (let c = 0; c < box.columns; c++) {
      const holds = (block?.values[r]?.[c] ?? null) !== null || (formulas?.formulas[r]?.[c] ?? null) !== null;
      if (holds) filled.push(addressOf(cellBox(box.row + r, box.column + c)));
    }
  }
  return filled;
}

/** The part of a sheet that holds anything, null where the sheet is blank or missing. */
export async function usedPart(host: LiveHost, sheet: string): Promise<Box | null> {
  const place = (await host.sheets()).find((one) => one.sheet === sheet);
  return place ? parseAddress(place.address) : null;
}

/** Where so many rows and columns have room: above a table with a blank row between, else beside all that the sheet holds. */
export function roomBy(table: Box, used: Box & { values: CellValue[][] }, rows: number, columns: number): Box {
  const isBlank = (row: number, column: number) => (used.values[row - used.row]?.[column - used.column] ?? null) === null;
  const above = { row: table.row - rows - 1, column: table.column, rows, columns };
  const free = above.row >= 0 && Array.from({ length: rows + 1 }, (_r, r) => Array.from({ length: columns }, (_c, c) => isBlank(above.row + r, above.column + c))).flat().every(Boolean);
  return free ? above : { row: table.row, column: Math.max(used.column + used.columns, table.column + table.columns) + 1, rows, columns };
}
