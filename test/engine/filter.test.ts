import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { type Edges, Fault, type Response, filterAttenuation, filterOrder } from '../../src/engine';
import { seeded } from '../support/random';

type Row = [Response, number | null, number | null, number | null, number | null, number, number, number, number, [number, number][]];
const { rows } = JSON.parse(readFileSync(path.join(import.meta.dirname, '../fixtures/filter/scipy.json'), 'utf8')) as { rows: Row[] };
const edges = (low: number | null, high: number | null): Edges => ({ low, high });

describe('filter orders and attenuations', () => {
  it('are those of scipy.signal for 2000 random specifications (fixtures/filter/make.py)', () => {
    const wrong: unknown[] = [];
    for (const [response, passLow, passHigh, stopLow, stopHigh, ripple, attenuation, order, raw] of rows) {
      const own = filterOrder(response, edges(passLow, passHigh), edges(stopLow, stopHigh), ripple, attenuation);
      // Where the order before rounding is a whole number but for rounding, either side will do.
      if (own !== order && Math.abs(raw - Math.round(raw)) > 1e-9) wrong.push([response, passLow, passHigh, stopLow, stopHigh, ripple, attenuation, { own, order, raw }]);
    }
    expect(wrong).toEqual([]);
    expect(rows).toHaveLength(2000);
  });

  it('attenuations of scipy.signal are met within 1e-9 of themselves (fixtures/filter/make.py)', () => {
    const wrong: unknown[] = [];
    for (const [response, , , , , ripple, attenuation, order, , points] of rows) {
      for (const [w, dB] of points) {
        const own = filterAttenuation(response, order, edges(null, 1), ripple, w, attenuation)!;
        // A loss near 0 dB is a difference of nearly equal numbers there: there the size of a rounding of 1 counts.
        if (Math.abs(own - dB) > 1e-9 * Math.max(dB, 1e-3)) wrong.push({ response, ripple, attenuation, order, w, own, dB });
      }
    }
    expect([wrong.length, wrong.slice(0, 5)]).toEqual([0, []]);
  });

  it.each<[Response, number, number, number, number, number, string]>([
    // response, ripple, attenuation, pass, stop, order, source
    ['butterworth', 3.01, 40, 500, 1000, 7, 'Proakis & Manolakis 3e, Ex. 8.3.6, from a companion script'],
    ['butterworth', 1, 30, 200, 600, 4, 'Babu, Digital Signal Processing, Ex. 5.1, from a companion script'],
    ['butterworth', 2, 10, 20, 30, 4, 'Babu, Ex. 5.4'],
    ['chebyshev', 3.01, 20, 1, 2, 3, 'Babu, Ex. 5.7'],
    ['chebyshev', 1, 40, 1, 2, 5, 'Babu, Ex. 5.8'],
    ['butterworth', 3, 15, 2, 3, 5, 'Pozar, Microwave Engineering, Ex. 8.3 (from memory)'],
    ['butterworth', 1, 80, 1, 1.2, 55, 'scipy.signal test suite'],
    ['chebyshev', 1, 80, 1, 1.2, 17, 'scipy.signal test suite'],
    ['elliptic', 1, 80, 1, 1.2, 9, 'scipy.signal test suite'],
    ['butterworth', 3, 60, 200, 600, 7, 'scipy.signal test suite'],
  ])('%s, %d and %d dB, %d to %d, is of order %d (%s)', (response, ripple, attenuation, pass, stop, order) => {
    expect(filterOrder(response, edges(null, pass), edges(null, stop), ripple, attenuation)).toBe(order);
  });

  it('the Butterworth band-pass of the scipy.signal documentation has order 13', () => {
    expect(filterOrder('butterworth', edges(20, 50), edges(14, 60), 3, 40)).toBe(13);
  });

  it('belong together: the order meets the stop edge, one less does not: 2000 random specifications (seed 301)', () => {
    const random = seeded(301);
    let refused = 0;
    for (let i = 0; i < 2000; i++) {
      const response = random.pick(['butterworth', 'chebyshev', 'inverse chebyshev', 'elliptic'] as const);
      const high = random.decimal(4, 2);
      const ratio = 1.02 + 3 * random.unit() ** 2;
      const kind = random.whole(0, 2);
      const low = high / (1.2 + 2 * random.unit());
      const [pass, stop] = kind === 0 ? [edges(null, high), edges(null, high * ratio)]
        : kind === 1 ? [edges(high, null), edges(high / ratio, null)]
          : [edges(low, high), edges(low / ratio, high + (high - low) * (ratio - 1))];
      const [ripple, attenuation] = [0.01 + 3 * random.unit(), 10 + 90 * random.unit()];
      const order = filterOrder(response, pass, stop, ripple, attenuation);
      const atEdges = (n: number) => Math.min(...[stop.low, stop.high].filter((edge) => edge !== null).map((edge) => filterAttenuation(response, n, pass, ripple, edge, attenuation) ?? Infinity));
      expect(atEdges(order)).toBeGreaterThanOrEqual(attenuation * (1 - 1e-9));
      if (order === 1) continue;
      refused++;
      expect(atEdges(order - 1)).toBeLessThan(attenuation * (1 + 1e-9));
    }
    expect(refused).toBeGreaterThan(1500);
  });

  it.each<[Response]>([['butterworth'], ['chebyshev'], ['inverse chebyshev'], ['elliptic']])('%s loses its ripple at both pass edges, and never more between', (response) => {
    const pass = edges(90, 110);
    for (const order of [1, 2, 5, 8]) {
      const loss = (f: number) => filterAttenuation(response, order, pass, 0.5, f, 60)!;
      expect([loss(90), loss(110)].map((x) => x.toFixed(9))).toEqual(['0.500000000', '0.500000000']);
      for (let f = 90; f <= 110; f += 0.25) expect(loss(f)).toBeLessThanOrEqual(0.5 + 1e-9);
      for (const f of [1, 40, 80, 89, 111, 140, 1000]) expect(loss(f)).toBeGreaterThan(0.5);
    }
  });

  it('an order that no one can build is still an answer, and a stop band may be endlessly deep', () => {
    expect(filterOrder('butterworth', edges(null, 100), edges(null, 100.01), 0.1, 120)).toBe(156_961);
    expect(filterAttenuation('butterworth', 2000, edges(null, 100), 3, 1e9, null)).toBeCloseTo(279_999.98, 1);
    expect(filterAttenuation('chebyshev', 3, edges(100, null), 1, 0, null)).toBeNull();
  });

  it.each<[string, () => unknown]>([
    ['ripple must be above 0; got 0.', () => filterOrder('butterworth', edges(null, 1), edges(null, 2), 0, 40)],
    ['attenuation must be above ripple, 3 dB; got 2.', () => filterOrder('butterworth', edges(null, 1), edges(null, 2), 3, 2)],
    ['passHigh must be given for a low-pass, passLow for a high-pass, both for a band-pass; got two blank cells.', () => filterOrder('butterworth', edges(null, null), edges(null, 2), 3, 40)],
    ['passLow and stopLow must both be given or both be blank.', () => filterOrder('butterworth', edges(1, 2), edges(null, 3), 3, 40)],
    ['stopHigh must be above passHigh, 2; got 1.', () => filterOrder('butterworth', edges(null, 2), edges(null, 1), 3, 40)],
    ['stopLow must be below passLow, 2; got 3.', () => filterOrder('butterworth', edges(2, null), edges(3, null), 3, 40)],
    ['passLow must not be above passHigh; got 3 and 2.', () => filterOrder('butterworth', edges(3, 2), edges(1, 4), 3, 40)],
    ['attenuation must be given for the response "elliptic"; got a blank cell.', () => filterAttenuation('elliptic', 3, edges(null, 1), 1, 2, null)],
    ['order must be a whole number, 1 or more; got 0.', () => filterAttenuation('butterworth', 0, edges(null, 1), 1, 2, null)],
  ])('say in words: %s', (sentence, ask) => expect(ask).toThrow(new Fault('input', sentence)));
});
