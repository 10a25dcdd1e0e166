// Values of cells as the file writes them.

import type { CellError, CellValue } from '../port';
import { decodeCellText, encodeCellText } from './xml';

export interface SharedString {
  text: string;
  /** Whether its parts have formats of their own. */
  rich: boolean;
}

/** A value that has the type and the text which a cell's element gives. */
export function readValue(type: string | undefined, text: string, strings: readonly SharedString[]): CellValue {
  switch (type) {
    case 's': return strings[Number(text)]?.text ?? '';
    case 'str':
    case 'inlineStr': return decodeCellText(text);
    case 'b': return text.trim() === '1' || text.trim() === 'true';
    case 'e': return { error: text.trim() };
    case 'd': return serialDate(text.trim());
    default: return readNumber(text);
  }
}

/** The type of a value in the file, undefined for a number, and its element's content. */
export function writeValue(value: Exclude<CellValue, null>): { type: 'b' | 'e' | 'str' | undefined; text: string } {
  if (typeof value === 'number') return { type: undefined, text: String(value) };
  if (typeof value === 'boolean') return { type: 'b', text: value ? '1' : '0' };
  if (typeof value === 'string') return { type: 'str', text: encodeCellText(value) };
  return { type: 'e', text: storedCode(value) };
}

export const isError = (value: CellValue | undefined): value is CellError => typeof value === 'object' && value !== null;

/** Whether two values are stored alike; messages of errors are not stored. */
export const sameValue = (a: CellValue, b: CellValue): boolean => (isError(a) && isError(b) ? storedCode(a) === storedCode(b) : Object.is(a, b));

/** The errors that the file format has. Programs write the others, such as #SPILL!, as #VALUE!; some refuse a file that holds them as they are. */
const STORED = ['#NULL!', '#DIV/0!', '#VALUE!', '#REF!', '#NAME?', '#NUM!', '#N/A', '#GETTING_DATA'];

const storedCode = ({ error }: CellError): string => (STORED.includes(error) ? error : '#VALUE!');

function readNumber(text: string): CellValue {
  const trimmed = text.trim();
  const number = Number(trimmed);
  return trimmed === '' ? null : Number.isFinite(number) ? number : trimmed;
}

const DAY = 86_400_000;

/** Days since the end of 1899, as cells count them. */
function serialDate(iso: string): CellValue {
  const time = Date.parse(/[Zz]$|[+-]\d\d:?\d\d$/.test(iso) || !iso.includes('T') ? iso : `${iso}Z`);
  return Number.isNaN(time) ? iso : (time - Date.UTC(1899, 11, 30)) / DAY;
}
