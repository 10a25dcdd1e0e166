// What a workbook holds, as far as a plain copy and a search for errors need it: values, formulas, the blocks they fill, and names.

import type { LiveHost, Sheet, Workbook } from '../../host/port';
import { parseAddress, referenceTo } from '../address';

export async function contentsOf(host: LiveHost): Promise<Workbook> {
  const sheets: Sheet[] = [];
  for (const { sheet, address } of await host.sheets()) sheets.push(await sheetOf(host, sheet, address));
  return { sheets, names: await host.names() };
}

async function sheetOf(host: LiveHost, name: string, address: string): Promise<Sheet> {
  const sheet: Sheet = { name, cells: {}, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } };
  const used = parseAddress(address);
  if (!used) return sheet;
  const reference = referenceTo(name, used);
  const [block, formulas, spills] = await Promise.all([host.read(reference), host.formulas(reference), host.spills(name)]);
  block?.values.forEach((line, r) => line.forEach((value, c) => {
    const formula = formulas?.formulas[r]?.[c] ?? null;
    if (value === null && formula === null) return;
    (sheet.cells[used.row + r] ??= {})[used.column + c] = { value, ...(formula !== null && { formula }) };
  }));
  for (const spill of spills) {
    const { row, column, rows, columns } = parseAddress(spill)!;
    const anchor = sheet.cells[row]?.[column];
    if (anchor?.formula !== undefined) anchor.spill = { rows, columns };
  }
  return sheet;
}
