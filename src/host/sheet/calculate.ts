// Recalculates a workbook without a window, as the command line does.

import type { Cell, CellError, CellValue, Sheet, Workbook } from '../port';
import type { WorksheetFunctions } from './functions-runtime';
import { openHeadless } from './headless';
import { unknownParts } from './known-functions';
import { cellsOf } from './workbook-data';

/**
 * The workbook with the values and blocks of all its formulas computed; the one given stays as it is. Errors of our functions come with
 * their sentence. A formula that the sheet does not know (see unknownParts) keeps the value it had.
 */
export async function calculate(workbook: Workbook, functions: WorksheetFunctions, onProgress?: (done: number, total: number) => void): Promise<Workbook> {
  const host = openHeadless(functions);
  try {
    await host.load(withoutUnknown(workbook), onProgress);
    const computed = host.save();
    const result = structuredClone(workbook);
    for (const [i, sheet] of result.sheets.entries()) {
      takeValues(sheet, computed.sheets[i]!);
      const errors = errorCells(sheet);
      for (const { row, column, sentence } of await host.sentencesOf(sheet.name, errors)) (sheet.cells[row]![column]!.value as CellError).message = sentence;
    }
    return result;
  } finally {
    host.dispose();
  }
}

/** Formulas that the sheet does not know as the values they had, so that what depends on them can be computed. */
function withoutUnknown(workbook: Workbook): Workbook {
  const known = (cell: Cell): Cell => (isComputed(cell) ? cell : { value: cell.value, ...(cell.style && { style: cell.style }) });
  return {
    ...workbook,
    sheets: workbook.sheets.map((sheet) => ({
      ...sheet,
      cells: mapIndexed(sheet.cells, (line) => mapIndexed(line, known)),
    })),
  };
}

/** Puts the computed values of formulas and of the blocks they fill into a sheet. */
function takeValues(sheet: Sheet, computed: Sheet): void {
  const formulas = [...cellsOf(sheet)].filter(([, , cell]) => cell.formula !== undefined && isComputed(cell));
  for (const [row, column, cell] of formulas) {
    fill(sheet, row, column, cell.spill, () => null);
    delete cell.spill;
  }
  for (const [row, column, cell] of formulas) {
    const source = computed.cells[row]?.[column];
    cell.value = source?.value ?? null;
    if (!source?.spill) continue;
    cell.spill = source.spill;
    fill(sheet, row, column, source.spill, (r, c) => computed.cells[r]?.[c]?.value ?? null);
  }
}

/** Sets the cells of a block other than its first. */
function fill(sheet: Sheet, row: number, column: number, size: Cell['spill'], value: (row: number, column: number) => CellValue): void {
  if (!size) return;
  for (let r = row; r < row + size.rows; r++) {
    for (let c = column; c < column + size.columns; c++) {
      if (r === row && c === column) continue;
      const line = (sheet.cells[r] ??= {});
      line[c] = { ...line[c], value: value(r, c) };
    }
  }
}

const isComputed = ({ formula }: Cell): boolean => formula === undefined || unknownParts(formula).length === 0;

const errorCells = (sheet: Sheet): { row: number; column: number }[] =>
  [...cellsOf(sheet)].flatMap(([row, column, { value }]) => (typeof value === 'object' && value !== null ? [{ row, column }] : []));

function mapIndexed<A, B>(entries: Record<number, A>, change: (entry: A) => B): Record<number, B> {
  return Object.fromEntries(Object.entries(entries).map(([index, entry]) => [index, change(entry)]));
}
