// The filter family: what has to be kept away from the converter, and with how many poles.

import { filterAttenuation, filterOrder, faults, stopEdges } from '../engine';
import { eachRow, eachRowOfTable, edges, headerRow, limit, number, responseKind, tone } from './cells';

/**
 * The nearest frequencies that land in a band: where an anti-alias filter must stop.
 * @customfunction STOPBAND STOPBAND
 * @param {any[][]} low Low edges, a cell or a column of the plan
 * @param {any[][]} high High edges, not below the low ones
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Lower stop edge, Upper stop edge, Lower transition, Upper transition (blank below zone 1)
 * @formula the ends, next to the band, of its images in the zones below and above
 * @source common practice
 * @example =FOLD.STOPBAND(60, 90, 100) =>
 *   Lower stop edge | Upper stop edge | Lower transition | Upper transition
 *   40 | 110 | 20 | 20
 */
export function stopband(low: any[][], high: any[][], rate: any[][], headers?: any[][]): any[][] {
  return eachRowOfTable(
    headerRow(headers), ['Lower stop edge', 'Upper stop edge', 'Lower transition', 'Upper transition'], [...edges('low', low, 'high', high), number('rate', rate)],
    (a, b, fs) => {
      const { lower, upper } = stopEdges(a, b, fs);
      return [lower?.edge ?? '', upper.edge, lower?.transition ?? '', upper.transition];
    },
  );
}

/**
 * The least order of a filter that keeps to its pass band's ripple and its stop band's attenuation. Low-pass without low edges, high-pass without high ones.
 * @customfunction FILTERORDER FILTERORDER
 * @param {any[][]} response "butterworth", "chebyshev", "inverse chebyshev" or "elliptic"; a cell or a column
 * @param {any[][]} passLow Low edge of the pass band; blank for a low-pass
 * @param {any[][]} passHigh High edge of the pass band; blank for a high-pass
 * @param {any[][]} stopLow Where the lower stop band begins; blank for a low-pass
 * @param {any[][]} stopHigh Where the upper stop band begins; blank for a high-pass
 * @param {any[][]} ripple Greatest loss in the pass band in dB, above 0
 * @param {any[][]} attenuation Least loss in the stop band in dB, above ripple
 * @returns {any[][]} Order of the low-pass prototype
 * @formula with s the nearer stop edge in the prototype and d = √((10^(A/10) − 1)/(10^(R/10) − 1)): lg d/lg s; arcosh d/arcosh s; K(1/s)·K′(1/d)/(K′(1/s)·K(1/d))
 * @source Proakis and Manolakis, Digital Signal Processing; for elliptic filters by the arithmetic-geometric mean, Abramowitz and Stegun, chapter 17
 * @example =FOLD.FILTERORDER("chebyshev", 60, 90, 40, 110, 1, 60) => 7
 */
export function filterorder(response: any[][], passLow: any[][], passHigh: any[][], stopLow: any[][], stopHigh: any[][], ripple: any[][], attenuation: any[][]): any[][] {
  return eachRow(
    [responseKind(response), limit('passLow', passLow), limit('passHigh', passHigh), limit('stopLow', stopLow), limit('stopHigh', stopHigh), number('ripple', ripple), number('attenuation', attenuation)],
    (kind, passFrom, passTo, stopFrom, stopTo, loss, wanted) => filterOrder(kind, { low: passFrom, high: passTo }, { low: stopFrom, high: stopTo }, loss, wanted),
  );
}

/**
 * The attenuation of a filter at a frequency, in dB.
 * @customfunction ATTENUATION ATTENUATION
 * @param {any[][]} response "butterworth", "chebyshev", "inverse chebyshev" or "elliptic"; a cell or a column
 * @param {any[][]} order Order of the low-pass prototype, 1 or more
 * @param {any[][]} passLow Low edge of the pass band; blank for a low-pass
 * @param {any[][]} passHigh High edge of the pass band; blank for a high-pass
 * @param {any[][]} ripple Loss at the edges of the pass band in dB, above 0
 * @param {any[][]} frequency Frequency to look at, 0 or more
 * @param {any[][]} [attenuation] Least loss in the stop band in dB; needed for "inverse chebyshev" and "elliptic"
 * @returns {any[][]} dB
 * @formula 10·lg(1 + (10^(R/10) − 1)·F²), with F = wⁿ, Tₙ(w) or the elliptic rational function; inverse Chebyshev from its stop band
 * @source Proakis and Manolakis, Digital Signal Processing
 * @example =FOLD.ATTENUATION("chebyshev", 3, 60, 90, 1, 100) => 14.1446446209097
 */
export function attenuation(response: any[][], order: any[][], passLow: any[][], passHigh: any[][], ripple: any[][], frequency: any[][], attenuation?: any[][]): any[][] {
  return eachRow(
    [responseKind(response), number('order', order), limit('passLow', passLow), limit('passHigh', passHigh), number('ripple', ripple), tone('frequency', frequency), limit('attenuation', attenuation)],
    (kind, n, low, high, loss, f, wanted) => {
      const dB = filterAttenuation(kind, n, { low, high }, loss, f, wanted);
      if (dB === null) throw faults.infiniteAttenuation(f);
      return dB;
    },
  );
}
