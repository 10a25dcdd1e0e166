// Rules to rates: the rates that no rule forbids, found by carving the forbidden intervals out of what is still free.
//
// A rule forbids the rates between A·D/(j(1+t)) and B·D/(j(1−t)) for every counted multiple j, where (A, B) is its interval, D its divisor
// and t the clock tolerance. From some j on these intervals overlap and make one block down to 0. The rules with the highest blocks go
// first, so that little is left for the others, and each costs only the pieces that are still free.
//
// Ends are compared as doubles, and as exact fractions only where doubles can't tell.

import { faults } from './fault';
import { ONE, type Rational, ZERO, add, compare, divide, floor, multiply, rational, subtract, times, toNumber } from './rational';
import { type Rule } from './rules';

/** One end of a range of rates: exactly the fraction over the divisor, and as a double with an error below 2^−52 of itself. */
interface End {
  readonly value: number;
  readonly over: Rational;
  readonly by: number;
}

/** A range of free rates, ends included; unlimited where it has no high end. */
export interface FreeRange {
  readonly low: Rational;
  readonly high: Rational | null;
}

interface Piece {
  readonly low: End;
  readonly high: End;
}

/** Budget of work, in looks at a piece; looking at an interval takes about twenty times as long. A second or two. */
const MOST_WORK = 200_000_000;
const INTERVAL_WORK = 20;

/**
 * The rates from `from` (above 0) to `to` (null: unlimited) that break no rule under a clock tolerance, ascending.
 * @throws Fault where the work would get out of hand
 */
export function carve(rules: readonly Rule[], tolerance: Rational, from: Rational, to: Rational | null): FreeRange[] {
  const combs = rules.map((rule) => combOf(rule, tolerance)).filter((comb) => comb !== null).sort((x, y) => y.block.value - x.block.value);
  let pieces: Piece[] = [{ low: end(from, 1), high: to === null ? UNLIMITED : end(to, 1) }];
  let work = 0;
  for (const comb of combs) {
    work += pieces.length;
    let cut: Piece[] | null = null;
    for (const [i, piece] of pieces.entries()) {
      if (misses(comb, piece)) {
        cut?.push(piece);
        continue;
      }
      work += intervalsIn(comb, piece) * INTERVAL_WORK;
      if (work > MOST_WORK) throw faults.tooMuchWork();
      cut ??= pieces.slice(0, i);
      cutOut(comb, piece, cut);
    }
    if (cut) pieces = cut;
    if (pieces.length === 0) break;
  }
  return pieces.map(({ low, high }) => ({ low: exact(low), high: high === UNLIMITED ? null : exact(high) }));
}

/** The forbidden intervals of one rule on the rate axis. */
interface Comb {
  /** The interval of multiple j runs from low/j to high/j, ends excluded. */
  readonly low: Rational;
  readonly high: Rational;
  readonly lowValue: number;
  readonly highValue: number;
  readonly exempt: number;
  /** From this multiple on, intervals overlap; its upper end bounds the block. */
  readonly first: number;
  readonly block: End;
}

/** Null where a rule forbids nothing. */
function combOf({ inside, divisor, exempt }: Rule, tolerance: Rational): Comb | null {
  const low = inside.low.n <= 0n ? ZERO : divide(times(inside.low, BigInt(divisor)), add(ONE, tolerance));
  const high = divide(times(inside.high, BigInt(divisor)), subtract(ONE, tolerance));
  if (compare(low, high) >= 0) return null;
  // Two counted multiples are 1 apart, and 2 across an exempt one: their intervals overlap where low·(j+apart) < high·j.
  const apart = exempt > 0 ? 2n : 1n;
  const first = Number(floor(divide(times(low, apart), subtract(high, low)))) + 1;
  // An exempt first multiple has no upper end of its own.
  const counted = exempt > 0 && first % exempt === 0 ? first + 1 : first;
  return { low, high, lowValue: toNumber(low), highValue: toNumber(high), exempt, first: counted, block: end(high, counted) };
}

/** Whether doubles can tell that no forbidden interval reaches into a piece. */
function misses({ lowValue, highValue, first }: Comb, { low, high }: Piece): boolean {
  const most = (highValue / low.value) * (1 + SLACK);
  if (most >= first) return false;
  const least = (lowValue / high.value) * (1 - SLACK);
  return Math.floor(most) < least || most < 1;
}

/** About how many intervals cutOut has to look at. */
const intervalsIn = ({ lowValue, highValue, first }: Comb, { low, high }: Piece): number =>
  Math.max(1, Math.min(first, highValue / low.value) - lowValue / high.value);

/** Pushes what a rule leaves of a piece. */
function cutOut(comb: Comb, piece: Piece, left: Piece[]): void {
  let { low } = piece;
  const { high } = piece;
  let j = Math.floor((comb.highValue / low.value) * (1 + SLACK));
  if (j >= comb.first) {
    if (order(comb.block, low) > 0) low = comb.block;
    j = comb.first - 1;
  }
  for (; j >= 1 && order(low, high) <= 0; j--) {
    if (comb.exempt > 0 && j % comb.exempt === 0) continue;
    const top = end(comb.high, j);
    if (order(top, low) <= 0) continue;
    const bottom = end(comb.low, j);
    if (order(bottom, high) >= 0) break;
    if (order(low, bottom) <= 0) left.push({ low, high: bottom });
    low = top;
  }
  if (order(low, high) <= 0) left.push({ low, high });
}

const end = (over: Rational, by: number): End => ({ value: toNumber(over) / by, over, by });
const UNLIMITED: End = { value: Infinity, over: rational(1n), by: 0 };

/** Each value is within one 2^−52 of the exact one, so a difference beyond four of them is a difference. */
const SLACK = 4 * Number.EPSILON;

/** Below 0, 0 or above 0 as x is below, at or above y. */
function order(x: End, y: End): number {
  const difference = x.value - y.value;
  if (Math.abs(difference) > SLACK * x.value || x === UNLIMITED || y === UNLIMITED) return difference;
  return compare(multiply(x.over, rational(BigInt(y.by))), multiply(y.over, rational(BigInt(x.by))));
}

const exact = ({ over, by }: End): Rational => divide(over, rational(BigInt(by)));
