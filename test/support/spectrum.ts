// A Fourier transform for tests that sample something and look where it went.

import FFT from 'fft.js';

/** Power in each line of the spectrum of a real record, from 0 to half its length. */
export function powerSpectrum(samples: readonly number[]): number[] {
  const transform = Number.isInteger(Math.log2(samples.length)) ? fast(samples) : direct(samples);
  return transform.slice(0, samples.length / 2 + 1).map(({ re, im }) => (re ** 2 + im ** 2) / samples.length ** 2);
}

function fast(samples: readonly number[]): { re: number; im: number }[] {
  const fft = new FFT(samples.length);
  const output = fft.createComplexArray();
  const input = fft.createComplexArray().map((_, i) => (i % 2 ? 0 : samples[i / 2]!));
  fft.transform(output, input);
  return samples.map((_, line) => ({ re: output[2 * line]!, im: output[2 * line + 1]! }));
}

/** By the definition, for lengths that are no power of two. */
function direct(samples: readonly number[]): { re: number; im: number }[] {
  const turn = (n: number) => (2 * Math.PI * (n % samples.length)) / samples.length;
  return samples.map((_, line) => samples.reduce(({ re, im }, x, n) => ({ re: re + x * Math.cos(turn(line * n)), im: im - x * Math.sin(turn(line * n)) }), { re: 0, im: 0 }));
}

/** The lines, but for 0, that stand out of rounding noise. */
export const linesIn = (samples: readonly number[], floor = 1e-12): number[] =>
  powerSpectrum(samples).flatMap((power, line) => (line > 0 && power > floor ? [line] : []));

/** Samples of a function of time, in periods of the rate. */
export const sample = (length: number, signal: (n: number) => number): number[] => Array.from({ length }, (_, n) => signal(n));

/** A tone that makes so many cycles in a record of so many samples; more than half as many alias by themselves. */
export const tone = (cycles: number, length: number, phase = 0) => (n: number): number => Math.cos(2 * Math.PI * (((cycles * n) % length) / length + phase));
