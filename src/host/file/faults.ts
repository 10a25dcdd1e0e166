// What this host tells the user when it can't go on.

import { HostFault } from '../port';

export const faults = {
  empty: () => new HostFault('The file is empty.'),
  notZip: () => new HostFault('This is not an .xlsx workbook.'),
  oldFormat: () => new HostFault('This is a workbook in the old .xls format; save it as .xlsx first.'),
  protectedByPassword: () => new HostFault('This workbook is protected by a password; save it without one first.'),
  compound: () => new HostFault('This is not an .xlsx workbook: it is a file of an older program.'),
  binaryFormat: () => new HostFault('This is a binary workbook (.xlsb); save it as .xlsx first.'),
  openDocument: () => new HostFault('This is an OpenDocument file; save it as .xlsx first.'),
  damagedArchive: () => new HostFault('The file is damaged: its archive is incomplete or changed.'),
  noWorkbook: () => new HostFault('There is no workbook in this file.'),
  noSheet: () => new HostFault('This workbook has no worksheet.'),
  partMissing: (part: string) => new HostFault(`The file is damaged: its part ${part} is missing.`),
  partDamaged: (part: string) => new HostFault(`The file is damaged: its part ${part} can't be read.`),

  noReference: (reference: string) => new HostFault(`The workbook has no name or sheet for ${reference}.`),
  otherSize: (reference: string, rows: number, columns: number) => new HostFault(`${reference} has ${rows} × ${columns} cells; what should be written has another size.`),
  partOfArray: (cell: string, area: string) => new HostFault(`${cell} is part of the array formula in ${area}, which can only be changed as a whole.`),
  sheetName: (name: string) => new HostFault(`The sheet name ${JSON.stringify(name)} can't be saved: a name has 1 to 31 characters, none of them [ ] : * ? / \\.`),
};
