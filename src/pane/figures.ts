// What a plan comes to at its rate: the engine's figures of every row, where each band stands zone by zone, and what speaks
// against the rate. Pure, and exact wherever a figure is shown.

import { Fault, bandCheck, bandGap, bandInverted, bandMargin, bandZone, conflicts, foldedFrequency, frequencyZone, imageHigh, imageLow } from '../engine';
import type { Plan, PlanRow } from './plan';
import { sentences } from './sentences';

export interface PlanFigures {
  plan: Plan;
  /** One for every row of the plan, in its order. */
  rows: RowFigures[];
  /** Those of the rows that can be drawn. */
  bands: BandFigures[];
  /** Pairs of bands, at least one of them wanted, whose images overlap or keep less than the guard; the worst first. */
  pairs: Pair[];
  /** Where there are no such pairs: those that become one within the tolerance of the clock, each at its worst; the worst first. */
  drifting: Pair[];
}

export interface RowFigures {
  row: PlanRow;
  /** How pictures and tables call the row, from 1. */
  number: number;
  /** null where the row can't be drawn. */
  band: BandFigures | null;
  problem: string | null;
}

export type State = 'clear' | 'tight' | 'crosses' | 'too wide';

export interface BandFigures {
  row: PlanRow;
  number: number;
  low: number;
  high: number;
  /** Ends of the image. */
  imageLow: number;
  imageHigh: number;
  zone: number;
  inverted: boolean;
  margin: number;
  state: State;
  /** The engine's words: `crosses 108.75`. */
  check: string;
  sections: Section[];
}

/** A part of a band that lies in one zone, or in zones that it fills from end to end. */
export interface Section {
  zone: number;
  /** Where the section goes through several zones: the last of them, else `zone`. */
  lastZone: number;
  /** Where it lands: low ≤ high. */
  low: number;
  high: number;
  /** Whether this is the side below 0 of a band that holds 0. */
  mirrored: boolean;
}

export interface Pair {
  first: BandFigures;
  second: BandFigures;
  /** Distance of the images; negative where they overlap. */
  gap: number;
  /** Where they overlap, as folded frequencies: low ≤ high. Between them where they don't. */
  low: number;
  high: number;
}

/** A band that fills more zones than this is drawn at its ends, and in between as a whole. */
const ZONES_DRAWN_ONE_BY_ONE = 4;

export function figuresOf(plan: Plan): PlanFigures {
  const rows = plan.rows.map((row, i): RowFigures => {
    const number = i + 1;
    if (!row.usable || plan.rate === null) return { row, number, band: null, problem: row.problem };
    try {
      return { row, number, band: bandFigures(row, number, plan.rate, plan.guard, plan.ppm), problem: row.problem };
    } catch (fault) {
      if (!(fault instanceof Fault)) throw fault;
      return { row, number, band: null, problem: fault.message };
    }
  });
  const bands = rows.flatMap(({ band }) => (band ? [band] : []));
  const pairs = plan.rate === null ? [] : pairsTooNear(bands, plan.rate, plan.guard);
  return { plan, rows, bands, pairs, drifting: plan.rate === null || pairs.length > 0 ? [] : pairsWithinTolerance(bands, plan.rate, plan) };
}

function bandFigures(row: PlanRow, number: number, rate: number, guard: number, ppm: number): BandFigures {
  const low = row.low!;
  const high = row.high!;
  const check = bandCheck(low, high, rate, guard, ppm);
  return {
    row, number, low, high, check,
    imageLow: imageLow(low, high, rate),
    imageHigh: imageHigh(low, high, rate),
    zone: bandZone(low, high, rate),
    inverted: bandInverted(low, high, rate),
    margin: bandMargin(low, high, rate, guard, ppm),
    state: check.startsWith('crosses') ? 'crosses' : (check as State),
    sections: sectionsOf(low, high, rate),
  };
}

// Where a band stands

/** A negative frequency stands where its mirror does. A band that holds 0 stands on both sides of it, both from the first zone up. */
function sectionsOf(low: number, high: number, rate: number): Section[] {
  if (low >= 0) return sectionsAbove0(low, high, rate);
  if (high <= 0) return sectionsAbove0(-high, -low, rate);
  const mirrored = sectionsAbove0(0, -low, rate).map((one) => ({ ...one, mirrored: true }));
  return [...mirrored, ...sectionsAbove0(0, high, rate)];
}

function sectionsAbove0(low: number, high: number, rate: number): Section[] {
  const first = frequencyZone(low, rate);
  let last = frequencyZone(high, rate);
  if (last > Number.MAX_SAFE_INTEGER) throw new Fault('input', sentences.zoneTooHigh);
  const foldedLow = foldedFrequency(low, rate);
  const foldedHigh = foldedFrequency(high, rate);
  // A band that only touches its upper edge has no part in the zone above.
  if (last > first && foldedHigh === edgeBelow(last, rate)) last--;
  if (first === last) return [section(first, foldedLow, foldedHigh)];

  const between: Section[] = [];
  if (last - first < ZONES_DRAWN_ONE_BY_ONE) {
    for (let zone = first + 1; zone < last; zone++) between.push(section(zone, 0, rate / 2));
  } else {
    between.push({ ...section(first + 1, 0, rate / 2), lastZone: last - 1 });
  }
  return [
    section(first, foldedLow, edgeBelow(first + 1, rate)),
    ...between,
    section(last, edgeBelow(last, rate), foldedHigh),
  ];
}

/** Where the lower edge of a zone lands. */
const edgeBelow = (zone: number, rate: number): number => (zone % 2 === 1 ? 0 : rate / 2);

function section(zone: number, end: number, otherEnd: number): Section {
  return { zone, lastZone: zone, low: Math.min(end, otherEnd), high: Math.max(end, otherEnd), mirrored: false };
}

// Bands against each other

function pairsTooNear(bands: BandFigures[], rate: number, guard: number): Pair[] {
  const ascending = [...bands].sort((a, b) => a.imageLow - b.imageLow);
  // The ends of images are rounded, at most by half a unit in the last place of the rate each; the engine decides what is left.
  const reach = guard + rate * 2 ** -51;
  const pairs: Pair[] = [];
  ascending.forEach((band, i) => {
    // Neighbours alone: whatever begins beyond the guard is far enough, and so is all that follows it.
    for (let j = i + 1; j < ascending.length && ascending[j]!.imageLow - band.imageHigh <= reach; j++) {
      const other = ascending[j]!;
      if (band.row.role !== 'wanted' && other.row.role !== 'wanted') continue;
      const gap = bandGap(band.low, band.high, other.low, other.high, rate);
      if (gap >= 0 && gap >= guard) continue;
      pairs.push(pairOf(band, other, gap));
    }
  });
  return pairs.sort((a, b) => a.gap - b.gap || a.first.number - b.first.number || a.second.number - b.second.number);
}

function pairsWithinTolerance(bands: BandFigures[], rate: number, { guard, ppm }: Plan): Pair[] {
  if (ppm === 0 || bands.every(({ row }) => row.role !== 'wanted')) return [];
  const plan = { low: bands.map(({ low }) => low), high: bands.map(({ high }) => high), role: bands.map(({ row }) => row.role), guard, harmonics: 1, cores: 1, sampling: 'real' as const };
  return conflicts(plan, rate, ppm).flatMap(({ kind, band, against, gap }) => (kind === 'band' ? [pairOf(bands[band]!, bands[against!]!, gap)] : []));
}

function pairOf(one: BandFigures, other: BandFigures, gap: number): Pair {
  const [first, second] = one.number < other.number ? [one, other] : [other, one];
  const inner = [Math.max(one.imageLow, other.imageLow), Math.min(one.imageHigh, other.imageHigh)] as const;
  return { first, second, gap, low: Math.min(...inner), high: Math.max(...inner) };
}
