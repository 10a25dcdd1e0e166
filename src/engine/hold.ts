// What a converter's held output does to its images.

import { readBand, readRate } from './band';
import { checkCount, checkListing } from './counts';
import { faults } from './fault';
import { isEven } from './folding';
import { type Interval, centre, mirror, shift } from './interval';
import { compare, half, times, toNumber } from './rational';

/** Held for the whole period, for its first half, or for its first half and then reversed for the second. */
export type Hold = 'nrz' | 'rz' | 'doublet';

/**
 * Size of a held output at a frequency, in dB of a sample held for its whole period; null where it is nothing at all.
 * It is the Fourier transform of the held pulse: with x = f/rate, sinc(x), sinc(x/2)/2, or sin²(πx/2)/(πx/2).
 * @param frequency 0 or more
 * @param rate above 0
 * @example holdLevel(50, 100, 'nrz').toFixed(2) // => '-3.92'
 */
export function holdLevel(frequency: number, rate: number, hold: Hold): number | null {
  const x = (Math.PI * frequency) / rate;
  // Whole periods in a pulse cancel: exactly, where the quotient is exact.
  const sinc = (y: number, turns: number) => (y === 0 ? 1 : Number.isInteger(turns) ? 0 : Math.sin(y) / y);
  const size = {
    nrz: () => sinc(x, frequency / rate),
    rz: () => sinc(x / 2, frequency / rate / 2) / 2,
    doublet: () => sinc(x / 2, frequency / rate / 2) * Math.sin(x / 2),
  }[hold]();
  return size === 0 ? null : 20 * Math.log10(Math.abs(size));
}

export interface OutputImage {
  zone: number;
  low: number;
  high: number;
  inverted: boolean;
  /** dB at the centre; null where nothing is left. */
  level: number | null;
}

/**
 * The images of a generated band in zones 1 to `zones`, with the level of a held output at the centre of each.
 * @param low from 0
 * @param high to rate/2
 * @param zones a whole number, 1 or more
 * @throws Fault where an argument is out of range or more than 10 000 zones would be listed
 * @example outputImages(10, 20, 100, 3, 'nrz').map(({ low, high }) => [low, high]) // => [[10, 20], [80, 90], [110, 120]]
 */
export function outputImages(low: number, high: number, rate: number, zones: number, hold: Hold): OutputImage[] {
  const band = readBand(low, high);
  const fs = readRate(rate);
  if (low < 0) throw faults.outsideFirstZone('low', low, toNumber(half(fs)));
  if (compare(band.high, half(fs)) > 0) throw faults.outsideFirstZone('high', high, toNumber(half(fs)));
  checkCount('zones', zones);
  checkListing(BigInt(zones), 'lower zones');
  return Array.from({ length: zones }, (_, i) => {
    const zone = BigInt(i + 1);
    const image: Interval = isEven(zone) ? shift(mirror(band), times(fs, zone / 2n)) : shift(band, times(fs, zone / 2n));
    return { zone: i + 1, low: toNumber(image.low), high: toNumber(image.high), inverted: isEven(zone), level: holdLevel(toNumber(centre(image)), rate, hold) };
  });
}
