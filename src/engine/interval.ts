// A closed interval of exact numbers, its two ends included; a point where they are equal.

import { type Rational, add, compare, greatest, half, least, negate, subtract, times } from './rational';

export interface Interval {
  readonly low: Rational;
  readonly high: Rational;
}

export const interval = (low: Rational, high: Rational): Interval => ({ low, high });
export const isEmpty = (x: Interval): boolean => compare(x.low, x.high) > 0;
export const mirror = (x: Interval): Interval => ({ low: negate(x.high), high: negate(x.low) });
export const shift = (x: Interval, by: Rational): Interval => ({ low: add(x.low, by), high: add(x.high, by) });
/** The n-th harmonic of a band. */
export const multiple = (x: Interval, n: number): Interval => ({ low: times(x.low, BigInt(n)), high: times(x.high, BigInt(n)) });
export const intersect = (x: Interval, y: Interval): Interval => ({ low: greatest(x.low, y.low), high: least(x.high, y.high) });
export const centre = (x: Interval): Rational => half(add(x.low, x.high));
export const width = (x: Interval): Rational => subtract(x.high, x.low);
