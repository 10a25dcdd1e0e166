// Cells to values, values to cells, and faults to cell errors: the only file that knows what a host hands to a function.
//
// A host passes every argument as rows of cells, an argument left out as null. A blank cell is null, "" or, on some desktops, 0.
// An error in a cell comes as an object with its code, and goes out again in the same row.

import { Fault, type Hold, type Response, type Role, type Sampling, faults, inRow } from '../engine';

/** What a host passes for an argument. */
export type Cells = any[][] | null | undefined;

/** One argument of a function: its cells and how one of them is read. */
export interface Argument<T> {
  name: string;
  cells: readonly (readonly unknown[])[];
  read(cell: unknown): T;
  /** Arguments of one key make a row blank where all of them are blank in it. */
  key?: string;
  /** Whether a 0 in a key may be a blank cell: two edges of 0 are no band. */
  zeroIsBlank?: boolean;
}

type Arguments<A extends unknown[]> = { [K in keyof A]: Argument<A[K]> };
type Result = number | string | boolean;

// Reading

const isBlank = (cell: unknown): boolean => cell === null || cell === undefined || cell === '';

const given = (cells: Cells): readonly (readonly unknown[])[] => (cells && cells.length > 0 ? cells : [[null]]);

/** A number that must be there. */
export function number(name: string, cells: Cells): Argument<number> {
  return { name, cells: given(cells), read: (cell) => readNumber(name, cell) };
}

function readNumber(name: string, cell: unknown): number {
  if (typeof cell !== 'number' || !Number.isFinite(cell)) throw faults.notNumber(name, cell);
  return cell;
}

/** The tone of a row; without it the row is blank. */
export const tone = (name: string, cells: Cells): Argument<number> => ({ ...number(name, cells), key: name });

/** The two edges of a band; a row without them is blank. */
export function edges(lowName: string, low: Cells, highName: string, high: Cells): [Argument<number>, Argument<number>] {
  const edge = (name: string, cells: Cells) => ({ ...number(name, cells), key: lowName, zeroIsBlank: true });
  return [edge(lowName, low), edge(highName, high)];
}

/** A number that may be left out. */
export function optional<T extends number | null>(name: string, cells: Cells, leftOut: T): Argument<number | T> {
  return { name, cells: given(cells), read: (cell) => (isBlank(cell) ? leftOut : readNumber(name, cell)) };
}

/** A limit that may be left out, also by a 0, which would make no sense of its own. */
export function limit(name: string, cells: Cells): Argument<number | null> {
  return { name, cells: given(cells), read: (cell) => (isBlank(cell) || cell === 0 ? null : readNumber(name, cell)) };
}

/** One of several words, the first where it is left out; upper and lower case are one. */
function word<T extends string>(name: string, cells: Cells, accepted: readonly T[]): Argument<T> {
  return {
    name,
    cells: given(cells),
    read(cell) {
      if (isBlank(cell) || cell === 0) return accepted[0]!;
      const found = typeof cell === 'string' ? accepted.find((one) => one === cell.trim().toLowerCase()) : undefined;
      if (found === undefined) throw faults.unknownWord(name, cell, accepted);
      return found;
    },
  };
}

export const samplingKind = (cells: Cells): Argument<Sampling> => word('sampling', cells, ['real', 'iq']);

export const holdKind = (cells: Cells): Argument<Hold> => word('hold', cells, ['nrz', 'rz', 'doublet']);

/** The response of a filter; a row without one is blank. */
export const responseKind = (cells: Cells): Argument<Response> =>
  ({ ...word('response', cells, ['butterworth', 'chebyshev', 'inverse chebyshev', 'elliptic']), key: 'response' });

/** How many of something, left out by a blank or by a 0, which would make no sense of its own. */
export function count(name: string, cells: Cells, leftOut: number): Argument<number> {
  return { name, cells: given(cells), read: (cell) => (isBlank(cell) || cell === 0 ? leftOut : readNumber(name, cell)) };
}

/** Whether a table gets its header row. */
export function headerRow(cells: Cells): Argument<boolean> {
  return {
    name: 'headers',
    cells: given(cells),
    read(cell) {
      if (isBlank(cell)) return true;
      if (typeof cell === 'boolean') return cell;
      if (cell === 0 || cell === 1) return cell === 1;
      throw faults.notFlag('headers', cell);
    },
  };
}

// Row functions

/**
 * Runs a kernel over the rows of its arguments. One cell serves every row and column, one column serves every column, one row every
 * row. A blank row stays blank; an error stays in its row.
 */
export function eachRow<A extends unknown[]>(args: Arguments<A>, kernel: (...values: A) => Result): any[][] {
  return guarded(() => {
    const list = args as Argument<unknown>[];
    const { rows, columns } = commonSize(list);
    const readers = list.map(columnReader);
    const values = new Array<unknown>(list.length) as A;
    const result: any[][] = new Array(rows);
    for (let r = 0; r < rows; r++) {
      const line: unknown[] = new Array(columns);
      for (let c = 0; c < columns; c++) line[c] = cellOf(list, readers, values, r, c, kernel);
      result[r] = line;
    }
    return result;
  });
}

/**
 * Runs a kernel that gives several results over the rows of its arguments, each of them one column, one row or one cell.
 * An error fills its row, so that none of its columns can be misread.
 */
export function eachRowOfTable<A extends unknown[]>(headers: Argument<boolean>, titles: string[], args: Arguments<A>, kernel: (...values: A) => Result[]): any[][] {
  return guarded(() => {
    const header = single(headers);
    const list = (args as Argument<unknown>[]).map(asColumn);
    const { rows } = commonSize(list);
    const readers = list.map(columnReader);
    const values = new Array<unknown>(list.length) as A;
    const result: any[][] = header ? [titles] : [];
    for (let r = 0; r < rows; r++) {
      const line = cellOf<A, Result[]>(list, readers, values, r, 0, kernel);
      result.push(Array.isArray(line) ? line : titles.map(() => line));
    }
    return result;
  });
}

/** The value, "" or the error of one place. */
function cellOf<A extends unknown[], R>(list: Argument<unknown>[], readers: Reader[], values: A, row: number, column: number, kernel: (...values: A) => R): R | string | CustomFunctions.Error {
  if (isBlankRow(list, row, column)) return '';
  try {
    for (let i = 0; i < readers.length; i++) values[i] = readers[i]!(row, column);
    return kernel(...values);
  } catch (fault) {
    return cellError(fault);
  }
}

type Reader = (row: number, column: number) => unknown;

/** Reads an argument's cell for a place of the result; an argument of one cell is read once. */
function columnReader(argument: Argument<unknown>): Reader {
  const { cells } = argument;
  const tall = cells.length > 1;
  const wide = cells[0]!.length > 1;
  const read = (cell: unknown) => {
    passError(cell);
    return argument.read(cell);
  };
  if (tall) return wide ? (r, c) => read(cells[r]![c]) : (r) => read(cells[r]![0]);
  if (wide) return (_r, c) => read(cells[0]![c]);
  let known = false;
  let value: unknown;
  return () => {
    if (!known) {
      value = read(cells[0]![0]);
      known = true;
    }
    return value;
  };
}

function isBlankRow(list: Argument<unknown>[], row: number, column: number): boolean {
  for (let i = 0; i < list.length; i++) {
    const { key } = list[i]!;
    if (key === undefined || (i > 0 && list[i - 1]!.key === key)) continue;
    let blank = true;
    for (let j = i; blank && j < list.length && list[j]!.key === key; j++) {
      const { cells, zeroIsBlank } = list[j]!;
      const line = cells.length > 1 ? cells[row]! : cells[0]!;
      const cell = line.length > 1 ? line[column] : line[0];
      blank = isBlank(cell) || (zeroIsBlank === true && cell === 0);
    }
    if (blank) return true;
  }
  return false;
}

/** Rows and columns of the result; every argument has as many or one. */
function commonSize(list: Argument<unknown>[]): { rows: number; columns: number } {
  let rows = 1;
  let columns = 1;
  let tallest = list[0]!;
  let widest = list[0]!;
  for (const argument of list) {
    const { cells } = argument;
    const height = cells.length;
    const width = cells[0]!.length;
    if (height > 1 && rows > 1 && height !== rows) throw faults.sizesDiffer(argument.name, size(argument), tallest.name, size(tallest));
    if (width > 1 && columns > 1 && width !== columns) throw faults.sizesDiffer(argument.name, size(argument), widest.name, size(widest));
    if (height > rows) [rows, tallest] = [height, argument];
    if (width > columns) [columns, widest] = [width, argument];
  }
  return { rows, columns };
}

const size = ({ cells }: Argument<unknown>): string => `${cells.length} × ${cells[0]!.length}`;

// Table functions

/** A table of results under its titles, or the error of the whole. */
export function table(headers: Argument<boolean>, titles: string[], list: () => Result[][]): any[][] {
  return guarded(() => {
    const header = single(headers);
    const lines = list();
    return header ? [titles, ...lines] : lines;
  });
}

/** A single result for a whole plan, or the error of it. */
export const result = (compute: () => Result): any[][] => guarded(() => [[compute()]]);

/** The value of an argument that is one cell. */
export function single<T>(argument: Argument<T>): T {
  const { cells } = argument;
  if (cells.length > 1 || cells[0]!.length > 1) throw faults.notSingle(argument.name, cells.length, cells[0]!.length);
  return value(argument, cells[0]![0]);
}

/** The values of an argument that is one column or one row; blank cells at its end are left out. */
export function vector<T>(argument: Argument<T>): T[] {
  const cells = asColumn(argument).cells.map((line) => line[0]);
  while (cells.length > 1 && isBlank(cells.at(-1))) cells.pop();
  return cells.map((cell) => value(argument, cell));
}

/** All numbers of a repeated argument, whatever the shape of its ranges; blank cells are left out. */
export function allNumbers(name: string, ranges: readonly Cells[] | null | undefined): number[] {
  const cells = (ranges ?? []).flatMap((range) => given(range).flat()).filter((cell) => !isBlank(cell));
  if (cells.length === 0) throw faults.notNumber(name, null);
  return cells.map((cell) => value(number(name, null), cell));
}

function value<T>(argument: Argument<T>, cell: unknown): T {
  passError(cell);
  return argument.read(cell);
}

/** The rows of a plan: blank ones are ignored, and a role may be one cell for all. Sentences name the row. */
export function planRows(low: Cells, high: Cells, role: Cells): { low: number[]; high: number[]; role: Role[] } {
  const [lows, highs, roles] = ([['low', low], ['high', high], ['role', role]] as const).map(([name, cells]) => columnOf(name, cells)) as [unknown[], unknown[], unknown[]];
  if (highs.length !== lows.length) throw faults.countsDiffer('high', highs.length, 'low', lows.length);
  if (roles.length !== lows.length && roles.length !== 1) throw faults.countsDiffer('role', roles.length, 'low', lows.length);
  const plan: { low: number[]; high: number[]; role: Role[] } = { low: [], high: [], role: [] };
  for (const [row, lowEdge] of lows.entries()) {
    const highEdge = highs[row];
    const blank = [lowEdge, highEdge].every((edge) => isBlank(edge) || edge === 0);
    plan.low.push(blank ? 0 : single(number(inRow('low', row), [[lowEdge]])));
    plan.high.push(blank ? 0 : single(number(inRow('high', row), [[highEdge]])));
    plan.role.push(blank ? 'ignore' : single(word(inRow('role', row), [[roles[roles.length === 1 ? 0 : row]]], ['wanted', 'unwanted', 'ignore'])));
  }
  return plan;
}

/** The cells of an argument that is one column or one row. */
const columnOf = (name: string, cells: Cells): unknown[] => asColumn({ name, cells: given(cells), read: (cell) => cell }).cells.map(([cell]) => cell);

/** Names for the rows of another argument, as text; a row without one is called otherwise. */
export function rowNames(name: string, cells: Cells, of: string, rows: number, otherwise: (row: number) => string): string[] {
  if (!cells) return Array.from({ length: rows }, (_, row) => otherwise(row));
  const names = columnOf(name, cells);
  while (names.length > rows && isBlank(names.at(-1))) names.pop();
  if (names.length !== rows) throw faults.countsDiffer(name, names.length, of, rows);
  return names.map((cell, row) => {
    passError(cell);
    return isBlank(cell) ? otherwise(row) : String(cell);
  });
}

function asColumn<T>(argument: Argument<T>): Argument<T> {
  const { cells, name } = argument;
  if (cells[0]!.length === 1) return argument;
  if (cells.length > 1) throw faults.notVector(name, cells.length, cells[0]!.length);
  return { ...argument, cells: cells[0]!.map((cell) => [cell]) };
}

// Errors

/** An error that stood in a cell of an argument, on its way to the result. */
class CellErrorPassed {
  constructor(readonly code: string) {}
}

function passError(cell: unknown): void {
  if (typeof cell !== 'object' || cell === null) return;
  const { code, basicValue } = cell as { code?: unknown; basicValue?: unknown };
  const shown = typeof code === 'string' ? code : basicValue;
  if (typeof shown === 'string' && shown.startsWith('#')) throw new CellErrorPassed(shown);
}

/** Runs a whole function; a fault of the whole is thrown, as is that of a single cell: it is the way that hosts document. */
function guarded(run: () => any[][]): any[][] {
  let cells: any[][];
  try {
    cells = run();
  } catch (fault) {
    throw cellError(fault);
  }
  const [[first]] = cells as [[unknown]];
  if (cells.length === 1 && cells[0]!.length === 1 && first instanceof CustomFunctions.Error) throw first;
  return cells;
}

/** The host's error for a fault. Hosts show a sentence only with #VALUE! and #N/A. */
function cellError(fault: unknown): CustomFunctions.Error {
  const { ErrorCode } = CustomFunctions;
  if (fault instanceof CellErrorPassed) {
    const known = Object.values(ErrorCode).find((code) => code === fault.code);
    return new CustomFunctions.Error(known ?? ErrorCode.invalidValue);
  }
  if (fault instanceof Fault) return new CustomFunctions.Error(fault.kind === 'none' ? ErrorCode.notAvailable : ErrorCode.invalidValue, fault.message);
  throw fault;
}
