// The port: all that Foldplan asks of a spreadsheet, whichever it is. Imports nothing.

/** An error in a cell. An object, so that the text "#N/A" stays text. */
export interface CellError {
  /** The code the cell shows, such as `#VALUE!`. */
  error: string;
  /** The sentence behind it, where the host can tell. */
  message?: string;
}

/** What a cell holds once it is computed; null is a blank cell. */
export type CellValue = number | string | boolean | null | CellError;

/** What can be written to a cell: a value (text stays text, whatever it begins with) or a formula such as `=FOLD.ZONE(B2,Rate)`. */
export type CellInput = Exclude<CellValue, CellError> | { formula: string };

/** Where cells are. */
export interface Place {
  /** Name of the sheet. */
  sheet: string;
  /** Address within it, without `$`: `B2:B9`. */
  address: string;
}

/** The cells of a reference, row by row, and where they are. */
export interface Block extends Place {
  values: CellValue[][];
}

/** The formulas of a block, row by row; null for a cell that holds none, be it filled by the formula of another cell. */
export interface FormulaBlock extends Place {
  formulas: (string | null)[][];
}

/** A structured table: its cells, header row included. */
export interface Table extends Place {
  name: string;
}

/** What is to be changed in a workbook. Parts are done in the order in which they stand here. */
export interface Change {
  /** Sheets to add behind the others: copies of a sheet, or blank ones. */
  sheets?: { name: string; copyOf?: string }[];
  /** Columns to add at the right end of a structured table, header first; they may use its column names: `=FOLD.ZONE([@Low],Rate)`. */
  tableColumns?: { table: string; cells: CellInput[][] }[];
  /** Blocks to write, each of its reference's own size. A formula that fills more than its cell is written to that cell alone. */
  cells?: { reference: string; cells: CellInput[][] }[];
  looks?: { reference: string; look: Look }[];
  /** Defined names of the whole workbook: what each refers to, without "=" (`Plan!$B$2:$B$14`), or null to take the name away. */
  names?: Record<string, string | null>;
}

/** How cells look; what is left out stays as it is. */
export interface Look {
  /** In the notation of the file format: `0.000`. */
  numberFormat?: string;
  bold?: boolean;
  /** Widths of their columns in pixels. */
  width?: number;
  /** A note on the first cell; '' takes one away. Left out where the host or the cell can't have one. */
  note?: string;
  /** Whether numbers below 0 stand out, by a conditional format; false takes away the one that was set for exactly these cells. */
  marksNegative?: boolean;
}

/** Numbers that stand out: text of a contrast of 7 : 1 on a fill of its own, so that it is there on light and dark sheets. */
export const NEGATIVE = { color: '#8f1d14', fill: '#fbe3df' } as const;

/** A picture for a sheet. */
export interface Picture {
  /** A PNG file. */
  png: Uint8Array;
  /** Its size on the sheet, in pixels. */
  width: number;
  height: number;
  /** What it shows, in words, for those who don't see it. */
  alternativeText: string;
}

/**
 * One workbook in one host. References are a defined name (`Fold_Rate`) or an address (`Plan!B2:B9`, `'My plan'!B2`;
 * without a sheet: the active one). Every method throws HostFault where the host can't do what is asked.
 */
export interface Host {
  /** The cells a reference stands for, or null where the workbook has no such name or sheet. */
  read(reference: string): Promise<Block | null>;
  /** Writes a block of the reference's own size, all of it or nothing. */
  write(reference: string, cells: CellInput[][]): Promise<void>;
  /** Calls `listener` after every recalculation, until the returned function is called. */
  onRecalculated(listener: () => void): Promise<() => Promise<void>>;
}

/** A host that shows its workbook to somebody. */
export interface LiveHost extends Host {
  /** What this host can't do at all, a sentence each, so that nobody is offered it. */
  readonly cannot: { readonly addPicture?: string };

  // What is there

  /** The formulas in the cells of a reference, or null as in `read`. */
  formulas(reference: string): Promise<FormulaBlock | null>;
  /** The blocks that formulas of a sheet fill beyond their own cells, each as its address: `D3:D9`. */
  spills(sheet: string): Promise<string[]>;
  /** The block of filled cells around a reference, as far as the first blank row and column on every side; null where those cells are blank. */
  surroundings(reference: string): Promise<Block | null>;
  /** The sheets in the order of their tabs, each with the part that holds anything; its address is '' where it is blank. */
  sheets(): Promise<Place[]>;
  /** The structured tables; none in a host that has no such thing. */
  tables(): Promise<Table[]>;
  /** Defined names of the whole workbook, with what each refers to, without "=". */
  names(): Promise<Record<string, string>>;

  // What the user is at

  /** The selected cells, or null where something else is selected. */
  selection(): Promise<Place | null>;
  /** Shows cells and selects them. */
  select(reference: string): Promise<void>;
  /** Calls `listener` after other cells are selected, until the returned function is called. */
  onSelected(listener: () => void): Promise<() => Promise<void>>;
  /** Calls `listener` after every edit, whoever makes it, until the returned function is called. */
  onEdited(listener: () => void): Promise<() => Promise<void>>;

  // Changes

  /**
   * Changes the workbook, all of it or nothing: after a HostFault it is as it was. The user's own undo takes it back in one step where the
   * host allows it; the returned function does so everywhere, unless cells, sheets or names that the change wrote hold something else since:
   * then it throws HostFault and leaves all as it is.
   */
  change(change: Change): Promise<() => Promise<void>>;
  /** Puts a picture on the sheet, its upper left corner at the reference's. */
  addPicture(reference: string, picture: Picture): Promise<void>;
  /** From now on the worksheet functions start with this workbook, wherever the add-in is installed. */
  startWithWorkbook(): Promise<void>;
}

/** A host could not do what was asked; the message is one sentence for the user. */
export class HostFault extends Error {
  override name = 'HostFault';
}

// A whole workbook as plain data: what hosts hand to each other when a file is opened or saved.

export interface Workbook {
  /** In the order of the tabs. */
  sheets: Sheet[];
  /** Defined names of the whole workbook: name -> what it refers to, without "=": `Plan!$B$2:$B$14`. */
  names: Record<string, string>;
}

export interface Sheet {
  name: string;
  /** Sparse: cells[row][column], both from 0. */
  cells: Record<number, Record<number, Cell>>;
  /** Widths in pixels, by column from 0. */
  columns: Record<number, { width?: number; hidden?: boolean }>;
  /** Heights in pixels, by row from 0. */
  rows: Record<number, { height?: number; hidden?: boolean }>;
  /** Merged ranges as addresses: `A1:C1`. */
  merges: string[];
  /** Rows and columns that stay in view. */
  frozen: { rows: number; columns: number };
  /** Notes on cells, by address: `B2`. */
  notes?: Record<string, string>;
  /** Ranges in which numbers below 0 stand out, as addresses. */
  marksNegative?: string[];
}

export interface Cell {
  value: CellValue;
  /** With "=", and with worksheet names (`FOLD.ZONE`), not those of the file format. */
  formula?: string;
  /** Size of the block that the formula fills, where it fills more than its own cell. */
  spill?: { rows: number; columns: number };
  style?: Style;
}

export interface Style {
  /** In the notation of the file format: `0.000`, `#,##0`. */
  numberFormat?: string;
  fontName?: string;
  /** Points. */
  fontSize?: number;
  bold?: boolean;
  italic?: boolean;
  underline?: boolean;
  strike?: boolean;
  /** Colours are `#rrggbb`. */
  color?: string;
  fill?: string;
  horizontal?: 'left' | 'center' | 'right';
  vertical?: 'top' | 'middle' | 'bottom';
  wrap?: boolean;
  border?: Partial<Record<'top' | 'right' | 'bottom' | 'left', { style: 'thin' | 'medium' | 'thick' | 'dashed' | 'dotted' | 'double'; color: string }>>;
}
