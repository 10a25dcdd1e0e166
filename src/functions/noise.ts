// The noise family: what a converter leaves of the signal-to-noise ratio, and how to test it.

import { coherentCycles, coherentFrequency, effectiveBits, faults, foldedNoise, holdLevel, jitterLimit, jitterSnr, quantizationSnr, sumSnr } from '../engine';
import { allNumbers, eachRow, holdKind, limit, number, optional, result, tone } from './cells';

/**
 * The signal-to-noise ratio that sampling jitter allows a full-scale sine.
 * @customfunction JITTERSNR JITTERSNR
 * @param {any[][]} frequency True frequency of the sine, above 0; a cell or a column
 * @param {any[][]} jitter Rms jitter, above 0, in the reciprocal unit: Hz and s, MHz and µs, GHz and ns
 * @returns {any[][]} dB
 */
export function jittersnr(frequency: any[][], jitter: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('jitter', jitter)], jitterSnr);
}

/**
 * The largest rms jitter that leaves a signal-to-noise ratio.
 * @customfunction JITTERLIMIT JITTERLIMIT
 * @param {any[][]} frequency True frequency of the sine, above 0; a cell or a column
 * @param {any[][]} snr Signal-to-noise ratio in dB
 * @returns {any[][]} Jitter in the reciprocal unit: s for Hz, µs for MHz, ns for GHz
 */
export function jitterlimit(frequency: any[][], snr: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('snr', snr)], jitterLimit);
}

/**
 * The signal-to-noise ratio of an ideal converter, with processing gain where a bandwidth is given.
 * @customfunction QUANTSNR QUANTSNR
 * @param {any[][]} bits Bits of the converter, 1 or more; a cell or a column
 * @param {any[][]} [rate] Sample rate; needed with a bandwidth
 * @param {any[][]} [bandwidth] Bandwidth that is kept, at most half the rate
 * @returns {any[][]} dB
 */
export function quantsnr(bits: any[][], rate?: any[][], bandwidth?: any[][]): any[][] {
  return eachRow([tone('bits', bits), limit('rate', rate), limit('bandwidth', bandwidth)], quantizationSnr);
}

/**
 * The signal-to-noise ratio that several give together: their noise powers add.
 * @customfunction SUMSNR SUMSNR
 * @param {any[][][]} snr Signal-to-noise ratios in dB: cells or ranges, blank cells left out
 * @returns {any[][]} dB
 */
export function sumsnr(snr: any[][][]): any[][] {
  return result(() => sumSnr(allNumbers('snr', snr)));
}

/**
 * The effective bits of a signal-to-noise ratio.
 * @customfunction ENOB ENOB
 * @param {any[][]} snr Signal-to-noise ratio in dB; a cell or a column
 * @returns {any[][]} Bits
 */
export function enob(snr: any[][]): any[][] {
  return eachRow([tone('snr', snr)], effectiveBits);
}

/**
 * The loss by noise that folds in from the other zones.
 * @customfunction NOISEFOLD NOISEFOLD
 * @param {any[][]} zones Zones that let noise in, the wanted one included; a cell or a column
 * @param {any[][]} [rejection] Attenuation of the filter in the other zones in dB (default 0)
 * @returns {any[][]} dB
 */
export function noisefold(zones: any[][], rejection?: any[][]): any[][] {
  return eachRow([tone('zones', zones), optional('rejection', rejection, 0)], foldedNoise);
}

/**
 * The level of a held output at a frequency, against a sample held for its whole period.
 * @customfunction DROOP DROOP
 * @param {any[][]} frequency Frequency, 0 or more; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [hold] "nrz" (default), "rz" or "doublet"
 * @returns {any[][]} dB
 */
export function droop(frequency: any[][], rate: any[][], hold?: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), holdKind(hold)], (f, fs, kind) => {
    const level = holdLevel(f, fs, kind);
    if (level === null) throw faults.noLevel(f);
    return level;
  });
}

/**
 * The nearest test frequency that makes a whole number of cycles, prime to the record length.
 * @customfunction COHERENT COHERENT
 * @param {any[][]} frequency Wanted frequency, 0 or more; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} samples Record length, a whole number
 * @returns {any[][]} Frequency
 */
export function coherent(frequency: any[][], rate: any[][], samples: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), number('samples', samples)], coherentFrequency);
}

/**
 * The whole number of cycles that COHERENT's frequency makes in the record.
 * @customfunction CYCLES CYCLES
 * @param {any[][]} frequency Wanted frequency, 0 or more; a cell or a column
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} samples Record length, a whole number
 * @returns {any[][]} Cycles
 */
export function cycles(frequency: any[][], rate: any[][], samples: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), number('samples', samples)], coherentCycles);
}
