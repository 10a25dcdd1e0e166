import { describe, expect, it } from 'vitest';
import { Fault, coherentCycles, coherentFrequency, foldedFrequency } from '../../src/engine';
import { seeded } from '../support/random';
import { linesIn, sample, tone } from '../support/spectrum';

const divisor = (a: number, b: number): number => (b === 0 ? a : divisor(b, a % b));

describe('coherent test frequencies (IEEE Std 1241 and 1057: f = rate·J/M, J and M relatively prime, from memory)', () => {
  it('are the nearest by exhaustive search: 5000 random cases (seed 321)', () => {
    const random = seeded(321);
    for (let i = 0; i < 5000; i++) {
      const samples = random.pick([2, 12, 30, 64, 100, 210, 256, 1000]);
      // Whole numbers throughout, so that the search compares exactly.
      const rate = random.whole(1, 200) * samples;
      const frequency = random.whole(0, 3 * rate);
      const step = rate / samples;
      let best = 0;
      for (let cycles = 1; cycles <= frequency / step + samples + 1; cycles++) {
        if (divisor(cycles, samples) === 1 && (best === 0 || Math.abs(cycles * step - frequency) < Math.abs(best * step - frequency))) best = cycles;
      }
      expect([frequency, rate, samples, coherentCycles(frequency, rate, samples)]).toEqual([frequency, rate, samples, best]);
      expect(coherentFrequency(frequency, rate, samples)).toBe(best * step);
    }
  });

  it('sampled, are one line: 200 random cases (seed 322)', () => {
    const random = seeded(322);
    for (let i = 0; i < 200; i++) {
      const rate = random.decimal(4, 2);
      const cycles = coherentCycles(rate * 4 * random.unit(), rate, 512);
      expect(cycles % 2).toBe(1);
      expect(linesIn(sample(512, tone(cycles, 512, 0.1)))).toEqual([foldedFrequency(cycles, 512)]);
    }
  });

  it.each<[string, () => unknown]>([
    ['frequency must be 0 or more; got -1.', () => coherentCycles(-1, 10, 8)],
    ['rate must be above 0; got 0.', () => coherentCycles(1, 0, 8)],
    ['samples must be a whole number from 1 to 4294967296; got 2.5.', () => coherentFrequency(1, 10, 2.5)],
  ])('say in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});
