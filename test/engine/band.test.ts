import Fraction from 'fraction.js';
import { describe, expect, it } from 'vitest';
import { Fault, type Sampling, bandCheck, bandGap, bandInverted, bandMargin, bandZone, imageHigh, imageLow } from '../../src/engine';
import { seeded } from '../support/random';

describe('a band at one rate', () => {
  it.each<[number, number, number, Sampling, number, number, number, number, string]>([
    // low, high, rate, sampling, folded low, folded high, zone, margin, check
    [10, 20, 100, 'real', 10, 20, 1, 10, 'clear'],
    [60, 90, 100, 'real', 10, 40, 2, 10, 'clear'],
    [0, 20, 100, 'real', 0, 20, 1, 30, 'clear'],
    [0, 50, 100, 'real', 0, 50, 1, 0, 'clear'],
    [50, 100, 100, 'real', 0, 50, 2, 0, 'clear'],
    [50, 50, 100, 'real', 50, 50, 2, 0, 'clear'],
    [40, 60, 100, 'real', 40, 50, 2, -10, 'crosses 50'],
    [45, 52, 100, 'real', 45, 50, 1, -2, 'crosses 50'],
    [95, 110, 100, 'real', 0, 10, 3, -5, 'crosses 100'],
    [40, 110, 100, 'real', 0, 50, 2, -10, 'too wide'],
    [0, 51, 100, 'real', 0, 50, 1, -1, 'too wide'],
    [-20, -10, 100, 'real', 10, 20, 1, 10, 'clear'],
    [-5, 10, 100, 'real', 0, 10, 1, -5, 'crosses 0'],
    [-20, 0, 100, 'real', 0, 20, 1, 30, 'clear'],
    [10, 20, 100, 'iq', 10, 20, 0, 30, 'clear'],
    [-10, 20, 100, 'iq', -10, 20, 0, 30, 'clear'],
    [60, 90, 100, 'iq', -40, -10, 1, 10, 'clear'],
    [40, 60, 100, 'iq', -50, 50, 1, -10, 'crosses 50'],
    [40, 50, 100, 'iq', 40, 50, 0, 0, 'clear'],
    [50, 60, 100, 'iq', -50, -40, 1, 0, 'clear'],
    [-60, -45, 100, 'iq', -50, 50, -1, -5, 'crosses -50'],
    [-160, -155, 100, 'iq', 40, 45, -2, 5, 'clear'],
    [0, 101, 100, 'iq', -50, 50, 1, -50, 'too wide'],
    [50, 150, 100, 'iq', -50, 50, 1, 0, 'clear'],
  ])('from %d to %d at %d, %s', (low, high, rate, sampling, foldedLow, foldedHigh, zone, margin, check) => {
    expect([
      imageLow(low, high, rate, sampling), imageHigh(low, high, rate, sampling), bandZone(low, high, rate, sampling),
      bandMargin(low, high, rate, 0, 0, sampling), bandCheck(low, high, rate, 0, 0, sampling), bandInverted(low, high, rate, sampling),
    ]).toEqual([foldedLow, foldedHigh, zone, margin, check, sampling === 'real' && zone % 2 === 0]);
  });

  it.each([
    // guard, ppm, margin, check: 60 to 90 at 100, in zone 2 from 50 to 100
    [0, 0, 10, 'clear'],
    [10, 0, 0, 'clear'],
    [10.5, 0, -0.5, 'tight'],
    [0, 100_000, 0, 'clear'], // the upper edge may sink to 90
    [0, 100_001, -0.0001, 'tight'],
    [5, 50_000, 0, 'clear'],
    [5, 60_000, -1, 'tight'],
  ])('with a guard of %d and %d ppm keeps a margin of %d', (guard, ppm, margin, check) => {
    expect([bandMargin(60, 90, 100, guard, ppm), bandCheck(60, 90, 100, guard, ppm)]).toEqual([margin, check]);
  });

  it('on the decimals that the sheet shows: 0.3 lies on an edge of 0.2, and 61.44 on one of 122.88', () => {
    expect(bandMargin(0.1 + 0.2, 0.4, 0.2)).toBe(0);
    expect(bandCheck(61.44, 70, 122.88)).toBe('clear');
    expect(bandCheck(61.43, 70, 122.88)).toBe('crosses 61.44');
  });

  it.each<[string, () => unknown]>([
    ['low must not be above high; got 5 and 3.', () => imageLow(5, 3, 10)],
    ['rate must be above 0; got -5.', () => bandZone(3, 5, -5)],
    ['rate must be above 0; got NaN.', () => bandZone(3, 5, NaN)],
    ['guard must be 0 or more; got -1.', () => bandMargin(3, 5, 10, -1)],
    ['ppm must be 0 or more; got -1.', () => bandCheck(3, 5, 10, 0, -1)],
    ['ppm must be below 1000000; got 2000000.', () => bandMargin(3, 5, 10, 0, 2e6)],
    ['otherLow must not be above otherHigh; got 9 and 8.', () => bandGap(3, 5, 9, 8, 10)],
  ])('says in words: %s', (sentence, ask) => {
    expect(ask).toThrow(new Fault('input', sentence));
  });
});

describe('the gap between two images', () => {
  it.each<[string, number[], Sampling, number]>([
    ['apart', [10, 20, 30, 40, 100], 'real', 10],
    ['touching', [10, 20, 70, 80, 100], 'real', 0],
    ['overlapping', [10, 20, 82, 95, 100], 'real', -8],
    ['a tone inside a band', [10, 20, 88, 88, 100], 'real', -2],
    ['two tones on one frequency', [12, 12, 88, 88, 100], 'real', 0],
    ['a band inside a band', [10, 40, 80, 85, 100], 'real', -10],
    ['mirrored across 0 at IQ sampling', [10, 20, -20, -10, 100], 'iq', 20],
    ['around the end of the spectrum at IQ sampling', [40, 45, -45, -40, 100], 'iq', 10],
    ['around the end, overlapping', [40, 48, 51, 60, 100], 'iq', 3],
  ])('%s', (_, [low, high, otherLow, otherHigh, rate], sampling, gap) => {
    expect(bandGap(low!, high!, otherLow!, otherHigh!, rate!, sampling)).toBe(gap);
  });

  it('is the distance of the images where both bands fit their zones: 3000 random pairs (seed 91)', () => {
    const random = seeded(91);
    let both = 0;
    for (let i = 0; i < 3000; i++) {
      const rate = random.decimal(3, 2);
      const band = () => {
        const low = random.whole(0, 8000) / 10;
        return [low, low + random.whole(0, 200) / 10] as const;
      };
      const [a, b] = [band(), band()];
      if (bandMargin(...a, rate) < 0 || bandMargin(...b, rate) < 0) continue;
      both++;
      const exact = (x: number) => new Fraction(String(x));
      const [l1, h1, l2, h2] = [imageLow(...a, rate), imageHigh(...a, rate), imageLow(...b, rate), imageHigh(...b, rate)].map(exact) as [Fraction, Fraction, Fraction, Fraction];
      const [over, under] = [l1.sub(h2), l2.sub(h1)];
      expect([a, b, rate, bandGap(...a, ...b, rate)]).toEqual([a, b, rate, (over.compare(under) > 0 ? over : under).valueOf()]);
    }
    expect(both).toBeGreaterThan(1000);
  });

  it('is below 0 exactly where a multiple of the rate lies inside the difference or the sum of the bands: 3000 random pairs (seed 92)', () => {
    const random = seeded(92);
    for (let i = 0; i < 3000; i++) {
      const rate = random.whole(10, 200);
      const [a1, a2] = [random.whole(0, 900), random.whole(0, 900)];
      const [b1, b2] = [a1 + random.whole(0, 60), a2 + random.whole(0, 60)];
      const inside = (low: number, high: number) => Array.from({ length: 400 }, (_, k) => (k - 200) * rate).some((m) => low < m && m < high);
      expect(bandGap(a1, b1, a2, b2, rate) < 0).toBe(inside(a1 - b2, b1 - a2) || inside(a1 + a2, b1 + b2));
      expect(bandGap(a1, b1, a2, b2, rate, 'iq') < 0).toBe(inside(a1 - b2, b1 - a2));
    }
  });
});
