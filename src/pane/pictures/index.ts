// The section Pictures: the zone ladder, what speaks against the rate, the rate ruler, and the figures of all rows as a table.

import './pictures.css';
import { attempts } from '../attempt';
import { element, toDom } from '../element';
import type { PlanFigures } from '../figures';
import { ladderPanel } from '../ladder/panel';
import { tableSection } from '../page';
import { rulerPanel } from '../ruler/panel';
import type { MakeSection } from '../section';
import { slot } from '../slot';
import { box } from './buttons';
import { conflictList } from './conflict-list';
import { rowReference } from './rows';
import { sentences } from './sentences';

export const picturesSection: MakeSection = (surroundings) => {
  const { document, host } = surroundings;
  const attempt = attempts(surroundings);
  const empty = toDom(document, element('p', { class: 'quiet' }, sentences.noPictures)) as HTMLElement;
  const conflicts = slot(document, 'conflicts-list');
  const conflictsPart = toDom(document, element('section', {}, element('h2', {}, sentences.conflictsHeading))) as HTMLElement;
  conflictsPart.append(conflicts.place);
  const rows = slot(document, 'rows');

  let figures: PlanFigures | null = null;
  const pick = (row: number) => {
    const reference = figures && rowReference(figures.plan, row);
    if (reference) void attempt(() => host.select(reference));
  };
  const isOpen = () => rows.place.querySelector('details')?.open ?? false;
  const showRows = () => rows.show(figures && figures.rows.length > 0 ? [tableSection(figures, isOpen())] : []);
  rows.place.addEventListener('toggle', showRows, { capture: true });
  conflicts.place.addEventListener('click', (event) => {
    const row = (event.target as Element).closest('[data-row]')?.getAttribute('data-row');
    if (row) pick(Number(row));
  });

  const ladder = ladderPanel(surroundings, pick);
  const ruler = rulerPanel(surroundings, (rate, rules, standing) => conflicts.show(conflictList(standing, rate, rules)));
  const place = box(document, { class: 'pictures' });
  place.append(empty, ladder.place, conflictsPart, ruler.place, rows.place);

  // A section out of view has no size.
  const sizes = new document.defaultView!.ResizeObserver(resize);
  function resize(): void {
    ladder.resize(place.clientWidth);
    ruler.resize(place.clientWidth);
  }
  sizes.observe(place);

  return {
    title: sentences.title,
    place,
    show(now, selected) {
      figures = now;
      const able = now.bands.length > 0 ? now : null;
      empty.hidden = able !== null;
      conflictsPart.hidden = able === null;
      resize();
      ladder.show(able, selected);
      ruler.show(able);
      showRows();
    },
    close() {
      sizes.disconnect();
      ruler.close();
    },
  };
};
