import { describe, expect, it } from 'vitest';
import { Fault, type RateRange, type Sampling, bandMargin, bandZone, clockTolerance, lowestRate, usableRates } from '../../src/engine';
import { type Random, seeded } from '../support/random';

interface Case {
  low: number;
  high: number;
  guard: number;
  ppm: number;
  sampling: Sampling;
}

/** A band of up to 200 zones, with guard and tolerance in most cases. */
function randomCase(random: Random): Case {
  const high = random.decimal(random.whole(1, 7), random.whole(-1, 4));
  const low = Number((high * (1 - random.pick([0.01, 0.1, 0.5, 1]) * (0.5 + random.unit() / 2))).toPrecision(random.whole(4, 8)));
  return {
    low,
    high,
    guard: random.pick([0, Number(((high - low) * random.unit()).toPrecision(2))]),
    ppm: random.pick([0, 1, 25, 100, 0.5, 2000]),
    sampling: random.pick(['real', 'iq'] as const),
  };
}

const list = ({ low, high, guard, ppm, sampling }: Case): RateRange[] => {
  try {
    return usableRates(low, high, 0, null, guard, ppm, sampling);
  } catch (fault) {
    if (fault instanceof Fault && fault.kind === 'none') return [];
    throw fault;
  }
};

const marginAt = (rate: number, { low, high, guard, ppm, sampling }: Case) => bandMargin(low, high, rate, guard, ppm, sampling);

/** The decimal one unit of its 15th digit beside x. */
function beside(x: number, step: 1n | -1n): number {
  const [digits, exponent] = x.toExponential(14).split('e') as [string, string];
  return Number(`${BigInt(digits.replace('.', '')) + step}e${Number(exponent) - 14}`);
}

describe('usable rates of one band', () => {
  it('hold at every end and inside, and nothing between them does: 10 000 random bands (seed 41)', () => {
    const random = seeded(41);
    let ends = 0;
    let gaps = 0;
    for (let i = 0; i < 10_000; i++) {
      const band = randomCase(random);
      const ranges = list(band);
      const failing: unknown[] = [];
      for (const [k, { zone, lowest, highest }] of ranges.entries()) {
        const top = highest ?? lowest * 3;
        const inside = Number((lowest + (top - lowest) * random.unit()).toPrecision(15));
        for (const rate of [lowest, top, inside]) {
          ends++;
          if (!(marginAt(rate, band) >= 0)) failing.push({ rate, zone });
        }
        // Just outside, and somewhere in the gap below (above a rate of 1/10 of the lowest, for the lowest range).
        const below = ranges[k - 1]?.highest ?? lowest / 10;
        const gap = Number((below + (lowest - below) * random.unit()).toPrecision(15));
        const outside = [beside(lowest, -1n), gap, ...(highest === null ? [] : [beside(highest, 1n)])];
        for (const rate of outside) {
          if (ranges.some((range) => range.lowest <= rate && rate <= (range.highest ?? Infinity))) continue;
          gaps++;
          if (!(marginAt(rate, band) < 0)) failing.push({ rate, between: [below, lowest] });
        }
      }
      expect({ band, failing }).toEqual({ band, failing: [] });
    }
    expect(ends).toBeGreaterThan(100_000);
    expect(gaps).toBeGreaterThan(50_000);
  });

  it('where none is usable, random rates agree (seed 42)', () => {
    const random = seeded(42);
    let without = 0;
    for (let i = 0; i < 3000; i++) {
      const band = randomCase(random);
      if (list(band).length > 0) continue;
      without++;
      for (let k = 0; k < 20; k++) expect(marginAt(random.decimal(random.whole(1, 10), random.whole(-3, 6)), band)).toBeLessThan(0);
    }
    expect(without).toBeGreaterThan(20);
  });

  it('are named by the zone that the band then lies in', () => {
    for (const { zone, lowest, highest } of usableRates(133.75, 146.25)) {
      expect(bandZone(133.75, 146.25, (lowest + (highest ?? 500)) / 2)).toBe(zone);
    }
    for (const { zone, lowest, highest } of usableRates(-146.25, -133.75, 0, null, 0, 0, 'iq')) {
      expect(bandZone(-146.25, -133.75, (lowest + (highest ?? 500)) / 2, 'iq')).toBe(zone);
    }
  });

  it('list a range that is one point, where a cell can show the point', () => {
    expect(usableRates(16, 20)[0]).toEqual({ zone: 5, lowest: 8, highest: 8, width: 0, inverted: false });
    // 22 to 33 fits zone 3 at exactly 22 alone.
    expect(usableRates(22, 33)[0]).toEqual({ zone: 3, lowest: 22, highest: 22, width: 0, inverted: false });
    // 4 to 5 fits zone 5 at 2; 8/3 to 10/3, the same band three times smaller, has no such point in decimals.
    expect(usableRates(4, 5)[0]!.lowest).toBe(2);
  });

  it('are cut to from and to', () => {
    expect(usableRates(17.5, 22.5, 16, 30).map(({ lowest, highest }) => [lowest, highest])).toEqual([[16, 17.5], [22.5, 30]]);
    expect(usableRates(17.5, 22.5, 50).map(({ lowest, highest, width }) => [lowest, highest, width])).toEqual([[50, null, null]]);
    expect(usableRates(0, 5).map(({ zone, lowest }) => [zone, lowest])).toEqual([[1, 10]]);
  });

  it.each<['input' | 'none', string, () => unknown]>([
    ['input', 'low must not be above high; got 5 and 3.', () => usableRates(5, 3)],
    ['input', 'from must be 0 or more; got -1.', () => usableRates(3, 5, -1)],
    ['input', 'to must be above 0; got -1.', () => usableRates(3, 5, 0, -1)],
    ['input', 'from must not be above to; got 9 and 8.', () => usableRates(3, 5, 9, 8)],
    ['input', 'guard must be 0 or more; got -1.', () => usableRates(3, 5, 0, null, -1)],
    ['input', 'ppm must be 0 or more; got -1.', () => usableRates(3, 5, 0, null, 0, -1)],
    ['input', 'ppm must be below 1000000; got 1000000.', () => usableRates(3, 5, 0, null, 0, 1e6)],
    ['input', 'from must be above 0 for a tone without guard or tolerance, which is usable at rates down to 0; got a blank cell.', () => usableRates(5, 5)],
    ['input', 'The result would have 100 001 rows and at most 10 000 are listed; raise from, lower to, or give a guard.', () => usableRates(5, 5, 0.0001)],
    ['none', 'No rate from 8 to 9 holds the band within one zone.', () => usableRates(17.5, 22.5, 8, 9)],
    ['none', 'No rate is usable: the band from -3 to 5 holds 0, which is a zone edge at every rate.', () => usableRates(-3, 5)],
    ['none', 'No rate is usable: the band begins at 3, nearer to the zone edge at 0 than the guard of 4.', () => usableRates(3, 5, 0, null, 4)],
  ])('say in words (%s): %s', (kind, sentence, ask) => {
    expect(ask).toThrow(new Fault(kind, sentence));
  });
});

describe('the lowest rate of one band', () => {
  it('is the first of its ranges: 2000 random bands (seed 43)', () => {
    const random = seeded(43);
    for (let i = 0; i < 2000; i++) {
      const band = randomCase(random);
      const [first] = list(band);
      if (first) expect(lowestRate(band.low, band.high, band.guard, band.ppm, band.sampling)).toBe(first.lowest);
    }
  });

  it('does not exist for a tone without guard', () => {
    expect(() => lowestRate(5, 5)).toThrow('There is no lowest rate: a tone without guard or tolerance is usable at rates down to 0.');
    expect(lowestRate(5, 5, 0.5)).toBe(2.2);
  });
});

describe('the tolerance of the clock', () => {
  it('holds as it stands, and one step further fails: 5000 random bands (seed 44)', () => {
    const random = seeded(44);
    let positive = 0;
    for (let i = 0; i < 5000; i++) {
      const band = randomCase(random);
      const rate = random.pick(list(band).map(({ lowest, highest }) => (lowest + (highest ?? lowest * 2)) / 2).concat(band.high * random.unit() + 0.001));
      const ppm = clockTolerance(band.low, band.high, rate, band.guard, band.sampling);
      if (ppm === 0) continue;
      positive++;
      expect(marginAt(rate, { ...band, ppm })).toBeGreaterThanOrEqual(0);
      if (ppm < 999_999) expect(marginAt(rate, { ...band, ppm: beside(ppm, 1n) })).toBeLessThan(0);
    }
    expect(positive).toBeGreaterThan(3000);
  });

  it('is 0 where the band already fails or just touches', () => {
    expect(clockTolerance(17.5, 22.5, 40)).toBe(0);
    expect(clockTolerance(17.5, 22.5, 35)).toBe(0);
  });
});
