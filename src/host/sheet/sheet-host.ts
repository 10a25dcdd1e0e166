// The port over a live workbook of the embedded sheet, with a window or without.

import {
  type IRange, type Univer, type Workbook as UniverWorkbook, type Worksheet, ICommandService, IUniverInstanceService, UniverInstanceType, generateRandomId,
} from '@univerjs/core';
import { FormulaDataModel } from '@univerjs/engine-formula';
import {
  ScrollToCellOperation, SelectionMoveType, SetSelectionsOperation, SetWorksheetActiveOperation, SheetsSelectionsService, getPrimaryForRange,
} from '@univerjs/sheets';
import type { Block, CellError, CellInput, CellValue, Change, FormulaBlock, LiveHost, Place, Table, Workbook } from '../port';
import { type CellRange, formatRange } from './address';
import { makeChange } from './changes';
import { type PlacedError, type PlacedSentence, errorSentences } from './error-sentences';
import { type Found, OpenWorkbook } from './open-workbook';
import { Recalculation } from './recalculation';
import { cannotAddPicture, faults } from './sheet-faults';
import type { Listener } from './univer-functions';
import { fromWorkbook, spills, toWorkbookData } from './workbook-data';

export class SheetHost implements LiveHost {
  readonly cannot = { addPicture: cannotAddPicture };

  private workbook: OpenWorkbook | null = null;
  private calculation: Recalculation | null = null;

  /**
   * Load a workbook before anything else.
   * @param listener the one that the functions of this sheet were made with
   */
  constructor(readonly univer: Univer, private readonly listener: Listener) {}

  // What is there

  async read(reference: string): Promise<Block | null> {
    const found = this.open.find(reference);
    return found && this.block(found);
  }

  async formulas(reference: string): Promise<FormulaBlock | null> {
    const found = this.open.find(reference);
    return found && { ...placeOf(found), formulas: this.open.formulasOf(found) };
  }

  async spills(sheet: string): Promise<string[]> {
    const found = this.open.sheetNamed(sheet);
    return found ? spills(found, this.get(FormulaDataModel)).map(formatRange) : [];
  }

  async surroundings(reference: string): Promise<Block | null> {
    const found = this.open.find(reference);
    const range = found && this.open.surroundings(found);
    return range && this.block({ sheet: found.sheet, range });
  }

  async sheets(): Promise<Place[]> {
    return this.open.sheets.map((sheet) => {
      const range = this.open.used(sheet);
      return range ? placeOf({ sheet, range }) : { sheet: sheet.getName(), address: '' };
    });
  }

  async tables(): Promise<Table[]> {
    return [];
  }

  async names(): Promise<Record<string, string>> {
    return Object.fromEntries(this.open.names().map(({ name, refersTo }) => [name, refersTo]));
  }

  // What the user is at

  async selection(): Promise<Place | null> {
    const range = this.get(SheetsSelectionsService).getCurrentLastSelection()?.range;
    const sheet = this.open.unit.getActiveSheet();
    return range ? placeOf({ sheet, range: withinSheet(sheet, range) }) : null;
  }

  async select(reference: string): Promise<void> {
    const found = this.open.find(reference);
    if (!found) throw faults.unknown(reference);
    const { sheet, range } = found;
    const target = { unitId: this.open.id, subUnitId: sheet.getSheetId() };
    const commands = this.get(ICommandService);
    commands.syncExecuteCommand(SetWorksheetActiveOperation.id, target);
    commands.syncExecuteCommand(SetSelectionsOperation.id, {
      ...target, selections: [{ range, primary: getPrimaryForRange(range, sheet), style: null }], type: SelectionMoveType.MOVE_END,
    });
    commands.syncExecuteCommand(ScrollToCellOperation.id, { ...target, range });
  }

  async onSelected(listener: () => void): Promise<() => Promise<void>> {
    const subscription = this.get(SheetsSelectionsService).selectionChanged$.subscribe(() => listener());
    return async () => subscription.unsubscribe();
  }

  async onEdited(listener: () => void): Promise<() => Promise<void>> {
    const stop = this.followEdits(listener);
    return async () => stop();
  }

  async onRecalculated(listener: () => void): Promise<() => Promise<void>> {
    const stop = this.recalculation.onDone(listener);
    return async () => stop();
  }

  // Changes

  async write(reference: string, cells: CellInput[][]): Promise<void> {
    makeChange(this.open, { cells: [{ reference, cells }] });
  }

  async change(change: Change): Promise<() => Promise<void>> {
    const undo = makeChange(this.open, change);
    return async () => undo();
  }

  async addPicture(): Promise<void> {
    throw faults.noPictures();
  }

  /** The functions are part of the workbench. */
  async startWithWorkbook(): Promise<void> {}

  // The workbook as a whole

  /**
   * Takes the place of the workbook that was open, and resolves when every formula is computed.
   * @param onProgress told how many formulas are computed, and of how many
   */
  async load(workbook: Workbook, onProgress: (done: number, total: number) => void = () => {}): Promise<void> {
    const data = toWorkbookData(workbook, generateRandomId());
    if (this.workbook) {
      await this.recalculation.idle(); // of a workbook that is gone, nothing can be computed
      this.get(IUniverInstanceService).disposeUnit(this.workbook.id);
    }
    const unit = this.univer.createUnit<object, UniverWorkbook>(UniverInstanceType.UNIVER_SHEET, data);
    this.workbook = new OpenWorkbook(unit, this.univer.__getInjector());
    this.recalculation.opened();
    const stop = this.recalculation.onProgress(onProgress);
    await this.settled();
    stop();
  }

  save(): Workbook {
    return fromWorkbook(this.open);
  }

  /** Resolves when nothing is left to compute. */
  settled(): Promise<void> {
    return this.recalculation.settled();
  }

  /** The cell that the user is at, as the port reads it; null where there is none. */
  selectedCell(): Promise<Block | null> {
    const primary = this.get(SheetsSelectionsService).getCurrentLastSelection()?.primary;
    if (!primary) return Promise.resolve(null);
    const { actualRow: row, actualColumn: column } = primary;
    return this.block({ sheet: this.open.unit.getActiveSheet(), range: { startRow: row, endRow: row, startColumn: column, endColumn: column } });
  }

  /** Sentences behind the errors of cells of a sheet, for those that a function of ours gave. */
  async sentencesOf(sheetName: string, cells: { row: number; column: number }[]): Promise<PlacedSentence[]> {
    const sheet = this.open.sheetNamed(sheetName);
    if (!sheet) return [];
    return this.sentences(sheet, cells.flatMap(({ row, column }) => {
      const [[value]] = this.open.values({ sheet, range: { startRow: row, endRow: row, startColumn: column, endColumn: column } }) as [[CellValue]];
      return isError(value) ? [{ row, column, code: value.error }] : [];
    }));
  }

  dispose(): void {
    this.univer.dispose();
  }

  // Below the port

  private get open(): OpenWorkbook {
    if (!this.workbook) throw new Error('No workbook is loaded.');
    return this.workbook;
  }

  private async block(found: Found): Promise<Block> {
    const values = this.open.values(found);
    const { startRow, startColumn } = found.range;
    const sentences = await this.sentences(found.sheet, errorsIn(values, found.range));
    for (const { row, column, sentence } of sentences) (values[row - startRow]![column - startColumn] as CellError).message = sentence;
    return { ...placeOf(found), values };
  }

  private async sentences(sheet: Worksheet, errors: PlacedError[]): Promise<PlacedSentence[]> {
    if (errors.length === 0) return [];
    await this.recalculation.idle();
    return errorSentences(this.open, this.listener, sheet, errors);
  }

  private followEdits(listener: () => void): () => void {
    const subscription = this.get(ICommandService).onMutationExecutedForCollab(({ params }, options) => {
      const ofWorkbook = (params as { unitId?: string } | undefined)?.unitId === this.open.id; // not of the text in the cell editor
      if (ofWorkbook && !options?.onlyLocal) listener(); // results of formulas stay local
    });
    return () => subscription.dispose();
  }

  /** Univer's services for sheets exist once there is a sheet. */
  private get recalculation(): Recalculation {
    if (!this.calculation) {
      const calculation = new Recalculation(this.get(FormulaDataModel), this.get(ICommandService));
      this.calculation = calculation;
      this.followEdits(() => calculation.changed());
    }
    return this.calculation;
  }

  private get get() {
    const injector = this.univer.__getInjector();
    return injector.get.bind(injector);
  }
}

const placeOf = ({ sheet, range }: Found): Place => ({ sheet: sheet.getName(), address: formatRange(range) });

/** Of whole rows and columns, the sheet leaves out where they end. */
function withinSheet(sheet: Worksheet, { startRow, startColumn, endRow, endColumn }: Readonly<IRange>): CellRange {
  const known = (index: number, otherwise: number) => (Number.isNaN(index) ? otherwise : index);
  return {
    startRow: known(startRow, 0), startColumn: known(startColumn, 0), endRow: known(endRow, sheet.getRowCount() - 1), endColumn: known(endColumn, sheet.getColumnCount() - 1),
  };
}

const isError = (value: CellValue): value is CellError => typeof value === 'object' && value !== null;

function errorsIn(values: CellValue[][], { startRow, startColumn }: CellRange): PlacedError[] {
  return values.flatMap((line, r) => line.flatMap((value, c) => (isError(value) ? [{ row: startRow + r, column: startColumn + c, code: value.error }] : [])));
}
