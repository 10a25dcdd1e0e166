// How cells look: number formats, weight, widths, notes, and marks on numbers below 0.

import { type ICellData, type IStyleData, BooleanNumber, ObjectMatrix } from '@univerjs/core';
import {
  SetColDataMutation, SetColDataMutationFactory, SetRangeValuesMutation, SetRangeValuesUndoMutationFactory, SetStyleCommand,
} from '@univerjs/sheets';
import type { Look } from '../port';
import { markNegative, setNote } from './notes-and-marks';
import type { Found, OpenWorkbook } from './open-workbook';
import type { Step } from './step';

export function setLook(step: Step, workbook: OpenWorkbook, place: Found, look: Look): void {
  const { numberFormat, bold, width, note, marksNegative } = look;
  const style: IStyleData = {
    ...(numberFormat !== undefined && { n: { pattern: numberFormat } }),
    ...(bold !== undefined && { bl: bold ? BooleanNumber.TRUE : BooleanNumber.FALSE }),
  };
  if (Object.keys(style).length > 0) setStyle(step, workbook, place, style);
  if (width !== undefined) setWidth(step, workbook, place, width);
  if (note !== undefined) setNote(step, workbook, place, note);
  if (marksNegative !== undefined) markNegative(step, workbook, place, marksNegative);
}

/** As the sheet's own command does it, which sets one property at a time: the mutation says that no formula has changed. */
function setStyle(step: Step, { id: unitId, injector }: OpenWorkbook, { sheet, range }: Found, style: IStyleData): void {
  const held = sheet.getCellMatrix();
  const keepType = (row: number, column: number) => ({ t: held.getValue(row, column)?.t }); // else a format for text would make text of numbers
  const cells = new ObjectMatrix<ICellData>();
  for (let r = range.startRow; r <= range.endRow; r++) for (let c = range.startColumn; c <= range.endColumn; c++) cells.setValue(r, c, { ...keepType(r, c), s: style });
  const params = { unitId, subUnitId: sheet.getSheetId(), trigger: SetStyleCommand.id, cellValue: cells.getMatrix() };
  const before = new ObjectMatrix<ICellData>();
  new ObjectMatrix(SetRangeValuesUndoMutationFactory(injector, params).cellValue).forValue((row, column, cell) => {
    before.setValue(row, column, { ...keepType(row, column), s: cell?.s ?? null }); // not the value, which may be computed anew by then
  });
  step.apply({ id: SetRangeValuesMutation.id, params }, { id: SetRangeValuesMutation.id, params: { ...params, cellValue: before.getMatrix() } });
}

/** The sheet's own command forgets which columns had no width of their own. */
function setWidth(step: Step, { id: unitId }: OpenWorkbook, { sheet, range }: Found, width: number): void {
  const columnData: Record<number, { w: number }> = {};
  for (let column = range.startColumn; column <= range.endColumn; column++) columnData[column] = { w: width };
  const params = { unitId, subUnitId: sheet.getSheetId(), columnData };
  step.apply({ id: SetColDataMutation.id, params }, { id: SetColDataMutation.id, params: SetColDataMutationFactory(params, sheet) });
}
