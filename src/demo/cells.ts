// How the demo workbooks are written down: lines of cells, and the few looks that they share.

import type { Cell, Sheet, Style } from '../host/port';

export type Line = (string | number | null | Cell)[];

export const FREQUENCY: Style = { numberFormat: '0.0000' };
export const TITLE: Style = { bold: true, fontSize: 14 };
export const NOTE: Style = { italic: true, color: '#5c6670' };
export const INPUT: Style = { fill: '#fff6dc', border: { bottom: { style: 'thin', color: '#b8860b' } } };
export const HEADER: Style = { bold: true, fill: '#dfe9ee', border: { bottom: { style: 'thin', color: '#41616f' } } };
export const NUMBER_HEADER: Style = { ...HEADER, horizontal: 'right' };

export const styled = (value: string | number, style: Style): Cell => ({ value, style });

export const formula = (text: string, style?: Style): Cell => ({ value: null, formula: text, ...(style && { style }) });

export const blanks = (count: number): null[] => new Array<null>(count).fill(null);

/** @param lines by row as the sheet counts, from 1 */
export function sheet(name: string, lines: Line[], widths: number[], frozen: Sheet['frozen']): Sheet {
  const made: Sheet = {
    name, cells: {}, columns: Object.fromEntries(widths.map((width, i) => [i, { width }])), rows: { 0: { height: 28 } }, merges: [], frozen,
  };
  lines.forEach((line, row) => line.forEach((cell, c) => {
    if (cell !== null) put(made, row - 1, c, typeof cell === 'object' ? cell : { value: cell });
  }));
  return made;
}

/** Puts a cell into a sheet; row and column from 0. */
export const put = (target: Sheet, row: number, column: number, cell: Cell): void => {
  (target.cells[row] ??= {})[column] = cell;
};

/** Gives looks to cells that a formula elsewhere fills; rows and columns from 0, the last ones included. */
export function look(target: Sheet, [firstRow, lastRow]: [number, number], columns: number[], style: Style): void {
  for (let row = firstRow; row <= lastRow; row++) for (const column of columns) put(target, row, column, { value: null, style });
}
