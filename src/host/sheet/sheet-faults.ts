// Every sentence that a user can read when the embedded sheet did not do what was asked.

import { HostFault } from '../port';

/** What this sheet can't do at all. */
export const cannotAddPicture = 'The sheet of the workbench has no room for pictures: save the picture as a file instead.';

export const faults = {
  unknown: (reference: string) => new HostFault(`The workbook has no name, sheet or cells called ${reference}.`),
  otherSize: (reference: string, has: string, got: string) => new HostFault(`${reference} has ${has} cells; got ${got}.`),
  notWritable: (reference: string, value: number) => new HostFault(`${reference} was not written: no cell can hold ${value}.`),
  refused: (what: string) => new HostFault(`The sheet did not accept ${what}.`),
  sheetExists: (name: string) => new HostFault(`The workbook has a sheet called ${name} already.`),
  sheetName: (name: string) =>
    new HostFault(`A sheet can't be called ${JSON.stringify(name)}: a name has 1 to 31 characters, none of them [ ] : * ? / \\, and no ' at an end.`),
  noTables: (table: string) => new HostFault(`There is no table called ${table}: the sheet of the workbench knows no tables.`),
  changedSince: (what: string) => new HostFault(`${what} changed since, so the earlier change stays; take it back by hand.`),
  noPictures: () => new HostFault(cannotAddPicture),
};
