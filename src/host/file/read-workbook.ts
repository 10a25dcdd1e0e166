// A workbook file as plain data.

import type { Cell, Sheet, Style, Workbook } from '../port';
import { areaAddress, columnsOf, isSingle, rowsOf } from '../../formula/address';
import { type Book, isBuiltIn, openBook } from './book';
import { toSheetFormula } from './formula-to-sheet';
import { markFormats, marksOf } from './marks';
import { notKept } from './not-kept';
import { readNotes } from './notes';
import { STANDARD_WIDTH, heightInPixels, widthInPixels } from './pixels';
import { readStyles } from './read-styles';
import type { FileCell, SheetPart } from './sheet-part';
import { child, childrenOf, isOn } from './xml';

export interface ReadWorkbook {
  workbook: Workbook;
  /** What the file holds beyond that, in words such as "charts"; a file written from the workbook will not have it. */
  notKept: string[];
}

/** @throws HostFault where the bytes are no .xlsx workbook that can be read */
export async function readWorkbook(bytes: Uint8Array): Promise<ReadWorkbook> {
  const book = await openBook(bytes);
  const styles = await readStyles(book);
  const marks = await markFormats(book);
  const sheets = await Promise.all(book.sheets.map(async (sheet) => {
    const [notes, marksNegative] = [await readNotes(book.archive, sheet.part), marksOf(sheet, marks)];
    return { ...plainSheet(book, sheet, styles), ...(Object.keys(notes).length > 0 && { notes }), ...(marksNegative.length > 0 && { marksNegative }) };
  }));
  return { workbook: { sheets, names: plainNames(book) }, notKept: await notKept(book) };
}

function plainSheet(book: Book, sheet: SheetPart, styles: readonly (Style | undefined)[]): Sheet {
  const cells: Sheet['cells'] = {};
  for (const { row, column, cell } of sheet.cells()) {
    const plain = plainCell(book, sheet, row, column, cell, styles[Number(cell.style ?? 0)]);
    if (!plain) continue;
    const line = (cells[row] ??= {});
    line[column] = plain;
  }
  return { name: sheet.name, cells, columns: columnWidths(sheet), rows: rowHeights(sheet), merges: sheet.merges.map(areaAddress), frozen: frozenPanes(sheet) };
}

function plainCell(book: Book, sheet: SheetPart, row: number, column: number, cell: FileCell, style: Style | undefined): Cell | null {
  const { value } = cell;
  const formula = cell.formula && sheetFormula(book, sheet, row, column, cell.formula);
  if (value === null && !formula && !style) return null;
  const { area } = cell.formula ?? {};
  return {
    value,
    ...(formula && { formula }),
    ...(formula && area && !isSingle(area) && { spill: { rows: rowsOf(area), columns: columnsOf(area) } }),
    ...(style && { style }),
  };
}

/** A formula that leans on something outside of the workbook gives way to its value. */
function sheetFormula(book: Book, sheet: SheetPart, row: number, column: number, formula: NonNullable<FileCell['formula']>): string | undefined {
  if (formula.kind === 'what-if') return undefined;
  const place = { sheet: sheet.name, row, column };
  const translation = toSheetFormula(book, formula, place, {
    names: 'keep',
    spillOf: (anchor) => book.sheets.find(({ name }) => name === anchor.sheet)?.cell(anchor.row, anchor.column)?.formula?.area
      ?? { top: anchor.row, left: anchor.column, bottom: anchor.row, right: anchor.column },
  });
  return translation.obstacle === 'another workbook' ? undefined : translation.formula;
}

/** Names of the whole workbook, and those of a single sheet whose name is free. */
function plainNames(book: Book): Workbook['names'] {
  const names: Workbook['names'] = {};
  const ordered = [...book.names].sort((a, b) => Number(a.sheet !== undefined) - Number(b.sheet !== undefined));
  const taken = new Set<string>();
  for (const { name, text, sheet } of ordered) {
    const place = { sheet: sheet ?? book.sheets[0]!.name, row: 0, column: 0 };
    if (isBuiltIn(name) || taken.has(name.toLowerCase())) continue;
    const { formula, obstacle } = toSheetFormula(book, { text, kind: 'dynamic' }, place, { names: 'keep', spillOf: ({ row, column }) => ({ top: row, left: column, bottom: row, right: column }) });
    if (obstacle === 'another workbook') continue;
    taken.add(name.toLowerCase());
    names[name] = formula.slice(1);
  }
  return names;
}

/** How many columns a sheet can have; a width for all of them is one for those in use. */
const ALL_COLUMNS = 16_384;

function columnWidths(sheet: SheetPart): Sheet['columns'] {
  const columns: Sheet['columns'] = {};
  const used = sheet.extent.column;
  const standard = widthInPixels(Number(child(sheet.root, 'sheetFormatPr')?.attributes.defaultColWidth ?? NaN));
  if (standard > 0 && standard !== STANDARD_WIDTH) for (let column = 0; column <= used; column++) columns[column] = { width: standard };
  for (const { attributes: { min, max, width, hidden } } of childrenOf(child(sheet.root, 'cols'), 'col')) {
    const last = Number(max) >= ALL_COLUMNS ? Math.max(used, Number(min) - 1) : Number(max) - 1;
    for (let column = Number(min) - 1; column <= last; column++) {
      columns[column] = { ...(width !== undefined && { width: widthInPixels(Number(width)) }), ...(isOn(hidden, false) && { hidden: true }) };
    }
  }
  return columns;
}

function rowHeights(sheet: SheetPart): Sheet['rows'] {
  const rows: Sheet['rows'] = {};
  for (const { row, attributes: { ht, hidden } } of sheet.rows) {
    if (ht === undefined && !isOn(hidden, false)) continue;
    rows[row] = { ...(ht !== undefined && { height: heightInPixels(Number(ht)) }), ...(isOn(hidden, false) && { hidden: true }) };
  }
  return rows;
}

function frozenPanes(sheet: SheetPart): Sheet['frozen'] {
  const { state, xSplit, ySplit } = child(child(child(sheet.root, 'sheetViews'), 'sheetView'), 'pane')?.attributes ?? {};
  return state === 'frozen' || state === 'frozenSplit' ? { rows: Number(ySplit ?? 0), columns: Number(xSplit ?? 0) } : { rows: 0, columns: 0 };
}
