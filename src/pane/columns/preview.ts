// The first rows of what would be inserted, computed by the engine.

import { type Tree, element } from '../element';
import type { PlanFigures } from '../figures';
import { exactFigure } from '../number-text';
import { decimalsOf, marginDecimalsOf } from './number-format';
import { type ResultKey, RESULTS } from './results';
import { sentences } from './sentences';

const ROWS = 5;

export function previewTable(figures: PlanFigures, results: ResultKey[]): Tree {
  const { plan, rows } = figures;
  const decimals = { frequency: decimalsOf(plan), margin: marginDecimalsOf(plan), word: null };
  const text = (key: ResultKey, value: number | boolean | string) => {
    if (typeof value === 'boolean') return value ? sentences.yes : sentences.no;
    if (typeof value === 'string') return value;
    const places = decimals[RESULTS[key].kind];
    return places === null ? exactFigure(value) : value.toFixed(places);
  };
  const titles = results.map((key) => sentences.titles[key]);
  return element('table', { role: 'table', class: 'preview' },
    element('caption', {}, sentences.previewCaption(Math.min(ROWS, rows.length), rows.length)),
    element('thead', { role: 'rowgroup' }, element('tr', { role: 'row' },
      ...[sentences.nameColumn, ...titles].map((title) => element('th', { role: 'columnheader', scope: 'col' }, title)))),
    element('tbody', { role: 'rowgroup' }, ...rows.slice(0, ROWS).map(({ row, band, problem }) => element('tr', { role: 'row', 'data-row': row.index },
      element('th', { role: 'rowheader', scope: 'row' }, element('bdi', {}, row.name)),
      ...(band === null
        ? [element('td', { role: 'cell', colspan: results.length }, problem ?? '')]
        : results.map((key, i) => element('td', { role: 'cell', class: RESULTS[key].kind === 'word' ? undefined : 'figure', 'data-column': titles[i] }, text(key, RESULTS[key].value(band, plan.rate!)))))))));
}
