// Where references lead: to the cells of an address or of a defined name.

import { faults, isOfficeError } from './office-faults';

export interface Found {
  reference: string;
  range: Excel.Range;
  /** With its id and name. */
  sheet: Excel.Worksheet;
  /** The part of the sheet that holds anything. */
  used: Excel.Range;
}

/** Rows and columns of a sheet. A range that reaches the last one means "as far as it goes". */
const SHEET_ROWS = 1_048_576;
const SHEET_COLUMNS = 16_384;

/** Cells, columns or rows. Anything else without a sheet is a name: the program allows none that looks like this. */
const ADDRESS = /^(\$?[A-Z]{1,3}\$?\d+(:\$?[A-Z]{1,3}\$?\d+)?|\$?[A-Z]{1,3}:\$?[A-Z]{1,3}|\$?\d+:\$?\d+)$/i;

/** The range of a reference, measured; null where the workbook has no such name or sheet. */
export async function find(context: Excel.RequestContext, reference: string): Promise<Found | null> {
  const sought = pointTo(context.workbook, reference);
  try {
    await context.sync();
  } catch (error) {
    const code = isOfficeError(error) ? error.code : '';
    if (code === 'ItemNotFound') return null;
    if (WRONG_ADDRESS.has(code)) throw faults.notAddress(reference);
    throw error;
  }
  return foundIn(sought);
}

/** The ranges of several references in one request. Throws where there is none. */
export async function findAll(context: Excel.RequestContext, references: string[]): Promise<Found[]> {
  if (references.length === 0) return [];
  const sought = references.map((reference) => pointTo(context.workbook, reference));
  let found: (Found | null)[];
  try {
    await context.sync();
    found = sought.map(foundIn);
  } catch (error) {
    if (!isOfficeError(error) || !(error.code === 'ItemNotFound' || WRONG_ADDRESS.has(error.code))) throw error;
    found = [];
    for (const reference of references) found.push(await find(context, reference)); // tells which one it is
  }
  return found.map((one, i) => {
    if (!one) throw faults.unknown(references[i]!);
    return one;
  });
}

/** The range, or as much of it as the sheet uses where it reaches the end of the sheet: a whole column is a million cells. */
export function withinUse({ range, used }: Found): Excel.Range {
  const { rowIndex, rowCount, columnIndex, columnCount } = range;
  const within = (first: number, count: number, end: number, usedEnd: number) =>
    (first + count < end ? count : Math.max(1, (used.isNullObject ? 0 : usedEnd) - first));
  const rows = within(rowIndex, rowCount, SHEET_ROWS, used.rowIndex + used.rowCount);
  const columns = within(columnIndex, columnCount, SHEET_COLUMNS, used.columnIndex + used.columnCount);
  return rows === rowCount && columns === columnCount ? range : range.getResizedRange(rows - rowCount, columns - columnCount);
}

/** `Plan!$B$2:$B$9` => `B2:B9` */
export const withoutSheet = (address: string): string => address.slice(address.lastIndexOf('!') + 1).replaceAll('$', '');

/** Cells that can be found again in a later request, whatever their sheet is called by then. */
export interface Spot {
  reference: string;
  sheetId: string;
  address: string;
}

export const spotOf = ({ reference, sheet, range }: Found): Spot => ({ reference, sheetId: sheet.id, address: withoutSheet(range.address) });

export const rangeAt = ({ workbook }: Excel.RequestContext, { sheetId, address }: Spot): Excel.Range => workbook.worksheets.getItem(sheetId).getRange(address);

const WRONG_ADDRESS = new Set(['InvalidArgument', 'InvalidReference']);

interface Sought extends Found {
  owner: Excel.NamedItem | Excel.Worksheet;
}

function pointTo({ names, worksheets }: Excel.Workbook, reference: string): Sought {
  const bang = reference.lastIndexOf('!');
  const isName = bang < 0 && !ADDRESS.test(reference);
  const named = isName ? names.getItemOrNullObject(reference) : null;
  const owner = named ?? (bang < 0 ? worksheets.getActiveWorksheet() : worksheets.getItemOrNullObject(unquoted(reference.slice(0, bang))));
  const range = named ? named.getRangeOrNullObject() : (owner as Excel.Worksheet).getRange(reference.slice(bang + 1));
  const sheet = range.worksheet;
  const used = sheet.getUsedRangeOrNullObject(true);
  owner.load('name');
  sheet.load('id,name');
  range.load('address,rowIndex,rowCount,columnIndex,columnCount');
  used.load('rowIndex,rowCount,columnIndex,columnCount');
  return { reference, owner, range, sheet, used };
}

function foundIn({ owner, ...found }: Sought): Found | null {
  if (owner.isNullObject) return null;
  if (found.range.isNullObject) throw faults.notCells(found.reference);
  return found;
}

const unquoted = (sheet: string): string => (/^'.*'$/.test(sheet) ? sheet.slice(1, -1).replaceAll("''", "'") : sheet);
