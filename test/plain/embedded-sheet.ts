// The embedded sheet, for many portions of rows one after the other: it parses a formula once and computes it for the rows of them all.

import type { CellInput, CellValue } from '../../src/host/port';
import { openHeadless } from '../../src/host/sheet/headless';
import type { SheetHost } from '../../src/host/sheet/sheet-host';
import { built } from '../support/built-functions';
import { sheetOf } from '../support/workbook';
import type { Portion } from './portions';
import type { Row } from './random-rows';

/** A sheet keeps every formula that it has parsed: after so many portions a new one takes its place. */
const PORTIONS = 10;

export class EmbeddedSheet {
  #host: SheetHost | null = null;
  #portions = 0;

  /** What the formulas of a portion give; undefined for a row without one. */
  async results({ rows, formulas }: Portion): Promise<(CellValue | undefined)[]> {
    if (this.#portions++ % PORTIONS === 0) this.close();
    const host = this.#host ??= await opened();
    await host.write(`A1:G${rows.length}`, rows.map((row, r) => [...inputs(row), formulaInput(formulas[r])]));
    await host.settled();
    const { values } = (await host.read(`G1:G${rows.length}`))!;
    return formulas.map((formula, r) => (formula === undefined ? undefined : values[r]![0]!));
  }

  close(): void {
    this.#host?.dispose();
    this.#host = null;
  }
}

async function opened(): Promise<SheetHost> {
  const host = openHeadless(built);
  await host.load({ sheets: [sheetOf('Plan', [])], names: {} });
  return host;
}

/** Cells A to F. An empty text is what a formula gives: one that is written leaves the cell blank. */
const inputs = (row: Row): CellInput[] => Array.from({ length: 6 }, (_, c) => (row[c] === '' ? { formula: '=""' } : row[c] ?? null));

const formulaInput = (formula: string | undefined): CellInput => (formula === undefined ? null : { formula: `=${formula}` });
