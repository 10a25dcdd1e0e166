// What a cell of the embedded sheet holds, in the words of the port, and back. Numbers stay the doubles they are: the sheet's own
// getters round to 12 digits and give booleans as 1 and 0.

import { type ICellData, type Nullable, CellValueType } from '@univerjs/core';
import { ErrorType } from '@univerjs/engine-formula';
import type { CellValue } from '../port';

/** The value of a cell; "" where a formula gave a blank. */
export function plainValue(cell: Nullable<ICellData>): CellValue {
  if (!cell) return null;
  const { v, t, p } = cell;
  if (v === null || v === undefined) return p?.body ? p.body.dataStream.replace(/\r\n$/, '') : null;
  switch (t) {
    case CellValueType.NUMBER: return Number(v);
    case CellValueType.BOOLEAN: return v === true || v === 1 || /^(true|1)$/i.test(String(v));
    case CellValueType.FORCE_STRING: return String(v);
    default: return typeof v === 'string' && ERROR_CODES.has(v) ? { error: v } : v;
  }
}

/** A cell that holds a value, as the sheet stores it. */
export function cellData(value: CellValue): ICellData {
  if (value === null) return { v: null, t: null };
  switch (typeof value) {
    case 'number': return { v: value, t: CellValueType.NUMBER };
    case 'boolean': return { v: value ? 1 : 0, t: CellValueType.BOOLEAN };
    case 'string': return { v: value, t: LOOKS_LIKE_SOMETHING_ELSE.test(value) ? CellValueType.FORCE_STRING : CellValueType.STRING };
    default: return { v: value.error, t: CellValueType.STRING };
  }
}

const ERROR_CODES = new Set<string>(Object.values(ErrorType));

/** Text that the sheet would read as a formula, a number, a date, a truth value or an error when someone edits the cell. */
const LOOKS_LIKE_SOMETHING_ELSE = /^\s*(['=+\-@#\d.,$€£¥%(]|true\s*$|false\s*$)|\d/i;
