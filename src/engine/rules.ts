// What makes a sample rate unusable for a plan, all of it in one form:
// no multiple of rate/divisor, but for the exempt ones, may lie inside an open interval of frequencies.

import { folds, readBand, readGuard } from './band';
import { checkCount } from './counts';
import { faults, inRow } from './fault';
import { type Sampling } from './folding';
import { type Interval, centre, interval, mirror, multiple } from './interval';
import { type Rational, add, negate, subtract } from './rational';

export type Role = 'wanted' | 'unwanted' | 'ignore';

/** What a plan asks of a rate. */
export interface Plan {
  readonly low: readonly number[];
  readonly high: readonly number[];
  /** One for each band. */
  readonly role: readonly Role[];
  readonly guard: number;
  /** Orders 2 to this one of every band must stay clear; 1 for none. */
  readonly harmonics: number;
  /** Interleaved cores; 1 for none. */
  readonly cores: number;
  readonly sampling: Sampling;
}

/** One rule, before a rate is known. */
export interface Rule {
  readonly kind: 'zone edge' | 'band' | 'harmonic' | 'image' | 'offset';
  /** Row of the wanted band, from 0. */
  readonly band: number;
  /** Row of the band that it must stay clear of; null for a zone edge and for an offset tone. */
  readonly against: number | null;
  /** Order of the harmonic; 1 for all other kinds. */
  readonly order: number;
  /** No multiple of rate/divisor may lie inside, ends excluded; its centre is never below 0. The guard is part of it. */
  readonly inside: Interval;
  readonly divisor: number;
  /** Every multiple of so many rate/divisor doesn't count, 0 included; 0 exempts none. */
  readonly exempt: number;
}

/** Exempts 0 alone: no other multiple is so high. */
const ZERO_ALONE = Number.MAX_SAFE_INTEGER;

const MOST_RULES = 500_000;

/**
 * The rules of a plan. Harmonics are those of every row, wanted or not; images and offset tones come from the interleaved cores.
 * @throws Fault where columns differ in length, an edge, the guard, harmonics or cores is out of range, or no row is wanted
 */
export function rulesOf(plan: Plan): Rule[] {
  const { sampling, harmonics, cores } = plan;
  const guard = readGuard(plan.guard);
  checkCount('harmonics', harmonics, 20);
  checkCount('cores', cores, 64);
  const bands = readBands(plan);
  const wanted = bands.filter(({ role }) => role === 'wanted');
  if (wanted.length === 0) throw faults.nothingWanted();
  const most = wanted.length * bands.length * (harmonics + 1) * 2;
  if (most > MOST_RULES) throw faults.tooManyRules(most);

  const rules: Rule[] = [];
  for (const { row, band } of wanted) {
    const clear = (kind: Rule['kind'], against: number, order: number, other: Interval, cored: number) => {
      for (const inside of overlaps(band, other, guard, sampling)) rules.push(rule(kind, row, against, order, inside, cored, cored > 1 ? cored : 0));
    };
    rules.push(edgeRule(row, band, guard, sampling));
    if (cores > 1) rules.push(rule('offset', row, null, 1, widen(band, guard), cores, cores));
    for (const other of bands) {
      // Two wanted bands are one pair, named once.
      const first = other.role !== 'wanted' || other.row > row;
      if (first && other.row !== row) clear('band', other.row, 1, other.band, 1);
      if (cores > 1 && (first || other.row === row)) clear('image', other.row, 1, other.band, cores);
      for (let order = 2; order <= harmonics; order++) clear('harmonic', other.row, order, multiple(other.band, order), 1);
    }
  }
  return rules;
}

function readBands({ low, high, role, sampling }: Plan): { row: number; band: Interval; role: Role }[] {
  if (high.length !== low.length) throw faults.countsDiffer('high', high.length, 'low', low.length);
  if (role.length !== low.length) throw faults.countsDiffer('role', role.length, 'low', low.length);
  return low.map((edge, row) => ({ row, band: folds(readBand(edge, high[row]!, inRow('low', row), inRow('high', row)), sampling), role: role[row]! })).filter((band) => band.role !== 'ignore');
}

const widen = ({ low, high }: Interval, guard: Rational): Interval => interval(subtract(low, guard), add(high, guard));

/** A wanted band fits a zone: no edge lies inside it and its guards. A real band that begins at exactly 0 has no edge there. */
function edgeRule(row: number, band: Interval, guard: Rational, sampling: Sampling): Rule {
  const inside = widen(band, guard);
  if (sampling === 'iq') return rule('zone edge', row, null, 1, inside, 2, 2);
  if (band.low.n === 0n) return rule('zone edge', row, null, 1, interval(negate(inside.high), inside.high), 2, ZERO_ALONE);
  return rule('zone edge', row, null, 1, inside, 2, 0);
}

/** Two images overlap where a multiple of the rate lies inside the difference of the bands or, at real sampling, their sum. */
function overlaps(a: Interval, b: Interval, guard: Rational, sampling: Sampling): Interval[] {
  const difference = widen(interval(subtract(a.low, b.high), subtract(a.high, b.low)), guard);
  const sum = widen(interval(add(a.low, b.low), add(a.high, b.high)), guard);
  return sampling === 'real' ? [difference, sum] : [difference];
}

/** Multiples lie evenly about 0, and so do the exempt ones: an interval and its mirror are one rule. */
function rule(kind: Rule['kind'], band: number, against: number | null, order: number, inside: Interval, divisor: number, exempt: number): Rule {
  return { kind, band, against, order, inside: centre(inside).n < 0n ? mirror(inside) : inside, divisor, exempt };
}
