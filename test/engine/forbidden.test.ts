import { describe, expect, it } from 'vitest';
import { type Forbidding, type Plan, type Role, Fault, conflicts, forbiddenRates } from '../../src/engine';
import { type Random, seeded } from '../support/random';

function randomPlan(random: Random): Plan {
  const rows = random.whole(1, 6);
  const low = Array.from({ length: rows }, () => random.whole(0, 4000) / 10);
  return {
    low, high: low.map((edge) => Number((edge + random.pick([0, 0.1, 1, 3])).toFixed(3))),
    role: low.map((_, i): Role => (i === 0 ? 'wanted' : random.pick(['wanted', 'unwanted', 'ignore']))),
    guard: random.pick([0, 0.05, 0.5]), harmonics: random.pick([1, 2, 3]), cores: random.pick([1, 1, 2, 4]), sampling: random.pick(['real', 'iq']),
  };
}

const nameOf = ({ kind, band, against, order }: Forbidding) => [kind, band, against, order].join();

describe('forbidden rates', () => {
  it('are those at which conflicts names the same rule, and no others: 400 random plans at 20 rates each (seed 111)', () => {
    const random = seeded(111);
    let [inside, outside] = [0, 0];
    for (let i = 0; i < 400; i++) {
      const plan = randomPlan(random);
      const ppm = random.pick([0, 50, 2000]);
      const [from, to] = [random.whole(20, 90), random.whole(100, 500)];
      const { rules, rule, low, high } = forbiddenRates(plan, from, to, ppm);
      const at = (rate: number) => {
        // Within a few roundings of an end, doubles can't tell.
        if (low.some((end, k) => Math.abs(end - rate) < 1e-9 || Math.abs(high[k]! - rate) < 1e-9)) return;
        const drawn = new Set(rule.flatMap((index, k) => (low[k]! < rate && rate < high[k]! ? [nameOf(rules[index]!)] : [])));
        const broken = conflicts(plan, rate, ppm).filter(({ beforeSampling }) => !beforeSampling);
        // Of a pair, conflicts tells the worse of what is displaced by q and by −q.
        const apart = (name: string) => !broken.some((one) => nameOf(one) === name);
        expect(broken.map(nameOf).filter((name) => !drawn.has(name)), `${JSON.stringify({ plan, ppm, rate })}`).toEqual([]);
        const always = conflicts(plan, rate, ppm).some(({ beforeSampling }) => beforeSampling);
        if (!always) expect([...drawn].filter((name) => !/^(image|offset)/.test(name)).filter(apart), `${JSON.stringify({ plan, ppm, rate })}`).toEqual([]);
        if (drawn.size > 0) inside++;
        else outside++;
      };
      for (let k = 0; k < 20; k++) at(Number((from + (to - from) * random.unit()).toFixed(4)));
    }
    expect(inside).toBeGreaterThan(500);
    expect(outside).toBeGreaterThan(500);
  });

  it('are refused, with the way out, where they would be millions', () => {
    const plan: Plan = { low: [1000], high: [1001], role: ['wanted'], guard: 0, harmonics: 1, cores: 1, sampling: 'real' };
    expect(() => forbiddenRates(plan, 1e-4, 10)).toThrow('raise from, lower to');
    expect(() => forbiddenRates(plan, 0, 10)).toThrow(new Fault('input', 'from must be above 0; got 0.'));
  });
});
