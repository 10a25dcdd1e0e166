import { describe, expect, it } from 'vitest';
import { Fault, effectiveBits, foldedNoise, jitterLimit, jitterSnr, quantizationSnr, sumSnr } from '../../src/engine';
import { type Random, seeded } from '../support/random';

/** A normal deviate (Box & Muller). */
const normal = (random: Random): number => Math.sqrt(-2 * Math.log(1 - random.unit())) * Math.cos(2 * Math.PI * random.unit());

/** Mean of a sample and the standard error of that mean. */
function meanOf(values: readonly number[]): { mean: number; error: number } {
  const mean = values.reduce((sum, x) => sum + x, 0) / values.length;
  const variance = values.reduce((sum, x) => sum + (x - mean) ** 2, 0) / (values.length - 1);
  return { mean, error: Math.sqrt(variance / values.length) };
}

describe('the noise budget in print', () => {
  it.each([[8, 49.92], [10, 61.96], [14, 86.04], [16, 98.08]])('%d bits: %d dB, rounded up to 0.011 dB lower than the exact form (Bennett 1948, from memory)', (bits, dB) => {
    expect(quantizationSnr(bits, null, null)).toBeGreaterThanOrEqual(dB);
    expect(quantizationSnr(bits, null, null)).toBeLessThan(dB + 0.0115);
  });

  it('12 bits give 74.00 dB, rounded; 68 dB are 11 effective bits, rounded (Harrison, Introduction to Radar Using Python and MATLAB, 2019)', () => {
    expect(quantizationSnr(12, null, null)).toBeCloseTo(74, 1);
    expect(Math.round(effectiveBits(68))).toBe(11);
  });

  it('1 ps rms at 100 MHz: 64 dB (Azeredo-Leme, IEEE CAS Magazine 2011)', () => {
    expect(jitterSnr(100, 1e-6).toFixed(2)).toBe('64.04');
    expect(jitterSnr(0.1, 1e-3)).toBeCloseTo(jitterSnr(100e6, 1e-12), 10);
  });

  it('two zones folded: 3 dB (Lyons, Eq. 2-12)', () => expect(foldedNoise(2, 0)).toBeCloseTo(3.01, 2));
});

describe('the noise budget by simulation', () => {
  it('jitter: a sine sampled at jittered instants has the noise that is told, within three standard errors (seed 311)', () => {
    const random = seeded(311);
    for (const [frequency, jitter] of [[100, 1e-5], [37.3, 5e-5], [940, 1e-6]] as const) {
      // Squared error of each sample against the sine itself; a small phase keeps the sine linear within the jitter.
      const errors = Array.from({ length: 60_000 }, (_, n) => {
        const t = n / 122.88;
        return (Math.sin(2 * Math.PI * frequency * (t + jitter * normal(random))) - Math.sin(2 * Math.PI * frequency * t)) ** 2;
      });
      const { mean, error } = meanOf(errors);
      const told = 0.5 * 10 ** (-jitterSnr(frequency, jitter) / 10);
      expect(Math.abs(mean - told)).toBeLessThan(3 * error + 0.001 * told);
    }
  });

  it('folding: white noise over z zones, weaker in all but one, sampled at one zone\'s rate, gains what is told (seed 312)', () => {
    const random = seeded(312);
    for (const [zones, rejection] of [[2, 0], [4, 10], [8, 3]] as const) {
      const LENGTH = 256;
      const gains = Array.from({ length: 80 }, () => {
        // Lines of a spectrum that reaches over all zones; the converter takes every z-th sample of what they make.
        const lines = Array.from({ length: (LENGTH / 2) * zones }, (_, line) => {
          const size = line < LENGTH / 2 ? 1 : 10 ** (-rejection / 20);
          return { a: size * normal(random), b: size * normal(random) };
        });
        const power = (part: typeof lines) => {
          const samples = Array.from({ length: LENGTH }, (_, n) => part.reduce((sum, { a, b }, line) => {
            // Sample n of the converter is sample n·z of the wide record, of LENGTH·z samples.
            const phase = (2 * Math.PI * ((line * n) % LENGTH)) / LENGTH;
            return sum + a * Math.cos(phase) + b * Math.sin(phase);
          }, 0));
          return samples.reduce((sum, x) => sum + x * x, 0);
        };
        return power(lines) / power(lines.slice(0, LENGTH / 2));
      });
      const { mean, error } = meanOf(gains);
      expect(Math.abs(mean - 10 ** (foldedNoise(zones, rejection) / 10))).toBeLessThan(3 * error + 0.01 * mean);
    }
  });

  it('quantisation: rounding a full-scale sine to a few bits leaves the noise that is told, within 0.15 dB', () => {
    for (const bits of [6, 8, 10]) {
      const levels = 2 ** (bits - 1);
      const errors = Array.from({ length: 50_000 }, (_, n) => {
        const x = Math.sin(2 * Math.PI * n * 0.1234567);
        return (Math.round(x * levels) / levels - x) ** 2;
      });
      expect(10 * Math.log10(0.5 / meanOf(errors).mean)).toBeCloseTo(quantizationSnr(bits, null, null), 0);
    }
  });
});

describe('noise functions', () => {
  it('undo each other', () => {
    for (const snr of [20, 64.04, 98]) expect(jitterSnr(123.4, jitterLimit(123.4, snr))).toBeCloseTo(snr, 10);
    for (const bits of [1, 8, 11.3, 24]) expect(effectiveBits(quantizationSnr(bits, null, null))).toBeCloseTo(bits, 12);
  });

  it('add powers, and processing gain', () => {
    expect(sumSnr([60])).toBe(60);
    expect(sumSnr([60, 60, 60, 60])).toBeCloseTo(60 - 6.0206, 4);
    expect(sumSnr([20, 4000])).toBe(20);
    expect(quantizationSnr(12, 100, 0.5) - quantizationSnr(12, null, null)).toBeCloseTo(20, 10);
    expect(foldedNoise(1, 0)).toBe(0);
  });

  it.each<[string, () => unknown]>([
    ['frequency must be above 0; got 0.', () => jitterSnr(0, 1)],
    ['jitter must be above 0; got -1.', () => jitterSnr(1, -1)],
    ['bits must be 1 or more; got 0.', () => quantizationSnr(0, null, null)],
    ['rate must be given with bandwidth; got a blank cell.', () => quantizationSnr(8, null, 5)],
    ['bandwidth must be at most half the rate, 50; got 60.', () => quantizationSnr(8, 100, 60)],
    ['zones must be a whole number, 1 or more; got 0.', () => foldedNoise(0, 10)],
  ])('say in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});
