// Where one frequency lands after sampling.

import { POWERS_OF_TEN, isWhole, placesOf, scaled } from './decimal';
import { faults } from './fault';
import { type Rational, absolute, add, divide, floor, fromNumber, half, rational, subtract, times, toNumber } from './rational';

/** Real sampling has zone edges at the multiples of rate/2, IQ sampling at its odd multiples. */
export type Sampling = 'real' | 'iq';

/**
 * The frequency at which a tone appears after sampling, in the unit of its inputs, correctly rounded.
 * Real sampling: |f − rate·round(f/rate)|, from 0 to rate/2; a negative frequency is its mirror.
 * IQ sampling: f − rate·floor(f/rate + 1/2), from −rate/2 to below rate/2.
 * @param frequency any finite number
 * @param rate above 0
 * @throws Fault where rate is not above 0
 * @example foldedFrequency(70, 100) // => 30
 */
export function foldedFrequency(frequency: number, rate: number, sampling: Sampling = 'real'): number {
  const places = commonPlaces(frequency, rate);
  if (places < 0) return toNumber(foldExactly(fromNumber(frequency), fromNumber(rate), sampling));
  const power = POWERS_OF_TEN[places]!;
  const period = scaled(rate, power);
  const rest = remainder(scaled(frequency, power), period);
  if (2 * rest < period) return rest / power;
  return (sampling === 'iq' ? rest - period : period - rest) / power;
}

/**
 * The Nyquist zone of a frequency. Real sampling: counted from 1, zone z from (z−1)·rate/2 to z·rate/2. IQ sampling: 0 is the
 * zone around 0. A frequency on an edge counts to the zone above.
 * @throws Fault where rate is not above 0, or where the number is too large for a cell
 * @example frequencyZone(70, 100) // => 2
 */
export function frequencyZone(frequency: number, rate: number, sampling: Sampling = 'real'): number {
  const places = commonPlaces(frequency, rate);
  if (places < 0) {
    const zone = Number(zoneExactly(fromNumber(frequency), fromNumber(rate), sampling));
    if (!Number.isFinite(zone)) throw faults.zoneTooHigh(frequency, rate);
    return zone;
  }
  const power = POWERS_OF_TEN[places]!;
  const period = scaled(rate, power);
  const whole = scaled(sampling === 'iq' ? frequency : Math.abs(frequency), power);
  const rest = remainder(whole, period);
  const turns = (whole - rest) / period;
  const upper = 2 * rest >= period ? 1 : 0;
  return sampling === 'iq' ? turns + upper : 2 * turns + upper + 1;
}

/**
 * Whether the spectrum around a frequency comes out reversed: in the even zones of real sampling, never in IQ sampling.
 * @throws Fault where rate is not above 0
 * @example isInverted(70, 100) // => true
 */
export function isInverted(frequency: number, rate: number, sampling: Sampling = 'real'): boolean {
  const places = commonPlaces(frequency, rate);
  if (sampling === 'iq') return false;
  if (places < 0) return isEven(zoneExactly(fromNumber(frequency), fromNumber(rate), sampling));
  const power = POWERS_OF_TEN[places]!;
  const period = scaled(rate, power);
  return 2 * remainder(scaled(Math.abs(frequency), power), period) >= period;
}

/** Real zones invert where they are even. */
export const isEven = (zone: bigint): boolean => (zone & 1n) === 0n;

/** foldedFrequency on fractions. */
export function foldExactly(frequency: Rational, rate: Rational, sampling: Sampling): Rational {
  const turns = floor(add(divide(frequency, rate), HALF));
  const folded = subtract(frequency, times(rate, turns));
  return sampling === 'iq' ? folded : absolute(folded);
}

/** frequencyZone on fractions. */
export function zoneExactly(frequency: Rational, rate: Rational, sampling: Sampling): bigint {
  return sampling === 'iq' ? floor(add(divide(frequency, rate), HALF)) : floor(divide(times(absolute(frequency), 2n), rate)) + 1n;
}

const HALF = rational(1n, 2n);

/** Edges of a zone: of zone z from lower to upper. */
export function zoneEdges(zone: bigint, rate: Rational, sampling: Sampling): { lower: Rational; upper: Rational } {
  const halves = sampling === 'iq' ? 2n * zone - 1n : zone - 1n;
  const width = sampling === 'iq' ? 2n : 1n;
  return { lower: half(times(rate, halves)), upper: half(times(rate, halves + width)) };
}

let knownRate = NaN;
let knownPlaces = -1;

/**
 * Places at which frequency and rate are both whole numbers below 10^15, or −1 where there are none: then the fast path is closed.
 * The last answer is tried first, since a column of a plan asks for one rate and like frequencies row after row.
 * @throws Fault where rate is not above 0
 */
function commonPlaces(frequency: number, rate: number): number {
  if (rate === knownRate && knownPlaces >= 0 && isWhole(frequency, knownPlaces)) return knownPlaces;
  if (!(rate > 0)) throw faults.notPositive('rate', rate);
  const ratePlaces = placesOf(rate);
  const places = ratePlaces < 0 ? -1 : placesOf(frequency, ratePlaces);
  knownRate = rate;
  knownPlaces = places >= 0 && isWhole(rate, places) ? places : -1;
  return knownPlaces;
}

/** The rest of a whole number after whole periods, exactly; both below 10^15 in size. */
function remainder(whole: number, period: number): number {
  // The quotient of doubles may be off by one where it is near a whole number; the rest, exact below 2^53, tells.
  const rest = whole - Math.floor(whole / period) * period;
  return rest < 0 ? rest + period : rest >= period ? rest - period : rest;
}
