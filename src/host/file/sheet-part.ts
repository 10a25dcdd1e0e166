// The part of a worksheet: its cells as they are read, and the same XML again with the cells that have changed.

import { tokenize, translateTokensToA1, translateTokensToR1C1 } from '@borgar/fx/xlsx';
import type { CellValue } from '../port';
import { type Area, areaAddress, cellAddress, columnsOf, eachCell, isSingle, parseArea, rowsOf, sameArea, singleCell } from '../../formula/address';
import { type SharedString, readValue, sameValue, writeValue } from './cell-values';
import type { DynamicArrays } from './dynamic-arrays';
import { type Edit, type Tag, type XmlElement, XmlTree, applyEdits, attributeText, child, childrenOf, encodeCellText, escapeText, parseXml, prefixOf, visitXml } from './xml';

/** A formula as the file has it. */
export interface FileFormula {
  /** With the file's names of functions, without "=". */
  text: string;
  /** An `array` fills the cells it was entered for, a `dynamic` one as many as it needs; a `what-if` is computed by other means. */
  kind: 'ordinary' | 'array' | 'dynamic' | 'what-if';
  /** The cells that it fills. */
  area: Area;
  /** Ordinary formulas of one number are stored once. */
  shared?: string;
}

export interface FileCell {
  /** What it shows; null also where a formula was never computed. */
  value: CellValue;
  formula?: FileFormula;
  /** Index of its format. */
  style?: string;
  /** Whether parts of its text have formats of their own. */
  rich?: boolean;
  /** The formula that fills it from another cell: that cell. */
  filledFrom?: { row: number; column: number };
  /** Where its element stands. */
  source?: { start: number; end: number; formula?: FileFormula };
}

interface SourceRow {
  row: number;
  tag: Tag;
  contentEnd: number;
  cells: { column: number; start: number }[];
}

export class SheetPart {
  readonly #rows = new Map<number, Map<number, FileCell>>();
  readonly #changed = new Map<number, Set<number>>();
  /** Changes outside of the cells. */
  readonly #texts: Edit[] = [];

  private constructor(
    readonly name: string,
    readonly part: string,
    private readonly xml: string,
    /** The elements around the cells; that of the cells is empty. */
    readonly root: XmlElement,
    private readonly sourceRows: SourceRow[],
  ) {}

  /** Reads a worksheet's XML. Throws where it is not well-formed. */
  static read(name: string, part: string, xml: string, strings: readonly SharedString[], arrays: DynamicArrays): SheetPart {
    const reader = new SheetReader(strings, arrays);
    visitXml(xml, reader);
    const sheet = new SheetPart(name, part, xml, reader.tree.root!, reader.rows);
    for (const { row, column, cell } of reader.cells) sheet.#put(row, column, cell);
    expandShared(reader.cells);
    for (const { row, column, cell } of reader.cells) if (cell.formula) sheet.#claim(row, column, cell.formula, false);
    return sheet;
  }

  get changed(): boolean {
    return this.#changed.size > 0 || this.#texts.length > 0;
  }

  /** Whether a formula spills now that did not in the file. */
  get needsSpillMark(): boolean {
    return this.#changedCells.some(({ formula, source }) => formula?.kind === 'dynamic' && source?.formula?.kind !== 'dynamic');
  }

  /** Whether there are formulas in other cells now than in the file. */
  get movesFormulas(): boolean {
    return this.#changedCells.some(({ formula, source }) => {
      const before = source?.formula;
      return formula?.kind !== before?.kind || (formula && before && !sameArea(formula.area, before.area));
    });
  }

  cell(row: number, column: number): FileCell | undefined {
    return this.#rows.get(row)?.get(column);
  }

  /** All cells that the file has, row by row. */
  *cells(): Generator<{ row: number; column: number; cell: FileCell }> {
    for (const [row, columns] of [...this.#rows].sort(([a], [b]) => a - b)) {
      for (const [column, cell] of [...columns].sort(([a], [b]) => a - b)) yield { row, column, cell };
    }
  }

  /** The last row and column that hold a cell, -1 where none does. */
  get extent(): { row: number; column: number } {
    let [lastRow, lastColumn] = [-1, -1];
    for (const { row, column } of this.cells()) [lastRow, lastColumn] = [Math.max(lastRow, row), Math.max(lastColumn, column)];
    return { row: lastRow, column: lastColumn };
  }

  /** The rows that the file has an element for. */
  get rows(): { row: number; attributes: Record<string, string> }[] {
    return this.sourceRows.map(({ row, tag }) => ({ row, attributes: tag.attributes }));
  }

  get merges(): Area[] {
    return childrenOf(child(this.root, 'mergeCells'), 'mergeCell').flatMap(({ attributes }) => parseArea(attributes.ref ?? '') ?? []);
  }

  /** Sets the value that a cell shows; its formula stays. */
  setValue(row: number, column: number, value: CellValue): void {
    const cell = this.#cellToChange(row, column);
    if (!sameValue(cell.value, value)) this.#mark(row, column);
    cell.value = value;
  }

  /** Sets, changes or removes the formula of a cell, and clears what the old one filled. */
  setFormula(row: number, column: number, formula: FileFormula | undefined): void {
    const cell = this.#cellToChange(row, column);
    if (cell.formula?.shared !== undefined) this.#dissolve(cell.formula.shared);
    this.#release(row, column);
    cell.formula = formula;
    delete cell.filledFrom;
    this.#mark(row, column);
    if (formula) this.#claim(row, column, formula, true);
  }

  /** Sets the cells that an array formula fills; those that it fills no longer are cleared. */
  setFilledArea(row: number, column: number, area: Area): void {
    const cell = this.cell(row, column)!;
    this.#release(row, column);
    cell.formula = { ...cell.formula!, area };
    this.#mark(row, column);
    this.#claim(row, column, cell.formula, true);
  }

  /** Sets the text of an element outside of the cells that holds nothing else. */
  setText(element: XmlElement, text: string): void {
    this.#texts.push({ start: element.end, end: element.contentEnd, text: escapeText(text) });
  }

  /** The sheet's XML with the changed cells; the rest of it as it was. */
  toXml(spillMark: string): string {
    const data = child(this.root, 'sheetData');
    if (!data) return this.xml;
    const prefix = prefixOf(this.xml, data);
    const write = (row: number, column: number) => this.#cellXml(row, column, prefix, spillMark);
    const edits: Edit[] = [...this.#texts];
    const newRows: { row: number; text: string }[] = [];
    const source = new Map(this.sourceRows.map((one) => [one.row, one]));
    for (const [row, columns] of [...this.#changed].sort(([a], [b]) => a - b)) {
      const added = [...columns].filter((column) => !this.cell(row, column)!.source).sort((a, b) => a - b);
      for (const column of columns) {
        const place = this.cell(row, column)!.source;
        if (place) edits.push({ start: place.start, end: place.end, text: write(row, column) });
      }
      if (added.length === 0) continue;
      const existing = source.get(row);
      if (existing) edits.push(...insertCells(this.xml, existing, added.map((column) => ({ column, text: write(row, column) })), prefix));
      else newRows.push({ row, text: `<${prefix}row r="${row + 1}">${added.map((column) => write(row, column)).join('')}</${prefix}row>` });
    }
    edits.push(...insertRows(data, this.sourceRows, newRows, prefix), ...this.#dimensionEdit());
    return applyEdits(this.xml, edits);
  }

  get #changedCells(): FileCell[] {
    return [...this.#changed].flatMap(([row, columns]) => [...columns].map((column) => this.cell(row, column)!));
  }

  #put(row: number, column: number, cell: FileCell): void {
    const columns = this.#rows.get(row) ?? new Map<number, FileCell>();
    columns.set(column, cell);
    this.#rows.set(row, columns);
  }

  #cellToChange(row: number, column: number): FileCell {
    const cell = this.cell(row, column) ?? { value: null };
    this.#put(row, column, cell);
    return cell;
  }

  #mark(row: number, column: number): void {
    const columns = this.#changed.get(row) ?? new Set<number>();
    columns.add(column);
    this.#changed.set(row, columns);
  }

  /**
   * Notes for the cells of an array formula that they are filled by it. A cell with a formula of its own is not. Reading takes the
   * cells that are there: an area as the file states it may be of any size.
   */
  #claim(row: number, column: number, { kind, area }: FileFormula, create: boolean): void {
    if (kind === 'ordinary' || kind === 'what-if' || isSingle(area)) return;
    if (create) eachCell(area, (r, c) => this.#cellToChange(r, c));
    this.#eachIn(area, (r, c, cell) => {
      if (!cell.formula && !(r === row && c === column)) cell.filledFrom = { row, column };
    });
  }

  #release(row: number, column: number): void {
    const { formula } = this.cell(row, column)!;
    if (!formula) return;
    this.#eachIn(formula.area, (r, c, cell) => {
      if (cell.filledFrom?.row !== row || cell.filledFrom.column !== column) return;
      delete cell.filledFrom;
      this.setValue(r, c, null);
    });
  }

  /** The cells of an area that are there. */
  #eachIn(area: Area, visit: (row: number, column: number, cell: FileCell) => void): void {
    if (area.bottom - area.top < this.#rows.size) {
      for (let row = area.top; row <= area.bottom; row++) visitRow(row, this.#rows.get(row));
    } else {
      for (const [row, columns] of this.#rows) if (row >= area.top && row <= area.bottom) visitRow(row, columns);
    }
    function visitRow(row: number, columns: Map<number, FileCell> | undefined) {
      for (const [column, cell] of columns ?? []) if (column >= area.left && column <= area.right) visit(row, column, cell);
    }
  }

  /** Makes each formula of a shared one its own, before one of them changes: the others may lean on it. */
  #dissolve(shared: string): void {
    for (const { row, column, cell } of this.cells()) {
      if (cell.formula?.shared !== shared) continue;
      const { text, kind, area } = cell.formula;
      cell.formula = { text, kind, area };
      this.#mark(row, column);
    }
  }

  #cellXml(row: number, column: number, prefix: string, spillMark: string): string {
    const { value, formula, filledFrom, source, style } = this.cell(row, column)!;
    const old = source && parseXml(this.xml.slice(source.start, source.end));
    const sameFormula = formula !== undefined && formula === source?.formula;
    const attributes = { ...old?.attributes, r: cellAddress(row, column), s: style };
    const sameKind = formula?.kind === source?.formula?.kind;
    const marks = { cm: formula && sameKind ? old?.attributes.cm : formula?.kind === 'dynamic' ? spillMark : undefined };
    const formulaText = formula === undefined ? '' : sameFormula ? rawFormula(this.xml, source!.start, old!) : formulaXml(formula, prefix);
    const { type, text } = valueXml(value, formula !== undefined || filledFrom !== undefined, prefix);
    const content = formulaText + text;
    const tag = `<${prefix}c${attributeText({ ...attributes, ...marks, t: type, vm: undefined })}`;
    return content === '' ? `${tag}/>` : `${tag}>${content}</${prefix}c>`;
  }

  /** The area that the sheet says it uses has to hold the new cells. */
  #dimensionEdit(): Edit[] {
    const element = child(this.root, 'dimension');
    const area = parseArea(element?.attributes.ref ?? '');
    if (!element || !area) return [];
    const wider = { ...area };
    for (const [row, columns] of this.#changed) {
      for (const column of columns) {
        if (this.cell(row, column)!.source) continue;
        wider.top = Math.min(wider.top, row);
        wider.bottom = Math.max(wider.bottom, row);
        wider.left = Math.min(wider.left, column);
        wider.right = Math.max(wider.right, column);
      }
    }
    if (areaAddress(wider) === areaAddress(area)) return [];
    const tag = this.xml.slice(element.start, element.end);
    return [{ start: element.start, end: element.end, text: tag.replace(/ref\s*=\s*("[^"]*"|'[^']*')/, `ref="${areaAddress(wider)}"`) }];
  }
}

// Reading

/** A cell whose element is being read. */
interface OpenCell {
  tag: Tag;
  column: number;
  type?: string;
  formula?: Tag;
  formulaText: string;
  hasValue: boolean;
  text: string;
  runs: number;
}

/** Takes the cells out of a worksheet's XML, and keeps the elements around them. */
class SheetReader {
  readonly tree = new XmlTree();
  readonly rows: SourceRow[] = [];
  readonly cells: { row: number; column: number; cell: FileCell }[] = [];

  #inData = false;
  #row: SourceRow | null = null;
  #cell: OpenCell | null = null;
  /** Which text is being read: that of the formula or of the value. */
  #reading: 'formula' | 'value' | null = null;
  /** Depth of phonetic hints, whose text is no part of the value. */
  #hints = 0;

  constructor(private readonly strings: readonly SharedString[], private readonly arrays: DynamicArrays) {}

  open(tag: Tag): void {
    if (!this.#inData) {
      this.tree.open(tag);
      this.#inData = tag.name === 'sheetData';
    } else if (tag.name === 'row') this.#openRow(tag);
    else if (tag.name === 'c') this.#openCell(tag);
    else if (this.#cell) this.#openInCell(this.#cell, tag);
  }

  text(text: string): void {
    if (!this.#inData) this.tree.text(text);
    else if (!this.#cell || this.#hints > 0) return;
    else if (this.#reading === 'formula') this.#cell.formulaText += text;
    else if (this.#reading === 'value') this.#cell.text += text;
  }

  close(name: string, start: number, end: number): void {
    if (!this.#inData || name === 'sheetData') {
      this.#inData = false;
      this.tree.close(name, start, end);
    } else if (name === 'row') {
      this.#row!.contentEnd = start;
      this.#row = null;
    } else if (name === 'c') this.#closeCell(end);
    else if (name === 'rPh') this.#hints--;
    else if (name === 'f' || name === 'v' || name === 't') this.#reading = null;
  }

  #openRow(tag: Tag): void {
    // Rows and cells may leave out where they are: then they follow the one before.
    const row = tag.attributes.r === undefined ? (this.rows.at(-1)?.row ?? -1) + 1 : Number(tag.attributes.r) - 1;
    this.#row = { row, tag, contentEnd: tag.end, cells: [] };
    this.rows.push(this.#row);
  }

  #openCell(tag: Tag): void {
    const address = parseArea(tag.attributes.r ?? '');
    const column = address?.left ?? (this.#row!.cells.at(-1)?.column ?? -1) + 1;
    this.#row!.cells.push({ column, start: tag.start });
    this.#cell = { tag, column, type: tag.attributes.t, formulaText: '', hasValue: false, text: '', runs: 0 };
  }

  #openInCell(cell: OpenCell, tag: Tag): void {
    if (tag.name === 'f') [cell.formula, this.#reading] = [tag, 'formula'];
    else if (tag.name === 'v' || tag.name === 't') [cell.hasValue, this.#reading] = [true, 'value'];
    else if (tag.name === 'r') cell.runs++;
    else if (tag.name === 'rPh') this.#hints++;
  }

  #closeCell(end: number): void {
    const { tag, column, type, formula: formulaTag, formulaText, hasValue, text, runs } = this.#cell!;
    const { row } = this.#row!;
    const cell: FileCell = { value: hasValue ? readValue(type, text, this.strings) : null };
    if (tag.attributes.s !== undefined) cell.style = tag.attributes.s;
    if (runs > 0 || (type === 's' && this.strings[Number(text)]?.rich)) cell.rich = true;
    if (formulaTag) cell.formula = this.#formula(formulaTag, formulaText, row, column, tag.attributes.cm);
    cell.source = { start: tag.start, end, formula: cell.formula };
    this.cells.push({ row, column, cell });
    this.#cell = null;
  }

  #formula({ attributes: { t, ref, si } }: Tag, text: string, row: number, column: number, mark: string | undefined): FileFormula {
    const area = parseArea(ref ?? '') ?? singleCell(row, column);
    if (rowsOf(area) * columnsOf(area) > MOST_CELLS) throw new Error(`A formula fills ${ref}.`);
    if (t === 'array') return { text, kind: this.arrays.isDynamic(mark) ? 'dynamic' : 'array', area };
    if (t === 'dataTable') return { text, kind: 'what-if', area };
    const ordinary: FileFormula = { text, kind: 'ordinary', area: singleCell(row, column) };
    return t === 'shared' && si !== undefined ? { ...ordinary, shared: si } : ordinary;
  }
}

/** More cells than one formula fills in any real workbook: two whole columns. */
const MOST_CELLS = 2_097_152;

/** Gives each cell of a shared formula its own text: the first one's, moved. */
function expandShared(cells: readonly { row: number; column: number; cell: FileCell }[]): void {
  const masters = new Map<string, ReturnType<typeof tokenize>>();
  for (const { row, column, cell: { formula } } of cells) {
    if (formula?.shared === undefined) continue;
    const address = cellAddress(row, column);
    if (formula.text !== '') masters.set(formula.shared, translateTokensToR1C1(tokenize(formula.text), address));
    else {
      const master = masters.get(formula.shared) ?? [];
      formula.text = translateTokensToA1(master, address).map(({ value }) => value).join('');
    }
  }
}

/** The strings that cells share. */
export function readSharedStrings(root: XmlElement): SharedString[] {
  return childrenOf(root, 'si').map((item) => {
    const runs = childrenOf(item, 'r');
    const parts = runs.length > 0 ? runs.flatMap((run) => childrenOf(run, 't')) : childrenOf(item, 't');
    return { text: decodeRuns(parts), rich: runs.length > 0 };
  });
}

const decodeRuns = (parts: XmlElement[]): string => readValue('str', parts.map(({ text }) => text).join(''), []) as string;

// Writing

function rawFormula(xml: string, start: number, cell: XmlElement): string {
  const formula = child(cell, 'f')!;
  return xml.slice(start + formula.start, start + formula.elementEnd);
}

/** The element of a formula. */
export function formulaXml({ text, kind, area }: Pick<FileFormula, 'text' | 'kind' | 'area'>, prefix = ''): string {
  const array = kind === 'array' || kind === 'dynamic' ? attributeText({ t: 'array', ref: areaAddress(area) }) : '';
  return `<${prefix}f${array}>${escapeText(text)}</${prefix}f>`;
}

/** The type of a cell and the element of its value. */
export function valueXml(value: CellValue, computed: boolean, prefix = ''): { type: string | undefined; text: string } {
  if (value === null) return { type: undefined, text: '' };
  if (typeof value === 'string' && !computed) {
    return { type: 'inlineStr', text: `<${prefix}is><${prefix}t xml:space="preserve">${encodeCellText(value)}</${prefix}t></${prefix}is>` };
  }
  const { type, text } = writeValue(value);
  return { type, text: `<${prefix}v>${text}</${prefix}v>` };
}

/** Puts new cells where their columns belong in a row. */
function insertCells(xml: string, { tag, contentEnd, cells }: SourceRow, added: { column: number; text: string }[], prefix: string): Edit[] {
  // "spans" only helps some readers, and would be wrong now.
  const start = xml.slice(tag.start, tag.end).replace(/\s+spans\s*=\s*("[^"]*"|'[^']*')/, '');
  const all = added.map(({ text }) => text).join('');
  if (tag.selfClosing) return [{ start: tag.start, end: tag.end, text: `${start.replace(/\s*\/>$/, '>')}${all}</${prefix}row>` }];
  const edits: Edit[] = [{ start: tag.start, end: tag.end, text: start }];
  for (const { column, text } of added) {
    const place = cells.find((one) => one.column > column)?.start ?? contentEnd;
    edits.push({ start: place, end: place, text });
  }
  return edits;
}

function insertRows(data: XmlElement, rows: SourceRow[], added: { row: number; text: string }[], prefix: string): Edit[] {
  if (added.length === 0) return [];
  if (data.selfClosing) return [{ start: data.end - 2, end: data.end, text: `>${added.map(({ text }) => text).join('')}</${prefix}sheetData>` }];
  return added.map(({ row, text }) => {
    const place = rows.find((one) => one.row > row)?.tag.start ?? data.contentEnd;
    return { start: place, end: place, text };
  });
}
