// From what was seen after sampling back to the frequencies that can have caused it.
// They are a comb: the folded interval and, at real sampling, its mirror, repeated at every multiple of the rate.

import { readRate } from './band';
import { checkListing } from './counts';
import { faults } from './fault';
import { type Sampling, isEven, zoneExactly } from './folding';
import { type Interval, interval, isEmpty, mirror, shift } from './interval';
import { type IntervalSet, intersection, union } from './interval-set';
import { type Rational, ZERO, add, ceiling, compare, divide, floor, fromNumber, greatest, half, least, negate, subtract, times, toNumber } from './rational';

const MOST_CANDIDATES = 100_000n;

/** A true frequency, the zone it is in, and whether that zone inverts. */
export interface Source {
  frequency: number;
  zone: number;
  inverted: boolean;
}

/**
 * Every frequency from `from` to `to` that lands on a folded frequency, ascending.
 * @param folded from 0 to rate/2; at IQ sampling from −rate/2 to below rate (the part from rate/2 on is the part below 0)
 * @throws Fault where an argument is out of range, nothing lands there, or more than 10 000 frequencies would be listed
 * @example imagesOf(30, 100, 0, 200).map(({ frequency }) => frequency) // => [30, 70, 130, 170] (in zones 1 to 4)
 */
export function imagesOf(folded: number, rate: number, from: number, to: number, sampling: Sampling = 'real'): Source[] {
  const fs = readRate(rate);
  const span = readSpan(from, to);
  const seen = readFolded('folded', folded, fs, ZERO, sampling);
  const comb = new Comb(interval(seen, seen), fs, sampling);
  checkListing(comb.count(span), 'bring from and to closer together');
  const sources = comb.within(span).map(({ low }) => {
    const zone = zoneExactly(low, fs, sampling);
    return { frequency: toNumber(low), zone: Number(zone), inverted: sampling === 'real' && isEven(zone) };
  });
  if (sources.length === 0) throw faults.nothingLands(folded, from, to);
  return sources;
}

/** A range of frequencies, ends included. */
export interface FrequencyRange {
  lowest: number;
  highest: number;
}

/**
 * The true frequencies from `from` to `to` that agree with what several rates saw, ascending.
 * @param observed a folded frequency for each rate, as for imagesOf
 * @param rates each above 0, as many as observations
 * @param tolerance 0 or more: how far each observation may be off
 * @throws Fault where an argument is out of range, nothing agrees, or the range leaves too much to try
 * @example resolveFrequency([14, 10, 4], [56, 40, 33], 0, 1000) // => [{ lowest: 70, highest: 70 }]
 */
export function resolveFrequency(observed: readonly number[], rates: readonly number[], from: number, to: number, tolerance = 0, sampling: Sampling = 'real'): FrequencyRange[] {
  if (observed.length !== rates.length) throw faults.countsDiffer('rates', rates.length, 'observed', observed.length);
  if (!(tolerance >= 0)) throw faults.negative('tolerance', tolerance);
  const span = readSpan(from, to);
  const blur = fromNumber(tolerance);
  const combs = rates.map((rate, i) => {
    const fs = readRate(rate, 'rates');
    const seen = readFolded('observed', observed[i]!, fs, blur, sampling);
    return new Comb(interval(subtract(seen, blur), add(seen, blur)), fs, sampling);
  });
  // The coarsest comb first: each later one is looked at only where something is left.
  combs.sort((x, y) => compare(y.rate, x.rate));
  let left: IntervalSet = [span];
  for (const comb of combs) {
    const candidates = left.reduce((sum, piece) => sum + comb.count(piece), 0n);
    if (candidates > MOST_CANDIDATES) throw faults.tooManyCandidates(candidates);
    left = union(left.flatMap((piece) => intersection(comb.within(piece), [piece])));
  }
  if (left.length === 0) throw faults.nothingFits(from, to);
  checkListing(BigInt(left.length), 'bring from and to closer together or add an observation');
  return left.map(({ low, high }) => ({ lowest: toNumber(low), highest: toNumber(high) }));
}

function readSpan(from: number, to: number): Interval {
  if (from > to) throw faults.edgesReversed('from', from, 'to', to);
  return interval(fromNumber(from), fromNumber(to));
}

/** A folded frequency, which may leave the spectrum by as much as it may be off. */
function readFolded(argument: string, folded: number, rate: Rational, blur: Rational, sampling: Sampling): Rational {
  const seen = fromNumber(folded);
  const lowest = sampling === 'iq' ? negate(half(rate)) : ZERO;
  const highest = sampling === 'iq' ? rate : half(rate);
  const above = compare(subtract(seen, blur), highest);
  if (compare(add(seen, blur), lowest) < 0 || above > 0 || (sampling === 'iq' && above === 0)) {
    throw faults.outsideSpectrum(argument, folded, toNumber(lowest), toNumber(highest), sampling === 'iq');
  }
  return seen;
}

/** All frequencies that land in an interval of folded frequencies. */
class Comb {
  private readonly teeth: readonly Interval[];

  constructor(folded: Interval, readonly rate: Rational, sampling: Sampling) {
    const seen = sampling === 'iq' ? folded : interval(greatest(folded.low, ZERO), least(folded.high, half(rate)));
    this.teeth = sampling === 'iq' ? [seen] : [seen, mirror(seen)];
  }

  /** How many teeth reach into an interval, before those that touch are joined. */
  count(span: Interval): bigint {
    return this.teeth.reduce((sum, tooth) => {
      const { first, last } = this.turns(tooth, span);
      return last < first ? sum : sum + last - first + 1n;
    }, 0n);
  }

  /** The teeth that reach into an interval. */
  within(span: Interval): IntervalSet {
    const reaching: Interval[] = [];
    for (const tooth of this.teeth) {
      const { first, last } = this.turns(tooth, span);
      for (let turn = first; turn <= last; turn++) reaching.push(shift(tooth, times(this.rate, turn)));
    }
    return union(reaching.filter((tooth) => !isEmpty(tooth)));
  }

  private turns(tooth: Interval, span: Interval): { first: bigint; last: bigint } {
    return {
      first: ceiling(divide(subtract(span.low, tooth.high), this.rate)),
      last: floor(divide(subtract(span.high, tooth.low), this.rate)),
    };
  }
}
