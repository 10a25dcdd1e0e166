// Test frequencies that make a whole number of cycles in a record, prime to its length, so that every sample is a different one.

import { readRate } from './band';
import { checkCount } from './counts';
import { faults } from './fault';
import { type Rational, absolute, compare, divide, floor, fromNumber, multiply, rational, subtract, toNumber } from './rational';

/**
 * The whole number of cycles, prime to the record length, whose frequency cycles·rate/samples is nearest to a frequency; the lower one
 * of two as near.
 * @param frequency 0 or more, in any zone
 * @param samples record length, a whole number from 1 to 2^32
 * @throws Fault where an argument is out of range
 * @source IEEE Std 1241, coherent sampling (from memory)
 * @example coherentCycles(10, 100, 1024) // => 103 (102.4 is nearest to 102, which is even)
 */
export function coherentCycles(frequency: number, rate: number, samples: number): number {
  return Number(cyclesNearest(frequency, readRate(rate), samples));
}

/**
 * The frequency of coherentCycles, in the unit of its inputs.
 * @example coherentFrequency(10, 100, 1024) // => 10.05859375
 */
export function coherentFrequency(frequency: number, rate: number, samples: number): number {
  const fs = readRate(rate);
  return toNumber(multiply(fs, rational(cyclesNearest(frequency, fs, samples), BigInt(samples))));
}

function cyclesNearest(frequency: number, rate: Rational, samples: number): bigint {
  if (!(frequency >= 0)) throw faults.negative('frequency', frequency);
  checkCount('samples', samples, 2 ** 32);
  const length = BigInt(samples);
  const place = divide(multiply(fromNumber(frequency), rational(length)), rate);
  const begin = floor(place);
  let below = begin;
  while (below >= 1n && !coprime(below, length)) below--;
  let above = begin + 1n;
  while (!coprime(above, length)) above++;
  if (below < 1n) return above;
  const miss = (cycles: bigint) => absolute(subtract(place, rational(cycles)));
  return compare(miss(below), miss(above)) <= 0 ? below : above;
}

function coprime(a: bigint, b: bigint): boolean {
  while (b > 0n) [a, b] = [b, a % b];
  return a === 1n;
}
