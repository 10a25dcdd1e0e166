// Our worksheet functions as functions of the embedded sheet, made from functions.json and the built bundle alone.
//
// Univer calls them through `calculate`, not through its `registerFunction`, which reads text results again ("1-2" would become a date).

import { type ICellData, type Nullable, BooleanNumber } from '@univerjs/core';
import {
  type BaseReferenceObject, type BaseValueObject, type FunctionVariantType, type IFunctionInfo, ArrayValueObject, BaseFunction, BooleanValueObject,
  ErrorType, ErrorValueObject, FunctionType, NumberValueObject, StringValueObject,
} from '@univerjs/engine-formula';
import { type Argument, type FunctionMetadata, type Implementation, type WorksheetFunctions, FunctionError, NAMESPACE, callFunction } from './functions-runtime';
import { plainValue } from './cell-values';

/** Notes what the functions return while someone listens: the sheet keeps the codes of errors, but not their sentences. */
export interface Listener {
  /** Called with the rows that a function returned and the cell whose formula called it; null while nobody listens. */
  heard: ((rows: unknown[][], row: number, column: number) => void) | null;
}

export interface UniverFunctions {
  /** For the formula engine: class and name of each function. */
  classes: [typeof BaseFunction, string][];
  /** For autocomplete. */
  descriptions: IFunctionInfo[];
}

export function univerFunctions({ metadata, implementations }: WorksheetFunctions, listener: Listener): UniverFunctions {
  return {
    classes: metadata.map((one) => [functionClass(one, implementations.get(one.id)!, listener), formulaName(one)]),
    descriptions: metadata.map(description),
  };
}

const formulaName = ({ name }: FunctionMetadata) => `${NAMESPACE}.${name}`;

function functionClass(metadata: FunctionMetadata, implementation: Implementation, listener: Listener): typeof BaseFunction {
  const most = metadata.parameters.at(-1)?.repeating ? Infinity : metadata.parameters.length;
  const least = metadata.parameters.filter(({ optional }) => !optional).length;

  return class extends BaseFunction {
    // References come as they are, so that cells are read once and as they stand.
    override needsReferenceObject = true;

    override calculate(...given: FunctionVariantType[]): BaseValueObject {
      const rows = given.length < least || given.length > most
        ? [[wrongCount(metadata, least, most, given.length)]]
        : callFunction(implementation, metadata.parameters, given.map(argument));
      listener.heard?.(rows, this.row, this.column);
      return resultObject(rows);
    }
  } as typeof BaseFunction;
}

function wrongCount(metadata: FunctionMetadata, least: number, most: number, given: number): FunctionError {
  const accepted = least === most ? `${most}` : most === Infinity ? `${least} or more` : `${least} to ${most}`;
  return new FunctionError('#VALUE!', `${formulaName(metadata)} takes ${accepted} arguments; got ${given}.`);
}

// Arguments

function argument(given: FunctionVariantType): Argument | null {
  if (given.isReferenceObject()) return referencedCells(given as BaseReferenceObject);
  const value = given as BaseValueObject;
  if (value.isNull()) return null; // an argument left out between commas
  if (!value.isArray()) return [[single(value)]];
  const array = value as ArrayValueObject;
  return Array.from({ length: array.getRowCount() }, (_r, row) =>
    Array.from({ length: array.getColumnCount() }, (_c, column) => single(array.get(row, column))));
}

function referencedCells(reference: BaseReferenceObject): Argument {
  const lostSheet = reference.getForcedSheetName() !== '' && !reference.getForcedSheetId();
  const { startRow, endRow, startColumn, endColumn } = reference.getRangePosition();
  if (lostSheet || startRow < 0 || startColumn < 0) return [[{ code: ErrorType.REF }]];
  const rows: Argument = new Array(endRow - startRow + 1);
  for (let r = startRow; r <= endRow; r++) {
    const row: Argument[number] = new Array(endColumn - startColumn + 1);
    for (let c = startColumn; c <= endColumn; c++) row[c - startColumn] = cell(reference.getCellData(r, c));
    rows[r - startRow] = row;
  }
  return rows;
}

function cell(data: Nullable<ICellData>): Argument[number][number] {
  const value = plainValue(data);
  return typeof value === 'object' && value !== null ? { code: value.error } : value;
}

function single(value: Nullable<BaseValueObject>): Argument[number][number] {
  if (!value || value.isNull()) return null;
  if (value.isError()) return { code: (value as unknown as ErrorValueObject).getErrorType() };
  return value.getValue();
}

// Results

function resultObject(rows: unknown[][]): BaseValueObject {
  const columns = rows[0]?.length ?? 0;
  if (columns === 0) return ErrorValueObject.create(ErrorType.CALC);
  if (rows.length === 1 && columns === 1) return valueObject(rows[0]![0]);
  return ArrayValueObject.create({
    calculateValueList: rows.map((row) => row.map(valueObject)), rowCount: rows.length, columnCount: columns, unitId: '', sheetId: '', row: -1, column: -1,
  });
}

function valueObject(value: unknown): BaseValueObject {
  if (typeof value === 'number') return Number.isFinite(value) ? NumberValueObject.create(value) : ErrorValueObject.create(ErrorType.NUM);
  if (typeof value === 'string') return StringValueObject.create(value);
  if (typeof value === 'boolean') return BooleanValueObject.create(value);
  if (value === null || value === undefined) return StringValueObject.create('');
  return ErrorValueObject.create(value instanceof FunctionError && ERROR_CODES.has(value.code) ? value.code as ErrorType : ErrorType.VALUE);
}

const ERROR_CODES = new Set<string>(Object.values(ErrorType));

// Autocomplete

function description(metadata: FunctionMetadata): IFunctionInfo {
  return {
    functionName: formulaName(metadata),
    functionType: FunctionType.User,
    description: metadata.description ?? '',
    abstract: metadata.description ?? '',
    functionParameter: metadata.parameters.map(({ name, description, optional, repeating }) => ({
      name,
      detail: description ?? '',
      example: '',
      require: optional ? BooleanNumber.FALSE : BooleanNumber.TRUE,
      repeat: repeating ? BooleanNumber.TRUE : BooleanNumber.FALSE,
    })),
  };
}
