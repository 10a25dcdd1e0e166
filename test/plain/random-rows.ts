// Random rows for every function that has a native equivalent: decimals of up to 9 digits on a common step, edges and the step beside
// them, bands that begin at 0, mirrors, guards, tolerances, words, blank cells and mistakes.

import type { CellValue } from '../../src/host/port';
import { type Random, seeded } from '../support/random';

/** What stands in the cells of a row, in the order of the arguments; null is an empty cell. */
export type Row = Exclude<CellValue, { error: string }>[];

type Make = (random: Random) => Row;

export function randomRows(id: string, rows: number, seed: number): Row[] {
  const random = seeded(seed);
  return Array.from({ length: rows }, () => withMishap(random, MAKERS[id]!(random)));
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
  /** So many steps as a decimal. */
  of(steps: number): number;
}

function grid(random: Random, digits = random.whole(1, 9), multipleOf = 1): Grid {
  const places = random.whole(0, 9);
  const of = (steps: number) => Number(`${steps}e-${places}`);
  const most = Math.max(1, Math.floor((10 ** digits - 1) / multipleOf));
  return { rate: random.whole(1, most) * multipleOf, of };
}

const MOST = 999_999_999;

/** A frequency in steps: anywhere, on an edge, or one step beside it. */
function frequency(random: Random, rate: number): number {
  const manner = random.unit();
  const far = 10 ** random.whole(0, 4);
  const anywhere = random.whole(0, Math.min(MOST, rate * far));
  const edge = Math.floor((random.whole(0, Math.min(2 * far, Math.floor((2 * MOST) / rate))) * rate) / 2);
  const size = manner < 0.4 ? anywhere : manner < 0.7 ? edge : Math.abs(edge + random.pick([-1, 1]));
  return Math.min(MOST, size) * (random.unit() < 0.15 ? -1 : 1);
}

/** Two edges in steps. */
function band(random: Random, rate: number): [number, number] {
  const low = random.unit() < 0.1 ? 0 : frequency(random, rate);
  const manner = random.unit();
  if (manner < 0.1) return [low, low];
  const high = manner < 0.6 ? low + random.whole(0, rate) : frequency(random, rate);
  return low <= high ? [low, high] : [high, low];
}

const toneRow: Make = (random) => {
  const { rate, of } = grid(random);
  return [of(frequency(random, rate)), of(rate), sampling(random)];
};

const bandRow: Make = (random) => {
  const { rate, of } = grid(random);
  return [...band(random, rate).map(of), of(rate), sampling(random)];
};

const guard = (random: Random, { rate, of }: Grid): Row[number] => random.pick([null, 0, of(random.whole(0, rate)), of(1)]);
const ppm = (random: Random): Row[number] => random.pick<Row[number]>([null, 0, 0.5, 20, random.whole(1, 999), random.whole(1, 99) * 1000]);

/** Half of the rows touch an edge that the tolerance has moved, or miss it by a step. */
const guardedRow: Make = (random) => {
  if (random.unit() < 0.5) {
    const any = grid(random);
    return [...band(random, any.rate).map(any.of), any.of(any.rate), guard(random, any), ppm(random), sampling(random)];
  }
  // Rates of whole thousands of steps and tolerances of whole thousandths move edges by whole steps.
  const { rate, of } = grid(random, random.whole(4, 6), 2000);
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
const lowestRateRow: Make = (random) => {
  if (random.unit() < 0.5) {
    const row = without(guardedRow(random), 2);
    const [low, high, g] = row as [number, number, number | null];
    const spread = high - low + 2 * (g ?? 0);
    return spread === 0 || Math.abs(low + high) < MOST_ZONES * spread ? row : lowestRateRow(random);
  }
  const { of } = grid(random);
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
  GAP(random) {
    const { rate, of } = grid(random);
    return [...[...band(random, rate), ...band(random, rate), rate].map(of), sampling(random)];
  },
  MINRATE: lowestRateRow,
  TOLERANCE: (random) => without(guardedRow(random), 4),
  JITTERSNR: (random) => [decimal(random, -3, 9), decimal(random, -15, -3)],
  JITTERLIMIT: (random) => [decimal(random, -3, 9), decimal(random, 0, 2)],
  QUANTSNR: (random) => [random.whole(1, 32), random.pick([null, decimal(random, 1, 3)]), random.pick([null, 0, decimal(random, -3, 0)])],
  ENOB: (random) => [decimal(random, 0, 2)],
  NOISEFOLD: (random) => [random.whole(1, 200), random.pick([null, 0, decimal(random, 0, 2)])],
  DROOP(random) {
    const { rate, of } = grid(random);
    return [of(Math.abs(frequency(random, rate))), of(rate), random.pick<Row[number]>([null, 'nrz', 'rz', 'doublet', ' RZ'])];
  },
};
