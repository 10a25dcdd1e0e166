// Plain data as a workbook file.

import JSZip from 'jszip';
import type { Cell, Sheet, Workbook } from '../port';
import { type Area, areaOf, cellAddress, isSingle, parseArea, singleCell } from '../../formula/address';
import { isError } from './cell-values';
import { metadataContentType, metadataRelation, metadataText } from './dynamic-arrays';
import { faults } from './faults';
import { toFileFormula } from './formula-to-file';
import { marksXml } from './marks';
import { noteBoxesXml, notesXml } from './notes';
import { STANDARD_WIDTH, heightInPoints, widthInDigits } from './pixels';
import { formulaXml, valueXml } from './sheet-part';
import { attributeText, escapeText } from './xml';
import { StyleSheet } from './write-styles';

/** @throws HostFault where a sheet has a name that a file can't have */
export async function writeWorkbook(workbook: Workbook): Promise<Uint8Array> {
  for (const { name } of workbook.sheets) if (!isSheetName(name)) throw faults.sheetName(name);
  const styles = new StyleSheet();
  const writers = workbook.sheets.map((sheet) => new SheetWriter(sheet, workbook.names, styles));
  const sheets = writers.map((writer, i) => writer.toXml(i === 0));
  const zip = new JSZip();
  const put = (part: string, text: string) => zip.file(part, text, { createFolders: false });
  const parts: Part[] = [
    ...sheets.map((text, i) => ({ part: `worksheets/sheet${i + 1}.xml`, text, relation: `${OFFICE}/worksheet`, content: `${CONTENT}.worksheet+xml` })),
    { part: 'styles.xml', text: styles.toXml(), relation: `${OFFICE}/styles`, content: `${CONTENT}.styles+xml` },
    ...(writers.some(({ spills }) => spills) ? [{ part: 'metadata.xml', text: metadataText, relation: metadataRelation, content: metadataContentType }] : []),
  ];
  const noted = workbook.sheets.flatMap(({ notes = {} }, i) => (Object.keys(notes).length > 0 ? [{ number: i + 1, notes }] : []));
  put('[Content_Types].xml', contentTypes(parts, noted.map(({ number }) => number)));
  put('_rels/.rels', relationships([{ target: 'xl/workbook.xml', type: `${OFFICE}/officeDocument` }]));
  put('xl/workbook.xml', workbookXml(workbook));
  put('xl/_rels/workbook.xml.rels', relationships(parts.map(({ part, relation }) => ({ target: part, type: relation }))));
  for (const { part, text } of parts) put(`xl/${part}`, text);
  for (const { number, notes } of noted) {
    put(`xl/worksheets/_rels/sheet${number}.xml.rels`, relationships([
      { target: `../comments${number}.xml`, type: `${OFFICE}/comments` }, { target: `../drawings/vmlDrawing${number}.vml`, type: `${OFFICE}/vmlDrawing` },
    ]));
    put(`xl/comments${number}.xml`, DECLARATION + notesXml(notes));
    put(`xl/drawings/vmlDrawing${number}.vml`, noteBoxesXml(notes));
  }
  return zip.generateAsync({ type: 'uint8array', compression: 'DEFLATE' });
}

interface Part {
  part: string;
  text: string;
  relation: string;
  content: string;
}

const DECLARATION = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n';
const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const OFFICE = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006';
const CONTENT = 'application/vnd.openxmlformats-officedocument.spreadsheetml';

const isSheetName = (name: string): boolean => /^[^[\]:*?/\\]{1,31}$/.test(name) && !name.startsWith("'") && !name.endsWith("'");

/** @param noted numbers of the sheets with notes */
const contentTypes = (parts: Part[], noted: number[]): string => `${DECLARATION}<Types xmlns="${PACKAGE}/content-types">`
  + '<Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" ContentType="application/xml"/>'
  + (noted.length > 0 ? '<Default Extension="vml" ContentType="application/vnd.openxmlformats-officedocument.vmlDrawing"/>' : '')
  + `<Override PartName="/xl/workbook.xml" ContentType="${CONTENT}.sheet.main+xml"/>`
  + `${parts.map(({ part, content }) => `<Override PartName="/xl/${part}" ContentType="${content}"/>`).join('')}`
  + `${noted.map((number) => `<Override PartName="/xl/comments${number}.xml" ContentType="${CONTENT}.comments+xml"/>`).join('')}</Types>`;

const relationships = (list: { target: string; type: string }[]): string => `${DECLARATION}<Relationships xmlns="${PACKAGE}/relationships">`
  + `${list.map(({ target, type }, i) => `<Relationship Id="rId${i + 1}" Type="${type}" Target="${target}"/>`).join('')}</Relationships>`;

function workbookXml({ sheets, names }: Workbook): string {
  const defined = Object.entries(names).map(([name, text]) => `<definedName${attributeText({ name })}>${escapeText(toFileFormula(text, names).text)}</definedName>`);
  return `${DECLARATION}<workbook xmlns="${MAIN}" xmlns:r="${OFFICE}"><bookViews><workbookView/></bookViews>`
    + `<sheets>${sheets.map(({ name }, i) => `<sheet${attributeText({ name, sheetId: i + 1, 'r:id': `rId${i + 1}` })}/>`).join('')}</sheets>`
    + `${defined.length > 0 ? `<definedNames>${defined.join('')}</definedNames>` : ''}</workbook>`;
}

class SheetWriter {
  /** Whether it wrote a formula that spills. */
  spills = false;

  /** Cells that a formula fills from another cell. */
  readonly #filled = new Set<string>();

  constructor(private readonly sheet: Sheet, private readonly names: Workbook['names'], private readonly styles: StyleSheet) {
    for (const [row, line] of indexed(sheet.cells)) {
      for (const [column, { spill }] of indexed(line)) {
        for (let r = 0; r < (spill?.rows ?? 1); r++) for (let c = 0; c < (spill?.columns ?? 1); c++) if (r + c > 0) this.#filled.add(cellAddress(row + r, column + c));
      }
    }
  }

  toXml(isFirst: boolean): string {
    const { merges, frozen, marksNegative = [], notes = {} } = this.sheet;
    const areas = merges.filter((merge) => isMerge(parseArea(merge)));
    return `${DECLARATION}<worksheet xmlns="${MAIN}" xmlns:r="${OFFICE}"><sheetViews><sheetView${attributeText({ tabSelected: isFirst ? 1 : undefined, workbookViewId: 0 })}>`
      + `${paneXml(frozen)}</sheetView></sheetViews><sheetFormatPr defaultRowHeight="15"/>${this.#columnsXml()}<sheetData>${this.#rowsXml()}</sheetData>`
      + `${areas.length > 0 ? `<mergeCells count="${areas.length}">${areas.map((ref) => `<mergeCell${attributeText({ ref })}/>`).join('')}</mergeCells>` : ''}`
      + `${marksXml(marksNegative)}${Object.keys(notes).length > 0 ? '<legacyDrawing r:id="rId2"/>' : ''}</worksheet>`;
  }

  #columnsXml(): string {
    const columns = indexed(this.sheet.columns).map(([column, { width, hidden }]) => `<col${attributeText({
      min: column + 1, max: column + 1, width: widthInDigits(width ?? STANDARD_WIDTH), customWidth: width === undefined ? undefined : 1, hidden: hidden ? 1 : undefined,
    })}/>`);
    return columns.length > 0 ? `<cols>${columns.join('')}</cols>` : '';
  }

  #rowsXml(): string {
    const rows = new Map<number, Record<number, Cell>>([...indexed(this.sheet.rows).map(([row]) => [row, {}] as const), ...indexed(this.sheet.cells)]);
    return [...rows].sort(([a], [b]) => a - b).map(([row, line]) => {
      const { height, hidden } = this.sheet.rows[row] ?? {};
      const attributes = attributeText({
        r: row + 1, ht: height === undefined ? undefined : heightInPoints(height), customHeight: height === undefined ? undefined : 1, hidden: hidden ? 1 : undefined,
      });
      return `<row${attributes}>${indexed(line).map(([column, cell]) => this.#cellXml(row, column, cell)).join('')}</row>`;
    }).join('');
  }

  #cellXml(row: number, column: number, cell: Cell): string {
    const r = cellAddress(row, column);
    const form = cell.formula === undefined ? null : this.#formulaOf(row, column, cell, cell.formula);
    const { type, text } = valueXml(cell.value, form !== null || this.#filled.has(r));
    const content = (form ? formulaXml(form) : '') + text;
    const attributes = attributeText({ r, s: cell.style && this.styles.indexOf(cell.style), t: type, cm: form?.kind === 'dynamic' ? 1 : undefined });
    return content === '' ? `<c${attributes}/>` : `<c${attributes}>${content}</c>`;
  }

  #formulaOf(row: number, column: number, { value, spill }: Cell, formula: string) {
    const area: Area = spill ? areaOf(row, column, spill) : singleCell(row, column);
    const { text, fillsOneCell, callsFold } = toFileFormula(formula, this.names);
    // A function of ours that shows an error now may fill a table once its arguments are right.
    const mayFillMore = !isSingle(area) || !fillsOneCell || (isError(value) && callsFold);
    this.spills ||= mayFillMore;
    return { text, area, kind: mayFillMore ? 'dynamic' as const : 'ordinary' as const };
  }
}

function paneXml({ rows, columns }: Sheet['frozen']): string {
  if (rows === 0 && columns === 0) return '';
  const activePane = rows === 0 ? 'topRight' : columns === 0 ? 'bottomLeft' : 'bottomRight';
  const splits = { xSplit: columns || undefined, ySplit: rows || undefined };
  return `<pane${attributeText({ ...splits, topLeftCell: cellAddress(rows, columns), activePane, state: 'frozen' })}/>`;
}

const isMerge = (area: Area | null): boolean => area !== null && !isSingle(area);

/** Entries by number, ascending. */
const indexed = <T>(entries: Record<number, T>): [number, T][] => Object.entries(entries).map(([key, value]): [number, T] => [Number(key), value]).sort(([a], [b]) => a - b);
