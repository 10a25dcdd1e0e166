// Every parameter of every function in functions.json against what people type by mistake: one clear sentence each, that names the
// argument, shows the value and says what is accepted.

import { describe, expect, it } from 'vitest';
import { FULL_CALLS, type Given, built, call } from '../support/built-functions';

/** A number is asked for. */
const notNumbers = (name: string): [Given, string][] => [
  ['abc', `#VALUE! ${name} must be a number; got "abc".`],
  ['61.44', `#VALUE! ${name} must be a number; got "61.44".`],
  [true, `#VALUE! ${name} must be a number; got TRUE.`],
  [Infinity, `#VALUE! ${name} must be a number; got Infinity.`],
  [NaN, `#VALUE! ${name} must be a number; got NaN.`],
  [{ code: '#REF!' }, '#REF!'],
];
const blank = (name: string): [Given, string] => ['', `#VALUE! ${name} must be a number; got a blank cell.`];
const notWord = (name: string): [Given, string][] => [
  ['complex', `#VALUE! ${name} must be "real" or "iq"; got "complex".`],
  [2, `#VALUE! ${name} must be "real" or "iq"; got 2.`],
  ['<img src=x onerror=alert(1)> and much more of it', `#VALUE! ${name} must be "real" or "iq"; got "<img src=x onerror=alert(1)> and much m…".`],
];

/** By the name of the parameter; where functions differ, by function and name. */
const BAD: Record<string, [Given, string][]> = {
  frequency: notNumbers('frequency'),
  low: [...notNumbers('low'), [95, '#VALUE! low must not be above high; got 95 and 90.'], blank('low')],
  high: [...notNumbers('high'), [5, '#VALUE! low must not be above high; got 60 and 5.'], blank('high')],
  otherLow: [...notNumbers('otherLow'), [21, '#VALUE! otherLow must not be above otherHigh; got 21 and 20.'], blank('otherLow')],
  otherHigh: [...notNumbers('otherHigh'), [9, '#VALUE! otherLow must not be above otherHigh; got 10 and 9.'], blank('otherHigh')],
  rate: [...notNumbers('rate'), blank('rate'), [0, '#VALUE! rate must be above 0; got 0.'], [-5, '#VALUE! rate must be above 0; got -5.']],
  guard: [...notNumbers('guard'), [-0.5, '#VALUE! guard must be 0 or more; got -0.5.']],
  ppm: [...notNumbers('ppm'), [-1, '#VALUE! ppm must be 0 or more; got -1.'], [1e6, '#VALUE! ppm must be below 1000000; got 1000000.']],
  sampling: notWord('sampling'),
  headers: [['maybe', '#VALUE! headers must be TRUE or FALSE; got "maybe".'], [7, '#VALUE! headers must be TRUE or FALSE; got 7.']],
  folded: [...notNumbers('folded'), blank('folded'), [50.5, '#VALUE! folded must be from 0 to 50, where this rate puts frequencies; got 50.5.'],
    [-1, '#VALUE! folded must be from 0 to 50, where this rate puts frequencies; got -1.']],
  'IMAGES from': [...notNumbers('from'), blank('from'), [151, '#VALUE! from must not be above to; got 151 and 150.']],
  'IMAGES to': [...notNumbers('to'), blank('to'), [-1, '#VALUE! from must not be above to; got 0 and -1.'],
    [1e9, '#VALUE! The result would have 20 000 000 rows and at most 10 000 are listed; bring from and to closer together.']],
  'RESOLVE from': [...notNumbers('from'), blank('from'), [1001, '#VALUE! from must not be above to; got 1001 and 1000.']],
  'RESOLVE to': [...notNumbers('to'), blank('to'), [1e9, '#VALUE! from and to leave 35 714 286 candidates to compare and at most 100 000 are tried; bring them closer together.']],
  'RATES from': [...notNumbers('from'), [-1, '#VALUE! from must be 0 or more; got -1.'], [41, '#VALUE! from must not be above to; got 41 and 40.']],
  'RATES to': [...notNumbers('to'), [-1, '#VALUE! to must be above 0; got -1.'], [3, '#VALUE! from must not be above to; got 12 and 3.'], [12.01, '#N/A No rate from 12 to 12.01 holds the band within one zone.']],
  'RATES low': [...notNumbers('low'), blank('low'), [23, '#VALUE! low must not be above high; got 23 and 22.5.']],
  'RATES high': [...notNumbers('high'), blank('high'), [17, '#VALUE! low must not be above high; got 17.5 and 17.']],
  'MINRATE low': [...notNumbers('low'), blank('low'), [23, '#VALUE! low must not be above high; got 23 and 22.5.']],
  'MINRATE high': [...notNumbers('high'), blank('high'), [17, '#VALUE! low must not be above high; got 17.5 and 17.']],
  observed: [...notNumbers('observed'), [[14, 10], '#VALUE! rates must have as many cells as observed, 2; got 3.'], [[14, 'x', 4], '#VALUE! observed must be a number; got "x".'],
    [[29, 10, 4], '#VALUE! observed must be from 0 to 28, where this rate puts frequencies; got 29.']],
  rates: [...notNumbers('rates'), [[56, 40], '#VALUE! rates must have as many cells as observed, 3; got 2.'], [[56, 0, 33], '#VALUE! rates must be above 0; got 0.']],
  tolerance: [...notNumbers('tolerance'), [-1, '#VALUE! tolerance must be 0 or more; got -1.']],
};

const badFor = (id: string, parameter: string) => BAD[`${id} ${parameter}`] ?? BAD[parameter];

describe.each(built.metadata)('FOLD.$id', ({ id, parameters }) => {
  const full = FULL_CALLS[id]!;

  it('is called with every argument in these tests', () => {
    expect(full).toHaveLength(parameters.length);
    expect(call(id, ...full).flat().filter((cell) => String(cell).startsWith('#'))).toEqual([]);
  });

  describe.each(parameters.map(({ name, optional }, index) => ({ name, optional, index })))('$name', ({ name, optional, index }) => {
    it('has rows of bad input', () => {
      expect(badFor(id, name)?.length).toBeGreaterThan(0);
    });

    it.each(badFor(id, name) ?? [])('given %j says %s', (value, sentence) => {
      // In every cell of the row or, where the whole is wrong, in the one cell that is left.
      expect(new Set(call(id, ...full.with(index, value)).flat())).toEqual(new Set([sentence]));
    });

    it('is one cell, or the size of the others', () => {
      const [first] = call(id, ...full.with(index, [[1, 2, 3], [4, 5, 6]]).with(index === 0 ? 1 : 0, [1, 2, 3]));
      expect(String(first![0])).toMatch(/^#VALUE! \w+ must be (one cell or the size of \w+, \d × \d cells|a single cell|one column or one row of cells); got \d × \d cells\.$/);
    });

    if (optional) {
      it('may be left out', () => {
        expect(call(id, ...full.with(index, null)).flat().filter((cell) => String(cell).startsWith('#'))).toEqual([]);
      });
    }
  });
});
