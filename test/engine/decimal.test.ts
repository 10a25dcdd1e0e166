import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalOf, isWhole, placesOf } from '../../src/engine/decimal';

const valueOf = ({ coefficient, places }: { coefficient: bigint; places: number }) => Number(`${coefficient}e${-places}`);

describe('a double is read as the decimal that a sheet shows', () => {
  it.each([
    // double, coefficient, places
    [0.3, 3n, 1],
    [0.1 + 0.2, 3n, 1],
    [61.44, 6144n, 2],
    [-122.88, -12288n, 2],
    [0, 0n, 0],
    [1575.42e6, 1575420000n, 0],
    [1 / 3, 333333333333333n, 15],
    [1e22, 1n, -22],
    [1.5e300, 15n, -299],
    [2.5e-300, 25n, 301],
    [999999999999999, 999999999999999n, 0],
    [9007199254740993, 900719925474099n, -1],
  ])('%d', (x, coefficient, places) => {
    expect(decimalOf(x)).toEqual({ coefficient, places });
  });

  it('whatever the double: the same as its 15 digits (fast-check)', () => {
    fc.assert(fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
      expect(valueOf(decimalOf(x))).toBe(Number(x.toPrecision(15)) || 0);
    }), { seed: 71, numRuns: 20_000 });
  });

  it('every decimal of 15 digits comes back (fast-check)', () => {
    fc.assert(fc.property(fc.integer({ min: 1, max: 999_999_999_999_999 }), fc.integer({ min: -40, max: 40 }), (digits, exponent) => {
      const { coefficient, places } = decimalOf(Number(`${digits}e${exponent}`));
      const shift = BigInt(Math.max(0, places, -exponent));
      expect(coefficient * 10n ** (shift - BigInt(places))).toBe(BigInt(digits) * 10n ** (shift + BigInt(exponent)));
    }), { seed: 72, numRuns: 20_000 });
  });
});

describe('scaling to whole numbers', () => {
  it('sees what is not whole at so many places, and what does not fit', () => {
    expect([isWhole(61.44, 2), isWhole(61.44, 1), isWhole(999_999_999_999_999, 0), isWhole(1e15, 0), isWhole(0.1 + 0.2, 1)]).toEqual([true, false, true, false, false]);
  });

  it('finds the least places', () => {
    expect([placesOf(61.44), placesOf(100), placesOf(0.1 + 0.2), placesOf(1e16), placesOf(1e-9), placesOf(61.44, 4)]).toEqual([2, 0, -1, -1, 9, 4]);
  });
});
