// Runs what the README says.

import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { beforeAll, describe, expect, it } from 'vitest';
import { coastPlan } from '../src/demo/coast';
import { frontEnd } from '../src/demo/front-end';
import type { CellValue, Workbook } from '../src/host/port';
import { readWorkbook, writeWorkbook } from '../src/host/file';
import { calculate } from '../src/host/sheet/calculate';
import { built } from './support/built-functions';

const root = path.join(import.meta.dirname, '..');
const read = (file: string) => readFileSync(path.join(root, file), 'utf8');
const readme = read('README.md');
const scripts = Object.keys((JSON.parse(read('package.json')) as { scripts: Record<string, string> }).scripts);

/** What a cell shows, as the README writes it. */
const shown = (value: CellValue): string => (typeof value === 'boolean' ? String(value).toUpperCase() : value === null ? '' : typeof value === 'object' ? value.error : String(value));

/** The rows of a table of Markdown, its rule left out. */
const rowsOf = (table: string) => table.trim().split('\n').filter((line) => !/^[ |-]+$/.test(line)).map((line) => line.split('|').slice(1, -1).map((cell) => cell.trim()));

/** The demo plan with formulas on a sheet of their own, far apart, computed. */
async function compute(formulas: readonly string[]): Promise<CellValue[][][]> {
  const APART = 50;
  const workbook: Workbook = coastPlan();
  workbook.sheets.push({
    name: 'README', columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 },
    cells: Object.fromEntries(formulas.map((formula, i) => [i * APART, { 0: { value: null, formula } }])),
  });
  const { cells } = (await calculate(workbook, built)).sheets.at(-1)!;
  return formulas.map((_, i) => {
    const { spill = { rows: 1, columns: 1 } } = cells[i * APART]![0]!;
    return Array.from({ length: spill.rows }, (_row, r) => Array.from({ length: spill.columns }, (_column, c) => cells[i * APART + r]?.[c]?.value ?? null));
  });
}

describe('the formulas of the README', () => {
  const single = [...readme.matchAll(/^\| `(=FOLD\.[^`]+)` \| (.+?) \|$/gm)].map(([, formula, result]) => ({ formula: formula!, result: result! }));
  const tables = [...readme.matchAll(/^`(=FOLD\.[^`]+)`\n\n((?:\|.*\n)+)/gm)].map(([, formula, table]) => ({ formula: formula!, rows: rowsOf(table!) }));
  let results: CellValue[][][];
  beforeAll(async () => {
    results = await compute([...single, ...tables].map(({ formula }) => formula));
  });

  it('are there', () => {
    expect([single.length >= 10, tables.length]).toEqual([true, 3]);
  });

  it.each(single.map((example, i) => ({ ...example, i })))('$formula gives $result', ({ result, i }) => {
    expect(results[i]!.map((row) => row.map(shown))).toEqual([[result]]);
  });

  it.each(tables.map((example, i) => ({ ...example, i })))('$formula gives the table under it', ({ rows, i }) => {
    expect(results[single.length + i]!.map((row) => row.map(shown))).toEqual(rows);
  });

  it('the rates that it lists leave CONFLICTS nothing to say, those beside them do', async () => {
    const [, ranges] = tables.map(({ rows }) => rows);
    const rates = ranges!.slice(1).flatMap(([lowest, highest, , centre]) => [lowest!, highest!, centre!]);
    const clear = await compute(rates.map((rate) => `=FOLD.CONFLICTS(Fold_Low,Fold_High,${rate},Fold_Role,Guard,Ppm,,,,,FALSE)`));
    expect(new Set(clear.map(([row]) => row![1]))).toEqual(new Set(['clear']));
  });
});

describe('the walk through the front end in the README', () => {
  const cells = [...readme.matchAll(/^\| ([A-Z][\w ]+)!([A-Z]+)(\d+) \| `(=FOLD\.[^`]+)` \| (.+?) \|$/gm)]
    .map(([, sheet, column, row, formula, result]) => ({ sheet: sheet!, column: column!, row: Number(row), formula: formula!, result: result! }));
  let demo: Workbook;
  beforeAll(async () => {
    demo = await calculate(frontEnd(), built);
  });

  it('comes to every sheet of the demo', () => {
    expect([...new Set(cells.map(({ sheet }) => sheet))]).toEqual(demo.sheets.map(({ name }) => name));
  });

  it.each(cells)('$sheet: $formula shows $result', ({ sheet, column, row, formula, result }) => {
    const found = demo.sheets.find(({ name }) => name === sheet)!;
    const { value } = found.cells[row - 1]![column.charCodeAt(0) - 65]!;
    expect(shown(typeof value === 'number' ? Number(value.toPrecision(15)) : value)).toBe(result);
    // The formula stands in that cell, or in one whose block holds it.
    expect(Object.values(found.cells).flatMap((line) => Object.values(line)).map((cell) => cell.formula)).toContain(formula);
  });

  it('has no cell that is an error', () => {
    const values = demo.sheets.flatMap((sheet) => Object.values(sheet.cells).flatMap((line) => Object.values(line).map(({ value }) => value)));
    expect(values.filter((value) => typeof value === 'object' && value !== null)).toEqual([]);
  });
});

describe('the function list of the README', () => {
  it('names every function with its arguments', () => {
    const listed = [...readme.matchAll(/^\| (`[A-Z]+\([^|]*) \|/gm)].flatMap(([, cell]) => [...cell!.matchAll(/`([A-Z]+)\((.*?)\)`/g)].map(([, id, args]) => [id!, args!] as const));
    const signature = (id: string) => built.metadata.find((one) => one.id === id)!.parameters.map(({ name, optional, repeating }) => (optional ? `[${name}]` : repeating ? `${name}…` : name)).join(', ');
    expect(listed.map(([id]) => id)).toEqual(built.metadata.map(({ id }) => id));
    for (const [id, args] of listed) if (args !== '…') expect([id, args]).toEqual([id, signature(id)]);
  });
});

describe('the commands of the documents', () => {
  it.each(['README.md', 'DEVELOPERS.md'])('of %s are scripts of the package', (file) => {
    const named = [...read(file).matchAll(/npm (?:run ([a-z]+)|(start|test))/g)].map(([, script, short]) => (script ?? short)!);
    expect(named.length).toBeGreaterThan(2);
    expect(named.filter((script) => !scripts.includes(script))).toEqual([]);
  });

  it('recalculate a plan', async () => {
    const [, line] = readme.match(/^npm run recalc -- (plan\.xlsx .*)$/m)!;
    const folder = mkdtempSync(path.join(tmpdir(), 'foldplan-'));
    writeFileSync(path.join(folder, 'plan.xlsx'), await writeWorkbook(coastPlan()));
    execFileSync(process.execPath, [path.join(root, 'dist-cli/recalc.cjs'), ...line!.split(' ')], { cwd: folder, stdio: 'pipe' });
    const { workbook } = await readWorkbook(readFileSync(path.join(folder, 'done.xlsx')));
    const plan = workbook.sheets[0]!.cells;
    const [rate] = Object.values(plan).flatMap((line_) => Object.values(line_)).filter(({ value }) => value === 100);
    expect(rate).toBeDefined();
    expect(Object.values(plan).flatMap((line_) => Object.values(line_)).filter(({ formula, value }) => formula?.includes('FOLD.') && value === null)).toEqual([]);
  });
});

describe('the plain copy of the README', () => {
  it('holds no formula of ours', async () => {
    const [, line] = readme.match(/^npm run recalc -- (plan\.xlsx --plain .*)$/m)!;
    const folder = mkdtempSync(path.join(tmpdir(), 'foldplan-'));
    writeFileSync(path.join(folder, 'plan.xlsx'), await writeWorkbook(coastPlan()));
    execFileSync(process.execPath, [path.join(root, 'dist-cli/recalc.cjs'), ...line!.split(' ')], { cwd: folder, stdio: 'pipe' });
    const { workbook } = await readWorkbook(readFileSync(path.join(folder, 'plain.xlsx')));
    const formulas = workbook.sheets.flatMap(({ cells }) => Object.values(cells).flatMap((row) => Object.values(row).flatMap(({ formula }) => formula ?? [])));
    expect(formulas.length).toBeGreaterThan(10);
    expect(formulas.filter((formula) => formula.includes('FOLD.'))).toEqual([]);
  });
});

describe('the links of the documents', () => {
  it.each(['README.md', 'DEVELOPERS.md'])('of %s lead somewhere', (file) => {
    const targets = [...read(file).matchAll(/\]\(([^)#]+)\)/g)].map(([, target]) => target!).filter((target) => !target.startsWith('http'));
    expect(targets.filter((target) => !existsSync(path.join(root, target)))).toEqual([]);
  });
});

describe('the README opens with', () => {
  it('the job in one paragraph, the two commands, and a picture, in this order', () => {
    const [title, job, commands, ...rest] = readme.split('\n\n');
    expect(title).toBe('# Foldplan');
    expect(job!.split(' ').length).toBeGreaterThan(60);
    expect(commands!.split('\n').filter((line) => line.startsWith('npm')).map((line) => line.split('#')[0]!.trim())).toEqual(['npm ci && npm start', 'npm ci && npm test']);
    expect(rest.slice(0, 2).some((paragraph) => paragraph.startsWith('!['))).toBe(true);
  });
});
