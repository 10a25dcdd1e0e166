// Addresses of cells: `B2:B9`, `Plan!$B$2`, `'My plan'!B2`.

/** Rows and columns count from 0; both ends belong to it. */
export interface CellRange {
  startRow: number;
  startColumn: number;
  endRow: number;
  endColumn: number;
}

/** The sheet of a reference (null where it names none) and its cells, or null where the text is no address. */
export function parseReference(reference: string): { sheet: string | null; range: CellRange } | null {
  const parts = /^\s*(?:(?:'((?:[^']|'')+)'|([^'!\s]+))!)?\s*\$?([A-Za-z]{1,3})\$?([0-9]{1,7})(?::\$?([A-Za-z]{1,3})\$?([0-9]{1,7}))?\s*$/.exec(reference);
  if (!parts) return null;
  const [, quoted, plain, column, row, otherColumn = column, otherRow = row] = parts as string[];
  const [columns, rows] = [[columnIndex(column!), columnIndex(otherColumn!)], [Number(row) - 1, Number(otherRow) - 1]];
  const range = {
    startRow: Math.min(...rows), startColumn: Math.min(...columns), endRow: Math.max(...rows), endColumn: Math.max(...columns),
  };
  if (range.startRow < 0 || range.endRow >= MOST_ROWS || range.endColumn >= MOST_COLUMNS) return null;
  return { sheet: quoted?.replaceAll("''", "'") ?? plain ?? null, range };
}

/** Without `$`, and without a colon for one cell. */
export function formatRange({ startRow, startColumn, endRow, endColumn }: CellRange): string {
  const first = formatCell(startRow, startColumn);
  return startRow === endRow && startColumn === endColumn ? first : `${first}:${formatCell(endRow, endColumn)}`;
}

export const formatCell = (row: number, column: number): string => `${columnLabel(column)}${row + 1}`;

const MOST_ROWS = 1_048_576;
const MOST_COLUMNS = 16_384;

const columnIndex = (label: string): number => [...label.toUpperCase()].reduce((index, letter) => index * 26 + letter.charCodeAt(0) - 64, 0) - 1;

const columnLabel = (index: number): string => (index < 26 ? '' : columnLabel(Math.floor(index / 26) - 1)) + String.fromCharCode(65 + (index % 26));
