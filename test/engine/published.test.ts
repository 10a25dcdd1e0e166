// Figures from print. Each row names its source; "from memory" marks a figure recalled rather than read again, all of which agree
// with theory to every printed digit.

import { describe, expect, it } from 'vitest';
import { bandInverted, bandMargin, bandZone, foldedFrequency, frequencyZone, imageHigh, imageLow, isInverted, lowestRate, resolveFrequency, usableRates } from '../../src/engine';

describe('tones land where the books print them', () => {
  it.each([
    // frequency, rate, folded, source
    [7, 6, 1, 'Lyons, Understanding Digital Signal Processing 3e, §2.1, Fig. 2-2'],
    [4, 6, 2, 'Lyons, Fig. 2-2'],
    [1, 6, 1, 'Lyons, Fig. 2-3(b)'],
    [13, 6, 1, 'Lyons, Fig. 2-3(b)'],
    [19, 6, 1, 'Lyons, Fig. 2-3(b)'],
    [50, 40, 10, 'Proakis & Manolakis, Digital Signal Processing, Ex. 1.4.1 (from memory)'],
    [50, 75, 25, 'Proakis & Manolakis, Ex. 1.4.2 (from memory)'],
    [1, 5, 1, 'Proakis & Manolakis, Ex. 1.4.4 (from memory)'],
    [3, 5, 2, 'Proakis & Manolakis, Ex. 1.4.4 (from memory)'],
    [6, 5, 1, 'Proakis & Manolakis, Ex. 1.4.4 (from memory)'],
    [8, 6, 2, 'Oppenheim & Schafer, Discrete-Time Signal Processing, §4.2 (from memory)'],
    [10, 5, 0, 'Wheeler & Ganji, Introduction to Engineering Experimentation, ch. 5'],
    [10, 11, 1, 'Wheeler & Ganji, ch. 5'],
    [10, 18, 8, 'Wheeler & Ganji, ch. 5'],
    [10, 20.1, 10, 'Wheeler & Ganji, ch. 5'],
    [28, 10, 2, 'Tan, Digital Signal Processing, answer 12.21(a)'],
    [32, 10, 2, 'Tan, answer 12.21(a)'],
    [31, 11, 2, 'Tan, answer 12.21(c)'],
    [35, 11, 2, 'Tan, answer 12.21(c)'],
    [14, 20, 6, 'Kester (ed.), Data Conversion Handbook: 7 MHz at 20 MS/s, harmonic 2 (from memory)'],
    [21, 20, 1, 'Kester: harmonic 3 (from memory)'],
    [28, 20, 8, 'Kester: harmonic 4 (from memory)'],
    [35, 20, 5, 'Kester: harmonic 5 (from memory)'],
    [42, 20, 2, 'Kester: harmonic 6 (from memory)'],
    [49, 20, 9, 'Kester: harmonic 7 (from memory)'],
    [56, 20, 4, 'Kester: harmonic 8 (from memory)'],
    [63, 20, 3, 'Kester: harmonic 9 (from memory)'],
  ])('%d at %d lands on %d: %s', (frequency, rate, folded) => {
    expect(foldedFrequency(frequency, rate)).toBe(folded);
  });

  it('7 kHz lies in zone 3 of 6 kHz and 4 kHz, reversed, in zone 2 (Lyons, Fig. 2-2)', () => {
    expect([frequencyZone(7, 6), isInverted(7, 6), frequencyZone(4, 6), isInverted(4, 6)]).toEqual([3, false, 2, true]);
  });

  it('of 1, 3 and 6 kHz at 5 kHz only 3 kHz is reversed (Proakis & Manolakis, Ex. 1.4.4, from memory: the sum keeps one minus sign)', () => {
    expect([1, 3, 6].map((f) => isInverted(f, 5))).toEqual([false, true, false]);
  });
});

describe('bands land where the books print them', () => {
  it.each([
    // low, high, rate, zone, folded low, folded high
    [10, 90, 200, 1, 10, 90],
    [110, 190, 200, 2, 10, 90],
    [170, 230, 160, 3, 10, 70],
    [210, 250, 200, 3, 10, 50],
  ])('%d to %d at %d MHz is zone %d, folded %d to %d (van Haarlem et al., A&A 2013, table of bands)', (low, high, rate, zone, foldedLow, foldedHigh) => {
    expect([bandZone(low, high, rate), imageLow(low, high, rate), imageHigh(low, high, rate)]).toEqual([zone, foldedLow, foldedHigh]);
    expect(bandMargin(low, high, rate)).toBeGreaterThanOrEqual(0);
  });

  it.each([
    // rate, zone, inverted
    [35, 2, true],
    [22.5, 2, true],
    [17.5, 3, false],
    [15, 3, false],
    [11.25, 4, true],
  ])('17.5 to 22.5 MHz at %d MHz just fits zone %d (Lyons, Fig. 2-9; the letters in its text for the reversed ones are wrong)', (rate, zone, inverted) => {
    expect([bandZone(17.5, 22.5, rate), bandInverted(17.5, 22.5, rate), bandMargin(17.5, 22.5, rate) >= 0]).toEqual([zone, inverted, true]);
  });

  it('17.5 to 22.5 MHz does not fit at 7.5 MHz (Lyons, Fig. 2-9)', () => {
    expect(bandMargin(17.5, 22.5, 7.5)).toBeLessThan(0);
  });
});

describe('usable rates are those in print', () => {
  const ranges = (...args: Parameters<typeof usableRates>) => usableRates(...args).map(({ zone, lowest, highest }) => [zone, lowest, highest]);

  it('20 MHz, 5 MHz wide: 22.5 to 35, 15 to 17.5, 11.25 to 11.66, nothing lower (Lyons §2.3, Table 2-1)', () => {
    expect(ranges(17.5, 22.5)).toEqual([[4, 11.25, 11.6666666666666], [3, 15, 17.5], [2, 22.5, 35], [1, 45, null]]);
  });

  it('10 702.5 to 10 727.5 kHz: zone 429, lowest rate 50.0117 kHz (Proakis & Manolakis 4e, Ex. 6.4.1, from memory)', () => {
    expect(usableRates(10702.5, 10727.5, 0, 51)[0]!.zone).toBe(429);
    expect(lowestRate(10702.5, 10727.5)).toBeCloseTo(50.0117, 4);
  });

  it('the same with guards of 2.5 kHz: zone 357, 60.1120 to 60.1124 kHz, 5.2 ppm wide (the same, from memory)', () => {
    const [range] = usableRates(10702.5, 10727.5, 0, 60.2, 2.5);
    expect(range!.zone).toBe(357);
    expect(range!.lowest).toBeCloseTo(60.112, 4);
    expect(range!.highest).toBeCloseTo(60.1124, 4);
    expect((range!.width! / range!.lowest) * 1e6).toBeCloseTo(5.2, 1);
  });

  it('16 to 20 kHz: 8 is a single point, 9 fails, 10 to 10.67 works (course notes, Technical University of Denmark, 62743)', () => {
    expect(ranges(16, 20)).toEqual([[5, 8, 8], [4, 10, 10.6666666666666], [3, 13.3333333333334, 16], [2, 20, 32], [1, 40, null]]);
    expect(bandMargin(16, 20, 9)).toBeLessThan(0);
  });

  it('10 to 30 kHz: only above 60 kHz (dsp.stackexchange, "Is there a condition for bandpass sampling?")', () => {
    expect(ranges(10, 30)).toEqual([[1, 60, null]]);
  });

  it('10 to 14 kHz: two undersampled zones, the lowest rate 28/3 kHz (the same thread)', () => {
    expect(ranges(10, 14).map(([zone]) => zone)).toEqual([3, 2, 1]);
    expect(lowestRate(10, 14)).toBeCloseTo(28 / 3, 12);
  });

  it('9 to 12 kHz: 6 kHz, a single point; 18 to 22 kHz: 8.8 kHz (a textbook\'s exercise 8.9, from its companion scripts)', () => {
    expect(ranges(9, 12)[0]).toEqual([4, 6, 6]);
    expect(lowestRate(18, 22)).toBe(8.8);
  });

  it('30 to 35 kHz needs 10 kHz, where the companion script of exercise 8.9(c) prints 5', () => {
    expect(lowestRate(30, 35)).toBe(10);
  });

  it.each([[40, 5], [100, 7], [61.44, 2.5]])('the range in zone n is 2(high − n·width)/(n(n−1)) wide, here for a band up to %d, %d wide (Vaughan, Scott & White, IEEE Trans. SP 39(9), 1991)', (high, width) => {
    const listed = usableRates(high - width, high).filter(({ zone }) => zone > 1);
    expect(listed.length).toBe(Math.floor(high / width) - 1);
    for (const range of listed) expect(range.width).toBeCloseTo((2 * (high - range.zone * width)) / (range.zone * (range.zone - 1)), 10);
  });

  it('133.75 to 146.25 MHz with guards of 0.45: zone 10 gives 29.34 to 29.6222 MHz (Kwan, Electronics 13(2):280, 2024, App. A; its inputs read, the result computed)', () => {
    const range = usableRates(133.75, 146.25, 0, null, 0.45).find(({ zone }) => zone === 10)!;
    expect([range.lowest, range.highest!.toFixed(4)]).toEqual([29.34, '29.6222']);
  });
});

describe('several rates tell which frequency it was', () => {
  it('remainders 2, 3 and 2 at 3, 5 and 7 mean 23, alone below 105 (Sunzi Suanjing, from memory)', () => {
    expect(resolveFrequency([2, 3, 2], [3, 5, 7], 0, 104, 0, 'iq')).toEqual([{ lowest: 23, highest: 23 }]);
  });

  it('70 seen as 14 at 56 and 10 at 40 leaves seven candidates, and with 4 at 33 itself (worked by hand)', () => {
    expect(resolveFrequency([14, 10], [56, 40], 0, 1000).map(({ lowest }) => lowest)).toEqual([70, 210, 350, 490, 630, 770, 910]);
    expect(resolveFrequency([14, 10, 4], [56, 40, 33], 0, 1000)).toEqual([{ lowest: 70, highest: 70 }]);
  });
});
