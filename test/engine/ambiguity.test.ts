import { describe, expect, it } from 'vitest';
import { Fault, type Sampling, foldedFrequency, frequencyZone, imagesOf, isInverted, resolveFrequency } from '../../src/engine';
import { seeded } from '../support/random';

describe('the frequencies behind a folded one', () => {
  it('land there, each one, and no other of a fine grid does: 500 random cases (seed 51)', () => {
    const random = seeded(51);
    for (let i = 0; i < 500; i++) {
      const sampling: Sampling = random.pick(['real', 'iq']);
      const rate = random.whole(1, 40);
      const folded = foldedFrequency(random.whole(0, 400) / 4, rate, sampling);
      const from = random.whole(-40, 40) / 4;
      const to = from + random.whole(160, 400) / 4;
      const grid = Array.from({ length: (to - from) * 4 + 1 }, (_, k) => from + k / 4);
      const wanted = grid.filter((f) => foldedFrequency(f, rate, sampling) === folded)
        .map((f) => ({ frequency: f, zone: frequencyZone(f, rate, sampling), inverted: isInverted(f, rate, sampling) }));
      expect(imagesOf(folded, rate, from, to, sampling)).toEqual(wanted);
    }
  });

  it.each<['input' | 'none', string, () => unknown]>([
    ['input', 'folded must be from 0 to 50, where this rate puts frequencies; got 51.', () => imagesOf(51, 100, 0, 1000)],
    ['input', 'folded must be from -50 to below 100, where this rate puts frequencies; got 100.', () => imagesOf(100, 100, 0, 1000, 'iq')],
    ['input', 'rate must be above 0; got 0.', () => imagesOf(5, 0, 0, 1000)],
    ['input', 'from must not be above to; got 5 and 4.', () => imagesOf(5, 100, 5, 4)],
    ['input', 'The result would have 2 000 000 000 rows and at most 10 000 are listed; bring from and to closer together.', () => imagesOf(0.25, 1, 0, 1e9)],
    ['none', 'No frequency from 31 to 32 lands on 30.', () => imagesOf(30, 100, 31, 32)],
  ])('say in words (%s): %s', (kind, sentence, ask) => {
    expect(ask).toThrow(new Fault(kind, sentence));
  });
});

describe('the frequencies that several rates agree on', () => {
  it('hold the true one, and agree within the tolerance at both ends: 500 random cases (seed 52)', () => {
    const random = seeded(52);
    for (let i = 0; i < 500; i++) {
      const sampling: Sampling = random.pick(['real', 'iq']);
      const truth = random.decimal(random.whole(2, 6), 2);
      const rates = Array.from({ length: random.whole(1, 4) }, () => random.decimal(random.whole(2, 5), 1));
      const tolerance = random.pick([0, 0.01, 0.3]);
      const observed = rates.map((rate) => foldedFrequency(truth, rate, sampling));
      const ranges = resolveFrequency(observed, rates, 0, 1000, tolerance, sampling);
      expect(ranges.some(({ lowest, highest }) => lowest <= truth && truth <= highest)).toBe(true);
      for (const { lowest, highest } of ranges) {
        for (const frequency of [lowest, highest]) {
          for (const [k, rate] of rates.entries()) {
            const miss = Math.abs(foldedFrequency(frequency, rate, sampling) - observed[k]!);
            // At IQ sampling the two ends of the spectrum are one place.
            expect(Math.min(miss, sampling === 'iq' ? rate - miss : miss)).toBeLessThanOrEqual(tolerance + 1e-12);
          }
        }
      }
    }
  });

  it('miss none of a grid (seed 53)', () => {
    const random = seeded(53);
    for (let i = 0; i < 100; i++) {
      const sampling: Sampling = random.pick(['real', 'iq']);
      const rates = [random.whole(5, 40), random.whole(5, 40)];
      const truth = random.whole(0, 2000) / 4;
      const observed = rates.map((rate) => foldedFrequency(truth, rate, sampling));
      const wanted = Array.from({ length: 2001 }, (_, k) => k / 4).filter((f) => rates.every((rate, k) => foldedFrequency(f, rate, sampling) === observed[k]));
      expect(resolveFrequency(observed, rates, 0, 500, 0, sampling).map(({ lowest }) => lowest)).toEqual(wanted);
    }
  });

  it.each<['input' | 'none', string, () => unknown]>([
    ['input', 'rates must have as many cells as observed, 2; got 1.', () => resolveFrequency([1, 2], [10], 0, 100)],
    ['input', 'tolerance must be 0 or more; got -1.', () => resolveFrequency([1], [10], 0, 100, -1)],
    ['input', 'observed must be from 0 to 5, where this rate puts frequencies; got 6.', () => resolveFrequency([6], [10], 0, 100, 0.5)],
    ['input', 'from and to leave 200 000 000 candidates to compare and at most 100 000 are tried; bring them closer together.', () => resolveFrequency([1], [10], 0, 1e9)],
    ['none', 'No frequency from 0 to 30 fits every observation.', () => resolveFrequency([14, 10], [56, 40], 0, 30)],
  ])('say in words (%s): %s', (kind, sentence, ask) => {
    expect(ask).toThrow(new Fault(kind, sentence));
  });
});
