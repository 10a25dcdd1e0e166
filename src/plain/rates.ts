// The row functions of the rates family as native formulas.

import { bySampling, edgesBelow, optionalTolerance, seen, touchesZero } from './landing';
import { type Equivalent, type Expression, NONE, WRONG, areNumbers, compares, greatest, inOrder, optionalFromZero, settled, unlessNoBand, where } from './native';

/** With the edge at m half rates below the band, (low − guard)(1 − t) ≥ m·(width + 2·guard + t·(low + high)): m is the quotient, rounded down. */
export const MINRATE: Equivalent = {
  least: 2,
  most: 5,
  rounds: true,
  write(a, b, guard, ppm, sampling) {
    const g = optionalFromZero(guard);
    const t = optionalTolerance(ppm);
    const plus = (value: string | null, text: string) => (value === null ? '' : text);
    const late = plus(t.value, `*(1-${t.value})`);
    // The width of its decimals: a difference of two large numbers would carry their errors.
    const width = `ROUND(${b.text}-${a.text},14-INT(LOG10(${greatest([a, b])})))`;
    const spread = `(${width}${plus(g.value, `+2*${g.value}`)}${plus(t.value, `+${t.value}*ABS(${a.text}+${b.text})`)})`;
    const lowest = bySampling(sampling, (kind) => {
      const { low, high } = seen(a, b, 'real');
      const ratio = settled(`${kind === 'iq' ? '2*' : ''}(${low}${plus(g.value, `-${g.value}`)})${late}/${spread}`);
      const upperEdge = kind === 'iq' ? `2*INT((INT(MAX(0,${ratio}))+1)/2)+1` : `INT(MAX(0,${ratio}))+1`;
      // A zone that fits at a single rate counts where a cell can hold that rate. Without a tolerance it is a multiple of the spread, a
      // decimal; with one it seldom is, so it counts where it has up to 9 digits.
      const isSingle = kind === 'iq' ? `ISODD(${ratio}),${ratio}=INT(${ratio})` : `${ratio}=INT(${ratio})`;
      const single = `${kind === 'iq' ? '' : '2*'}${spread}/(1-(${t.value})^2)`;
      const endless = `ABS(ROUND(${single},8-INT(LOG10(${single})))-${single})>2E-15*${single}`;
      const isOff = typeof ppm.literal === 'number' ? '' : `${t.value}>0,`;
      const skipped = t.value === null ? '' : `-IF(AND(${isOff}${ratio}>0,${isSingle},${endless}),${kind === 'iq' ? 2 : 1},0)`;
      const rate = `IF(${spread}=0,${NONE},2*(${high}${plus(g.value, `+${g.value}`)})/((${upperEdge}${skipped})${late}))`;
      if (kind === 'iq') return rate;
      const holdsZero = typeof a.literal === 'number' && a.literal >= 0 ? null : `${low}<0`;
      const guardReaches = g.value === null ? null : `AND(${low}>0,ROUND((${low}-${g.value})/${high},12)<0)`;
      const none = [holdsZero, guardReaches].filter((one) => one !== null);
      return none.length === 0 ? rate : `IF(${none.length === 1 ? none[0]! : `OR(${none.join(',')})`},${NONE},${rate})`;
    });
    const conditions = [areNumbers(a, b), inOrder(a, b), ...g.conditions, ...t.conditions];
    return unlessNoBand(a, b, where(conditions, lowest, WRONG));
  },
};

export const TOLERANCE: Equivalent = {
  least: 3,
  most: 5,
  rounds: true,
  write(a, b, r, guard, sampling) {
    const g = optionalFromZero(guard);
    const tolerance = bySampling(sampling, (kind) => `ROUND(1E6*MAX(0,MIN(1,${kind === 'iq' ? iqRatios(a, b, r, g.value) : realRatios(a, b, r, g.value)})),9)`);
    const conditions = [areNumbers(a, b, r), compares(r, '>', 0), inOrder(a, b), ...g.conditions];
    return unlessNoBand(a, b, where(conditions, tolerance, WRONG));
  },
};

/** How far each edge may move before it meets the band, as a fraction of its place. An edge at 0 doesn't move. */
function realRatios(a: Expression, b: Expression, r: Expression, guard: string | null): string {
  const { low, high } = seen(a, b, 'real');
  const [below, above] = guard === null ? [low, high] : [`(${low}-${guard})`, `(${high}+${guard})`];
  const edges = edgesBelow(a, b, r);
  const zero = touchesZero(a, b);
  const clear = guard === null ? `${low}>=0` : `ROUND(${below}/${r.text},12)>=0`;
  const atZero = guard === null || zero === null ? clear : `OR(${zero},${clear})`;
  return `IF(${edges}=0,IF(${atZero},1,0),2*${below}/(${edges}*${r.text})-1),1-2*${above}/((${edges}+1)*${r.text})`;
}

function iqRatios(a: Expression, b: Expression, r: Expression, guard: string | null): string {
  const less = guard === null ? '' : `-${guard}`;
  const centre = `INT((${a.text}+${b.text})/${r.text}/2+0.5)`;
  const edge = (side: string) => `(2*${centre}${side}1)*${r.text}/2`;
  return `(${a.text}${less}-${edge('-')})/ABS(${edge('-')}),(${edge('+')}-${b.text}${less})/ABS(${edge('+')})`;
}
