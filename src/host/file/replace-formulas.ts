// All formulas of a workbook file, wherever they stand, and others in their place.

import { type Area, cellAddress, eachCell, isSingle, singleCell } from '../../formula/address';
import { type NewSheet, addSheet } from './add-sheet';
import { type Book, isBuiltIn, sheetNamed } from './book';
import { type SheetArea, referencedArea } from './formula-to-sheet';
import type { SheetPart } from './sheet-part';
import { type XmlElement, child, childrenOf, escapeText } from './xml';

export interface FormulaSource {
  /** Those in cells, each with the cells that it fills, as the file writes them. */
  formulas: (SheetArea & { text: string })[];
  names: { name: string; text: string; sheet?: string }[];
  /** Those of rules, and of the columns of tables. */
  others: { sheet: string; where: string; text: string }[];
  sheets: string[];
  /** The cells that a reference means in a formula at a place, null where it means something else. */
  areaOf(reference: string, at: { sheet: string; row: number; column: number }): SheetArea | null;
}

/** Formulas in the file's notation. */
export interface Replacement {
  /** By the cells that the old one fills: a formula for each of them, one that fills them all, or just the values that they show. */
  cells: (SheetArea & { outcome: { kind: 'formulas'; formulas: string[][] } | { kind: 'reference'; formula: string } | { kind: 'values' } })[];
  /** null takes a name away. */
  names: { name: string; sheet?: string; text: string | null }[];
  /** By their place in the source; null takes one away. */
  others: { index: number; text: string | null }[];
  /** A sheet to add. */
  sheet: NewSheet;
}

export async function formulaSource(book: Book): Promise<FormulaSource> {
  return {
    formulas: book.sheets.flatMap((sheet) => [...sheet.cells()].flatMap(({ cell: { formula } }) =>
      (formula && formula.kind !== 'what-if' ? [{ sheet: sheet.name, area: formula.area, text: formula.text }] : []))),
    names: book.names.filter(({ name }) => !isBuiltIn(name)).map(({ name, text, sheet }) => ({ name, text, ...(sheet !== undefined && { sheet }) })),
    others: (await otherFormulas(book)).map(({ sheet, where, element }) => ({ sheet: sheet.name, where, text: element.text })),
    sheets: [...book.sheets.map(({ name }) => name), ...book.otherTabs],
    areaOf: (reference, at) => referencedArea(book, reference, at),
  };
}

export async function replaceFormulas(book: Book, { cells, names, others, sheet }: Replacement): Promise<void> {
  const known = await otherFormulas(book);
  for (const { index, text } of others) await known[index]!.replace(text);
  for (const { sheet: name, area, outcome } of cells) replaceInCells(sheetNamed(book, name)!, area, outcome);
  if (names.length > 0) await replaceNames(book, names);
  await addSheet(book, sheet);
}

function replaceInCells(sheet: SheetPart, area: Area, outcome: Replacement['cells'][number]['outcome']): void {
  const { top, left } = area;
  const formula = sheet.cell(top, left)!.formula!;
  if (outcome.kind === 'reference') {
    sheet.setFormula(top, left, { text: outcome.formula, kind: formula.kind, area });
    return;
  }
  // The old formula takes what it filled with it.
  const values: { row: number; column: number; value: NonNullable<ReturnType<SheetPart['cell']>>['value'] }[] = [];
  eachCell(area, (row, column) => values.push({ row, column, value: sheet.cell(row, column)?.value ?? null }));
  sheet.setFormula(top, left, undefined);
  for (const { row, column, value } of values) {
    if (outcome.kind === 'formulas') {
      sheet.setFormula(row, column, { text: outcome.formulas[row - top]![column - left]!, kind: 'ordinary', area: singleCell(row, column) });
    }
    if (outcome.kind === 'formulas' || value !== null || !isSingle(area)) sheet.setValue(row, column, value);
  }
}

async function replaceNames(book: Book, names: Replacement['names']): Promise<void> {
  await book.archive.edit(book.part, (_xml, root) => {
    const elements = childrenOf(child(root, 'definedNames'), 'definedName');
    return names.map(({ name, sheet, text }) => {
      const element = elements[book.names.findIndex((one) => one.name === name && one.sheet === sheet)]!;
      return text === null ? { start: element.start, end: element.elementEnd, text: '' } : { start: element.end, end: element.contentEnd, text: escapeText(text) };
    });
  });
  book.names = book.names.flatMap((one) => {
    const change = names.find(({ name, sheet }) => one.name === name && one.sheet === sheet);
    return !change ? [one] : change.text === null ? [] : [{ ...one, text: change.text }];
  });
}

interface OtherFormula {
  sheet: SheetPart;
  where: string;
  element: XmlElement;
  replace(text: string | null): void | Promise<void>;
}

/** What a rule says whose formula is gone: it never applies, or allows everything. */
const NEVER: Record<string, string> = { conditionalFormatting: 'FALSE', dataValidation: 'TRUE' };

async function otherFormulas(book: Book): Promise<OtherFormula[]> {
  const found: OtherFormula[] = [];
  for (const sheet of book.sheets) {
    for (const rule of elementsWithin(sheet.root, ({ name }) => /(^|:)(conditionalFormatting|dataValidation)$/.test(name))) {
      const kind = rule.name.replace(/^.*:/, '');
      const where = rule.attributes.sqref ?? elementsWithin(rule, ({ name }) => name.endsWith('sqref'))[0]?.text ?? '';
      for (const element of elementsWithin(rule, ({ name }) => /(^|:)(formula[12]?|f)$/.test(name))) {
        if (element.children.length === 0) found.push({ sheet, where, element, replace: (text) => sheet.setText(element, text ?? NEVER[kind]!) });
      }
    }
    for (const { type, target } of await book.archive.relations(sheet.part)) {
      if (type !== 'table' || !book.archive.has(target)) continue;
      const root = await book.archive.xml(target);
      const formulas = (of: XmlElement) => elementsWithin(of, ({ name }) => name === 'calculatedColumnFormula' || name === 'totalsRowFormula');
      for (const [i, element] of formulas(root).entries()) {
        found.push({
          sheet, where: root.attributes.displayName ?? cellAddress(0, 0), element,
          replace: (text) => book.archive.edit(target, (_xml, now) => {
            const { start, end, contentEnd, elementEnd } = formulas(now)[i]!;
            return [text === null ? { start, end: elementEnd, text: '' } : { start: end, end: contentEnd, text: escapeText(text) }];
          }),
        });
      }
    }
  }
  return found;
}

/** The elements inside of one that are wanted; not those inside of these. */
const elementsWithin = ({ children }: XmlElement, wanted: (element: XmlElement) => boolean): XmlElement[] =>
  children.flatMap((element) => (wanted(element) ? [element] : elementsWithin(element, wanted)));
