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

/** The cells of a reference, row by row, and where they are. */
export interface Block {
  /** Name of the sheet. */
  sheet: string;
  /** Address within it, without `$`: `B2:B9`. */
  address: string;
  values: CellValue[][];
}

/**
 * One open workbook in one host. References are a defined name (`Fold_Rate`) or an address (`Plan!B2:B9`, `'My plan'!B2`;
 * without a sheet: the active one).
 */
export interface Host {
  /** The cells a reference stands for, or null where the workbook has no such name or sheet. */
  read(reference: string): Promise<Block | null>;
  /** Writes a block of the reference's own size, all of it or nothing. Throws HostFault where it can't. */
  write(reference: string, cells: CellInput[][]): Promise<void>;
  /** Calls `listener` after every recalculation, until the returned function is called. */
  onRecalculated(listener: () => void): Promise<() => Promise<void>>;
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
