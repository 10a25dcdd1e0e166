// Where an anti-alias filter must stop: the frequencies nearest to a band that land in its image.

import { folds, isWithinZone, readBand, readRate } from './band';
import { faults } from './fault';
import { zoneEdges, zoneExactly } from './folding';
import { centre } from './interval';
import { subtract, times, toNumber } from './rational';

/** A stop edge, and how far it is from the band. */
export interface StopEdge {
  edge: number;
  transition: number;
}

/**
 * At real sampling the neighbours of a band are its mirrors in the edges of its zone; below zone 1 there is none.
 * @throws Fault where low is above high, rate is not above 0, or the band crosses a zone edge and so overlaps its mirror
 * @example stopEdges(60, 90, 100) // => { lower: { edge: 40, transition: 20 }, upper: { edge: 110, transition: 20 } }
 */
export function stopEdges(low: number, high: number, rate: number): { lower: StopEdge | null; upper: StopEdge } {
  const fs = readRate(rate);
  const band = folds(readBand(low, high), 'real');
  if (!isWithinZone(band, fs)) throw faults.noOneImage(low, high, rate);
  const { lower, upper } = zoneEdges(zoneExactly(centre(band), fs, 'real'), fs, 'real');
  const [below, above] = [subtract(band.low, lower), subtract(upper, band.high)];
  return {
    lower: lower.n === 0n ? null : { edge: toNumber(subtract(lower, below)), transition: toNumber(times(below, 2n)) },
    upper: { edge: toNumber(subtract(times(upper, 2n), band.high)), transition: toNumber(times(above, 2n)) },
  };
}
