// How cells of the played workbook look: weight, widths, conditional formats.

import { ProgramError, Served, ServedList } from './batch';
import { type Box, inside } from './boxes';
import { RangeModel } from './workbook-model';

/** The width of a column, in points. */
export class ColumnModel {
  private width = STANDARD_WIDTH;
  private standard = true;

  get ColumnWidth(): number {
    return this.width;
  }

  set ColumnWidth(points: number) {
    this.width = points;
    this.standard = false;
  }

  get UseStandardWidth(): boolean {
    return this.standard;
  }

  set UseStandardWidth(standard: boolean) {
    this.standard = standard;
    if (standard) this.width = STANDARD_WIDTH;
  }
}

const STANDARD_WIDTH = 48;

export class RangeFormatModel extends Served {
  readonly Font: FontModel;

  constructor(private range: RangeModel) {
    super();
    this.Font = new FontModel(range);
  }

  get ColumnWidth(): number | null {
    return common(this.columns.map(({ ColumnWidth: width }) => width));
  }

  set ColumnWidth(points: number) {
    this.range.refuseIfProtected();
    for (const column of this.columns) column.ColumnWidth = points;
  }

  get UseStandardWidth(): boolean | null {
    return common(this.columns.map(({ UseStandardWidth: standard }) => standard));
  }

  set UseStandardWidth(standard: boolean) {
    for (const column of this.columns) column.UseStandardWidth = standard;
  }

  private get columns(): ColumnModel[] {
    const { column, columns } = this.range.box;
    return Array.from({ length: columns }, (_, c) => this.range.Worksheet.column(column + c));
  }
}

class FontModel extends Served {
  constructor(private range: RangeModel) {
    super();
  }

  get Bold(): boolean | null {
    return common(this.range.cells(({ bold = false }) => bold).flat());
  }

  set Bold(bold: boolean) {
    this.range.restyle(this.range.cells(() => ({ bold })));
  }
}

/** What all have; null where they differ. */
const common = <T>(values: T[]): T | null => (values.every((one) => one === values[0]) ? values[0]! : null);

export interface Mark {
  box: Box;
  type: string;
  rule: { formula1: string; operator: string };
  color: string;
  fill: string;
}

/** Those that touch a range. */
export class ConditionalFormatsModel extends ServedList<ConditionalFormatModel> {
  constructor(private range: RangeModel) {
    super();
  }

  get all(): ConditionalFormatModel[] {
    const { Worksheet: sheet, box } = this.range;
    return sheet.marks.filter((mark) => inside(mark.box, box)).map((mark) => new ConditionalFormatModel(this.range, mark));
  }

  Add(type: string): ConditionalFormatModel {
    this.range.refuseIfProtected();
    const mark = { box: this.range.box, type, rule: { formula1: '', operator: '' }, color: '', fill: '' };
    this.range.Worksheet.marks.push(mark);
    return new ConditionalFormatModel(this.range, mark);
  }

  protected found(id: string): ConditionalFormatModel | undefined {
    return this.all.find(({ Id }) => Id === id);
  }
}

const ids = new WeakMap<Mark, string>();
let made = 0;

class ConditionalFormatModel extends Served {
  readonly CellValue: CellValueModel;

  constructor(private range: RangeModel, private mark: Mark) {
    super();
    if (!ids.has(mark)) ids.set(mark, `{mark-${++made}}`);
    this.CellValue = new CellValueModel(mark);
  }

  get Id(): string {
    return ids.get(this.mark)!;
  }

  get Type(): string {
    return this.mark.type;
  }

  GetRangeOrNullObject(): RangeModel {
    return new RangeModel(this.range.Worksheet, this.mark.box);
  }

  Delete(): void {
    this.range.refuseIfProtected();
    const { marks } = this.range.Worksheet;
    marks.splice(marks.indexOf(this.mark), 1);
  }
}

class CellValueModel extends Served {
  readonly Format: MarkFormatModel;

  constructor(private mark: Mark) {
    super();
    this.Format = new MarkFormatModel(mark);
  }

  get Rule(): Mark['rule'] {
    return this.mark.rule;
  }

  /** The program writes a value as a formula. */
  set Rule({ formula1, operator }: Mark['rule']) {
    if (formula1 === '' || operator === '') throw new ProgramError('InvalidArgument');
    this.mark.rule = { formula1: formula1.startsWith('=') ? formula1 : `=${formula1}`, operator };
  }
}

class MarkFormatModel extends Served {
  readonly Font: MarkColorModel;
  readonly Fill: MarkColorModel;

  constructor(mark: Mark) {
    super();
    this.Font = new MarkColorModel(mark, 'color');
    this.Fill = new MarkColorModel(mark, 'fill');
  }
}

class MarkColorModel extends Served {
  constructor(private mark: Mark, private part: 'color' | 'fill') {
    super();
  }

  /** The program shows colours in capitals. */
  get Color(): string {
    return this.mark[this.part].toUpperCase();
  }

  set Color(color: string) {
    this.mark[this.part] = color;
  }
}
