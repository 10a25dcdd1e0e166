// Where one frequency lands after sampling.

import { POWERS_OF_TEN, placesOf, scaled } from './decimal';
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
  const place = locate(frequency, rate);
  if (place === null) return toNumber(foldExactly(fromNumber(frequency), fromNumber(rate), sampling));
  const { rest, period, power } = place;
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
  const place = locate(sampling === 'iq' ? frequency : Math.abs(frequency), rate);
  if (place === null) {
    const zone = Number(zoneExactly(fromNumber(frequency), fromNumber(rate), sampling));
    if (!Number.isFinite(zone)) throw faults.zoneTooHigh(frequency, rate);
    return zone;
  }
  const upper = 2 * place.rest >= place.period ? 1 : 0;
  return sampling === 'iq' ? place.turns + upper : 2 * place.turns + upper + 1;
}

/**
 * Whether the spectrum around a frequency comes out reversed: in the even zones of real sampling, never in IQ sampling.
 * @throws Fault where rate is not above 0
 * @example isInverted(70, 100) // => true
 */
export function isInverted(frequency: number, rate: number, sampling: Sampling = 'real'): boolean {
  const place = locate(Math.abs(frequency), rate);
  if (sampling === 'iq') return false;
  return place === null ? isEven(zoneExactly(fromNumber(frequency), fromNumber(rate), sampling)) : 2 * place.rest >= place.period;
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

/** frequency = (turns·period + rest) / power in whole numbers, 0 ≤ rest < period. */
interface Place {
  turns: number;
  rest: number;
  period: number;
  power: number;
}

const place: Place = { turns: 0, rest: 0, period: 0, power: 1 };
let lastRate = NaN;
let lastPlaces = 0;

/**
 * Splits a frequency into whole periods of the rate and a rest, exactly, on whole numbers below 10^15: the fast path.
 * Null where frequency and rate share no such scale. One result object serves all calls, and the places of the last rate are
 * kept, since a column of a plan asks for the same rate row after row.
 */
function locate(frequency: number, rate: number): Place | null {
  if (!(rate > 0)) throw faults.notPositive('rate', rate);
  if (rate !== lastRate) {
    lastRate = rate;
    lastPlaces = placesOf(rate);
  }
  if (lastPlaces < 0) return null;
  let places = lastPlaces;
  let whole = scaled(frequency, places);
  if (Number.isNaN(whole)) {
    places = placesOf(frequency, places + 1);
    if (places < 0) return null;
    whole = scaled(frequency, places);
  }
  const period = scaled(rate, places);
  if (Number.isNaN(period)) return null;
  // The quotient of doubles may be off by one where it is near a whole number; the rest, exact below 2^53, tells.
  let turns = Math.floor(whole / period);
  let rest = whole - turns * period;
  if (rest < 0) {
    turns--;
    rest += period;
  } else if (rest >= period) {
    turns++;
    rest -= period;
  }
  place.turns = turns;
  place.rest = rest;
  place.period = period;
  place.power = POWERS_OF_TEN[places]!;
  return place;
}
