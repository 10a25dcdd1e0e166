// Which rules forbid which rates: a lane for each kind of rule, and one for each of the rules that matter most at a rate.

import type { Forbidding, ForbiddenRates } from '../../engine';
import type { RateWindow } from './window';

export interface Lanes {
  lanes: Lane[];
  /** Rules with a lane of their own, and all rules in view. */
  drawn: number;
  total: number;
}

export interface Lane {
  kind: Forbidding['kind'];
  /** null for all rules of a kind. */
  rule: Forbidding | null;
  /** How many rules the lane stands for. */
  rules: number;
  /** How a rule stands to the rate. */
  bound: Bound;
  /** What is forbidden, ascending, within the window. */
  stretches: { low: number; high: number }[];
}

/** Whether a rule forbids the rate, or ends the range about it below, above or on both sides. */
export type Bound = 'forbids' | 'below' | 'above' | 'both' | 'none';

const KINDS: Forbidding['kind'][] = ['zone edge', 'band', 'harmonic', 'image', 'offset'];

/** Finer than any picture: what all rules of a kind forbid is joined in so many steps. */
const STEPS = 4096;

/**
 * The lanes of a window: each kind of rule followed by those of its rules that are among the `most` nearest to a rate.
 */
export function lanesOf(found: ForbiddenRates, window: RateWindow, rate: number, most: number): Lanes {
  const { rules } = found;
  const standing = standingsAt(found, rate);
  const nearest = rules.map((_, i) => i).sort((i, j) => standing.distance[i]! - standing.distance[j]! || i - j).slice(0, most);
  const lanes = KINDS.flatMap((kind): Lane[] => {
    const count = rules.reduce((sum, rule) => sum + (rule.kind === kind ? 1 : 0), 0);
    if (count === 0) return [];
    const whole: Lane = { kind, rule: null, rules: count, bound: 'none', stretches: joinedCoarsely(found, kind, window) };
    return [whole, ...nearest.filter((i) => rules[i]!.kind === kind).map((i): Lane => ({
      kind, rule: rules[i]!, rules: 1, bound: boundOf(standing, i), stretches: joined(found, i, window),
    }))];
  });
  return { lanes, drawn: nearest.length, total: rules.length };
}

/** The rules that forbid a rate, as doubles can tell. */
export function forbidding({ rules, rule, low, high }: ForbiddenRates, rate: number): Forbidding[] {
  const found = new Set<number>();
  for (let k = 0; k < rule.length; k++) if (low[k]! < rate && rate < high[k]!) found.add(rule[k]!);
  return [...found].map((index) => rules[index]!);
}

interface Standings {
  /** Of each rule's forbidden rates from the rate; below 0, by how far from their end, where they hold it. */
  distance: Float64Array;
  /** The nearest forbidden rates of each rule. */
  below: Float64Array;
  above: Float64Array;
  nearestBelow: number;
  nearestAbove: number;
}

function standingsAt({ rules, rule, low, high }: ForbiddenRates, rate: number): Standings {
  const distance = new Float64Array(rules.length).fill(Infinity);
  const below = new Float64Array(rules.length).fill(-Infinity);
  const above = new Float64Array(rules.length).fill(Infinity);
  for (let k = 0; k < rule.length; k++) {
    const [index, bottom, top] = [rule[k]!, low[k]!, high[k]!];
    distance[index] = Math.min(distance[index]!, Math.max(bottom - rate, rate - top));
    if (top <= rate) below[index] = Math.max(below[index]!, top);
    if (bottom >= rate) above[index] = Math.min(above[index]!, bottom);
  }
  return { distance, below, above, nearestBelow: below.reduce((x, y) => Math.max(x, y), -Infinity), nearestAbove: above.reduce((x, y) => Math.min(x, y), Infinity) };
}

function boundOf({ distance, below, above, nearestBelow, nearestAbove }: Standings, index: number): Bound {
  if (distance.some((one) => one < 0)) return distance[index]! < 0 ? 'forbids' : 'none';
  const [ends, begins] = [Number.isFinite(below[index]!) && below[index] === nearestBelow, Number.isFinite(above[index]!) && above[index] === nearestAbove];
  return ends && begins ? 'both' : ends ? 'below' : begins ? 'above' : 'none';
}

function joined({ rule, low, high }: ForbiddenRates, index: number, { from, to }: RateWindow): Lane['stretches'] {
  const parts: Lane['stretches'] = [];
  for (let k = 0; k < rule.length; k++) if (rule[k] === index) parts.push({ low: Math.max(low[k]!, from), high: Math.min(high[k]!, to) });
  parts.sort((a, b) => a.low - b.low);
  const all: Lane['stretches'] = [];
  for (const part of parts) {
    const last = all.at(-1);
    if (last && part.low <= last.high) last.high = Math.max(last.high, part.high);
    else all.push(part);
  }
  return all;
}

/** A million intervals are counted into steps instead of being sorted. */
function joinedCoarsely({ rules, rule, low, high }: ForbiddenRates, kind: Forbidding['kind'], { from, to }: RateWindow): Lane['stretches'] {
  const changes = new Int32Array(STEPS + 1);
  const size = (to - from) / STEPS;
  for (let k = 0; k < rule.length; k++) {
    if (rules[rule[k]!]!.kind !== kind) continue;
    const first = Math.max(0, Math.floor((low[k]! - from) / size));
    changes[first]! += 1;
    changes[Math.min(STEPS, Math.max(first + 1, Math.ceil((high[k]! - from) / size)))]! -= 1;
  }
  const all: Lane['stretches'] = [];
  let depth = 0;
  let start = 0;
  for (let step = 0; step <= STEPS; step++) {
    const before = depth;
    depth += changes[step]!;
    if (before === 0 && depth > 0) start = step;
    if (before > 0 && depth === 0) all.push({ low: from + start * size, high: from + step * size });
  }
  return all;
}
