import { Window } from 'happy-dom';
import { describe, expect, it } from 'vitest';
import { toDom } from '../../../src/pane/element';
import { ladderLayout } from '../../../src/pane/ladder/layout';
import { ladderPicture } from '../../../src/pane/ladder/picture';
import { type LadderView, WHOLE } from '../../../src/pane/ladder/view';
import { markup } from '../markup';
import { type GivenRow, figures, receiver } from './plans';

const picture = (rows: GivenRow[], width = 360, view: Partial<LadderView> = {}, cells = {}) =>
  ladderPicture(ladderLayout(figures(rows, cells), width, { ...WHOLE, ...view })!, 'A verdict.');

describe('the picture of the ladder', () => {
  it.each<[string, Parameters<typeof picture>]>([
    ['one-band', [[['One', 70, 72]], 300]],
    ['receiver', [receiver, 360, {}, { guard: 1 }]],
    ['receiver-zoomed-and-selected', [receiver, 640, { from: 0.66, to: 0.72, selected: 3 }]],
    ['wide-and-straddling', [[['Sweep', 0, 700, 'unwanted'], ['Self', 60, 70], ['Mirror', -5, 5]], 420, {}, { rate: 128 }]],
  ])('of %s is as reviewed', async (name, given) => {
    await expect(`${markup(picture(...given))}\n`).toMatchFileSnapshot(`snapshots/${name}.svg`);
  });

  it('shows names that hold markup, formulas and scripts of any direction as they stand', () => {
    const hostile = ['<script>alert(1)</script>', '"><img src=x onerror=alert(1)>', '=HYPERLINK("x")', '&lt;b&gt;', 'תדר <b>', '${x}'];
    const rows = hostile.map((name, i): GivenRow => [name, 10 + 15 * i, 24 + 15 * i]);
    const { document } = new Window();
    const drawn = toDom(document as unknown as Document, picture(rows, 1280));
    expect([...drawn.querySelectorAll('script, img, b')]).toEqual([]);
    const shown = [...drawn.querySelectorAll('.band')].map((band) => [band.getAttribute('aria-label'), band.textContent].join());
    hostile.forEach((name, i) => expect(shown[i]).toContain(name));
    expect([...drawn.querySelectorAll('*')].flatMap((one) => [...one.attributes]).filter(({ name }) => name.startsWith('on') || name === 'href')).toEqual([]);
  });

  it('tells the state of every band without colour: unwanted ones are hatched, overlaps are bracketed, the selected one has corners', () => {
    const drawn = markup(picture(receiver, 480, { selected: 2 }));
    expect(drawn.match(/class="bar" fill="url\(#ladder-unwanted\)"/g)).toHaveLength(5); // on the rung, in the output, in the legend
    expect(drawn.match(/class="bracket"/g)!.length).toBeGreaterThan(0);
    expect(drawn.match(/class="picked"/g)!.length).toBeGreaterThan(1);
    expect(drawn.match(/aria-pressed="true"/g)).toHaveLength(1);
  });
});
