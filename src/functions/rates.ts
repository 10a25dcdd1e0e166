// The rates family: which sample rates are usable.

import { clockTolerance, lowestRate, usableRates } from '../engine';
import { eachRow, edges, headerRow, limit, number, optional, samplingKind, single, table } from './cells';

/**
 * Every range of sample rates that holds a band within one zone, ascending.
 * @customfunction RATES RATES
 * @param {any[][]} low Low edge of the band
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} [from] Lowest rate to list (default: as low as the band allows)
 * @param {any[][]} [to] Highest rate to list (default: unlimited)
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Zone, Lowest rate, Highest rate (blank where unlimited), Width, Inverted
 */
export function rates(low: any[][], high: any[][], from?: any[][], to?: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Zone', 'Lowest rate', 'Highest rate', 'Width', 'Inverted'], () =>
    usableRates(
      single(number('low', low)), single(number('high', high)), single(optional('from', from, 0)), single(limit('to', to)),
      single(optional('guard', guard, 0)), single(optional('ppm', ppm, 0)), single(samplingKind(sampling)),
    ).map((range) => [range.zone, range.lowest, range.highest ?? '', range.width ?? '', range.inverted]));
}

/**
 * The lowest sample rate that holds a band within one zone.
 * @customfunction MINRATE MINRATE
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Lowest rate
 */
export function minrate(low: any[][], high: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][]): any[][] {
  return eachRow([...edges('low', low, 'high', high), optional('guard', guard, 0), optional('ppm', ppm, 0), samplingKind(sampling)], lowestRate);
}

/**
 * Parts per million by which the clock may be off either way before a band leaves its zone; 0 where it already does.
 * @customfunction TOLERANCE TOLERANCE
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} ppm
 */
export function tolerance(low: any[][], high: any[][], rate: any[][], guard?: any[][], sampling?: any[][]): any[][] {
  return eachRow([...edges('low', low, 'high', high), number('rate', rate), optional('guard', guard, 0), samplingKind(sampling)], clockTolerance);
}
