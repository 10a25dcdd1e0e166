import { describe, expect, it } from 'vitest';
import type { Plan, Role } from '../../src/engine';
import { certainlyHolds, roomAtAGlance } from '../../src/engine/glance';
import { type Rational, fromNumber, toNumber } from '../../src/engine/rational';
import { type Rule, rulesOf } from '../../src/engine/rules';
import { seeded } from '../support/random';

/** Whether a rule holds, by trying every multiple in whole numbers; figures have at most six places. */
function holds({ inside, divisor, exempt }: Rule, rate: number, ppm: number): boolean {
  const whole = (x: Rational) => (x.n * 1_000_000n) / x.d;
  const [low, high] = [inside.low, inside.high].map((x) => whole(x) * BigInt(divisor) * 1_000_000n) as [bigint, bigint];
  const fs = whole(fromNumber(rate));
  const t = BigInt(ppm);
  for (let j = -400n; j <= 400n; j++) {
    if (exempt > 0 && j % BigInt(exempt) === 0n) continue;
    const size = j < 0n ? -j : j;
    const [least, most] = [j * fs * 1_000_000n - size * fs * t, j * fs * 1_000_000n + size * fs * t];
    if (most > low && least < high) return false;
  }
  return true;
}

describe('what doubles can tell of a rule', () => {
  it('is never wrong, and nearly always something: 400 random plans, rates on the ends of rules included (seed 121)', () => {
    const random = seeded(121);
    const told = { holds: 0, broken: 0, unsure: 0 };
    for (let i = 0; i < 400; i++) {
      const low = Array.from({ length: 4 }, () => random.whole(0, 3000) / 10);
      const plan: Plan = {
        low, high: low.map((edge) => Number((edge + random.pick([0, 0.1, 3])).toFixed(3))), role: low.map((): Role => random.pick(['wanted', 'unwanted'])).with(0, 'wanted'),
        guard: random.pick([0, 0.5]), harmonics: 2, cores: random.pick([1, 2, 3]), sampling: random.pick(['real', 'iq']),
      };
      const rules = rulesOf(plan);
      const onEnd = toNumber(random.pick(rules).inside.high) / random.whole(1, 3);
      const rate = random.pick([random.whole(400, 2000) / 10, Number(onEnd.toFixed(3))]);
      if (!(rate > 20)) continue;
      const ppm = random.pick([0, 100]);
      for (const rule of rules) {
        const exactly = holds(rule, rate, ppm);
        const glance = certainlyHolds(rule, rate, ppm / 1e6);
        if (glance) expect(exactly, JSON.stringify({ plan, rate, ppm })).toBe(true);
        told[glance ? 'holds' : exactly ? 'unsure' : 'broken']++;
        const room = roomAtAGlance(rule, rate);
        if (room !== null) expect([room >= 0, room <= 1]).toEqual([true, true]);
      }
    }
    expect(told.holds).toBeGreaterThan(3 * told.unsure); // rates on the ends of a rule and empty intervals are for fractions to decide
    expect(told.broken).toBeGreaterThan(500);
  });
});
