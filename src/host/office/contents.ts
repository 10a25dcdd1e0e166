// What cells hold, and how it is written to them and put back.

import type { CellInput, CellValue } from '../port';
import { faults } from './office-faults';

/** In a cell of this format even a formula would become text. */
const TEXT_FORMAT = '@';
const GENERAL_FORMAT = 'General';

/** What a block holds, in the form that writes it again. */
export interface Contents {
  entries: (string | number | boolean)[][];
  formats: string[][];
}

export function cellValue(value: string | number | boolean, type: Excel.RangeValueType | string): CellValue {
  if (type === 'Empty') return null;
  return type === 'Error' ? { error: String(value) } : value;
}

/** Throws where cells can't be written to a range, which must be measured. */
export function checkFit(reference: string, { rowCount, columnCount }: Excel.Range, cells: CellInput[][]): void {
  if (cells.length !== rowCount || cells.some((row) => row.length !== columnCount)) {
    const widths = [...new Set(cells.map((row) => row.length))].join(' or ');
    throw faults.sizeDiffers(reference, `${rowCount} × ${columnCount}`, `${cells.length} × ${widths || 0}`);
  }
  for (const cell of cells.flat()) {
    if (typeof cell === 'number' && !Number.isFinite(cell)) throw faults.notWritable(reference, cell);
  }
}

/** What blocks hold, in as few requests as it takes. */
export async function contentsOf(context: Excel.RequestContext, ranges: Excel.Range[]): Promise<Contents[]> {
  for (const range of ranges) range.load('values,valueTypes,formulas,numberFormat,hasSpill');
  await context.sync();
  const spilled = await spilledCells(context, ranges);
  return ranges.map(({ values, valueTypes, formulas, numberFormat }, i) => {
    const again = (value: string | number | boolean, r: number, c: number) => {
      if (spilled[i]?.[r]![c]) return ''; // comes back with the formula that spills
      const formula: unknown = formulas[r]![c];
      if (isFormula(formula, value)) return formula;
      return valueTypes[r]![c] === 'String' ? entry(String(value)) : value;
    };
    return { entries: values.map((row, r) => row.map((value, c) => again(value, r, c))), formats: numberFormat };
  });
}

/** Whether what `formulas` says of a cell is a formula: of text that begins with "=" it says the text. */
export const isFormula = (formula: unknown, value: unknown): formula is string => typeof formula === 'string' && formula.startsWith('=') && formula !== value;

/** Queues the writing of a block; cells for text that get something else are for anything from then on. */
export function writeCells(range: Excel.Range, cells: CellInput[][], before: Contents): void {
  const formats = before.formats.map((row, r) => row.map((format, c) => formatFor(cells[r]![c]!, format)));
  if (!same(formats, before.formats)) range.numberFormat = formats;
  range.formulas = cells.map((row) => row.map(entry));
}

/** Puts blocks back after a write that failed: the program may have stored some cells before the one that it refused. */
export async function putBack(context: Excel.RequestContext, blocks: { range: Excel.Range; before: Contents }[]): Promise<void> {
  const now = await contentsOf(context, blocks.map(({ range }) => range));
  const changed = blocks.filter(({ before }, i) => !same(now[i], before));
  for (const { range, before } of changed) range.numberFormat = before.formats.map((row) => row.map(() => GENERAL_FORMAT));
  // Formulas last: they need the room that they filled.
  for (const { range, before } of changed) range.formulas = before.entries.map((row) => row.map((one) => (isFormulaEntry(one) ? '' : one)));
  for (const { range, before } of changed) {
    if (before.entries.flat().some(isFormulaEntry)) range.formulas = before.entries.map((row) => row.map((one) => (isFormulaEntry(one) ? one : null)));
  }
  for (const { range, before } of changed) range.numberFormat = before.formats;
  if (changed.length > 0) await context.sync();
}

/** For each block, which of its cells get their value from a formula in another cell; null where there are none. */
export async function spilledCells(context: Excel.RequestContext, ranges: Excel.Range[]): Promise<(boolean[][] | null)[]> {
  const asked = ranges.map((range) => (range.hasSpill === false ? null : range.values.map((row, r) => row.map((_, c) => {
    const cell = range.getCell(r, c);
    const parent = cell.getSpillParentOrNullObject();
    cell.load('address');
    parent.load('address');
    return { cell, parent };
  }))));
  if (asked.some((cells) => cells !== null)) await context.sync();
  return asked.map((cells) => cells && cells.map((row) => row.map(({ cell, parent }) => !parent.isNullObject && parent.address !== cell.address)));
}

/** What makes the program store a cell's input: behind an apostrophe everything is text. */
export function entry(cell: CellInput): string | number | boolean {
  if (cell === null || cell === '') return '';
  if (typeof cell === 'string') return `'${cell}`;
  return typeof cell === 'object' ? cell.formula : cell;
}

const isFormulaEntry = (entered: string | number | boolean): boolean => typeof entered === 'string' && entered.startsWith('=');

const formatFor = (cell: CellInput, format: string): string => (typeof cell !== 'string' && format === TEXT_FORMAT ? GENERAL_FORMAT : format);

export const same = (one: unknown, other: unknown): boolean => JSON.stringify(one) === JSON.stringify(other);
