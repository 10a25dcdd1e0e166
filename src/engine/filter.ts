// Orders and attenuations of analogue filters, through the low-pass prototype whose pass band ends at 1.

import { checkCount } from './counts';
import { cd, integralRatio, modulus, modulusOfRatio } from './elliptic';
import { faults } from './fault';

export type Response = 'butterworth' | 'chebyshev' | 'inverse chebyshev' | 'elliptic';

/** Edges in any unit; null where the filter has none. Low-pass without low edges, high-pass without high ones, else band-pass. */
export interface Edges {
  readonly low: number | null;
  readonly high: number | null;
}

/**
 * The least order of the low-pass prototype that loses at most `ripple` dB in the pass band and at least `attenuation` dB from the stop
 * edges on.
 * @param pass edges of the pass band
 * @param stop edges of the stop band, further out
 * @param ripple dB, above 0
 * @param attenuation dB, above ripple
 * @throws Fault where edges don't belong together or an argument is out of range
 * @source L. Paarmann, Design and Analysis of Analog Filters, 2001: minimum orders of the four responses
 * @example filterOrder('butterworth', { low: null, high: 200 }, { low: null, high: 600 }, 3, 60) // => 7
 */
export function filterOrder(response: Response, pass: Edges, stop: Edges, ripple: number, attenuation: number): number {
  checkLoss(ripple, attenuation);
  return Math.max(1, Math.ceil(rawOrder(response, stopOfPrototype(pass, stop), ripple, attenuation)));
}

/** The order before it is rounded up. */
export function rawOrder(response: Response, stop: number, ripple: number, attenuation: number): number {
  const discrimination = Math.sqrt(lossRatio(attenuation) / lossRatio(ripple));
  switch (response) {
    case 'butterworth': return Math.log(discrimination) / Math.log(stop);
    case 'elliptic': return integralRatio(modulus(1 / discrimination)) / integralRatio(modulus(1 / stop));
    default: return Math.acosh(discrimination) / Math.acosh(stop);
  }
}

/**
 * Attenuation of a filter at a frequency, in dB; null where it lets nothing through.
 * @param order of the low-pass prototype, 1 or more
 * @param pass edges of the pass band, where it loses `ripple` dB
 * @param frequency 0 or more
 * @param attenuation of the stop band in dB: needed by the two responses that have one, inverse chebyshev and elliptic
 * @throws Fault where an argument is out of range or missing
 * @example filterAttenuation('butterworth', 3, { low: null, high: 100 }, 3.0103, 200, null).toFixed(2) // => '18.13'
 */
export function filterAttenuation(response: Response, order: number, pass: Edges, ripple: number, frequency: number, attenuation: number | null): number | null {
  checkCount('order', order);
  checkEdges(pass);
  if (!(frequency >= 0)) throw faults.negative('frequency', frequency);
  if (attenuation === null && (response === 'inverse chebyshev' || response === 'elliptic')) throw faults.noAttenuation(response);
  checkLoss(ripple, attenuation ?? Infinity);
  const size = logCharacteristic(response, order, inPrototype(frequency, pass), ripple, attenuation ?? 0);
  // 10·log₁₀(1 + e^size), without overflow.
  const loss = size > 700 ? size : Math.log1p(Math.exp(size));
  return loss === Infinity ? null : (10 / Math.LN10) * loss;
}

/** 10^(dB/10) − 1. */
const lossRatio = (dB: number): number => Math.expm1((dB * Math.LN10) / 10);

function checkLoss(ripple: number, attenuation: number): void {
  if (!(ripple > 0)) throw faults.notPositive('ripple', ripple);
  if (!(attenuation > ripple)) throw faults.attenuationBelowRipple(attenuation, ripple);
}

function checkEdges({ low, high }: Edges): void {
  if (low === null && high === null) throw faults.noEdges();
  if (low !== null && !(low > 0)) throw faults.notPositive('passLow', low);
  if (high !== null && !(high > 0)) throw faults.notPositive('passHigh', high);
  if (low !== null && high !== null && !(low < high)) throw faults.edgesReversed('passLow', low, 'passHigh', high);
}

/** Where the nearer stop edge lies in the prototype: above 1. */
function stopOfPrototype(pass: Edges, stop: Edges): number {
  checkEdges(pass);
  if ((pass.low === null) !== (stop.low === null)) throw faults.edgesDiffer('passLow', 'stopLow');
  if ((pass.high === null) !== (stop.high === null)) throw faults.edgesDiffer('passHigh', 'stopHigh');
  if (stop.low !== null && !(stop.low > 0)) throw faults.notPositive('stopLow', stop.low);
  if (stop.low !== null && !(stop.low < pass.low!)) throw faults.stopInside('stopLow', stop.low, 'below passLow', pass.low!);
  if (stop.high !== null && !(stop.high > pass.high!)) throw faults.stopInside('stopHigh', stop.high, 'above passHigh', pass.high!);
  return Math.min(...[stop.low, stop.high].filter((edge) => edge !== null).map((edge) => inPrototype(edge, pass)));
}

/** A frequency through the transformation that makes a filter of its low-pass prototype; only its size matters. */
function inPrototype(frequency: number, { low, high }: Edges): number {
  if (low === null) return frequency / high!;
  if (high === null) return low / frequency;
  // (f² − low·high)/(f·(high − low)), and 1 exactly on the edges.
  return frequency === low || frequency === high ? 1 : Math.abs((frequency / high - low / frequency) / (1 - low / high));
}

/** Natural logarithm of loss − 1 at a frequency w of the prototype. */
function logCharacteristic(response: Response, order: number, w: number, ripple: number, attenuation: number): number {
  const passLoss = Math.log(lossRatio(ripple));
  switch (response) {
    case 'butterworth': return passLoss + 2 * order * Math.log(w);
    case 'chebyshev': return passLoss + 2 * logChebyshev(order, w);
    case 'inverse chebyshev': {
      const stopLoss = Math.log(lossRatio(attenuation));
      // The stop band begins where the loss at 1 comes out as the ripple.
      const stop = Math.cosh(Math.acosh(Math.exp((stopLoss - passLoss) / 2)) / order);
      return w === 0 ? -Infinity : stopLoss - 2 * logChebyshev(order, stop / w);
    }
    case 'elliptic': return passLoss + 2 * logEllipticRational(order, w, Math.sqrt(lossRatio(attenuation) / lossRatio(ripple)));
  }
}

/** ln|T(x)| of the Chebyshev polynomial, x 0 or more. */
function logChebyshev(order: number, x: number): number {
  if (x <= 1) return Math.log(Math.abs(Math.cos(order * Math.acos(x))));
  if (x === Infinity) return Infinity;
  const y = order * Math.acosh(x);
  return y - Math.LN2 + Math.log1p(Math.exp(-2 * y));
}

/**
 * ln|R(w)| of the elliptic rational function that stays within 1 up to w = 1 and beyond `discrimination` in the stop band.
 * Its zeros are cd((2i−1)/order·K, k), its poles their inverses over k; k follows from the degree equation.
 */
function logEllipticRational(order: number, w: number, discrimination: number): number {
  const selectivity = modulusOfRatio(integralRatio(modulus(1 / discrimination)) / order);
  const pairs = Array.from({ length: Math.floor(order / 2) }, (_, i) => cd((2 * i + 1) / order, selectivity));
  const inverse = (zero: number) => (selectivity.k * zero) ** 2;
  // Each factor divided by its value at 1, so that the product is 1 there; far out they tend to their limits.
  const factor = (x: number, zero: number) => (x === Infinity ? 1 / inverse(zero) : Math.abs((x ** 2 - zero ** 2) / (1 - inverse(zero) * x ** 2)));
  const sum = pairs.reduce((total, zero) => total + Math.log(factor(w, zero)) - Math.log(factor(1, zero)), 0);
  return order % 2 ? sum + Math.log(w) : sum;
}
