// Rows in portions, each row with its native formula. Every portion begins in row 1 again, so that most of its formulas are those of the
// portion before: they are converted once, and the embedded sheet parses them once.

import { plainCopy, workbookSource } from '../../src/plain';
import { sheetOf } from '../support/workbook';
import type { Row } from './random-rows';

/** Rows with their cells in columns A to F. */
export interface Portion {
  rows: Row[];
  /** The native formula of each row, without "="; undefined where it has none. */
  formulas: (string | undefined)[];
}

const ROWS = 250;

export async function portionsOf(id: string, all: Row[]): Promise<Portion[]> {
  const portions: Portion[] = [];
  for (let first = 0; first < all.length; first += ROWS) {
    const rows = all.slice(first, first + ROWS);
    portions.push({ rows, formulas: await nativeFormulas(rows.map((row, r) => `=FOLD.${id}(${row.map((value, c) => argument(value, r, c)).join(',')})`)) });
  }
  return portions;
}

/** Every third formula has its words and numbers written out. */
function argument(value: Row[number], row: number, column: number): string {
  const isWritten = typeof value === 'string' ? /^[a-z ]*$/i.test(value) && value !== 'fast' : column > 1 && typeof value === 'number';
  return row % 3 === 0 && isWritten ? JSON.stringify(value) : `${'ABCDEF'[column]}${row + 1}`;
}

/** What formulas of ours have become so far. */
const known = new Map<string, string | undefined>();

async function nativeFormulas(ours: string[]): Promise<(string | undefined)[]> {
  const sheet = sheetOf('Plan', ours.map((formula) => [known.has(formula) ? null : { value: 0, formula }]));
  const { cells } = await plainCopy(workbookSource({ sheets: [sheet], names: {} }), { version: '', date: '' });
  for (const { area, outcome } of cells) known.set(ours[area.top]!, outcome.kind === 'formulas' ? outcome.formulas[0]![0]! : undefined);
  return ours.map((formula) => known.get(formula));
}
