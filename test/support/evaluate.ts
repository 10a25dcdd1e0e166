// FOLD formulas of the played workbook, computed by the built functions.

import type { CellValue } from '../../src/host/port';
import { FunctionError, callFunction } from '../../src/host/sheet/functions-runtime';
import { built } from './built-functions';
import type { Evaluate } from './played-excel/formula-model';

export const evaluate: Evaluate = (name, args) => {
  const given = args.map((rows) => rows && rows.map((row) => row.map((one) => (typeof one === 'object' && one ? { code: one.error } : one))));
  const { parameters } = built.metadata.find(({ id }) => id === name)!;
  return callFunction(built.implementations.get(name)!, parameters, given).map((row) => row.map(cell));
};

const cell = (value: unknown): CellValue => (value instanceof FunctionError ? { error: value.code } : (value as CellValue));
