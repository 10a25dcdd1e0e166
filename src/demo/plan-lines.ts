// The lines of a plan: a band in the columns A to D, and beside it where it lands.

import { FREQUENCY, HEADER, type Line, NUMBER_HEADER, formula, styled } from './cells';

export type BandOfPlan = [name: string, low: number, high: number, role: 'wanted' | 'unwanted'];

/** Names in A, edges in B and C, roles in D, results from E on. */
export const planHeader = (first: string): Line => [first, 'Low', 'High', 'Role', 'Folded low', 'Folded high', 'Zone', 'Inverted', 'Margin', 'Check']
  .map((title, column) => styled(title, [0, 3, 9].includes(column) ? HEADER : NUMBER_HEADER));

/** @param row as the sheet counts, from 1 */
export function planLine(row: number, [name, low, high, role]: BandOfPlan): Line {
  const band = `B${row},C${row},Rate`;
  const centre = `(B${row}+C${row})/2`;
  return [
    name, styled(low, FREQUENCY), styled(high, FREQUENCY), role,
    formula(`=FOLD.LOW(${band})`, FREQUENCY), formula(`=FOLD.HIGH(${band})`, FREQUENCY),
    formula(`=FOLD.ZONE(${centre},Rate)`), formula(`=FOLD.INVERTED(${centre},Rate)`, { horizontal: 'right' }),
    formula(`=FOLD.MARGIN(${band},Guard,Ppm)`, FREQUENCY), formula(`=FOLD.CHECK(${band},Guard,Ppm)`),
  ];
}
