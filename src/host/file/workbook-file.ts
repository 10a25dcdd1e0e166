// An .xlsx file as a host: what is written and computed changes its cells, everything else of it stays byte for byte.

import { type Block, type CellInput, type CellValue, type Host } from '../port';
import { type Area, LAST_COLUMN, LAST_ROW, areaAddress, cellAddress, columnsOf, isSingle, rowsOf, singleCell } from '../../formula/address';
import { type Book, openBook, sheetNamed } from './book';
import { faults } from './faults';
import { type SheetArea, referencedArea } from './formula-to-sheet';
import { toFileFormula } from './formula-to-file';
import { type FormulaSource, type Replacement, formulaSource, replaceFormulas } from './replace-formulas';
import { type Calculator, type Recalculated, recalculate } from './recalculation';
import type { SheetPart } from './sheet-part';

export class WorkbookFile implements Host {
  readonly #listeners = new Set<() => void>();
  /** What was written since the last recalculation. */
  #written: SheetArea[] = [];

  private constructor(private readonly book: Book) {}

  /** @throws HostFault where the bytes are no .xlsx workbook that can be read */
  static async open(bytes: Uint8Array): Promise<WorkbookFile> {
    return new WorkbookFile(await openBook(bytes));
  }

  async read(reference: string): Promise<Block | null> {
    const found = this.#find(reference);
    if (!found) return null;
    const { sheet, area } = found;
    const values: CellValue[][] = [];
    for (let row = area.top; row <= area.bottom; row++) {
      const line: CellValue[] = [];
      for (let column = area.left; column <= area.right; column++) line.push(sheet.cell(row, column)?.value ?? null);
      values.push(line);
    }
    return { sheet: sheet.name, address: areaAddress(area), values };
  }

  /** Whether the first cell of a reference holds a formula of its own. */
  hasFormula(reference: string): boolean {
    const found = this.#find(reference);
    return found?.sheet.cell(found.area.top, found.area.left)?.formula !== undefined;
  }

  /** What depends on the cells is not computed before recalculate(). */
  async write(reference: string, cells: CellInput[][]): Promise<void> {
    const found = this.#find(reference);
    if (!found) throw faults.noReference(reference);
    const { sheet, area } = found;
    const [rows, columns] = [rowsOf(area), columnsOf(area)];
    if (cells.length !== rows || cells.some((line) => line.length !== columns)) throw faults.otherSize(reference, rows, columns);
    const places = cells.flatMap((line, r) => line.map((input, c) => ({ row: area.top + r, column: area.left + c, input })));
    for (const { row, column } of places) refuseArrays(sheet, row, column);
    for (const { row, column, input } of places) this.#writeCell(sheet, row, column, input);
  }

  async onRecalculated(listener: () => void): Promise<() => Promise<void>> {
    this.#listeners.add(listener);
    return async () => {
      this.#listeners.delete(listener);
    };
  }

  /** Computes every formula with a function of ours or without a value, and all that depends on those and on what was written. */
  async recalculate(calculator: Calculator): Promise<Recalculated> {
    const result = await recalculate(this.book, this.#written, calculator);
    this.#written = [];
    for (const listener of this.#listeners) listener();
    return result;
  }

  /** All formulas of the file, and what they refer to. */
  formulas(): Promise<FormulaSource> {
    return formulaSource(this.book);
  }

  /** Puts others in place of formulas; the values that cells show stay, and nothing is computed. */
  async replaceFormulas(replacement: Replacement): Promise<void> {
    await replaceFormulas(this.book, replacement);
  }

  /** The file as it is now. */
  async save(): Promise<Uint8Array> {
    const { archive, arrays, part, relations } = this.book;
    const changed = this.book.sheets.filter((sheet) => sheet.changed);
    for (const sheet of changed) archive.set(sheet.part, sheet.toXml(sheet.needsSpillMark ? await arrays.mark(archive, part) : ''));
    // The order in which formulas were computed last: programs find it anew, but refuse one that lists cells without a formula.
    const order = relations.find(({ type }) => type === 'calcChain')?.target;
    if (order !== undefined && archive.has(order) && changed.some((sheet) => sheet.movesFormulas)) await archive.remove(order, part);
    return archive.save();
  }

  #find(reference: string): { sheet: SheetPart; area: Area } | null {
    const found = referencedArea(this.book, reference, { sheet: this.book.activeSheet, row: 0, column: 0 });
    const sheet = found && sheetNamed(this.book, found.sheet);
    if (!sheet) return null;
    // Whole columns and rows end where the sheet's cells do.
    const { row, column } = sheet.extent;
    const { top, left, bottom, right } = found.area;
    return { sheet, area: { top, left, bottom: bottom === LAST_ROW ? Math.max(row, top) : bottom, right: right === LAST_COLUMN ? Math.max(column, left) : right } };
  }

  #writeCell(sheet: SheetPart, row: number, column: number, input: CellInput): void {
    const cell = sheet.cell(row, column);
    const value = input === '' ? null : input;
    if (value === null && cell?.filledFrom) return; // what a formula fills is not cleared on its own
    const replaced = cell?.formula?.area ?? singleCell(row, column);
    if (typeof value === 'object' && value !== null) {
      const { text, fillsOneCell } = toFileFormula(value.formula, Object.fromEntries(this.book.names.map((name) => [name.name, name.text])));
      sheet.setFormula(row, column, { text, kind: fillsOneCell ? 'ordinary' : 'dynamic', area: singleCell(row, column) });
      sheet.setValue(row, column, null);
    } else {
      if (cell?.formula || cell?.filledFrom) sheet.setFormula(row, column, undefined);
      sheet.setValue(row, column, value);
    }
    this.#written.push({ sheet: sheet.name, area: replaced });
  }
}

/** The cells of an array formula change together or not at all. */
function refuseArrays(sheet: SheetPart, row: number, column: number): void {
  const cell = sheet.cell(row, column);
  const anchor = cell?.filledFrom ? sheet.cell(cell.filledFrom.row, cell.filledFrom.column) : cell;
  const formula = anchor?.formula;
  if (formula?.kind === 'array' && !isSingle(formula.area)) throw faults.partOfArray(cellAddress(row, column), areaAddress(formula.area));
}
