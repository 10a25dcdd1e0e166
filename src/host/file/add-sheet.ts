// A sheet more in a workbook file.

import { cellAddress } from '../../formula/address';
import type { CellInput } from '../port';
import { type Book, relationId } from './book';
import { widthInDigits } from './pixels';
import { SheetPart, formulaXml, valueXml } from './sheet-part';
import { append, attributeText, child, childrenOf, prefixOf } from './xml';

const RELATION = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet';
const CONTENT = 'application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml';

export interface NewSheet {
  /** One that is free. */
  name: string;
  rows: CellInput[][];
  /** Widths of its columns in pixels, from the first on. */
  widths: number[];
}

/** Adds it behind all tabs. */
export async function addSheet(book: Book, { name, rows, widths }: NewSheet): Promise<void> {
  const { archive } = book;
  const folder = book.sheets[0]!.part.replace(/[^/]*$/, '');
  let number = book.sheets.length + 1;
  while (archive.has(`${folder}sheet${number}.xml`)) number++;
  const part = `${folder}sheet${number}.xml`;
  const xml = sheetXml(rows, widths);
  await archive.add(part, xml, book.part, RELATION, CONTENT);
  const id = (await archive.relations(book.part)).find(({ target }) => target === part)!.id;
  await archive.edit(book.part, (text, root) => {
    const list = child(root, 'sheets')!;
    const tabs = childrenOf(list, 'sheet').map(({ attributes }) => attributes);
    // The prefix of the attribute that names a relation is the one that the file declares.
    const idName = Object.keys(tabs[0]!).find((key) => tabs[0]![key] === relationId(tabs[0]!))!;
    const sheetId = Math.max(...tabs.map((attributes) => Number(attributes.sheetId))) + 1;
    return [append(text, list, `<${prefixOf(text, list)}sheet${attributeText({ name, sheetId, [idName]: id })}/>`)];
  });
  book.sheets.push(SheetPart.read(name, part, xml, [], book.arrays));
}

function sheetXml(rows: CellInput[][], widths: number[]): string {
  const columns = widths.map((width, i) => `<col${attributeText({ min: i + 1, max: i + 1, width: widthInDigits(width), customWidth: 1 })}/>`).join('');
  const lines = rows.map((line, row) => `<row r="${row + 1}">${line.map((input, column) => cellXml(row, column, input)).join('')}</row>`);
  return '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n<worksheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">'
    + `<sheetFormatPr defaultRowHeight="15"/><cols>${columns}</cols><sheetData>${lines.join('')}</sheetData></worksheet>`;
}

function cellXml(row: number, column: number, input: CellInput): string {
  if (input === null || input === '') return '';
  const r = cellAddress(row, column);
  if (typeof input === 'object') {
    const area = { top: row, left: column, bottom: row, right: column };
    return `<c${attributeText({ r })}>${formulaXml({ text: input.formula.slice(1), kind: 'ordinary', area })}</c>`;
  }
  const { type, text } = valueXml(input, false);
  return `<c${attributeText({ r, t: type })}>${text}</c>`;
}
