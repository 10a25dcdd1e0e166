// The first rows of what would be inserted, computed by the engine.

import { type Tree, element } from '../element';
import type { PlanFigures } from '../figures';
import { exactFigure } from '../number-text';
import { decimalsOf, marginDecimalsOf } from './number-format';
import { type ResultKey, RESULTS, RESULT_KEYS } from './results';
import { sentences } from './sentences';

const ROWS = 5;

/** Columns that hold numbers. */
const FIGURES: ReadonlySet<string> = new Set(RESULT_KEYS.filter((key) => key !== 'inverted' && key !== 'check').map((key) => sentences.titles[key]));

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
  return element('div', { class: 'scroll', role: 'region', 'aria-label': sentences.preview, tabindex: 0 }, element('table', { class: 'first-rows' },
    element('caption', {}, sentences.previewCaption(Math.min(ROWS, rows.length), rows.length)),
    element('thead', {}, element('tr', {},
      ...[sentences.nameColumn, ...titles].map((title) => element('th', { scope: 'col', class: FIGURES.has(title) ? 'figure' : undefined }, title)))),
    element('tbody', {}, ...rows.slice(0, ROWS).map(({ row, band, problem }) => element('tr', { 'data-row': row.index },
      element('th', { scope: 'row', title: row.name }, element('bdi', {}, row.name)),
      ...(band === null
        ? [element('td', { colspan: results.length, class: 'problem' }, problem ?? '')]
        : results.map((key) => element('td', { class: FIGURES.has(sentences.titles[key]) ? 'figure' : undefined }, text(key, RESULTS[key].value(band, plan.rate!))))))))));
}
