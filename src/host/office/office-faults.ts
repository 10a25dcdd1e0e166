// Every sentence that a user can read when the spreadsheet program did not do what was asked.

import { HostFault } from '../port';

/** What the program's error codes mean to the user; behind any other code stand the program's own words. */
const REASONS: Record<string, string> = {
  AccessDenied: 'the sheet is protected, or the workbook can only be read',
  ActivityLimitReached: 'the spreadsheet program is busy; try again in a moment',
  ConnectionFailure: 'the connection to the spreadsheet program is lost; close the pane and open it again',
  FilteredRangeConflict: 'a filter hides some of the cells; clear it and try again',
  FormulaLengthExceedsLimit: 'a formula would be longer than the spreadsheet program allows',
  InactiveWorkbook: 'another workbook is in front; come back to this one and try again',
  InvalidOperationInCellEditMode: 'a cell is being edited; finish it with Enter and try again',
  InvalidOrTimedOutSession: 'the session has expired; open the workbook again',
  MergedRangeConflict: 'some of the cells are merged',
  OperationCellsExceedLimit: 'these are more cells than the spreadsheet program passes at once',
  RangeExceedsLimit: 'these are more cells than the spreadsheet program passes at once',
  RequestPayloadSizeLimitExceeded: 'these are more cells than the spreadsheet program passes at once',
  ResponsePayloadSizeLimitExceeded: 'these are more cells than the spreadsheet program passes at once',
};

export const faults = {
  unknown: (reference: string) => new HostFault(`This workbook has no name or sheet that ${reference} could stand for.`),
  notCells: (reference: string) => new HostFault(`${reference} stands for no cells; they may have been deleted.`),
  notAddress: (reference: string) => new HostFault(`${reference} is no address of cells.`),
  sizeDiffers: (reference: string, has: string, got: string) => new HostFault(`${reference} has ${has} cells; ${got} were to be written.`),
  notWritable: (reference: string, value: number) => new HostFault(`${reference} was not written: no cell can hold ${value}.`),

  sheetExists: (name: string) => new HostFault(`The workbook has a sheet called ${name} already.`),
  sheetName: (name: string) =>
    new HostFault(`A sheet can't be called ${JSON.stringify(name)}: a name has 1 to 31 characters, none of them [ ] : * ? / \\, and no ' at an end.`),
  noSheet: (name: string) => new HostFault(`This workbook has no sheet called ${name}.`),
  noTable: (name: string) => new HostFault(`This workbook has no table called ${name}.`),
  changedSince: (what: string) => new HostFault(`${what} changed since, so the earlier change stays; take it back by hand.`),
  noStart: () => new HostFault('The functions could not be made to start with this workbook; opening the pane starts them.'),

  /** The program answered with an error. */
  refused: (what: string, error: OfficeError) => new HostFault(`${what}: ${reason(error)}.`),
  /** It did so half-way, and then would not take back the half. */
  halfWritten: (what: string, error: OfficeError) => new HostFault(`${what} may be written in part, so undo or check it: ${reason(error)}.`),
};

/** What every error of the client library carries. */
export interface OfficeError {
  code: string;
  message: string;
}

export function isOfficeError(error: unknown): error is OfficeError {
  return error instanceof Error && typeof (error as Partial<OfficeError>).code === 'string';
}

const reason = ({ code, message }: OfficeError): string => REASONS[code] ?? `${message.replace(/\.$/, '')} (${code})`;
