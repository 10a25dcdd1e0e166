import Fraction from 'fraction.js';
import { describe, expect, it } from 'vitest';
import { type Sampling, bandMargin, foldedFrequency, frequencyZone, imageHigh, imageLow, isInverted } from '../../src/engine';
import { modelFrequency, modelImage, modelInverted, modelMargin, modelZone } from '../support/exact-model';
import { type Random, seeded } from '../support/random';

interface Row {
  low: number;
  high: number;
  rate: number;
  guard: number;
  ppm: number;
  sampling: Sampling;
}

/** Decimal text for the exact product of a decimal and a fraction of powers of ten, or NaN where it needs more than 15 digits. */
function timesHalves(rate: number, halves: number): number {
  const [digits, exponent] = rate.toExponential(14).split('e') as [string, string];
  const exact = BigInt(digits.replace('.', '')) * BigInt(halves) * 5n;
  const text = `${exact}e${Number(exponent) - 15}`;
  return exact.toString().replace(/0+$/, '').replace('-', '').length <= 15 ? Number(text) : NaN;
}

/** The decimal one unit of its 15th digit beside x. */
function beside(x: number, step: 1 | -1): number {
  const [digits, exponent] = x.toExponential(14).split('e') as [string, string];
  return Number(`${BigInt(digits.replace('.', '')) + BigInt(step)}e${Number(exponent) - 14}`);
}

const kinds = {
  'plan-like figures'(random: Random) {
    const rate = random.decimal(random.whole(1, 6), random.whole(0, 3));
    return { rate, low: random.decimal(random.whole(1, 7), random.whole(-2, 4)) };
  },
  'figures of 15 digits'(random: Random) {
    return { rate: random.decimal(15, random.whole(-3, 6)), low: random.decimal(15, random.whole(-3, 9)) };
  },
  'on an edge'(random: Random) {
    const rate = random.decimal(random.whole(1, 7), random.whole(-6, 6));
    return { rate, low: timesHalves(rate, random.whole(0, 100_000)) };
  },
  'one digit beside an edge'(random: Random) {
    const rate = random.decimal(random.whole(1, 7), random.whole(-6, 6));
    return { rate, low: beside(timesHalves(rate, random.whole(1, 100_000)), random.pick([1, -1])) };
  },
  'a band from edge to edge, or beside them'(random: Random) {
    const rate = random.decimal(random.whole(1, 5), random.whole(-6, 6));
    const first = random.whole(0, 10_000);
    const near = (x: number) => (x > 0 && random.whole(0, 1) ? beside(x, random.pick([1, -1])) : x);
    return { rate, low: near(timesHalves(rate, first)), high: near(timesHalves(rate, first + random.whole(1, 3))) };
  },
  'huge ratios'(random: Random) {
    const exponent = random.whole(-9, 3);
    return { rate: random.decimal(random.whole(1, 15), exponent), low: random.decimal(random.whole(1, 15), exponent + random.whole(8, 15)) };
  },
  'tiny rates'(random: Random) {
    const exponent = random.whole(-300, -20);
    return { rate: random.decimal(random.whole(1, 15), exponent), low: random.decimal(random.whole(1, 15), exponent + random.whole(-2, 12)) };
  },
  'binary residue'(random: Random) {
    // What a sheet computes: 0.1 + 0.2 shows 0.3 and means it.
    const rate = random.whole(1, 999) / 10 + random.whole(1, 999) / 100;
    return { rate, low: rate * random.whole(1, 99) + 0.1 };
  },
} satisfies Record<string, (random: Random) => { rate: number; low: number; high?: number }>;

function row(random: Random, kind: keyof typeof kinds): Row {
  for (;;) {
    const { rate, low: magnitude, high: top }: { rate: number; low: number; high?: number } = kinds[kind](random);
    if (!Number.isFinite(magnitude) || Number.isNaN(top)) continue;
    const low = top === undefined && random.whole(0, 9) === 0 ? -magnitude : magnitude;
    const width = random.pick([0, 0.001, 0.1, 0.5, 0.9, 3]) * rate * random.unit();
    const high = top ?? Number((low + width).toPrecision(15));
    const guard = random.pick([0, 0, Number((rate * 0.01 * random.unit()).toPrecision(3))]);
    const ppm = random.pick([0, 0, 20, 2.5, random.decimal(random.whole(1, 5), random.whole(-2, 3))]);
    return { low, high: Math.max(low, high), rate, guard, ppm, sampling: random.pick(['real', 'iq'] as const) };
  }
}

describe('results are those of the decimals that the sheet shows, to the last bit', () => {
  const EACH = 14_000;
  const SEED = 20261201;
  for (const kind of Object.keys(kinds) as (keyof typeof kinds)[]) {
    it(`on ${EACH} rows: ${kind} (seed ${SEED})`, () => {
      const random = seeded(SEED + kind.length);
      const wrong: unknown[] = [];
      for (let i = 0; i < EACH; i++) {
        const r = row(random, kind);
        const image = modelImage(r.low, r.high, r.rate, r.sampling);
        const got = [
          foldedFrequency(r.low, r.rate, r.sampling), frequencyZone(r.low, r.rate, r.sampling), isInverted(r.low, r.rate, r.sampling),
          imageLow(r.low, r.high, r.rate, r.sampling), imageHigh(r.low, r.high, r.rate, r.sampling),
          bandMargin(r.low, r.high, r.rate, r.guard, r.ppm, r.sampling),
        ];
        const wanted = [
          modelFrequency(r.low, r.rate, r.sampling), modelZone(r.low, r.rate, r.sampling), modelInverted(r.low, r.rate, r.sampling),
          image[0], image[1], modelMargin(r.low, r.high, r.rate, r.guard, r.ppm, r.sampling),
        ];
        // === and not Object.is: a cell doesn't tell -0 from 0.
        if (!got.every((value, k) => value === wanted[k])) wrong.push({ ...r, got, wanted });
      }
      expect(wrong.slice(0, 5)).toEqual([]);
    });
  }

  it('also by the fractions of fraction.js, on 7000 rows (seed 7)', () => {
    const random = seeded(7);
    const half = new Fraction(1, 2);
    for (let i = 0; i < 7000; i++) {
      const { low, rate, sampling } = row(random, random.pick(['plan-like figures', 'figures of 15 digits', 'on an edge', 'one digit beside an edge', 'huge ratios', 'binary residue']));
      const f = new Fraction(plain(low));
      const fs = new Fraction(plain(rate));
      const turns = f.div(fs).add(half).floor();
      const folded = f.sub(fs.mul(turns));
      const wanted = sampling === 'iq' ? folded : folded.abs();
      expect([low, rate, foldedFrequency(low, rate, sampling)]).toEqual([low, rate, Number(wanted.toString(80))]);
      const zone = sampling === 'iq' ? turns : f.abs().div(fs).mul(2).floor().add(1);
      expect([low, rate, frequencyZone(low, rate, sampling)]).toEqual([low, rate, Number(zone.toFraction())]);
    }
  });
});

/** A number as the decimal of 15 digits that a sheet shows, without an exponent. */
function plain(x: number): string {
  const [digits, exponent] = x.toExponential(14).split('e') as [string, string];
  const power = BigInt(Math.abs(Number(exponent) - 14));
  const whole = digits.replace('.', '');
  return Number(exponent) >= 14 ? `${BigInt(whole) * 10n ** power}` : `${whole}/${10n ** power}`;
}
