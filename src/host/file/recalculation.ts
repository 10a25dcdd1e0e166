// Computes again what has to be, and puts the values into the sheets.

import type { Cell, CellValue, Sheet, Workbook } from '../port';
import { AffectedFormulas, type Dependent } from './affected';
import { type Area, areaOf, cellAddress, columnsOf, eachCell, isSingle, overlap, rowsOf, sameArea, singleCell } from '../../formula/address';
import type { Book } from './book';
import { isError } from './cell-values';
import { type Place, type SheetArea, type Translation, toSheetFormula } from './formula-to-sheet';
import type { FileFormula, SheetPart } from './sheet-part';

/** What computes a workbook whose formulas are the ones to compute; the rest of it is constant. */
export interface Calculator {
  calculate(workbook: Workbook): Promise<Workbook>;
  /** What in a formula it does not know; empty where it can compute it. */
  unknownParts(formula: string): string[];
}

export interface Recalculated {
  sheets: {
    name: string;
    /** How many formulas with a function of ours were computed. */
    fold: number;
    /** How many others were, because of those or of cells that changed. */
    others: number;
  }[];
  /** Cells of formulas with a function of ours that show an error, or could not be computed. */
  errors: { sheet: string; address: string; code: string; message: string }[];
  /** Other formulas that should have been computed, and keep what they had. */
  kept: { sheet: string; address: string; message: string }[];
}

/** @param changed cells that something else than a recalculation has changed */
export async function recalculate(book: Book, changed: readonly SheetArea[], calculator: Calculator): Promise<Recalculated> {
  const formulas = new Formulas(book, calculator);
  const affected = new AffectedFormulas(formulas.all);
  for (const formula of formulas.all) if (formula.callsFold || formula.neverComputed || book.valuesAreStale) affected.add(formula);
  for (const area of changed) affected.addReadersOf(area);
  await formulas.compute(affected);
  const done = formulas.all.filter((formula) => affected.found.has(formula));
  for (const formula of done) formula.store();
  return report(book, done);
}

class Formulas {
  readonly all: Formula[] = [];
  readonly #at = new Map<string, Formula>();

  constructor(private readonly book: Book, private readonly calculator: Calculator) {
    for (const sheet of book.sheets) {
      for (const { row, column, cell: { formula } } of sheet.cells()) {
        if (!formula || formula.kind === 'what-if') continue;
        const one = new Formula(this, book, sheet, row, column, formula);
        this.all.push(one);
        this.#at.set(placeKey(one.place), one);
      }
    }
    // Only now is it known what every cell fills.
    for (const formula of this.all) formula.translate();
  }

  spillOf = (place: Place): Area => this.#at.get(placeKey(place))?.fills.area ?? singleCell(place.row, place.column);

  unknownParts(formula: string): string[] {
    return this.calculator.unknownParts(formula);
  }

  /** One round tells how far each formula spills; where that changes what others read, there is another. */
  async compute(affected: AffectedFormulas<Formula>): Promise<void> {
    for (let round = 1; round <= MOST_ROUNDS; round++) {
      const pending = [...affected.found].filter((formula) => formula.obstacle === null);
      if (pending.length === 0) return;
      const result = await this.calculator.calculate(this.#workbook(new Set(pending)));
      const results = new Map(result.sheets.map((sheet) => [sheet.name, sheet]));
      const moved = pending.filter((formula) => formula.take(results.get(formula.place.sheet)!));
      const known = affected.found.size;
      for (const { fills } of moved) affected.addReadersOf(fills);
      const readers = [...affected.found].filter((formula) => moved.some((one) => formula.readsSpillOf(one)));
      for (const formula of readers) formula.translate();
      if (readers.length === 0 && affected.found.size === known && !pending.some((formula) => formula.wantsAnotherRound)) return;
    }
  }

  /** The workbook for a round: the formulas to compute, and everything else as it is. */
  #workbook(pending: ReadonlySet<Formula>): Workbook {
    const isPending = (sheet: string, { row, column }: { row: number; column: number }) => {
      const formula = this.#at.get(placeKey({ sheet, row, column }));
      return formula !== undefined && pending.has(formula) ? formula : null;
    };
    const sheets = this.book.sheets.map((sheet): Sheet => {
      const cells: Sheet['cells'] = {};
      for (const { row, column, cell } of sheet.cells()) {
        const formula = cell.formula && isPending(sheet.name, { row, column });
        const filled = cell.filledFrom && isPending(sheet.name, cell.filledFrom);
        if (filled || (!formula && cell.value === null)) continue;
        const line: Record<number, Cell> = (cells[row] ??= {});
        line[column] = formula ? formula.cell(cell.value) : { value: cell.value };
      }
      return { name: sheet.name, cells, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } };
    });
    return { sheets, names: {} };
  }
}

/** More than any workbook needs whose spills come to rest. */
const MOST_ROUNDS = 20;

const placeKey = ({ sheet, row, column }: Place): string => `${row},${column},${sheet}`;

class Formula implements Dependent {
  readonly place: Place;
  readonly fills: SheetArea;
  wantsAnotherRound = false;

  #translation!: Translation;
  #obstacle: string | null | undefined;
  /** How it fills cells: as many as it needs, the one that it stands in, or those that it was entered for. */
  #manner: 'spill' | 'single' | 'fixed' = 'single';
  /** Whether its result must be cut or stretched to its cells. */
  #fitted = false;
  /** Whether what it would fill is not free, in a way that only the file knows. */
  #blocked = false;
  #values: { row: number; column: number; value: CellValue }[] = [];

  constructor(private readonly formulas: Formulas, private readonly book: Book, readonly sheet: SheetPart, row: number, column: number, private readonly file: FileFormula) {
    this.place = { sheet: sheet.name, row, column };
    this.fills = { sheet: sheet.name, area: file.area };
  }

  get reads(): SheetArea[] {
    return this.#translation.reads;
  }

  get readsAnything(): boolean {
    return this.#translation.readsAnything;
  }

  get callsFold(): boolean {
    return this.#translation.callsFold;
  }

  get neverComputed(): boolean {
    return this.sheet.cell(this.place.row, this.place.column)!.value === null;
  }

  /** Why it can't be computed here; null where it can. */
  get obstacle(): string | null {
    if (this.#obstacle === undefined) this.#obstacle = this.#findObstacle();
    return this.#obstacle;
  }

  translate(): void {
    this.#translation = toSheetFormula(this.book, this.file, this.place, { names: 'replace', spillOf: this.formulas.spillOf });
    this.#manner = this.file.kind === 'array' ? 'fixed' : this.file.kind === 'dynamic' || this.callsFold ? 'spill' : 'single';
  }

  readsSpillOf({ place }: Formula): boolean {
    return this.#translation.spills.some((one) => placeKey(one) === placeKey(place));
  }

  /** The cell for a round. */
  cell(value: CellValue): Cell {
    return this.#blocked ? { value: { error: '#SPILL!' } } : { value, formula: this.#fitted ? this.#fittedFormula() : this.#translation.formula };
  }

  /** Takes the result of a round. Returns whether it fills other cells now than before. */
  take(result: Sheet): boolean {
    const { row, column } = this.place;
    const at = (r: number, c: number): CellValue => result.cells[r]?.[c]?.value ?? null;
    const { spill } = result.cells[row]![column]!;
    const area = spill ? areaOf(row, column, spill) : singleCell(row, column);
    const before = this.fills.area;
    this.wantsAnotherRound = false;
    if (this.#manner === 'spill') {
      const blocked = this.#isBlocked(area);
      this.wantsAnotherRound = blocked && !this.#blocked;
      this.#blocked ||= blocked;
      this.fills.area = this.#blocked ? singleCell(row, column) : area;
    } else if (!this.#fitted && (!sameArea(area, this.file.area) || codeOf(at(row, column)) === '#SPILL!')) {
      this.#fitted = this.wantsAnotherRound = true;
    }
    this.#values = [];
    eachCell(this.fills.area, (r, c) => this.#values.push({ row: r, column: c, value: at(r, c) }));
    return !sameArea(before, this.fills.area);
  }

  /** Puts the result into the sheet. */
  store(): void {
    if (this.obstacle !== null) return;
    const { row, column } = this.place;
    const { area } = this.fills;
    const spills = !isSingle(area) || codeOf(this.#values[0]!.value) === '#SPILL!';
    if (this.file.kind === 'ordinary' && this.#manner === 'spill' && spills) {
      // As a spreadsheet program stores it when such a formula is entered.
      this.sheet.setFormula(row, column, { text: this.file.text, kind: 'dynamic', area });
    } else if (this.file.kind === 'dynamic' && !sameArea(area, this.file.area)) this.sheet.setFilledArea(row, column, area);
    for (const { row: r, column: c, value } of this.#values) this.sheet.setValue(r, c, value);
  }

  /** The errors that it shows, or that it could not be computed. */
  errors(): Recalculated['errors'] {
    if (this.obstacle !== null) return [{ ...this.#named(this.place), code: '', message: this.keptMessage }];
    return this.#values.flatMap(({ row, column, value }) => (isError(value)
      ? [{ ...this.#named({ row, column }), code: value.error, message: value.message ?? sentences[value.error] ?? sentences.other! }]
      : []));
  }

  kept(): Recalculated['kept'] {
    return this.obstacle === null ? [] : [{ ...this.#named(this.place), message: this.keptMessage }];
  }

  get keptMessage(): string {
    return `keeps what it had: ${this.obstacle}`;
  }

  #named({ row, column }: { row: number; column: number }): { sheet: string; address: string } {
    return { sheet: this.place.sheet, address: cellAddress(row, column) };
  }

  #fittedFormula(): string {
    const formula = this.#translation.formula.slice(1);
    const [rows, columns] = [rowsOf(this.file.area), columnsOf(this.file.area)];
    // An array formula repeats a row, a column or a value over its cells, and shows #N/A where its result ends.
    return isSingle(this.file.area) ? `=TAKE(${formula},1,1)` : `=TAKE(IF(SEQUENCE(${rows},${columns}),${formula}),${rows},${columns})`;
  }

  /** Merged cells and tables are not filled. */
  #isBlocked(area: Area): boolean {
    if (isSingle(area)) return false;
    const tables = this.book.tables.filter(({ sheet }) => sheet === this.place.sheet).map((table) => table.area);
    return [...this.sheet.merges, ...tables].some((one) => overlap(one, area));
  }

  #findObstacle(): string | null {
    const { formula, obstacle } = this.#translation;
    if (obstacle) return `it refers to ${obstacle}`;
    const [unknown] = this.formulas.unknownParts(formula);
    return unknown === undefined ? null : `${unknown} can't be computed here`;
  }
}

const codeOf = (value: CellValue): string | null => (isError(value) ? value.error : null);

/** What is said of an error that comes without a sentence of its own. */
const sentences: Record<string, string> = {
  '#SPILL!': 'Other cells stand where the result belongs.',
  '#NAME?': 'The formula holds a name or a function that is not known.',
  '#REF!': 'The formula refers to cells that are not there.',
  other: 'The error comes from a cell or a function that the formula uses.',
};

function report(book: Book, affected: Formula[]): Recalculated {
  const ours = affected.filter(({ callsFold }) => callsFold);
  const others = affected.filter(({ callsFold }) => !callsFold);
  const computedOn = (sheet: string, list: Formula[]) => list.filter(({ place, obstacle }) => place.sheet === sheet && obstacle === null).length;
  return {
    sheets: book.sheets.map(({ name }) => ({ name, fold: computedOn(name, ours), others: computedOn(name, others) })),
    errors: ours.flatMap((formula) => formula.errors()),
    kept: others.flatMap((formula) => formula.kept()),
  };
}
