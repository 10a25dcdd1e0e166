// How formulas name the cells of a plan: the cells of a row, the columns of a structured table, or the workbook's names.

import { addressOf, cellBox } from '../address';
import type { Edges } from '../plan';
import { NAMES } from '../sentences';

/** The band of a formula. */
export interface Band {
  low: string;
  high: string;
  centre: string;
}

/** The cells, or columns, that hold the edges of a band as the plan gives them. */
export function bandOf(edges: Edges, one: string, other: string): Band {
  if (one === other) return { low: one, high: one, centre: one };
  if (edges[0] === 'low') return { low: one, high: other, centre: `(${one}+${other})/2` };
  return { low: `${one}-${other}/2`, high: `${one}+${other}/2`, centre: one };
}

/** A centre that stays blank where its row is: the sum of blank cells would be 0. */
export const blankWhereBlank = (band: Band, one: string): Band => (band.centre === one ? band : { ...band, centre: `IF(${one}="","",${band.centre})` });

/** A cell of a row, which moves along with the formula. */
export const cellOfRow = (row: number, column: number): string => addressOf(cellBox(row, column));

export const nameOf = (key: Edges[number]): string => NAMES[key].name;

/** A column of the structured table that holds the formula, in the formula's own row. */
export function columnOfTable(title: string): string {
  return `[@${/^[\p{L}\p{N}_]+$/u.test(title) ? title : `[${title.replace(/['[\]#@]/g, "'$&")}]`}]`;
}
