// A spilled column of 100 000 rows, exact against plain, in the same loop: what does exactness cost?

import { check, freq, low, margin, zone } from '../../src/functions/landing';
import { eachRow, number, samplingKind, tone } from '../../src/functions/cells';
import { seeded } from '../support/random';
import { type Row, race } from './table';

const ROWS = 100_000;

export function benchFunctions(seed: number): Row[] {
  const random = seeded(seed);
  const rate = [[122.88]];
  const lows = Array.from({ length: ROWS }, () => [random.whole(0, 6_000_000) / 1000]);
  const highs = lows.map(([a]) => [Number((a! + random.whole(0, 20_000) / 1000).toFixed(3))]);
  const guard = [[0.5]];
  const ppm = [[20]];
  const plain = (f: number, fs: number, _sampling: string) => Math.abs(f - fs * Math.round(f / fs));
  const formula = 'the formula |f − fs·round(f/fs)| in doubles, same loop';
  const times = race(15, {
    [formula]: () => eachRow([tone('frequency', lows), number('rate', rate), samplingKind(null)], plain),
    'FREQ': () => freq(lows, rate),
    'ZONE': () => zone(lows, rate),
    'LOW': () => low(lows, highs, rate),
    'MARGIN with guard and ppm': () => margin(lows, highs, rate, guard, ppm),
    'CHECK with guard and ppm': () => check(lows, highs, rate, guard, ppm),
  });
  return Object.entries(times).map(([what, ms]) => ({
    what: `${what}, ${ROWS} rows`, ms, ratio: what === formula ? null : ms / times[formula]!, comparedWith: 'the formula',
  }));
}
