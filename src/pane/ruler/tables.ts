// The ruler's facts as tables: usable ranges, and what another rate would change.

import type { PlanRange } from '../../engine';
import { type Tree, element } from '../element';
import type { PlanFigures } from '../figures';
import { exactFigure } from '../number-text';
import { isolated } from '../sentences';
import { type Standing, ppmText } from '../pictures/standing';
import { type Change, changesBetween, smallestMargin } from './preview';
import { sentences } from './sentences';
import type { RateWindow } from './window';

/** More rows than this serve nobody; zooming in shows the others. */
const MOST_LISTED = 200;
/** Changes in view; the others are a click away. */
const IN_VIEW = 6;

export function rangesTable(ranges: readonly PlanRange[], { from, to }: RateWindow): Tree[] {
  if (ranges.length === 0) return [];
  const cell = (x: number | null) => (x === null ? '' : exactFigure(x));
  return [element('details', { class: 'figures', 'data-keep': 'ranges' },
    element('summary', {}, sentences.tableSummary(ranges.length)),
    ...(ranges.length > MOST_LISTED ? [element('p', {}, sentences.tableShown(MOST_LISTED, ranges.length))] : []),
    table(sentences.tableCaption(exactFigure(from), exactFigure(to)), sentences.columns, ranges.slice(0, MOST_LISTED).map(({ lowest, highest, width, centre, headroom }) =>
      [cell(lowest), cell(highest), cell(width), cell(centre), headroom === null ? '' : ppmText(headroom)])))];
}

/** Standings are null while they are being computed. */
export function previewTable(before: PlanFigures, now: Standing | null, after: PlanFigures, then: Standing | null): Tree[] {
  const of = (standing: Standing | null, figure: (known: Standing) => string) => (standing === null ? sentences.unknown : standing.problem !== null ? '' : figure(standing));
  const changes = changesBetween(before, after);
  const columns = sentences.previewColumns(exactFigure(before.plan.rate!), exactFigure(after.plan.rate!));
  const checked = ({ before: band, after: other }: Change) =>
    [isolated(band.row.name), ...[band, other].map(({ check, margin }) => sentences.checkOf(check, exactFigure(margin)))];
  const rest = changes.slice(IN_VIEW);
  return [
    table(sentences.previewCaption, columns, [
      [sentences.conflicts, of(now, ({ conflicts }) => String(conflicts.length)), of(then, ({ conflicts }) => String(conflicts.length))],
      [sentences.headroom, of(now, ({ headroom }) => ppmText(headroom)), of(then, ({ headroom }) => ppmText(headroom))],
      [sentences.smallest, smallestMargin(before), smallestMargin(after)],
      ...changes.slice(0, IN_VIEW).map(checked),
    ]),
    ...(changes.length === 0 ? [element('p', { class: 'quiet' }, sentences.nothingChanges)] : []),
    ...(rest.length > 0 ? [element('details', { 'data-keep': 'changes' }, element('summary', {}, sentences.moreChanges(rest.length)), table(sentences.previewCaption, columns, rest.map(checked)))] : []),
  ];
}

/** A table whose first column names its rows, or holds figures like the others. */
function table(caption: string, columns: readonly string[], rows: string[][]): Tree {
  return element('table', { role: 'table', class: 'plain' },
    element('caption', {}, caption),
    element('thead', { role: 'rowgroup' }, element('tr', { role: 'row' }, ...columns.map((title) => (title === '' ? element('td', { role: 'cell' }) : element('th', { role: 'columnheader', scope: 'col' }, title))))),
    element('tbody', { role: 'rowgroup' }, ...rows.map((cells) => element('tr', { role: 'row' }, ...cells.map((cell, i) =>
      (i === 0 && columns[0] === ''
        ? element('th', { role: 'rowheader', scope: 'row' }, cell)
        : element('td', { role: 'cell', 'data-column': columns[i], class: 'figure' }, cell)))))));
}
