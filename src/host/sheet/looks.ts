// How cells look: number formats, weight, widths, notes, and marks on numbers below 0.

import { type IStyleData, BooleanNumber } from '@univerjs/core';
import { SetColDataMutation, SetColDataMutationFactory, SetRangeValuesCommand } from '@univerjs/sheets';
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
  if (Object.keys(style).length > 0) setStyle(step, place, style);
  if (width !== undefined) setWidth(step, workbook, place, width);
  if (note !== undefined) setNote(step, workbook, place, note);
  if (marksNegative !== undefined) markNegative(step, workbook, place, marksNegative);
}

function setStyle(step: Step, { sheet, range }: Found, style: IStyleData): void {
  const value = Array.from({ length: range.endRow - range.startRow + 1 }, () => Array.from({ length: range.endColumn - range.startColumn + 1 }, () => ({ s: style })));
  step.run(SetRangeValuesCommand, { subUnitId: sheet.getSheetId(), range, value });
}

/** The sheet's own command forgets which columns had no width of their own. */
function setWidth(step: Step, { id: unitId }: OpenWorkbook, { sheet, range }: Found, width: number): void {
  const columnData: Record<number, { w: number }> = {};
  for (let column = range.startColumn; column <= range.endColumn; column++) columnData[column] = { w: width };
  const params = { unitId, subUnitId: sheet.getSheetId(), columnData };
  step.apply({ id: SetColDataMutation.id, params }, { id: SetColDataMutation.id, params: SetColDataMutationFactory(params, sheet) });
}
