// Every parameter of every function in functions.json against what people type by mistake: one clear sentence each, that names the
// argument, shows the value and says what is accepted.

import { describe, expect, it } from 'vitest';
import { built, call } from '../support/built-functions';
import { FULL_CALLS, type Given } from '../support/full-calls';

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

const counts = (name: string, most: number | null, tooMany: [Given, string]): [Given, string][] => {
  const accepted = `${name} must be a whole number${most === null ? ', 1 or more' : ` from 1 to ${most}`}`;
  return [...notNumbers(name), [2.5, `#VALUE! ${accepted}; got 2.5.`], [-1, `#VALUE! ${accepted}; got -1.`], tooMany];
};
/** Columns of a plan. */
const planLows: [Given, string][] = [
  [[10, 'x'], '#VALUE! low (row 2) must be a number; got "x".'], [[10, { code: '#N/A' }], '#N/A'], [[10, 63], '#VALUE! low (row 2) must not be above high (row 2); got 63 and 62.'],
  [[10, ''], '#VALUE! low (row 2) must be a number; got a blank cell.'], [[10, 60, 70], '#VALUE! high must have as many cells as low, 3; got 2.'],
];
const planHighs: [Given, string][] = [
  [[12, 'x'], '#VALUE! high (row 2) must be a number; got "x".'], [[12, Infinity], '#VALUE! high (row 2) must be a number; got Infinity.'], [[12, 59], '#VALUE! low (row 2) must not be above high (row 2); got 60 and 59.'],
  [[12], '#VALUE! high must have as many cells as low, 2; got 1.'],
];
const PLAN_FUNCTIONS = ['PLANRATES', 'RANKRATES', 'CONFLICTS', 'HEADROOM'];

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
  'RESOLVE observed': [...notNumbers('observed'), [[14, 10], '#VALUE! rates must have as many cells as observed, 2; got 3.'], [[14, 'x', 4], '#VALUE! observed must be a number; got "x".'],
    [[29, 10, 4], '#VALUE! observed must be from 0 to 28, where this rate puts frequencies; got 29.']],
  rates: [...notNumbers('rates'), [[56, 40], '#VALUE! rates must have as many cells as observed, 3; got 2.'], [[56, 0, 33], '#VALUE! rates must be above 0; got 0.']],
  tolerance: [...notNumbers('tolerance'), [-1, '#VALUE! tolerance must be 0 or more; got -1.']],
  'HARMONICS low': [...notNumbers('low'), [13, '#VALUE! low must not be above high; got 13 and 12.']],
  'HARMONICS high': [...notNumbers('high'), [9, '#VALUE! low must not be above high; got 10 and 9.']],
  'INTERLEAVING low': [...notNumbers('low'), [13, '#VALUE! low must not be above high; got 13 and 12.']],
  'INTERLEAVING high': [...notNumbers('high'), [9, '#VALUE! low must not be above high; got 10 and 9.']],
  'MIXING low': [...notNumbers('low'), [13, '#VALUE! low must not be above high; got 13 and 12.']],
  'MIXING high': [...notNumbers('high'), [9, '#VALUE! low must not be above high; got 10 and 9.']],
  'DACIMAGES low': [...notNumbers('low'), [-1, '#VALUE! low must be from 0 to 50, half the rate; got -1.']],
  'DACIMAGES high': [...notNumbers('high'), [51, '#VALUE! high must be from 0 to 50, half the rate; got 51.']],
  'SOURCES observed': [...notNumbers('observed'), [11, '#VALUE! observed must be from 0 to 10, where this rate puts frequencies; got 11.'],
    [0.2, '#N/A No product up to order 3 lands on 0.2 within the tolerance; the nearest, 2·clock-carrier, misses by 0.8.']],
  'SOURCES order': counts('order', null, [1e3, '#VALUE! The tones have 1 001 006 products up to this order and at most 200 000 are tried; lower order or give fewer tones.']),
  'PLANRATES from': [...notNumbers('from'), [-1, '#VALUE! from must be 0 or more; got -1.'], [205, '#VALUE! from must not be above to; got 205 and 200.']],
  'PLANRATES to': [...notNumbers('to'), [-1, '#VALUE! to must be above 0; got -1.'], [101, '#N/A No rate from 100 to 101 keeps every wanted band clear.']],
  'RANKRATES from': [...notNumbers('from'), [-1, '#VALUE! from must be 0 or more; got -1.'], [95, '#VALUE! from must not be above to; got 95 and 90.']],
  'RANKRATES to': [...notNumbers('to'), [31, '#N/A No rate of the grid keeps every wanted band clear.']],
  'CLOCKRATES from': [...notNumbers('from'), [-1, '#VALUE! from must be 0 or more; got -1.'], [71, '#VALUE! from must not be above to; got 71 and 70.']],
  'CLOCKRATES to': [...notNumbers('to'), [59, '#VALUE! from must not be above to; got 60 and 59.']],
  cores: counts('cores', 64, [65, '#VALUE! cores must be a whole number from 1 to 64; got 65.']),
  harmonics: counts('harmonics', 20, [21, '#VALUE! harmonics must be a whole number from 1 to 20; got 21.']),
  count: counts('count', 10000, [20_000, '#VALUE! count must be a whole number from 1 to 10000; got 20000.']),
  multiply: counts('multiply', 10000, [20_000, '#VALUE! multiply must be a whole number from 1 to 10000; got 20000.']),
  divide: counts('divide', 10000, [20_000, '#VALUE! divide must be a whole number from 1 to 10000; got 20000.']),
  highest: counts('highest', null, [20_000, '#VALUE! The result would have 20 000 rows and at most 10 000 are listed; lower highest.']),
  zones: counts('zones', null, [20_000, '#VALUE! The result would have 20 000 rows and at most 10 000 are listed; lower zones.']),
  m: counts('m', null, [9_000, '#VALUE! The result would have 27 001 rows and at most 10 000 are listed; lower m or n.']),
  n: counts('n', null, [9_000, '#VALUE! The result would have 27 001 rows and at most 10 000 are listed; lower m or n.']),
  order: counts('order', null, [200, '#VALUE! The result would have 40 198 rows and at most 10 000 are listed; lower order or give fewer tones.']),
  oscillator: [...notNumbers('oscillator'), [0, '#VALUE! oscillator must be above 0; got 0.']],
  reference: [...notNumbers('reference'), [0, '#VALUE! reference must be above 0; got 0.']],
  frequencies: [...notNumbers('frequencies').filter(([value]) => typeof value !== 'object'), [[5], '#VALUE! frequencies must hold at least two tones; got 1.'], [[5, 'x'], '#VALUE! frequencies must be a number; got "x".']],
  tones: [...notNumbers('tones'), [[7, ''], '#VALUE! name must have as many cells as tones, 1; got 2.'], [[7, 'x'], '#VALUE! tones must be a number; got "x".']],
  grid: [...notNumbers('grid'), [0, '#VALUE! grid must hold rates or one step, each above 0; got 0.'], [[60, 0], '#VALUE! grid must hold rates or one step, each above 0; got 0.'],
    [[60, 'x'], '#VALUE! grid must be a number; got "x".'], [[24, 48], '#N/A No rate of the grid keeps every wanted band clear.']],
  role: [[['wanted', 'Jammer'], '#VALUE! role (row 2) must be "wanted" or "unwanted" or "ignore"; got "Jammer".'], [['ignore', 'unwanted'], '#VALUE! role must be "wanted" or blank in at least one row; got no such row.'],
    [['wanted', 'unwanted', 'unwanted'], '#VALUE! role must have as many cells as low, 2; got 3.'], [['wanted', { code: '#REF!' }], '#REF!']],
  'CONFLICTS name': [[['a', 'b', 'c'], '#VALUE! name must have as many cells as low, 2; got 3.'], [['a', { code: '#REF!' }], '#REF!']],
  'SOURCES name': [[['a', 'b', 'c'], '#VALUE! name must have as many cells as tones, 2; got 3.'], [['a', { code: '#REF!' }], '#REF!']],
  response: [['bessel', '#VALUE! response must be "butterworth" or "chebyshev" or "inverse chebyshev" or "elliptic"; got "bessel".'], [3, '#VALUE! response must be "butterworth" or "chebyshev" or "inverse chebyshev" or "elliptic"; got 3.']],
  'ATTENUATION order': counts('order', null, [0, '#VALUE! order must be a whole number, 1 or more; got 0.']),
  passLow: [...notNumbers('passLow'), [-1, '#VALUE! passLow must be above 0; got -1.'], [91, '#VALUE! passLow must not be above passHigh; got 91 and 90.']],
  passHigh: [...notNumbers('passHigh'), [-1, '#VALUE! passHigh must be above 0; got -1.'], [59, '#VALUE! passLow must not be above passHigh; got 60 and 59.']],
  stopLow: [...notNumbers('stopLow'), [60, '#VALUE! stopLow must be below passLow, 60; got 60.'], ['', '#VALUE! passLow and stopLow must both be given or both be blank.']],
  stopHigh: [...notNumbers('stopHigh'), [89, '#VALUE! stopHigh must be above passHigh, 90; got 89.'], ['', '#VALUE! passHigh and stopHigh must both be given or both be blank.']],
  ripple: [...notNumbers('ripple'), blank('ripple'), [0, '#VALUE! ripple must be above 0; got 0.']],
  'FILTERORDER attenuation': [...notNumbers('attenuation'), blank('attenuation'), [1, '#VALUE! attenuation must be above ripple, 1 dB; got 1.']],
  'ATTENUATION attenuation': [...notNumbers('attenuation'), [0.5, '#VALUE! attenuation must be above ripple, 1 dB; got 0.5.']],
  'ATTENUATION frequency': [...notNumbers('frequency'), [-1, '#VALUE! frequency must be 0 or more; got -1.']],
  'JITTERSNR frequency': [...notNumbers('frequency'), [0, '#VALUE! frequency must be above 0; got 0.']],
  'JITTERLIMIT frequency': [...notNumbers('frequency'), [-1, '#VALUE! frequency must be above 0; got -1.']],
  jitter: [...notNumbers('jitter'), [0, '#VALUE! jitter must be above 0; got 0.']],
  snr: notNumbers('snr'),
  'QUANTSNR bits': [...notNumbers('bits'), [0.5, '#VALUE! bits must be 1 or more; got 0.5.']],
  'QUANTSNR rate': [...notNumbers('rate'), ['', '#VALUE! rate must be given with bandwidth; got a blank cell.'], [-1, '#VALUE! rate must be above 0; got -1.'], [10, '#VALUE! bandwidth must be at most half the rate, 5; got 10.']],
  bandwidth: [...notNumbers('bandwidth'), [-1, '#VALUE! bandwidth must be above 0; got -1.'], [51, '#VALUE! bandwidth must be at most half the rate, 50; got 51.']],
  'NOISEFOLD zones': counts('zones', null, [0, '#VALUE! zones must be a whole number, 1 or more; got 0.']),
  rejection: notNumbers('rejection'),
  'COHERENT frequency': [...notNumbers('frequency'), [-1, '#VALUE! frequency must be 0 or more; got -1.']],
  'CYCLES frequency': [...notNumbers('frequency'), [-1, '#VALUE! frequency must be 0 or more; got -1.']],
  samples: counts('samples', 2 ** 32, [2 ** 32 + 1, '#VALUE! samples must be a whole number from 1 to 4294967296; got 4294967297.']),
  'DROOP frequency': [...notNumbers('frequency'), [-1, '#VALUE! frequency must be 0 or more; got -1.']],
  'CHAIN oscillator': [...notNumbers('oscillator'), [51, '#VALUE! oscillator must be from 0 to 50, where this rate puts frequencies; got 51.']],
  decimation: [...notNumbers('decimation'), [[2, 0.5], '#VALUE! decimation must be a whole number, 1 or more; got 0.5.']],
  usable: [...notNumbers('usable'), [0, '#VALUE! usable must be above 0 and at most 1; got 0.'], [1.1, '#VALUE! usable must be above 0 and at most 1; got 1.1.']],
  bits: counts('bits', 53, [54, '#VALUE! bits must be a whole number from 1 to 53; got 54.']),
  hold: [['square', '#VALUE! hold must be "nrz" or "rz" or "doublet"; got "square".']],
};

const badFor = (id: string, parameter: string): [Given, string][] | undefined => {
  if (PLAN_FUNCTIONS.includes(id) && parameter === 'low') return planLows;
  if (PLAN_FUNCTIONS.includes(id) && parameter === 'high') return planHighs;
  return BAD[`${id} ${parameter}`] ?? BAD[parameter];
};

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

    it.skipIf(parameters.length === 1)('is one cell, or the size of the others', () => {
      const [first] = call(id, ...full.with(index, [[1, 2, 3], [4, 5, 6]]).with(index === 0 ? 1 : 0, [1, 2, 3]));
      expect(String(first![0])).toMatch(/^#VALUE! \w+ must (be one cell or the size of \w+, \d × \d cells; got \d × \d cells|be (a single cell|one column or one row of cells); got \d × \d cells|have as many cells as \w+, \d; got \d)\.$/);
    });

    if (optional) {
      it('may be left out', () => {
        const left = full.with(index, null);
        if (id === 'QUANTSNR') left[2] = null; // a bandwidth asks for a rate
        expect(call(id, ...left).flat().filter((cell) => String(cell).startsWith('#'))).toEqual([]);
      });
    }
  });
});
