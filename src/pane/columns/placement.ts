// Where columns go: beside the plan, in its rows.

import type { CellValue } from '../../host/port';
import { type Box, columnLetters, parseAddress } from '../address';
import type { PlanTable } from '../setup/table';

/** The rows that a column of results takes, its header included, and the columns for so many of them. */
export function resultBox(table: PlanTable, column: number, columns: number): Box {
  const top = headerRow(table) ?? table.first;
  return { row: top, column, rows: table.first + table.rows - top, columns };
}

/** The row for the headers of results: that of the plan, or the row right above it; null where the plan begins in the sheet's first row. */
export const headerRow = ({ header, first }: PlanTable): number | null => header ?? (first > 0 ? first - 1 : null);

/** The first columns to the right of the plan that have room for so many. */
export function nextFree(table: PlanTable, count: number, used: Box & { values: CellValue[][] }): number {
  const right = Math.max(...Object.values(table.columns).map(({ column }) => column));
  const { row, rows } = resultBox(table, 0, 1);
  const isFree = (column: number) => Array.from({ length: rows }, (_, i) => used.values[row + i - used.row]?.[column - used.column] ?? null).every((value) => value === null);
  let first = right + 1;
  for (let column = first; column < first + count; column++) if (!isFree(column)) first = column + 1;
  return first;
}

/** A column as typed, `K` or `K7`; null where it is none. */
export function columnFrom(text: string): number | null {
  const letters = /^\s*\$?([A-Z]{1,3})\$?\d*\s*$/i.exec(text)?.[1];
  return letters === undefined ? null : parseAddress(`${letters}1`)?.column ?? null;
}

/** Whether a box would lie over a column of the plan. */
export const meetsPlan = (table: PlanTable, { column, columns }: Box): string | null => {
  const met = Object.values(table.columns).find((one) => one.column >= column && one.column < column + columns);
  return met ? columnLetters(met.column) : null;
};
