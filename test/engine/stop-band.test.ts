import { describe, expect, it } from 'vitest';
import { bandGap, foldedFrequency, stopEdges } from '../../src/engine';
import { seeded } from '../support/random';

describe('the stop edges of a band', () => {
  it('land on its own edges, and nothing nearer lands inside: 1000 random bands (seed 341)', () => {
    const random = seeded(341);
    let found = 0;
    for (let i = 0; i < 1000; i++) {
      const rate = random.whole(20, 200);
      const low = random.whole(0, 4000) / 10;
      const high = low + random.whole(0, 100) / 10;
      let edges;
      try {
        edges = stopEdges(low, high, rate);
      } catch (fault) {
        expect((fault as Error).message).toMatch(/^The band from .* crosses a zone edge of the rate .*, so it overlaps its own mirror\.$/);
        continue;
      }
      found++;
      const { lower, upper } = edges;
      expect(foldedFrequency(upper.edge, rate)).toBeCloseTo(foldedFrequency(high, rate), 9);
      expect(upper.edge - high).toBeCloseTo(upper.transition, 9);
      if (lower) {
        expect(foldedFrequency(lower.edge, rate)).toBeCloseTo(foldedFrequency(low, rate), 9);
        expect(low - lower.edge).toBeCloseTo(lower.transition, 9);
      } else expect(high).toBeLessThanOrEqual(rate / 2);
      // Whatever lies between a stop edge and the band lands clear of it.
      for (const [from, to] of [[high, upper.edge], ...(lower ? [[lower.edge, low]] : [])] as [number, number][]) {
        const between = from + (to - from) * (0.01 + 0.98 * random.unit());
        if (to - from > 1e-6 && high > low) expect(bandGap(low, high, between, between, rate)).toBeGreaterThan(-1e-9);
      }
    }
    expect(found).toBeGreaterThan(500);
  });

  it('are its mirrors in the edges of its zone; zone 1 has none below', () => {
    expect(stopEdges(17.5, 22.5, 35)).toEqual({ lower: { edge: 17.5, transition: 0 }, upper: { edge: 47.5, transition: 25 } });
    expect(stopEdges(10, 20, 100)).toEqual({ lower: null, upper: { edge: 80, transition: 60 } });
  });
});
