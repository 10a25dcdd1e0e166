// A workbook file, opened: its sheets, names and tables.

import type { SharedString } from './cell-values';
import { DynamicArrays } from './dynamic-arrays';
import { faults } from './faults';
import { Package, type Relation, readPart } from './package';
import { SheetPart, readSharedStrings } from './sheet-part';
import { type Table, readTable } from './tables';
import { type XmlElement, child, childrenOf, isOn } from './xml';

export interface DefinedName {
  name: string;
  /** What it refers to, as the file has it. */
  text: string;
  /** The only sheet that knows it; undefined where the whole workbook does. */
  sheet?: string;
  hidden: boolean;
}

export interface Book {
  archive: Package;
  /** The part that lists the sheets, and what it says. */
  part: string;
  root: XmlElement;
  relations: Relation[];
  /** The worksheets, in the order of their tabs. */
  sheets: SheetPart[];
  /** Tabs that are no worksheets. */
  otherTabs: string[];
  hiddenSheets: string[];
  activeSheet: string;
  names: DefinedName[];
  tables: Table[];
  arrays: DynamicArrays;
  /** Whether the file itself says that its values must not be relied on. */
  valuesAreStale: boolean;
}

/** @throws HostFault where the bytes are no .xlsx workbook that can be read */
export async function openBook(bytes: Uint8Array): Promise<Book> {
  const archive = await Package.open(bytes);
  const part = await workbookPart(archive);
  const root = await archive.xml(part);
  const relations = await archive.relations(part);
  const arrays = await DynamicArrays.of(archive, relations);
  const strings = await sharedStrings(archive, relations);
  const tabs = childrenOf(child(root, 'sheets'), 'sheet').map(({ attributes }) => ({ attributes, relation: relations.find(({ id }) => id === relationId(attributes)) }));
  const worksheets = tabs.filter(({ relation }) => relation?.type === 'worksheet');
  if (worksheets.length === 0) throw faults.noSheet();
  const sheets: SheetPart[] = [];
  const tables: Table[] = [];
  for (const { attributes: { name = '' }, relation } of worksheets) {
    const { target } = relation!;
    const xml = await archive.text(target);
    sheets.push(readPart(target, () => SheetPart.read(name, target, xml, strings, arrays)));
    tables.push(...await sheetTables(archive, name, target));
  }
  const activeTab = Number(child(child(root, 'bookViews'), 'workbookView')?.attributes.activeTab ?? 0);
  const active = tabs[activeTab]?.attributes.name;
  return {
    archive, part, root, relations, sheets, tables, arrays,
    otherTabs: tabs.filter((tab) => !worksheets.includes(tab)).map(({ attributes }) => attributes.name ?? ''),
    hiddenSheets: worksheets.filter(({ attributes: { state = 'visible' } }) => state !== 'visible').map(({ attributes }) => attributes.name ?? ''),
    activeSheet: sheets.find(({ name }) => name === active)?.name ?? sheets[0]!.name,
    names: childrenOf(child(root, 'definedNames'), 'definedName').map(({ attributes: { name = '', localSheetId, hidden }, text }) => ({
      name, text, hidden: isOn(hidden, false), ...(localSheetId === undefined ? {} : { sheet: tabs[Number(localSheetId)]?.attributes.name ?? '' }),
    })),
    valuesAreStale: isOn(child(root, 'calcPr')?.attributes.fullCalcOnLoad, false),
  };
}

export const sheetNamed = (book: Book, name: string): SheetPart | undefined => book.sheets.find((sheet) => sheet.name.toLowerCase() === name.toLowerCase());

/** A defined name as a sheet knows it: its own before the workbook's. */
export function findName(book: Book, name: string, sheet: string): DefinedName | undefined {
  const alike = book.names.filter((one) => one.name.toLowerCase() === name.toLowerCase());
  return alike.find((one) => one.sheet?.toLowerCase() === sheet.toLowerCase()) ?? alike.find((one) => one.sheet === undefined);
}

/** Names that programs give to what they keep for themselves, such as the area to print. */
export const isBuiltIn = (name: string): boolean => /^_xlnm\./i.test(name);

/** The id of a relation that an element refers to: the one attribute of that name which has a prefix. */
export const relationId = (attributes: Record<string, string>): string | undefined =>
  Object.entries(attributes).find(([name]) => /:id$/.test(name))?.[1];

async function workbookPart(archive: Package): Promise<string> {
  const main = (await archive.relations()).find(({ type }) => type === 'officeDocument')?.target;
  if (main !== undefined && /\.bin$/i.test(main)) throw faults.binaryFormat();
  if (main === undefined && archive.has('mimetype')) throw faults.openDocument();
  if (main === undefined || (!archive.has(main) && !archive.has('xl/workbook.xml'))) throw faults.noWorkbook();
  if ((await archive.xml(main)).name !== 'workbook') throw faults.noWorkbook();
  return main;
}

async function sharedStrings(archive: Package, relations: Relation[]): Promise<SharedString[]> {
  const part = relations.find(({ type }) => type === 'sharedStrings')?.target;
  return part === undefined || !archive.has(part) ? [] : readSharedStrings(await archive.xml(part));
}

async function sheetTables(archive: Package, sheet: string, part: string): Promise<Table[]> {
  const parts = (await archive.relations(part)).filter(({ type, target }) => type === 'table' && archive.has(target));
  const tables = await Promise.all(parts.map(async ({ target }) => readTable(sheet, await archive.xml(target))));
  return tables.filter((table) => table !== null);
}
