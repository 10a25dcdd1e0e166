import { describe, expect, it } from 'vitest';
import { call } from '../support/built-functions';

describe('row functions of the noise family', () => {
  it.each([
    ['JITTERSNR',   [[100, null, 0], 1e-6],       [expect.closeTo(64.0364026328377, 12), '', '#VALUE! frequency must be above 0; got 0.']],
    ['JITTERLIMIT', [[100, ''], 64],              [expect.closeTo(1.00419980254158e-6, 18), '']],
    ['QUANTSNR',    [[12, 8, null]],              [expect.closeTo(74.0081115499123, 12), expect.closeTo(49.9257118967938, 12), '']],
    ['QUANTSNR',    [12, [100, 100], [10, null]], [expect.closeTo(80.9978115932725, 12), expect.closeTo(74.0081115499123, 12)]],
    ['ENOB',        [[74, null, 'x']],            [expect.closeTo(11.9986527007227, 12), '', '#VALUE! snr must be a number; got "x".']],
    ['NOISEFOLD',   [[4, 4, 1, null], [0, 20, 0, 0]], [expect.closeTo(6.02059991327962, 12), expect.closeTo(0.128372247051722, 12), 0, '']],
    ['DROOP',       [[50, 100, null], 100],       [expect.closeTo(-3.92239754060305, 12), '#N/A The held output has nothing at 100.', '']],
    ['COHERENT',    [[10, null], 100, 1024],      [10.05859375, '']],
    ['CYCLES',      [[10, null], 100, 1024],      [103, '']],
  ])('%s takes a column, keeps blanks blank and errors in their rows: %j', (id, given, wanted) => {
    expect(call(id, ...(given as Parameters<typeof call> extends [string, ...infer Rest] ? Rest : never))).toEqual(wanted.map((cell) => [cell]));
  });
});

describe('SUMSNR', () => {
  it('adds noise powers over cells and ranges, blank ones left out', () => {
    expect(call('SUMSNR', [[70, null], ['', 70]])).toEqual([[expect.closeTo(66.9897000433602, 12)]]);
    expect(call('SUMSNR', 70, [70, 70], 70)).toEqual([[expect.closeTo(63.9794000867204, 12)]]);
    expect(call('SUMSNR', 70)).toEqual([[70]]);
  });

  it('passes an error on, and refuses text and nothing at all', () => {
    expect(call('SUMSNR', 70, { code: '#REF!' })).toEqual([['#REF!']]);
    expect(call('SUMSNR', 70, 'loud')).toEqual([['#VALUE! snr must be a number; got "loud".']]);
    expect(call('SUMSNR', [null, ''])).toEqual([['#VALUE! snr must be a number; got a blank cell.']]);
  });
});
