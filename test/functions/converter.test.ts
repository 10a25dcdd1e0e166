import { describe, expect, it } from 'vitest';
import { call } from '../support/built-functions';

describe('CHAIN', () => {
  it('lists a row for each stage; the margin is negative from the stage on that no longer holds the band', () => {
    expect(call('CHAIN', 60, 90, 100, 25, [2, 2], 0.9)).toEqual([
      ['Output low', 'Output high', 'Output rate', 'Margin', 'Inverted'],
      [-15, 15, 50, 7.5, true],
      [-15, 15, 25, -3.75, true],
    ]);
  });

  it('takes one decimation as one stage, and the whole output rate as usable', () => {
    expect(call('CHAIN', 10, 12, 100, 10, 4, null, false)).toEqual([[0, 2, 25, 10.5, false]]);
  });

  it('has no answer for a band that the converter has folded onto itself', () => {
    expect(call('CHAIN', 40, 60, 100, 25, 2)).toEqual([['#N/A The band from 40 to 60 crosses a zone edge of the rate 100, so it overlaps its own mirror.']]);
  });
});

describe('TUNINGWORD and TUNED', () => {
  it('take a column, keep blanks blank and errors in their rows', () => {
    expect(call('TUNINGWORD', [25, null, 10], 100, [32, 32, 54])).toEqual([[2 ** 30], [''], ['#VALUE! bits must be a whole number from 1 to 53; got 54.']]);
    expect(call('TUNED', [25, null, 10], 100, [32, 32, 8])).toEqual([[25], [''], [10.15625]]);
  });
});
