// The definitions of folding, zones and margins once more, on whole numbers: every input is scaled by one power of ten, so nothing
// is rounded until a result is written as a decimal and read by the language's own correctly rounding parser. It shares no code
// with the engine.

import type { Sampling } from '../../src/engine';

/** The decimal of 15 significant digits that a cell shows, as digits and a power of ten. */
function shownDecimal(x: number): { digits: bigint; exponent: number } {
  const [mantissa, power] = x.toPrecision(15).includes('e') ? (x.toPrecision(15).split('e') as [string, string]) : [x.toPrecision(15), '0'];
  const fraction = mantissa.split('.')[1] ?? '';
  return { digits: BigInt(mantissa.replace('.', '')), exponent: Number(power) - fraction.length };
}

/** Whole numbers in a common unit of 10^−places. */
function common(...values: number[]): { whole: bigint[]; places: number } {
  const decimals = values.map(shownDecimal);
  const places = Math.max(0, ...decimals.map(({ exponent }) => -exponent));
  return { whole: decimals.map(({ digits, exponent }) => digits * 10n ** BigInt(exponent + places)), places };
}

/** whole / 10^places, rounded once. */
const asNumber = (whole: bigint, places: number): number => Number(`${whole}e-${places}`);

/** Rounds down to a whole number. */
function quotient(a: bigint, b: bigint): bigint {
  let q = a / b;
  if (q * b > a) q--;
  return q;
}

const size = (x: bigint): bigint => (x < 0n ? -x : x);

/** |f − fs·round(f/fs)|, or f − fs·floor(f/fs + 1/2), in whole units. */
function fold(f: bigint, fs: bigint, sampling: Sampling): bigint {
  const folded = f - fs * quotient(2n * f + fs, 2n * fs);
  return sampling === 'iq' ? folded : size(folded);
}

const zoneNumber = (f: bigint, fs: bigint, sampling: Sampling): bigint =>
  sampling === 'iq' ? quotient(2n * f + fs, 2n * fs) : quotient(2n * size(f), fs) + 1n;

export function modelFrequency(frequency: number, rate: number, sampling: Sampling): number {
  const { whole: [f, fs], places } = common(frequency, rate);
  return asNumber(fold(f!, fs!, sampling), places);
}

export function modelZone(frequency: number, rate: number, sampling: Sampling): number {
  const { whole: [f, fs] } = common(frequency, rate);
  return Number(zoneNumber(f!, fs!, sampling));
}

export function modelInverted(frequency: number, rate: number, sampling: Sampling): boolean {
  const { whole: [f, fs] } = common(frequency, rate);
  return sampling === 'real' && zoneNumber(f!, fs!, sampling) % 2n === 0n;
}

/** Ends of the image: those of the folded ends and of every edge that the band holds. */
export function modelImage(low: number, high: number, rate: number, sampling: Sampling): [number, number] {
  const { whole, places } = common(low, high, rate);
  // In half units, so that half a rate is whole.
  const [a, b, fs] = whole.map((x) => 2n * x) as [bigint, bigint, bigint];
  const edge = fs / 2n;
  const seen = [fold(a, fs, sampling), fold(b, fs, sampling)];
  const first = quotient(a, edge);
  const last = quotient(b, edge);
  if (sampling === 'iq') {
    for (let e = first; e <= last && e <= first + 4n; e++) if (e % 2n !== 0n && e * edge > a && e * edge < b) seen.push(-edge, edge);
    // A band that ends on its zone's upper edge reaches it from below.
    if (b > a && last * edge === b && last % 2n !== 0n && !seen.includes(edge)) {
      seen.splice(1, 1, edge);
    }
  } else {
    for (let e = first; e <= last && e <= first + 4n; e++) if (e * edge >= a && e * edge <= b) seen.push(e % 2n === 0n ? 0n : edge);
  }
  const ascending = seen.sort((x, y) => (x < y ? -1 : 1));
  return [ascending[0]!, ascending.at(-1)!].map((x) => Number(`${x * 5n}e-${places + 1}`)) as [number, number];
}

export function modelMargin(low: number, high: number, rate: number, guard: number, ppm: number, sampling: Sampling): number {
  const { whole, places } = common(low, high, rate, guard);
  const { whole: [p], places: ppmPlaces } = common(ppm);
  const million = 1_000_000n * 10n ** BigInt(ppmPlaces);
  // In units of 1/(2·million), so that edges and their tolerances are whole.
  const unit = 2n * million;
  let [a, b] = [whole[0]! * unit, whole[1]! * unit];
  const g = whole[3]! * unit;
  const halfRate = whole[2]! * million;
  if (sampling === 'real' && a + b < 0n) [a, b] = [-b, -a];
  const zone = zoneNumber(a + b, 4n * halfRate, sampling);
  const [lower, upper] = sampling === 'iq' ? [(2n * zone - 1n) * halfRate, (2n * zone + 1n) * halfRate] : [(zone - 1n) * halfRate, zone * halfRate];
  // Worst of the clock fast and slow.
  const worst = (distance: (edge: bigint) => bigint, edge: bigint) => {
    const fast = distance(edge + (edge * p!) / million);
    const slow = distance(edge - (edge * p!) / million);
    return fast < slow ? fast : slow;
  };
  const toUpper = worst((edge) => edge - b, upper);
  const toLower = worst((edge) => a - edge, lower);
  const free = sampling === 'real' && a === 0n && zone === 1n;
  const nearest = free || toUpper < toLower ? toUpper : toLower;
  return asNumberOver(nearest - g, unit, places);
}

/** whole / (unit·10^places), where unit is 2 times a power of ten. */
const asNumberOver = (whole: bigint, unit: bigint, places: number): number => asNumber(whole * 5n, places + unit.toString().length);
