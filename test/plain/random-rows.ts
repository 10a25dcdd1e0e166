// Random rows for every function that has a native equivalent: decimals of up to 9 or 12 digits on a common step, edges and the step beside
// them, bands that begin at 0, mirrors, guards, tolerances, words, blank cells and mistakes.

import type { CellValue } from '../../src/host/port';
import { type Random, seeded } from '../support/random';

/** What stands in the cells of a row, in the order of the arguments; null is an empty cell. */
export type Row = Exclude<CellValue, { error: string }>[];

type Make = (random: Random, digits: number) => Row;

export function randomRows(id: string, rows: number, seed: number, digits = 9): Row[] {
  const random = seeded(seed);
  return Array.from({ length: rows }, () => withMishap(random, MAKERS[id]!(random, digits)));
}

/** Now and then a cell is empty, or holds what it should not. */
function withMishap(random: Random, row: Row): Row {
  if (random.unit() > 0.03) return row;
  const place = random.whole(0, row.length - 1);
  return row.map((cell, i) => (i === place ? random.pick<Row[number]>([null, null, '', 'fast', -1, 0]) : cell));
}

/** A sampling that is given now and then, written in several ways. */
const sampling = (random: Random): Row[number] => random.pick<Row[number]>([null, '', 'real', 'iq', 'iq', ' IQ ', 'Real']);

/** A rate and a way to make decimals on its step, by whole numbers of steps. */
interface Grid {
  rate: number;
  /** No number has more steps. */
  most: number;
  /** So many steps as a decimal. */
  of(steps: number): number;
}

function grid(random: Random, digits: number, multipleOf = 1): Grid {
  const places = random.whole(0, 9);
  const rate = random.whole(1, Math.max(1, Math.floor((10 ** random.whole(1, digits) - 1) / multipleOf))) * multipleOf;
  return { rate, most: 10 ** digits - 1, of: (steps) => Number(`${steps}e-${places}`) };
}

/** A frequency in steps: anywhere, on an edge, or one step beside it. Of 12 digits, up to 1000 half rates. */
function frequency(random: Random, { rate, most }: Grid): number {
  const manner = random.unit();
  const far = most > 1e9 ? random.whole(1, 499) : 10 ** random.whole(0, 4);
  const anywhere = random.whole(0, Math.min(most, rate * far));
  const edge = Math.floor((random.whole(0, Math.min(2 * far, Math.floor((2 * most) / rate))) * rate) / 2);
  const size = manner < 0.4 ? anywhere : manner < 0.7 ? edge : Math.abs(edge + random.pick([-1, 1]));
  return Math.min(most, size) * (random.unit() < 0.15 ? -1 : 1);
}

/** Two edges in steps. */
function band(random: Random, any: Grid): [number, number] {
  const low = random.unit() < 0.1 ? 0 : frequency(random, any);
  const manner = random.unit();
  if (manner < 0.1) return [low, low];
  if (manner < 0.25) return [low, Math.min(any.most, Math.floor(((Math.floor((2 * low) / any.rate) + random.whole(1, 2)) * any.rate) / 2))]; // up to an edge
  const high = manner < 0.6 ? Math.min(any.most, low + random.whole(0, any.rate)) : frequency(random, any);
  return low <= high ? [low, high] : [high, low];
}

const toneRow: Make = (random, digits) => {
  const any = grid(random, digits);
  return [any.of(frequency(random, any)), any.of(any.rate), sampling(random)];
};

const bandRow: Make = (random, digits) => {
  const any = grid(random, digits);
  return [...band(random, any).map(any.of), any.of(any.rate), sampling(random)];
};

const guard = (random: Random, { rate, of }: Grid): Row[number] => random.pick([null, 0, of(random.whole(0, rate)), of(1)]);
const ppm = (random: Random): Row[number] => random.pick<Row[number]>([null, 0, 0.5, 20, random.whole(1, 999), random.whole(1, 99) * 1000]);

/** Half of the rows touch an edge that the tolerance has moved, or miss it by a step. */
const guardedRow: Make = (random, digits) => {
  if (random.unit() < 0.5) {
    const any = grid(random, digits);
    return [...band(random, any).map(any.of), any.of(any.rate), guard(random, any), ppm(random), sampling(random)];
  }
  // Rates of whole thousands of steps and tolerances of whole thousandths move edges by whole steps.
  const { rate, of } = grid(random, 6, 2000);
  const thousandths = random.whole(0, 9);
  const isIq = random.unit() < 0.4;
  const lower = isIq ? 2 * random.whole(0, 20) + 1 : random.whole(0, 40);
  const upper = lower + (isIq ? 2 : 1);
  const g = random.pick([0, random.whole(0, rate / 8)]);
  const beside = () => random.pick([0, 0, 1, -1]);
  const low = ((lower * rate) / 2 / 1000) * (1000 + thousandths) + g + beside();
  const high = ((upper * rate) / 2 / 1000) * (1000 - thousandths) - g + beside();
  const [a, b] = random.pick([[low, high], [low, low + 1], [high - 1, high]]).sort((x, y) => x - y) as [number, number];
  const signed = random.unit() < 0.15 ? [-b, -a] : [a, b];
  return [...signed.map(of), of(rate), of(g), thousandths * 1000, isIq ? 'iq' : random.pick([null, 'real'])];
};

const without = (row: Row, place: number): Row => row.filter((_, i) => i !== place);

/** Above so many zones a range of rates may be narrower than a cell can show, and FOLD takes the next one. */
const MOST_ZONES = 10_000;

/** Half of the bands are usable at a single rate of their highest zone, or miss that by a step. */
const lowestRateRow: Make = (random, digits) => {
  if (random.unit() < 0.5) {
    const row = without(guardedRow(random, digits), 2);
    const [low, high, g] = row as [number, number, number | null];
    const spread = high - low + 2 * (g ?? 0);
    return spread === 0 || Math.abs(low + high) < MOST_ZONES * spread ? row : lowestRateRow(random, digits);
  }
  const { of } = grid(random, digits);
  const g = random.pick([0, random.whole(1, 50)]);
  const [width, edges] = [random.whole(1, 5000), random.whole(0, 1000)];
  const low = (width + 2 * g) * edges + g + random.pick([0, 0, 1, -1]);
  const from = Math.max(0, low);
  return [of(from), of(from + width), of(g), random.pick([null, 0]), sampling(random)];
};

const decimal = (random: Random, least: number, most: number): number => random.decimal(random.whole(1, 9), random.whole(least, most));

const MAKERS: Record<string, Make> = {
  FREQ: toneRow,
  ZONE: toneRow,
  INVERTED: toneRow,
  LOW: bandRow,
  HIGH: bandRow,
  MARGIN: guardedRow,
  CHECK: guardedRow,
  GAP(random, digits) {
    const any = grid(random, digits);
    return [...[...band(random, any), ...band(random, any), any.rate].map(any.of), sampling(random)];
  },
  MINRATE: lowestRateRow,
  TOLERANCE: (random, digits) => without(guardedRow(random, digits), 4),
  JITTERSNR: (random) => [decimal(random, -3, 9), decimal(random, -15, -3)],
  JITTERLIMIT: (random) => [decimal(random, -3, 9), decimal(random, 0, 2)],
  QUANTSNR: (random) => [random.whole(1, 32), random.pick([null, decimal(random, 1, 3)]), random.pick([null, 0, decimal(random, -3, 0)])],
  ENOB: (random) => [decimal(random, 0, 2)],
  NOISEFOLD: (random) => [random.whole(1, 200), random.pick([null, 0, decimal(random, 0, 2)])],
  DROOP(random, digits) {
    const any = grid(random, digits);
    return [any.of(Math.abs(frequency(random, any))), any.of(any.rate), random.pick<Row[number]>([null, 'nrz', 'rz', 'doublet', ' RZ'])];
  },
};
