// Native formulas against the exact engine, as two other programs compute them.
//
// PLAIN_ROWS sets how many random rows each function gets: `npm run test:plain` takes 20 000.

import { describe, expect, it } from 'vitest';
import { EQUIVALENTS, plainCopy, workbookSource } from '../../src/plain';
import { WorkbookFile, writeWorkbook } from '../../src/host/file';
import type { CellValue, Workbook } from '../../src/host/port';
import { calculate } from '../../src/host/sheet/calculate';
import { built, call } from '../support/built-functions';
import { sheetOf } from '../support/workbook';
import { type Row, randomRows } from './random-rows';
import { noSoffice, recomputed } from './soffice';
import { strictly } from './strict';

const ROWS = Number(process.env.PLAIN_ROWS ?? 100);
const SEED = 20261201;
const ids = Object.keys(EQUIVALENTS);

const LETTERS = 'ABCDEF';

/** The rows of a function with its native formula behind them. Every third formula has its words and numbers written out. */
async function planFor(id: string, rows: Row[]): Promise<Workbook> {
  const column = LETTERS.length;
  const argument = (value: Row[number], r: number, c: number) => (r % 3 === 0 && (typeof value === 'string' ? /^[a-z ]*$/i.test(value) && value !== 'fast' : c > 1 && typeof value === 'number')
    ? JSON.stringify(value) : `${LETTERS[c]}${r + 1}`);
  const sheet = sheetOf('Plan', rows.map((row, r) => [
    ...row, ...Array<null>(column - row.length).fill(null), { value: 0, formula: `=FOLD.${id}(${row.map((value, c) => argument(value, r, c)).join(',')})` },
  ]));
  const copy = await plainCopy(workbookSource({ sheets: [sheet], names: {} }), { version: '', date: '' });
  for (const { area, outcome } of copy.cells) {
    const cell = sheet.cells[area.top]![area.left]!;
    if (outcome.kind === 'formulas') Object.assign(cell, { value: null, formula: `=${outcome.formulas[0]![0]!}` });
    else delete sheet.cells[area.top]![area.left];
  }
  return { sheets: [sheet], names: {} };
}

/** What cells show, of the rows whose formula has become another one. */
const resultsOf = (values: (CellValue | undefined)[], plan: Workbook) => values.map((value, r) => {
  if (!plan.sheets[0]!.cells[r]![LETTERS.length]) return undefined;
  return typeof value === 'object' && value !== null ? value.error : value ?? '';
});

/** The results in doubles as they are. */
const inDoubles = ({ sheets: [sheet] }: Workbook, rows: Row[]) => rows.map((row, r) => {
  const formula = sheet!.cells[r]![LETTERS.length]?.formula;
  return formula === undefined ? undefined : strictly(formula.slice(1), row);
});

/** The results of a workbook as plain data, and of one as a file. */
const inData = ({ sheets: [sheet] }: Workbook, rows: number) => Array.from({ length: rows }, (_, r) => sheet!.cells[r]?.[LETTERS.length]?.value);
const inFile = async (bytes: Uint8Array, rows: number) => (await (await WorkbookFile.open(bytes)).read(`Plan!G1:G${rows}`))!.values.map(([value]) => value);

/** The exact results, an error by its code alone. */
const exactOf = (id: string, rows: Row[]): unknown[] => call(id, ...rows[0]!.map((_, c) => rows.map((row) => row[c]!))).map(([value]) => (typeof value === 'string' && value.startsWith('#') ? value.split(' ')[0] : value));

/** How far a number may be off: 1e-9 of the rate, or of the result where it is a rate, or dB. */
function allowed(id: string, row: Row, exact: number): number {
  const rate = { FREQ: row[1], LOW: row[2], HIGH: row[2], MARGIN: row[2], GAP: row[4] }[id];
  // Numbers that are thousands of millions of times the rate have no more digits.
  if (typeof rate === 'number') return 1e-9 * rate + 1e-15 * Math.max(...row.map((cell) => Math.abs(Number(cell) || 0)));
  // Near a null the engine's own sine is only as good as its doubles.
  if (id === 'DROOP') return 1e-9 + 1e-14 * 10 ** (-exact / 20);
  return id === 'ZONE' ? 0 : id === 'TOLERANCE' ? 1e-8 + 1e-9 * exact : 1e-9 * Math.max(Math.abs(exact), id === 'MINRATE' || id === 'JITTERLIMIT' ? 0 : 1);
}

function differences(id: string, rows: Row[], results: (CellValue | undefined)[]): string[] {
  const exact = exactOf(id, rows);
  return rows.flatMap((row, r) => {
    const [wanted, got] = [exact[r], results[r]];
    if (got === undefined) return []; // stays a value
    const alike = typeof wanted === 'number' && typeof got === 'number' ? Math.abs(wanted - got) <= allowed(id, row, wanted) : wanted === got;
    return alike || isSameEdge(wanted, got) ? [] : [`${id}(${row.map((cell) => JSON.stringify(cell)).join(', ')}) is ${String(wanted)}; native ${String(got)}`];
  });
}

/** Programs write numbers into text in ways of their own: 1.05e-7, 0.000000105, or with a last digit that a double does not have. */
function isSameEdge(wanted: unknown, got: unknown): boolean {
  const [a, b] = [wanted, got].map((text) => (typeof text === 'string' && text.startsWith('crosses ') ? Number(text.slice('crosses '.length)) : NaN)) as [number, number];
  return Math.abs(a - b) <= 1e-14 * Math.abs(a);
}

/** In portions: the embedded sheet takes more than twice the time for twice the rows. */
const portions = (rows: Row[]): Row[][] => Array.from({ length: Math.ceil(rows.length / 500) }, (_, i) => rows.slice(i * 500, i * 500 + 500));

describe(`the native formula, on ${ROWS} random rows of seed ${SEED},`, () => {
  it.each(ids)('of %s gives the exact result in the embedded sheet', async (id) => {
    const wrong: string[] = [];
    let native = 0;
    for (const rows of portions(randomRows(id, ROWS, SEED))) {
      const plan = await planFor(id, rows);
      const results = resultsOf(inData(await calculate(plan, built), rows.length), plan);
      native += results.filter((value) => value !== undefined).length;
      wrong.push(...differences(id, rows, results));
    }
    expect(native).toBeGreaterThan(ROWS * 0.9);
    expect(wrong.slice(0, 10)).toEqual([]);
  }, 3_600_000);

  it.each(ids)('of %s gives the exact result in bare doubles', async (id) => {
    const rows = randomRows(id, Math.max(1000, ROWS), SEED);
    const plan = await planFor(id, rows);
    expect(differences(id, rows, resultsOf(inDoubles(plan, rows), plan)).slice(0, 10)).toEqual([]);
  }, 3_600_000);

  it.each(['FREQ', 'ZONE', 'INVERTED', 'LOW', 'HIGH'])('of %s is right beside edges up to the twelfth digit', async (id) => {
    const rows = randomRows(id, ROWS, SEED, 12);
    const plan = await planFor(id, rows);
    expect(differences(id, rows, resultsOf(inDoubles(plan, rows), plan)).slice(0, 10)).toEqual([]);
    expect(differences(id, rows, resultsOf(inData(await calculate(plan, built), ROWS), plan)).slice(0, 10)).toEqual([]);
  });

  if (noSoffice) console.log(noSoffice);
  it.skipIf(noSoffice !== null)('of every function gives the exact result in LibreOffice', async () => {
    const plans = await Promise.all(ids.map(async (id) => [id, await planFor(id, randomRows(id, ROWS, SEED))] as const));
    const done = recomputed(Object.fromEntries(await Promise.all(plans.map(async ([id, plan]) => [id, await writeWorkbook(plan)] as const))));
    const wrong = await Promise.all(plans.map(async ([id, plan]) => {
      const rows = randomRows(id, ROWS, SEED);
      return differences(id, rows, resultsOf(await inFile(done[id]!, ROWS), plan)).slice(0, 10);
    }));
    expect(wrong.flat()).toEqual([]);
  }, 3_600_000);
});
