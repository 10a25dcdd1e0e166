// Native formulas against the exact engine, as two other programs compute them.
//
// PLAIN_ROWS sets how many random rows each function gets.

import { afterAll, describe, expect, it } from 'vitest';
import { EQUIVALENTS } from '../../src/plain';
import { WorkbookFile, writeWorkbook } from '../../src/host/file';
import type { CellValue } from '../../src/host/port';
import { call } from '../support/built-functions';
import { sheetOf } from '../support/workbook';
import { EmbeddedSheet } from './embedded-sheet';
import { type Portion, portionsOf } from './portions';
import { type Row, randomRows } from './random-rows';
import { noSoffice, recomputed } from './soffice';
import { strictly } from './strict';

const ROWS = Number(process.env.PLAIN_ROWS ?? 100);
const SEED = 20261201;
const ids = Object.keys(EQUIVALENTS);

type Results = (CellValue | undefined)[];

/** The results in doubles as they are. */
const inDoubles = ({ rows, formulas }: Portion): Results => rows.map((row, r) => {
  const formula = formulas[r];
  return formula === undefined ? undefined : strictly(formula, row);
});

/** A workbook with a sheet for each portion, its results in column G. */
const fileOf = (portions: Portion[]): Promise<Uint8Array> => writeWorkbook({
  sheets: portions.map(({ rows, formulas }, i) => sheetOf(`Part ${i + 1}`, rows.map((row, r) => {
    const formula = formulas[r];
    return [...row, ...Array<null>(6 - row.length).fill(null), formula === undefined ? null : `=${formula}`];
  }))),
  names: {},
});

async function inFile(file: WorkbookFile, i: number, { formulas }: Portion): Promise<Results> {
  const { values } = (await file.read(`'Part ${i + 1}'!G1:G${formulas.length}`))!;
  return formulas.map((formula, r) => (formula === undefined ? undefined : values[r]![0]!));
}

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

function differences(id: string, { rows }: Portion, results: Results): string[] {
  const exact = exactOf(id, rows);
  return rows.flatMap((row, r) => {
    if (results[r] === undefined) return []; // stays a value
    const [wanted, got] = [exact[r], shown(results[r])];
    const alike = typeof wanted === 'number' && typeof got === 'number' ? Math.abs(wanted - got) <= allowed(id, row, wanted) : wanted === got;
    return alike || isSameEdge(wanted, got) ? [] : [`${id}(${row.map((cell) => JSON.stringify(cell)).join(', ')}) is ${String(wanted)}; native ${String(got)}`];
  });
}

/** An error by its code; a blank cell shows what an empty text shows. */
const shown = (value: CellValue) => (typeof value === 'object' && value !== null ? value.error : value ?? '');

/** Programs write numbers into text in ways of their own: 1.05e-7, 0.000000105, or with a last digit that a double does not have. */
function isSameEdge(wanted: unknown, got: unknown): boolean {
  const [a, b] = [wanted, got].map((text) => (typeof text === 'string' && text.startsWith('crosses ') ? Number(text.slice('crosses '.length)) : NaN)) as [number, number];
  return Math.abs(a - b) <= 1e-14 * Math.abs(a);
}

describe(`the native formula, on ${ROWS} random rows of seed ${SEED},`, () => {
  const sheet = new EmbeddedSheet();
  afterAll(() => sheet.close());

  it.each(ids)('of %s gives the exact result in the embedded sheet', async (id) => {
    const wrong: string[] = [];
    let native = 0;
    for (const portion of await portionsOf(id, randomRows(id, ROWS, SEED))) {
      const results = await sheet.results(portion);
      native += results.filter((value) => value !== undefined).length;
      wrong.push(...differences(id, portion, results));
    }
    expect(native).toBeGreaterThan(ROWS * 0.9);
    expect(wrong.slice(0, 10)).toEqual([]);
  }, 3_600_000);

  it.each(ids)('of %s gives the exact result in bare doubles', async (id) => {
    const wrong: string[] = [];
    for (const portion of await portionsOf(id, randomRows(id, Math.max(1000, ROWS), SEED))) wrong.push(...differences(id, portion, inDoubles(portion)));
    expect(wrong.slice(0, 10)).toEqual([]);
  }, 3_600_000);

  it.each(['FREQ', 'ZONE', 'INVERTED', 'LOW', 'HIGH'])('of %s is right beside edges up to the twelfth digit', async (id) => {
    const wrong: string[] = [];
    for (const portion of await portionsOf(id, randomRows(id, ROWS, SEED, 12))) {
      wrong.push(...differences(id, portion, inDoubles(portion)), ...differences(id, portion, await sheet.results(portion)));
    }
    expect(wrong.slice(0, 10)).toEqual([]);
  }, 3_600_000);

  it('of MINRATE counts a zone that fits at a single rate, whatever its digits, where the tolerance is 0', async () => {
    const rows: Row[] = [
      [8.68e-7, 8.69e-7, 1e-9, 0, 'real'],
      [8.68e-7, 8.69e-7, 1e-9, 0, 'real'],
      [-6e-9, -6e-9, 3e-9, null, 'iq'],
      [0.3703703673, 0.4938271564, null, 0, 'real'],
      [0.3703703673, 0.4938271564, null, 0, 'real'],
    ];
    const [portion] = await portionsOf('MINRATE', rows);
    expect(differences('MINRATE', portion!, inDoubles(portion!))).toEqual([]);
    expect(differences('MINRATE', portion!, await sheet.results(portion!))).toEqual([]);
  });

  if (noSoffice) console.log(noSoffice);
  it.skipIf(noSoffice !== null)('of every function gives the exact result in LibreOffice', async () => {
    const files: Record<string, Uint8Array> = {};
    for (const id of ids) files[id] = await fileOf(await portionsOf(id, randomRows(id, ROWS, SEED)));
    const done = recomputed(files);
    const wrong: string[] = [];
    for (const id of ids) {
      const file = await WorkbookFile.open(done[id]!);
      for (const [i, portion] of (await portionsOf(id, randomRows(id, ROWS, SEED))).entries()) wrong.push(...differences(id, portion, await inFile(file, i, portion)));
    }
    expect(wrong.slice(0, 100)).toEqual([]);
  }, 3_600_000);
});
