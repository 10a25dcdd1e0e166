// What a cell holds is a double; what it shows, and what the engineer means, is a decimal of at most 15 significant digits.
// Decimals of so few digits and doubles correspond one to one, so the decimal can be read back exactly.

/** coefficient · 10^−places, exactly. */
export interface Decimal {
  readonly coefficient: bigint;
  readonly places: number;
}

/** 10^0 to 10^22: the powers of ten that a double holds exactly. */
export const POWERS_OF_TEN: readonly number[] = Array.from({ length: 23 }, (_, k) => Number(`1e${k}`));

const LIMIT = 1e15;

/** x·power, rounded to a whole number: exactly x·power where isWhole says so of that power of ten. */
export const scaled = (x: number, power: number): number => Math.round(x * power);

/**
 * Whether x is a whole number below 10^15 in size at so many places.
 * The test is exact: the quotient of two exact doubles is the double nearest to that decimal, and no other decimal of at most
 * 15 digits shares it.
 */
export function isWhole(x: number, places: number): boolean {
  const power = POWERS_OF_TEN[places]!;
  const whole = scaled(x, power);
  return whole / power === x && whole < LIMIT && whole > -LIMIT;
}

/** The least number of places, from `start` on, at which isWhole holds, or −1 where there is none up to 22. */
export function placesOf(x: number, start = 0): number {
  for (let places = start; places < POWERS_OF_TEN.length; places++) {
    if (isWhole(x, places)) return places;
    if (Math.abs(x) * POWERS_OF_TEN[places]! >= LIMIT) return -1;
  }
  return -1;
}

/** The decimal of at most 15 significant digits that a sheet shows for a finite x. */
export function decimalOf(x: number): Decimal {
  const places = placesOf(x);
  if (places >= 0) return { coefficient: BigInt(scaled(x, POWERS_OF_TEN[places]!)), places };
  const [digits, exponent] = x.toExponential(14).split('e') as [string, string];
  const significant = digits.replace('.', '').replace(/0+$/, '');
  const fraction = significant.replace('-', '').length - 1;
  return { coefficient: BigInt(significant), places: fraction - Number(exponent) };
}
