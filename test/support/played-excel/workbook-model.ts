// A workbook as the spreadsheet program keeps it, as far as Foldplan's host asks: what is typed becomes a number, a truth value, a
// formula or text; formulas of worksheet functions compute and spill; events tell of it. It is a model: it cannot prove what the
// program itself does, only that the host and the program's client library understand each other.

import { type CellValue, type Sheet, type Workbook, NEGATIVE } from '../../../src/host/port';
import { ProgramError, Served, ServedList } from './batch';
import { type Evaluate, compute, isFormula } from './formula-model';
import { ColumnModel, ConditionalFormatsModel, RangeFormatModel, type Mark } from './looks-model';
import { NotesModel } from './notes-model';
import { ShapesModel } from './shapes-model';
import { TablesModel } from './tables-model';
import { type Box, boxAddress, cellBox, inside, parseAddress, place } from './boxes';

export interface WorkbookEvent {
  type: typeof CHANGED | typeof CALCULATED | typeof SELECTED | typeof ACTIVATED;
  sheet: WorksheetModel;
  message: object;
}

/** Numbers of the protocol. */
export const CHANGED = 10;
export const CALCULATED = 16;
export const SELECTED = 14;
export const ACTIVATED = 11;

export interface CellModel {
  /** What the cell holds; "" is a blank cell. */
  value: number | string | boolean | { error: string };
  formula?: string;
  format: string;
  bold?: boolean;
  /** The cell whose formula fills this one. */
  filledBy?: string;
}

export class WorkbookModel extends Served {
  readonly Worksheets: WorksheetsModel;
  readonly Names: NamesModel;
  readonly Tables = new TablesModel();
  readonly sheets: WorksheetModel[];
  active: WorksheetModel;
  /** Null while something else than cells is selected. */
  selected: RangeModel | null;
  private made = 0;
  private listeners = new Set<(event: WorkbookEvent) => void>();

  constructor(workbook: Workbook, readonly evaluate: Evaluate) {
    super();
    this.sheets = [];
    this.Worksheets = new WorksheetsModel(this);
    this.Names = new NamesModel(this, { ...workbook.names });
    for (const sheet of workbook.sheets) this.addSheet(sheet.name).fillFrom(sheet);
    this.active = this.sheets[0]!;
    this.selected = this.active.GetRange('A1');
    this.calculate();
  }

  listen(listener: (event: WorkbookEvent) => void): void {
    this.listeners.add(listener);
  }

  GetSelectedRange(): RangeModel {
    if (!this.selected) throw new ProgramError('InvalidSelection', 'The current selection is invalid for this operation.');
    return this.selected;
  }

  addSheet(name: string): WorksheetModel {
    const sheet = new WorksheetModel(this, `{sheet-${++this.made}}`, name);
    this.sheets.push(sheet);
    return sheet;
  }

  removeSheet(sheet: WorksheetModel): void {
    this.sheets.splice(this.sheets.indexOf(sheet), 1);
    if (this.active === sheet) this.active = this.sheets[0]!;
  }

  select(range: RangeModel): void {
    this.activate(range.Worksheet);
    this.selected = range;
    this.tell({ type: SELECTED, sheet: range.Worksheet, message: { address: range.local, worksheetId: range.Worksheet.Id } });
  }

  activate(sheet: WorksheetModel): void {
    if (this.active === sheet) return;
    this.active = sheet;
    this.selected = sheet.GetRange('A1');
    this.tell({ type: ACTIVATED, sheet, message: { worksheetId: sheet.Id } });
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
    const sheet = bang < 0 ? this.active : this.sheets.find((s) => s.Name === name);
    const box = parseAddress(reference.slice(bang + 1));
    return sheet && box && new RangeModel(sheet, box);
  }

  /** Everything that a user could lose. */
  snapshot(): unknown {
    const names = Object.fromEntries(Object.entries(this.Names.refersTo).sort(([a], [b]) => (a < b ? -1 : 1)));
    return { sheets: this.sheets.map((sheet) => [sheet.Name, sheet.snapshot()]), names, tables: this.Tables.all.map(({ Name, range }) => [Name, range.Address]) };
  }

  /** A name has come to mean something else. */
  named(): void {
    this.calculate();
  }

  private calculate(): void {
    for (const sheet of this.sheets) sheet.unspill();
    for (const sheet of this.sheets) for (const [key, cell] of sheet.formulas()) this.compute(sheet, key, cell);
  }

  private compute(sheet: WorksheetModel, key: string, cell: CellModel): void {
    sheet.fill(key, compute(cell.formula!, this.evaluate, (reference) => this.referredTo(sheet, key, reference)?.cells(({ value }) => (value === '' ? null : value))));
  }

  /** The cells that a reference means in a formula. */
  private referredTo(sheet: WorksheetModel, key: string, reference: string): RangeModel | undefined {
    if (reference.startsWith('[')) return this.Tables.inRow(new RangeModel(sheet, cellBox(...place(key))), reference);
    const isLocal = !reference.includes('!') && this.Names.refersTo[reference] === undefined;
    return this.range(isLocal ? `'${sheet.Name.replaceAll("'", "''")}'!${reference}` : reference);
  }

  private tell(event: WorkbookEvent): void {
    for (const listener of this.listeners) listener(event);
  }
}

/** Events are registered at the collection; the library sorts out whom they concern. */
class WorksheetsModel extends ServedList<WorksheetModel> {
  constructor(private workbook: WorkbookModel) {
    super();
  }

  get all(): WorksheetModel[] {
    return this.workbook.sheets;
  }

  GetActiveWorksheet(): WorksheetModel {
    return this.workbook.active;
  }

  Add(name: string): WorksheetModel {
    return this.workbook.addSheet(name);
  }

  protected found(key: string): WorksheetModel | undefined {
    return this.all.find((sheet) => sheet.Name.toLowerCase() === key.toLowerCase() || sheet.Id === key);
  }

  _RegisterCalculatedEvent(): void {}
  _UnregisterCalculatedEvent(): void {}
  _RegisterDataChangedEvent(): void {}
  _UnregisterDataChangedEvent(): void {}
  _RegisterSelectionChangedEvent(): void {}
  _UnregisterSelectionChangedEvent(): void {}
  _RegisterActivatedEvent(): void {}
  _UnregisterActivatedEvent(): void {}
}

class NamesModel extends ServedList<NamedItemModel> {
  constructor(private workbook: WorkbookModel, readonly refersTo: Record<string, string>) {
    super();
  }

  get all(): NamedItemModel[] {
    return Object.keys(this.refersTo).map((name) => new NamedItemModel(this.workbook, name));
  }

  Add(name: string, formula: string): NamedItemModel {
    if (this.found(name)) throw new ProgramError('ItemAlreadyExists');
    if (!formula.startsWith('=')) throw new ProgramError('InvalidArgument');
    this.refersTo[name] = formula.slice(1);
    this.workbook.named();
    return this.GetItem(name);
  }

  protected found(key: string): NamedItemModel | undefined {
    return this.all.find(({ Name }) => Name.toLowerCase() === key.toLowerCase());
  }
}

class NamedItemModel extends Served {
  readonly Comment = '';
  readonly Visible = true;

  constructor(private workbook: WorkbookModel, readonly Name: string) {
    super();
  }

  get Id(): string {
    return this.Name;
  }

  get Formula(): string {
    return `=${this.workbook.Names.refersTo[this.Name]!}`;
  }

  set Formula(formula: string) {
    this.workbook.Names.refersTo[this.Name] = formula.slice(1);
    this.workbook.named();
  }

  GetRangeOrNullObject(): RangeModel | null {
    return this.workbook.range(this.workbook.Names.refersTo[this.Name]!) ?? null;
  }

  Delete(): void {
    delete this.workbook.Names.refersTo[this.Name];
    this.workbook.named();
  }
}

const BLANK: CellModel = { value: '', format: 'General' };

export class WorksheetModel extends Served {
  isProtected = false;
  /** Where a filter hides cells. */
  filtered: Box | null = null;
  readonly columns = new Map<number, ColumnModel>();
  readonly marks: Mark[] = [];
  readonly Notes = new NotesModel(this);
  readonly Shapes = new ShapesModel(this);
  private grid = new Map<string, CellModel>();

  constructor(readonly workbook: WorkbookModel, readonly Id: string, public Name: string) {
    super();
  }

  fillFrom({ cells, columns, notes = {}, marksNegative = [] }: Sheet): void {
    for (const [row, line] of Object.entries(cells)) {
      for (const [column, { value, formula, style: { numberFormat: format = 'General', bold } = {} }] of Object.entries(line)) {
        const spilled = formula === undefined && isFilled(cells, Number(row), Number(column));
        this.put(Number(row), Number(column), { ...(formula === undefined ? { value: spilled ? '' : value ?? '' } : { value: '', formula }), format, ...(bold && { bold }) });
      }
    }
    for (const [column, { width }] of Object.entries(columns)) if (width !== undefined) this.column(Number(column)).ColumnWidth = width * 0.75;
    for (const [address, text] of Object.entries(notes)) this.Notes.texts.set(address, text);
    for (const address of marksNegative) this.marks.push({ box: parseAddress(address)!, type: 'CellValue', rule: { formula1: '=0', operator: 'LessThan' }, color: NEGATIVE.color, fill: NEGATIVE.fill });
  }

  column(index: number): ColumnModel {
    if (!this.columns.has(index)) this.columns.set(index, new ColumnModel());
    return this.columns.get(index)!;
  }

  /** Behind the others; the name is the program's own until another is given. */
  Copy(position: string): WorksheetModel {
    if (position !== 'End') throw new ProgramError('NotImplemented');
    const copy = this.workbook.addSheet(`${this.Name} (2)`);
    for (const [key, cell] of this.grid) copy.grid.set(key, { ...cell });
    for (const [index, column] of this.columns) Object.assign(copy.column(index), column);
    copy.marks.push(...this.marks.map((mark) => ({ ...mark })));
    for (const [address, text] of this.Notes.texts) copy.Notes.texts.set(address, text);
    this.workbook.edited(copy, '');
    return copy;
  }

  Delete(): void {
    this.workbook.removeSheet(this);
  }

  Activate(): void {
    this.workbook.activate(this);
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
    for (const [key, cell] of this.grid) if (cell.filledBy) this.grid.set(key, { value: '', format: cell.format, bold: cell.bold });
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
    for (const { r, c, value } of others) this.put(r, c, { value, format: this.at(r, c).format, bold: this.at(r, c).bold, filledBy: anchor });
  }

  /** Whether a formula fills more than its own cell. */
  fills(anchor: string): boolean {
    return [...this.grid.values()].some(({ filledBy }) => filledBy === anchor);
  }

  /** The block that a formula fills. */
  filledBy(anchor: string): Box {
    const cells = [place(anchor), ...[...this.grid].filter(([, { filledBy }]) => filledBy === anchor).map(([key]) => place(key))];
    const [row, column] = place(anchor);
    return { row, column, rows: Math.max(...cells.map(([r]) => r)) - row + 1, columns: Math.max(...cells.map(([, c]) => c)) - column + 1 };
  }

  snapshot(): unknown {
    const shown = [...this.grid].filter(([, { value, formula, format, bold }]) => value !== '' || formula || format !== 'General' || bold).sort(([a], [b]) => (a < b ? -1 : 1));
    return {
      cells: Object.fromEntries(shown.map(([key, { bold, ...cell }]) => [key, { ...cell, ...(bold && { bold }) }])),
      columns: Object.fromEntries([...this.columns].filter(([, { UseStandardWidth: standard }]) => !standard).map(([index, { ColumnWidth: width }]) => [index, width])),
      marks: this.marks.map(({ box, ...mark }) => JSON.stringify([boxAddress(box), mark])).sort(),
      notes: Object.fromEntries([...this.Notes.texts].sort(([a], [b]) => (a < b ? -1 : 1))),
      shapes: this.Shapes.all.map((shape) => ({ ...shape })),
    };
  }
}

/** Whether a formula of a sheet's plain data fills a cell. */
const isFilled = (cells: Sheet['cells'], row: number, column: number): boolean => Object.entries(cells).some(([r, line]) => Object.entries(line).some(([c, { spill }]) =>
  spill && row >= Number(r) && row < Number(r) + spill.rows && column >= Number(c) && column < Number(c) + spill.columns));

let references = 0;

export class RangeModel extends Served {
  override readonly _ReferenceId = `range-${++references}`;

  readonly Format: RangeFormatModel;
  readonly ConditionalFormats: ConditionalFormatsModel;

  constructor(readonly Worksheet: WorksheetModel, readonly box: Box) {
    super();
    this.Format = new RangeFormatModel(this);
    this.ConditionalFormats = new ConditionalFormatsModel(this);
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
    return boxAddress(this.box);
  }

  /** Where the range is on its sheet, in points. */
  get Left(): number {
    return Array.from({ length: this.box.column }, (_, c) => this.Worksheet.columns.get(c)?.ColumnWidth ?? new ColumnModel().ColumnWidth).reduce((sum, width) => sum + width, 0);
  }

  get Top(): number {
    return this.box.row * 15;
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
    this.change(entries, (cell, input) => ({ bold: cell.bold, ...typed(input, cell.format) }));
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

  GetSpillingToRangeOrNullObject(): RangeModel | null {
    const anchor = `${this.box.row},${this.box.column}`;
    return this.Worksheet.fills(anchor) ? new RangeModel(this.Worksheet, this.Worksheet.filledBy(anchor)) : null;
  }

  /** As far as the first blank row and column on every side; what touches at a corner belongs to it. */
  GetSurroundingRegion(): RangeModel {
    const box = { ...this.box };
    const filled = (row: number, column: number, rows: number, columns: number) => row >= 0 && column >= 0
      && new RangeModel(this.Worksheet, { row, column, rows, columns }).cells(({ value, formula }) => value !== '' || formula !== undefined).flat().some(Boolean);
    let grown = true;
    const grow = (side: Partial<Box>) => {
      Object.assign(box, side);
      grown = true;
    };
    while (grown) {
      grown = false;
      const [left, top] = [Math.max(0, box.column - 1), Math.max(0, box.row - 1)];
      const [wide, high] = [box.column + box.columns + 1 - left, box.row + box.rows + 1 - top];
      if (filled(box.row - 1, left, 1, wide)) grow({ row: box.row - 1, rows: box.rows + 1 });
      else if (filled(box.row + box.rows, left, 1, wide)) grow({ rows: box.rows + 1 });
      else if (filled(top, box.column - 1, high, 1)) grow({ column: box.column - 1, columns: box.columns + 1 });
      else if (filled(top, box.column + box.columns, high, 1)) grow({ columns: box.columns + 1 });
    }
    return new RangeModel(this.Worksheet, box);
  }

  GetCellProperties(): object[][] {
    return this.cells(({ bold = false }) => ({ format: { font: { bold } } }));
  }

  SetCellProperties(properties: { format: { font: { bold: boolean } } }[][]): void {
    this.restyle(properties.map((row) => row.map(({ format: { font } }) => font)));
  }

  /** Sets what cells look like, and computes nothing. */
  restyle(looks: Partial<CellModel>[][]): void {
    this.refuseIfProtected();
    this.cells((cell, row, column) => this.Worksheet.put(row, column, { ...cell, ...looks[row - this.box.row]![column - this.box.column] }));
  }

  refuseIfProtected(): void {
    if (this.Worksheet.isProtected) throw new ProgramError('AccessDenied', 'You cannot do the requested operation.');
  }

  Select(): void {
    this.Worksheet.workbook.select(this);
  }

  GetColumn(column: number): RangeModel {
    return new RangeModel(this.Worksheet, { ...this.box, column: this.box.column + column, columns: 1 });
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
    this.refuseIfProtected();
    if (sheet.filtered && inside(sheet.filtered, this.box)) throw new ProgramError('FilteredRangeConflict');
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
    if (!isFormula(input)) throw new ProgramError('InvalidArgument', 'The formula is not correct.');
    return { value: '', formula: input, format };
  }
  if (input.trim() !== '' && Number.isFinite(Number(input))) return { value: Number(input), format };
  if (/^[+\-@]/.test(input)) throw new ProgramError('InvalidArgument', 'The formula is not correct.');
  if (/^(true|false)$/i.test(input)) return { value: /true/i.test(input), format };
  if (/^#(N\/A|VALUE!|REF!|DIV\/0!|NUM!|NAME\?|NULL!)$/.test(input)) return { value: { error: input }, format };
  return { value: input, format };
}
