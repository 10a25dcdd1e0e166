// The port over a live workbook of the embedded sheet, with a window or without.

import {
  type ICellData, type IDisposable, type Univer, type Workbook as UniverWorkbook, type Worksheet, ICommandService, IUndoRedoService,
  IUniverInstanceService, UniverInstanceType, generateRandomId,
} from '@univerjs/core';
import { FORMULA_REF_TO_ARRAY_CACHE, FormulaDataModel, ICalculateFormulaService, IDefinedNamesService } from '@univerjs/engine-formula';
import { SetRangeValuesCommand, SetWorksheetColumnCountCommand, SetWorksheetRowCountCommand, SheetsSelectionsService } from '@univerjs/sheets';
import { FormulaCalculationSessionService } from '@univerjs/sheets-formula';
import { type Block, type CellError, type CellInput, type CellValue, type Host, type Workbook, HostFault } from '../port';
import { type CellRange, formatCell, formatRange, parseReference } from './address';
import { cellData, plainValue } from './cell-values';
import { FunctionError, NAMESPACE } from './functions-runtime';
import { Recalculation } from './recalculation';
import type { Listener } from './univer-functions';
import { formulaAt, fromWorkbook, spills, toWorkbookData } from './workbook-data';

export class SheetHost implements Host {
  private workbook: UniverWorkbook | null = null;
  private calculation: Recalculation | null = null;

  /**
   * Load a workbook before anything else.
   * @param listener the one that the functions of this sheet were made with
   */
  constructor(readonly univer: Univer, private readonly listener: Listener) {}

  // The port

  async read(reference: string): Promise<Block | null> {
    const place = this.find(reference);
    return place && this.readCells(place.sheet, place.range);
  }

  async write(reference: string, cells: CellInput[][]): Promise<void> {
    const place = this.find(reference);
    if (!place) throw new HostFault(`The workbook has no name, sheet or cells called ${reference}.`);
    const { sheet, range } = place;
    const rows = range.endRow - range.startRow + 1;
    const columns = range.endColumn - range.startColumn + 1;
    const other = cells.find((row) => row.length !== columns);
    if (cells.length !== rows || other) {
      throw new HostFault(`${reference} has ${rows} × ${columns} cells; got ${cells.length} × ${other?.length ?? cells[0]?.length ?? 0}.`);
    }
    const target = { unitId: sheet.getUnitId(), subUnitId: sheet.getSheetId() };
    this.inOneStep(() => {
      if (range.endRow >= sheet.getRowCount()) this.run(SetWorksheetRowCountCommand.id, { ...target, rowCount: range.endRow + 1 });
      if (range.endColumn >= sheet.getColumnCount()) this.run(SetWorksheetColumnCountCommand.id, { ...target, columnCount: range.endColumn + 1 });
      this.run(SetRangeValuesCommand.id, { ...target, range, value: cells.map((row) => row.map(inputData)) });
    });
  }

  async onRecalculated(listener: () => void): Promise<() => Promise<void>> {
    const stop = this.recalculation.onDone(listener);
    return async () => stop();
  }

  // The workbook as a whole

  /**
   * Takes the place of the workbook that was open, and resolves when every formula is computed.
   * @param onProgress told how many formulas are computed, and of how many
   */
  async load(workbook: Workbook, onProgress: (done: number, total: number) => void = () => {}): Promise<void> {
    const data = toWorkbookData(workbook, generateRandomId());
    if (this.workbook) {
      await this.recalculation.idle(); // of a workbook that is gone, nothing can be computed
      this.get(IUniverInstanceService).disposeUnit(this.workbook.getUnitId());
    }
    this.workbook = this.univer.createUnit<object, UniverWorkbook>(UniverInstanceType.UNIVER_SHEET, data);
    this.recalculation.opened();
    const stop = this.recalculation.onProgress(onProgress);
    await this.settled();
    stop();
  }

  save(): Workbook {
    return fromWorkbook(this.open, this.get(FormulaDataModel), this.get(IDefinedNamesService));
  }

  /** Resolves when nothing is left to compute. */
  settled(): Promise<void> {
    return this.recalculation.settled();
  }

  /** Calls `listener` after every change that a user or a write makes, until the returned function is called. */
  onEdited(listener: () => void): () => void {
    const subscription = this.get(ICommandService).onMutationExecutedForCollab(({ params }, options) => {
      const ofWorkbook = (params as { unitId?: string } | undefined)?.unitId === this.open.getUnitId(); // not of the text in the cell editor
      if (ofWorkbook && !options?.onlyLocal) listener(); // results of formulas stay local
    });
    return () => subscription.dispose();
  }

  /** Calls `listener` after another cell is selected, until the returned function is called. */
  onSelected(listener: () => void): () => void {
    const subscription = this.get(SheetsSelectionsService).selectionChanged$.subscribe(() => listener());
    return () => subscription.unsubscribe();
  }

  /** The cell that the user is at, as the port reads it; null where there is none. */
  selectedCell(): Promise<Block | null> {
    const primary = this.get(SheetsSelectionsService).getCurrentLastSelection()?.primary;
    if (!primary) return Promise.resolve(null);
    const { actualRow: row, actualColumn: column } = primary;
    return this.readCells(this.open.getActiveSheet(), { startRow: row, endRow: row, startColumn: column, endColumn: column });
  }

  /** Sentences behind the errors of cells of a sheet, for those that a function of ours gave. */
  async sentencesOf(sheetName: string, cells: { row: number; column: number }[]): Promise<PlacedSentence[]> {
    const sheet = this.sheetNamed(sheetName);
    if (!sheet) return [];
    return this.sentences(sheet, cells.flatMap(({ row, column }) => {
      const [[value]] = this.values(sheet, { startRow: row, endRow: row, startColumn: column, endColumn: column }) as [[CellValue]];
      return isError(value) ? [{ row, column, code: value.error }] : [];
    }));
  }

  dispose(): void {
    this.univer.dispose();
  }

  // Reading

  private get open(): UniverWorkbook {
    if (!this.workbook) throw new Error('No workbook is loaded.');
    return this.workbook;
  }

  private async readCells(sheet: Worksheet, range: CellRange): Promise<Block> {
    const values = this.values(sheet, range);
    const sentences = await this.sentences(sheet, errorsIn(values, range));
    for (const { row, column, sentence } of sentences) (values[row - range.startRow]![column - range.startColumn] as CellError).message = sentence;
    return { sheet: sheet.getName(), address: formatRange(range), values };
  }

  private find(reference: string): { sheet: Worksheet; range: CellRange } | null {
    const named = this.get(IDefinedNamesService).getValueByName(this.open.getUnitId(), reference.trim());
    const parsed = parseReference(named ? named.formulaOrRefString.replace(/^=/, '') : reference);
    if (!parsed || (named && parsed.sheet === null)) return null;
    const sheet = parsed.sheet === null ? this.open.getActiveSheet() : this.sheetNamed(parsed.sheet);
    return sheet ? { sheet, range: parsed.range } : null;
  }

  private sheetNamed(name: string): Worksheet | undefined {
    return this.open.getSheets().find((sheet) => sheet.getName().toLowerCase() === name.toLowerCase());
  }

  private values(sheet: Worksheet, range: CellRange): CellValue[][] {
    const cells = sheet.getCellMatrix();
    const spilled = this.get(FormulaDataModel).getArrayFormulaCellData()?.[sheet.getUnitId()]?.[sheet.getSheetId()];
    const rows: CellValue[][] = [];
    for (let r = range.startRow; r <= range.endRow; r++) {
      const row: CellValue[] = [];
      for (let c = range.startColumn; c <= range.endColumn; c++) {
        const own = cells.getValue(r, c);
        row.push(own?.f || own?.si ? plainValue(own) : plainValue(own) ?? plainValue(spilled?.[r]?.[c]));
      }
      rows.push(row);
    }
    return rows;
  }

  /**
   * The sheet keeps only the codes of errors, so the formulas behind them are computed once more while someone listens: what is told is
   * always what the formula says now.
   */
  private async sentences(sheet: Worksheet, errors: PlacedError[]): Promise<PlacedSentence[]> {
    if (errors.length === 0) return [];
    await this.recalculation.idle();
    const formulas = this.get(FormulaDataModel);
    const blocks = spills(sheet, formulas);
    const anchored = errors.map((error) => {
      const block = blocks.find((one) => holds(one, error));
      return { ...error, anchorRow: block?.startRow ?? error.row, anchorColumn: block?.startColumn ?? error.column };
    });
    const behind: Record<number, Record<number, string[]>> = {};
    for (const { anchorRow, anchorColumn } of anchored) {
      const formula = formulaAt(sheet, formulas, anchorRow, anchorColumn);
      if (formula?.toUpperCase().includes(`${NAMESPACE}.`)) (behind[anchorRow] ??= {})[anchorColumn] = [formula];
    }
    const heard = await this.listenTo(sheet, behind);
    return anchored.flatMap(({ row, column, code, anchorRow, anchorColumn }) => {
      const sentence = sentenceFor(code, heard.get(formatCell(anchorRow, anchorColumn)) ?? [], row - anchorRow, column - anchorColumn);
      return sentence === undefined ? [] : [{ row, column, sentence }];
    });
  }

  /** What our functions return while formulas are computed, by cell, in the order in which they do. */
  private async listenTo(sheet: Worksheet, formulas: Record<number, Record<number, string[]>>): Promise<Map<string, unknown[][][]>> {
    const heard = new Map<string, unknown[][][]>();
    this.listener.heard = (rows, row, column) => {
      const cell = formatCell(row, column);
      heard.set(cell, [...heard.get(cell) ?? [], rows]);
    };
    try {
      await this.get(ICalculateFormulaService).executeFormulas({ [sheet.getUnitId()]: { [sheet.getSheetId()]: formulas } });
    } finally {
      this.listener.heard = null;
      FORMULA_REF_TO_ARRAY_CACHE.clear(); // else the next recalculation would find the values of this one
    }
    return heard;
  }

  // Univer's services

  /** Univer's services for sheets exist once there is a sheet. */
  private get recalculation(): Recalculation {
    if (!this.calculation) {
      const calculation = new Recalculation(this.get(FormulaCalculationSessionService), this.get(FormulaDataModel), this.get(ICommandService));
      this.calculation = calculation;
      this.onEdited(() => calculation.changed());
    }
    return this.calculation;
  }

  private get get() {
    const injector = this.univer.__getInjector();
    return injector.get.bind(injector);
  }

  private run(command: string, params: object): void {
    if (!this.get(ICommandService).syncExecuteCommand(command, params)) throw new HostFault('The sheet did not accept the cells.');
  }

  private inOneStep(change: () => void): void {
    const batch: IDisposable = this.get(IUndoRedoService).__tempBatchingUndoRedo(this.open.getUnitId());
    try {
      change();
    } finally {
      batch.dispose();
    }
  }
}

interface PlacedError {
  row: number;
  column: number;
  code: string;
}

export interface PlacedSentence {
  row: number;
  column: number;
  sentence: string;
}

const isError = (value: CellValue): value is CellError => typeof value === 'object' && value !== null;

function errorsIn(values: CellValue[][], { startRow, startColumn }: CellRange): PlacedError[] {
  return values.flatMap((line, r) => line.flatMap((value, c) => (isError(value) ? [{ row: startRow + r, column: startColumn + c, code: value.error }] : [])));
}

const holds = (range: CellRange, { row, column }: { row: number; column: number }): boolean =>
  row >= range.startRow && row <= range.endRow && column >= range.startColumn && column <= range.endColumn;

/** The last function called is the outermost; one inside may have given the error that it passed on. */
function sentenceFor(code: string, heard: unknown[][][], row: number, column: number): string | undefined {
  for (const rows of heard.toReversed()) {
    const cell = rows.length === 1 && rows[0]!.length === 1 ? rows[0]![0] : rows[row]?.[column];
    if (cell instanceof FunctionError && cell.code === code && cell.message) return cell.message;
  }
  return undefined;
}

function inputData(input: CellInput): ICellData {
  const empty = { f: null, si: null, p: null };
  if (typeof input === 'object' && input !== null) return { ...empty, f: input.formula, v: null };
  return { ...empty, ...cellData(input === '' ? null : input) };
}
