// The whole job in the pane, run once for each host that shows the pane: a plan is set up by its headers, columns are inserted, the rate
// is changed, the pictures follow, another rate is chosen on the ruler and written, and all of it is taken back.

import type { Locator, Page } from 'playwright-core';
import { describe, expect, it } from 'vitest';
import type { CellValue } from '../../src/host/port';
import { outputFile } from './browser';
import { call } from './built-functions';
import { BANDS, OBJECTIONS, RATE, SHAPES, type Shape, USABLE } from './plan-shapes';

/** A host with a workbook and the pane, as its user sees them. */
export interface Stage {
  /** The page whose pointer is moved. */
  page: Page;
  pane: Locator;
  hasTables: boolean;
  enter(cell: string, text: string): Promise<void>;
  /** Takes the last step back, by the host's own undo where that knows the step. */
  takeBack(step: Step): Promise<void>;
  held(): Promise<Held>;
}

/** What was done last: by the pane, whose section has a button to take it back, or to a cell, which held something before. */
export type Step = { section: string; button: string } | { cell: string; before: string };

export interface Held {
  names: Record<string, string>;
  /** A cell of the plan's sheet, counted from 0. */
  cell(row: number, column: number): { value: CellValue; formula?: string };
  /** All that an undo must restore. */
  everything: unknown;
}

const TYPED_RATE = 245.76;

/** @param open opens a workbook that holds a plan of this shape */
export function testWholeJob(host: string, open: (shape: Shape) => Promise<Stage>): void {
  describe(`the whole job in ${host}`, () => {
    it.each(SHAPES)('is done and taken back on a plan with %s', async (what, shape) => {
      const stage = await open(shape);
      const { pane } = stage;
      const button = (name: string) => pane.getByRole('button', { name, exact: true });
      const openSection = (name: string) => pane.getByRole('tab', { name, exact: true }).click();
      const expectPane = (text: string | RegExp) => expect.poll(() => pane.innerText(), PATIENCE).toMatch(text);
      const expectNoFault = async () => expect(await pane.getByRole('alert').allTextContents()).toEqual(['']);
      const expectPictures = (rate: number, candidate = rate) => expect.poll(() => picturesIn(pane), PATIENCE).toEqual(duePictures(shape, rate, candidate));
      const states: unknown[] = [];
      const remember = async () => states.push((await stage.held()).everything);

      await remember();
      await expectPane(/Found on the sheet Plan, 3 rows/);
      await button('Use this plan').click();
      await expectPane('Stored the plan in the workbook.');
      expect((await stage.held()).names).toEqual(shape.names);

      await remember();
      await openSection('Columns');
      await button('Insert 6 columns').click();
      await expectPane(/Inserted 6 columns at/);
      const held = await stage.held();
      const [row, column] = shape.at;
      expect(held.cell(row, column).formula).toBe((stage.hasTables && shape.tableFormula) || shape.formula);
      expect(resultsIn(held, shape)).toEqual(dueResults(shape, RATE));

      await remember();
      await openSection('Pictures');
      await expectPictures(RATE);
      await stage.enter(shape.rateCell, String(TYPED_RATE));
      await expectPictures(TYPED_RATE);
      expect(resultsIn(await stage.held(), shape)).toEqual(dueResults(shape, TYPED_RATE));

      await remember();
      await fill(pane, 'From', 240);
      await fill(pane, 'To', 320);
      const chosen = what === DRAGGED_ON ? await dragCandidate(stage) : await typeCandidate(pane, 300);
      await expectPictures(TYPED_RATE, chosen);
      expect(await textsIn(pane.getByRole('table', { name: 'What changes' }).getByRole('row'))).toEqual(dueChanges(shape, TYPED_RATE, chosen));
      expect((await stage.held()).everything).toEqual(states.at(-1));
      if (what === DRAGGED_ON) await stage.page.screenshot({ path: outputFile(`whole-job-in-${host.replaceAll(' ', '-')}.png`) });
      await expectNoFault();
      await button('Use this rate').click();
      await expectPane(`The rate cell was set to ${chosen}; before, it held ${TYPED_RATE}.`);
      await expectPictures(chosen);
      expect(resultsIn(await stage.held(), shape)).toEqual(dueResults(shape, chosen));

      const expectState = () => expect.poll(async () => (await stage.held()).everything, PATIENCE).toEqual(states.pop());
      await stage.takeBack({ section: 'Pictures', button: `Undo: back to ${TYPED_RATE}` });
      await expectPictures(TYPED_RATE);
      await expectState();
      await stage.takeBack({ cell: shape.rateCell, before: String(RATE) });
      await expectPictures(RATE);
      await expectState();
      await stage.takeBack({ section: 'Columns', button: 'Undo' });
      await expectState();
      await stage.takeBack({ section: 'Plan', button: 'Undo' });
      await expectState();
      await openSection('Plan');
      await expectPane(/Found on the sheet Plan, 3 rows/);
      await expectNoFault();
    });
  });
}

const PATIENCE = { timeout: 20_000 };

const DRAGGED_ON = 'low and high';

// What the user does

async function fill(pane: Locator, label: string, value: number): Promise<void> {
  const field = pane.getByLabel(label, { exact: true });
  await field.fill(String(value));
  await field.press('Enter');
}

async function typeCandidate(pane: Locator, rate: number): Promise<number> {
  await fill(pane, 'Candidate', rate);
  return rate;
}

/** Drags the candidate into the lowest usable range in view. @returns where it came to rest */
async function dragCandidate({ page, pane }: Stage): Promise<number> {
  const handle = pane.getByRole('slider', { name: 'Candidate rate' });
  await pane.locator('.ruler').scrollIntoViewIfNeeded();
  await expect.poll(() => pane.locator('.ruler .usable').first().getAttribute('d'), PATIENCE).toMatch(/^M/);
  const grip = (await handle.boundingBox())!;
  const usable = (await pane.locator('.ruler .usable').first().boundingBox())!;
  await page.mouse.move(grip.x + grip.width / 2, grip.y + grip.height / 2);
  await page.mouse.down();
  await page.mouse.move(usable.x + 10, usable.y + usable.height / 2, { steps: 5 });
  await page.mouse.up();
  const rate = Number(await handle.getAttribute('aria-valuenow'));
  expect(rate).toBeGreaterThan(USABLE.from);
  expect(rate).toBeLessThan(USABLE.to);
  expect(await pane.locator('.stage + .readout').textContent()).toBe(`${rate} lies in the usable range ${USABLE.from} to ${USABLE.to}.`);
  return rate;
}

// What the user sees, and what is due by the built functions

const lowEdges = BANDS.map(({ low }) => low);
const highEdges = BANDS.map(({ high }) => high);
const guardOf = ({ guard = 0 }: Shape) => guard;

const figuresAt = (shape: Shape, rate: number) => call('BAND', lowEdges, highEdges, rate, guardOf(shape), null, null, false).map((figures, i) => {
  const [foldedLow, foldedHigh, zone, inverted, margin, check] = figures as [number, number, number, boolean, number, string];
  return { ...BANDS[i]!, foldedLow, foldedHigh, zone, inverted, margin, check };
});

/** A promise to three digits, so rounded down. */
function headroomAt(shape: Shape, rate: number): string {
  const ppm = call('HEADROOM', lowEdges, highEdges, rate, null, guardOf(shape))[0]![0] as number;
  const unit = 10 ** (Math.floor(Math.log10(ppm)) - 2);
  return ppm === 0 ? '0' : String(Math.floor(ppm / unit) * unit);
}

const objectionsTo = (rate: number): string[] => OBJECTIONS[rate] ?? [];

const resultsIn = ({ cell }: Held, { at: [row, column] }: Shape) => BANDS.map((_, r) => Array.from({ length: 6 }, (_c, c) => cell(row + r, column + c).value));

const dueResults = (shape: Shape, rate: number) => figuresAt(shape, rate).map(({ foldedLow, foldedHigh, zone, inverted, margin, check }) => [foldedLow, foldedHigh, zone, inverted, margin, check]);

async function picturesIn(pane: Locator) {
  return {
    rate: await pane.locator('.ladder .rate').textContent(),
    bands: await pane.locator('.ladder .band[data-row] title').allTextContents(),
    conflicts: await pane.locator('.conflicts-list :is(li, p)').allTextContents(),
    flags: await pane.locator('.ruler text.flag').allTextContents(),
    candidate: await pane.getByRole('slider', { name: 'Candidate rate' }).getAttribute('aria-valuenow'),
    standing: await pane.locator('.standing').textContent(),
  };
}

function duePictures(shape: Shape, rate: number, candidate: number): Awaited<ReturnType<typeof picturesIn>> {
  const against = objectionsTo(rate);
  const broken = objectionsTo(candidate).length;
  return {
    rate: `rate ${rate}`,
    bands: figuresAt(shape, rate).map(({ name, low, high, zone, inverted, foldedLow, foldedHigh, margin, check }) =>
      `${name}, wanted: ${low} to ${high}. Zone ${zone}, ${inverted ? 'inverted' : 'not inverted'}, lands on ${foldedLow} to ${foldedHigh}. Margin ${margin}, ${check}.`),
    conflicts: against.length > 0 ? against : [`Nothing speaks against ${rate}.`],
    flags: [`candidate ${candidate}`, `now ${rate}`],
    candidate: String(candidate),
    standing: broken > 0 ? `${candidate} breaks ${broken === 1 ? 'one rule' : `${broken} rules`}.`
      : `${candidate} works: the rate may move ${headroomAt(shape, candidate)} ppm either way before a rule breaks.`,
  };
}

function dueChanges(shape: Shape, before: number, after: number): string[][] {
  const smallest = (rate: number) => {
    const { margin, name } = figuresAt(shape, rate).reduce((a, b) => (b.margin < a.margin ? b : a));
    return `${margin} (${name})`;
  };
  const airband = (rate: number) => {
    const { check, margin } = figuresAt(shape, rate)[0]!;
    return `${check}, margin ${margin}`;
  };
  return [
    ['', `Now ${before}`, `At ${after}`],
    ['Conflicts', String(objectionsTo(before).length), '0'],
    ['Headroom ppm', headroomAt(shape, before), headroomAt(shape, after)],
    ['Smallest margin', smallest(before), smallest(after)],
    ['Airband', airband(before), airband(after)],
  ];
}

const textsIn = (rows: Locator): Promise<string[][]> => rows.evaluateAll((all) => all.map((row) => [...row.children].map((cell) => cell.textContent ?? '')));
