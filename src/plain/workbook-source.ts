// The formulas of a workbook as plain data, for the plain copy.

import { parseA1Ref } from '@borgar/fx/xlsx';
import { areaOf as areaFrom, parseArea } from '../formula/address';
import type { Workbook } from '../host/port';
import type { PlainSource } from './plain-copy';
import type { SheetArea } from './plain-formula';

/** A workbook's own tables and rules are no part of plain data: formulas name their cells. */
export function workbookSource({ sheets, names }: Workbook): PlainSource {
  const sheetNamed = (name: string) => sheets.find((sheet) => sheet.name.toLowerCase() === name.toLowerCase())?.name;
  const meanings = new Map(Object.entries(names).map(([name, text]) => [name.toLowerCase(), text]));
  const areaOf = (reference: string, at: { sheet: string }, within: readonly string[] = []): SheetArea | null => {
    const parsed = parseA1Ref(reference);
    if (!parsed || parsed.workbookName) return null;
    if ('name' in parsed) {
      const name = parsed.name.toLowerCase();
      const meaning = meanings.get(name);
      return meaning === undefined || within.includes(name) ? null : areaOf(meaning, at, [...within, name]);
    }
    const sheet = sheetNamed(parsed.sheetName || at.sheet);
    const area = parseArea(reference.slice(reference.lastIndexOf('!') + 1));
    return sheet !== undefined && area ? { sheet, area } : null;
  };
  return {
    formulas: sheets.flatMap(({ name, cells }) => Object.entries(cells).flatMap(([row, line]) => Object.entries(line).flatMap(([column, { formula, spill }]) =>
      (formula === undefined ? [] : [{ sheet: name, area: areaFrom(Number(row), Number(column), spill ?? { rows: 1, columns: 1 }), text: formula.slice(1) }])))),
    names: Object.entries(names).map(([name, text]) => ({ name, text })),
    others: [],
    sheets: sheets.map(({ name }) => name),
    areaOf,
  };
}
