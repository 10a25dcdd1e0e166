// The port over the spreadsheet program's own client library. `Excel` is touched only in calls, never while this file loads.

import type { Block, CellInput, CellValue, Host } from '../port';
import { faults, isOfficeError } from './office-faults';

/** Rows and columns of a sheet. A range that reaches the last one means "as far as it goes". */
const SHEET_ROWS = 1_048_576;
const SHEET_COLUMNS = 16_384;

/** In a cell of this format even a formula would become text. */
const TEXT_FORMAT = '@';
const GENERAL_FORMAT = 'General';

export class OfficeHost implements Host {
  read(reference: string): Promise<Block | null> {
    return attempt(`${reference} was not read`, async (context) => {
      const found = await find(context, reference);
      if (!found) return null;
      const range = withinUse(found);
      range.load('address,values,valueTypes');
      await context.sync();
      return {
        sheet: found.sheet.name,
        address: range.address.slice(range.address.lastIndexOf('!') + 1).replaceAll('$', ''),
        values: range.values.map((row, r) => row.map((value, c) => cellValue(value, range.valueTypes[r]![c]!))),
      };
    });
  }

  write(reference: string, cells: CellInput[][]): Promise<void> {
    return attempt(`${reference} was not written`, async (context) => {
      const found = await find(context, reference);
      if (!found) throw faults.unknown(reference);
      const { range } = found;
      checkFit(reference, range, cells);
      const before = await contents(context, range);
      try {
        const formats = before.formats.map((row, r) => row.map((format, c) => formatFor(cells[r]![c]!, format)));
        if (!same(formats, before.formats)) range.numberFormat = formats;
        range.formulas = cells.map((row) => row.map(entry));
        await context.sync();
      } catch (error) {
        await putBack(context, range, before).catch(() => {
          throw isOfficeError(error) ? faults.halfWritten(reference, error) : error;
        });
        throw error;
      }
    });
  }

  async onRecalculated(listener: () => void): Promise<() => Promise<void>> {
    let following = true;
    const tell = async () => {
      if (following) listener();
    };
    try {
      const handlers = await attempt('Recalculation cannot be followed', async (context) => {
        const { worksheets } = context.workbook;
        // An edit counts as well: a plan without formulas is never calculated.
        const added = [worksheets.onCalculated.add(tell), worksheets.onChanged.add(tell)];
        await context.sync();
        return added;
      });
      return () => {
        following = false;
        return attempt('The spreadsheet program goes on reporting recalculations', async (context) => {
          for (const handler of handlers) handler.remove();
          await context.sync();
        }, handlers[0]!.context);
      };
    } catch (fault) {
      following = false; // one of the two may have been added
      throw fault;
    }
  }
}

/** Runs a batch, in the context of an earlier one if need be; errors of the program become sentences. */
async function attempt<T>(failed: string, batch: (context: Excel.RequestContext) => Promise<T>, earlier?: OfficeExtension.ClientRequestContext): Promise<T> {
  try {
    // While a cell is being edited the program takes no requests: wait for it.
    return await (earlier ? Excel.run(earlier, batch) : Excel.run({ delayForCellEdit: true }, batch));
  } catch (error) {
    throw isOfficeError(error) ? faults.refused(failed, error) : error;
  }
}

// References

interface Found {
  range: Excel.Range;
  sheet: Excel.Worksheet;
  /** The part of the sheet that holds anything. */
  used: Excel.Range;
}

/** Cells, columns or rows. Anything else without a sheet is a name: the program allows none that looks like this. */
const ADDRESS = /^(\$?[A-Z]{1,3}\$?\d+(:\$?[A-Z]{1,3}\$?\d+)?|\$?[A-Z]{1,3}:\$?[A-Z]{1,3}|\$?\d+:\$?\d+)$/i;

/** The range of a reference, measured; null where the workbook has no such name or sheet. */
async function find(context: Excel.RequestContext, reference: string): Promise<Found | null> {
  const { owner, range } = pointTo(context.workbook, reference);
  const sheet = range.worksheet;
  const used = sheet.getUsedRangeOrNullObject(true);
  owner.load('name');
  sheet.load('name');
  range.load('rowIndex,rowCount,columnIndex,columnCount');
  used.load('rowIndex,rowCount,columnIndex,columnCount');
  try {
    await context.sync();
  } catch (error) {
    const code = isOfficeError(error) ? error.code : '';
    if (code === 'ItemNotFound') return null;
    if (code === 'InvalidArgument' || code === 'InvalidReference') throw faults.notAddress(reference);
    throw error;
  }
  if (owner.isNullObject) return null;
  if (range.isNullObject) throw faults.notCells(reference);
  return { range, sheet, used };
}

function pointTo({ names, worksheets }: Excel.Workbook, reference: string): { owner: Excel.NamedItem | Excel.Worksheet; range: Excel.Range } {
  const bang = reference.lastIndexOf('!');
  if (bang < 0 && !ADDRESS.test(reference)) {
    const owner = names.getItemOrNullObject(reference);
    return { owner, range: owner.getRangeOrNullObject() };
  }
  const owner = bang < 0 ? worksheets.getActiveWorksheet() : worksheets.getItemOrNullObject(unquoted(reference.slice(0, bang)));
  return { owner, range: owner.getRange(reference.slice(bang + 1)) };
}

const unquoted = (sheet: string): string => (/^'.*'$/.test(sheet) ? sheet.slice(1, -1).replaceAll("''", "'") : sheet);

/** The range, or as much of it as the sheet uses where it reaches the end of the sheet: a whole column is a million cells. */
function withinUse({ range, used }: Found): Excel.Range {
  const { rowIndex, rowCount, columnIndex, columnCount } = range;
  const within = (first: number, count: number, end: number, usedEnd: number) =>
    (first + count < end ? count : Math.max(1, (used.isNullObject ? 0 : usedEnd) - first));
  const rows = within(rowIndex, rowCount, SHEET_ROWS, used.rowIndex + used.rowCount);
  const columns = within(columnIndex, columnCount, SHEET_COLUMNS, used.columnIndex + used.columnCount);
  return rows === rowCount && columns === columnCount ? range : range.getResizedRange(rows - rowCount, columns - columnCount);
}

// Values

function cellValue(value: string | number | boolean, type: Excel.RangeValueType | string): CellValue {
  if (type === 'Empty') return null;
  return type === 'Error' ? { error: String(value) } : value;
}

/** What makes the program store a cell's input: behind an apostrophe everything is text. */
function entry(cell: CellInput): string | number | boolean {
  if (cell === null || cell === '') return '';
  if (typeof cell === 'string') return `'${cell}`;
  return typeof cell === 'object' ? cell.formula : cell;
}

const formatFor = (cell: CellInput, format: string): string => (typeof cell !== 'string' && format === TEXT_FORMAT ? GENERAL_FORMAT : format);

function checkFit(reference: string, range: Excel.Range, cells: CellInput[][]): void {
  const { rowCount, columnCount } = range;
  if (cells.length !== rowCount || cells.some((row) => row.length !== columnCount)) {
    const widths = [...new Set(cells.map((row) => row.length))].join(' or ');
    throw faults.sizeDiffers(reference, `${rowCount} × ${columnCount}`, `${cells.length} × ${widths || 0}`);
  }
  for (const cell of cells.flat()) {
    if (typeof cell === 'number' && !Number.isFinite(cell)) throw faults.notWritable(reference, cell);
  }
}

// All or nothing

/** What a block holds, in the form that writes it again. */
interface Contents {
  entries: (string | number | boolean)[][];
  formats: string[][];
}

async function contents(context: Excel.RequestContext, range: Excel.Range): Promise<Contents> {
  range.load('values,valueTypes,formulas,numberFormat,hasSpill');
  await context.sync();
  const { values, valueTypes, formulas, numberFormat } = range;
  const spilled = range.hasSpill === false ? null : await spilledCells(context, range);
  const again = (value: string | number | boolean, r: number, c: number) => {
    if (spilled?.[r]![c]) return ''; // comes back with the formula that spills
    const formula: unknown = formulas[r]![c];
    if (typeof formula === 'string' && formula.startsWith('=') && formula !== value) return formula;
    return valueTypes[r]![c] === 'String' ? entry(String(value)) : value;
  };
  return { entries: values.map((row, r) => row.map((value, c) => again(value, r, c))), formats: numberFormat };
}

/** Which cells get their value from a formula in another cell. */
async function spilledCells(context: Excel.RequestContext, range: Excel.Range): Promise<boolean[][]> {
  const cells = range.values.map((row, r) => row.map((_, c) => {
    const cell = range.getCell(r, c);
    const parent = cell.getSpillParentOrNullObject();
    cell.load('address');
    parent.load('address');
    return { cell, parent };
  }));
  await context.sync();
  return cells.map((row) => row.map(({ cell, parent }) => !parent.isNullObject && parent.address !== cell.address));
}

/** After a write that failed: the program may have stored some cells before the one that it refused. */
async function putBack(context: Excel.RequestContext, range: Excel.Range, before: Contents): Promise<void> {
  if (same(await contents(context, range), before)) return;
  range.numberFormat = before.formats.map((row) => row.map(() => GENERAL_FORMAT));
  range.formulas = before.entries;
  range.numberFormat = before.formats;
  await context.sync();
}

const same = (one: unknown, other: unknown): boolean => JSON.stringify(one) === JSON.stringify(other);
