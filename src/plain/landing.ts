// The landing family as native formulas.
//
// With q = 2·frequency/rate, the edges of real sampling are the whole q, those of IQ sampling the odd ones. Image ends, margins and gaps
// don't jump where a frequency passes an edge, so a plain ratio serves them; zones, words and IQ images do, and take the settled one.

import {
  type Condition, type Equivalent, type Expression, WRONG, areNumbers, byWord, compares, greatest, inOrder, optionalFromZero, optionalNumber, settled, size, tidy,
  unlessBlank, unlessNoBand, where,
} from './native';

const SAMPLING = ['real', 'iq'] as const;
export type Kind = (typeof SAMPLING)[number];

export const bySampling = (sampling: Expression, write: (kind: Kind) => string): string => byWord(sampling, SAMPLING, write);

export const FREQ = ofTone((f, r, kind) => (kind === 'iq'
  ? tidy(`${f.text}-${r.text}*${turnsBelow(f, r)}`, f, r)
  : tidy(folded(f.text, r.text), f, r)));

export const ZONE = ofTone((f, r, kind) => (kind === 'iq' ? turnsBelow(f, r) : `${halvesIn(f, r)}+1`));

export const INVERTED = ofTone((f, r, kind) => (kind === 'iq' ? 'FALSE' : `ISODD(${halvesIn(f, r)})`));

export const LOW = ofImage((a, b, r, kind) => (kind === 'iq'
  ? `IF(${withinTurn(a, b, r)},${a.text}-${r.text}*${turnsBelow(a, r)},-${r.text}/2)`
  : `IF(INT(${b.text}/${r.text})>INT(${a.text}/${r.text}),0,MIN(${folded(a.text, r.text)},${folded(b.text, r.text)}))`));

export const HIGH = ofImage((a, b, r, kind) => (kind === 'iq'
  ? `IF(${withinTurn(a, b, r)},${b.text}-${r.text}*${turnsBelow(a, r)},${r.text}/2)`
  : `IF(INT(${b.text}/${r.text}+0.5)>INT(${a.text}/${r.text}+0.5),${r.text}/2,MAX(${folded(a.text, r.text)},${folded(b.text, r.text)}))`));

export const MARGIN = ofBand((a, b, r, guard, tolerance, kind) => tidy(margin(a, b, r, guard, tolerance, kind), a, b, r), false);

export const CHECK = ofBand((a, b, r, guard, tolerance, kind) => {
  const largest = `2*${greatest([a, b])}/${r.text}`;
  const fits = (g: string | null, t: string | null) => `${settled(`2*(${margin(a, b, r, g, t, kind)})/${r.text}`, largest)}>=0`;
  const tooWide = `${settled(`2*(${b.text}-${a.text})/${r.text}`, largest)}>${kind === 'iq' ? 2 : 1}`;
  const { low } = seen(a, b, kind);
  const next = kind === 'iq' ? `2*${turnsBelow(a, r)}+1` : `${halvesBelow(low, r)}+1`;
  const crossed = `(${next})*${r.text}/2`;
  const edge = tidy(kind === 'iq' || (typeof a.literal === 'number' && a.literal >= 0) ? crossed : `IF(${low}<0,0,${crossed})`, a, b, r);
  const misses = `IF(${tooWide},"too wide","crosses "&${edge})`;
  const within = guard === null && tolerance === null ? misses : `IF(${fits(null, null)},"tight",${misses})`;
  return `IF(${fits(guard, tolerance)},"clear",${within})`;
}, true);

export const GAP: Equivalent = {
  least: 5,
  most: 6,
  rounds: false,
  write(a, b, c, d, r, sampling) {
    const widths = `(${b.text}-${a.text}+${d.text}-${c.text})/2`;
    const apart = folded(`(${a.text}+${b.text}-${c.text}-${d.text})/2`, r.text);
    const mirrored = folded(`(${a.text}+${b.text}+${c.text}+${d.text})/2`, r.text);
    const gap = bySampling(sampling, (kind) => tidy(`${kind === 'iq' ? apart : `MIN(${apart},${mirrored})`}-${widths}`, a, b, c, d, r));
    const conditions = [areNumbers(a, b, c, d, r), compares(r, '>', 0), inOrder(a, b), inOrder(c, d)];
    return unlessNoBand(a, b, unlessNoBand(c, d, where(conditions, gap, WRONG)));
  },
};

// What the three kinds of row have in common

function ofTone(result: (frequency: Expression, rate: Expression, kind: Kind) => string): Equivalent {
  return {
    least: 2,
    most: 3,
    rounds: true,
    write: (f, r, sampling) => unlessBlank(f, where([areNumbers(f, r), compares(r, '>', 0)], bySampling(sampling, (kind) => result(f, r, kind)), WRONG)),
  };
}

function ofImage(end: (low: Expression, high: Expression, rate: Expression, kind: Kind) => string): Equivalent {
  return {
    least: 3,
    most: 4,
    rounds: true,
    write: (a, b, r, sampling) => unlessNoBand(a, b, where(bandConditions(a, b, r), bySampling(sampling, (kind) => tidy(end(a, b, r, kind), a, b, r)), WRONG)),
  };
}

type OfBand = (low: Expression, high: Expression, rate: Expression, guard: string | null, tolerance: string | null, kind: Kind) => string;

function ofBand(result: OfBand, rounds: boolean): Equivalent {
  return {
    least: 3,
    most: 6,
    rounds,
    write(a, b, r, guard, ppm, sampling) {
      const g = optionalFromZero(guard);
      const t = optionalTolerance(ppm);
      const conditions = [...bandConditions(a, b, r), ...g.conditions, ...t.conditions];
      return unlessNoBand(a, b, where(conditions, bySampling(sampling, (kind) => result(a, b, r, g.value, t.value, kind)), WRONG));
    },
  };
}

const bandConditions = (a: Expression, b: Expression, r: Expression): Condition[] => [areNumbers(a, b, r), compares(r, '>', 0), inOrder(a, b)];

/** A tolerance as a fraction: its value, null where it is known to be 0, and the conditions on the parts per million. */
export function optionalTolerance(ppm: Expression): { value: string | null; conditions: Condition[] } {
  const { value, conditions } = optionalFromZero(ppm);
  if (value === null) return { value, conditions };
  const bounded = optionalNumber(ppm).value!;
  return { value: `${value}/1E6`, conditions: [...conditions, compares({ ...ppm, text: bounded }, '<', 1e6)] };
}

// Pieces

/** |x − rate·round(x/rate)| */
const folded = (x: string, rate: string): string => `ABS(${x}-${rate}*ROUND(${x}/${rate},0))`;

/** How many half rates lie at or below a frequency. */
const halvesBelow = (frequency: string, rate: Expression): string => `INT(${settled(`2*${frequency}/${rate.text}`)})`;

/** The same for the size of a frequency. */
function halvesIn(frequency: Expression, rate: Expression): string {
  const ratio = `2*${size(frequency)}/${rate.text}`;
  return `INT(${settled(ratio, ratio)})`;
}

/** The IQ zone: the odd half rates at or below a frequency, counted from the one below 0. */
const turnsBelow = (frequency: Expression, rate: Expression): string => `INT((${halvesBelow(frequency.text, rate)}+1)/2)`;

/** Whether a band reaches no further than the upper edge of the IQ zone in which it begins. */
const withinTurn = (a: Expression, b: Expression, r: Expression): string => `${settled(`2*${b.text}/${r.text}`)}<=2*${turnsBelow(a, r)}+1`;

/** The edges of a band as the sampler sees it: at real sampling a band whose centre is below 0 is its mirror. */
export function seen(a: Expression, b: Expression, kind: Kind): { low: string; high: string } {
  if (kind === 'iq' || (typeof a.literal === 'number' && a.literal >= 0)) return { low: a.text, high: b.text };
  const mirrored = `${a.text}+${b.text}<0`;
  return { low: `IF(${mirrored},-${b.text},${a.text})`, high: `IF(${mirrored},-${a.text},${b.text})` };
}

/** Whether a band begins at exactly 0, or ends there; null where it is known not to. */
export function touchesZero(a: Expression, b: Expression): string | null {
  const open = [a, b].filter(({ literal }) => literal === undefined || literal === 0).map(({ text }) => `${text}=0`);
  return open.length === 0 ? null : open.length === 1 ? open[0]! : `OR(${open.join(',')})`;
}

/** The distance to the nearer edge of the zone that holds the centre. */
function margin(a: Expression, b: Expression, r: Expression, guard: string | null, tolerance: string | null, kind: Kind): string {
  const { low, high } = seen(a, b, kind);
  const less = guard === null ? '' : `-${guard}`;
  if (kind === 'iq') {
    const centre = `INT((${a.text}+${b.text})/${r.text}/2+0.5)`;
    const edge = (halves: string, sign: string) => `(${halves})*${r.text}/2${tolerance === null ? '' : `${sign}ABS(${halves})*${r.text}/2*${tolerance}`}`;
    return `MIN(${low}-(${edge(`2*${centre}-1`, '+')}),${edge(`2*${centre}+1`, '-')}-${high})${less}`;
  }
  const below = edgesBelow(a, b, r);
  const early = tolerance === null ? '' : `*(1+${tolerance})`;
  const late = tolerance === null ? '' : `*(1-${tolerance})`;
  const toLower = `${low}-${below}*${r.text}/2${early}`;
  const toUpper = `(${below}+1)*${r.text}/2${late}-${high}`;
  // A band that begins at 0 has no edge there; the rate is more than the distance to the other.
  const zero = touchesZero(a, b);
  return `MIN(${zero === null ? toLower : `IF(AND(${zero},${below}=0),${r.text},${toLower})`},${toUpper})${less}`;
}

/** How many half rates lie below the centre of a real band. */
export const edgesBelow = (a: Expression, b: Expression, r: Expression): string => `INT(ABS(${a.text}+${b.text})/${r.text})`;
