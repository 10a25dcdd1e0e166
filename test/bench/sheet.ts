// The same plan in the embedded sheet, computed by FOLD formulas and by native formulas that say the same: which is faster when the
// rate changes?

import { FormulaCalculationSessionService } from '@univerjs/sheets-formula';
import type { Cell, Sheet, Workbook } from '../../src/host/port';
import type { WorksheetFunctions } from '../../src/host/sheet/functions-runtime';
import { openHeadless } from '../../src/host/sheet/headless';
import type { SheetHost } from '../../src/host/sheet/sheet-host';
import { seeded } from '../support/random';
import type { Row } from './table';

const ROWS = 1000;
const ROUNDS = 7;
/** Names instead of addresses would cost both kinds of formulas the same. */
const [RATE, GUARD, PPM] = ['$B$1', '$B$2', '$B$3'];
const FIRST = 5;

/** Every column in two notations; `low` and `high` are the edges of a row's band, or of all of them. */
const COLUMNS: { fold: (low: string, high: string) => string; native: (low: string, high: string) => string }[] = [
  {
    fold: (low, high) => `=FOLD.LOW(${low},${high},${RATE})`,
    native: (low, high) => `=IF(INT(${high}/${RATE})*${RATE}>=${low},0,MIN(${folded(low)},${folded(high)}))`,
  },
  {
    fold: (low, high) => `=FOLD.HIGH(${low},${high},${RATE})`,
    native: (low, high) => `=IF((INT(${high}/${RATE}-0.5)+0.5)*${RATE}>=${low},${RATE}/2,MAX(${folded(low)},${folded(high)}))`,
  },
  { fold: (low) => `=FOLD.ZONE(${low},${RATE})`, native: (low) => `=INT(2*${low}/${RATE})+1` },
  { fold: (low) => `=FOLD.INVERTED(${low},${RATE})`, native: (low) => `=MOD(INT(2*${low}/${RATE}),2)=1` },
  {
    fold: (low, high) => `=FOLD.MARGIN(${low},${high},${RATE},${GUARD},${PPM})`,
    native: (low, high) => {
      const below = `INT((${low}+${high})/${RATE})`;
      return `=MIN(${low}-${below}*${RATE}/2*(1+${PPM}/10^6),(${below}+1)*${RATE}/2*(1-${PPM}/10^6)-${high})-${GUARD}`;
    },
  },
];

const folded = (frequency: string) => `ABS(${frequency}-${RATE}*ROUND(${frequency}/${RATE},0))`;

/** @throws Error where the notations give different results */
export async function benchSheet(seed: number, functions: WorksheetFunctions): Promise<Row[]> {
  const bands = randomBands(seed, ROWS, 10_000);
  const native = 'native formulas';
  const plans: Record<string, SheetHost> = {};
  for (const [name, columns] of Object.entries({
    [native]: perRow((column) => column.native), 'FOLD formulas': perRow((column) => column.fold), 'spilled FOLD columns': spilled(ROWS),
  })) {
    plans[name] = openHeadless(functions);
    await plans[name].load(workbook(bands, columns));
  }
  for (const [name, host] of Object.entries(plans)) await expectSame(plans[native]!, host, name);

  const times = Object.fromEntries(Object.keys(plans).map((name) => [name, Infinity]));
  for (let round = -1; round < ROUNDS; round++) {
    for (const [name, host] of Object.entries(plans)) {
      const spent = await recalculation(host, 100 + round);
      if (round >= 0) times[name] = Math.min(times[name]!, spent); // the first round warms up
    }
  }
  for (const host of Object.values(plans)) host.dispose();
  return Object.entries(times).map(([name, ms]) => ({
    what: `sheet of ${ROWS} × ${COLUMNS.length} ${name}, recalculated`, ms, ratio: name === native ? null : ms / times[native]!, comparedWith: native,
  }));
}

/** From the moment the sheet begins to recalculate until the results stand in the cells; it waits a fixed time before it begins. */
export async function recalculation(host: SheetHost, rate: number): Promise<number> {
  const session = host.univer.__getInjector().get(FormulaCalculationSessionService);
  const before = session.state.id;
  let [start, end] = [0, 0];
  const subscription = session.state$.subscribe((state) => {
    if (state.id !== before + 1) return;
    start ||= performance.now();
    if (state.resultApplied && (state.completed || state.resultEmitted)) end ||= performance.now();
  });
  await host.write(`Plan!${RATE}`, [[rate]]);
  await host.settled();
  subscription.unsubscribe();
  return end - start;
}

async function expectSame(one: SheetHost, other: SheetHost, name: string): Promise<void> {
  const results = `Plan!C${FIRST}:G${FIRST + ROWS - 1}`;
  const [expected, given] = [(await one.read(results))!.values.flat(), (await other.read(results))!.values.flat()];
  const differs = given.findIndex((value, i) => {
    const wanted = expected[i];
    return typeof value === 'number' && typeof wanted === 'number' ? Math.abs(value - wanted) > 1e-9 * Math.max(1, Math.abs(wanted)) : value !== wanted;
  });
  if (differs >= 0) throw new Error(`${name} give ${JSON.stringify(given[differs])}, not ${JSON.stringify(expected[differs])}, in result ${differs}.`);
}

/** @param widest in thousandths */
export function randomBands(seed: number, count: number, widest: number): [low: number, high: number][] {
  const random = seeded(seed);
  return Array.from({ length: count }, () => {
    const low = random.whole(1, 2_000_000) / 1000;
    return [low, Number((low + random.whole(1, widest) / 1000).toFixed(3))];
  });
}

type Formulas = Record<number, string[]>;

const perRow = (notation: (column: (typeof COLUMNS)[number]) => (low: string, high: string) => string): Formulas =>
  Object.fromEntries(Array.from({ length: ROWS }, (_, i) => [FIRST + i, COLUMNS.map((column) => notation(column)(`A${FIRST + i}`, `B${FIRST + i}`))]));

export const spilled = (count: number): Formulas => {
  const rows = (letter: string) => `${letter}${FIRST}:${letter}${FIRST + count - 1}`;
  return { [FIRST]: COLUMNS.map(({ fold }) => fold(rows('A'), rows('B'))) };
};

export function workbook(bands: [number, number][], formulas: Formulas): Workbook {
  const line = (...cells: Cell[]) => Object.fromEntries(cells.map((cell, i) => [i, cell]));
  const cells: Sheet['cells'] = {
    0: line({ value: 'rate' }, { value: 122.88 }),
    1: line({ value: 'guard' }, { value: 0.5 }),
    2: line({ value: 'ppm' }, { value: 20 }),
  };
  bands.forEach(([low, high], i) => {
    cells[FIRST + i - 1] = line({ value: low }, { value: high }, ...(formulas[FIRST + i] ?? []).map((formula) => ({ value: null, formula })));
  });
  return { sheets: [{ name: 'Plan', cells, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } }], names: {} };
}
