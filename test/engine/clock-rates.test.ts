import { describe, expect, it } from 'vitest';
import { Fault, clockRates } from '../../src/engine';

describe('the rates of a clock tree', () => {
  it('are every ratio once, ascending: against all pairs', () => {
    for (const [reference, from, to, multiply, divide] of [[10, 55, 130, 40, 9], [30.72, 61.44, 245.76, 12, 12], [26, 0, 26, 5, 7]] as const) {
      const wanted = new Map<number, [number, number]>();
      for (let d = divide; d >= 1; d--) {
        for (let n = 1; n <= multiply; n++) if ((reference * n) / d >= from - 1e-12 && (reference * n) / d <= to + 1e-12) wanted.set(Number((n / d).toPrecision(12)), [n, d]);
      }
      // Lowest terms come last and stay.
      expect(clockRates(reference, from, to, multiply, divide).map(({ n, d }) => [n, d])).toEqual([...wanted].sort(([x], [y]) => x - y).map(([, ratio]) => ratio));
    }
  });

  it('hold the doubled family of 30.72 (common practice)', () => {
    expect(clockRates(30.72, 61.44, 491.52, 16, 1).map(({ rate }) => rate)).toEqual(expect.arrayContaining([61.44, 122.88, 245.76, 491.52]));
  });

  it('take limits as the decimals shown', () => {
    expect(clockRates(0.1, 0.3, 0.3, 3, 1)).toEqual([{ rate: 0.3, n: 3, d: 1 }]);
  });

  it.each<['input' | 'none', string, () => unknown]>([
    ['input', 'reference must be above 0; got 0.', () => clockRates(0, 1, 2, 3, 3)],
    ['input', 'from must not be above to; got 3 and 2.', () => clockRates(1, 3, 2, 3, 3)],
    ['input', 'multiply must be a whole number from 1 to 10000; got 20000.', () => clockRates(1, 1, 2, 20_000, 3)],
    ['input', 'multiply and divide leave 100 000 000 ratios and at most 1 000 000 are tried; lower them or bring from and to closer together.', () => clockRates(1, 0, 1e9, 10_000, 10_000)],
    ['none', 'No ratio gives a rate from 1.1 to 1.2.', () => clockRates(1, 1.1, 1.2, 3, 3)],
  ])('say in words (%s): %s', (kind, sentence, ask) => expect(ask).toThrow(new Fault(kind, sentence)));
});
