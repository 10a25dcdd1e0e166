// A change of the port, as one step of the embedded sheet's undo.

import { type ICellData, generateRandomId } from '@univerjs/core';
import {
  InsertDefinedNameCommand, InsertSheetCommand, RemoveDefinedNameCommand, SetDefinedNameCommand, SetRangeValuesCommand, SetWorksheetColumnCountCommand,
  SetWorksheetRowCountCommand,
} from '@univerjs/sheets';
import type { CellInput, Change } from '../port';
import type { CellRange } from './address';
import { cellData } from './cell-values';
import { setLook } from './looks';
import { copyNotesAndMarks } from './notes-and-marks';
import type { Found, OpenWorkbook } from './open-workbook';
import { faults } from './sheet-faults';
import { Step } from './step';
import { WHOLE_WORKBOOK, blankSheet, copyOfSheet } from './workbook-data';

/**
 * All of it or nothing.
 * @returns takes it back, as long as what it wrote is still there
 */
export function makeChange(workbook: OpenWorkbook, change: Change): () => void {
  const { sheets = [], tableColumns = [], cells = [], looks = [], names = {} } = change;
  if (tableColumns.length > 0) throw faults.noTables(tableColumns[0]!.table);
  if (sheets.length + cells.length + looks.length + Object.keys(names).length === 0) return () => {};
  const places: Place[] = [];
  const place = (reference: string): Place => {
    const found = workbook.find(reference);
    if (!found) throw faults.unknown(reference);
    return { reference, ...found };
  };
  const step = Step.of(workbook.injector, workbook.id, (running) => {
    for (const sheet of sheets) addSheet(running, workbook, sheet);
    for (const { reference, cells: rows } of cells) {
      const written = place(reference);
      writeCells(running, written, rows);
      places.push(written);
    }
    for (const { reference, look } of looks) setLook(running, workbook, place(reference), look);
    for (const [name, refersTo] of Object.entries(names)) setName(running, workbook, name, refersTo);
  });
  places.push(...sheets.map(({ name }) => wholeSheet(workbook, name)));
  const contents = places.map((one) => contentsOf(workbook, one));
  const named = Object.keys(names).map((name) => refersTo(workbook, name));
  return () => {
    for (const [i, one] of places.entries()) if (contentsOf(workbook, one) !== contents[i]) throw faults.changedSince(one.reference);
    for (const [i, name] of Object.keys(names).entries()) if (refersTo(workbook, name) !== named[i]) throw faults.changedSince(name);
    step.undo();
  };
}

// The parts of a change

function addSheet(step: Step, workbook: OpenWorkbook, { name, copyOf }: NonNullable<Change['sheets']>[number]): void {
  if (!/^[^[\]:*?/\\]{1,31}$/.test(name) || /^'|'$/.test(name)) throw faults.sheetName(name);
  if (workbook.sheetNamed(name)) throw faults.sheetExists(name);
  const original = copyOf === undefined ? undefined : workbook.sheetNamed(copyOf);
  if (copyOf !== undefined && !original) throw faults.unknown(copyOf);
  const id = generateRandomId();
  step.run(InsertSheetCommand, { index: workbook.sheets.length, sheet: original ? copyOfSheet(workbook, original, id, name) : blankSheet(id, name) }, `a sheet called ${name}`);
  if (original) copyNotesAndMarks(step, workbook, original, id);
}

function writeCells(step: Step, { reference, sheet, range }: Place, cells: CellInput[][]): void {
  const rows = range.endRow - range.startRow + 1;
  const columns = range.endColumn - range.startColumn + 1;
  const other = cells.find((row) => row.length !== columns);
  if (cells.length !== rows || other) throw faults.otherSize(reference, `${rows} × ${columns}`, `${cells.length} × ${other?.length ?? cells[0]?.length ?? 0}`);
  for (const cell of cells.flat()) if (typeof cell === 'number' && !Number.isFinite(cell)) throw faults.notWritable(reference, cell);
  const target = { subUnitId: sheet.getSheetId() };
  if (range.endRow >= sheet.getRowCount()) step.run(SetWorksheetRowCountCommand, { ...target, rowCount: range.endRow + 1 });
  if (range.endColumn >= sheet.getColumnCount()) step.run(SetWorksheetColumnCountCommand, { ...target, columnCount: range.endColumn + 1 });
  step.run(SetRangeValuesCommand, { ...target, range, value: cells.map((row) => row.map(inputData)) });
}

function inputData(input: CellInput): ICellData {
  const empty = { f: null, si: null, p: null };
  if (typeof input === 'object' && input !== null) return { ...empty, f: input.formula, v: null };
  return { ...empty, ...cellData(input === '' ? null : input) };
}

function setName(step: Step, workbook: OpenWorkbook, name: string, refersToNow: string | null): void {
  const known = definedName(workbook, name);
  if (refersToNow === null) {
    if (known) step.run(RemoveDefinedNameCommand, { id: known.id, name: known.name, formulaOrRefString: known.refersTo, localSheetId: WHOLE_WORKBOOK }, name);
    return;
  }
  const params = { id: known?.id ?? generateRandomId(), name: known?.name ?? name, formulaOrRefString: refersToNow, localSheetId: WHOLE_WORKBOOK };
  step.run(known ? SetDefinedNameCommand : InsertDefinedNameCommand, params, name);
}

const definedName = (workbook: OpenWorkbook, name: string) => workbook.names().find((one) => one.name.toLowerCase() === name.toLowerCase());

const refersTo = (workbook: OpenWorkbook, name: string): string | undefined => definedName(workbook, name)?.refersTo;

// What a change left behind

interface Place extends Found {
  reference: string;
}

function wholeSheet(workbook: OpenWorkbook, name: string): Place {
  const sheet = workbook.sheetNamed(name)!;
  const range: CellRange = { startRow: 0, startColumn: 0, endRow: sheet.getRowCount() - 1, endColumn: sheet.getColumnCount() - 1 };
  return { reference: name, sheet, range };
}

/** What the cells themselves hold, as text; results of formulas are not among it. */
function contentsOf(workbook: OpenWorkbook, { sheet, range }: Found): string {
  if (!workbook.sheets.includes(sheet)) return 'gone';
  const { startRow, startColumn, endRow, endColumn } = range;
  const held: unknown[] = [];
  sheet.getCellMatrix().forValue((row, column, cell) => {
    if (row < startRow || row > endRow || column < startColumn || column > endColumn) return;
    const formula = workbook.formulaAt(sheet, row, column);
    if (formula !== null || (cell?.v ?? null) !== null) held.push([row, column, formula ?? cell!.v]);
  });
  return JSON.stringify(held);
}
