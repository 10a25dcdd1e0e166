import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type RateWindow, holding, pannedRates, windowAbout, zoomedRates } from '../../../src/pane/ruler/window';

const SEED = 431;

describe('the window of the ruler', () => {
  const window: RateWindow = { from: 100, to: 200 };

  it.each<[string, RateWindow, RateWindow]>([
    //                                                                       from     to
    ['opens about a rate                  ', windowAbout(409.6), { from: 348, to: 471 }],
    ['zooms about its middle              ', zoomedRates(window, 0.5), { from: 125, to: 175 }],
    ['zooms about a rate                  ', zoomedRates(window, 0.5, 120), { from: 110, to: 160 }],
    ['goes up                             ', pannedRates(window, 0.25), { from: 125, to: 225 }],
    ['moves to a rate that it did not hold', holding(window, 409.6), { from: 359.6, to: 459.6 }],
    ['stays where it holds a rate         ', holding(window, 122.88), window],
  ])('%s', (_, moved, expected) => {
    expect(moved).toEqual(expected);
  });

  it(`stays above 0 with its ends apart, whatever is done (seed ${SEED})`, () => {
    fc.assert(fc.property(fc.double({ min: 1e-6, max: 1e12, noNaN: true }), fc.array(fc.tuple(fc.boolean(), fc.double({ min: 0.01, max: 50, noNaN: true }))), (rate, steps) => {
      let now = windowAbout(rate);
      for (const [zoom, by] of steps) {
        now = zoom ? zoomedRates(now, by) : pannedRates(now, by - 25);
        expect(now.from).toBeGreaterThan(0);
        expect(now.to).toBeGreaterThan(now.from);
      }
    }), { seed: SEED, numRuns: 500 });
  });
});
