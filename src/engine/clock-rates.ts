// The rates that a clock tree can make of its reference.

import { checkCount, checkListing } from './counts';
import { faults } from './fault';
import { ceiling, compare, divide, floor, fromNumber, multiply, rational, times, toNumber } from './rational';

/** rate = reference·n/d, in lowest terms. */
export interface ClockRate {
  rate: number;
  n: number;
  d: number;
}

const MOST_PAIRS = 1_000_000n;

/**
 * Every rate reference·N/D from `from` to `to` with N ≤ multiply and D ≤ divide, ascending, each once.
 * @param reference above 0
 * @param multiply a whole number from 1 to 10 000; divide as well
 * @throws Fault where an argument is out of range, no ratio fits, or more than 10 000 rates would be listed
 * @example clockRates(10, 12, 16, 5, 3).map(({ n, d }) => `${n}/${d}`) // => ['4/3', '3/2'] (5/4 needs a divider of 4)
 */
export function clockRates(reference: number, from: number, to: number, multiplyUpTo: number, divideUpTo: number): ClockRate[] {
  if (!(reference > 0)) throw faults.notPositive('reference', reference);
  if (!(from >= 0)) throw faults.negative('from', from);
  if (from > to) throw faults.edgesReversed('from', from, 'to', to);
  checkCount('multiply', multiplyUpTo, 10_000);
  checkCount('divide', divideUpTo, 10_000);
  const base = fromNumber(reference);
  const [low, high] = [divide(fromNumber(from), base), divide(fromNumber(to), base)];
  const spans = Array.from({ length: divideUpTo }, (_, i) => {
    const least = Number(ceiling(times(low, BigInt(i + 1))));
    return { d: i + 1, first: Math.max(1, least), last: Math.min(multiplyUpTo, Number(floor(times(high, BigInt(i + 1))))) };
  });
  const pairs = spans.reduce((sum, { first, last }) => sum + BigInt(Math.max(0, last - first + 1)), 0n);
  if (pairs > MOST_PAIRS) throw faults.tooManyPairs(pairs);
  const ratios = spans.flatMap(({ d, first, last }) =>
    Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => ({ n: first + i, d })).filter(({ n }) => greatestCommonDivisor(n, d) === 1));
  if (ratios.length === 0) throw faults.noClockRate(from, to);
  checkListing(BigInt(ratios.length), 'lower multiply or divide, or bring from and to closer together');
  return ratios
    .map(({ n, d }) => ({ exact: multiply(base, rational(BigInt(n), BigInt(d))), n, d }))
    .sort((x, y) => compare(x.exact, y.exact))
    .map(({ exact, n, d }) => ({ rate: toNumber(exact), n, d }));
}

const greatestCommonDivisor = (a: number, b: number): number => (b === 0 ? a : greatestCommonDivisor(b, a % b));
