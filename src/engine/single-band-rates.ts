// The sample rates at which one band lies within one zone.
//
// A band from a to b with guard g fits zone z of real sampling when (z−1)·fs/2 ≤ a−g and b+g ≤ z·fs/2. With a clock that may be off by
// the fraction t, the lower edge may rise to (1+t) of its place and the upper one sink to (1−t), so zone z allows the rates from
// 2(b+g)/(z(1−t)) to 2(a−g)/((z−1)(1+t)). At IQ sampling the same holds with 2z−1 and 2z+1 for z−1 and z: the edges in half rates.

import { folds, inPpm, largestTolerance, readBand, readGuard, readRate, readTolerance } from './band';
import { checkListing } from './counts';
import { faults } from './fault';
import { type Sampling, isEven } from './folding';
import { type Interval, centre } from './interval';
import {
  ONE, type Rational, ZERO, add, ceiling, compare, divide, floor, fromNumber, greatest, least, multiply, roundDown, roundUp, subtract, times, toNumber,
} from './rational';

/** The usable rates of one zone, ends included. */
export interface RateRange {
  zone: number;
  lowest: number;
  /** null where unlimited */
  highest: number | null;
  /** highest − lowest; null where unlimited */
  width: number | null;
  inverted: boolean;
}

/** So many ranges in a row may be too narrow for 15 digits before the search for the lowest gives up. */
const MOST_NARROW_RANGES = 10_000n;

/**
 * Every range of rates from `from` to `to` that holds a band within one zone, ascending. Ends are rounded inward to 15 digits, so
 * each of them, put back as the rate, has a margin of 0 or more. A range of one point is listed where 15 digits can tell it.
 * @param from the least rate asked for, 0 or more; 0: as low as the band allows
 * @param to the greatest rate asked for, or null for no limit
 * @throws Fault where an argument is out of range, where no rate is usable, or where more than 10 000 ranges would be listed
 * @source zone by zone as in R. Vaughan, N. Scott, D. White, The theory of bandpass sampling, IEEE Trans. Signal Processing 39(9), 1991
 * @example usableRates(17.5, 22.5)[0] // => { zone: 4, lowest: 11.25, highest: 11.6666666666666, width: 0.4166666666666, inverted: true }
 */
export function usableRates(low: number, high: number, from = 0, to: number | null = null, guard = 0, ppm = 0, sampling: Sampling = 'real'): RateRange[] {
  if (!(from >= 0)) throw faults.negative('from', from);
  if (to !== null && !(to > 0)) throw faults.notPositive('to', to);
  if (to !== null && from > to) throw faults.edgesReversed('from', from, 'to', to);
  const fit = new Fit(low, high, guard, ppm, sampling);
  const bottom = fromNumber(from);
  const top = to === null ? null : fromNumber(to);
  const first = fit.highestZone(bottom);
  const last = top === null ? fit.lowestZone : fit.zoneReaching(top);
  if (first === null) throw faults.endlessRates();
  checkListing(first - last + 1n, 'raise from, lower to, or give a guard');
  const ranges: RateRange[] = [];
  for (let zone = first; zone >= last; zone--) {
    const range = fit.range(zone, bottom, top);
    if (range) ranges.push(range);
  }
  if (ranges.length === 0) throw faults.noRateInRange(from || toNumber(fit.leastRate), to);
  return ranges;
}

/**
 * The lowest rate that holds a band within one zone.
 * @throws Fault where an argument is out of range or no rate is lowest
 * @example lowestRate(17.5, 22.5) // => 11.25
 */
export function lowestRate(low: number, high: number, guard = 0, ppm = 0, sampling: Sampling = 'real'): number {
  const fit = new Fit(low, high, guard, ppm, sampling);
  const first = fit.highestZone(ZERO);
  if (first === null) throw faults.noLowestRate();
  for (let zone = first; zone >= fit.lowestZone && first - zone < MOST_NARROW_RANGES; zone--) {
    const range = fit.range(zone, ZERO, null);
    if (range) return range.lowest;
  }
  throw faults.rangesTooNarrow();
}

/**
 * Parts per million by which the clock may be off either way before a band loses its margin, rounded down to 15 digits; 0 where
 * it has none.
 * @throws Fault where low is above high, rate is not above 0 or guard is below 0
 * @example clockTolerance(10, 40, 100) // => 200000
 */
export function clockTolerance(low: number, high: number, rate: number, guard = 0, sampling: Sampling = 'real'): number {
  const tolerance = largestTolerance(readBand(low, high), readRate(rate), readGuard(guard), sampling);
  return tolerance === null ? 0 : roundDown(inPpm(tolerance));
}

/** One band against all zones. */
class Fit {
  private readonly band: Interval;
  /** −1 where the zones counted here are those of the band's mirror */
  private readonly sign: bigint;
  /** a − g and b + g */
  private readonly below: Rational;
  private readonly above: Rational;
  /** 1 + t and 1 − t */
  private readonly early: Rational;
  private readonly late: Rational;
  private readonly beginsAtZero: boolean;

  constructor(low: number, high: number, guard: number, ppm: number, private readonly sampling: Sampling) {
    const band = readBand(low, high);
    const g = readGuard(guard);
    const t = readTolerance(ppm);
    // Zones mirror about 0 with the band, also at IQ sampling, where a band below 0 has the negative of its mirror's zone.
    this.sign = centre(band).n < 0n ? -1n : 1n;
    this.band = folds(band, 'real');
    this.beginsAtZero = sampling === 'real' && this.band.low.n === 0n;
    this.below = subtract(this.band.low, g);
    this.above = add(this.band.high, g);
    this.early = add(ONE, t);
    this.late = subtract(ONE, t);
    if (sampling === 'real' && this.band.low.n < 0n) throw faults.holdsZero(low, high);
    if (sampling === 'real' && !this.beginsAtZero && this.below.n < 0n) throw faults.guardReachesZero(toNumber(this.band.low), guard);
  }

  /** The zone that allows every high rate. */
  get lowestZone(): bigint {
    return this.sampling === 'iq' ? 0n : 1n;
  }

  /** No rate below it could carry the band. */
  get leastRate(): Rational {
    return times(subtract(this.above, this.below), this.sampling === 'iq' ? 1n : 2n);
  }

  /** Half rates from 0 to the edges of a zone. */
  private halves(zone: bigint): { upper: bigint; lower: bigint } {
    return this.sampling === 'iq' ? { upper: 2n * zone + 1n, lower: 2n * zone - 1n } : { upper: zone, lower: zone - 1n };
  }

  /** The highest zone with a usable rate at or above `from`; null where there is no highest. */
  highestZone(from: Rational): bigint | null {
    if (this.beginsAtZero || this.below.n <= 0n) return this.lowestZone;
    // Zone with lower edge at m half rates and upper at m+s: usable when (b+g)·m·(1+t) ≤ (a−g)·(m+s)·(1−t).
    const step = this.sampling === 'iq' ? 2n : 1n;
    const up = multiply(this.above, this.early);
    const down = multiply(this.below, this.late);
    const difference = subtract(up, down);
    const bounds: bigint[] = [];
    if (difference.n > 0n) bounds.push(floor(divide(times(down, step), difference)));
    if (from.n > 0n) bounds.push(floor(divide(times(this.below, 2n), multiply(from, this.early))));
    if (bounds.length === 0) return null;
    const most = bounds.reduce((x, y) => (x < y ? x : y));
    return this.zoneAtOrBelow(most);
  }

  /** The highest zone whose lower edge is at most `halves` half rates. */
  private zoneAtOrBelow(halves: bigint): bigint {
    return this.sampling === 'iq' ? (halves + 1n) / 2n : halves + 1n;
  }

  /** The lowest zone with a usable rate at or below `to`. */
  zoneReaching(to: Rational): bigint {
    // Upper edge at m half rates: 2(b+g)/(m(1−t)) ≤ to.
    const least = ceiling(divide(times(this.above, 2n), multiply(to, this.late)));
    const zone = this.sampling === 'iq' ? least / 2n : least;
    return zone > this.lowestZone ? zone : this.lowestZone;
  }

  /** The usable rates of a zone within from..to, or null where 15 digits hold none. */
  range(zone: bigint, from: Rational, to: Rational | null): RateRange | null {
    const { upper, lower } = this.halves(zone);
    let bottom = divide(times(this.above, 2n), times(this.late, upper));
    let top: Rational | null = null;
    if (lower > 0n && !this.beginsAtZero) top = divide(times(this.below, 2n), times(this.early, lower));
    // The zone around 0 of IQ sampling reaches as far down as up.
    else if (this.sampling === 'iq' && this.below.n < 0n) bottom = greatest(bottom, divide(times(this.below, -2n), this.late));
    bottom = greatest(bottom, from);
    if (to !== null) top = top === null ? to : least(top, to);
    if (bottom.n <= 0n || (top !== null && compare(bottom, top) > 0)) return null;
    const lowest = roundUp(bottom);
    const highest = top === null ? null : roundDown(top);
    if (highest !== null && lowest > highest) return null;
    return {
      zone: Number(this.sampling === 'iq' ? this.sign * zone : zone),
      lowest,
      highest,
      width: highest === null ? null : toNumber(subtract(fromNumber(highest), fromNumber(lowest))),
      inverted: this.sampling === 'real' && isEven(zone),
    };
  }
}
