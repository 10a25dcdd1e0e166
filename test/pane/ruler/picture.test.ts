import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { Fault, type PlanRange, forbiddenRates, planRates } from '../../../src/engine';
import { boxOf, collide } from '../../../src/pane/ladder/frame';
import { lanesOf } from '../../../src/pane/ruler/lanes';
import { type RulerLayout, rulerLayout } from '../../../src/pane/ruler/layout';
import { rulerPicture } from '../../../src/pane/ruler/picture';
import { type Orders, rulesOf } from '../../../src/pane/ruler/rules';
import { type RateWindow, windowAbout } from '../../../src/pane/ruler/window';
import { type GivenRow, cells, planOf, receiver, rows } from '../ladder/plans';
import { markup } from '../markup';

const SEED = 441;

function layoutOf(given: GivenRow[], width: number, numbers: { rate?: number; guard?: number; ppm?: number } = {}, orders: Orders = { harmonics: 1, cores: 1 }, candidate = numbers.rate ?? 245.76): RulerLayout {
  const plan = planOf(given, numbers);
  const rules = rulesOf(plan, orders);
  const window: RateWindow = windowAbout(plan.rate!);
  const lanes = lanesOf(forbiddenRates(rules.plan, window.from, window.to, rules.ppm), window, candidate, 6);
  let ranges: PlanRange[] = [];
  try {
    ranges = planRates(rules.plan, window.from, window.to, rules.ppm);
  } catch (fault) {
    if (!(fault instanceof Fault)) throw fault;
  }
  return rulerLayout({ window, now: plan.rate!, candidate, ranges, lanes, rules }, width);
}

describe('the picture of the ruler', () => {
  it.each<[string, Parameters<typeof layoutOf>]>([
    ['one-band', [[['One', 120, 130]], 300, { rate: 90 }]],
    ['receiver', [receiver, 360, { rate: 409.6, guard: 0.05 }, undefined, 412]],
    ['receiver-with-harmonics-and-cores', [receiver, 800, { rate: 409.6, guard: 0.05, ppm: 20 }, { harmonics: 2, cores: 2 }, 420]],
  ])('of %s is as reviewed', async (name, given) => {
    await expect(`${markup(rulerPicture(layoutOf(...given), 245.76, 'Some ranges.'))}\n`).toMatchFileSnapshot(`snapshots/${name}.svg`);
  });

  it(`never lets texts collide, and keeps everything inside its frame (seed ${SEED})`, () => {
    fc.assert(fc.property(rows(6), cells, fc.constantFrom(300, 500, 540, 1200), fc.integer({ min: 1, max: 3 }), fc.integer({ min: 1, max: 4 }), fc.double({ min: 0.7, max: 1.3, noNaN: true }),
      (given, numbers, width, harmonics, cores, share) => {
        const layout = layoutOf([...given, ['Wanted', 70, 71]], width, numbers, { harmonics, cores }, Number((numbers.rate * share).toPrecision(6)));
        const boxes = layout.texts.filter(({ text }) => text !== '').map((one) => ({ ...boxOf(one), text: one.text }));
        expect(boxes.flatMap((a, i) => boxes.slice(i + 1).filter((b) => collide(a, b)).map((b) => [a.text, b.text]))).toEqual([]);
        expect(boxes.filter(({ left, right, top, bottom }) => left < 0 || right > layout.width || top < 0 || bottom > layout.height)).toEqual([]);
        for (const { x, width: wide } of [layout.usable, ...layout.lanes].flatMap(({ marks }) => marks)) {
          expect(x).toBeGreaterThanOrEqual(layout.left - 1e-6);
          expect(x + wide).toBeLessThanOrEqual(layout.right + 1e-6);
        }
        expect(layout.height).toBeLessThan(500);
      }), { seed: SEED, numRuns: 200 });
  });

  it('puts usable rates and what forbids them on one axis: they share no pixel but at their ends', () => {
    const { usable, lanes } = layoutOf(receiver, 1200, { rate: 409.6, guard: 0.02 });
    const kinds = lanes.filter(({ form }) => form === 'kind').flatMap(({ marks }) => marks);
    expect(usable.marks.length).toBeGreaterThan(2);
    for (const free of usable.marks.filter(({ width }) => width > 3)) {
      for (const taken of kinds) expect(Math.min(free.x + free.width, taken.x + taken.width) - Math.max(free.x, taken.x)).toBeLessThan(1.6);
    }
  });
});
