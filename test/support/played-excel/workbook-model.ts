// A workbook as the spreadsheet program keeps it, as far as Foldplan's host asks: what is typed becomes a number, a truth value, a
// formula or text; formulas of worksheet functions compute and spill; events tell of it. It is a model: it cannot prove what the
// program itself does, only that the host and the program's client library understand each other.

import type { CellValue, Workbook } from '../../../src/host/port';
import { ProgramError, Served } from './batch';

/** Computes `=FOLD.NAME(reference, …)`: rows of cells, an error as an object. */
export type Evaluate = (name: string, args: (CellValue[][] | null)[]) => CellValue[][];

export interface WorkbookEvent {
  type: typeof CHANGED | typeof CALCULATED;
  sheet: WorksheetModel;
  message: object;
}

/** Numbers of the protocol. */
export const CHANGED = 10;
export const CALCULATED = 16;

interface CellModel {
  /** What the cell holds; "" is a blank cell. */
  value: number | string | boolean | { error: string };
  formula?: string;
  format: string;
  /** The cell whose formula fills this one. */
  filledBy?: string;
}

interface Box {
  row: number;
  column: number;
  rows: number;
  columns: number;
}

export class WorkbookModel extends Served {
  readonly Worksheets: WorksheetsModel;
  readonly Names: NamesModel;
  readonly sheets: WorksheetModel[];
  private listeners = new Set<(event: WorkbookEvent) => void>();

  constructor(workbook: Workbook, readonly evaluate: Evaluate) {
    super();
    this.sheets = workbook.sheets.map((sheet, i) => new WorksheetModel(this, `{sheet-${i + 1}}`, sheet.name));
    this.Worksheets = new WorksheetsModel(this.sheets);
    this.Names = new NamesModel(this, { ...workbook.names });
    for (const [i, { cells }] of workbook.sheets.entries()) {
      for (const [row, line] of Object.entries(cells)) {
        for (const [column, { value, formula }] of Object.entries(line)) {
          this.sheets[i]!.put(Number(row), Number(column), formula === undefined ? { value: value ?? '', format: 'General' } : { value: '', formula, format: 'General' });
        }
      }
    }
    this.calculate();
  }

  listen(listener: (event: WorkbookEvent) => void): void {
    this.listeners.add(listener);
  }

  /** After an edit: formulas compute, and the events are told. */
  edited(sheet: WorksheetModel, address: string): void {
    this.tell({ type: CHANGED, sheet, message: { address, changeType: 'RangeEdited', source: 'Local', triggerSource: 'ThisLocalAddin', worksheetId: sheet.Id } });
    this.calculate();
    for (const one of this.sheets.filter((s) => s.hasFormulas())) this.tell({ type: CALCULATED, sheet: one, message: { address: '', worksheetId: one.Id } });
  }

  /** The range of a name or an address; undefined where there is none. */
  range(reference: string): RangeModel | undefined {
    const bang = reference.lastIndexOf('!');
    if (bang < 0 && this.Names.refersTo[reference] !== undefined) return this.range(this.Names.refersTo[reference]);
    const name = reference.slice(0, Math.max(0, bang)).replace(/^'|'$/g, '').replaceAll("''", "'");
    const sheet = bang < 0 ? this.sheets[0] : this.sheets.find((s) => s.Name === name);
    const box = parseAddress(reference.slice(bang + 1));
    return sheet && box && new RangeModel(sheet, box);
  }

  /** Everything that a user could lose. */
  snapshot(): unknown {
    return this.sheets.map((sheet) => [sheet.Name, sheet.snapshot()]);
  }

  private calculate(): void {
    for (const sheet of this.sheets) sheet.unspill();
    for (const sheet of this.sheets) for (const [key, cell] of sheet.formulas()) this.compute(sheet, key, cell);
  }

  private compute(sheet: WorksheetModel, key: string, cell: CellModel): void {
    const [, name, list] = /^=FOLD\.([A-Z]+)\((.*)\)$/.exec(cell.formula!) ?? [];
    if (!name) {
      cell.value = { error: '#NAME?' };
      return;
    }
    const args = list!.split(',').map((arg) => this.argument(sheet, arg.trim()));
    sheet.fill(key, this.evaluate(name, args));
  }

  private argument(sheet: WorksheetModel, text: string): CellValue[][] | null {
    if (text === '') return null;
    if (text !== '' && Number.isFinite(Number(text))) return [[Number(text)]];
    const isLocal = !text.includes('!') && this.Names.refersTo[text] === undefined;
    const range = this.range(isLocal ? `'${sheet.Name.replaceAll("'", "''")}'!${text}` : text);
    return range ? range.cells((cell) => (cell.value === '' ? null : cell.value)) : [[{ error: '#NAME?' }]];
  }

  private tell(event: WorkbookEvent): void {
    for (const listener of this.listeners) listener(event);
  }
}

/** Events are registered at the collection; the library sorts out whom they concern. */
class WorksheetsModel extends Served {
  constructor(private sheets: WorksheetModel[]) {
    super();
  }

  GetActiveWorksheet(): WorksheetModel {
    return this.sheets[0]!;
  }

  GetItemOrNullObject(key: string): WorksheetModel | null {
    return this.sheets.find((sheet) => sheet.Name === key || sheet.Id === key) ?? null;
  }

  _RegisterCalculatedEvent(): void {}
  _UnregisterCalculatedEvent(): void {}
  _RegisterDataChangedEvent(): void {}
  _UnregisterDataChangedEvent(): void {}
}

class NamesModel extends Served {
  constructor(private workbook: WorkbookModel, readonly refersTo: Record<string, string>) {
    super();
  }

  GetItemOrNullObject(name: string): NamedItemModel | null {
    const refersTo = this.refersTo[name];
    return refersTo === undefined ? null : new NamedItemModel(name, this.workbook.range(refersTo) ?? null);
  }
}

class NamedItemModel extends Served {
  constructor(readonly Name: string, private range: RangeModel | null) {
    super();
  }

  GetRangeOrNullObject(): RangeModel | null {
    return this.range;
  }
}

const BLANK: CellModel = { value: '', format: 'General' };

export class WorksheetModel extends Served {
  isProtected = false;
  private grid = new Map<string, CellModel>();

  constructor(readonly workbook: WorkbookModel, readonly Id: string, readonly Name: string) {
    super();
  }

  GetRange(address: string): RangeModel {
    const box = parseAddress(address);
    if (!box) throw new ProgramError('InvalidArgument', 'The argument is invalid or missing or has an incorrect format.');
    return new RangeModel(this, box);
  }

  GetUsedRangeOrNullObject(): RangeModel | null {
    const places = [...this.grid].filter(([, cell]) => cell.value !== '').map(([key]) => place(key));
    if (places.length === 0) return null;
    const [row, column] = [Math.min(...places.map(([r]) => r)), Math.min(...places.map(([, c]) => c))];
    return new RangeModel(this, { row, column, rows: Math.max(...places.map(([r]) => r)) - row + 1, columns: Math.max(...places.map(([, c]) => c)) - column + 1 });
  }

  at(row: number, column: number): CellModel {
    return this.grid.get(`${row},${column}`) ?? BLANK;
  }

  put(row: number, column: number, cell: CellModel): void {
    this.grid.set(`${row},${column}`, cell);
  }

  formulas(): [string, CellModel][] {
    return [...this.grid].filter(([, cell]) => cell.formula !== undefined);
  }

  hasFormulas(): boolean {
    return this.formulas().length > 0;
  }

  unspill(): void {
    for (const [key, cell] of this.grid) if (cell.filledBy) this.grid.set(key, { value: '', format: cell.format });
  }

  /** Puts a formula's result into its cell and, where there is room, into those below and beside it. */
  fill(anchor: string, result: CellValue[][]): void {
    const [row, column] = place(anchor);
    const others = result.flatMap((line, r) => line.map((value, c) => ({ r: row + r, c: column + c, value: value ?? '' }))).slice(1);
    const own = this.grid.get(anchor)!;
    if (others.some(({ r, c }) => this.at(r, c).value !== '' || this.at(r, c).formula)) {
      own.value = { error: '#SPILL!' };
      return;
    }
    own.value = result[0]![0] ?? '';
    for (const { r, c, value } of others) this.put(r, c, { value, format: this.at(r, c).format, filledBy: anchor });
  }

  /** Whether a formula fills more than its own cell. */
  fills(anchor: string): boolean {
    return [...this.grid.values()].some(({ filledBy }) => filledBy === anchor);
  }

  snapshot(): unknown {
    const shown = [...this.grid].filter(([, { value, formula, format }]) => value !== '' || formula || format !== 'General');
    return Object.fromEntries(shown.map(([key, cell]) => [key, { ...cell }]));
  }
}

let references = 0;

export class RangeModel extends Served {
  override readonly _ReferenceId = `range-${++references}`;

  constructor(readonly Worksheet: WorksheetModel, private box: Box) {
    super();
  }

  get RowIndex(): number {
    return this.box.row;
  }

  get ColumnIndex(): number {
    return this.box.column;
  }

  get RowCount(): number {
    return this.box.rows;
  }

  get ColumnCount(): number {
    return this.box.columns;
  }

  get Address(): string {
    const name = this.Worksheet.Name;
    return `${/^\w+$/.test(name) ? name : `'${name.replaceAll("'", "''")}'`}!${this.local}`;
  }

  get local(): string {
    const { row, column, rows, columns } = this.box;
    const first = `${letters(column)}${row + 1}`;
    return rows * columns === 1 ? first : `${first}:${letters(column + columns - 1)}${row + rows}`;
  }

  get Values(): unknown[][] {
    return this.cells(({ value }) => (typeof value === 'object' ? value.error : value));
  }

  get ValueTypes(): string[][] {
    return this.cells(({ value, formula, filledBy }) => {
      if (value === '' && !formula && !filledBy) return 'Empty';
      return { number: 'Double', boolean: 'Boolean', object: 'Error', string: 'String' }[typeof value as 'number' | 'boolean' | 'object' | 'string'];
    });
  }

  /** A cell filled from elsewhere shows the formula that fills it, as in an array formula of old. */
  get Formulas(): unknown[][] {
    return this.cells(({ value, formula, filledBy }) => {
      if (filledBy) return this.Worksheet.at(...place(filledBy)).formula!;
      return formula ?? (typeof value === 'object' ? value.error : value);
    });
  }

  /** The program stores cell after cell, and stops at one that it cannot. */
  set Formulas(entries: unknown) {
    this.change(entries, (cell, input) => typed(input, cell.format));
  }

  get NumberFormat(): string[][] {
    return this.cells(({ format }) => format);
  }

  set NumberFormat(formats: unknown) {
    this.change(formats, (cell, format) => ({ ...cell, format: String(format) }));
  }

  get HasSpill(): boolean | null {
    const spilled = this.cells(({ filledBy }, r, c) => Boolean(filledBy) || this.Worksheet.fills(`${r},${c}`)).flat();
    return spilled.every((one) => one === spilled[0]) ? spilled[0]! : null;
  }

  GetSpillParentOrNullObject(): RangeModel | null {
    const { row, column } = this.box;
    const { filledBy } = this.Worksheet.at(row, column);
    if (filledBy) return new RangeModel(this.Worksheet, cellBox(...place(filledBy)));
    return this.Worksheet.fills(`${row},${column}`) ? this : null;
  }

  GetCell(row: number, column: number): RangeModel {
    return new RangeModel(this.Worksheet, cellBox(this.box.row + row, this.box.column + column));
  }

  GetResizedRange(rows: number, columns: number): RangeModel {
    return new RangeModel(this.Worksheet, { ...this.box, rows: this.box.rows + rows, columns: this.box.columns + columns });
  }

  cells<T>(of: (cell: CellModel, row: number, column: number) => T): T[][] {
    const { row, column, rows, columns } = this.box;
    if (rows * columns > 5_000_000) throw new ProgramError('ResponsePayloadSizeLimitExceeded');
    return Array.from({ length: rows }, (_, r) => Array.from({ length: columns }, (_, c) => of(this.Worksheet.at(row + r, column + c), row + r, column + c)));
  }

  private change(inputs: unknown, to: (cell: CellModel, input: unknown) => CellModel): void {
    const sheet = this.Worksheet;
    if (sheet.isProtected) throw new ProgramError('AccessDenied', 'You cannot do the requested operation.');
    const { row, column, rows, columns } = this.box;
    const lines = inputs as unknown[][];
    if (lines.length !== rows || lines.some((line) => line.length !== columns)) {
      throw new ProgramError('InvalidArgument', 'The number of rows or columns in the input array does not match the size of the range.');
    }
    try {
      for (const [r, line] of lines.entries()) {
        for (const [c, input] of line.entries()) {
          const cell = sheet.at(row + r, column + c);
          const cleared = input === '' && cell.filledBy; // nothing of its own to clear
          if (input !== null && !cleared) sheet.put(row + r, column + c, to(cell, input));
        }
      }
    } finally {
      sheet.workbook.edited(sheet, this.local);
    }
  }
}

/** What becomes of an input, typed or set. */
function typed(input: unknown, format: string): CellModel {
  if (typeof input !== 'string') return { value: format === '@' ? String(input) : (input as number | boolean), format };
  if (input.startsWith("'")) return { value: input.slice(1), format };
  if (format === '@') return { value: input, format };
  if (input.startsWith('=')) {
    if (input.split('(').length !== input.split(')').length) throw new ProgramError('InvalidArgument', 'The formula is not correct.');
    return { value: '', formula: input, format };
  }
  if (input.trim() !== '' && Number.isFinite(Number(input))) return { value: Number(input), format };
  if (/^[+\-@]/.test(input)) throw new ProgramError('InvalidArgument', 'The formula is not correct.');
  if (/^(true|false)$/i.test(input)) return { value: /true/i.test(input), format };
  if (/^#(N\/A|VALUE!|REF!|DIV\/0!|NUM!|NAME\?|NULL!)$/.test(input)) return { value: { error: input }, format };
  return { value: input, format };
}

const cellBox = (row: number, column: number): Box => ({ row, column, rows: 1, columns: 1 });

const place = (key: string): [number, number] => key.split(',').map(Number) as [number, number];

/** Cells, or whole columns or rows; undefined for anything else. */
function parseAddress(address: string): Box | undefined {
  const [, a, one, b, two] = /^\$?([A-Z]+)?\$?(\d+)?(?::\$?([A-Z]+)?\$?(\d+)?)?$/i.exec(address) ?? [];
  const isRange = address.includes(':');
  if (!(a || one) || (!isRange && !(a && one)) || (isRange && (Boolean(a) !== Boolean(b) || Boolean(one) !== Boolean(two)))) return undefined;
  const [left, right] = a ? [number(a), number(b ?? a)] : [0, 16_383];
  const [top, bottom] = one ? [Number(one) - 1, Number(two ?? one) - 1] : [0, 1_048_575];
  return { row: top, column: left, rows: bottom - top + 1, columns: right - left + 1 };
}

const number = (column: string): number => [...column.toUpperCase()].reduce((n, letter) => n * 26 + letter.charCodeAt(0) - 64, 0) - 1;

const letters = (column: number): string => (column < 26 ? '' : letters(Math.floor(column / 26) - 1)) + String.fromCharCode(65 + (column % 26));
