// FOLD cells that show an error: those whose function is not known where the formula was typed, and the others with their sentence.

import type { Workbook } from '../../host/port';
import { callsOurs } from '../../plain';
import { addressOf, cellBox, referenceTo } from '../address';
import { sentences } from './sentences';

export interface Trouble {
  sheet: string;
  /** `D8` */
  address: string;
  formula: string;
  /** `#NAME?` */
  code: string;
  /** What the function says, where the host can tell. */
  message: string | null;
}

/** In the order of the sheets, row by row. Cells that a formula elsewhere fills count as that formula's. */
export function troublesIn({ sheets }: Workbook): Trouble[] {
  return sheets.flatMap(({ name, cells }) => Object.entries(cells).flatMap(([row, line]) => Object.entries(line).flatMap(([column, { value, formula }]) => {
    if (formula === undefined || typeof value !== 'object' || value === null || !callsOurs(formula.slice(1))) return [];
    return [{ sheet: name, address: addressOf(cellBox(Number(row), Number(column))), formula, code: value.error, message: value.message ?? null }];
  })));
}

/** Whether entering the formula again may help: it was typed where the function was not known. */
export const isUnknown = ({ code }: Trouble): boolean => code === '#NAME?';

export const unknownSentence = (unknown: Trouble[]): string =>
  sentences.unknown(unknown.length, unknown.length === 1 ? placeOf(unknown[0]!) : `${placeOf(unknown[0]!)} to ${placeOf(unknown.at(-1)!)}`);

/** `Plan!D8` */
export const placeOf = ({ sheet, address }: Trouble): string => referenceTo(sheet, address);
