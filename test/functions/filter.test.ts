import { describe, expect, it } from 'vitest';
import { call } from '../support/built-functions';

describe('STOPBAND', () => {
  it('lists a row for each band under a header row; below zone 1 there is nothing to stop', () => {
    expect(call('STOPBAND', [60, 10, null], [90, 40, null], 100)).toEqual([
      ['Lower stop edge', 'Upper stop edge', 'Lower transition', 'Upper transition'],
      [40, 110, 20, 20],
      ['', 60, '', 20],
      ['', '', '', ''],
    ]);
  });

  it('has no answer for a band that overlaps its own mirror', () => {
    expect(call('STOPBAND', [40, 60], [60, 90], 100, false)).toEqual([
      Array(4).fill('#N/A The band from 40 to 60 crosses a zone edge of the rate 100, so it overlaps its own mirror.'),
      [40, 110, 20, 20],
    ]);
  });
});

describe('FILTERORDER', () => {
  it('tells low-pass, high-pass and band-pass from the blank edges', () => {
    expect(call('FILTERORDER', 'butterworth', ['', 40, 60], [40, '', 90], ['', 20, 40], [60, '', 110], 1, 60)).toEqual([[19], [11], [11]]);
  });

  it('takes a column of responses, in any letters', () => {
    expect(call('FILTERORDER', ['Butterworth', 'CHEBYSHEV', 'Inverse Chebyshev', 'elliptic', null], null, 40, null, 60, 1, 60)).toEqual([[19], [9], [9], [6], ['']]);
  });

  it('says which edges do not belong together', () => {
    expect(call('FILTERORDER', 'elliptic', [null, 40], [null, null], [null, 41], [null, null], 1, 60)).toEqual([
      ['#VALUE! passHigh must be given for a low-pass, passLow for a high-pass, both for a band-pass; got two blank cells.'], ['#VALUE! stopLow must be below passLow, 40; got 41.'],
    ]);
  });
});

describe('ATTENUATION', () => {
  it('is the ripple at the edge of the pass band, and meets the stop band at the order that FILTERORDER gives', () => {
    const order = call('FILTERORDER', 'elliptic', null, 40, null, 60, 1, 60)[0]![0] as number;
    const [[edge], [stop]] = call('ATTENUATION', 'elliptic', order, null, 40, 1, [40, 60], 60) as [[number], [number]];
    expect(edge).toBeCloseTo(1, 12);
    expect(stop).toBeGreaterThanOrEqual(60);
  });

  it('asks for the attenuation of the stop band where the response has one', () => {
    expect(call('ATTENUATION', ['chebyshev', 'elliptic'], 3, null, 40, 1, 40)).toEqual([
      [expect.closeTo(1, 12)], ['#VALUE! attenuation must be given for the response "elliptic"; got a blank cell.'],
    ]);
  });

  it('has no number where nothing gets through', () => {
    expect(call('ATTENUATION', 'chebyshev', 3, 40, null, 1, 0)).toEqual([['#N/A The filter lets nothing through at 0.']]);
  });
});
