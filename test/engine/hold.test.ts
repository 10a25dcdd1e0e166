import { describe, expect, it } from 'vitest';
import { Fault, type Hold, holdLevel, outputImages } from '../../src/engine';

/** The Fourier transform of a held pulse of one period, by the midpoint rule, as a size relative to a whole period at frequency 0. */
function transformed(turns: number, hold: Hold): number {
  const STEPS = 20_000;
  let re = 0;
  let im = 0;
  for (let k = 0; k < STEPS; k++) {
    const t = (k + 0.5) / STEPS;
    const pulse = { nrz: 1, rz: t < 0.5 ? 1 : 0, doublet: t < 0.5 ? 1 : -1 }[hold];
    re += (pulse * Math.cos(2 * Math.PI * turns * t)) / STEPS;
    im -= (pulse * Math.sin(2 * Math.PI * turns * t)) / STEPS;
  }
  return Math.hypot(re, im);
}

describe('a held output', () => {
  it('is 3.92 dB down at half the rate (every handbook, from memory) and loses 27.17 % of 3.4 kHz at 8 kHz in amplitude (Tan, Ex. 2.7(a), from memory)', () => {
    expect(holdLevel(50, 100, 'nrz')!.toFixed(2)).toBe('-3.92');
    expect(((1 - 10 ** (holdLevel(3.4, 8, 'nrz')! / 20)) * 100).toFixed(1)).toBe('27.2');
  });

  it.each<[Hold]>([['nrz'], ['rz'], ['doublet']])('%s is the Fourier transform of its pulse', (hold) => {
    for (const turns of [0.001, 0.1, 0.25, 0.499, 0.75, 1.3, 1.75, 2.6, 3.49]) {
      expect(10 ** (holdLevel(turns * 100, 100, hold)! / 20)).toBeCloseTo(transformed(turns, hold), 7);
    }
  });

  it('is nothing at the zeros of its transform', () => {
    expect([holdLevel(100, 100, 'nrz'), holdLevel(300, 100, 'nrz'), holdLevel(200, 100, 'rz'), holdLevel(200, 100, 'doublet'), holdLevel(0, 100, 'doublet')]).toEqual([null, null, null, null, null]);
    expect(holdLevel(0.3, 0.1, 'nrz')).toBeNull(); // whose quotient as doubles is no whole number
    expect(holdLevel(100, 100, 'rz')).not.toBeNull();
  });
});

describe('images of a generated band', () => {
  it('lie in every zone, reversed in the even ones', () => {
    expect(outputImages(10, 20, 100, 4, 'nrz').map(({ zone, low, high, inverted }) => [zone, low, high, inverted])).toEqual([
      [1, 10, 20, false], [2, 80, 90, true], [3, 110, 120, false], [4, 180, 190, true],
    ]);
    expect(outputImages(10, 20, 100, 1, 'rz')[0]!.level).toBe(holdLevel(15, 100, 'rz'));
  });

  it.each([
    ['low must be from 0 to 50, half the rate; got -1.', () => outputImages(-1, 20, 100, 4, 'nrz')],
    ['high must be from 0 to 50, half the rate; got 51.', () => outputImages(10, 51, 100, 4, 'nrz')],
    ['zones must be a whole number, 1 or more; got 1.5.', () => outputImages(10, 20, 100, 1.5, 'nrz')],
  ])('say in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});
