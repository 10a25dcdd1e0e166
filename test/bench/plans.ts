// Usable rates of whole plans: how the time grows with the rows, beside the number of forbidden intervals and a scan of a grid.

import { type Plan, conflicts, planRates } from '../../src/engine';
import { rulesOf } from '../../src/engine/rules';
import { toNumber } from '../../src/engine/rational';
import { seeded } from '../support/random';
import { type Row, race } from './table';

const FROM = 10;
const TO = 600;

export function benchPlans(seed: number): Row[] {
  const rows: Row[] = [];
  let first = 0;
  for (const size of [10, 20, 50, 100]) {
    const plan = randomPlan(size, seed);
    let found = 0;
    let narrowest = Infinity;
    const { time } = race(5, {
      time: () => {
        const ranges = planRates(plan, FROM, TO, 10);
        found = ranges.length;
        narrowest = Math.min(...ranges.map(({ width }) => width!).filter((width) => width > 0));
      },
    }) as { time: number };
    first ||= time;
    rows.push({ what: `PLANRATES, ${size} rows, ${intervalsOf(plan)} forbidden intervals, ${found} ranges left`, ms: time, ratio: time / first, comparedWith: '10 rows' });
    const points = (TO - FROM) / narrowest;
    const { scan } = race(1, { scan: () => [50, 200, 550].forEach((rate) => conflicts(plan, rate, 10)) }) as { scan: number };
    const whole = (scan / 3) * points;
    rows.push({ what: `a scan of the same plan on ${Math.round(points)} rates, from the time of three`, ms: whole, ratio: whole / time, comparedWith: 'PLANRATES' });
  }
  return rows;
}

/** Bands 0.02 wide between 100 and 200, half of them wanted: none overlap, nor does a harmonic, before sampling. */
function randomPlan(size: number, seed: number): Plan {
  const random = seeded(seed);
  const places = Array.from({ length: 100 }, (_, i) => ({ low: 100 + i + random.whole(0, 800) / 1000, order: random.unit() }));
  const low = places.sort((x, y) => x.order - y.order).slice(0, size).map((place) => Number(place.low.toFixed(3)));
  return {
    low, high: low.map((edge) => Number((edge + 0.02).toFixed(3))), role: low.map((_, i) => (i % 2 ? 'unwanted' : 'wanted')),
    guard: 0.005, harmonics: 5, cores: 4, sampling: 'real',
  };
}

/** Forbidden intervals that reach into FROM..TO, one for each counted multiple of each rule. */
function intervalsOf(plan: Plan): number {
  return rulesOf(plan).reduce((sum, { inside, divisor, exempt }) => {
    const [low, high] = [Math.max(0, toNumber(inside.low)) * divisor, toNumber(inside.high) * divisor];
    const multiples = Math.max(0, Math.floor(high / FROM) - Math.floor(low / TO));
    return sum + (exempt > 1 ? Math.round(multiples * (1 - 1 / exempt)) : multiples);
  }, 0);
}
