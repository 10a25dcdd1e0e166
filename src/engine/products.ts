// Products of several tones: c1·f1 + c2·f2 + …, and which of them explains a spur.

import { readRate } from './band';
import { checkCount, checkListing } from './counts';
import { faults } from './fault';
import { foldExactly } from './folding';
import { type Rational, ZERO, absolute, add, compare, divide, fromNumber, half, rational, subtract, times, toNumber } from './rational';

export interface Product {
  /** Such as `2·f1-f2`. */
  product: string;
  /** Sum of the absolute multipliers. */
  order: number;
  frequency: number;
  folded: number;
}

const MOST_PRODUCTS = 200_000n;

/**
 * Every product of tones from order 2 to `order`, harmonics of one tone among them, by order and frequency, and where each lands at
 * real sampling.
 * @param tones two or more
 * @throws Fault where an argument is out of range or more than 10 000 products would be listed
 * @example intermodulation([5, 6], 100, 2).map(({ product }) => product) // => ['f2-f1', '2·f1', 'f1+f2', '2·f2']
 */
export function intermodulation(tones: readonly number[], rate: number, order: number): Product[] {
  if (tones.length < 2) throw faults.tooFewTones(tones.length);
  const fs = readRate(rate);
  checkCount('order', order);
  checkListing(countProducts(tones.length, order) - BigInt(tones.length), 'lower order or give fewer tones');
  const names = tones.map((_, i) => `f${i + 1}`);
  return combinations(tones.map(fromNumber), order)
    .filter((combination) => combination.order > 1)
    .sort((x, y) => x.order - y.order || compare(x.frequency, y.frequency))
    .map(({ multipliers, order: own, frequency }) => ({
      product: inWords(multipliers, names), order: own, frequency: toNumber(frequency), folded: toNumber(foldExactly(frequency, fs, 'real')),
    }));
}

/** Something that lands where a spur was seen. */
export interface Suspect {
  /** Such as `2·f1-f2`, `f1 image 1/4` or `offset 1/4`. */
  product: string;
  order: number;
  frequency: number;
  /** How far it lands from what was observed. */
  miss: number;
}

/**
 * What could make a spur seen at a folded frequency of real sampling: the products of the tones up to an order, images of the tones and
 * offset tones of interleaved cores; the lowest order first, then the nearest.
 * @param observed from 0 to rate/2
 * @param order highest sum of absolute multipliers, 1 or more; an offset tone has order 0
 * @param tolerance 0 or more: how far a suspect may land from what was observed
 * @param cores a whole number from 1 to 64
 * @param names of the tones; as many
 * @throws Fault where an argument is out of range, nothing lands there, or there are too many products
 * @example suspectsOf(6, 20, [7], 3, 0, 1, ['f1']) // => [{ product: '2·f1', order: 2, frequency: 14, miss: 0 }]
 */
export function suspectsOf(
  observed: number, rate: number, tones: readonly number[], order: number, tolerance: number, cores: number, names: readonly string[],
): Suspect[] {
  const fs = readRate(rate);
  const seen = fromNumber(observed);
  if (seen.n < 0n || compare(seen, half(fs)) > 0) throw faults.outsideSpectrum('observed', observed, 0, toNumber(half(fs)), false);
  checkCount('order', order);
  if (!(tolerance >= 0)) throw faults.negative('tolerance', tolerance);
  checkCount('cores', cores, 64);
  if (names.length !== tones.length) throw faults.countsDiffer('name', names.length, 'tones', tones.length);
  const products = countProducts(tones.length, order) + BigInt(cores * (tones.length + 1));
  if (products > MOST_PRODUCTS) throw faults.tooManyProducts(products);

  const frequencies = tones.map(fromNumber);
  const displaced = (q: number) => times(divide(fs, rational(BigInt(cores))), BigInt(q));
  const steps = Array.from({ length: cores - 1 }, (_, i) => i + 1);
  const all = [
    ...steps.filter((q) => 2 * q <= cores).map((q) => ({ name: () => `offset ${q}/${cores}`, order: 0, frequency: displaced(q) })),
    ...combinations(frequencies, order).map(({ multipliers, order: own, frequency }) => ({ name: () => inWords(multipliers, names), order: own, frequency })),
    ...frequencies.flatMap((tone, i) => steps.map((q) => ({ name: () => `${names[i]!} image ${q}/${cores}`, order: 1, frequency: add(tone, displaced(q)) }))),
  ].map((suspect) => ({ ...suspect, miss: absolute(subtract(foldExactly(suspect.frequency, fs, 'real'), seen)) }));
  const allowed = fromNumber(tolerance);
  const found = all.filter(({ miss }) => compare(miss, allowed) <= 0);
  if (found.length === 0) {
    const nearest = all.reduce((x, y) => (compare(y.miss, x.miss) < 0 ? y : x));
    throw faults.nothingExplains(observed, order, nearest.name(), toNumber(nearest.miss));
  }
  checkListing(BigInt(found.length), 'lower order or tolerance');
  return found
    .sort((x, y) => x.order - y.order || compare(x.miss, y.miss))
    .map(({ name, order: own, frequency, miss }) => ({ product: name(), order: own, frequency: toNumber(frequency), miss: toNumber(miss) }));
}

interface Combination {
  readonly multipliers: readonly number[];
  readonly order: number;
  /** Never below 0. */
  readonly frequency: Rational;
}

/** How many combinations there are of order 1 to `order`, one of each pair of opposite signs. */
function countProducts(tones: number, order: number): bigint {
  // Whole-number vectors of absolute sum d with j places other than 0: 2^j ways to sign, C(tones, j) places, C(d−1, j−1) splits.
  let total = 0n;
  for (let d = 1; d <= order && total <= 10n ** 15n; d++) {
    for (let j = 1; j <= Math.min(tones, d); j++) total += 2n ** BigInt(j - 1) * choose(tones, j) * choose(d - 1, j - 1);
  }
  return total;
}

function choose(n: number, k: number): bigint {
  let ways = 1n;
  for (let i = 1; i <= k; i++) ways = (ways * BigInt(n - k + i)) / BigInt(i);
  return ways;
}

/** Every combination of order 1 to `order`; of a combination and its negative, the one whose frequency is not below 0. */
function combinations(tones: readonly Rational[], order: number): Combination[] {
  const found: Combination[] = [];
  const multipliers = new Array<number>(tones.length).fill(0);
  const extend = (i: number, used: number, sum: Rational) => {
    if (i === tones.length) {
      if (used === 0) return;
      const leading = multipliers.find((c) => c !== 0)!;
      if (sum.n > 0n || (sum.n === 0n && leading > 0)) found.push({ multipliers: [...multipliers], order: used, frequency: sum });
      return;
    }
    for (let c = used - order; c <= order - used; c++) {
      multipliers[i] = c;
      extend(i + 1, used + Math.abs(c), c === 0 ? sum : add(sum, times(tones[i]!, BigInt(c))));
    }
    multipliers[i] = 0;
  };
  extend(0, 0, ZERO);
  return found;
}

/** `2·f1-f2`: what is added first, so that a cell never takes it for a formula. */
function inWords(multipliers: readonly number[], names: readonly string[]): string {
  const terms = multipliers.map((c, i) => ({ c, name: names[i]! })).filter(({ c }) => c !== 0);
  const size = (c: number, name: string) => (Math.abs(c) === 1 ? name : `${Math.abs(c)}·${name}`);
  const added = terms.filter(({ c }) => c > 0).map(({ c, name }) => size(c, name)).join('+');
  const taken = terms.filter(({ c }) => c < 0).map(({ c, name }) => `-${size(c, name)}`).join('');
  return `${added}${taken}`;
}
