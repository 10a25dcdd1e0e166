import { describe, expect, it } from 'vitest';
import { call } from '../support/built-functions';
import { FULL_CALLS } from '../support/full-calls';

describe('row functions of the landing family', () => {
  it.each([
    ['FREQ', 30],
    ['ZONE', 2],
    ['INVERTED', true],
    ['LOW', 10],
    ['HIGH', 40],
    ['MARGIN', 7.9], // 60 − 50·1.001 is 9.95, 100·0.999 − 90 is 9.9, less the guard of 2
    ['CHECK', 'clear'],
    ['GAP', -10],
  ])('%s of cells is a cell', (id, result) => {
    expect(call(id, ...FULL_CALLS[id]!)).toEqual([[result]]);
  });

  it.each([
    ['FREQ', [30, 38.56, 0]],
    ['ZONE', [2, 2, 1]],
    ['INVERTED', [true, true, false]],
  ])('%s of a column is a column', (id, results) => {
    expect(call(id, [70, 61.44, 0], 100)).toEqual(results.map((one) => [one]));
  });

  it('rate, guard and all others may be columns, and one cell serves every row', () => {
    expect(call('ZONE', [70, 70, 70], [100, 50, 20])).toEqual([[2], [3], [8]]);
    expect(call('MARGIN', [60, 60], [90, 90], 100, [0, 5])).toEqual([[10], [5]]);
    expect(call('FREQ', 70, 100, ['real', 'iq', 'IQ '])).toEqual([[30], [-30], [-30]]);
  });

  it('a column against a row spans a block, as in the sheet', () => {
    expect(call('FREQ', [[70], [130]], [[100, 50, 40]])).toEqual([[30, 20, 10], [30, 20, 10]]);
  });

  it('a blank row stays blank, whichever way the host hands over a blank', () => {
    expect(call('FREQ', [70, null, ''], 100)).toEqual([[30], [''], ['']]);
    // Some desktops pass 0 for a blank cell: two edges of 0 are no band.
    expect(call('MARGIN', [60, null, '', 0, 0], [90, null, '', 0, null], 100)).toEqual([[10], [''], [''], [''], ['']]);
    expect(call('GAP', [60, 60, null], [90, 90, null], [10, null, 10], [20, null, 20], 100)).toEqual([[-10], [''], ['']]);
    expect(call('FREQ', 0, 100)).toEqual([[0]]);
  });

  it('an error stays in its row, its own and that of another cell', () => {
    expect(call('ZONE', [70, 'x', { code: '#DIV/0!' }, 130], 100)).toEqual([[2], ['#VALUE! frequency must be a number; got "x".'], ['#DIV/0!'], [3]]);
    expect(call('FREQ', [70, 130], [0, 100])).toEqual([['#VALUE! rate must be above 0; got 0.'], [30]]);
  });

  it('optional arguments left out or blank are their defaults', () => {
    expect(call('MARGIN', 60, 90, 100, null, null, null)).toEqual([[10]]);
    expect(call('MARGIN', 60, 90, 100, '', '', '')).toEqual([[10]]);
    expect(call('MARGIN', 60, 90, 100, 0, 0, 0)).toEqual([[10]]);
  });

  it('IQ sampling has its own zones', () => {
    expect(call('ZONE', [0, 49, 50, -50, -51], 100, 'iq')).toEqual([[0], [0], [1], [0], [-1]]);
    expect(call('INVERTED', 70, 100, 'iq')).toEqual([[false]]);
    expect([call('LOW', 60, 90, 100, 'iq'), call('HIGH', 60, 90, 100, 'iq')]).toEqual([[[-40]], [[-10]]]);
  });
});

describe('BAND', () => {
  const titles = ['Folded low', 'Folded high', 'Zone', 'Inverted', 'Margin', 'Check'];

  it('gives a row for each band under a header row', () => {
    expect(call('BAND', [17.5, 60, 45], [22.5, 90, 55], 100, 2)).toEqual([
      titles,
      [17.5, 22.5, 1, false, 15.5, 'clear'],
      [10, 40, 2, true, 8, 'clear'],
      [45, 50, 2, true, -7, 'crosses 50'],
    ]);
  });

  it('leaves the header row out on request, keeps blank rows blank, and fills the row of an error', () => {
    const sentence = '#VALUE! high must be a number; got "n/a".';
    expect(call('BAND', [60, null, 45], [90, null, 'n/a'], 100, null, null, null, false)).toEqual([
      [10, 40, 2, true, 10, 'clear'],
      ['', '', '', '', '', ''],
      Array(6).fill(sentence),
    ]);
  });

  it('reads bands from rows as well as from columns, but not from a block', () => {
    expect(call('BAND', [[17.5, 60]], [[22.5, 90]], 100, null, null, null, false)).toHaveLength(2);
    expect(call('BAND', [[1, 2], [3, 4]], 5, 100)).toEqual([['#VALUE! low must be one column or one row of cells; got 2 × 2 cells.']]);
  });
});

describe('IMAGES', () => {
  it('lists the true frequencies behind a folded one', () => {
    expect(call('IMAGES', 30, 100, 0, 150)).toEqual([['Frequency', 'Zone', 'Inverted'], [30, 1, false], [70, 2, true], [130, 3, false]]);
    expect(call('IMAGES', -30, 100, 0, 200, 'iq', false)).toEqual([[70, 1, false], [170, 2, false]]);
  });

  it('has no answer where none lands there', () => {
    expect(call('IMAGES', 30, 100, 31, 60)).toEqual([['#N/A No frequency from 31 to 60 lands on 30.']]);
  });
});

describe('RESOLVE', () => {
  it('finds the frequency that several rates agree on', () => {
    expect(call('RESOLVE', [14, 10, 4], [56, 40, 33], 0, 1000)).toEqual([['Lowest', 'Highest'], [70, 70]]);
    expect(call('RESOLVE', [14, 10, 4], [56, 40, 33], 0, 1000, 0.5, null, false)).toEqual([[69.5, 70.5], [490.5, 490.5], [630.5, 630.5]]);
  });

  it('leaves out the blank cells at the end of its columns', () => {
    expect(call('RESOLVE', [14, 10, 4, null, ''], [56, 40, 33, null, null], 0, 1000, null, null, false)).toEqual([[70, 70]]);
    expect(call('RESOLVE', [14, null, 4], [56, 40, 33], 0, 1000)).toEqual([['#VALUE! observed must be a number; got a blank cell.']]);
  });
});
