import { describe, expect, it } from 'vitest';
import { Fault, foldedFrequency, intermodulation, suspectsOf } from '../../src/engine';
import { seeded } from '../support/random';
import { linesIn, powerSpectrum, sample, tone } from '../support/spectrum';

const LENGTH = 1024;

describe('intermodulation', () => {
  it('of 5 and 6 MHz up to order 3 lands on 1, 4, 7, 10, 11, 12, 15, 16, 17 and 18 MHz (Kester, two-tone figure, from memory)', () => {
    expect(intermodulation([5, 6], 100, 3).map(({ frequency }) => frequency).sort((x, y) => x - y)).toEqual([1, 4, 7, 10, 11, 12, 15, 16, 17, 18]);
  });

  it('names its products with what is added first, by order and frequency', () => {
    expect(intermodulation([5, 6], 16, 3)).toEqual([
      { product: 'f2-f1', order: 2, frequency: 1, folded: 1 },
      { product: '2·f1', order: 2, frequency: 10, folded: 6 },
      { product: 'f1+f2', order: 2, frequency: 11, folded: 5 },
      { product: '2·f2', order: 2, frequency: 12, folded: 4 },
      { product: '2·f1-f2', order: 3, frequency: 4, folded: 4 },
      { product: '2·f2-f1', order: 3, frequency: 7, folded: 7 },
      { product: '3·f1', order: 3, frequency: 15, folded: 1 },
      { product: '2·f1+f2', order: 3, frequency: 16, folded: 0 },
      { product: 'f1+2·f2', order: 3, frequency: 17, folded: 1 },
      { product: '3·f2', order: 3, frequency: 18, folded: 2 },
    ]);
  });

  it('is what a cubic makes of two and three tones, sampled: 200 random sets (seed 211)', () => {
    const random = seeded(211);
    for (let i = 0; i < 200; i++) {
      const tones = Array.from({ length: random.whole(2, 3) }, () => random.whole(1, 6 * LENGTH));
      const parts = tones.map((cycles) => tone(cycles, LENGTH, random.unit()));
      const lines = linesIn(sample(LENGTH, (n) => {
        const x = parts.reduce((sum, part) => sum + part(n), 0);
        return x + 0.5 * x ** 2 + 0.25 * x ** 3;
      }), 1e-8);
      const listed = [...tones.map((f) => foldedFrequency(f, LENGTH)), ...intermodulation(tones, LENGTH, 3).map(({ folded }) => folded)];
      const expected = [...new Set(listed)].filter((line) => line > 0).sort((x, y) => x - y);
      expect(lines.filter((line) => !expected.includes(line))).toEqual([]);
      // Where no two fall together, every one is there.
      if (expected.length === listed.length) expect(lines).toEqual(expected);
    }
  });

  it.each([
    ['frequencies must hold at least two tones; got 1.', () => intermodulation([5], 10, 3)],
    ['order must be a whole number, 1 or more; got 0.', () => intermodulation([5, 6], 10, 0)],
    ['The result would have 11 176 rows and at most 10 000 are listed; lower order or give fewer tones.', () => intermodulation([1, 2, 3, 4, 5], 10, 9)],
  ])('says in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});

describe('what could make a spur', () => {
  it('holds the true product of 1000 simulated spurs, first where no lower order and nothing of its own fits (seed 212)', () => {
    const random = seeded(212);
    let first = 0;
    for (let i = 0; i < 1000; i++) {
      const tones = Array.from({ length: random.whole(1, 3) }, () => random.whole(1, 5 * LENGTH));
      const multipliers = tones.map(() => random.whole(-2, 2));
      const order = multipliers.reduce((sum, c) => sum + Math.abs(c), 0);
      if (order === 0) continue;
      const cycles = multipliers.reduce((sum, c, k) => sum + c * tones[k]!, 0);
      // The spur as a converter shows it: sampled, and read off its spectrum.
      const power = powerSpectrum(sample(LENGTH, tone(Math.abs(cycles), LENGTH, 0.1)));
      const observed = power.indexOf(Math.max(...power));
      const names = tones.map((_, k) => `f${k + 1}`);
      const suspects = suspectsOf(observed, LENGTH, tones, 6, 0, 1, names);
      const own = (suspect: { frequency: number; order: number }) => suspect.frequency === Math.abs(cycles) && suspect.order === order;
      expect(suspects.some(own)).toBe(true);
      expect(suspects.every(({ frequency, miss }) => foldedFrequency(frequency, LENGTH) === observed && miss === 0)).toBe(true);
      const better = suspects.filter((suspect) => suspect.order < order).length;
      const equals = suspects.filter((suspect) => suspect.order === order).length;
      if (better === 0 && equals === 1) {
        expect(own(suspects[0]!)).toBe(true);
        first++;
      }
    }
    expect(first).toBeGreaterThan(500);
  });

  it('ranks by order, then by how near it lands, and knows interleaved cores', () => {
    expect(suspectsOf(15, 100, [10, 35.2], 2, 0.3, 4, ['wanted', 'blocker'])).toEqual([
      { product: 'wanted image 3/4', order: 1, frequency: 85, miss: 0 },
      { product: 'blocker image 2/4', order: 1, frequency: 85.2, miss: 0.2 },
    ]);
    expect(suspectsOf(25, 100, [10], 1, 0, 4, ['f1'])).toEqual([{ product: 'offset 1/4', order: 0, frequency: 25, miss: 0 }]);
  });

  it('says what comes nearest where nothing fits', () => {
    expect(() => suspectsOf(6.5, 20, [7], 3, 0.1, 1, ['f1'])).toThrow(
      new Fault('none', 'No product up to order 3 lands on 6.5 within the tolerance; the nearest, f1, misses by 0.5.'),
    );
  });

  it.each([
    ['observed must be from 0 to 10, where this rate puts frequencies; got 11.', () => suspectsOf(11, 20, [7], 3, 0, 1, ['f1'])],
    ['tolerance must be 0 or more; got -1.', () => suspectsOf(1, 20, [7], 3, -1, 1, ['f1'])],
    ['cores must be a whole number from 1 to 64; got 65.', () => suspectsOf(1, 20, [7], 3, 0, 65, ['f1'])],
    ['name must have as many cells as tones, 1; got 2.', () => suspectsOf(1, 20, [7], 3, 0, 1, ['f1', 'f2'])],
  ])('says in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});
