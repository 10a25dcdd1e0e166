// Rectangles of cells and their addresses, as the played workbook counts them: from 0.

export interface Box {
  row: number;
  column: number;
  rows: number;
  columns: number;
}

export const cellBox = (row: number, column: number): Box => ({ row, column, rows: 1, columns: 1 });

/** The row and column of a key: `2,3`. */
export const place = (key: string): [number, number] => key.split(',').map(Number) as [number, number];

export function boxAddress({ row, column, rows, columns }: Box): string {
  const first = `${letters(column)}${row + 1}`;
  return rows * columns === 1 ? first : `${first}:${letters(column + columns - 1)}${row + rows}`;
}

/** Whether two boxes have a cell in common. */
export const inside = (one: Box, other: Box): boolean =>
  one.row < other.row + other.rows && other.row < one.row + one.rows && one.column < other.column + other.columns && other.column < one.column + one.columns;

/** Cells, or whole columns or rows; undefined for anything else. */
export function parseAddress(address: string): Box | undefined {
  const [, a, one, b, two] = /^\$?([A-Z]+)?\$?(\d+)?(?::\$?([A-Z]+)?\$?(\d+)?)?$/i.exec(address) ?? [];
  const isRange = address.includes(':');
  if (!(a || one) || (!isRange && !(a && one)) || (isRange && (Boolean(a) !== Boolean(b) || Boolean(one) !== Boolean(two)))) return undefined;
  const [left, right] = a ? [number(a), number(b ?? a)] : [0, 16_383];
  const [top, bottom] = one ? [Number(one) - 1, Number(two ?? one) - 1] : [0, 1_048_575];
  return { row: top, column: left, rows: bottom - top + 1, columns: right - left + 1 };
}

const number = (column: string): number => [...column.toUpperCase()].reduce((n, letter) => n * 26 + letter.charCodeAt(0) - 64, 0) - 1;

const letters = (column: number): string => (column < 26 ? '' : letters(Math.floor(column / 26) - 1)) + String.fromCharCode(65 + (column % 26));
