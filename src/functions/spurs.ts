// The spurs family: what else lands in the spectrum.

import { harmonicsOf, interleavingSpurs, intermodulation, mixingProducts, outputImages, suspectsOf } from '../engine';
import { count, headerRow, holdKind, number, optional, rowNames, samplingKind, single, table, vector } from './cells';

/**
 * The harmonics of a band, and where each lands.
 * @customfunction HARMONICS HARMONICS
 * @param {any[][]} low Low edge of the band
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [highest] Highest order to list (default 5)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Order, Low, High, Folded low, Folded high, Zone, Inverted, Gap (to the fundamental's image)
 * @formula n·low to n·high, folded
 * @source Kester (ed.), The Data Conversion Handbook
 * @example =FOLD.HARMONICS(10, 12, 50, 3) =>
 *   Order | Low | High | Folded low | Folded high | Zone | Inverted | Gap
 *   1 | 10 | 12 | 10 | 12 | 1 | FALSE | 
 *   2 | 20 | 24 | 20 | 24 | 1 | FALSE | 8
 *   3 | 30 | 36 | 14 | 20 | 2 | TRUE | 2
 */
export function harmonics(low: any[][], high: any[][], rate: any[][], highest?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Order', 'Low', 'High', 'Folded low', 'Folded high', 'Zone', 'Inverted', 'Gap'], () =>
    harmonicsOf(single(number('low', low)), single(number('high', high)), single(number('rate', rate)), single(count('highest', highest, 5)), single(samplingKind(sampling)))
      .map(({ order, low: from, high: to, foldedLow, foldedHigh, zone, inverted, gap }) => [order, from, to, foldedLow, foldedHigh, zone, inverted, gap ?? '']));
}

/**
 * What interleaved cores add to a band: its displaced images, and offset tones.
 * @customfunction INTERLEAVING INTERLEAVING
 * @param {any[][]} low Low edge of the band
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate of all cores together, above 0
 * @param {any[][]} cores Interleaved cores, 1 to 64
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Kind, Multiple (q of q·rate/cores), Folded low, Folded high, Gap
 * @formula images at q·fs/M ± f, offset tones at q·fs/M
 * @source Black and Hodges, Time interleaved converter arrays, IEEE J. Solid-State Circuits, 1980
 * @example =FOLD.INTERLEAVING(10, 12, 100, 4) =>
 *   Kind | Multiple | Folded low | Folded high | Gap
 *   image | 1 | 35 | 37 | 23
 *   image | 2 | 38 | 40 | 26
 *   image | 3 | 13 | 15 | 1
 *   offset | 1 | 25 | 25 | 13
 *   offset | 2 | 50 | 50 | 38
 */
export function interleaving(low: any[][], high: any[][], rate: any[][], cores: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Kind', 'Multiple', 'Folded low', 'Folded high', 'Gap'], () =>
    interleavingSpurs(single(number('low', low)), single(number('high', high)), single(number('rate', rate)), single(number('cores', cores)))
      .map(({ kind, multiple, foldedLow, foldedHigh, gap }) => [kind, multiple, foldedLow, foldedHigh, gap]));
}

/**
 * The products m·band ± n·oscillator of a mixer, and where each lands.
 * @customfunction MIXING MIXING
 * @param {any[][]} low Low edge of the band
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} oscillator Frequency of the oscillator, above 0
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [m] Highest multiple of the band (default 3)
 * @param {any[][]} [n] Highest multiple of the oscillator (default 3)
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} m, n, Low, High, Folded low, Folded high
 * @formula m·band ± n·oscillator, folded
 * @source common practice of mixer charts
 * @example =FOLD.MIXING(10, 12, 100, 250, 1, 1) =>
 *   m | n | Low | High | Folded low | Folded high
 *   0 | 1 | 100 | 100 | 100 | 100
 *   1 | -1 | 88 | 90 | 88 | 90
 *   1 | 1 | 110 | 112 | 110 | 112
 */
export function mixing(low: any[][], high: any[][], oscillator: any[][], rate: any[][], m?: any[][], n?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['m', 'n', 'Low', 'High', 'Folded low', 'Folded high'], () =>
    mixingProducts(
      single(number('low', low)), single(number('high', high)), single(number('oscillator', oscillator)), single(number('rate', rate)), single(count('m', m, 3)), single(count('n', n, 3)),
    ).map((product) => [product.m, product.n, product.low, product.high, product.foldedLow, product.foldedHigh]));
}

/**
 * The products of two or more tones in a nonlinear stage, and where each lands.
 * @customfunction INTERMOD INTERMOD
 * @param {any[][]} frequencies Tones, two or more
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [order] Highest sum of the multipliers (default 3)
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Product, Order, Frequency, Folded
 * @formula Σ kᵢ·fᵢ with Σ|kᵢ| from 2 to the order, folded
 * @source Kester (ed.), The Data Conversion Handbook
 * @example =FOLD.INTERMOD({5;6}, 16, 2) =>
 *   Product | Order | Frequency | Folded
 *   f2-f1 | 2 | 1 | 1
 *   2·f1 | 2 | 10 | 6
 *   f1+f2 | 2 | 11 | 5
 *   2·f2 | 2 | 12 | 4
 */
export function intermod(frequencies: any[][], rate: any[][], order?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Product', 'Order', 'Frequency', 'Folded'], () =>
    intermodulation(vector(number('frequencies', frequencies)), single(number('rate', rate)), single(count('order', order, 3)))
      .map((product) => [product.product, product.order, product.frequency, product.folded]));
}

/**
 * What could make a spur seen at a folded frequency, the likeliest first: products of the tones, and what interleaved cores add.
 * @customfunction SOURCES SOURCES
 * @param {any[][]} observed Folded frequency of the spur, from 0 to half the rate
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} tones Tones that are present
 * @param {any[][]} [order] Highest sum of the absolute multipliers (default 5)
 * @param {any[][]} [tolerance] How far the observation may be off, 0 or more (default 0)
 * @param {any[][]} [cores] Interleaved cores, 1 to 64 (default 1)
 * @param {any[][]} [name] Names of the tones
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Product, Order, Frequency, Miss
 * @formula the products Σ kᵢ·fᵢ, with the cores' images and tones, that land within the tolerance; lower orders first
 * @source as INTERMOD and INTERLEAVING
 * @example =FOLD.SOURCES(6, 20, {7;4}, 3, 0.5, 2, {"carrier";"clock"}) =>
 *   Product | Order | Frequency | Miss
 *   clock image 1/2 | 1 | 14 | 0
 *   2·carrier | 2 | 14 | 0
 */
export function sources(observed: any[][], rate: any[][], tones: any[][], order?: any[][], tolerance?: any[][], cores?: any[][], name?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Product', 'Order', 'Frequency', 'Miss'], () => {
    const frequencies = vector(number('tones', tones));
    return suspectsOf(
      single(number('observed', observed)), single(number('rate', rate)), frequencies, single(count('order', order, 5)), single(optional('tolerance', tolerance, 0)),
      single(count('cores', cores, 1)), rowNames('name', name, 'tones', frequencies.length, (row) => `f${row + 1}`),
    ).map((suspect) => [suspect.product, suspect.order, suspect.frequency, suspect.miss]);
  });
}

/**
 * The images of a generated band in each zone, with the level that a held output leaves at the centre.
 * @customfunction DACIMAGES DACIMAGES
 * @param {any[][]} low Low edge of the band, from 0
 * @param {any[][]} high High edge of the band, to half the rate
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [zones] How many zones to list (default 4)
 * @param {any[][]} [hold] "nrz" (default), "rz" or "doublet"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Zone, Low, High, Inverted, Level dB (blank where nothing is left)
 * @formula k·fs ± band; the level is that of DROOP at the centre
 * @source Kester (ed.), The Data Conversion Handbook
 * @example =FOLD.DACIMAGES(10, 20, 100, 3) =>
 *   Zone | Low | High | Inverted | Level dB
 *   1 | 10 | 20 | FALSE | -0.323887337936199
 *   2 | 80 | 90 | TRUE | -15.3904406711084
 *   3 | 110 | 120 | FALSE | -18.0160189638948
 */
export function dacimages(low: any[][], high: any[][], rate: any[][], zones?: any[][], hold?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Zone', 'Low', 'High', 'Inverted', 'Level dB'], () =>
    outputImages(single(number('low', low)), single(number('high', high)), single(number('rate', rate)), single(count('zones', zones, 4)), single(holdKind(hold)))
      .map((image) => [image.zone, image.low, image.high, image.inverted, image.level ?? '']));
}
