// The noise family: what a converter leaves of the signal-to-noise ratio, and how to test it.

import { coherentCycles, coherentFrequency, effectiveBits, faults, foldedNoise, holdLevel, jitterLimit, jitterSnr, quantizationSnr, sumSnr } from '../engine';
import { allNumbers, eachRow, holdKind, limit, number, optional, result, tone } from './cells';

/**
 * The signal-to-noise ratio that sampling jitter allows a full-scale sine.
 * @customfunction JITTERSNR JITTERSNR
 * @param {any[][]} frequency True frequency of the sine, above 0; a cell or a column
 * @param {any[][]} jitter Rms jitter, above 0, in the reciprocal unit: Hz and s, MHz and µs, GHz and ns
 * @returns {any[][]} dB
 * @formula −20·lg(2π·f·t)
 * @source Kester (ed.), The Data Conversion Handbook
 * @example =FOLD.JITTERSNR(100, 0.000001) => 64.0364026328377
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
 * @formula 10^(−snr/20)/(2π·f)
 * @source Kester (ed.), The Data Conversion Handbook
 * @example =FOLD.JITTERLIMIT(100, 64) => 0.00000100419980254159
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
 * @formula 20·lg(2ᴺ·√1.5) + 10·lg(fs/(2·bandwidth))
 * @source Bennett, Spectra of quantized signals, Bell System Technical Journal, 1948
 * @example =FOLD.QUANTSNR(12) => 74.0081115499123
 */
export function quantsnr(bits: any[][], rate?: any[][], bandwidth?: any[][]): any[][] {
  return eachRow([tone('bits', bits), limit('rate', rate), limit('bandwidth', bandwidth)], quantizationSnr);
}

/**
 * The signal-to-noise ratio that several give together: their noise powers add.
 * @customfunction SUMSNR SUMSNR
 * @param {any[][][]} snr Signal-to-noise ratios in dB: cells or ranges, blank cells left out
 * @returns {any[][]} dB
 * @formula −10·lg Σ 10^(−snr/10)
 * @source noise powers add
 * @example =FOLD.SUMSNR(70, 70) => 66.9897000433602
 */
export function sumsnr(snr: any[][][]): any[][] {
  return result(() => sumSnr(allNumbers('snr', snr)));
}

/**
 * The effective bits of a signal-to-noise ratio.
 * @customfunction ENOB ENOB
 * @param {any[][]} snr Signal-to-noise ratio in dB; a cell or a column
 * @returns {any[][]} Bits
 * @formula (snr − 10·lg 1.5)/(20·lg 2)
 * @source IEEE Std 1241
 * @example =FOLD.ENOB(74) => 11.9986527007227
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
 * @formula 10·lg(1 + (zones − 1)·10^(−rejection/10))
 * @source Lyons, Understanding Digital Signal Processing, 3rd ed., section 2.3
 * @example =FOLD.NOISEFOLD(2) => 3.01029995663981
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
 * @formula with x = f/fs, 20·lg of |sinc x|, |sinc(x/2)|/2 or |sin²(πx/2)/(πx/2)|, sinc x = sin(πx)/(πx)
 * @source the Fourier transform of the held pulse
 * @example =FOLD.DROOP(50, 100) => -3.92239754060305
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
 * @formula fs·J/M, J and M relatively prime
 * @source IEEE Std 1057 and 1241
 * @example =FOLD.COHERENT(10, 100, 1024) => 10.05859375
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
 * @formula the J of COHERENT
 * @source IEEE Std 1057 and 1241
 * @example =FOLD.CYCLES(10, 100, 1024) => 103
 */
export function cycles(frequency: any[][], rate: any[][], samples: any[][]): any[][] {
  return eachRow([tone('frequency', frequency), number('rate', rate), number('samples', samples)], coherentCycles);
}
