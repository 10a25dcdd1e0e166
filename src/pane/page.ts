// Parts of the pane as trees: notices, the rate at a glance, the table of figures.

import { type Tree, element } from './element';
import type { PlanFigures, RowFigures } from './figures';
import { exactFigure } from './number-text';
import { sentences } from './sentences';
import type { Headline } from './words';

export function noticeList(notices: string[]): Tree {
  return element('ul', { class: 'notices' }, ...notices.map((notice) => element('li', {}, notice)));
}

export function headlineSection({ outcome, verdict, facts, against, objections, remarks }: Headline): Tree {
  return element('section', { class: 'headline', 'data-outcome': outcome },
    element('p', { class: 'verdict', role: 'status' }, verdict),
    ...remarks.map((remark) => element('p', { class: 'remark' }, remark)),
    element('dl', { class: 'facts' }, ...facts.map(({ what, figure }) => element('div', {}, element('dt', {}, what), element('dd', {}, figure)))),
    ...(against > 0
      ? [element('details', { 'data-keep': 'objections' }, element('summary', {}, sentences.against(against)),
        noticeList([...objections, ...(against > objections.length ? [sentences.andMore(against - objections.length)] : [])]))]
      : []));
}

/**
 * The facts of the picture as a table. Its cells name their column, for panes too narrow to hold the columns side by side.
 * @param opened a table that nobody has opened needs no cells
 */
export function tableSection({ plan, rows }: PlanFigures, opened: boolean): Tree {
  const caption = plan.rate === null ? sentences.tableCaptionWithoutRate : sentences.tableCaption(exactFigure(plan.rate));
  return element('details', { class: 'figures', 'data-keep': 'figures' },
    element('summary', {}, sentences.tableSummary(rows.length)),
    ...(opened ? [element('table', { role: 'table' },
      element('caption', {}, caption),
      element('thead', { role: 'rowgroup' }, element('tr', { role: 'row' },
        ...sentences.columns.map((title) => element('th', { role: 'columnheader', scope: 'col' }, title)))),
      element('tbody', { role: 'rowgroup' }, ...rows.map(tableRow)))] : []));
}

function tableRow({ row, number, band, problem }: RowFigures): Tree {
  const figure = (x: number | null | undefined) => (x === null || x === undefined ? '' : exactFigure(x));
  const cells = [
    String(number), row.name, row.role, figure(row.low), figure(row.high),
    ...(band
      ? [String(band.zone), band.inverted ? sentences.yes : sentences.no, figure(band.imageLow), figure(band.imageHigh), figure(band.margin), band.check]
      : ['', '', '', '', '', '']),
  ];
  const lastColumn = cells.length - 1;
  if (problem) cells[lastColumn] = cells[lastColumn] === '' ? problem : `${cells[lastColumn]}. ${problem}`;
  return element('tr', { role: 'row', class: row.role, 'data-row': row.index }, ...cells.map((cell, i) => element(
    i === 1 ? 'th' : 'td',
    { role: i === 1 ? 'rowheader' : 'cell', scope: i === 1 ? 'row' : undefined, 'data-column': sentences.columns[i], class: COLUMN_KINDS[i] },
    ...(cell === '' ? [] : [i === 1 ? element('bdi', {}, cell) : cell]),
  )));
}

const COLUMN_KINDS = ['figure', 'words', 'words', 'figure', 'figure', 'figure', 'words', 'figure', 'figure', 'figure', 'words'];
