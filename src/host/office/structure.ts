// Sheets and table columns that a change adds.

import type { Change } from '../port';
import { entry } from './contents';
import { faults } from './office-faults';
import { type Spot, withoutSheet } from './references';
import type { TakeBack } from './taking-back';

/** Adds sheets behind the others. @returns their ids */
export async function addSheets(context: Excel.RequestContext, sheets: NonNullable<Change['sheets']>, takeBacks: TakeBack[]): Promise<string[]> {
  if (sheets.length === 0) return [];
  const { worksheets } = context.workbook;
  worksheets.load('items/id,items/name');
  await context.sync();
  const before = worksheets.items.map(({ id, name }) => ({ id, name }));
  const known = new Set(before.map(({ name }) => name.toLowerCase()));
  const originals = sheets.map(({ name, copyOf }) => {
    if (!/^[^[\]:*?/\\]{1,31}$/.test(name) || /^'|'$/.test(name)) throw faults.sheetName(name);
    if (known.has(name.toLowerCase())) throw faults.sheetExists(name);
    known.add(name.toLowerCase());
    const original = before.find((one) => one.name.toLowerCase() === copyOf?.toLowerCase());
    if (copyOf !== undefined && !original) throw faults.noSheet(copyOf);
    return original;
  });
  takeBacks.push((later) => removeSheets(later, before.map(({ id }) => id), sheets));
  const added = sheets.map(({ name }, i) => {
    const original = originals[i];
    const sheet = original ? worksheets.getItem(original.id).copy('End') : worksheets.add(name);
    if (original) sheet.name = name;
    sheet.load('id');
    return sheet;
  });
  await context.sync();
  return added.map(({ id }) => id);
}

/** Removes what was added: by their names, or by those that the program gives to copies until they get their own. */
async function removeSheets(context: Excel.RequestContext, idsBefore: string[], added: NonNullable<Change['sheets']>): Promise<void> {
  const { worksheets } = context.workbook;
  worksheets.load('items/id,items/name');
  await context.sync();
  const isOurs = (sheet: Excel.Worksheet) => !idsBefore.includes(sheet.id)
    && added.some(({ name, copyOf }) => sheet.name === name || (copyOf !== undefined && / \(\d+\)$/.test(sheet.name) && sheet.name.startsWith(copyOf.slice(0, SHORTEST_STEM))));
  for (const sheet of worksheets.items.filter(isOurs)) sheet.delete();
  await context.sync();
}

/** The program shortens a long name to make room for the number of a copy. */
const SHORTEST_STEM = 20;

/** Adds columns at the right end of tables. @returns where they are */
export async function addTableColumns(context: Excel.RequestContext, added: NonNullable<Change['tableColumns']>, takeBacks: TakeBack[]): Promise<Spot[]> {
  if (added.length === 0) return [];
  const tables = added.map(({ table: name }) => {
    const parts = partsOf(context.workbook.tables.getItemOrNullObject(name));
    parts.table.load('name');
    parts.columns.load('count');
    parts.body.load('rowCount');
    parts.sheet.load('id');
    return { name, ...parts };
  });
  await context.sync();
  const written = tables.flatMap(({ name, table, body, sheet }, i) => {
    if (table.isNullObject) throw faults.noTable(name);
    const { cells } = added[i]!;
    const width = cells[0]?.length ?? 0;
    if (cells.length !== body.rowCount + 1 || cells.some((row) => row.length !== width)) {
      throw faults.sizeDiffers(`${name} with its header`, `${body.rowCount + 1} × ${width}`, `${cells.length} × ${[...new Set(cells.map((row) => row.length))].join(' or ') || 0}`);
    }
    return cells[0]!.map((header, c) => ({ table, sheet, header: String(header ?? ''), values: cells.slice(1).map((row) => [entry(row[c]!)]), name }));
  });
  const counts = tables.map(({ name, columns }) => ({ name, count: columns.count }));
  takeBacks.push((later) => removeColumns(later, counts));
  const ranges = written.map(({ table, header, values }) => {
    const column = table.columns.add(-1, undefined, header);
    const cells = column.getDataBodyRange();
    cells.numberFormat = values.map(() => ['General']); // beside a column for text, the program would take formulas for text
    cells.formulas = values;
    const range = column.getRange();
    range.load('address');
    return range;
  });
  await context.sync();
  return ranges.map((range, i) => ({ reference: written[i]!.name, sheetId: written[i]!.sheet.id, address: withoutSheet(range.address) }));
}

const partsOf = (table: Excel.Table) => ({ table, columns: table.columns, body: table.getDataBodyRange(), sheet: table.worksheet });

async function removeColumns(context: Excel.RequestContext, before: { name: string; count: number }[]): Promise<void> {
  const now = before.map(({ name }) => context.workbook.tables.getItemOrNullObject(name).columns);
  for (const columns of now) columns.load('count');
  await context.sync();
  for (const [i, columns] of now.entries()) {
    const { name, count } = before[i]!;
    if (before.findIndex((one) => one.name === name) !== i) continue; // a table that is named twice
    for (let last = columns.count - 1; last >= count; last--) columns.getItemAt(last).delete();
  }
  await context.sync();
}
