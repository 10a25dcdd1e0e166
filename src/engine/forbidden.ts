// The rates that each rule of a plan forbids, for pictures: which rule speaks against which rates.

import { readTolerance } from './band';
import { faults } from './fault';
import { toNumber } from './rational';
import { type Plan, type Rule, rulesOf } from './rules';

/** What forbids: the fields of a rule, with the order as conflicts tell it. */
export interface Forbidding {
  kind: Rule['kind'];
  /** Row of the wanted band, from 0. */
  band: number;
  /** Row of the other band, from 0; null for a zone edge and an offset tone. */
  against: number | null;
  /** Order of a harmonic; for an image or an offset tone, how many rate/cores it is displaced by; else 1. */
  order: number;
}

/** Intervals of rates, side by side in lists because there may be a million: which of `rules` forbids what lies between low and high. */
export interface ForbiddenRates {
  rules: Forbidding[];
  rule: number[];
  low: number[];
  high: number[];
}

const MOST_INTERVALS = 2_000_000;

/**
 * Every interval of rates that a rule forbids and that reaches into from..to, ends excluded; in no order, and not joined.
 * Ends are doubles within a few roundings of the exact ones: what lies near an end is for planRates and conflicts to decide.
 * @param from above 0
 * @param to not below from
 * @throws Fault where an argument is out of range, or there are more than two million intervals
 * @example forbiddenRates({ low: [120], high: [130], role: ['wanted'], guard: 0, harmonics: 1, cores: 1, sampling: 'real' }, 60, 90).low // => [80, 60]
 */
export function forbiddenRates(plan: Plan, from: number, to: number, ppm = 0): ForbiddenRates {
  if (!(from > 0)) throw faults.notPositive('from', from);
  if (!(from <= to && to < Infinity)) throw faults.edgesReversed('from', from, 'to', to);
  const tolerance = toNumber(readTolerance(ppm));
  const found: ForbiddenRates = { rules: [], rule: [], low: [], high: [] };
  let before: Rule | null = null;
  let byOrder = new Map<number, number>();
  for (const rule of rulesOf(plan)) {
    // Difference and sum of two bands are one thing to a person; they stand side by side.
    if (!before || before.kind !== rule.kind || before.band !== rule.band || before.against !== rule.against || before.order !== rule.order) byOrder = new Map();
    before = rule;
    const low = (Math.max(0, toNumber(rule.inside.low)) * rule.divisor) / (1 + tolerance);
    const high = (toNumber(rule.inside.high) * rule.divisor) / (1 - tolerance);
    if (!(low < high)) continue;
    const last = Math.floor(high / from);
    const first = Math.max(1, Math.ceil(low / to));
    if (found.rule.length + last - first > MOST_INTERVALS) throw faults.tooMuchWork();
    for (let j = first; j <= last; j++) {
      if (rule.exempt > 0 && j % rule.exempt === 0) continue;
      const order = rule.kind === 'image' || rule.kind === 'offset' ? j % rule.divisor : rule.order;
      let index = byOrder.get(order);
      if (index === undefined) {
        index = found.rules.push({ kind: rule.kind, band: rule.band, against: rule.against, order }) - 1;
        byOrder.set(order, index);
      }
      found.rule.push(index);
      found.low.push(low / j);
      found.high.push(high / j);
    }
  }
  return found;
}
