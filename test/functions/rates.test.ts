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

describe('PLANRATES', () => {
  it('finds 60 Hz for 120 to 130 and 150 to 170 Hz together, an isolated point (Owen, Practical Signal Processing, 2007)', () => {
    expect(call('PLANRATES', [120, 150], [130, 170], null, 50, 70)).toEqual([['Lowest rate', 'Highest rate', 'Width', 'Centre', 'Headroom ppm'], [60, 60, 0, 60, 0]]);
  });

  it('gives the last range no end where there is no limit', () => {
    expect(call('PLANRATES', 0, 5, null, null, null, null, null, null, null, null, false)).toEqual([[10, '', '', '', '']]);
  });

  it('ignores blank rows and rows that are to be ignored', () => {
    const alone = call('PLANRATES', [10], [12], null, 10, 40);
    expect(call('PLANRATES', [10, null, 11, 0], [12, '', 30, null], ['', '', 'Ignore', ''], 10, 40)).toEqual(alone);
  });

  it('tells which bands overlap before sampling', () => {
    expect(call('PLANRATES', [10, 50, 11], [12, 51, 13])).toEqual([['#N/A No rate is usable: band 1 (10 to 12) and band 3 (11 to 13) overlap, or come nearer than the guard, before sampling.']]);
    expect(call('PLANRATES', [10, 21], [12, 23], ['unwanted', 'wanted'], null, 200, null, null, 2)).toEqual([
      ['#N/A No rate is usable: band 2 (21 to 23) and harmonic 2 of band 1 (10 to 12) overlap, or come nearer than the guard, before sampling.'],
    ]);
  });
});

describe('RANKRATES', () => {
  it('ranks a step or a list by headroom, and names the rule that comes nearest', () => {
    // At 60 the second band lands on 0 to 2: 8 clear of the first until the rate falls to 52, where it lands on 8 to 10.
    expect(call('RANKRATES', [10, 60], [12, 62], 5, ['wanted', 'unwanted'], 50, 75, null, null, null, null, 2)).toEqual([
      ['Rate', 'Headroom ppm', 'Tightest gap', 'Tightest rule'],
      [60, 133333.333333333, 8, 'row 1: band against row 2'],
      [65, 76923.0769230769, 5, 'row 1: band against row 2'],
    ]);
    expect(call('RANKRATES', [10, 60], [12, 62], [95, 35], ['wanted', 'unwanted'], null, null, null, null, null, null, null, null, false).map(([rate]) => rate)).toEqual([95, 35]);
  });

  it('needs a limit for a step', () => {
    expect(call('RANKRATES', 10, 12, 1)).toEqual([['#VALUE! to must be given where grid is a step; got a blank cell.']]);
  });
});

describe('CONFLICTS', () => {
  it('lists what a rate breaks, worst first, by the names of the bands', () => {
    // Worked by hand at 49 with half the rate at 24.5: the blocker lands on 9 to 11, three times 24 to 26 on 23 and up, and so on.
    expect(call('CONFLICTS', [10, 58, 24], [12, 60, 26], 49, ['wanted', 'unwanted', 'wanted'], 0, 0, 3, 2, ['Beacon', 'Blocker', null])).toEqual([
      ['Band', 'Rule', 'Against', 'Gap'],
      ['row 3', 'harmonic 3', 'row 3', -3],
      ['Beacon', 'band', 'Blocker', -1],
      ['row 3', 'harmonic 2', 'Beacon', -1],
      ['row 3', 'zone edge', 24.5, -0.5],
      ['row 3', 'offset 1/2', 24.5, -0.5],
    ]);
  });

  it('says clear in one row', () => {
    expect(call('CONFLICTS', [10, 60], [12, 62], 70)).toEqual([['Band', 'Rule', 'Against', 'Gap'], ['', 'clear', '', '']]);
  });

  it('says so where bands overlap before sampling, and gives zone edges and offset tones by frequency', () => {
    expect(call('CONFLICTS', [10, 11], [12, 13], 100, null, null, null, null, null, ['A', 'B'], null, false)).toEqual([['A', 'band, before sampling', 'B', -1]]);
    expect(call('CONFLICTS', [24], [26], 50, null, null, null, null, null, ['A'], null, false)).toEqual([['A', 'zone edge', 25, -1]]);
    expect(call('CONFLICTS', [24], [26], 100, null, null, null, null, 4, ['A'], null, false)).toContainEqual(['A', 'offset 1/4', 25, -1]);
  });
});

describe('HEADROOM and CLOCKRATES', () => {
  it('give what a plan leaves to the clock, and what a clock can make', () => {
    // 10 to 12 and 60 to 62 at 80: the second lands on 18 to 20 and meets the first when the rate falls to 74.
    expect(call('HEADROOM', [10, 60], [12, 62], 80)).toEqual([[75_000]]);
    expect(call('HEADROOM', [10, 60], [12, 62], 50)).toEqual([[0]]);
    expect(call('CLOCKRATES', 10, 60, 70, 20, 3)).toEqual([['Rate', 'N', 'D'], [60, 6, 1], [63.333333333333336, 19, 3], [65, 13, 2], [66.66666666666667, 20, 3], [70, 7, 1]]);
  });
});
