// A whole plan against the rate: which rates keep every wanted band clear of everything, how well, and what a rate breaks.
// All answers come from the same rules, so they can't disagree.

import { inPpm, readGuard, readRate, readTolerance } from './band';
import { type FreeRange, carve } from './carve';
import { checkCount, checkListing } from './counts';
import { faults, shown } from './fault';
import { GLANCE_DOUBT, certainlyHolds, roomAtAGlance } from './glance';
import { centre } from './interval';
import {
  ONE, type Rational, ZERO, absolute, add, ceiling, compare, divide, floor, fromNumber, greatest, half, least, multiply, rational, roundDown, roundUp, subtract,
  times, toNumber,
} from './rational';
import { type Plan, type Rule, rulesOf } from './rules';

/** Rates that keep a whole plan clear, ends included; null where there is no limit. */
export interface PlanRange {
  lowest: number;
  highest: number | null;
  width: number | null;
  centre: number | null;
  /** Parts per million by which the rate in the centre may move either way within the range. */
  headroom: number | null;
}

/**
 * Every range of rates from `from` to `to` at which each wanted band lies within one zone and clear of every other image, ascending.
 * Ends are rounded inward to 15 digits. Isolated rates are listed where 15 digits can tell them.
 * @param from 0: as low as the widths of the wanted bands allow
 * @param to null for no limit
 * @param ppm tolerance of the clock, 0 to below a million
 * @throws Fault where an argument is out of range, bands overlap before sampling, no rate is usable, or more than 10 000 ranges would be listed
 * @example planRates({ low: [120, 150], high: [130, 170], role: ['wanted', 'wanted'], guard: 0, harmonics: 1, cores: 1, sampling: 'real' }, 50, 70).map(({ lowest }) => lowest) // => [60] (an isolated point; S. Owen, Practical Signal Processing, 2007)
 */
export function planRates(plan: Plan, from = 0, to: number | null = null, ppm = 0): PlanRange[] {
  const ranges = freeRanges(plan, from, to, readTolerance(ppm)).flatMap(({ low, high }): PlanRange[] => {
    const lowest = roundUp(low);
    if (high === null) return [{ lowest, highest: null, width: null, centre: null, headroom: null }];
    const highest = roundDown(high);
    if (lowest > highest) return [];
    const [a, b] = [fromNumber(lowest), fromNumber(highest)];
    return [{
      lowest, highest, width: toNumber(subtract(b, a)), centre: roundDown(half(add(a, b))), headroom: roundDown(inPpm(divide(subtract(b, a), add(a, b)))),
    }];
  });
  checkListing(BigInt(ranges.length), 'raise from, lower to, or give a guard');
  if (ranges.length === 0) throw faults.noPlanRate(from || toNumber(leastRate(plan)), to);
  return ranges;
}

/** One rate of a grid and how well it suits the plan. */
export interface RankedRate {
  rate: number;
  headroom: number;
  gap: number;
  rule: BrokenRule;
}

/**
 * The rates of a grid that keep the plan clear, those with most headroom first.
 * @param grid a step, whose multiples are the rates, or a list of rates; all above 0
 * @param to null only for a list
 * @param count most rates wanted
 * @throws Fault as planRates does, and where no rate of the grid is usable
 */
export function rankRates(plan: Plan, grid: number | readonly number[], from = 0, to: number | null = null, ppm = 0, most = 10): RankedRate[] {
  for (const rate of typeof grid === 'number' ? [grid] : grid) if (!(rate > 0)) throw faults.badGrid(rate);
  if (typeof grid === 'number' && to === null) throw faults.noLimit();
  checkCount('count', most, 10_000);
  const tolerance = readTolerance(ppm);
  const guard = readGuard(plan.guard);
  const rules = checkedRules(plan);
  const usable = freeRanges(plan, from, to, tolerance);
  // The rate may move as far as rules hold without a tolerance, beyond from and to as well.
  const free = (tolerance.n === 0n ? usable : freeRanges(plan, from, to, ZERO)).map((range) => stretch(range, rules, from, to));
  const around = (rate: Rational) => free.find((range) => holds(range, rate))!;
  const candidates = typeof grid === 'number'
    ? usable.flatMap((range) => stepsWithin(range, around(range.low), grid, most))
    : grid.map(fromNumber).filter((rate) => usable.some((range) => holds(range, rate)));
  if (candidates.length === 0) throw faults.noGridRate();
  const ranked = candidates.map((rate) => ({ rate, room: headroomWithin(around(rate), rate) }));
  ranked.sort((x, y) => compare(y.room, x.room) || compare(x.rate, y.rate));
  return ranked.slice(0, most).map(({ rate, room }) => {
    const tightest = rules.map((rule) => standingAt(rule, rate, tolerance, guard)).reduce((x, y) => (compare(y.slack, x.slack) < 0 ? y : x));
    return { rate: toNumber(rate), headroom: roundDown(inPpm(room)), gap: toNumber(tightest.gap), rule: tightest.broken() };
  });
}

/** A rule at one rate, in terms that a person can follow. */
export interface BrokenRule {
  kind: Rule['kind'];
  /** Row of the wanted band, from 0. */
  band: number;
  /** Row of the other band, from 0; null for a zone edge and an offset tone. */
  against: number | null;
  /** Order of a harmonic; for an image or an offset tone, how many rate/cores it is displaced by; else 1. */
  order: number;
  /** True frequency of a zone edge or an offset tone; else null. */
  at: number | null;
  /** Whether bands overlap, or come nearer than the guard, before sampling: no rate helps. */
  beforeSampling: boolean;
}

export interface Conflict extends BrokenRule {
  /** Distance in the worst case over the tolerance, below the guard; negative where the images overlap. */
  gap: number;
}

/**
 * Every rule that a rate breaks, worst first; none where the plan is clear.
 * @param rate above 0
 * @param ppm tolerance of the clock
 * @throws Fault where an argument is out of range
 */
export function conflicts(plan: Plan, rate: number, ppm = 0): Conflict[] {
  const fs = readRate(rate);
  const tolerance = readTolerance(ppm);
  const guard = readGuard(plan.guard);
  const worst = new Map<string, Standing>();
  for (const rule of rulesOf(plan)) {
    if (certainlyHolds(rule, rate, ppm / 1e6)) continue;
    const standing = standingAt(rule, fs, tolerance, guard);
    if (standing.slack.n >= 0n) continue;
    // Difference and sum of two bands are one thing to a person.
    const name = [rule.kind, rule.band, rule.against, rule.order].join();
    const known = worst.get(name);
    if (!known || compare(standing.slack, known.slack) < 0) worst.set(name, standing);
  }
  checkListing(BigInt(worst.size), 'give fewer rows or a lower order of harmonics');
  return [...worst.values()].sort((x, y) => compare(x.slack, y.slack)).map((standing) => ({ ...standing.broken(), gap: toNumber(standing.gap) }));
}

/**
 * Parts per million by which a rate may move either way before it breaks a rule, rounded down; 0 where it breaks one.
 * @throws Fault where an argument is out of range
 */
export function headroom(plan: Plan, rate: number): number {
  const fs = readRate(rate);
  const rules = rulesOf(plan);
  const glances = rules.map((rule) => roomAtAGlance(rule, rate));
  const narrowest = glances.reduce<number>((x, y) => (y === null ? x : Math.min(x, y)), 1) + GLANCE_DOUBT;
  const decisive = rules.filter((_, i) => glances[i]! <= narrowest); // those that doubles can't tell included: null counts as 0
  return roundDown(inPpm(decisive.map((rule) => roomOf(rule, fs)).reduce(least, ONE)));
}

/** A plan's rules, or the fault of a band that no rate can help. */
function checkedRules(plan: Plan): Rule[] {
  const rules = rulesOf(plan);
  for (const rule of rules) {
    if (!neverHolds(rule)) continue;
    if (rule.kind === 'zone edge') {
      const [low, high] = [plan.low[rule.band]!, plan.high[rule.band]!];
      throw low < 0 ? faults.holdsZero(low, high) : faults.guardReachesZero(low, plan.guard);
    }
    throw faults.overlapBeforeSampling(bandInWords(plan, rule.band, 1), bandInWords(plan, rule.against!, rule.order));
  }
  return rules;
}

/** Whether 0, which is a multiple of every rate, lies inside and counts. */
const neverHolds = ({ inside, exempt }: Rule): boolean => exempt === 0 && inside.low.n < 0n && inside.high.n > 0n;

const bandInWords = ({ low, high }: Plan, row: number, order: number): string =>
  `${order > 1 ? `harmonic ${order} of ` : ''}band ${row + 1} (${shown(low[row])} to ${shown(high[row])})`;

function freeRanges(plan: Plan, from: number, to: number | null, tolerance: Rational): FreeRange[] {
  if (!(from >= 0)) throw faults.negative('from', from);
  if (to !== null && !(to > 0)) throw faults.notPositive('to', to);
  if (to !== null && from > to) throw faults.edgesReversed('from', from, 'to', to);
  const rules = checkedRules(plan);
  const least = leastRate(plan);
  const bottom = from > 0 ? fromNumber(from) : least;
  if (bottom.n === 0n) throw faults.endlessRates();
  if (to !== null && compare(bottom, fromNumber(to)) > 0) return [];
  return carve(rules, tolerance, bottom, to === null ? null : fromNumber(to));
}

/** No rate below it could carry the wanted widths, each with a guard at one side at least. */
function leastRate({ low, high, role, guard, sampling }: Plan): Rational {
  const width = low.reduce((sum, edge, i) => (role[i] === 'wanted' ? add(sum, add(subtract(fromNumber(high[i]!), fromNumber(edge)), fromNumber(guard))) : sum), ZERO);
  return times(width, sampling === 'real' ? 2n : 1n);
}

const holds = ({ low, high }: FreeRange, rate: Rational): boolean => compare(low, rate) <= 0 && (high === null || compare(rate, high) <= 0);

const headroomWithin = ({ low, high }: FreeRange, rate: Rational): Rational =>
  [subtract(ONE, divide(low, rate)), ...(high === null ? [] : [subtract(divide(high, rate), ONE)])].reduce(least, ONE);

/** A free range that from or to cut off, to where a rule bounds it. */
function stretch(range: FreeRange, rules: readonly Rule[], from: number, to: number | null): FreeRange {
  const ends = (rate: Rational) => rules.map((rule) => boundsAround(rule, rate));
  const cutBelow = from > 0 && compare(range.low, fromNumber(from)) === 0;
  const cutAbove = to !== null && compare(range.high!, fromNumber(to)) === 0;
  return {
    low: cutBelow ? ends(range.low).map(({ low }) => low).reduce(greatest, ZERO) : range.low,
    high: cutAbove ? ends(range.high!).map(({ high }) => high).reduce((x, y) => (x === null || y === null ? x ?? y : least(x, y)), null) : range.high,
  };
}

/** The multiples of a step in a usable range that have most headroom: those around the centre of the free range about it. */
function stepsWithin({ low, high }: FreeRange, about: FreeRange, step: number, most: number): Rational[] {
  const size = fromNumber(step);
  const first = ceiling(divide(low, size));
  const last = floor(divide(high!, size));
  // Headroom grows up to the centre; without a bound below, the lowest steps have all there is.
  const centre = about.low.n === 0n ? first : about.high === null ? last : floor(divide(half(add(about.low, about.high)), size));
  const middle = centre < first ? first : centre > last ? last : centre;
  const steps: Rational[] = [];
  for (let k = middle - BigInt(most); k <= middle + BigInt(most); k++) if (k >= first && k <= last) steps.push(times(size, k));
  return steps;
}

/** How a rule stands at a rate. */
interface Standing {
  /** Below 0 where it is broken: the gap less the guard. */
  slack: Rational;
  gap: Rational;
  broken(): BrokenRule;
}

function standingAt(rule: Rule, rate: Rational, tolerance: Rational, guard: Rational): Standing {
  const { low, high } = rule.inside;
  const { above, below } = multiplesAround(rule, rate);
  const spacing = divide(rate, rational(BigInt(rule.divisor)));
  const smear = (m: Rational) => multiply(absolute(m), tolerance);
  const [up, down] = [times(spacing, above), times(spacing, below)];
  const toAbove = subtract(subtract(up, smear(up)), high);
  const toBelow = subtract(low, add(down, smear(down)));
  const nearer = compare(toAbove, toBelow) <= 0;
  const slack = nearer ? toAbove : toBelow;
  return {
    slack,
    gap: add(slack, guard),
    broken: () => {
      const j = nearer ? above : below;
      const displaced = rule.kind === 'image' || rule.kind === 'offset';
      const modulo = Number(((j % BigInt(rule.divisor)) + BigInt(rule.divisor)) % BigInt(rule.divisor));
      return {
        kind: rule.kind, band: rule.band, against: rule.against, order: displaced ? modulo : rule.order,
        at: rule.against === null ? toNumber(nearer ? up : down) : null, beforeSampling: neverHolds(rule),
      };
    },
  };
}

/** How far a rate may move either way, as a fraction of it, before it breaks a rule. */
function roomOf(rule: Rule, rate: Rational): Rational {
  if (standingAt(rule, rate, ZERO, ZERO).slack.n < 0n) return ZERO;
  return headroomWithin(boundsAround(rule, rate), rate);
}

/** The ends of the forbidden intervals next to a rate that breaks no rule: 0 and null where there are none. */
function boundsAround(rule: Rule, rate: Rational): FreeRange {
  const { low, high } = rule.inside;
  const { above, below } = multiplesAround(rule, rate);
  // An empty interval forbids nothing.
  if (compare(low, high) >= 0) return { low: ZERO, high: null };
  const over = (edge: Rational, j: bigint) => divide(times(edge, BigInt(rule.divisor)), rational(j));
  return { low: over(high, above), high: below > 0n ? over(low, below) : null };
}

/** The counted multiples of rate/divisor nearest to the centre of a rule's interval from above and from below. */
function multiplesAround({ inside, divisor, exempt }: Rule, rate: Rational): { above: bigint; below: bigint } {
  const place = divide(times(centre(inside), BigInt(divisor)), rate);
  const counts = (j: bigint) => exempt === 0 || j % BigInt(exempt) !== 0n;
  let above = ceiling(place);
  let below = floor(place);
  if (!counts(above)) above++;
  if (!counts(below)) below--;
  return { above, below };
}
