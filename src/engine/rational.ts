// Exact fractions. The decimals of a sheet enter here, and a result leaves through one rounding at the end.

import { decimalOf } from './decimal';

/** n / d with d above 0; not reduced, since a result lives for a few operations only. */
export interface Rational {
  readonly n: bigint;
  readonly d: bigint;
}

export const rational = (n: bigint, d = 1n): Rational => ({ n, d });
export const ZERO = rational(0n);
export const ONE = rational(1n);

/** The decimal of at most 15 significant digits that a sheet shows for `x`. */
export function fromNumber(x: number): Rational {
  const { coefficient, places } = decimalOf(x);
  return places >= 0 ? { n: coefficient, d: 10n ** BigInt(places) } : { n: coefficient * 10n ** BigInt(-places), d: 1n };
}

export const add = (x: Rational, y: Rational): Rational => (x.d === y.d ? { n: x.n + y.n, d: x.d } : { n: x.n * y.d + y.n * x.d, d: x.d * y.d });
export const subtract = (x: Rational, y: Rational): Rational => (x.d === y.d ? { n: x.n - y.n, d: x.d } : { n: x.n * y.d - y.n * x.d, d: x.d * y.d });
export const multiply = (x: Rational, y: Rational): Rational => ({ n: x.n * y.n, d: x.d * y.d });
/** Division by 0 throws, as it does for whole numbers. */
export function divide(x: Rational, y: Rational): Rational {
  if (y.n === 0n) throw new RangeError('division by 0');
  return y.n > 0n ? { n: x.n * y.d, d: x.d * y.n } : { n: -x.n * y.d, d: x.d * -y.n };
}
export const times = (x: Rational, k: bigint): Rational => ({ n: x.n * k, d: x.d });
export const half = (x: Rational): Rational => ({ n: x.n, d: 2n * x.d });
export const negate = (x: Rational): Rational => ({ n: -x.n, d: x.d });
export const absolute = (x: Rational): Rational => (x.n < 0n ? negate(x) : x);

/** Below 0, 0 or above 0 as x is below, at or above y. */
export function compare(x: Rational, y: Rational): number {
  const difference = x.d === y.d ? x.n - y.n : x.n * y.d - y.n * x.d;
  return difference > 0n ? 1 : difference < 0n ? -1 : 0;
}
export const least = (x: Rational, y: Rational): Rational => (compare(x, y) <= 0 ? x : y);
export const greatest = (x: Rational, y: Rational): Rational => (compare(x, y) >= 0 ? x : y);

/** Quotient of whole numbers rounded towards −∞; b above 0. */
export function floorDivide(a: bigint, b: bigint): bigint {
  const quotient = a / b;
  return a < 0n && quotient * b !== a ? quotient - 1n : quotient;
}
export const floor = (x: Rational): bigint => floorDivide(x.n, x.d);
export const ceiling = (x: Rational): bigint => -floorDivide(-x.n, x.d);

const SAFE = BigInt(Number.MAX_SAFE_INTEGER);
const bits = (x: bigint): number => x.toString(16).length * 4;

/** The nearest double, ties to even: the only rounding of a calculation. */
export function toNumber(x: Rational): number {
  const size = x.n < 0n ? -x.n : x.n;
  // Both fit into a double exactly, and IEEE 754 rounds the one division correctly.
  if (size <= SAFE && x.d <= SAFE) return Number(x.n) / Number(x.d);
  // A quotient of 64 to 72 bits, its last bit set where more follow, rounds as the whole quotient would.
  // Not finer than 2^-1076, so that a subnormal result is rounded once as well.
  const shift = Math.min(68 - (bits(size) - bits(x.d)), 1076);
  const scaled = shift >= 0 ? size << BigInt(shift) : size;
  const divisor = shift >= 0 ? x.d : x.d << BigInt(-shift);
  const quotient = scaled / divisor;
  const sticky = quotient * divisor === scaled ? quotient : quotient | 1n;
  const magnitude = scaleByPowerOfTwo(Number(sticky), -shift);
  return x.n < 0n ? -magnitude : magnitude;
}

/** value·2^exponent; the steps before the last are exact, so it rounds once. */
function scaleByPowerOfTwo(value: number, exponent: number): number {
  let rest = exponent;
  while (rest < -1000) {
    const step = Math.max(rest, -100);
    value *= 2 ** step;
    rest -= step;
  }
  while (rest > 900) {
    value *= 2 ** 100;
    rest -= 100;
  }
  return value * 2 ** rest;
}

const DIGITS = 15;

/** The greatest decimal of 15 significant digits that is not above x; x is 0 or more. */
export function roundDown(x: Rational): number {
  return roundToDigits(x, floorDivide);
}

/** The least decimal of 15 significant digits that is not below x; x is 0 or more. */
export function roundUp(x: Rational): number {
  return roundToDigits(x, (a, b) => -floorDivide(-a, b));
}

function roundToDigits(x: Rational, quotient: (a: bigint, b: bigint) => bigint): number {
  if (x.n === 0n) return 0;
  let places = DIGITS - 1 - Math.floor(Math.log10(toNumber(x)));
  // log10 of a double beside a power of ten may be one off; the digits themselves tell.
  while (digitsAt(x, places) > DIGITS) places--;
  while (digitsAt(x, places) < DIGITS) places++;
  const whole = places >= 0 ? quotient(x.n * 10n ** BigInt(places), x.d) : quotient(x.n, x.d * 10n ** BigInt(-places));
  return Number(`${whole}e${-places}`);
}

const digitsAt = (x: Rational, places: number): number =>
  (places >= 0 ? (x.n * 10n ** BigInt(places)) / x.d : x.n / (x.d * 10n ** BigInt(-places))).toString().length;
