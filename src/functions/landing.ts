// The landing family: where one row of a plan lands after sampling.

import {
  bandCheck, bandGap, bandInverted, bandMargin, bandZone, foldedFrequency, frequencyZone, imageHigh, imageLow, imagesOf, isInverted, resolveFrequency,
} from '../engine';
import { eachRow, eachRowOfTable, edges, headerRow, number, optional, samplingKind, single, table, tone, vector } from './cells';

/**
 * The frequency at which a tone appears after sampling.
 * @customfunction FREQ FREQ
 * @param {any[][]} frequency Frequency of the tone, in the unit of the rate; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Folded frequency
 */
export function freq(frequency: any[][], rate: any[][], sampling?: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), samplingKind(sampling)], foldedFrequency);
}

/**
 * The Nyquist zone of a frequency, counted from 1; at IQ sampling 0 is the zone around 0.
 * @customfunction ZONE ZONE
 * @param {any[][]} frequency Frequency of the tone, in the unit of the rate; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Zone number
 */
export function zone(frequency: any[][], rate: any[][], sampling?: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), samplingKind(sampling)], frequencyZone);
}

/**
 * TRUE where sampling reverses the spectrum around a frequency: in the even zones of real sampling.
 * @customfunction INVERTED INVERTED
 * @param {any[][]} frequency Frequency of the tone, in the unit of the rate; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} TRUE or FALSE
 */
export function inverted(frequency: any[][], rate: any[][], sampling?: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), samplingKind(sampling)], isInverted);
}

/**
 * The lowest folded frequency of a band.
 * @customfunction LOW LOW
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Low end of the image
 */
export function low(low: any[][], high: any[][], rate: any[][], sampling?: any[][]): any[][] {
  return eachRow([...edges('low', low, 'high', high), number('rate', rate), samplingKind(sampling)], imageLow);
}

/**
 * The highest folded frequency of a band.
 * @customfunction HIGH HIGH
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} High end of the image
 */
export function high(low: any[][], high: any[][], rate: any[][], sampling?: any[][]): any[][] {
  return eachRow([...edges('low', low, 'high', high), number('rate', rate), samplingKind(sampling)], imageHigh);
}

/**
 * Distance of a band from the nearest edge of its zone, less the guard, in the worst case over the clock tolerance; negative where it crosses.
 * @customfunction MARGIN MARGIN
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Margin
 */
export function margin(low: any[][], high: any[][], rate: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][]): any[][] {
  return eachRow(
    [...edges('low', low, 'high', high), number('rate', rate), optional('guard', guard, 0), optional('ppm', ppm, 0), samplingKind(sampling)],
    bandMargin,
  );
}

/**
 * How a band fits its zone: "clear", "tight" (not with guard and tolerance), "crosses" and the edge, or "too wide".
 * @customfunction CHECK CHECK
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Text
 */
export function check(low: any[][], high: any[][], rate: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][]): any[][] {
  return eachRow(
    [...edges('low', low, 'high', high), number('rate', rate), optional('guard', guard, 0), optional('ppm', ppm, 0), samplingKind(sampling)],
    bandCheck,
  );
}

/**
 * Distance between the images of two bands; negative where they overlap, by how far one would have to move.
 * @customfunction GAP GAP
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} otherLow Low edge of the other band; a cell or a column
 * @param {any[][]} otherHigh High edge of the other band, not below otherLow
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Gap
 */
export function gap(low: any[][], high: any[][], otherLow: any[][], otherHigh: any[][], rate: any[][], sampling?: any[][]): any[][] {
  return eachRow(
    [...edges('low', low, 'high', high), ...edges('otherLow', otherLow, 'otherHigh', otherHigh), number('rate', rate), samplingKind(sampling)],
    bandGap,
  );
}

/**
 * All that the landing functions tell of each band: folded edges, zone, inversion, margin and check.
 * @customfunction BAND BAND
 * @param {any[][]} low Low edges, a column of the plan
 * @param {any[][]} high High edges, not below the low ones
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} A row for each band
 */
export function band(low: any[][], high: any[][], rate: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return eachRowOfTable(
    headerRow(headers),
    ['Folded low', 'Folded high', 'Zone', 'Inverted', 'Margin', 'Check'],
    [...edges('low', low, 'high', high), number('rate', rate), optional('guard', guard, 0), optional('ppm', ppm, 0), samplingKind(sampling)],
    (a, b, fs, g, p, kind) => [
      imageLow(a, b, fs, kind), imageHigh(a, b, fs, kind), bandZone(a, b, fs, kind), bandInverted(a, b, fs, kind),
      bandMargin(a, b, fs, g, p, kind), bandCheck(a, b, fs, g, p, kind),
    ],
  );
}

/**
 * Every true frequency in a range that lands on a folded frequency.
 * @customfunction IMAGES IMAGES
 * @param {any[][]} folded Frequency seen after sampling, from 0 to half the rate; at IQ sampling from minus half the rate
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} from Lowest frequency to list
 * @param {any[][]} to Highest frequency to list
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Frequency, Zone, Inverted
 */
export function images(folded: any[][], rate: any[][], from: any[][], to: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Frequency', 'Zone', 'Inverted'], () =>
    imagesOf(
      single(number('folded', folded)), single(number('rate', rate)), single(number('from', from)), single(number('to', to)),
      single(samplingKind(sampling)),
    ).map((source) => [source.frequency, source.zone, source.inverted]));
}

/**
 * The true frequencies in a range that agree with what several sample rates saw.
 * @customfunction RESOLVE RESOLVE
 * @param {any[][]} observed Folded frequencies, one for each rate
 * @param {any[][]} rates Sample rates, each above 0
 * @param {any[][]} from Lowest frequency to consider
 * @param {any[][]} to Highest frequency to consider
 * @param {any[][]} [tolerance] How far each observation may be off, 0 or more (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Lowest, Highest
 */
export function resolve(observed: any[][], rates: any[][], from: any[][], to: any[][], tolerance?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Lowest', 'Highest'], () =>
    resolveFrequency(
      vector(number('observed', observed)), vector(number('rates', rates)), single(number('from', from)), single(number('to', to)),
      single(optional('tolerance', tolerance, 0)), single(samplingKind(sampling)),
    ).map((range) => [range.lowest, range.highest]));
}
