import { describe, expect, it } from 'vitest';
import { Fault, type Plan, type PlanRange, type Role, conflicts, headroom, planRates, rankRates } from '../../src/engine';
import { modelClear } from '../support/plan-model';
import { type Random, seeded } from '../support/random';

/** A plan of 1 to 12 rows, most of them narrow, so that many have usable rates. */
function randomPlan(random: Random): Plan {
  const rows = random.whole(1, 12);
  const low: number[] = [];
  const high: number[] = [];
  const role: Role[] = [];
  for (let i = 0; i < rows; i++) {
    const width = random.pick([0, 0.1, 1, 2.5, 8]);
    const start = random.whole(0, 19) === 0 ? 0 : random.whole(1, 400) / random.pick([1, 1, 2, 4, 10]);
    low.push(start);
    high.push(Number((start + width).toFixed(3)));
    role.push(i === 0 ? 'wanted' : random.pick(['wanted', 'unwanted', 'unwanted', 'ignore'] as const));
  }
  return {
    low, high, role, guard: random.pick([0, 0, 0.05, 0.5]), harmonics: random.pick([1, 1, 2, 3, 5]), cores: random.pick([1, 1, 1, 2, 3, 4, 8]),
    sampling: random.pick(['real', 'iq'] as const),
  };
}

const ranges = (plan: Plan, from: number, to: number, ppm: number): PlanRange[] => {
  try {
    return planRates(plan, from, to, ppm);
  } catch (fault) {
    if (fault instanceof Fault && fault.kind === 'none') return [];
    throw fault;
  }
};

function beside(x: number, step: 1n | -1n): number {
  const [digits, exponent] = x.toExponential(14).split('e') as [string, string];
  return Number(`${BigInt(digits.replace('.', '')) + step}e${Number(exponent) - 14}`);
}

describe('usable rates of a whole plan', () => {
  it('are those of the definition, enumerated: 2000 random plans (seed 101)', () => {
    const random = seeded(101);
    let listed = 0;
    let points = 0;
    for (let i = 0; i < 2000; i++) {
      const plan = randomPlan(random);
      const ppm = random.pick([0, 0, 10, 100, 1500]);
      const [from, to] = [random.whole(5, 100), random.whole(200, 1000)];
      const found = ranges(plan, from, to, ppm);
      listed += found.length;
      const wrong: unknown[] = [];
      const inRange = (rate: number) => found.some(({ lowest, highest }) => lowest <= rate && rate <= highest!);
      const look = (rate: number, where: string) => {
        if (rate >= from && rate <= to && modelClear(plan, rate, ppm) !== inRange(rate)) wrong.push({ rate, where });
      };
      for (const [k, { lowest, highest, centre }] of found.slice(0, 60).entries()) {
        if (lowest === highest) points++;
        for (const rate of [lowest, highest!, centre!, lowest + (highest! - lowest) * random.unit()]) look(Number(rate.toPrecision(15)), 'inside');
        look(beside(lowest, -1n), 'just below');
        look(beside(highest!, 1n), 'just above');
        const before = found[k - 1]?.highest ?? from;
        look(Number((before + (lowest - before) * random.unit()).toPrecision(15)), 'gap');
      }
      for (let k = 0; k < 40; k++) look(Number((from + (to - from) * random.unit()).toPrecision(random.whole(2, 8))), 'anywhere');
      expect({ plan, ppm, from, to, wrong }).toEqual({ plan, ppm, from, to, wrong: [] });
    }
    expect(listed).toBeGreaterThan(5000);
    expect(points).toBeGreaterThan(10);
  });

  it('also where thousands of ranges are left, which are carved another way: 12 dense plans (seed 105)', () => {
    const random = seeded(105);
    let listed = 0;
    for (let i = 0; i < 12; i++) {
      const low = Array.from({ length: random.whole(3, 8) }, (_, k) => 100 + 10 * k + random.whole(0, 5000) / 1000);
      const plan: Plan = {
        low, high: low.map((edge) => Number((edge + 0.02).toFixed(3))), role: low.map((_, k) => (k % 2 ? 'unwanted' : 'wanted')), guard: 0,
        harmonics: random.whole(1, 5), cores: random.pick([1, 3, 4]), sampling: random.pick(['real', 'iq'] as const),
      };
      const ppm = random.pick([0, 5]);
      const found = ranges(plan, 15, 600, ppm);
      listed += found.length;
      const samples = [
        ...Array.from({ length: 300 }, () => Number((15 + 585 * random.unit() ** 2).toPrecision(random.whole(3, 9)))),
        ...Array.from({ length: 100 }, () => random.pick(found)).flatMap(({ lowest, highest }) => [lowest, highest!, beside(lowest, -1n), beside(highest!, 1n)]).filter((rate) => rate >= 15 && rate <= 600),
      ];
      const wrong = samples.filter((rate) => modelClear(plan, rate, ppm) !== found.some(({ lowest, highest }) => lowest <= rate && rate <= highest!));
      expect({ plan, ppm, wrong }).toEqual({ plan, ppm, wrong: [] });
    }
    expect(listed).toBeGreaterThan(5_000);
  });

  it('leave conflicts nothing to report, and everywhere else it has something: 600 random plans (seed 102)', () => {
    const random = seeded(102);
    let clear = 0;
    for (let i = 0; i < 600; i++) {
      const plan = randomPlan(random);
      const ppm = random.pick([0, 0, 50]);
      const found = ranges(plan, 20, 600, ppm);
      const rates = [
        ...found.slice(0, 10).flatMap(({ lowest, highest, centre }) => [lowest, highest!, centre!]),
        ...Array.from({ length: 10 }, () => Number((20 + 580 * random.unit()).toPrecision(random.whole(2, 8)))),
      ];
      for (const rate of rates) {
        const broken = conflicts(plan, rate, ppm);
        expect([plan, rate, broken.length === 0]).toEqual([plan, rate, modelClear(plan, rate, ppm)]);
        expect(broken.every(({ gap }, k) => gap < plan.guard + 1e-12 && (k === 0 || broken[k - 1]!.gap <= gap))).toBe(true);
        if (broken.length === 0) clear++;
      }
    }
    expect(clear).toBeGreaterThan(1000);
  });

  it('have a headroom that holds as it stands and fails one step further: 1500 random plans (seed 103)', () => {
    const random = seeded(103);
    let positive = 0;
    for (let i = 0; i < 1500; i++) {
      const plan = randomPlan(random);
      const found = ranges(plan, 20, 600, 0);
      const rate = random.pick(found.map(({ lowest, highest }) => Number((lowest + (highest! - lowest) * random.unit()).toPrecision(15))).concat(random.whole(20, 600)));
      const ppm = headroom(plan, rate);
      expect([plan, rate, modelClear(plan, rate, ppm, true)]).toEqual([plan, rate, ppm > 0 || modelClear(plan, rate, 0)]);
      if (ppm === 0 || ppm >= 999_999) continue;
      positive++;
      expect([plan, rate, modelClear(plan, rate, beside(ppm, 1n), true)]).toEqual([plan, rate, false]);
    }
    expect(positive).toBeGreaterThan(800);
  });
});

describe('ranked rates', () => {
  it('are the best of a step, by headroom: 200 random plans against every rate of the grid (seed 104)', () => {
    const random = seeded(104);
    let ranked = 0;
    for (let i = 0; i < 200; i++) {
      const plan = randomPlan(random);
      const step = random.pick([0.5, 1, 2.5]);
      const ppm = random.pick([0, 100]);
      const all = Array.from({ length: Math.floor(300 / step) + 1 }, (_, k) => k * step).filter((rate) => rate >= 40 && rate <= 300)
        .filter((rate) => modelClear(plan, rate, ppm)).map((rate) => ({ rate, headroom: headroom(plan, rate) }))
        .sort((x, y) => y.headroom - x.headroom || x.rate - y.rate);
      let best: { rate: number; headroom: number }[] = [];
      try {
        best = rankRates(plan, step, 40, 300, ppm, 5);
      } catch (fault) {
        expect((fault as Fault).kind).toBe('none');
      }
      expect(best.every(({ rate }) => conflicts(plan, rate, ppm).length === 0)).toBe(true);
      expect([plan, best.map((one) => [one.rate, one.headroom])]).toEqual([plan, all.slice(0, 5).map((one) => [one.rate, one.headroom])]);
      ranked += best.length;
    }
    expect(ranked).toBeGreaterThan(100);
  });
});
