// The one rule of the design, enumerated at a single rate: every pair, every multiple, in whole numbers. It shares no code with the
// engine and knows no shortcut: wanted pairs are looked at twice, both signs of multiples are tried.

import type { Plan } from '../../src/engine';

const PLACES = 9;

/** Whole units of 10^−9 of a decimal with few digits. */
const units = (x: number): bigint => BigInt(Math.round(Number(`${x}e3`) * 1e6));

/**
 * Whether a rate keeps a plan clear when the clock may be off by ppm either way; the rate has at most 15 digits.
 * @param moving the rate itself moves by so much: an empty interval, which a tolerance would widen, then stays empty
 */
export function modelClear(plan: Plan, rate: number, ppm: number, moving = false): boolean {
  const [mantissa, exponent] = rate.toExponential(14).split('e') as [string, string];
  // rate = n/d in units
  const places = 14 - Number(exponent) - PLACES;
  const digits = BigInt(mantissa.replace('.', ''));
  const [n, d] = places >= 0 ? [digits, 10n ** BigInt(places)] : [digits * 10n ** BigInt(-places), 1n];
  const [ppmMantissa, ppmExponent] = ppm.toExponential(14).split('e') as [string, string];
  const t = BigInt(ppmMantissa.replace('.', ''));
  const one = 1_000_000n * 10n ** BigInt(14 - Number(ppmExponent));
  return clear(plan, n, d, t, one, moving);
}

function clear(plan: Plan, n: bigint, d: bigint, t: bigint, one: bigint, moving: boolean): boolean {
  const g = units(plan.guard);
  const real = plan.sampling === 'real';
  const cores = BigInt(plan.cores);
  const rows = plan.low.map((low, i) => ({ a: units(low), b: units(plan.high[i]!), role: plan.role[i]! })).filter(({ role }) => role !== 'ignore');

  /** Whether a counted multiple of rate/divisor lies in the open interval. */
  const hit = (low: bigint, high: bigint, divisor: bigint, counts: (k: bigint) => boolean): boolean => {
    if (moving && low >= high) return false;
    if (low < 0n && high > 0n && counts(0n)) return true;
    for (const [a, b, sign] of [[low, high, 1n], [-high, -low, -1n]] as const) {
      if (b <= 0n) continue;
      // k·n/(d·divisor)·(1+t) > a and k·n/(d·divisor)·(1−t) < b, for k above 0
      const first = a > 0n ? (a * d * divisor * one) / (n * (one + t)) : 1n;
      for (let k = first > 0n ? first : 1n; k * n * (one - t) < b * d * divisor * one; k++) {
        if (k * n * (one + t) > a * d * divisor * one && counts(sign * k)) return true;
      }
    }
    return false;
  };
  const all = () => true;
  const displaced = (k: bigint) => k % cores !== 0n;

  return rows.every((wanted, i) => {
    if (wanted.role !== 'wanted') return true;
    const { a, b } = wanted;
    if (real) {
      if (hit(2n * a - 2n * g, 2n * b + 2n * g, 1n, (k) => k !== 0n || a !== 0n)) return false;
    } else if (hit(a - g, b + g, 2n, (k) => k % 2n !== 0n)) return false;
    if (cores > 1n && hit(a - g, b + g, cores, displaced)) return false;
    return rows.every((other, j) => {
      const touches = (c: bigint, e: bigint, divisor: bigint, counts: (k: bigint) => boolean) =>
        hit(a - e - g, b - c + g, divisor, counts) || (real && hit(a + c - g, b + e + g, divisor, counts));
      if (i !== j && touches(other.a, other.b, 1n, all)) return false;
      if (cores > 1n && touches(other.a, other.b, cores, displaced)) return false;
      for (let order = 2n; order <= BigInt(plan.harmonics); order++) if (touches(order * other.a, order * other.b, 1n, all)) return false;
      return true;
    });
  });
}
