// The noise budget of a converter. All results are in dB unless they say otherwise.

import { checkCount } from './counts';
import { faults } from './fault';

/** Decibels of a ratio of powers. */
const dB = (ratio: number): number => 10 * Math.log10(ratio);

/**
 * Signal-to-noise ratio that the jitter of the sampling instant allows a full-scale sine.
 * @param frequency above 0: the true one, not the folded
 * @param jitter rms, above 0, in the reciprocal unit: Hz and s, MHz and µs, GHz and ns
 * @throws Fault where an argument is not above 0
 * @source J. Azeredo-Leme, Clock jitter effects on sampling: a tutorial, IEEE Circuits and Systems Magazine 11(3), 2011
 * @example jitterSnr(100e6, 1e-12).toFixed(2) // => '64.04'
 */
export function jitterSnr(frequency: number, jitter: number): number {
  positive('frequency', frequency);
  positive('jitter', jitter);
  return -20 * Math.log10(2 * Math.PI * frequency * jitter);
}

/**
 * The largest rms jitter at which jitterSnr is still so many dB, in the reciprocal unit of the frequency.
 * @throws Fault where frequency is not above 0
 * @example jitterLimit(100, jitterSnr(100, 1e-6)).toPrecision(6) // => '0.00000100000'
 */
export function jitterLimit(frequency: number, snr: number): number {
  positive('frequency', frequency);
  return 10 ** (-snr / 20) / (2 * Math.PI * frequency);
}

/**
 * Signal-to-noise ratio of an ideal converter for a full-scale sine, with the processing gain of a bandwidth where one is given:
 * 10·log₁₀(1.5·4^bits), which is 6.02·bits + 1.76, and 10·log₁₀(rate/(2·bandwidth)).
 * @param bits 1 or more, not necessarily whole
 * @param rate and bandwidth: both or neither, above 0, the bandwidth at most rate/2
 * @throws Fault where an argument is out of range
 * @source W. Bennett, Spectra of quantized signals, Bell System Technical Journal 27(3), 1948
 * @example quantizationSnr(12, null, null).toFixed(2) // => '74.01'
 */
export function quantizationSnr(bits: number, rate: number | null, bandwidth: number | null): number {
  if (!(bits >= 1)) throw faults.below('bits', bits, 1);
  const ideal = dB(1.5) + bits * dB(4);
  if (bandwidth === null) return ideal;
  if (rate === null) throw faults.missingWith('rate', 'bandwidth');
  positive('rate', rate);
  positive('bandwidth', bandwidth);
  if (bandwidth > rate / 2) throw faults.aboveHalf('bandwidth', bandwidth, rate);
  return ideal + dB(rate / (2 * bandwidth));
}

/**
 * The signal-to-noise ratio that several give together: their noise powers add.
 * @param snrs one or more
 * @example sumSnr([60, 60]).toFixed(2) // => '56.99'
 */
export function sumSnr(snrs: readonly number[]): number {
  // Relative to the worst, so that no power overflows.
  const worst = Math.min(...snrs);
  return worst - dB(snrs.reduce((sum, snr) => sum + 10 ** ((worst - snr) / 10), 0));
}

/**
 * Effective bits of a signal-to-noise ratio: the bits of the ideal converter that has it.
 * @example effectiveBits(quantizationSnr(10, null, null)) // => 10
 */
export const effectiveBits = (snr: number): number => (snr - dB(1.5)) / dB(4);

/**
 * Loss by the noise that folds in from the other zones: 10·log₁₀(1 + (zones−1)·10^(−rejection/10)).
 * @param zones a whole number, the wanted zone included
 * @param rejection dB of the filter in the other zones
 * @throws Fault where zones is no whole number from 1
 * @source R. Lyons, Understanding Digital Signal Processing 3e, Eq. 2-12, for a rejection of 0
 * @example foldedNoise(2, 0).toFixed(2) // => '3.01'
 */
export function foldedNoise(zones: number, rejection: number): number {
  checkCount('zones', zones);
  return dB(1 + (zones - 1) * 10 ** (-rejection / 10));
}

function positive(argument: string, value: number): void {
  if (!(value > 0)) throw faults.notPositive(argument, value);
}
