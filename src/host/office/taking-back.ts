// What takes a part of a change back, and what tells whether it is still as the change left it.

import { type Spot, rangeAt } from './references';

/** Compares what there is with what was, and restores it: it may be called after any part of a change has been made. */
export type TakeBack = (context: Excel.RequestContext) => Promise<void>;

/** What a change wrote. */
export interface Written {
  cells: Spot[];
  sheetIds: string[];
  names: string[];
}

/** A word for each thing that a change wrote, and what it holds now, as text: formulas and values, not the results of formulas. */
export async function remains(context: Excel.RequestContext, { cells, sheetIds, names }: Written): Promise<{ what: string; holds: string }[]> {
  const { workbook } = context;
  const sheets = [...cells.map(({ sheetId }) => sheetId), ...sheetIds].map((id) => workbook.worksheets.getItemOrNullObject(id));
  for (const sheet of sheets) sheet.load('name');
  const items = names.map((name) => workbook.names.getItemOrNullObject(name));
  for (const item of items) item.load('formula');
  await context.sync();
  const there = sheets.map((sheet) => !sheet.isNullObject);
  const ranges = [
    ...cells.map((spot, i) => (there[i] ? rangeAt(context, spot) : null)),
    ...sheetIds.map((id, i) => (there[cells.length + i] ? workbook.worksheets.getItem(id).getUsedRangeOrNullObject(true) : null)),
  ];
  for (const range of ranges) range?.load('address,formulas');
  await context.sync();
  const whats = [...cells.map(({ reference }) => reference), ...sheets.slice(cells.length).map((sheet) => (sheet.isNullObject ? 'A sheet' : sheet.name))];
  return [
    ...ranges.map((range, i) => ({ what: whats[i]!, holds: !range ? 'gone' : range.isNullObject ? 'blank' : JSON.stringify([withoutName(range.address), range.formulas]) })),
    ...items.map((item, i) => ({ what: names[i]!, holds: item.isNullObject ? 'gone' : String(item.formula) })),
  ];
}

/** A sheet that is called otherwise still holds the same. */
const withoutName = (address: string): string => address.slice(address.lastIndexOf('!') + 1);
