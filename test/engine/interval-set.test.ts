import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Interval, interval } from '../../src/engine/interval';
import { type IntervalSet, intersection, union } from '../../src/engine/interval-set';
import { rational, toNumber } from '../../src/engine/rational';

// Intervals on the thirds from 0 to 20, so that brute force can look at every third and every place between.
const some = fc.array(fc.tuple(fc.integer({ min: 0, max: 60 }), fc.integer({ min: -1, max: 9 })), { maxLength: 12 })
  .map((list) => list.map(([low, width]): Interval => interval(rational(BigInt(low), 3n), rational(BigInt(low + width), 3n))));
const places = Array.from({ length: 160 }, (_, k) => k / 6);
const holds = (set: readonly Interval[], x: number) => set.some(({ low, high }) => toNumber(low) <= x + 1e-9 && x - 1e-9 <= toNumber(high));
const ends = (set: IntervalSet) => set.map(({ low, high }) => [toNumber(low), toNumber(high)]);

describe('sets of intervals', () => {
  it('a union holds what any interval holds, ascending, and no two touch (fast-check)', () => {
    fc.assert(fc.property(some, (list) => {
      const set = union(list);
      for (const x of places) expect(holds(set, x)).toBe(holds(list.filter(({ low, high }) => toNumber(low) <= toNumber(high)), x));
      for (let i = 1; i < set.length; i++) expect(toNumber(set[i]!.low)).toBeGreaterThan(toNumber(set[i - 1]!.high));
    }), { seed: 81, numRuns: 500 });
  });

  it('an intersection holds what both hold (fast-check)', () => {
    fc.assert(fc.property(some, some, (x, y) => {
      const both = intersection(union(x), union(y));
      for (const place of places) expect(holds(both, place)).toBe(holds(union(x), place) && holds(union(y), place));
    }), { seed: 82, numRuns: 500 });
  });

  it('keep points, and join intervals that touch', () => {
    const at = (low: bigint, high: bigint) => interval(rational(low), rational(high));
    expect(ends(union([at(3n, 5n), at(1n, 3n), at(8n, 8n)]))).toEqual([[1, 5], [8, 8]]);
    expect(ends(intersection([at(1n, 3n)], [at(3n, 5n)]))).toEqual([[3, 3]]);
  });
});
