// A workbook as plain data and as the embedded sheet keeps it.

import {
  type ICellData, type IStyleData, type IWorkbookData, type IWorksheetData, type Worksheet, BooleanNumber, LocaleType,
} from '@univerjs/core';
import { FormulaDataModel } from '@univerjs/engine-formula';
import type { Cell, Sheet, Style, Workbook } from '../port';
import { type CellRange, formatRange, parseReference } from './address';
import { cellData, plainValue } from './cell-values';
import { notesAndMarksData, plainNotesAndMarks } from './notes-and-marks';
import type { OpenWorkbook } from './open-workbook';
import { fromStyleData, toStyleData } from './style-data';

const DEFAULT_WIDTH = 64;
const DEFAULT_HEIGHT = 20;
/** Empty cells around what a sheet holds, so that the longest list a function gives fits below it. */
const SPARE_ROWS = 10_240;
const SPARE_COLUMNS = 26;

/** Names that the sheet keeps for a whole workbook. */
export const WHOLE_WORKBOOK = 'AllDefaultWorkbook';
const NAMES_RESOURCE = 'SHEET_DEFINED_NAME_PLUGIN';

// In

/** @param id must be new in this process: the formula engine remembers formulas by it */
export function toWorkbookData(workbook: Workbook, id: string): IWorkbookData {
  const styles = new StyleTable();
  const sheets = workbook.sheets.map((sheet, i) => worksheetData(sheet, `sheet-${i + 1}`, styles));
  const names = Object.entries(workbook.names).map(([name, formulaOrRefString], i) => ({
    id: `name-${i + 1}`, name, formulaOrRefString, localSheetId: WHOLE_WORKBOOK,
  }));
  return {
    id,
    name: '',
    appVersion: '',
    locale: LocaleType.EN_US,
    styles: styles.data,
    sheetOrder: sheets.map((sheet) => sheet.id!),
    sheets: Object.fromEntries(sheets.map((sheet) => [sheet.id!, sheet])),
    resources: [
      { name: NAMES_RESOURCE, data: JSON.stringify(Object.fromEntries(names.map((name) => [name.id, name]))) },
      ...notesAndMarksData(workbook.sheets.map((sheet, i) => [sheets[i]!.id!, sheet])),
    ],
  };
}

export const blankSheet = (id: string, name: string): Partial<IWorksheetData> =>
  worksheetData({ name, cells: {}, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } }, id, new StyleTable());

/** A sheet of the same workbook with all that is in the cells and about them. */
export function copyOfSheet({ injector }: OpenWorkbook, original: Worksheet, id: string, name: string): Partial<IWorksheetData> {
  const copy = structuredClone(original.getConfig());
  const formulas = injector.get(FormulaDataModel);
  for (const [row, line] of Object.entries(copy.cellData)) {
    for (const [column, cell] of Object.entries(line as Record<string, ICellData>)) {
      const formula = formulaAt(original, formulas, Number(row), Number(column));
      if (formula) Object.assign(cell, { f: formula, si: null }); // cells may share one formula
    }
  }
  return { ...copy, id, name };
}

function worksheetData(sheet: Sheet, id: string, styles: StyleTable): Partial<IWorksheetData> {
  const spilled = spilledCells(sheet);
  const data: Record<number, Record<number, ICellData>> = {};
  let lastRow = 0;
  let lastColumn = 0;
  for (const [row, column, cell] of cellsOf(sheet)) {
    (data[row] ??= {})[column] = {
      ...(cell.formula !== undefined ? { f: cell.formula } : spilled.has(`${row},${column}`) ? {} : cell.value === null ? {} : cellData(cell.value)),
      ...(cell.style && { s: styles.idOf(cell.style) }),
    };
    lastRow = Math.max(lastRow, row);
    lastColumn = Math.max(lastColumn, column);
  }
  const { rows, columns } = sheet.frozen;
  return {
    id,
    name: sheet.name,
    cellData: data,
    rowCount: lastRow + SPARE_ROWS,
    columnCount: lastColumn + SPARE_COLUMNS,
    defaultColumnWidth: DEFAULT_WIDTH,
    defaultRowHeight: DEFAULT_HEIGHT,
    columnData: mapIndexed(sheet.columns, ({ width, hidden }) => ({ ...(width !== undefined && { w: width }), hd: hidden ? BooleanNumber.TRUE : BooleanNumber.FALSE })),
    rowData: mapIndexed(sheet.rows, ({ height, hidden }) => ({
      ...(height !== undefined && { h: height, ia: BooleanNumber.FALSE }), hd: hidden ? BooleanNumber.TRUE : BooleanNumber.FALSE,
    })),
    mergeData: sheet.merges.map((merge) => parseReference(merge)!.range),
    freeze: { xSplit: columns, ySplit: rows, startRow: rows > 0 ? rows : -1, startColumn: columns > 0 ? columns : -1 },
  };
}

/** Each style once, however many cells have it. */
class StyleTable {
  readonly data: Record<string, IStyleData> = {};
  private readonly ids = new Map<string, string>();

  idOf(style: Style): string {
    const key = JSON.stringify(style);
    const known = this.ids.get(key);
    if (known !== undefined) return known;
    const id = `style-${this.ids.size + 1}`;
    this.ids.set(key, id);
    this.data[id] = toStyleData(style);
    return id;
  }
}

/** Cells that a formula fills beyond its own: they hold nothing of their own. */
function spilledCells(sheet: Sheet): Set<string> {
  const spilled = new Set<string>();
  for (const [row, column, { spill }] of cellsOf(sheet)) {
    if (!spill) continue;
    for (let r = 0; r < spill.rows; r++) for (let c = 0; c < spill.columns; c++) if (r > 0 || c > 0) spilled.add(`${row + r},${column + c}`);
  }
  return spilled;
}

export function* cellsOf(sheet: Sheet): Generator<[row: number, column: number, cell: Cell]> {
  for (const [row, line] of Object.entries(sheet.cells)) for (const [column, cell] of Object.entries(line)) yield [Number(row), Number(column), cell];
}

function mapIndexed<A, B>(entries: Record<number, A>, change: (entry: A) => B): Record<number, B> {
  return Object.fromEntries(Object.entries(entries).map(([index, entry]) => [index, change(entry)]));
}

// Out

export function fromWorkbook(workbook: OpenWorkbook): Workbook {
  return {
    sheets: workbook.sheets.map((sheet) => plainSheet(workbook, sheet)),
    names: Object.fromEntries(workbook.names().map(({ name, refersTo }) => [name, refersTo])),
  };
}

function plainSheet(workbook: OpenWorkbook, sheet: Worksheet): Sheet {
  const config = sheet.getConfig();
  const { xSplit, ySplit } = sheet.getFreeze();
  return {
    name: sheet.getName(),
    cells: plainCells(sheet, workbook.injector.get(FormulaDataModel)),
    columns: filterIndexed(config.columnData, ({ w, hd }) => ({ ...(w !== undefined && { width: w }), ...(hd && { hidden: true }) })),
    // A height that the sheet found for itself is no wish of the user.
    rows: filterIndexed(config.rowData, ({ h, ia, hd }) => ({ ...(ia === BooleanNumber.FALSE && { height: h }), ...(hd && { hidden: true }) })),
    merges: sheet.getMergeData().map(formatRange),
    frozen: { rows: Math.max(ySplit, 0), columns: Math.max(xSplit, 0) },
    ...plainNotesAndMarks(workbook, sheet),
  };
}

function plainCells(sheet: Worksheet, formulas: FormulaDataModel): Sheet['cells'] {
  const cells: Sheet['cells'] = {};
  const put = (row: number, column: number, cell: Partial<Cell>) => {
    const line = (cells[row] ??= {});
    line[column] = { value: null, ...line[column], ...cell };
  };
  sheet.getCellMatrix().forValue((row, column, data) => {
    const formula = formulaAt(sheet, formulas, row, column);
    const style = fromStyleData(sheet.getComposedCellStyle(row, column));
    const value = plainValue(data);
    if (value !== null || formula || style) put(row, column, { value, ...(formula && { formula }), ...(style && { style }) });
  });
  const filled = formulas.getArrayFormulaCellData()?.[sheet.getUnitId()]?.[sheet.getSheetId()];
  for (const { startRow, startColumn, endRow, endColumn } of spills(sheet, formulas)) {
    for (let r = startRow; r <= endRow; r++) for (let c = startColumn; c <= endColumn; c++) {
      if (r > startRow || c > startColumn) put(r, c, { value: plainValue(filled?.[r]?.[c]) });
    }
    cells[startRow]![startColumn]!.spill = { rows: endRow - startRow + 1, columns: endColumn - startColumn + 1 };
  }
  return cells;
}

export function formulaAt(sheet: Worksheet, formulas: FormulaDataModel, row: number, column: number): string | undefined {
  const cell = sheet.getCellMatrix().getValue(row, column);
  if (!cell?.f && !cell?.si) return undefined;
  return formulas.getFormulaStringByCell(row, column, sheet.getSheetId(), sheet.getUnitId()) ?? undefined;
}

/** The blocks that formulas of a sheet fill beyond their own cells. */
export function spills(sheet: Worksheet, formulas: FormulaDataModel): CellRange[] {
  const ranges = formulas.getArrayFormulaRange()?.[sheet.getUnitId()]?.[sheet.getSheetId()] ?? {};
  return Object.entries(ranges).flatMap(([row, line]) => Object.entries(line ?? {}).flatMap(([column, range]) => {
    const anchor = sheet.getCellMatrix().getValue(Number(row), Number(column));
    const blocked = anchor?.v === '#SPILL!';
    return range && !blocked && (anchor?.f || anchor?.si) ? [range as CellRange] : [];
  }));
}

/** Without the entries that say nothing. */
function filterIndexed<A, B extends object>(entries: Record<number, A | undefined>, change: (entry: A) => B): Record<number, B> {
  return Object.fromEntries(Object.entries(entries).flatMap(([index, entry]) => {
    const changed = entry && change(entry);
    return changed && Object.keys(changed).length > 0 ? [[index, changed]] : [];
  }));
}
