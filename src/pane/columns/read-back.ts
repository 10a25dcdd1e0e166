// Looks at inserted cells once they are computed: an error in one of them is said.

import type { LiveHost } from '../../host/port';
import { type Box, addressOf, cellBox, referenceTo } from '../address';
import { sentences } from './sentences';

/** What a cell shows while it is being computed. */
const PENDING = ['#BUSY!', '#GETTING_DATA', '#CALC!'];

/** A sentence about the first error among cells, null where there is none. */
export async function errorsIn(host: LiveHost, sheet: string, box: Box): Promise<string | null> {
  const values = (await host.read(referenceTo(sheet, box)))?.values ?? [];
  const errors = values.flatMap((line, r) => line.flatMap((value, c) =>
    (typeof value === 'object' && value !== null && !PENDING.includes(value.error) ? [{ ...value, cell: addressOf(cellBox(box.row + r, box.column + c)) }] : [])));
  const [first] = errors;
  return first ? sentences.errors(first.cell, first.error, first.message, errors.length - 1) : null;
}
