import { describe, expect, it } from 'vitest';
import { call } from '../support/built-functions';

describe('RATES', () => {
  it('lists the usable ranges of one band, ascending, the last without an end', () => {
    expect(call('RATES', 17.5, 22.5)).toEqual([
      ['Zone', 'Lowest rate', 'Highest rate', 'Width', 'Inverted'],
      [4, 11.25, 11.6666666666666, 0.4166666666666, true],
      [3, 15, 17.5, 2.5, false],
      [2, 22.5, 35, 12.5, true],
      [1, 45, '', '', false],
    ]);
  });

  it('takes limits, guard, tolerance, sampling and no headers', () => {
    expect(call('RATES', 17.5, 22.5, 16, 30, null, null, null, false)).toEqual([[3, 16, 17.5, 1.5, false], [2, 22.5, 30, 7.5, true]]);
    expect(call('RATES', 16, 20, null, null, 0.5, null, null, false)).toEqual([
      [4, 10.25, 10.3333333333333, 0.0833333333333, true], [3, 13.6666666666667, 15.5, 1.8333333333333, false], [2, 20.5, 31, 10.5, true], [1, 41, '', '', false],
    ]);
    expect(call('RATES', 60, 90, 90, 130, null, 100_000, null, false)).toEqual([[2, 100, 109.090909090909, 9.090909090909, true]]);
    expect(call('RATES', 16, 20, 20, null, null, null, 'iq', false)).toEqual([[1, 20, 32, 12, false], [0, 40, '', '', false]]);
  });

  it('takes 0 for an empty cell where 0 makes no sense', () => {
    expect(call('RATES', 17.5, 22.5, 0, 0, 0, 0, 0)).toEqual(call('RATES', 17.5, 22.5));
  });
});

describe('MINRATE and TOLERANCE', () => {
  it('work on cells and columns', () => {
    expect(call('MINRATE', [17.5, 9, null, 18], [22.5, 12, null, 22])).toEqual([[11.25], [6], [''], [8.8]]);
    expect(call('TOLERANCE', [60, 17.5], [90, 22.5], [100, 35])).toEqual([[100_000], [0]]);
    expect(call('TOLERANCE', 60, 90, 100, 2)).toEqual([[80_000]]);
  });

  it('have no answer where no rate is lowest', () => {
    expect(call('MINRATE', 5, 5)).toEqual([['#N/A There is no lowest rate: a tone without guard or tolerance is usable at rates down to 0.']]);
  });
});
