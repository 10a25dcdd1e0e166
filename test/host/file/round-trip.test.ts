// From the command line into the workbench and back: the same workbook.

import { afterEach, describe, expect, it } from 'vitest';
import { coastPlan } from '../../../src/demo/coast';
import { frontEnd } from '../../../src/demo/front-end';
import { WorkbookFile, readWorkbook, writeWorkbook } from '../../../src/host/file';
import type { Cell, Workbook } from '../../../src/host/port';
import { openHeadless } from '../../../src/host/sheet/headless';
import type { SheetHost } from '../../../src/host/sheet/sheet-host';
import { built } from '../../support/built-functions';
import { seeded } from '../../support/random';
import { STALE, styledPlan } from '../../support/styled-plan';
import { calculator } from './calculator';

/** As the command line does. */
async function recalculated(bytes: Uint8Array): Promise<Uint8Array> {
  const file = await WorkbookFile.open(bytes);
  await file.recalculate(calculator);
  return file.save();
}

const plain = async (bytes: Uint8Array): Promise<Workbook> => (await readWorkbook(bytes)).workbook;

let host: SheetHost;
afterEach(() => host.dispose());

/** As the workbench opens a workbook and saves it. */
async function throughTheSheet(workbook: Workbook): Promise<Workbook> {
  host = openHeadless(built);
  await host.load(workbook);
  return host.save();
}

const cellsIn = ({ sheets }: Workbook): Cell[] => sheets.flatMap(({ cells }) => Object.values(cells).flatMap((line) => Object.values(line)));

describe('a workbook that the command line wrote, opened and saved in the workbench and recalculated again, is the same', () => {
  it.each([
    ['the plan of the workbench', () => writeWorkbook(coastPlan())],
    ['the front end of the workbench', () => writeWorkbook(frontEnd())],
    ['a styled plan of 40 rows (seed 20261205)', async () => (await styledPlan(40, seeded(20261205))).bytes],
  ])('%s', async (_name, make) => {
    const first = await plain(await recalculated(await make()));
    // So that this says something.
    expect(cellsIn(first).filter(({ spill }) => spill).length).toBeGreaterThan(0);
    expect(cellsIn(first).filter(({ formula }) => formula?.includes('FOLD.')).length).toBeGreaterThan(20);
    expect(Object.keys(first.names).length).toBeGreaterThan(3);
    const saved = await throughTheSheet(first);
    const second = await plain(await recalculated(await writeWorkbook(saved)));
    // The command line keeps the values of formulas that have nothing to do with a plan; the workbench computes them.
    expect(cellsIn(second).filter(isStale)).toEqual([]);
    expect(withoutStale(second, first)).toEqual(withoutStale(first, first));
  });
});

const isStale = ({ value }: Cell): boolean => value === STALE;

/** A workbook without the values of cells that are stale in another one. */
const withoutStale = (workbook: Workbook, other: Workbook): Workbook => ({
  ...workbook,
  sheets: workbook.sheets.map((sheet, i) => ({
    ...sheet,
    cells: mapEntries(sheet.cells, (line, row) => mapEntries(line, (cell, column) => {
      const before = other.sheets[i]?.cells[row]?.[column];
      return before && isStale(before) ? { ...cell, value: null } : cell;
    })),
  })),
});

const mapEntries = <A, B>(entries: Record<number, A>, change: (entry: A, index: number) => B): Record<number, B> =>
  Object.fromEntries(Object.entries(entries).map(([index, entry]) => [index, change(entry, Number(index))]));
