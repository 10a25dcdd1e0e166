// Rates to offer: decimals that a person would write, on the clock's grid where there is one, and never rounded off a usable range.

import type { PlanRange } from '../../engine';

/** The rate that a place on the ruler means. */
export interface Grid {
  /** Multiples of this step alone; null for any rate. */
  step: number | null;
}

/**
 * The rate meant by a point on the ruler: within `reach` of it, with as few digits as that allows; where the point is within reach of a
 * usable range, a rate of that range, if the grid has one.
 * @param ranges usable ranges, ascending
 * @param reach above 0: how far the point may be off
 */
export function rateAt(point: number, ranges: readonly PlanRange[], reach: number, { step }: Grid): number {
  const range = rangeNear(point, ranges, reach);
  if (range) {
    const inside = rateWithin(range, point, reach, { step });
    if (inside !== null) return inside;
  }
  return step === null ? shortest(point, reach, 0, Infinity) : multiple(Math.max(1, Math.round(point / step)), step);
}

/** The middle of a usable range in as few digits as stay near it, or the multiple nearest to it; null where the range holds none. */
export const middleOf = (range: PlanRange, grid: Grid): number | null =>
  rateWithin(range, range.centre ?? range.lowest, (range.width ?? 0) / 20, grid);

/** The usable range that a rate lies in. */
export const rangeOf = (rate: number, ranges: readonly PlanRange[]): PlanRange | null => rangeNear(rate, ranges, 0);

/** The middle of the next usable range above (1) or below (−1) that the grid reaches; null where there is none in view. */
export function nextMiddle(rate: number, direction: 1 | -1, ranges: readonly PlanRange[], grid: Grid): number | null {
  const ordered = direction === 1 ? ranges : ranges.toReversed();
  for (const range of ordered) {
    if (direction === 1 ? range.lowest <= rate : (range.highest ?? Infinity) >= rate) continue;
    const middle = middleOf(range, grid);
    if (middle !== null) return middle;
  }
  return null;
}

/** The next rate above (1) or below (−1) on the grid, or on a decimal step that suits the width of the window. */
export function stepped(rate: number, by: number, width: number, { step }: Grid): number {
  const unit = step ?? Number(`1e${Math.floor(Math.log10(width / 200))}`);
  const at = rate / unit;
  const nearest = Math.round(at);
  const onGrid = multiple(nearest, unit) === rate;
  return multiple(Math.max(1, onGrid ? nearest + by : by > 0 ? Math.floor(at) + by : Math.ceil(at) + by), unit);
}

/** The nearest rate of the grid. */
export const onGrid = (rate: number, { step }: Grid): number => (step === null ? rate : multiple(Math.max(1, Math.round(rate / step)), step));

/** A rate and how many ppm it may move either way within its usable range. */
export interface Offer {
  rate: number;
  headroom: number;
}

/** Rates of the most roomy of the usable ranges, one of each, those with most headroom first. */
export function roomiest(ranges: readonly PlanRange[], grid: Grid, most: number): Offer[] {
  const found: Offer[] = [];
  for (const range of ranges.toSorted((a, b) => (b.headroom ?? Infinity) - (a.headroom ?? Infinity) || a.lowest - b.lowest)) {
    const rate = middleOf(range, grid);
    if (rate !== null) found.push({ rate, headroom: (Math.min(rate - range.lowest, (range.highest ?? Infinity) - rate) / rate) * 1e6 });
    if (found.length === most) break;
  }
  return found.sort((a, b) => b.headroom - a.headroom || a.rate - b.rate);
}

function rangeNear(rate: number, ranges: readonly PlanRange[], reach: number): PlanRange | null {
  let nearest: PlanRange | null = null;
  let distance = Infinity;
  for (const range of ranges) {
    const off = Math.max(range.lowest - rate, rate - (range.highest ?? Infinity), 0);
    if (off <= reach && off < distance) [nearest, distance] = [range, off];
  }
  return nearest;
}

function rateWithin({ lowest, highest }: PlanRange, wish: number, reach: number, { step }: Grid): number | null {
  const most = highest ?? Infinity;
  const near = Math.min(Math.max(wish, lowest), most);
  if (step === null) return shortest(near, reach, lowest, most);
  const k = Math.round(near / step);
  const rates = [k, k + 1, k - 1].filter((count) => count >= 1).map((count) => multiple(count, step));
  return rates.find((rate) => rate >= lowest && rate <= most) ?? null;
}

/** The decimal of fewest digits within `reach` of x and between the ends; x itself lies between them, and they have at most 15 digits. */
function shortest(x: number, reach: number, lowest: number, highest: number): number {
  for (let digits = 1; digits < 15; digits++) {
    const rate = Number(x.toPrecision(digits));
    if (rate > 0 && rate >= lowest && rate <= highest && Math.abs(rate - x) <= reach) return rate;
  }
  // Ends are decimals of 15 digits, so rounding to as many can't leave them.
  return Number(x.toPrecision(15));
}

/** k·step as the decimal it is: the product of two doubles is within two roundings, which 15 digits don't show. */
const multiple = (k: number, step: number): number => Number((k * step).toPrecision(15));
