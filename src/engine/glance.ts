// What doubles can tell of a rule at a rate: most rules of a large plan are nowhere near being broken, and need no fractions.

import { toNumber } from './rational';
import type { Rule } from './rules';

/** Doubles are within a few roundings of the exact figures; whatever is nearer than this, in parts of the largest figure, they can't tell. */
const DOUBT = 1e-12;

/** Whether a rule certainly holds at a rate; false where doubles can't tell. */
export function certainlyHolds(rule: Rule, rate: number, tolerance: number): boolean {
  const near = neighbours(rule, rate);
  if (!near) return false;
  const { low, high, spacing, above, below } = near;
  const slack = Math.min(above * spacing - Math.abs(above) * spacing * tolerance - high, low - below * spacing - Math.abs(below) * spacing * tolerance);
  return slack > DOUBT * (Math.abs(low) + Math.abs(high) + rate);
}

/** About how far a rate may move either way, as a fraction of it, before it breaks a rule: within DOUBT; null where doubles can't tell. */
export function roomAtAGlance(rule: Rule, rate: number): number | null {
  if (!certainlyHolds(rule, rate, 0)) return null;
  const { low, high, spacing, above, below } = neighbours(rule, rate)!;
  if (!(low < high)) return null; // an empty interval forbids nothing, if it is empty
  return Math.min(1, 1 - high / (above * spacing), below > 0 ? low / (below * spacing) - 1 : 1);
}

export const GLANCE_DOUBT = 10 * DOUBT;

/** The counted multiples of rate/divisor on either side of a rule's centre; null where the centre is too near to one. */
function neighbours({ inside, divisor, exempt }: Rule, rate: number): { low: number; high: number; spacing: number; above: number; below: number } | null {
  const [low, high] = [toNumber(inside.low), toNumber(inside.high)];
  const spacing = rate / divisor;
  const place = (low + high) / 2 / spacing;
  if (!(Math.abs(place - Math.round(place)) > DOUBT * (1 + (Math.abs(low) + Math.abs(high)) / spacing))) return null;
  const counts = (j: number) => exempt === 0 || j % exempt !== 0;
  const [above, below] = [Math.ceil(place), Math.floor(place)];
  return { low, high, spacing, above: counts(above) ? above : above + 1, below: counts(below) ? below : below - 1 };
}
