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
 * @formula |f − fs·round(f/fs)|; at IQ sampling f − fs·⌊f/fs + ½⌋
 * @source the sampling theorem; Lyons, Understanding Digital Signal Processing, 3rd ed., section 2.1
 * @example =FOLD.FREQ(70, 100) => 30
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
 * @formula ⌊2f/fs⌋ + 1; at IQ sampling ⌊f/fs + ½⌋
 * @source common practice: zones are half the rate wide and counted from 1
 * @example =FOLD.ZONE(70, 100) => 2
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
 * @formula whether the zone number is even; never at IQ sampling
 * @source Lyons, Understanding Digital Signal Processing, 3rd ed., section 2.3
 * @example =FOLD.INVERTED(70, 100) => TRUE
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
 * @formula the least folded frequency of the band: 0 where it holds a multiple of fs
 * @source common practice
 * @example =FOLD.LOW(60, 90, 100) => 10
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
 * @formula the greatest folded frequency of the band: fs/2 where it holds an odd multiple of fs/2
 * @source common practice
 * @example =FOLD.HIGH(60, 90, 100) => 40
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
 * @formula min(low − e₁·(1 + t), e₂·(1 − t) − high) − guard, with the zone's edges e₁ and e₂ and t = ppm/10⁶
 * @source the definition of this add-in; the zone is that of the band's centre
 * @example =FOLD.MARGIN(60, 90, 100, 2, 1000) => 7.9
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
 * @formula clear where MARGIN is 0 or more, tight where it would be without guard and tolerance, otherwise the edge that is crossed, or too wide
 * @source the definition of this add-in
 * @example =FOLD.CHECK(17.5, 22.5, 40) => crosses 20
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
 * @formula the greater of one image's low end less the other's high end, either way round
 * @source the definition of this add-in
 * @example =FOLD.GAP(60, 90, 10, 20, 100) => -10
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
 * @formula LOW, HIGH, ZONE of the centre, INVERTED, MARGIN and CHECK side by side
 * @source see there
 * @example =FOLD.BAND(60, 90, 100, 2, 1000) =>
 *   Folded low | Folded high | Zone | Inverted | Margin | Check
 *   10 | 40 | 2 | TRUE | 7.9 | clear
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
 * @formula k·fs ± f for every whole k; at IQ sampling k·fs + f
 * @source Lyons, Understanding Digital Signal Processing, 3rd ed., section 2.1
 * @example =FOLD.IMAGES(30, 100, 0, 150) =>
 *   Frequency | Zone | Inverted
 *   30 | 1 | FALSE
 *   70 | 2 | TRUE
 *   130 | 3 | FALSE
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
 * @formula the intersection, over the rates, of all k·fs ± observed, each widened by the tolerance
 * @source the Chinese remainder theorem; Sunzi Suanjing
 * @example =FOLD.RESOLVE({14;10;4}, {56;40;33}, 0, 1000) =>
 *   Lowest | Highest
 *   70 | 70
 */
export function resolve(observed: any[][], rates: any[][], from: any[][], to: any[][], tolerance?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Lowest', 'Highest'], () =>
    resolveFrequency(
      vector(number('observed', observed)), vector(number('rates', rates)), single(number('from', from)), single(number('to', to)),
      single(optional('tolerance', tolerance, 0)), single(samplingKind(sampling)),
    ).map((range) => [range.lowest, range.highest]));
}
