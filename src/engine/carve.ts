// Rules to rates: the rates that no rule forbids, found by carving the forbidden intervals out of what is still free.
//
// A rule forbids the rates between A·D/(j(1+t)) and B·D/(j(1−t)) for every counted multiple j, where (A, B) is its interval, D its divisor
// and t the clock tolerance. From some j on these intervals overlap and make one block down to 0. The rules with the highest blocks go
// first, so that little is left for the others, and each costs only the pieces that are still free.
//
// Ends are compared as doubles, and as exact fractions only where doubles can't tell.

import { faults } from './fault';
import { ONE, type Rational, ZERO, add, compare, divide, rational, subtract, times, toNumber } from './rational';
import { type Rule } from './rules';

/** An end of a forbidden interval, for multiple 1: a double within SLACK of it, and the fraction itself, made when it is asked for. */
interface Edge {
  readonly value: number;
  readonly exact: () => Rational;
}

/** One end of a range of rates: an edge over a multiple. */
interface End {
  readonly value: number;
  readonly edge: Edge;
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
  const spread: Tolerance = { early: known(add(ONE, tolerance)), late: known(subtract(ONE, tolerance)) };
  const combs = rules.map((rule) => combOf(rule, spread)).filter((comb) => comb !== null).sort((x, y) => y.block.value - x.block.value);
  let pieces: Piece[] = [{ low: end(given(from), 1), high: to === null ? UNLIMITED : end(given(to), 1) }];
  let work = 0;
  for (const comb of combs) {
    if (pieces.length === 0) break;
    const multiples = multiplesWithin(comb, pieces);
    work += Math.min(multiples * INTERVAL_WORK, pieces.length);
    if (work > MOST_WORK) throw faults.tooMuchWork();
    if (multiples * INTERVAL_WORK < pieces.length) cutByMultiples(comb, multiples, pieces);
    else {
      work += pieces.reduce((sum, piece) => sum + (misses(comb, piece) ? 0 : intervalsIn(comb, piece) * INTERVAL_WORK), 0);
      if (work > MOST_WORK) throw faults.tooMuchWork();
      pieces = cutByPieces(comb, pieces);
    }
  }
  return pieces.map(({ low, high }) => ({ low: exact(low), high: high === UNLIMITED ? null : exact(high) }));
}

/** 1 + t and 1 − t. */
interface Tolerance {
  readonly early: { readonly value: number; readonly exact: Rational };
  readonly late: { readonly value: number; readonly exact: Rational };
}

const known = (exact: Rational) => ({ value: toNumber(exact), exact });

/** The forbidden intervals of one rule on the rate axis: multiple j forbids what lies between low/j and high/j. */
interface Comb {
  readonly low: Edge;
  readonly high: Edge;
  readonly exempt: number;
  /** From this multiple on, intervals overlap; its upper end bounds the block. */
  readonly first: number;
  readonly block: End;
}

/** Null where a rule forbids nothing. */
function combOf({ inside, divisor, exempt }: Rule, tolerance: Tolerance): Comb | null {
  const low: Edge = inside.low.n <= 0n ? NOTHING : {
    value: (toNumber(inside.low) * divisor) / tolerance.early.value,
    exact: () => divide(times(inside.low, BigInt(divisor)), tolerance.early.exact),
  };
  const high: Edge = {
    value: (toNumber(inside.high) * divisor) / tolerance.late.value,
    exact: () => divide(times(inside.high, BigInt(divisor)), tolerance.late.exact),
  };
  const width = high.value - low.value;
  const doubt = SLACK * high.value;
  if (width <= doubt && compare(low.exact(), high.exact()) >= 0) return null;
  // Two counted multiples are 1 apart, and 2 across an exempt one: their intervals overlap where low·(j+apart) < high·j. A first
  // multiple that is higher than need be costs a look, one that is lower would lose an isolated rate.
  const apart = exempt > 0 ? 2 : 1;
  const overlapping = width > doubt ? Math.floor(((low.value * apart) / (width - doubt)) * (1 + SLACK)) + 1 : Number.MAX_SAFE_INTEGER;
  const first = exempt > 0 && overlapping % exempt === 0 ? overlapping + 1 : overlapping;
  return { low, high, exempt, first, block: end(high, first) };
}

/** Whether doubles can tell that no forbidden interval reaches into a piece. */
function misses(comb: Comb, { low, high }: Piece): boolean {
  const most = (comb.high.value / low.value) * (1 + SLACK);
  if (most >= comb.first) return false;
  const least = (comb.low.value / high.value) * (1 - SLACK);
  return Math.floor(most) < least || most < 1;
}

/** About how many intervals cutOut has to look at. */
const intervalsIn = (comb: Comb, { low, high }: Piece): number =>
  Math.max(1, Math.min(comb.first, comb.high.value / low.value) - comb.low.value / high.value);

/** The multiples of a rule that reach into the lowest piece or above it, its block counting as one. */
const multiplesWithin = (comb: Comb, pieces: readonly Piece[]): number => Math.min(comb.first, Math.floor((comb.high.value / pieces[0]!.low.value) * (1 + SLACK)));

/** Looks at every piece: for few pieces and many intervals. */
function cutByPieces(comb: Comb, pieces: readonly Piece[]): Piece[] {
  const left: Piece[] = [];
  for (const piece of pieces) {
    if (misses(comb, piece)) left.push(piece);
    else cutOut(comb, piece, left);
  }
  return left;
}

/** Looks up every interval, in place: for few intervals and many pieces. */
function cutByMultiples(comb: Comb, multiples: number, pieces: Piece[]): void {
  let begin = 0;
  for (let j = multiples; j >= 1 && begin < pieces.length; j--) {
    if (comb.exempt > 0 && j % comb.exempt === 0) continue;
    const bottom = j === comb.first ? end(NOTHING, 1) : end(comb.low, j);
    const top = end(comb.high, j);
    begin = firstReachingAbove(bottom, pieces, begin);
    let behind = begin;
    while (behind < pieces.length && order(pieces[behind]!.low, top) < 0) behind++;
    if (behind === begin) continue;
    const [first, last] = [pieces[begin]!, pieces[behind - 1]!];
    const left: Piece[] = [];
    if (order(first.low, bottom) <= 0) left.push({ low: first.low, high: bottom });
    if (order(top, last.high) <= 0) left.push({ low: top, high: last.high });
    pieces.splice(begin, behind - begin, ...left);
  }
}

/** Index of the first piece whose high end is above an end, from `begin` on. */
function firstReachingAbove(bottom: End, pieces: readonly Piece[], begin: number): number {
  let [low, high] = [begin, pieces.length];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (order(pieces[middle]!.high, bottom) > 0) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** Pushes what a rule leaves of a piece. */
function cutOut(comb: Comb, piece: Piece, left: Piece[]): void {
  let { low } = piece;
  const { high } = piece;
  let j = Math.floor((comb.high.value / low.value) * (1 + SLACK));
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

const end = (edge: Edge, by: number): End => ({ value: edge.value / by, edge, by });
const given = (rate: Rational): Edge => ({ value: toNumber(rate), exact: () => rate });
const NOTHING = given(ZERO);
const UNLIMITED: End = { value: Infinity, edge: NOTHING, by: 1 };

/** Each value is within four roundings of the exact one, so a difference beyond twice as many is a difference. */
const SLACK = 8 * Number.EPSILON;

/** Below 0, 0 or above 0 as x is below, at or above y. */
function order(x: End, y: End): number {
  const difference = x.value - y.value;
  if (Math.abs(difference) > SLACK * x.value || x === UNLIMITED || y === UNLIMITED) return difference;
  return compare(times(x.edge.exact(), BigInt(y.by)), times(y.edge.exact(), BigInt(x.by)));
}

const exact = ({ edge, by }: End): Rational => divide(edge.exact(), rational(BigInt(by)));
