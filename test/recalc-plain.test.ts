// The built command line with --plain, run as a user runs it.

import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, readdirSync, rmSync, watch, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { WorkbookFile, readWorkbook, writeWorkbook } from '../src/host/file';
import { type Given, planOf } from './support/workbook';
import { seeded } from './support/random';

const program = path.join(import.meta.dirname, '../dist-cli/recalc.cjs');
const ROWS = 2000;

/** A plan with columns filled down, one that spills, a table of results and a last formula. */
function plan(bands: number, last: string): Promise<Uint8Array> {
  const random = seeded(7);
  const rows = Array.from({ length: bands }, (_, i): Given[] => {
    const low = random.decimal(6, random.whole(0, 3));
    return [low, Number((low + 0.25).toPrecision(9)), `=FOLD.ZONE(A${i + 2},Rate)`, `=FOLD.LOW(A${i + 2},B${i + 2},Rate)`, `=IF(FOLD.INVERTED(A${i + 2},Rate),"mirrored","straight")`,
      i === 0 ? `=FOLD.MARGIN(A2:A${bands + 1},B2:B${bands + 1},Rate,0.5,20)` : null];
  });
  return writeWorkbook(planOf([[122.88, 'Rate', null, null, null, 'Margin', null, '=FOLD.RATES(60,90)', null, null, null, null, null, last], ...rows], { Rate: 'Plan!$A$1' }));
}

let folder: string;
const file = (name: string) => readFileSync(path.join(folder, name));
beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'foldplan-'));
  writeFileSync(path.join(folder, 'plan.xlsx'), await plan(ROWS, '=FOLD.FREQ(70,Rate)'));
  writeFileSync(path.join(folder, 'wrong.xlsx'), await plan(10, '=FOLD.FREQ("fast",Rate)'));
});
afterAll(() => rmSync(folder, { recursive: true }));

const start = (...args: string[]): ChildProcess => spawn(process.execPath, [program, ...args], { cwd: folder, stdio: ['ignore', 'pipe', 'pipe'] });

/** Waits for the end of a run. */
function ended(run: ChildProcess): Promise<{ code: number | null; output: string; complaints: string }> {
  const told = { output: '', complaints: '' };
  run.stdout!.on('data', (data: Buffer) => told.output += data.toString());
  run.stderr!.on('data', (data: Buffer) => told.complaints += data.toString());
  return new Promise((done) => run.on('close', (code) => done({ code, ...told })));
}

describe('recalc --plain', () => {
  it('copies a plan of 2 000 rows, counts what it did on each sheet, and leaves the plan as it was', async () => {
    const before = file('plan.xlsx');
    const { code, output } = await ended(start('plan.xlsx', '--plain', '--out', 'plain.xlsx'));
    expect(code).toBe(0);
    expect(output.trim().split('\n').slice(-2)).toEqual([`Plan: ${3 * ROWS + 2} FOLD formulas made native, 1 other made values`, 'The sheet "Plain copy" lists them.']);
    expect(file('plan.xlsx')).toEqual(before);
    const { formulas } = await (await WorkbookFile.open(file('plain.xlsx'))).formulas();
    expect(formulas.filter(({ text }) => /fold[._]/i.test(text))).toEqual([]);
    expect(formulas.length).toBe(4 * ROWS + 1);
    const { workbook } = await readWorkbook(file('plain.xlsx'));
    const list = Object.values(workbook.sheets.at(-1)!.cells).map((line) => Object.values(line).map(({ value }) => value)).filter(([sheet]) => sheet === 'Plan');
    expect(list.map(([, cells]) => cells)).toEqual([`C2:C${ROWS + 1}`, `D2:D${ROWS + 1}`, `E2:E${ROWS + 1}`, `F2:F${ROWS + 1}`, expect.stringMatching(/^H1:L\d+$/), 'N1']);
  }, 300_000);

  it('says with 1 that a cell shows an error, and writes the copy', async () => {
    const { code, complaints } = await ended(start('wrong.xlsx', '--plain', '--out', 'wrong-plain.xlsx'));
    expect(code).toBe(1);
    expect(complaints).toContain('#VALUE! frequency must be a number; got "fast".');
    expect(file('wrong-plain.xlsx').length).toBeGreaterThan(0);
  });

  it('is refused in place of the workbook', async () => {
    const before = file('plan.xlsx');
    const { code, output, complaints } = await ended(start('plan.xlsx', '--plain', '--out', './plan.xlsx'));
    expect([code, output, complaints]).toEqual([2, '', 'A plain copy is another file than the workbook: give --out another name.\n']);
    expect(file('plan.xlsx')).toEqual(before);
  });

  it('leaves nothing where it is stopped while it computes', async () => {
    const before = readdirSync(folder);
    const run = start('plan.xlsx', '--plain', '--out', 'stopped.xlsx');
    run.stderr!.once('data', () => run.kill('SIGINT')); // it tells how far it is
    const { code, output } = await ended(run);
    expect([code, output]).toEqual([130, '']);
    expect(readdirSync(folder)).toEqual(before);
  });

  it('leaves nothing unfinished where it is stopped while it writes', async () => {
    const before = readdirSync(folder);
    const run = start('wrong.xlsx', '--plain', '--out', 'stopped.xlsx');
    const watcher = watch(folder, (_event, name) => {
      if (name?.startsWith('.stopped.xlsx')) run.kill('SIGINT');
    });
    await ended(run);
    watcher.close();
    expect(readdirSync(folder).filter((name) => name !== 'stopped.xlsx')).toEqual(before);
  });
});
