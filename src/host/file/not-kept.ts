// What a workbook file holds that plain data has no place for.

import { type Book, isBuiltIn } from './book';
import { isMark, markFormats } from './marks';
import type { SheetPart } from './sheet-part';
import { type XmlElement, child, childrenOf, isOn } from './xml';

/** Words for it, in a fixed order. */
export async function notKept(book: Book): Promise<string[]> {
  const marks = await markFormats(book);
  const found = new Set([...await inParts(book), ...inWorkbook(book), ...book.sheets.flatMap((sheet) => [...inSheet(sheet, marks), ...inCells(sheet)])]);
  return ORDER.filter((words) => found.has(words));
}

const ORDER = [
  'macros', 'charts', 'chart sheets', 'pictures', 'shapes', 'embedded objects', 'form controls', 'sparklines', 'pivot tables', 'slicers',
  'tables (formulas name their cells instead)', 'references to a whole spill (formulas name its cells instead)', 'what-if tables',
  'links to other workbooks (their last values stay)', 'data connections', 'conditional formats', 'data validation', 'filters', 'comments', 'hyperlinks',
  'formats within a text', 'formats of whole rows and columns', 'groups of rows and columns', 'hidden sheets (they are shown)',
  'names that differ from sheet to sheet', 'protection', 'print areas', 'headers and footers',
] as const;

type Words = (typeof ORDER)[number];

/** By the type of a relation to it. */
const PARTS: Record<string, Words> = {
  vbaProject: 'macros', chart: 'charts', chartEx: 'charts', chartsheet: 'chart sheets', dialogsheet: 'chart sheets', image: 'pictures', oleObject: 'embedded objects',
  package: 'embedded objects', control: 'form controls', ctrlProp: 'form controls', pivotTable: 'pivot tables', slicer: 'slicers', timeline: 'slicers',
  table: 'tables (formulas name their cells instead)', externalLink: 'links to other workbooks (their last values stay)', connections: 'data connections',
  queryTable: 'data connections', threadedComment: 'comments', hyperlink: 'hyperlinks',
};

/** By the name of an element of a sheet. */
const ELEMENTS: Record<string, Words> = {
  dataValidations: 'data validation', autoFilter: 'filters', hyperlinks: 'hyperlinks', sheetProtection: 'protection',
  headerFooter: 'headers and footers', oleObjects: 'embedded objects', controls: 'form controls',
};

/** By the end of the name of an extension of a sheet. */
const EXTENSIONS: Record<string, Words> = {
  sparklineGroups: 'sparklines', conditionalFormattings: 'conditional formats', dataValidations: 'data validation', slicerList: 'slicers',
};

async function inParts({ archive }: Book): Promise<Words[]> {
  const found: Words[] = [];
  for (const part of archive.parts.filter((name) => !/(^|\/)_rels\/|\/$/.test(name))) {
    for (const { type, target } of await archive.relations(part)) {
      const words = PARTS[type];
      if (words) found.push(words);
      if (type === 'drawing' && archive.has(target) && hasShapes(await archive.xml(target))) found.push('shapes');
    }
  }
  return found;
}

const hasShapes = (element: XmlElement): boolean => ['sp', 'cxnSp', 'grpSp'].includes(element.name) || element.children.some(hasShapes);

function inWorkbook(book: Book): Words[] {
  const own = book.names.filter(({ name }) => !isBuiltIn(name)).map(({ name }) => name.toLowerCase());
  return [
    ...(book.names.some(({ name }) => /^_xlnm\.print_/i.test(name)) ? ['print areas' as const] : []),
    ...(new Set(own).size < own.length ? ['names that differ from sheet to sheet' as const] : []),
    ...(book.hiddenSheets.length > 0 ? ['hidden sheets (they are shown)' as const] : []),
    ...(child(book.root, 'workbookProtection') ? ['protection' as const] : []),
  ];
}

function inSheet({ root, rows }: SheetPart, marks: ReadonlySet<number>): Words[] {
  const extensions = childrenOf(child(root, 'extLst'), 'ext').flatMap(({ children }) => children.map(({ name }) => EXTENSIONS[name.slice(name.indexOf(':') + 1)]));
  const columns = childrenOf(child(root, 'cols'), 'col').map(({ attributes }) => attributes);
  const lines = [...columns, ...rows.map(({ attributes }) => attributes)];
  return [
    ...root.children.map(({ name }) => ELEMENTS[name]),
    ...extensions,
    childrenOf(root, 'conditionalFormatting').some((element) => !isMark(element, marks)) ? 'conditional formats' as const : undefined,
    lines.some(({ outlineLevel = '0' }) => outlineLevel !== '0') ? 'groups of rows and columns' as const : undefined,
    columns.some(({ style = '0' }) => style !== '0') || rows.some(({ attributes: { s = '0', customFormat } }) => s !== '0' && isOn(customFormat, false))
      ? 'formats of whole rows and columns' as const : undefined,
  ].filter((words) => words !== undefined);
}

function inCells(sheet: SheetPart): Words[] {
  const found: Words[] = [];
  for (const { cell: { rich, formula } } of sheet.cells()) {
    if (rich) found.push('formats within a text');
    if (formula?.kind === 'what-if') found.push('what-if tables');
    if (formula && /ANCHORARRAY\(/i.test(formula.text)) found.push('references to a whole spill (formulas name its cells instead)');
  }
  return found;
}
