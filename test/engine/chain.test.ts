import { describe, expect, it } from 'vitest';
import { Fault, downConvert, foldedFrequency, tunedFrequency, tuningWord } from '../../src/engine';
import { seeded } from '../support/random';
import FFT from 'fft.js';

const LENGTH = 1024;

/** The highest line in the spectrum of a complex record, from −half to half its length. */
function complexPeak(samples: readonly { re: number; im: number }[]): number {
  const fft = new FFT(samples.length);
  const output = fft.createComplexArray();
  fft.transform(output, samples.flatMap(({ re, im }) => [re, im]));
  const power = samples.map((_, line) => output[2 * line]! ** 2 + output[2 * line + 1]! ** 2);
  const line = power.indexOf(Math.max(...power));
  return line < samples.length / 2 ? line : line - samples.length;
}

describe('down-conversion and decimation', () => {
  it('move a tone where mixing, an ideal filter and decimation put it: 300 random tones (seed 331)', () => {
    const random = seeded(331);
    for (let i = 0; i < 300; i++) {
      const decimation = random.pick([2, 4, 8]);
      // In lines of the spectrum: a rate of LENGTH, whole frequencies, and an oscillator near the folded tone.
      const frequency = random.whole(1, 4 * LENGTH);
      const folded = foldedFrequency(frequency, LENGTH);
      const reach = LENGTH / decimation / 2 - 1;
      const oscillator = Math.min(LENGTH / 2, Math.max(0, folded + random.whole(-reach + 1, reach - 1)));
      const turn = (cycles: number, n: number) => (2 * Math.PI * ((cycles * n) % LENGTH)) / LENGTH;
      // The ideal filter keeps the part of the real tone that is near the oscillator: its positive folded frequency.
      const mixed = Array.from({ length: LENGTH }, (_, n) => ({ re: Math.cos(turn(folded - oscillator, n)), im: Math.sin(turn(folded - oscillator, n)) }));
      const seen = complexPeak(mixed.filter((_, n) => n % decimation === 0));
      const [stage] = downConvert(frequency, frequency, LENGTH, oscillator, [decimation], 1);
      expect([frequency, oscillator, seen]).toEqual([frequency, oscillator, stage!.low]);
      expect([stage!.rate, stage!.high, stage!.margin]).toEqual([LENGTH / decimation, stage!.low, LENGTH / decimation / 2 - Math.abs(stage!.low)]);
    }
  });

  it('show after which stage a band no longer fits', () => {
    // 70 to 74 lands on 30 to 26; from 28 it reaches 2 either way.
    expect(downConvert(70, 74, 100, 28, [5, 2, 2, 2], 0.8)).toEqual([
      { low: -2, high: 2, rate: 20, margin: 6, inverted: true },
      { low: -2, high: 2, rate: 10, margin: 2, inverted: true },
      { low: -2, high: 2, rate: 5, margin: 0, inverted: true },
      { low: -2, high: 2, rate: 2.5, margin: -1, inverted: true },
    ]);
  });

  it.each<['input' | 'none', string, () => unknown]>([
    ['input', 'oscillator must be from 0 to 50, where this rate puts frequencies; got 60.', () => downConvert(70, 74, 100, 60, [2], 1)],
    ['input', 'decimation must be a whole number, 1 or more; got 2.5.', () => downConvert(70, 74, 100, 28, [2.5], 1)],
    ['input', 'usable must be above 0 and at most 1; got 1.5.', () => downConvert(70, 74, 100, 28, [2], 1.5)],
    ['none', 'The band from 48 to 52 crosses a zone edge of the rate 100, so it overlaps its own mirror.', () => downConvert(48, 52, 100, 28, [2], 1)],
  ])('say in words (%s): %s', (kind, sentence, ask) => expect(ask).toThrow(new Fault(kind, sentence)));
});

describe('the word of an oscillator', () => {
  it('is the nearest there is, and gives what it says: 2000 random cases (seed 332)', () => {
    const random = seeded(332);
    for (let i = 0; i < 2000; i++) {
      const [rate, bits] = [random.whole(1, 500), random.whole(1, 24)];
      const frequency = random.whole(0, 10 * rate * 16) / 160;
      const word = tuningWord(frequency, rate, bits);
      const step = rate / 2 ** bits;
      const miss = Math.abs(frequency - word * step - rate * Math.round((frequency - word * step) / rate));
      expect(miss).toBeLessThanOrEqual(step / 2 + 1e-9);
      expect(word).toBeLessThan(2 ** bits);
      expect(tunedFrequency(frequency, rate, bits)).toBeCloseTo(word * step, 9);
    }
  });

  it('counts a rate as 0, and is exact for any number of bits', () => {
    expect([tuningWord(100, 100, 32), tuningWord(-25, 100, 32), tuningWord(99.9999999999999, 100, 32)]).toEqual([0, 3 * 2 ** 30, 0]);
    expect(tuningWord(61.44 / 3, 61.44, 48)).toBe(Math.round(2 ** 48 / 3));
  });

  it('has at most 53 bits', () => {
    expect(() => tuningWord(1, 10, 54)).toThrow(new Fault('input', 'bits must be a whole number from 1 to 53; got 54.'));
  });
});
