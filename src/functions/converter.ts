// The family of what comes after the converter: down-conversion, decimation, the oscillator's word.

import { downConvert, tunedFrequency, tuningWord } from '../engine';
import { headerRow, eachRow, number, optional, single, table, tone, vector } from './cells';

/**
 * A band after the converter, an oscillator that moves it to 0, and one or more decimations, as it stands after each.
 * @customfunction CHAIN CHAIN
 * @param {any[][]} low Low edge of the band
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} oscillator Folded frequency that goes to 0, from 0 to half the rate
 * @param {any[][]} decimation Decimation, a whole number, or a column of them for several stages
 * @param {any[][]} [usable] Flat part of each output rate, above 0 and at most 1 (default 1)
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Output low, Output high, Output rate, Margin (negative from the stage on that no longer holds the band), Inverted
 * @formula image less oscillator; margin = usable·rate/2 less the farther end
 * @source common practice of digital down-conversion
 * @example =FOLD.CHAIN(60, 90, 100, 25, {2;2}, 0.9) =>
 *   Output low | Output high | Output rate | Margin | Inverted
 *   -15 | 15 | 50 | 7.5 | TRUE
 *   -15 | 15 | 25 | -3.75 | TRUE
 */
export function chain(low: any[][], high: any[][], rate: any[][], oscillator: any[][], decimation: any[][], usable?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Output low', 'Output high', 'Output rate', 'Margin', 'Inverted'], () =>
    downConvert(
      single(number('low', low)), single(number('high', high)), single(number('rate', rate)), single(number('oscillator', oscillator)),
      vector(number('decimation', decimation)), single(optional('usable', usable, 1)),
    ).map((stage) => [stage.low, stage.high, stage.rate, stage.margin, stage.inverted]));
}

/**
 * The word of a numerically controlled oscillator that comes nearest to a frequency.
 * @customfunction TUNINGWORD TUNINGWORD
 * @param {any[][]} frequency Wanted frequency; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} bits Bits of the accumulator, 1 to 53
 * @returns {any[][]} Word
 * @formula round(2ᵇ·f/fs) modulo 2ᵇ
 * @source common practice of direct digital synthesis
 * @example =FOLD.TUNINGWORD(25, 100, 32) => 1073741824
 */
export function tuningword(frequency: any[][], rate: any[][], bits: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), number('bits', bits)], tuningWord);
}

/**
 * The frequency that TUNINGWORD's word really gives.
 * @customfunction TUNED TUNED
 * @param {any[][]} frequency Wanted frequency; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} bits Bits of the accumulator, 1 to 53
 * @returns {any[][]} Frequency
 * @formula word·fs/2ᵇ
 * @source common practice of direct digital synthesis
 * @example =FOLD.TUNED(10, 100, 8) => 10.15625
 */
export function tuned(frequency: any[][], rate: any[][], bits: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), number('bits', bits)], tunedFrequency);
}
