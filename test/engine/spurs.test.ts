import { describe, expect, it } from 'vitest';
import { Fault, foldedFrequency, harmonicsOf, imageHigh, imageLow, interleavingSpurs, mixingProducts } from '../../src/engine';
import { seeded } from '../support/random';
import { linesIn, sample, tone } from '../support/spectrum';

const LENGTH = 1024;

describe('harmonics', () => {
  it('of 7 MHz at 20 MS/s, orders 2 to 9, land on 6, 1, 8, 5, 2, 9, 4 and 3 MHz (Kester (ed.), Data Conversion Handbook, from memory)', () => {
    expect(harmonicsOf(7, 7, 20, 9).slice(1).map(({ foldedLow }) => foldedLow)).toEqual([6, 1, 8, 5, 2, 9, 4, 3]);
  });

  it('are the lines in the spectrum of a distorted tone, sampled: 200 random tones (seed 201)', () => {
    const random = seeded(201);
    for (let i = 0; i < 200; i++) {
      const cycles = random.whole(1, 20 * LENGTH);
      const input = tone(cycles, LENGTH, random.unit());
      // Orders 1 to 5, each with a part of its own.
      const distorted = (x: number) => x + 0.3 * x ** 2 + 0.2 * x ** 3 + 0.15 * x ** 4 + 0.1 * x ** 5;
      const lines = linesIn(sample(LENGTH, (n) => distorted(input(n))), 1e-8);
      const expected = new Set(harmonicsOf(cycles, cycles, LENGTH, 5).map(({ foldedLow }) => foldedLow).filter((line) => line > 0));
      // Two orders on one line may cancel, none may appear elsewhere.
      expect(lines.filter((line) => !expected.has(line))).toEqual([]);
      if (expected.size === 5) expect(lines).toEqual([...expected].sort((x, y) => x - y));
    }
  });

  it('of a band are bands, with zone, inversion and the gap to the fundamental', () => {
    expect(harmonicsOf(10, 12, 50, 3)).toEqual([
      { order: 1, low: 10, high: 12, foldedLow: 10, foldedHigh: 12, zone: 1, inverted: false, gap: null },
      { order: 2, low: 20, high: 24, foldedLow: 20, foldedHigh: 24, zone: 1, inverted: false, gap: 8 },
      { order: 3, low: 30, high: 36, foldedLow: 14, foldedHigh: 20, zone: 2, inverted: true, gap: 2 },
    ]);
    expect(harmonicsOf(10, 12, 30, 2, 'iq')[1]).toEqual({ order: 2, low: 20, high: 24, foldedLow: -10, foldedHigh: -6, zone: 1, inverted: false, gap: 8 });
  });

  it.each([
    ['highest must be a whole number, 1 or more; got 2.5.', () => harmonicsOf(1, 2, 10, 2.5)],
    ['The result would have 20 000 rows and at most 10 000 are listed; lower highest.', () => harmonicsOf(1, 2, 10, 20_000)],
  ])('say in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});

describe('interleaved cores', () => {
  it.each([2, 3, 4, 8])('of unequal gain and offset, %d of them, put images and tones where they are listed (seed 202)', (cores) => {
    const random = seeded(202 + cores);
    // A whole number of turns through the cores in the record, so that all is on lines.
    const length = cores === 3 ? 192 : LENGTH;
    for (let i = 0; i < 40; i++) {
      const cycles = random.whole(1, 5 * length);
      const gains = Array.from({ length: cores }, () => 1 + random.unit());
      const offsets = Array.from({ length: cores }, () => random.unit());
      const input = tone(cycles, length, random.unit());
      const lines = linesIn(sample(length, (n) => gains[n % cores]! * input(n) + offsets[n % cores]!), 1e-10);
      const listed = interleavingSpurs(cycles, cycles, length, cores).map(({ foldedLow }) => foldedLow);
      const expected = [...new Set([foldedFrequency(cycles, length), ...listed])].filter((line) => line > 0).sort((x, y) => x - y);
      expect(lines.filter((line) => !expected.includes(line))).toEqual([]);
      if (expected.length === listed.length + 1) expect(lines).toEqual(expected);
    }
    expect(interleavingSpurs(1, 1, 30, cores)).toHaveLength(cores - 1 + Math.floor(cores / 2));
  });

  it('put images at k·rate/M ± f and tones at k·rate/M (Black & Hodges 1980; Vogel 2005)', () => {
    const spurs = interleavingSpurs(10, 10, 120, 3);
    expect(spurs).toEqual([
      { kind: 'image', multiple: 1, foldedLow: 50, foldedHigh: 50, gap: 40 },
      { kind: 'image', multiple: 2, foldedLow: 30, foldedHigh: 30, gap: 20 },
      { kind: 'offset', multiple: 1, foldedLow: 40, foldedHigh: 40, gap: 30 },
    ]);
    expect(spurs.filter(({ kind }) => kind === 'image').map(({ foldedLow }) => foldedLow)).toEqual([40 + 10, 40 - 10]);
  });
});

describe('mixing products', () => {
  it('of a band are its multiples moved by multiples of the oscillator, by the sum of both', () => {
    expect(mixingProducts(10, 12, 100, 250, 1, 2).map(({ m, n, low, high, foldedLow, foldedHigh }) => [m, n, low, high, foldedLow, foldedHigh])).toEqual([
      [0, 1, 100, 100, 100, 100],
      [0, 2, 200, 200, 50, 50],
      [1, -1, 88, 90, 88, 90],
      [1, 1, 110, 112, 110, 112],
      [1, -2, 188, 190, 60, 62],
      [1, 2, 210, 212, 38, 40],
    ]);
  });

  it('that hold 0 begin there', () => {
    expect(mixingProducts(95, 102, 100, 250, 1, 1)[1]).toEqual({ m: 1, n: -1, low: 0, high: 5, foldedLow: 0, foldedHigh: 5 });
  });

  it('are what a multiplier makes, sampled: 100 random pairs (seed 203)', () => {
    const random = seeded(203);
    for (let i = 0; i < 100; i++) {
      const [band, oscillator] = [random.whole(1, 3 * LENGTH), random.whole(1, 3 * LENGTH)];
      const [x, y] = [tone(band, LENGTH, random.unit()), tone(oscillator, LENGTH, random.unit())];
      const lines = linesIn(sample(LENGTH, (n) => x(n) * y(n)), 1e-8);
      const listed = mixingProducts(band, band, oscillator, LENGTH, 1, 1).filter(({ m, n }) => m === 1 && n !== 0).map(({ foldedLow }) => foldedLow);
      expect(lines.filter((line) => !listed.includes(line))).toEqual([]);
      for (const { low, high, foldedLow, foldedHigh } of mixingProducts(band, band + 2, oscillator, LENGTH, 2, 2)) {
        expect([foldedLow, foldedHigh]).toEqual([imageLow(low, high, LENGTH), imageHigh(low, high, LENGTH)]);
      }
    }
  });
});
