// What comes after the converter: a digital oscillator that moves a band to 0, and decimation.

import { bandImage, bandInverted, isWithinZone, readBand, readRate } from './band';
import { checkCount } from './counts';
import { faults } from './fault';
import { type Interval, shift } from './interval';
import { type Rational, absolute, add, compare, divide, floor, fromNumber, greatest, half, multiply, negate, rational, subtract, times, toNumber } from './rational';

/** A band after down-conversion and decimation. */
export interface ChainStage {
  low: number;
  high: number;
  rate: number;
  /** Distance of the band from the nearer end of the flat part of the output; negative where it leaves it. */
  margin: number;
  inverted: boolean;
}

/**
 * A band folded by the converter, moved by an oscillator in the folded spectrum and decimated in stages, as it stands after each of them.
 * @param oscillator folded frequency that goes to 0, from 0 to rate/2
 * @param decimations of the stages, each a whole number, 1 or more
 * @param usable flat part of each stage's output, above 0 and at most 1
 * @throws Fault where an argument is out of range, or the band crosses a zone edge of the converter and has no one image
 * @example downConvert(70, 74, 100, 28, [4, 2], 0.8).map(({ margin }) => margin) // => [8, 3]
 */
export function downConvert(low: number, high: number, rate: number, oscillator: number, decimations: readonly number[], usable: number): ChainStage[] {
  const band = readBand(low, high);
  const fs = readRate(rate);
  const lo = fromNumber(oscillator);
  if (lo.n < 0n || compare(lo, half(fs)) > 0) throw faults.outsideSpectrum('oscillator', oscillator, 0, toNumber(half(fs)), false);
  if (!(usable > 0 && usable <= 1)) throw faults.notFraction('usable', usable);
  if (!isWithinZone(band, fs)) throw faults.noOneImage(low, high, rate);
  const moved: Interval = shift(bandImage(band, fs, 'real'), negate(lo));
  const reach = greatest(absolute(moved.low), absolute(moved.high));
  let output: Rational = fs;
  return decimations.map((decimation) => {
    checkCount('decimation', decimation);
    output = divide(output, rational(BigInt(decimation)));
    return {
      low: toNumber(moved.low), high: toNumber(moved.high), rate: toNumber(output),
      margin: toNumber(subtract(half(multiply(output, fromNumber(usable))), reach)), inverted: bandInverted(low, high, rate),
    };
  });
}

/**
 * The word of a numerically controlled oscillator that comes nearest to a frequency; frequencies a whole rate apart have one word.
 * @param bits of the accumulator, a whole number from 1 to 53
 * @throws Fault where rate or bits is out of range
 * @example tuningWord(25, 100, 32) // => 1073741824
 */
export function tuningWord(frequency: number, rate: number, bits: number): number {
  return Number(wordOf(frequency, readRate(rate), bits));
}

/**
 * The frequency that the word gives, from 0 to below the rate.
 * @example tunedFrequency(10, 100, 8) // => 10.15625
 */
export function tunedFrequency(frequency: number, rate: number, bits: number): number {
  const fs = readRate(rate);
  return toNumber(multiply(fs, rational(wordOf(frequency, fs, bits), 2n ** BigInt(bits))));
}

function wordOf(frequency: number, rate: Rational, bits: number): bigint {
  checkCount('bits', bits, 53);
  const words = 2n ** BigInt(bits);
  const nearest = floor(add(divide(times(fromNumber(frequency), words), rate), rational(1n, 2n)));
  return ((nearest % words) + words) % words;
}
