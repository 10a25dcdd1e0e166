// Addresses of cells and areas; rows and columns count from 0.

import { MAX_COLS, MAX_ROWS, addA1RangeBounds, parseA1Range, toCol } from '@borgar/fx/xlsx';

/** A rectangle of cells, its edges included. */
export interface Area {
  top: number;
  left: number;
  bottom: number;
  right: number;
}

/** The last row and column that a sheet can have. */
export const LAST_ROW = MAX_ROWS;
export const LAST_COLUMN = MAX_COLS;

/** `cellAddress(1, 1) // => 'B2'` */
export const cellAddress = (row: number, column: number): string => `${toCol(column)}${row + 1}`;

/** `B2:C3`, or `B2` for a single cell. */
export function areaAddress({ top, left, bottom, right }: Area): string {
  const first = cellAddress(top, left);
  return top === bottom && left === right ? first : `${first}:${cellAddress(bottom, right)}`;
}

/** The area of `B2`, `$B$2:C3`, `A:C` or `2:5`; null where the text is no address. */
export function parseArea(address: string): Area | null {
  const range = parseA1Range(address);
  if (!range) return null;
  const { top, left, bottom, right } = addA1RangeBounds(range);
  return { top: top!, left: left!, bottom: bottom!, right: right! };
}

export const singleCell = (row: number, column: number): Area => ({ top: row, left: column, bottom: row, right: column });

export const areaOf = (row: number, column: number, size: { rows: number; columns: number }): Area =>
  ({ top: row, left: column, bottom: row + size.rows - 1, right: column + size.columns - 1 });

export const rowsOf = (area: Area): number => area.bottom - area.top + 1;
export const columnsOf = (area: Area): number => area.right - area.left + 1;
export const isSingle = (area: Area): boolean => area.top === area.bottom && area.left === area.right;

export const contains = (area: Area, row: number, column: number): boolean =>
  row >= area.top && row <= area.bottom && column >= area.left && column <= area.right;

export const overlap = (a: Area, b: Area): boolean => a.top <= b.bottom && b.top <= a.bottom && a.left <= b.right && b.left <= a.right;

export const sameArea = (a: Area, b: Area): boolean => a.top === b.top && a.left === b.left && a.bottom === b.bottom && a.right === b.right;

/** Calls back for each cell, row by row. */
export function eachCell(area: Area, visit: (row: number, column: number) => void): void {
  for (let row = area.top; row <= area.bottom; row++) for (let column = area.left; column <= area.right; column++) visit(row, column);
}

/** A sheet's name as formulas write it: `Plan`, `'My plan'`. Quoted whenever in doubt. */
export const sheetPrefix = (name: string): string => (/^[A-Za-z_][A-Za-z_]*$/.test(name) && name.length > 3 ? name : `'${name.replaceAll("'", "''")}'`);
