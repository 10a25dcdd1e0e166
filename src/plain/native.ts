// Native formulas as text: what the equivalents of all families are made of. Only functions that every spreadsheet program has.

import { reasons } from './sentences';

/** An argument of a call, ready to stand anywhere in a formula. */
export interface Expression {
  /** In parentheses where it is more than one term; empty where the argument is left out. */
  text: string;
  /** Its value, where it is written out as a number or a text. */
  literal?: number | string;
}

/** A worksheet function as a native formula. */
export interface Equivalent {
  /** How many arguments it takes: at least, and at most. */
  least: number;
  most: number;
  /** Whether it rounds where the exact answer jumps, as at a zone edge. */
  rounds: boolean;
  /** The formula, without "=". Arguments left out at the end are there, empty. */
  write(...args: Expression[]): string;
}

/** There is no equivalent; the message says why, as a part of a sentence. */
export class NoEquivalent extends Error {}

// Conditions and results. A condition is null where it is known to hold.

export type Condition = string | null;

export const WRONG = '#VALUE!';
export const NONE = 'NA()';

/** `then` where all conditions hold. */
export function where(conditions: readonly Condition[], then: string, otherwise: string): string {
  const known = conditions.filter((condition) => condition !== null);
  return known.length === 0 ? then : `IF(${known.length === 1 ? known[0]! : `AND(${known.join(',')})`},${then},${otherwise})`;
}

/** Whether a cell shows nothing. By the length of its text: where formulas compare a cell with both 0 and "", the embedded sheet takes one for the other. */
export const isEmpty = (text: string): string => `LEN(${text})=0`;

const isLeftOut = ({ text, literal }: Expression): boolean => text === '' || literal === '';

/** Holds where every argument is a number. Arguments written as text are no numbers, although native formulas take them for such. */
export function areNumbers(...args: Expression[]): Condition {
  for (const { text, literal } of args) if (text === '' || typeof literal === 'string') throw new NoEquivalent(reasons.notNumber);
  const open = args.filter(({ literal }) => literal === undefined).map(({ text }) => text);
  return open.length === 0 ? null : `COUNT(${open.join(',')})=${open.length}`;
}

/** A comparison of an argument with a number. */
export function compares({ text, literal }: Expression, sign: '>' | '>=' | '<', bound: number): Condition {
  if (typeof literal !== 'number') return `${text}${sign}${bound}`;
  if (sign === '>' ? literal > bound : sign === '<' ? literal < bound : literal >= bound) return null;
  throw new NoEquivalent(reasons.outOfRange);
}

/** Holds where one argument is not above another. */
export function inOrder(low: Expression, high: Expression): Condition {
  if (typeof low.literal !== 'number' || typeof high.literal !== 'number') return `${low.text}<=${high.text}`;
  if (low.literal <= high.literal) return null;
  throw new NoEquivalent(reasons.outOfRange);
}

/** A number that may be left out, also by an empty cell, for 0: its value, null where it is known to be 0, and the conditions on it. */
export function optionalNumber(argument: Expression): { value: string | null; conditions: Condition[] } {
  const { text, literal } = argument;
  if (isLeftOut(argument) || literal === 0) return { value: null, conditions: [] };
  if (typeof literal === 'number') return { value: text, conditions: [] };
  areNumbers(argument);
  return { value: `N(${text})`, conditions: [`OR(${isEmpty(text)},COUNT(${text})=1)`] };
}

/** A guard, a rejection, a tolerance: an optional number from 0. */
export function optionalFromZero(argument: Expression): { value: string | null; conditions: Condition[] } {
  const { value, conditions } = optionalNumber(argument);
  if (value === null) return { value, conditions };
  return { value, conditions: [...conditions, compares({ ...argument, text: value }, '>=', 0)] };
}

/** One of several formulas by a word, the first where it is left out: written out, or looked up when the sheet computes. */
export function byWord<T extends string>(argument: Expression, words: readonly T[], write: (word: T) => string): string {
  const [first, ...others] = words as readonly [T, ...T[]];
  if (isLeftOut(argument) || argument.literal === 0) return write(first);
  const { text, literal } = argument;
  if (literal !== undefined) {
    const word = words.find((one) => typeof literal === 'string' && one === literal.trim().toLowerCase());
    if (word === undefined) throw new NoEquivalent(reasons.unknownWord);
    return write(word);
  }
  const said = `LOWER(TRIM(${text}))`;
  const known = `IF(OR(${isEmpty(text)},${text}=0,${said}="${first}"),${write(first)},${WRONG})`;
  return others.reduceRight((rest, word) => `IF(${said}="${word}",${write(word)},${rest})`, known);
}

/** "" for a row without a tone, else the result. */
export function unlessBlank(tone: Expression, result: string): string {
  return typeof tone.literal === 'number' ? result : `IF(${isEmpty(tone.text)},"",${result})`;
}

/** "" for a row without a band, else the result. Two edges of 0 are no band. */
export function unlessNoBand(low: Expression, high: Expression, result: string): string {
  const isBlank = (edge: Expression): Condition | false => {
    if (edge.literal === 0) return null;
    return edge.literal === undefined ? `OR(${isEmpty(edge.text)},${edge.text}=0)` : false;
  };
  const blanks = [isBlank(low), isBlank(high)].filter((one) => one !== null);
  if (blanks.includes(false)) return result;
  return blanks.length === 0 ? '""' : `IF(${blanks.length === 1 ? String(blanks[0]) : `AND(${blanks.join(',')})`},"",${result})`;
}

// Numbers
//
// Where a result jumps, a formula compares a frequency with multiples of half the rate. Of decimals that are multiples of one step and
// below 10^12 steps, the ratio to half the rate is a whole number or at least 10^-12 away from one: its denominator is the rate in steps,
// and near an edge that holds also for a rate of more digits. A double carries the ratio with an error of a few parts in 10^16. So up to
// 1000 half rates, rounding to 12 decimals turns what should be whole into a whole number, and nothing else. Above that the 15 digits of
// a cell are kept; fewer digits of the decimals can be told apart then, 9 up to 10^6 half rates.

/** A ratio to half the rate, settled to whole where it should be. @param size from 0, at least as large: it says how exact the ratio is */
export const settled = (ratio: string, size = `ABS(${ratio})`): string => `ROUND(${ratio},MIN(12,15-LEN(INT(${size}))))`;

/** A result to the 15 digits of the greatest number that went into it, so that 7.9 is not 7.90000000000001. */
export const tidy = (result: string, ...from: Expression[]): string => `ROUND(${result},14-INT(LOG10(${greatest(from)})))`;

/** The greatest size of several numbers. */
export const greatest = (from: readonly Expression[]): string => {
  const sizes = [...new Set(from.map(size))];
  return sizes.length === 1 ? sizes[0]! : `MAX(${sizes.join(',')})`;
};

export const size = ({ text, literal }: Expression): string => (typeof literal === 'number' ? String(Math.abs(literal)) : `ABS(${text})`);
