// A plain copy of one sheet, as one change of the workbook: the copy, and a sheet that lists what became what.

import type { Cell, CellInput, CellValue, Change, Workbook } from '../../host/port';
import { type Maker, type OnProgress, type PlainCopy, callsOurs, plainCopy, workbookSource } from '../../plain';
import { addressOf, referenceTo } from '../address';
import { sentences } from './sentences';

export interface PlainSheet {
  change: Change;
  /** Names of the two new sheets. */
  copy: string;
  list: string;
  /** How many formulas became native ones, and how many became values. */
  formulas: number;
  values: number;
}

/** How many FOLD formulas stand on each sheet, for those that have any. */
export const sheetsWithFormulas = ({ sheets }: Workbook): { sheet: string; count: number }[] => sheets
  .map(({ name, cells }) => ({ sheet: name, count: Object.values(cells).flatMap((line) => Object.values(line)).filter(isOurs).length }))
  .filter(({ count }) => count > 0);

const isOurs = ({ formula }: Cell): boolean => formula !== undefined && callsOurs(formula.slice(1));

export async function plainSheet(workbook: Workbook, sheet: string, maker: Maker, onProgress?: OnProgress): Promise<PlainSheet> {
  const source = workbookSource(workbook);
  const ours = source.names.filter(({ text }) => callsOurs(text));
  const copied = await plainCopy({
    ...source,
    formulas: source.formulas.filter((one) => one.sheet === sheet),
    // The names of the workbook stay as they are, so what uses one that calls functions of ours becomes a value.
    names: source.names.filter((one) => !ours.includes(one)),
    lost: ours.map(({ name }) => name),
  }, maker, onProgress);
  const copy = freeName(sentences.copyOf(sheet), [...source.sheets, copied.sheet.name]);
  const { cells } = workbook.sheets.find(({ name }) => name === sheet)!;
  const rows = copied.sheet.rows;
  const width = Math.max(...rows.map((row) => row.length));
  const list = { row: 0, column: 0, rows: rows.length, columns: width };
  const counts = copied.counts.find((one) => one.sheet === sheet)!;
  return {
    copy, list: copied.sheet.name, formulas: counts.formulas, values: counts.values,
    change: {
      sheets: [{ name: copy, copyOf: sheet }, { name: copied.sheet.name }],
      cells: [
        ...copied.cells.map((one) => blockOf(copy, one, cells)),
        { reference: referenceTo(copied.sheet.name, list), cells: rows.map((row) => Array.from({ length: width }, (_, i) => row[i] ?? null)) },
      ],
      looks: copied.sheet.widths.map((pixels, column) => ({ reference: referenceTo(copied.sheet.name, { row: 0, column, rows: 1, columns: 1 }), look: { width: pixels } })),
    },
  };
}

/** Formulas of a plain copy come without "=". */
function blockOf(copy: string, { area, outcome }: PlainCopy['cells'][number], cells: Workbook['sheets'][number]['cells']): NonNullable<Change['cells']>[number] {
  const { top, left, bottom, right } = area;
  const block = { row: top, column: left, rows: bottom - top + 1, columns: right - left + 1 };
  if (outcome.kind === 'reference') return { reference: referenceTo(copy, { ...block, rows: 1, columns: 1 }), cells: [[{ formula: `=${outcome.formula}` }]] };
  const made = (r: number, c: number): CellInput => (outcome.kind === 'formulas'
    ? { formula: `=${outcome.formulas[r]![c]!}` } : asInput(cells[top + r]?.[left + c]?.value ?? null));
  return { reference: referenceTo(copy, addressOf(block)), cells: Array.from({ length: block.rows }, (_row, r) => Array.from({ length: block.columns }, (_cell, c) => made(r, c))) };
}

/** An error can't be typed: `#N/A` has a function of its own, of the others the code stays as text. */
function asInput(value: CellValue): CellInput {
  if (typeof value !== 'object' || value === null) return value;
  return value.error === '#N/A' ? { formula: '=NA()' } : value.error;
}

/** A sheet's name has at most 31 characters. */
function freeName(wanted: string, taken: readonly string[]): string {
  const isTaken = (name: string) => taken.some((one) => one.toLowerCase() === name.toLowerCase());
  for (let number = 1; ; number++) {
    const suffix = number === 1 ? '' : ` ${number}`;
    const name = wanted.slice(0, 31 - suffix.length) + suffix;
    if (!isTaken(name)) return name;
  }
}
