// Where the unwanted relatives of one band land: its harmonics, what interleaved cores add, what a mixer makes.

import { bandImage, imageGap, readBand, readRate } from './band';
import { checkCount, checkListing } from './counts';
import { faults } from './fault';
import { type Sampling, isEven, zoneExactly } from './folding';
import { type Interval, centre, interval, mirror, multiple, shift } from './interval';
import { type Rational, fromNumber, greatest, multiply, negate, rational, times, toNumber } from './rational';

export interface Harmonic {
  order: number;
  low: number;
  high: number;
  foldedLow: number;
  foldedHigh: number;
  zone: number;
  inverted: boolean;
  /** Distance of its image from that of order 1, negative where they overlap; null for order 1 itself. */
  gap: number | null;
}

/**
 * The harmonics of a band from order 1 on, and where each lands.
 * @param highest a whole number, 1 or more
 * @throws Fault where an argument is out of range
 * @example harmonicsOf(7, 7, 20, 5).map(({ foldedLow }) => foldedLow) // => [7, 6, 1, 8, 5]
 */
export function harmonicsOf(low: number, high: number, rate: number, highest: number, sampling: Sampling = 'real'): Harmonic[] {
  const band = readBand(low, high);
  const fs = readRate(rate);
  checkCount('highest', highest);
  checkListing(BigInt(highest), 'lower highest');
  return Array.from({ length: highest }, (_, i) => {
    const harmonic = multiple(band, i + 1);
    const image = bandImage(harmonic, fs, sampling);
    const zone = zoneExactly(centre(harmonic), fs, sampling);
    return {
      order: i + 1, ...ends(harmonic), foldedLow: toNumber(image.low), foldedHigh: toNumber(image.high), zone: Number(zone),
      inverted: sampling === 'real' && isEven(zone), gap: i === 0 ? null : toNumber(imageGap(band, harmonic, fs, sampling)),
    };
  });
}

export interface InterleavingSpur {
  kind: 'image' | 'offset';
  /** q of q·rate/cores: how far an image is displaced, or where an offset tone stands. */
  multiple: number;
  foldedLow: number;
  foldedHigh: number;
  /** Distance from the band's own image, negative where they overlap. */
  gap: number;
}

/**
 * What M interleaved cores add to a band at real sampling: its images displaced by q·rate/M, from unequal gain and timing, and tones at
 * q·rate/M, from unequal offsets.
 * @param cores M, a whole number from 1 to 64
 * @throws Fault where an argument is out of range
 * @source W. Black, D. Hodges, Time interleaved converter arrays, IEEE J. Solid-State Circuits 15(6), 1980
 * @example interleavingSpurs(10, 10, 100, 4).map(({ foldedLow }) => foldedLow) // => [35, 40, 15, 25, 50] (three images, two offset tones)
 */
export function interleavingSpurs(low: number, high: number, rate: number, cores: number): InterleavingSpur[] {
  const band = readBand(low, high);
  const fs = readRate(rate);
  checkCount('cores', cores, 64);
  const at = (q: number) => multiply(fs, rational(BigInt(q), BigInt(cores)));
  const spur = (kind: InterleavingSpur['kind'], q: number, from: Interval): InterleavingSpur => {
    const image = bandImage(from, fs, 'real');
    return { kind, multiple: q, foldedLow: toNumber(image.low), foldedHigh: toNumber(image.high), gap: toNumber(imageGap(band, from, fs, 'real')) };
  };
  const images = Array.from({ length: cores - 1 }, (_, i) => spur('image', i + 1, shift(band, at(i + 1))));
  // q and M − q fold onto one tone.
  const offsets = Array.from({ length: Math.floor(cores / 2) }, (_, i) => spur('offset', i + 1, interval(at(i + 1), at(i + 1))));
  return [...images, ...offsets];
}

export interface MixingProduct {
  m: number;
  n: number;
  low: number;
  high: number;
  foldedLow: number;
  foldedHigh: number;
}

/**
 * The products m·band + n·oscillator of a mixer for m from 0 to `mostM` and n from −mostN to mostN, by |m| + |n|, and where they land at
 * real sampling. A product below 0 is its mirror; the band itself is left out.
 * @throws Fault where an argument is out of range or more than 10 000 products would be listed
 * @example mixingProducts(10, 12, 100, 61.44, 1, 1).map(({ low }) => low) // => [100, 88, 110]
 */
export function mixingProducts(low: number, high: number, oscillator: number, rate: number, mostM: number, mostN: number): MixingProduct[] {
  const band = readBand(low, high);
  if (!(oscillator > 0)) throw faults.notPositive('oscillator', oscillator);
  const lo = fromNumber(oscillator);
  const fs = readRate(rate);
  checkCount('m', mostM);
  checkCount('n', mostN);
  checkListing(BigInt(mostM) * (2n * BigInt(mostN) + 1n) + BigInt(mostN), 'lower m or n');
  const products: MixingProduct[] = [];
  for (let m = 0; m <= mostM; m++) {
    for (let n = m === 0 ? 1 : -mostN; n <= mostN; n++) {
      if (m === 1 && n === 0) continue;
      const product = shift(multiple(band, m), times(lo, BigInt(n)));
      const image = bandImage(product, fs, 'real');
      products.push({ m, n, ...ends(product), foldedLow: toNumber(image.low), foldedHigh: toNumber(image.high) });
    }
  }
  return products.sort((x, y) => x.m + Math.abs(x.n) - y.m - Math.abs(y.n) || x.m - y.m || x.n - y.n);
}

/** The ends of a band as frequencies: what lies below 0 is its mirror. */
function ends(band: Interval): { low: number; high: number } {
  if (band.low.n >= 0n) return { low: toNumber(band.low), high: toNumber(band.high) };
  const { low, high } = mirror(band);
  const top = (x: Rational, y: Rational) => toNumber(greatest(x, y));
  return band.high.n <= 0n ? { low: toNumber(low), high: toNumber(high) } : { low: 0, high: top(band.high, negate(band.low)) };
}

