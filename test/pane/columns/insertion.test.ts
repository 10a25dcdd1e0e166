// Formulas, formats and structured references, without a host.

import { describe, expect, it } from 'vitest';
import type { Block, CellValue } from '../../../src/host/port';
import { type Wanted, formulaTexts, insertionOf } from '../../../src/pane/columns/insertion';
import { decimalsOf, formatOf, marginDecimalsOf } from '../../../src/pane/columns/number-format';
import { columnOfTable } from '../../../src/pane/columns/references';
import { RESULT_KEYS } from '../../../src/pane/columns/results';
import { figuresOf } from '../../../src/pane/figures';
import { type Plan, planFrom } from '../../../src/pane/plan';

const block = (address: string, ...values: CellValue[]): Block => ({ sheet: 'Plan', address, values: values.map((value) => [value]) });

/** A plan in A2:C3 with headers, its rate in F1. */
function plan(edges: 'low and high' | 'centre and width', guard: number | null = null, ppm: number | null = null): Plan {
  const columns = [block('B2:B3', 118, 161.9625), block('C2:C3', 137, 162.0375)];
  const pair = edges === 'low and high' ? { low: columns[0]!, high: columns[1]!, centre: null, width: null } : { low: null, high: null, centre: columns[0]!, width: block('C2:C3', 2, 0.5) };
  const made = planFrom({
    ...pair, name: block('A2:A3', 'a', 'b'), role: null, rate: block('F1', 245.76), guard: guard === null ? null : block('F2', guard), ppm: ppm === null ? null : block('F3', ppm),
  });
  const [one, other] = made.edges;
  const titled = (column: number, title: string) => ({ column, title, unit: 'MHz' });
  return { ...made, table: { sheet: 'Plan', first: 1, rows: 2, header: 0, unit: 'MHz', lastBelow: null, columns: { name: titled(0, 'Name'), [one]: titled(1, 'x'), [other]: titled(2, 'y') } } };
}

const wanted = (of: Plan, rest: Partial<Wanted> = {}): Wanted => ({
  figures: figuresOf(of), results: RESULT_KEYS, way: 'rows', names: { rate: 'Rate', guard: null, ppm: null }, column: 7, structured: null, over: false, version: '1.2.3', ...rest,
});

describe('a title in a structured reference', () => {
  it.each([
    ['Low',               '[@Low]'],
    ['Tief_2',            '[@Tief_2]'],
    ['Низ',               '[@Низ]'],
    ['Low (MHz)',         '[@[Low (MHz)]]'],
    ['Low [MHz]',         "[@[Low '[MHz']]]"],
    ["Band's edge #1 @x", "[@[Band''s edge '#1 '@x]]"],
    ['Low\nMHz',          '[@[Low\nMHz]]'],
  ])('%j', (title, reference) => {
    expect(columnOfTable(title)).toBe(reference);
  });
});

describe('formulas', () => {
  it.each([
    ['low and high',     'rows',    ['=FOLD.FREQ((B2+C2)/2,Rate)', '=FOLD.LOW(B2,C2,Rate)']],
    ['centre and width', 'rows',    ['=FOLD.FREQ(B2,Rate)', '=FOLD.LOW(B2-C2/2,B2+C2/2,Rate)']],
    ['low and high',     'spilled', ['=FOLD.FREQ((Fold_Low+Fold_High)/2,Rate)', '=FOLD.LOW(Fold_Low,Fold_High,Rate)']],
    ['low and high',     'table',   ['=FOLD.FREQ(([@[Low (MHz)]]+[@High])/2,Rate)', '=FOLD.LOW([@[Low (MHz)]],[@High],Rate)']],
    ['centre and width', 'table',   ['=FOLD.FREQ([@[Low (MHz)]],Rate)', '=FOLD.LOW([@[Low (MHz)]]-[@High]/2,[@[Low (MHz)]]+[@High]/2,Rate)']],
  ] as const)('of a plan with %s, as %s', (edges, way, formulas) => {
    const structured = { table: { sheet: 'Plan', address: 'A1:D3', name: 'Bands' }, titles: ['Name', 'Low (MHz)', 'High', 'Zone'] };
    expect(formulaTexts(wanted(plan(edges), { way, structured }), 1).slice(0, 2)).toEqual(formulas);
  });

  it('never refer to one another: every precedent is a cell of the plan or a name', () => {
    const { change } = insertionOf(wanted(plan('low and high'), { names: { rate: 'Rate', guard: 'Guard', ppm: 'Ppm' } }));
    const formulas = change.cells![0]!.cells.slice(1).flat().map((cell) => (cell as { formula: string }).formula);
    for (const [i, formula] of formulas.entries()) {
      const row = 2 + Math.floor(i / RESULT_KEYS.length);
      expect(formula.replace(/^=FOLD\.[A-Z]+/, '').match(/[A-Z]+\d+|[A-Z][a-z]+/g)!.filter((word) => ![`B${row}`, `C${row}`, 'Rate', 'Guard', 'Ppm'].includes(word))).toEqual([]);
    }
  });
});

describe('columns of a structured table', () => {
  const structured = { table: { sheet: 'Plan', address: 'A1:D3', name: 'Bands' }, titles: ['Name', 'Low (MHz)', 'High', 'zone'] };

  it('are added at its end under titles that it does not have yet, with looks for their cells', () => {
    const { change, box } = insertionOf(wanted(plan('low and high'), { way: 'table', structured, results: ['zone', 'margin'] }));
    expect(box).toEqual({ row: 0, column: 4, rows: 3, columns: 2 });
    expect(change.tableColumns).toEqual([{ table: 'Bands', cells: [
      ['Zone 2', 'Margin (MHz)'],
      ...[1, 2].map(() => [{ formula: '=FOLD.ZONE(([@[Low (MHz)]]+[@High])/2,Rate)' }, { formula: '=FOLD.MARGIN([@[Low (MHz)]],[@High],Rate)' }]),
    ] }]);
    expect(change.looks!.map(({ reference }) => reference)).toEqual(['Plan!E1', 'Plan!F2:F3', 'Plan!F1']);
    expect(change.cells).toBeUndefined();
  });
});

describe('numbers', () => {
  it.each<[number, number, number, number | null, number]>([
    // low, high, rate, ppm, decimals
    [70,       71,       100,     null, 0],
    [70,       71,       101,     null, 1], // half the rate
    [161.9625, 162.0375, 245.76,  null, 4],
    [1e-7,     1e-6,     1,       null, 7],
    [118,      137,      409.6,   20,   1],
    [1 / 3,    1,        3,       null, 9],
  ])('of a band %d to %d at %d have as many decimals as it takes', (low, high, rate, ppm, decimals) => {
    const of = planFrom({ low: block('A1', low), high: block('B1', high), rate: block('C1', rate), ppm: ppm === null ? null : block('D1', ppm), guard: null, name: null, role: null, centre: null, width: null });
    expect(decimalsOf(of)).toBe(decimals);
    expect(marginDecimalsOf(of)).toBe(Math.min(9, decimals + (ppm === null ? 0 : 3)));
  });

  it('have formats of as many zeros', () => {
    expect([formatOf(0), formatOf(4)]).toEqual(['0', '0.0000']);
  });
});

describe('notes', () => {
  it('carry the unit, what guard and tolerance mean, and the version', () => {
    const { change } = insertionOf(wanted(plan('low and high', 0.5, 20), { results: ['margin'], names: { rate: 'Rate', guard: 'Guard', ppm: 'Fold_Ppm' } }));
    const note = change.looks!.find(({ look }) => look.note !== undefined)!.look.note!;
    for (const fact of ['in MHz', 'The guard (Guard) is taken off', '(Fold_Ppm): the rate may be off by so many ppm either way', 'At the sample rate in Rate', 'Foldplan 1.2.3']) expect(note).toContain(fact);
  });
});
