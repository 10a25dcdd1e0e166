// Sets of numbers as ascending closed intervals, no two of which touch.

import { type Interval, intersect, isEmpty } from './interval';
import { compare, greatest } from './rational';

export type IntervalSet = readonly Interval[];

/** The set that intervals in any order cover; those that overlap or touch become one. */
export function union(intervals: readonly Interval[]): IntervalSet {
  const ascending = intervals.filter((x) => !isEmpty(x)).sort((x, y) => compare(x.low, y.low));
  const merged: Interval[] = [];
  for (const next of ascending) {
    const last = merged.at(-1);
    if (last && compare(next.low, last.high) <= 0) merged[merged.length - 1] = { low: last.low, high: greatest(last.high, next.high) };
    else merged.push(next);
  }
  return merged;
}

/** What lies in both sets. */
export function intersection(x: IntervalSet, y: IntervalSet): IntervalSet {
  const common: Interval[] = [];
  for (let i = 0, j = 0; i < x.length && j < y.length;) {
    const both = intersect(x[i]!, y[j]!);
    if (!isEmpty(both)) common.push(both);
    if (compare(x[i]!.high, y[j]!.high) <= 0) i++;
    else j++;
  }
  return common;
}
