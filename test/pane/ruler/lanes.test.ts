import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { forbiddenRates } from '../../../src/engine';
import { forbidding, lanesOf } from '../../../src/pane/ruler/lanes';
import { rulesOf } from '../../../src/pane/ruler/rules';
import { type GivenRow, cells, planOf, rows } from '../ladder/plans';

const SEED = 421;
const window = { from: 60, to: 200 };

const lanesFor = (given: GivenRow[], rate: number, most: number, orders = { harmonics: 1, cores: 1 }) => {
  const { plan, ppm } = rulesOf(planOf(given), orders);
  return lanesOf(forbiddenRates(plan, window.from, window.to, ppm), window, rate, most);
};

describe('lanes of the ruler', () => {
  // One band from 120 to 130: the rates 240/k to 260/k are forbidden.
  const one: GivenRow[] = [['One', 120, 130]];

  it('show what a rule forbids within the window, and how it stands to the rate', () => {
    const { lanes, drawn, total } = lanesFor(one, 100, 6);
    expect({ drawn, total }).toEqual({ drawn: 1, total: 1 });
    expect(lanes.map(({ kind, rules, bound }) => [kind, rules, bound])).toEqual([['zone edge', 1, 'none'], ['zone edge', 1, 'both']]);
    const stretches = lanes[1]!.stretches.map(({ low, high }) => [low, high].map((x) => Number(x.toFixed(4))));
    expect(stretches).toEqual([[60, 65], [80, 86.6667], [120, 130]]);
    expect(lanesFor(one, 125, 6).lanes[1]!.bound).toBe('forbids');
    expect(lanesFor(one, 140, 6).lanes[1]!.bound).toBe('below');
  });

  it('draw the nearest rules alone, and count all', () => {
    const many = Array.from({ length: 8 }, (_, i): GivenRow => [`Band ${i}`, 70 + 13 * i, 71 + 13 * i]);
    const { lanes, drawn, total } = lanesFor(many, 100, 4, { harmonics: 3, cores: 2 });
    expect(drawn).toBe(4);
    expect(lanes.filter(({ rule }) => rule)).toHaveLength(4);
    expect(total).toBe(lanes.filter(({ rule }) => !rule).reduce((sum, { rules }) => sum + rules, 0));
    expect(total).toBeGreaterThan(50);
  });

  it(`agree with one another at every rate: kinds with their rules, and both with what forbids it (seed ${SEED})`, () => {
    let [some, none] = [0, 0];
    fc.assert(fc.property(rows(4), cells, fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 3 }), (given, numbers, harmonics, cores) => {
      const rules = rulesOf(planOf([...given, ['Wanted', 70, 71]], numbers), { harmonics, cores });
      const found = forbiddenRates(rules.plan, window.from, window.to, rules.ppm);
      const { lanes } = lanesOf(found, window, 100, Infinity);
      for (let rate = 60.37; rate < 200; rate += 7.9) {
        const covers = ({ stretches }: (typeof lanes)[number], slack: number) => stretches.some(({ low, high }) => low - slack < rate && rate < high + slack);
        const ofRules = lanes.filter((lane) => lane.rule && covers(lane, 0)).map(({ rule }) => rule);
        expect(new Set(ofRules)).toEqual(new Set(forbidding(found, rate)));
        for (const lane of lanes.filter(({ rule }) => !rule)) if (ofRules.some((rule) => rule!.kind === lane.kind)) expect(covers(lane, 0)).toBe(true);
        if (ofRules.length > 0) some++;
        else none++;
      }
    }), { seed: SEED, numRuns: 150 });
    expect(some).toBeGreaterThan(200);
    expect(none).toBeGreaterThan(50);
  });
});
