// Arguments that count something, and the limit on results that spill over rows, checked by counting before anything is listed.

import { faults } from './fault';

const MOST_ROWS = 10_000n;

/**
 * @param how what the user can do about it: the end of a sentence
 * @throws Fault where a result would have more than 10 000 rows
 */
export function checkListing(rows: bigint, how: string): void {
  if (rows > MOST_ROWS) throw faults.tooManyRows(rows, how);
}

/** @throws Fault where an argument is not a whole number from 1 to `most` */
export function checkCount(argument: string, value: number, most = Infinity): void {
  if (!(Number.isSafeInteger(value) && value >= 1 && value <= most)) throw faults.notCount(argument, value, most);
}
