// What a converter's held output does to its images.

import { readBand, readRate } from './band';
import { checkCount, checkListing } from './counts';
import { faults } from './fault';
import { isEven } from './folding';
import { type Interval, centre, mirror, shift } from './interval';
import { type Rational, compare, divide, fromNumber, half, times, toNumber } from './rational';

/** Held for the whole period, for its first half, or for its first half and then reversed for the second. */
export type Hold = 'nrz' | 'rz' | 'doublet';

/**
 * Size of a held output at a frequency, in dB of a sample held for its whole period; null where it is nothing at all.
 * It is the Fourier transform of the held pulse: with x = f/rate, sinc(x), sinc(x/2)/2, or sin²(πx/2)/(πx/2).
 * @param frequency 0 or more
 * @param rate above 0
 * @throws Fault where an argument is out of range
 * @example holdLevel(50, 100, 'nrz').toFixed(2) // => '-3.92'
 */
export function holdLevel(frequency: number, rate: number, hold: Hold): number | null {
  const fs = readRate(rate);
  if (!(frequency >= 0)) throw faults.negative('frequency', frequency);
  return levelAt(divide(fromNumber(frequency), fs), hold);
}

/** @param turns frequency/rate */
function levelAt(turns: Rational, hold: Hold): number | null {
  const angle = Math.PI * toNumber(turns);
  const size = {
    nrz: () => sinc(turns),
    rz: () => sinc(half(turns)) / 2,
    doublet: () => sinc(half(turns)) * Math.sin(angle / 2),
  }[hold]();
  return size === 0 ? null : 20 * Math.log10(Math.abs(size));
}

/** sin(πx)/(πx). Whole periods in a pulse cancel: exactly. */
function sinc(x: Rational): number {
  if (x.n % x.d === 0n) return x.n === 0n ? 1 : 0;
  const angle = Math.PI * toNumber(x);
  return Math.sin(angle) / angle;
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
    return { zone: i + 1, low: toNumber(image.low), high: toNumber(image.high), inverted: isEven(zone), level: levelAt(divide(centre(image), fs), hold) };
  });
}
