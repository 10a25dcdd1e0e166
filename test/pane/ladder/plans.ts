// Plans for the tests of pictures, in a few words.

import fc from 'fast-check';
import { type PlanFigures, figuresOf } from '../../../src/pane/figures';
import type { Plan, Role } from '../../../src/pane/plan';

export type GivenRow = [name: string, low: number, high: number, role?: Role];

export function planOf(rows: GivenRow[], { rate = 245.76, guard = 0, ppm = 0 } = {}): Plan {
  return {
    missing: [], edges: ['low', 'high'], rate, guard, ppm, places: {}, table: null, notices: [],
    rows: rows.map(([name, low, high, role = 'wanted'], index) => ({ index, place: `B${index + 2}`, name, role, low, high, centre: null, problem: null, usable: true })),
  };
}

export const figures = (rows: GivenRow[], cells = {}): PlanFigures => figuresOf(planOf(rows, cells));

/** A receiver's plan with all that a ladder shows: inverted zones, an overlap, a band across an edge, a tone, a skipped zone. */
export const receiver: GivenRow[] = [
  ['Clock leak', 10, 10, 'unwanted'],
  ['FM', 87.5, 108, 'unwanted'],
  ['Airband', 117.975, 137],
  ['AIS', 161.9625, 162.0375],
  ['Beacons', 406, 406.1],
  ['ADS-B', 1089, 1091],
];

const name = fc.oneof(
  { weight: 4, arbitrary: fc.string({ minLength: 1, maxLength: 30, unit: 'grapheme' }) },
  { weight: 1, arbitrary: fc.constantFrom('GPS', 'W', '<b>bold</b>', '=1+1', 'תדר', '周波数', '📡 dish', 'a very long name of a band that nobody will ever read to its end') },
);

const row: fc.Arbitrary<GivenRow> = fc.record({
  name, low: fc.integer({ min: 0, max: 300_000 }), width: fc.oneof(fc.constant(0), fc.integer({ min: 1, max: 4000 }), fc.integer({ min: 1, max: 150_000 })),
  role: fc.constantFrom<Role>('wanted', 'unwanted'),
}).filter(({ low, width }) => low + width > 0).map(({ name: called, low, width, role }) => [called, low / 100, (low + width) / 100, role]);

/** Up to so many rows in the first dozens of zones. */
export const rows = (most: number): fc.Arbitrary<GivenRow[]> => fc.array(row, { minLength: 1, maxLength: most });

export const cells = fc.record({
  rate: fc.integer({ min: 2000, max: 60_000 }).map((x) => x / 100), guard: fc.constantFrom(0, 0.05, 2), ppm: fc.constantFrom(0, 20),
});
