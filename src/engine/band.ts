// A band at one rate: its image, its zone, its margin.
// Every number enters as the decimal a sheet shows, is computed on exactly, and is rounded once.

import { faults } from './fault';
import { type Sampling, foldExactly, isEven, zoneEdges, zoneExactly } from './folding';
import { type Interval, centre, interval, mirror, width } from './interval';
import {
  ONE, type Rational, ZERO, absolute, add, compare, divide, floor, fromNumber, greatest, half, least, multiply, negate, rational, subtract,
  toNumber,
} from './rational';

const MILLION = rational(1_000_000n);
const HALF = rational(1n, 2n);

/**
 * A band from low to high, or a tone where they are equal.
 * @throws Fault where low is above high
 */
export function readBand(low: number, high: number, lowName = 'low', highName = 'high'): Interval {
  if (low > high) throw faults.edgesReversed(lowName, low, highName, high);
  return interval(fromNumber(low), fromNumber(high));
}

/** @throws Fault where rate is not above 0 */
export function readRate(rate: number, name = 'rate'): Rational {
  if (!(rate > 0)) throw faults.notPositive(name, rate);
  return fromNumber(rate);
}

/** @throws Fault where guard is below 0 */
export function readGuard(guard: number): Rational {
  if (!(guard >= 0)) throw faults.negative('guard', guard);
  return fromNumber(guard);
}

/**
 * A clock tolerance in parts per million, as a fraction of the rate.
 * @throws Fault where ppm is below 0, or a million or more
 */
export function readTolerance(ppm: number): Rational {
  if (!(ppm >= 0)) throw faults.negative('ppm', ppm);
  if (ppm >= 1e6) throw faults.ppmTooLarge(ppm);
  return divide(fromNumber(ppm), MILLION);
}

/** The band as the sampler sees it: at real sampling a band whose centre is below 0 is its mirror. */
export const folds = (band: Interval, sampling: Sampling): Interval => (sampling === 'real' && centre(band).n < 0n ? mirror(band) : band);

/**
 * The lowest folded frequency of a band; see bandImage.
 * @example imageLow(17, 22, 20) // => 0 (the band holds the zone edge 20)
 */
export const imageLow = (low: number, high: number, rate: number, sampling: Sampling = 'real'): number =>
  toNumber(bandImage(readBand(low, high), readRate(rate), sampling).low);

/**
 * The highest folded frequency of a band; see bandImage.
 * @example imageHigh(17, 22, 20) // => 3
 */
export const imageHigh = (low: number, high: number, rate: number, sampling: Sampling = 'real'): number =>
  toNumber(bandImage(readBand(low, high), readRate(rate), sampling).high);

/**
 * The ends of the folded frequencies of a band. A band that holds a zone edge reaches 0 or rate/2 at real sampling, and both
 * ends of the spectrum at IQ sampling. A band that only touches an edge of its zone reaches that end.
 */
export function bandImage(band: Interval, rate: Rational, sampling: Sampling): Interval {
  const low = foldExactly(band.low, rate, sampling);
  const high = foldExactly(band.high, rate, sampling);
  if (sampling === 'iq') {
    const zones = zoneExactly(band.high, rate, 'iq') - zoneExactly(band.low, rate, 'iq');
    if (zones === 0n) return interval(low, high);
    const touchesAbove = zones === 1n && compare(negate(high), half(rate)) === 0;
    return interval(touchesAbove ? low : negate(half(rate)), half(rate));
  }
  // Multiples of the rate fold to 0, odd multiples of half the rate to rate/2.
  const holds = (offset: Rational) =>
    floor(add(divide(band.high, rate), offset)) > floor(add(divide(band.low, rate), offset));
  return interval(holds(ZERO) ? ZERO : least(low, high), holds(HALF) ? half(rate) : greatest(low, high));
}

/**
 * The zone of a band is the zone of its centre.
 * @example bandZone(17.5, 22.5, 35) // => 2
 */
export const bandZone = (low: number, high: number, rate: number, sampling: Sampling = 'real'): number =>
  Number(zoneExactly(centre(readBand(low, high)), readRate(rate), sampling));

/**
 * Whether a band comes out reversed: its zone is an even one of real sampling.
 * @example bandInverted(17.5, 22.5, 35) // => true
 */
export const bandInverted = (low: number, high: number, rate: number, sampling: Sampling = 'real'): boolean =>
  sampling === 'real' && isEven(zoneExactly(centre(readBand(low, high)), readRate(rate), sampling));

/**
 * The smaller distance from a band to the edges of its zone, less the guard, in the worst case over the clock tolerance, in the
 * unit of its inputs; negative where the band crosses an edge, by how much. A real band that begins at exactly 0 has no edge there.
 * @param guard 0 or more: the clear distance wanted
 * @param ppm from 0 to below a million: how far the clock may be off either way
 * @throws Fault where low is above high, rate is not above 0, or guard or ppm is out of range
 * @example bandMargin(17.5, 22.5, 40) // => -2.5 (it crosses the edge 20)
 */
export function bandMargin(low: number, high: number, rate: number, guard = 0, ppm = 0, sampling: Sampling = 'real'): number {
  return toNumber(margin(readBand(low, high), readRate(rate), readGuard(guard), readTolerance(ppm), sampling));
}

/** Whether a band lies within one zone of real sampling. */
export const isWithinZone = (band: Interval, rate: Rational): boolean => margin(band, rate, ZERO, ZERO, 'real').n >= 0n;

function margin(band: Interval, rate: Rational, guard: Rational, tolerance: Rational, sampling: Sampling): Rational {
  const { low, high } = folds(band, sampling);
  const { lower, upper } = zoneEdges(zoneExactly(centre({ low, high }), rate, sampling), rate, sampling);
  const above = subtract(subtract(upper, multiply(absolute(upper), tolerance)), high);
  const below = subtract(low, add(lower, multiply(absolute(lower), tolerance)));
  const hasLowerEdge = !(sampling === 'real' && lower.n === 0n && low.n === 0n);
  return subtract(hasLowerEdge ? least(below, above) : above, guard);
}

/**
 * A band's state in words: `clear`, `tight` (within its zone, but not with guard and tolerance), `crosses E` with the edge that it
 * holds, or `too wide` where no zone of this rate could hold it.
 * @throws Fault as bandMargin does
 * @example bandCheck(17.5, 22.5, 40) // => 'crosses 20'
 */
export function bandCheck(low: number, high: number, rate: number, guard = 0, ppm = 0, sampling: Sampling = 'real'): string {
  const band = readBand(low, high);
  const fs = readRate(rate);
  if (margin(band, fs, readGuard(guard), readTolerance(ppm), sampling).n >= 0n) return 'clear';
  if (margin(band, fs, ZERO, ZERO, sampling).n >= 0n) return 'tight';
  if (compare(width(band), sampling === 'iq' ? fs : half(fs)) > 0) return 'too wide';
  // Not wider than a zone, so it holds one edge: the first above its low end.
  const { low: begin } = folds(band, sampling);
  const edge = begin.n < 0n && sampling === 'real' ? ZERO : zoneEdges(zoneExactly(begin, fs, sampling), fs, sampling).upper;
  return `crosses ${toNumber(edge)}`;
}

/**
 * The distance between the images of two bands, in the unit of its inputs; negative where they overlap, by how far one would have
 * to move. Two images overlap when a multiple of the rate lies between the extreme differences of the bands or, at real sampling,
 * of their sums; so this is the distance of that interval from the nearest multiple.
 * @throws Fault where low is above high in either band, or rate is not above 0
 * @example bandGap(10, 20, 75, 85, 100) // => -5 (75 to 85 lands on 15 to 25)
 */
export function bandGap(low: number, high: number, otherLow: number, otherHigh: number, rate: number, sampling: Sampling = 'real'): number {
  const band = readBand(low, high);
  const other = readBand(otherLow, otherHigh, 'otherLow', 'otherHigh');
  return toNumber(imageGap(band, other, readRate(rate), sampling));
}

/** bandGap on fractions. */
export function imageGap(band: Interval, other: Interval, rate: Rational, sampling: Sampling): Rational {
  const distances = [foldExactly(subtract(centre(band), centre(other)), rate, 'real')];
  if (sampling === 'real') distances.push(foldExactly(add(centre(band), centre(other)), rate, 'real'));
  return subtract(distances.reduce(least), half(add(width(band), width(other))));
}

/** The largest clock tolerance at which a band still has a margin of 0 or more, as a fraction of the rate; null where it already fails. */
export function largestTolerance(band: Interval, rate: Rational, guard: Rational, sampling: Sampling): Rational | null {
  if (margin(band, rate, guard, ZERO, sampling).n < 0n) return null;
  const { low, high } = folds(band, sampling);
  const { lower, upper } = zoneEdges(zoneExactly(centre({ low, high }), rate, sampling), rate, sampling);
  // An edge at 0 doesn't move with the clock.
  const ratios = [
    ...(lower.n === 0n ? [] : [absolute(divide(subtract(subtract(low, guard), lower), lower))]),
    ...(upper.n === 0n ? [] : [absolute(divide(subtract(upper, add(high, guard)), upper))]),
  ];
  return ratios.reduce(least, ONE);
}

/** In parts per million. */
export const inPpm = (tolerance: Rational): Rational => multiply(tolerance, MILLION);
