import { readFileSync } from 'node:fs';
import path from 'node:path';
import { Window } from 'happy-dom';
import { beforeAll, describe, expect, it } from 'vitest';
import type { CellValue, Workbook } from '../../src/host/port';
import { calculate } from '../../src/host/sheet/calculate';
import { faults } from '../../src/engine';
import { helpPage } from '../../src/help/help-page.js';
import { readSentences } from '../../src/help/sources.js';
import { dist } from '../support/browser';
import { built } from '../support/built-functions';

const { document } = new Window();
document.write(readFileSync(path.join(dist, 'help.html'), 'utf8'));
const sectionOf = (id: string) => document.getElementById(id)!;
const textsOf = (root: { querySelectorAll(selector: string): ArrayLike<{ textContent: string }> }, selector: string) =>
  Array.from(root.querySelectorAll(selector), ({ textContent }) => textContent);

describe('the help page', () => {
  it.each(built.metadata)('has FOLD.$id under its own anchor, with every argument, what it returns, its formula and its source', ({ id, description, parameters }) => {
    const section = sectionOf(id);
    expect(section.querySelector('h2')!.textContent).toMatch(new RegExp(`^FOLD\\.${id}\\(`));
    expect(section.querySelector('p')!.textContent).toBe(description);
    expect([...section.querySelectorAll('dt')].map((term) => term.firstChild!.textContent!.trim())).toEqual(parameters.map(({ name }) => name));
    expect(textsOf(section, 'dd')).toEqual(parameters.map((parameter) => parameter.description));
    expect(textsOf(section, 'h3')).toEqual(['Returns', 'Example', 'Formula']);
    expect(section.querySelector('.source')!.textContent).toMatch(/^Source: \S.*[^.]\.$/);
    expect(document.querySelector(`nav a[href="#${id}"]`)).not.toBeNull();
  });

  it('is where the help address of each function points', () => {
    const { functions } = JSON.parse(readFileSync(path.join(dist, 'functions.json'), 'utf8')) as { functions: { id: string; helpUrl: string }[] };
    expect(functions.map(({ helpUrl }) => helpUrl)).toEqual(functions.map(({ id }) => `https://localhost:3000/help.html#${id}`));
  });

  it('tells what every sentence of the engine means', () => {
    const meanings = textsOf(document, '.sentences dd');
    expect(meanings).toHaveLength(Object.keys(faults).length);
    expect(meanings.filter((meaning) => meaning.length < 20)).toEqual([]);
    expect(textsOf(document, '.sentences dt')).toContain('#VALUE! rate must be given with other; got a blank cell.'.replace('rate', 'argument'));
    expect(textsOf(document, '.sentences dt')).toContain('#N/A No frequency from from to to lands on folded.');
  });

  it('shows text as text', () => {
    const functions = new Map([['X', { example: '=FOLD.X("<b>")', result: [['<i>']], formula: 'a < b', source: '&', returns: '<u>' }]]);
    const page = helpPage({ functions: [{ id: 'X', description: '<script>alert("&")</script>', parameters: [] }] }, [{ family: '<p>', functions }], [], '1');
    expect(page).toContain('&lt;script&gt;alert(&quot;&amp;&quot;)&lt;/script&gt;');
    expect(page).not.toMatch(/<[biu]>/);
  });
});

describe('the sentences of the sources', () => {
  it('are those that the engine gives', () => {
    const file = path.join(import.meta.dirname, '../../src/engine/fault.ts');
    const pattern = (parts: (string | { shows: string })[]) => new RegExp(`^${parts.map((part) => (typeof part === 'string' ? part.replace(/[.*+?^${}()|[\]\\]/g, '\\$&') : '.*')).join('')}$`);
    const read = readSentences(file).map(({ code, parts }) => ({ code, pattern: pattern(parts) }));
    const given = Object.entries(faults).map(([name, make]) =>
      (make as (...args: unknown[]) => Error & { kind: string })(1, 2, name === 'unknownWord' ? ['b', 'c'] : 3, 4, 5));
    given.forEach(({ message, kind }, i) => {
      expect(message).toMatch(read[i]!.pattern);
      expect(read[i]!.code).toBe(kind === 'none' ? '#N/A' : '#VALUE!');
    });
  });
});

describe('the examples of the help page', () => {
  const APART = 50;
  const examples = built.metadata.map(({ id }, i) => ({ id, row: i * APART, formula: sectionOf(id).querySelector('.example')!.textContent! }));
  let cells: Workbook['sheets'][number]['cells'];
  beforeAll(async () => {
    const sheet = {
      name: 'Examples', columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 },
      cells: Object.fromEntries(examples.map(({ row, formula }) => [row, { 0: { value: null, formula } }])),
    };
    cells = (await calculate({ sheets: [sheet], names: {} }, built)).sheets[0]!.cells;
  });

  it.each(examples)('$formula gives what stands under it', ({ id, row, formula }) => {
    expect(formula).toMatch(new RegExp(`^=FOLD\\.${id}\\(`));
    const section = sectionOf(id);
    const told = section.querySelector('.result')
      ? [[section.querySelector('.result')!.textContent!]]
      : [...section.querySelectorAll('tr')].map((line) => textsOf(line, 'th, td'));
    const { spill = { rows: 1, columns: 1 } } = cells[row]![0]!;
    const given = Array.from({ length: spill.rows }, (_line, r) => Array.from({ length: spill.columns }, (_cell, c) => shown(cells[row + r]?.[c]?.value ?? null)));
    expect(given).toEqual(told);
  });
});

/** What a cell shows. */
function shown(value: CellValue): string {
  if (typeof value === 'number') return String(Number(value.toPrecision(15)));
  if (typeof value === 'boolean') return String(value).toUpperCase();
  return value === null ? '' : typeof value === 'object' ? value.error : value;
}
