import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { foldedFrequency, frequencyZone } from '../../../src/engine';
import type { BandFigures } from '../../../src/pane/figures';
import { type Box, boxOf, collide, place, trueFrequency } from '../../../src/pane/ladder/frame';
import { type LadderLayout, ladderLayout } from '../../../src/pane/ladder/layout';
import { type LadderView, WHOLE, panned, zoomed } from '../../../src/pane/ladder/view';
import { cells, figures, receiver, rows } from './plans';

const SEED = 401;
const width = fc.constantFrom(300, 420, 760, 1280);
const view = fc.oneof(fc.constant(WHOLE), fc.record({
  share: fc.double({ min: 0.001, max: 1, noNaN: true }), about: fc.double({ min: 0, max: 1, noNaN: true }), role: fc.constantFrom<LadderView['role']>('all', 'wanted', 'unwanted'),
}).map(({ share, about, role }): LadderView => ({ ...zoomed(WHOLE, share, about), role })));

const check = <T>(property: fc.IProperty<T>, runs: number) => fc.assert(property, { seed: SEED, numRuns: runs });
const forLadders = (most: number, runs: number, look: (layout: LadderLayout, drawn: BandFigures[]) => void) =>
  check(fc.property(rows(most), cells, width, view, (given, numbers, wide, looked) => {
    const layout = ladderLayout(figures(given, numbers), wide, looked);
    if (layout) look(layout, layout.bands.map((band) => band.figures));
  }), runs);

/** Frequencies of a band: its ends and some between. */
const frequenciesOf = ({ low, high }: BandFigures) => [0, 0.13, 0.5, 0.77, 1].map((share) => low + (high - low) * share);

/** Every text as the rectangle that it fills. */
function textBoxes(layout: LadderLayout): (Box & { text: string })[] {
  const labels = layout.bands.flatMap(({ pieces, image }) => [...pieces.map(({ label }) => label), image.label].flatMap((label) => label ?? []));
  return [...layout.texts, ...labels].filter(({ text }) => text !== '').map((one) => ({ ...boxOf(one), text: one.text }));
}

describe(`the zone ladder (seed ${SEED})`, () => {
  it('draws each frequency of a band on the rung of its zone, and straight below it where it lands', () => {
    let seen = 0;
    forLadders(12, 300, (layout, drawn) => {
      const { frame, rungs } = layout;
      drawn.forEach((band, i) => {
        for (const frequency of frequenciesOf(band)) {
          const [zone, folded] = [frequencyZone(frequency, frame.rate), foldedFrequency(frequency, frame.rate)];
          if (folded <= frame.low || folded >= frame.high || folded < 1e-6 || folded > frame.half - 1e-6) continue;
          const x = place(frame, folded);
          const over = ({ x: from, width: wide }: { x: number; width: number }) => from - 2 <= x && x <= from + wide + 2;
          const { pieces, image } = layout.bands[i]!;
          expect(over(image.shape)).toBe(true);
          const here = pieces.filter((piece) => piece.zone <= zone && zone <= piece.lastZone && over(piece.shape));
          expect(here).toHaveLength(1);
          const rung = rungs.find((one) => one.zone === zone);
          if (here[0]!.zone !== here[0]!.lastZone || !rung) continue;
          expect(here[0]!.shape.y).toBeGreaterThan(rung.top);
          expect(here[0]!.shape.y).toBeLessThan(rung.line);
          seen++;
        }
      });
    });
    expect(seen).toBeGreaterThan(1000);
  });

  it('orders rungs by zone, the highest on top, and runs even ones from right to left', () => {
    forLadders(12, 200, ({ rungs, frame, bands }) => {
      for (const [i, { zone, inverted, line }] of rungs.entries()) {
        if (i > 0) expect([zone < rungs[i - 1]!.zone, line > rungs[i - 1]!.line]).toEqual([true, true]);
        expect(inverted).toBe(zone % 2 === 0);
        expect(trueFrequency(zone, frame.low, frame.rate) > trueFrequency(zone, frame.high, frame.rate)).toBe(inverted);
      }
      const onRung = (zone: number) => rungs.some((rung) => rung.zone === zone);
      for (const { pieces } of bands) for (const { zone, lastZone, shape } of pieces) if (zone === lastZone && onRung(zone)) expect(shape.tall).toBe(zone % 2 === 0 ? 'left' : 'right');
    });
  });

  it('marks overlaps exactly where the image of a wanted band meets another image, or itself', () => {
    let [marked, clear] = [0, 0];
    forLadders(8, 300, ({ frame, overlaps }, drawn) => {
      for (let k = 1; k < 60; k++) {
        const folded = frame.low + ((frame.high - frame.low) * k) / 60;
        const x = place(frame, folded);
        const ends = drawn.flatMap(({ sections }) => sections.flatMap(({ low, high }) => [place(frame, low), place(frame, high)]));
        if (ends.some((end) => Math.abs(end - x) < 3)) continue;
        const there = drawn.filter(({ imageLow, imageHigh }) => imageLow < folded && folded < imageHigh);
        const twice = there.some(({ row, sections }) => row.role === 'wanted' && sections.filter(({ low, high }) => low < folded && folded < high).length > 1);
        const expected = twice || (there.length > 1 && there.some(({ row }) => row.role === 'wanted'));
        expect(overlaps.some((one) => one.x <= x && x <= one.x + one.width)).toBe(expected);
        if (expected) marked++;
        else clear++;
      }
    });
    expect(marked).toBeGreaterThan(500);
    expect(clear).toBeGreaterThan(500);
  });

  it('never lets texts collide, and keeps everything inside its frame', () => {
    forLadders(60, 150, (layout) => {
      const boxes = textBoxes(layout);
      const colliding = boxes.flatMap((a, i) => boxes.slice(i + 1).filter((b) => collide(a, b)).map((b) => [a.text, b.text]));
      expect(colliding).toEqual([]);
      expect(boxes.filter(({ left, right, top, bottom }) => left < 0 || right > layout.width || top < 0 || bottom > layout.height)).toEqual([]);
      for (const { pieces, image } of layout.bands) {
        for (const { x, width: wide, y, height } of [...pieces.map(({ shape }) => shape), image.shape]) {
          expect(x).toBeGreaterThanOrEqual(layout.frame.left - 1e-6);
          expect(x + wide).toBeLessThanOrEqual(layout.frame.right + 1e-6);
          expect(y - height / 2).toBeGreaterThanOrEqual(0);
          expect(y + height / 2).toBeLessThanOrEqual(layout.axis);
        }
      }
    });
  });

  it.each([10, 50, 200, 500])('stays below 1600 pixels with %i rows, be they in one zone or in as many zones', (count) => {
    for (const spread of [0.1, 1, 130]) {
      const given = Array.from({ length: count }, (_, i) => [`Band ${i + 1}`, 10 + i * spread, 10 + i * spread + 0.05, i % 3 ? 'wanted' : 'unwanted'] as const);
      const layout = ladderLayout(figures(given.map((one) => [...one])), 360, WHOLE)!;
      expect(layout.height).toBeLessThan(1600);
      expect(layout.bands).toHaveLength(count);
    }
  });

  it('calls few bands by name, more by number, and none where they would not be readable', () => {
    const labels = (count: number) => {
      const given = Array.from({ length: count }, (_, i) => [`Band ${i + 1}`, 10 + i * 0.2, 10.1 + i * 0.2] as [string, number, number]);
      return ladderLayout(figures(given), 360, WHOLE)!.bands.flatMap(({ image }) => image.label?.text ?? []);
    };
    expect(labels(5)).toEqual(['Band 1', 'Band 2', 'Band 3', 'Band 4', 'Band 5']);
    expect(labels(18).slice(0, 2)).toEqual(['#1', '#2']);
    expect(labels(400)).toEqual([]);
  });
});

describe('what the ladder shows', () => {
  const shown = (looked: Partial<LadderView>) => ladderLayout(figures(receiver), 480, { ...WHOLE, ...looked });
  const namesOf = (layout: LadderLayout | null) => layout?.bands.map((band) => band.figures.row.name) ?? null;

  it('are the bands of one role, or all', () => {
    expect(namesOf(shown({}))).toEqual(['Clock leak', 'FM', 'Airband', 'AIS', 'Beacons', 'ADS-B']);
    expect(namesOf(shown({ role: 'wanted' }))).toEqual(['Airband', 'AIS', 'Beacons', 'ADS-B']);
    expect(namesOf(shown({ role: 'unwanted' }))).toEqual(['Clock leak', 'FM']);
  });

  it('are the bands that land in the stretch in view, or nothing at all', () => {
    // Images at 245.76: 10; 87.5 to 108; 108.76 to 122.88; 83.7225 to 83.7975; 85.42 to 85.52; 105.96 to 107.96
    expect(namesOf(shown({ from: 83 / 122.88, to: 86 / 122.88 }))).toEqual(['AIS', 'Beacons']);
    expect(namesOf(shown({ from: 20 / 122.88, to: 30 / 122.88 }))).toBeNull();
  });

  it('is the selected row with a mark of its own, and no other', () => {
    expect(shown({ selected: 3 })!.bands.map(({ selected }) => selected)).toEqual([false, false, false, true, false, false]);
  });

  it('separates bands that lie close when it is zoomed', () => {
    const gap = (layout: LadderLayout | null) => {
      const [ais, beacons] = ['AIS', 'Beacons'].map((name) => layout!.bands.find((band) => band.figures.row.name === name)!.image.shape);
      return beacons!.x - (ais!.x + ais!.width);
    };
    expect(gap(shown({}))).toBeLessThan(6);
    expect(gap(shown({ from: 83 / 122.88, to: 86 / 122.88 }))).toBeGreaterThan(100);
  });
});

describe('zoom and pan', () => {
  it.each([
    //                                            from  to
    ['in, about the middle', zoomed(WHOLE, 0.5), [0.25, 0.75]],
    ['in, about a point   ', zoomed(WHOLE, 0.5, 0.2), [0.1, 0.6]],
    ['out, beyond all     ', zoomed(zoomed(WHOLE, 0.5), 4), [0, 1]],
    ['to the right        ', panned(zoomed(WHOLE, 0.5), 0.25), [0.375, 0.875]],
    ['beyond the left end ', panned(zoomed(WHOLE, 0.5), -3), [0, 0.5]],
  ])('%s', (_, { from, to }, expected) => {
    expect([from, to]).toEqual(expected);
  });

  it(`stays on the axis, whatever is done (seed ${SEED})`, () => {
    check(fc.property(fc.array(fc.tuple(fc.constantFrom('zoom', 'pan'), fc.double({ min: 0.01, max: 30, noNaN: true }), fc.double({ min: 0, max: 1, noNaN: true }))), (steps) => {
      let now = WHOLE;
      for (const [what, by, about] of steps) now = what === 'zoom' ? zoomed(now, by, about) : panned(now, by - 15);
      expect(now.from).toBeGreaterThanOrEqual(0);
      expect(now.to).toBeLessThanOrEqual(1);
      expect(now.to - now.from).toBeGreaterThan(0.5e-4);
    }), 300);
  });
});
