// The definition of sampling itself as a witness: take samples of a tone and look where their spectrum has its peak.

import FFT from 'fft.js';
import { describe, expect, it } from 'vitest';
import { type Sampling, foldedFrequency } from '../../src/engine';
import { seeded } from '../support/random';

const LENGTH = 2048;
const fft = new FFT(LENGTH);

/** The frequency of the highest line in the spectrum of a sampled tone, in lines; from LENGTH/2 on they are the negative ones. */
function peak(sample: (n: number) => { re: number; im: number }): number {
  const input = fft.createComplexArray();
  const output = fft.createComplexArray();
  for (let n = 0; n < LENGTH; n++) {
    const { re, im } = sample(n);
    input[2 * n] = re;
    input[2 * n + 1] = im;
  }
  fft.transform(output, input);
  const power = Array.from({ length: LENGTH }, (_, line) => output[2 * line]! ** 2 + output[2 * line + 1]! ** 2);
  return power.indexOf(Math.max(...power));
}

describe('a folded tone is the peak of the spectrum of its samples', () => {
  it.each<[Sampling]>([['real'], ['iq']])('at %s sampling: 400 random tones on lines of the transform (seed 61)', (sampling) => {
    const random = seeded(61);
    for (let i = 0; i < 400; i++) {
      // A whole number of cycles in the record, some zones up, so that the peak is one line; the rate makes a line 1/4 wide.
      const rate = LENGTH / 4;
      const cycles = random.whole(1, 60 * LENGTH);
      const frequency = cycles / 4;
      const phase = random.unit();
      const turns = (n: number) => ((cycles * n) % LENGTH) / LENGTH + phase;
      const line = peak((n) => ({ re: Math.cos(2 * Math.PI * turns(n)), im: sampling === 'iq' ? Math.sin(2 * Math.PI * turns(n)) : 0 }));
      const folded = foldedFrequency(frequency, rate, sampling);
      const signed = (line < LENGTH / 2 ? line : line - LENGTH) / 4;
      expect([frequency, sampling === 'iq' ? signed : Math.abs(signed)]).toEqual([frequency, folded]);
    }
  });

  it('within half a line for tones between lines: 400 random tones (seed 62)', () => {
    const random = seeded(62);
    for (let i = 0; i < 400; i++) {
      const rate = random.decimal(4, 1);
      const frequency = Number((rate * (0.02 + 20 * random.unit())).toPrecision(7));
      const folded = foldedFrequency(frequency, rate);
      // Near 0 and half the rate the mirror of a tone leaks into its own line.
      if (folded < 0.02 * rate || folded > 0.48 * rate) continue;
      const line = peak((n) => ({ re: Math.cos(2 * Math.PI * ((frequency * n) / rate)) * (1 - Math.cos((2 * Math.PI * n) / LENGTH)), im: 0 }));
      const seen = (Math.min(line, LENGTH - line) * rate) / LENGTH;
      expect(Math.abs(seen - folded)).toBeLessThanOrEqual((0.5 * rate) / LENGTH + 1e-9 * rate);
    }
  });
});
