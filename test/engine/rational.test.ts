import fc from 'fast-check';
import Fraction from 'fraction.js';
import { describe, expect, it } from 'vitest';
import { ceiling, compare, floor, fromNumber, rational, roundDown, roundUp, toNumber } from '../../src/engine/rational';

const wide = fc.bigInt({ min: -(10n ** 60n), max: 10n ** 60n });
const above0 = fc.bigInt({ min: 1n, max: 10n ** 60n });

describe('a fraction becomes the nearest double', () => {
  it.each([
    ['a third', rational(1n, 3n), 1 / 3],
    ['below 0', rational(-2n, 3n), -2 / 3],
    ['a tie goes to the even neighbour', rational(2n ** 53n + 1n), 2 ** 53],
    ['a hair above a tie goes up', rational((2n ** 53n + 1n) * 10n ** 40n + 1n, 10n ** 40n), 2 ** 53 + 2],
    ['the least subnormal', rational(1n, 2n ** 1074n), 5e-324],
    ['half of it goes to 0, a hair more does not', rational(10n ** 30n + 1n, 2n ** 1075n * 10n ** 30n), 5e-324],
    ['half of it', rational(1n, 2n ** 1075n), 0],
    // A hair below 5.5 units: rounded to 53 bits first it would be a tie and go up.
    ['a subnormal is rounded once', rational(11n * 2n ** 57n - 1n, 2n ** 1132n), 5 * 2 ** -1074],
    ['the largest', rational(BigInt(Number.MAX_VALUE)), Number.MAX_VALUE],
  ])('%s', (_, fraction, wanted) => {
    expect(toNumber(fraction)).toBe(wanted);
  });

  it('decimals as the language itself reads them (fast-check)', () => {
    fc.assert(fc.property(wide, fc.integer({ min: 0, max: 330 }), (digits, places) => {
      expect(toNumber(rational(digits, 10n ** BigInt(places)))).toBe(Number(`${digits}e-${places}`));
    }), { seed: 73, numRuns: 10_000 });
  });
});

describe('rounding to 15 digits', () => {
  it('encloses the fraction as tightly as 15 digits can (fast-check)', () => {
    fc.assert(fc.property(above0, above0, (n, d) => {
      const x = rational(n, d);
      const [down, up] = [roundDown(x), roundUp(x)];
      expect(compare(fromNumber(down), x)).toBeLessThanOrEqual(0);
      expect(compare(fromNumber(up), x)).toBeGreaterThanOrEqual(0);
      const [digits, exponent] = down.toExponential(14).split('e') as [string, string];
      const next = Number(`${BigInt(digits.replace('.', '')) + 1n}e${Number(exponent) - 14}`);
      expect([down, next]).toContain(up);
    }), { seed: 74, numRuns: 10_000 });
  });

  it('leaves a decimal of 15 digits as it is', () => {
    for (const x of [11.25, 0.1, 8, 999999999999999, 1e15, 1e-7, 60.1120448179272, 1000, 9.99999999999999]) expect([roundDown(fromNumber(x)), roundUp(fromNumber(x))]).toEqual([x, x]);
  });
});

describe('whole parts', () => {
  it('round towards the side they name, as fraction.js does (fast-check)', () => {
    fc.assert(fc.property(wide, above0, (n, d) => {
      const reference = new Fraction(n, d);
      expect([floor(rational(n, d)), ceiling(rational(n, d))]).toEqual([BigInt(reference.floor().toFraction()), BigInt(reference.ceil().toFraction())]);
    }), { seed: 75, numRuns: 2000 });
  });
});
