import { describe, expect, it } from 'vitest';
import { call } from '../support/built-functions';
import { FULL_CALLS } from '../support/full-calls';

describe('table functions of the spurs family', () => {
  it.each([
    ['HARMONICS', ['Order', 'Low', 'High', 'Folded low', 'Folded high', 'Zone', 'Inverted', 'Gap'],
      [[1, 10, 12, 10, 12, 1, false, ''], [2, 20, 24, 20, 24, 1, false, 8], [3, 30, 36, 14, 20, 2, true, 2]]],
    ['INTERLEAVING', ['Kind', 'Multiple', 'Folded low', 'Folded high', 'Gap'],
      [['image', 1, 35, 37, 23], ['image', 2, 38, 40, 26], ['image', 3, 13, 15, 1], ['offset', 1, 25, 25, 13], ['offset', 2, 50, 50, 38]]],
    ['MIXING', ['m', 'n', 'Low', 'High', 'Folded low', 'Folded high'], [[0, 1, 100, 100, 100, 100], [1, -1, 88, 90, 88, 90], [1, 1, 110, 112, 110, 112]]],
    ['INTERMOD', ['Product', 'Order', 'Frequency', 'Folded'], [['f2-f1', 2, 1, 1], ['2·f1', 2, 10, 6], ['f1+f2', 2, 11, 5], ['2·f2', 2, 12, 4]]],
    ['SOURCES', ['Product', 'Order', 'Frequency', 'Miss'], [['clock image 1/2', 1, 14, 0], ['2·carrier', 2, 14, 0]]],
    ['DACIMAGES', ['Zone', 'Low', 'High', 'Inverted', 'Level dB'],
      [[1, 10, 20, false, expect.closeTo(-6.101117566707631, 12)], [2, 80, 90, true, expect.closeTo(-8.774745652676724, 12)], [3, 110, 120, false, expect.closeTo(-11.400323945463104, 12)]]],
  ])('%s lists its rows under a header row, or without it', (id, titles, rows) => {
    const full = FULL_CALLS[id]!;
    expect(call(id, ...full)).toEqual(rows);
    expect(call(id, ...full.with(-1, null))).toEqual([titles, ...rows]);
  });

  it('take their defaults for what is left out, blank, or 0 where 0 makes no sense', () => {
    expect(call('HARMONICS', 10, 12, 50)).toHaveLength(1 + 5);
    expect(call('HARMONICS', 10, 12, 50, 0)).toEqual(call('HARMONICS', 10, 12, 50, 5));
    expect(call('MIXING', 10, 12, 100, 250, '', '')).toEqual(call('MIXING', 10, 12, 100, 250, 3, 3));
    expect(call('INTERMOD', [5, 6], 100)).toEqual(call('INTERMOD', [5, 6], 100, 3));
    expect(call('SOURCES', 6, 20, [7])).toEqual(call('SOURCES', 6, 20, [7], 5, 0, 1, ['f1']));
    expect(call('DACIMAGES', 10, 20, 100)).toEqual(call('DACIMAGES', 10, 20, 100, 4, 'nrz'));
  });

  it('leave out blank cells at the end of a column of tones, and of their names', () => {
    expect(call('SOURCES', 6, 20, [7, 4, null], 3, 0.5, 2, ['carrier', 'clock', null], false)).toEqual(call('SOURCES', ...FULL_CALLS.SOURCES!));
  });
});
