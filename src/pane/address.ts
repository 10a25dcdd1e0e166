// Addresses of cells, as references write them: `B2:B9`, `$B$2`, `'My plan'!B2`.

/** Rows and columns count from 0. */
export interface Box {
  row: number;
  column: number;
  rows: number;
  columns: number;
}

/** Rows of a sheet. */
export const MOST_ROWS = 1_048_576;
/** Columns of a sheet. */
export const MOST_COLUMNS = 16_384;

/** The sheet of a reference, null where it names none, and its cells; null where the text is no address of cells. */
export function parseReference(reference: string): { sheet: string | null; box: Box } | null {
  const [, quoted, plain, address] = /^\s*(?:'((?:[^']|'')+)'!|([^'!]+)!)?\s*([^!]*?)\s*$/.exec(reference) ?? [];
  const box = address === undefined ? null : parseAddress(address);
  return box && { sheet: quoted?.replaceAll("''", "'") ?? plain?.trim() ?? null, box };
}

/** The cells of an address without a sheet, null where it is none. */
export function parseAddress(address: string): Box | null {
  const [, left, top, right = left, bottom = top] = /^\$?([A-Z]{1,3})\$?(\d{1,7})(?::\$?([A-Z]{1,3})\$?(\d{1,7}))?$/i.exec(address) ?? [];
  if (left === undefined) return null;
  const [columns, rows] = [[columnNumber(left), columnNumber(right!)], [Number(top) - 1, Number(bottom) - 1]];
  const [column, row] = [Math.min(...columns), Math.min(...rows)];
  const box = { row, column, rows: Math.max(...rows) - row + 1, columns: Math.max(...columns) - column + 1 };
  return row >= 0 && row + box.rows <= MOST_ROWS && column + box.columns <= MOST_COLUMNS ? box : null;
}

/** The address of cells: `B2:B9`, or `$B$2:$B$9` where it must not move along with a formula. */
export function addressOf({ row, column, rows, columns }: Box, mark: '' | '$' = ''): string {
  const corner = (r: number, c: number) => `${mark}${columnLetters(c)}${mark}${r + 1}`;
  return rows * columns === 1 ? corner(row, column) : `${corner(row, column)}:${corner(row + rows - 1, column + columns - 1)}`;
}

/** A reference to cells of a sheet: `'My plan'!B2:B9`. */
export const referenceTo = (sheet: string, cells: Box | string): string => `${quotedSheet(sheet)}!${typeof cells === 'string' ? cells : addressOf(cells)}`;

/** What a defined name refers to: `'My plan'!$B$2:$B$9`. */
export const fixedReference = (sheet: string, box: Box): string => `${quotedSheet(sheet)}!${addressOf(box, '$')}`;

/** A plain word stands as it is, unless it could be read as a cell. */
const quotedSheet = (sheet: string): string => (/^[A-Z_]{4,}\w*$|^[A-Z_]+$/i.test(sheet) && !/^(R|C|RC)$/i.test(sheet) ? sheet : `'${sheet.replaceAll("'", "''")}'`);

export const cellBox = (row: number, column: number): Box => ({ row, column, rows: 1, columns: 1 });

export const holdsBox = (outer: Box, inner: Box): boolean =>
  inner.row >= outer.row && inner.column >= outer.column
  && inner.row + inner.rows <= outer.row + outer.rows && inner.column + inner.columns <= outer.column + outer.columns;

export const sameBox = (one: Box, other: Box): boolean => holdsBox(one, other) && holdsBox(other, one);

export const columnLetters = (column: number): string =>
  (column < 26 ? '' : columnLetters(Math.floor(column / 26) - 1)) + String.fromCharCode(65 + (column % 26));

const columnNumber = (letters: string): number => [...letters.toUpperCase()].reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0) - 1;
