// Structured tables of the played workbook.

import { parseStructRef } from '@borgar/fx';
import { ProgramError, Served, ServedList } from './batch';
import { inside } from './boxes';
import { RangeModel, type WorksheetModel } from './workbook-model';

export class TablesModel extends ServedList<TableModel> {
  readonly all: TableModel[] = [];

  /** Makes a table of cells that are there. */
  put(name: string, range: RangeModel): void {
    this.all.push(new TableModel(name, range));
  }

  /** The cell that a formula of this cell means by a column of its own table: `[@[Low edge]]`. */
  inRow({ box, Worksheet: sheet }: RangeModel, reference: string): RangeModel | undefined {
    const table = this.all.find(({ range }) => range.Worksheet === sheet && inside(range.box, box));
    const { columns = [], sections = [] } = parseStructRef(reference) ?? {};
    const at = table && sections[0] === 'this row' ? table.titles.indexOf(columns[0]!) : -1;
    return at < 0 ? undefined : new RangeModel(sheet, { ...box, column: table!.range.box.column + at });
  }

  protected found(key: string): TableModel | undefined {
    return this.all.find(({ Name }) => Name.toLowerCase() === key.toLowerCase());
  }
}

export class TableModel extends Served {
  readonly Columns = new TableColumnsModel(this);

  constructor(readonly Name: string, public range: RangeModel) {
    super();
  }

  get Id(): string {
    return this.Name;
  }

  get Worksheet(): WorksheetModel {
    return this.range.Worksheet;
  }

  GetRange(): RangeModel {
    return this.range;
  }

  get titles(): string[] {
    return this.range.Values[0]!.map(String);
  }

  GetDataBodyRange(): RangeModel {
    const { box, Worksheet: sheet } = this.range;
    return new RangeModel(sheet, { ...box, row: box.row + 1, rows: box.rows - 1 });
  }
}

class TableColumnsModel extends ServedList<TableColumnModel> {
  constructor(private table: TableModel) {
    super();
  }

  get all(): TableColumnModel[] {
    return Array.from({ length: this.table.range.box.columns }, (_, index) => new TableColumnModel(this.table, index));
  }

  get Count(): number {
    return this.all.length;
  }

  Add(index: number, _values: unknown, header: string): TableColumnModel {
    if (index !== -1) throw new ProgramError('NotImplemented');
    const { range } = this.table;
    const { box, Worksheet: sheet } = range;
    const beside = new RangeModel(sheet, { ...box, column: box.column + box.columns, columns: 1 });
    beside.refuseIfProtected();
    if (beside.Values.flat().some((value) => value !== '')) throw new ProgramError('NotImplemented', 'The model of the workbook moves no cells.');
    this.table.range = new RangeModel(sheet, { ...box, columns: box.columns + 1 });
    beside.NumberFormat = range.NumberFormat.map((row) => [row.at(-1)!]); // as the column beside it
    const column = this.all.at(-1)!;
    column.GetRange().GetCell(0, 0).Formulas = [[`'${header}`]];
    return column;
  }

  protected found(key: string): TableColumnModel | undefined {
    return this.all.find(({ Id }) => String(Id) === key);
  }
}

class TableColumnModel extends Served {
  constructor(private table: TableModel, private index: number) {
    super();
  }

  get Id(): number {
    return this.index + 1;
  }

  GetRange(): RangeModel {
    return this.table.range.GetColumn(this.index);
  }

  GetDataBodyRange(): RangeModel {
    return this.table.GetDataBodyRange().GetColumn(this.index);
  }

  Delete(): void {
    const { box, Worksheet: sheet } = this.table.range;
    if (this.index !== box.columns - 1) throw new ProgramError('NotImplemented', 'The model of the workbook moves no cells.');
    const column = this.GetRange();
    column.refuseIfProtected();
    column.cells((_, row, at) => sheet.put(row, at, { value: '', format: 'General' }));
    sheet.workbook.edited(sheet, column.local);
    this.table.range = new RangeModel(sheet, { ...box, columns: box.columns - 1 });
  }
}
