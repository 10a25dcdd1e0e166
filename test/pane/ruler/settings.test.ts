import { describe, expect, it } from 'vitest';
import type { CellValue } from '../../../src/host/port';
import { type Settings, readSetting } from '../../../src/pane/ruler/settings';

describe('what the ruler is asked besides the plan', () => {
  it.each<[keyof Settings, CellValue, number | null | string]>([
    ['step', null, null],
    ['step', '', null],
    ['step', 0.48, 0.48],
    ['step', ' 0.48 ', 0.48],
    ['step', 0, 'Step must be a number above 0, or blank for any rate; got 0.'],
    ['step', 'fine', 'Step must be a number above 0, or blank for any rate; got "fine".'],
    ['step', { error: '#N/A' }, 'Step must be a number above 0, or blank for any rate; got #N/A.'],
    ['harmonics', null, 1],
    ['harmonics', 3, 3],
    ['harmonics', 21, 'Harmonics up to must be a whole number from 1 to 20; got 21.'],
    ['cores', '4', 4],
    ['cores', 1.5, 'Cores must be a whole number from 1 to 64; got 1.5.'],
    ['cores', true, 'Cores must be a whole number from 1 to 64; got "true".'],
  ])('%s of %j', (key, value, expected) => {
    expect(readSetting(key, value)).toEqual(typeof expected === 'string' ? { sentence: expected } : { value: expected });
  });
});
