import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Fault, type PlanRange, conflicts, planRates } from '../../../src/engine';
import { middleOf, nextMiddle, rangeOf, rateAt, roomiest, stepped } from '../../../src/pane/ruler/candidate';
import { rulesOf } from '../../../src/pane/ruler/rules';
import { cells, planOf, rows } from '../ladder/plans';

const SEED = 411;

const range = (lowest: number, highest: number): PlanRange => ({
  lowest, highest, width: highest - lowest, centre: (lowest + highest) / 2, headroom: ((highest - lowest) / (highest + lowest)) * 1e6,
});
const free = { step: null };

describe('the rate that a point on the ruler means', () => {
  const usable = [range(100.1, 108), range(120.123456, 120.123457), range(150, 150)];

  it.each([
    //                                              point      reach  step  rate
    ['a short decimal near it                    ', 103.4567, 0.3, null, 103.5],
    ['a short decimal where nothing is usable    ', 113.4567, 0.3, null, 113.5],
    ['the nearest usable rate within reach       ', 99.97, 0.3, null, 100.1],
    ['a decimal inside a range far below reach   ', 120.3, 0.3, null, 120.123457],
    ['the one rate of an isolated range          ', 150.2, 0.3, null, 150],
    ['a multiple of the step inside the range    ', 100, 0.3, 0.48, 100.32],
    ['the nearest multiple where none is inside  ', 120.3, 0.3, 0.48, 120.48],
  ])('is %s', (_, point, reach, step, rate) => {
    expect(rateAt(point, usable, reach, { step })).toBe(rate);
  });

  it(`never fails where a usable rate is within reach: the engine's own verdict on random plans (seed ${SEED})`, () => {
    let chosen = 0;
    fc.assert(fc.property(rows(4), cells, fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 5, maxLength: 5 }), fc.constantFrom(null, 0.01, 0.32), (given, numbers, shares, step) => {
      const { plan, ppm } = rulesOf(planOf(given, numbers), { harmonics: 1, cores: 1 });
      const [from, to] = [50, 400];
      let ranges: PlanRange[];
      try {
        ranges = planRates(plan, from, to, ppm);
      } catch (fault) {
        if (fault instanceof Fault) return;
        throw fault;
      }
      const offered = [
        ...shares.map((share) => rateAt(from + share * (to - from), ranges, 0.5, { step })).filter((rate) => rangeOf(rate, ranges)),
        ...roomiest(ranges, { step }, 5).map(({ rate }) => rate),
        ...[1, -1].flatMap((direction) => nextMiddle(200, direction as 1 | -1, ranges, { step }) ?? []),
      ];
      for (const rate of offered) {
        expect(conflicts(plan, rate, ppm), `${rate}`).toEqual([]);
        if (step !== null) expect(Math.abs(Math.round(rate / step) * step - rate)).toBeLessThan(1e-9);
        chosen++;
      }
      // Within reach of a usable rate, what is meant is usable, but for the grid.
      if (step === null) for (const { lowest, highest } of ranges.slice(0, 10)) expect(rangeOf(rateAt((lowest + highest!) / 2 + 0.2, ranges, 0.5, free), ranges)).not.toBeNull();
    }), { seed: SEED, numRuns: 400 });
    expect(chosen).toBeGreaterThan(500);
  });
});

describe('steps of the candidate', () => {
  it.each([
    //  rate      by   width  step   next
    [100.237, 1, 200, null, 101],
    [100.237, -1, 200, null, 100],
    [100, 1, 200, null, 101],
    [100, -10, 200, null, 90],
    [100.1, 1, 2, null, 100.11],
    [100.1, 1, 200, 30.72, 122.88],
    [122.88, 1, 200, 30.72, 153.6],
    [122.88, -10, 200, 30.72, 30.72],
    [0.3, 1, 20, 0.1, 0.4],
  ])('from %d by %d in a window %d wide on a step of %s lead to %d', (rate, by, width, step, next) => {
    expect(stepped(rate, by, width, { step })).toBe(next);
  });

  it('go from range to range, passing those without a multiple of the step', () => {
    const usable = [range(90, 92), range(100.1, 100.3), range(110, 114)];
    expect(nextMiddle(91, 1, usable, free)).toBe(100.2);
    expect(nextMiddle(91, 1, usable, { step: 1 })).toBe(112);
    expect(nextMiddle(112, -1, usable, { step: 1 })).toBe(91);
    expect(nextMiddle(112, 1, usable, free)).toBeNull();
  });

  it('middles are short and near the middle', () => {
    expect(middleOf(range(100.0123, 108.987), free)).toBe(104.5);
    expect(middleOf(range(120.123456, 120.123457), free)).toBeCloseTo(120.1234565, 7);
    expect(middleOf(range(100.1, 100.3), { step: 7 })).toBeNull();
  });

  it('the roomiest come first', () => {
    const offers = roomiest([range(90, 91), range(100, 108), range(110, 114)], free, 2);
    expect(offers.map(({ rate, headroom }) => [rate, Math.floor(headroom)])).toEqual([[104, 38461], [112, 17857]]); // 4/104 and 2/112
  });
});
