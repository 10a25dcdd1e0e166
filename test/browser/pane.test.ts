// The pane in the built workbench, in a real browser: the whole job, by pointer and by keyboard, on plans of different shapes.

import { readFileSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { readWorkbook, writeWorkbook } from '../../src/host/file';
import type { CellValue, Workbook } from '../../src/host/port';
import { type Site, type Watched, launchBrowser, outputFile, serveSite, watch } from '../support/browser';
import { call } from '../support/built-functions';
import { type Given, planOf, valuesOf } from '../support/workbook';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

let browser: Browser;
let site: Site;
/** What most tests share: a browser that has loaded the site before reads it from its cache. */
let shared: BrowserContext;
let context: BrowserContext;
let page: Page;
let watched: Watched;

const WIDE = { viewport: { width: 1400, height: 900 } };

beforeAll(async () => {
  [browser, site] = await Promise.all([launchBrowser(), serveSite()]);
  shared = await browser.newContext(WIDE);
});
afterAll(async () => {
  await browser.close();
  await site.close();
});
afterEach(async () => {
  await (context === shared ? page.close() : context.close());
  expect(watched).toEqual({ console: [], strayRequests: [] });
});

/** Opens the workbench, on a workbook where one is given. */
async function open(workbook: Workbook | null, options?: Parameters<Browser['newContext']>[0]): Promise<void> {
  context = options ? await browser.newContext({ ...WIDE, ...options }) : shared;
  page = await context.newPage();
  watched = watch(page, site.address);
  await page.goto(`${site.address}/workbench.html`);
  await expectText('#status', /^A demo plan/);
  if (!workbook) return;
  await page.locator('#chosen-file').setInputFiles({ name: 'plan.xlsx', mimeType: 'application/octet-stream', buffer: Buffer.from(await writeWorkbook(workbook)) });
  await expectText('#status', /^Opened plan\.xlsx/);
}

const expectText = (selector: string, text: RegExp | string) => expect.poll(() => page.locator(selector).innerText(), { timeout: 40_000 }).toMatch(text);
const expectPane = (text: RegExp | string) => expectText('#pane', text);
const tab = (name: string) => page.locator('#pane').getByRole('tab', { name, exact: true });
const button = (name: string) => page.locator('#pane').getByRole('button', { name, exact: true });

async function goTo(cell: string): Promise<void> {
  const nameBox = page.getByLabel('Selected cell');
  await nameBox.fill(cell);
  await nameBox.press('Enter');
}

async function enter(cell: string, text: string): Promise<void> {
  await goTo(cell);
  await page.keyboard.type(text);
  await page.keyboard.press('Enter');
}

async function saved(): Promise<Workbook> {
  const [download] = await Promise.all([page.waitForEvent('download'), page.locator('#save').click()]);
  return (await readWorkbook(new Uint8Array(await readFile(await download.path())))).workbook;
}

const cellsOf = (workbook: Workbook): CellValue[][] => valuesOf(workbook.sheets[0]!);

// Plans of five shapes. All hold the same bands, so that the same results are due.

const LOW = [118, 161.9625, 122];
const HIGH = [137, 162.0375, 124];
const RATE = 245.76;
const NAMES = ['Airband', 'AIS', 'Beacon'];

interface Shape {
  rows: Given[][];
  names: Record<string, string>;
  /** The first formula, and the cell that it stands in: row and column from 0. */
  formula: string;
  at: [row: number, column: number];
  rateCell: string;
}

const edges = (row: Given[] = []): Given[][] => LOW.map((low, i) => [...row, NAMES[i]!, low, HIGH[i]!]);
const around = (): Given[][] => LOW.map((low, i) => [NAMES[i]!, (low + HIGH[i]!) / 2, HIGH[i]! - low]);

const SHAPES: [what: string, Shape][] = [
  ['low and high', {
    rows: [['Sample rate', RATE], [], ['Name', 'Low', 'High'], ...edges()],
    names: { Fold_Name: 'Plan!$A$4:$A$6', Fold_Low: 'Plan!$B$4:$B$6', Fold_High: 'Plan!$C$4:$C$6', Fold_Rate: 'Plan!$B$1' },
    formula: '=FOLD.LOW(B4,C4,Fold_Rate)', at: [3, 3], rateCell: 'B1',
  }],
  ['centre and width', {
    rows: [['fs', RATE, 'MHz'], [], ['Channel', 'Centre (MHz)', 'BW (MHz)'], ...around()],
    names: { Fold_Name: 'Plan!$A$4:$A$6', Fold_Centre: 'Plan!$B$4:$B$6', Fold_Width: 'Plan!$C$4:$C$6', Fold_Rate: 'Plan!$B$1' },
    formula: '=FOLD.LOW(B4-C4/2,B4+C4/2,Fold_Rate)', at: [3, 3], rateCell: 'B1',
  }],
  ['units in the headers', {
    rows: [['Signal', 'f_low / MHz', 'f_high / MHz'], ...edges(), [], ['Sampling rate (MS/s)', RATE]],
    names: { Fold_Name: 'Plan!$A$2:$A$4', Fold_Low: 'Plan!$B$2:$B$4', Fold_High: 'Plan!$C$2:$C$4', Fold_Rate: 'Plan!$B$6' },
    formula: '=FOLD.LOW(B2,C2,Fold_Rate)', at: [1, 3], rateCell: 'B6',
  }],
  ['the columns of a table, with others among them', {
    rows: [['No.', 'Service', 'From', null, 'To', 'Use', 'Remark'], ...edges(['x']).map(([, name, low, high], i) => [i + 1, name!, low!, null, high!, 'wanted', 'checked']), [], ['Rate', RATE]],
    names: { Fold_Name: 'Plan!$B$2:$B$4', Fold_Low: 'Plan!$C$2:$C$4', Fold_High: 'Plan!$E$2:$E$4', Fold_Role: 'Plan!$F$2:$F$4', Fold_Rate: 'Plan!$B$6' },
    formula: '=FOLD.LOW(C2,E2,Fold_Rate)', at: [1, 7], rateCell: 'B6',
  }],
  ['a title above, from C7 on', {
    rows: [[], [null, null, 'Receiver plan'], [null, null, 'Sample rate', RATE], [], [], [], [null, null, 'Name', 'Lower edge', 'Upper edge'], ...edges([null, null])],
    names: { Fold_Name: 'Plan!$C$8:$C$10', Fold_Low: 'Plan!$D$8:$D$10', Fold_High: 'Plan!$E$8:$E$10', Fold_Rate: 'Plan!$D$3' },
    formula: '=FOLD.LOW(D8,E8,Fold_Rate)', at: [7, 5], rateCell: 'D3',
  }],
];

describe('the pane sets up a plan by its headers, inserts columns, follows the rate, and takes it back', () => {
  it.each(SHAPES)('with %s', async (_what, { rows, names, formula, at: [row, column], rateCell }) => {
    await open(planOf(rows));
    const before = await saved();
    expect(await tab('Plan').getAttribute('aria-selected')).toBe('true');
    await expectPane(/Found on the sheet Plan, 3 rows/);
    await button('Use this plan').click();
    await expectPane('The plan is stored in the workbook.');
    expect((await saved()).names).toEqual(names);

    await tab('Columns').click();
    await button('Insert 6 columns').click();
    await expectPane(/Inserted 6 columns at/);
    const results = async () => {
      const { sheets: [sheet] } = await saved();
      return LOW.map((_, i) => Array.from({ length: 6 }, (_c, c) => sheet!.cells[row + i]?.[column + c]?.value ?? null));
    };
    const due = (rate: number) => LOW.map((low, i) => {
      const high = HIGH[i]!;
      return [call('LOW', low, high, rate), call('HIGH', low, high, rate), call('ZONE', (low + high) / 2, rate), call('INVERTED', (low + high) / 2, rate), call('MARGIN', low, high, rate), call('CHECK', low, high, rate)].map(([line]) => line![0]);
    });
    expect((await saved()).sheets[0]!.cells[row]![column]!.formula).toBe(formula);
    expect(await results()).toEqual(due(RATE));

    await enter(rateCell, '500');
    await expectPane(/500 (works|does not work)/);
    expect(await results()).toEqual(due(500));

    await goTo(rateCell);
    for (let step = 0; step < 3; step++) await page.keyboard.press('Control+Z');
    await expectPane(/Found on the sheet Plan|No plan is set up|need a plan/);
    const after = await saved();
    expect([cellsOf(after), after.names]).toEqual([cellsOf(before), before.names]);
  });
});

describe('the pane by keyboard alone', () => {
  /** Goes on with the tab key until something of this name has the focus. */
  async function tabTo(name: string): Promise<void> {
    const focused = () => page.evaluate(() => {
      const active = document.activeElement;
      return active?.getAttribute('aria-label') ?? (active instanceof HTMLInputElement ? active.labels?.[0]?.textContent : active?.textContent) ?? '';
    });
    const passed: string[] = [];
    for (let i = 0; i < 60; i++) {
      if ((await focused()) === name) return;
      passed.push(await focused());
      await page.keyboard.press('Tab');
    }
    throw new Error(`The tab key never reaches ${name}, only ${passed.join(' | ')}.`);
  }

  /** Goes from part to part of the workbench. */
  async function goTo(part: 'open' | 'sheet' | 'pane'): Promise<void> {
    for (let i = 0; i < 4; i++) {
      await page.keyboard.press('F6');
      if (await page.evaluate((id) => document.getElementById(id)!.contains(document.activeElement), part)) return;
    }
    throw new Error(`F6 never reaches the part ${part}.`);
  }

  it('does the whole job: opens a workbook, sets it up, inserts, changes the rate, takes it back, saves', async () => {
    const [, { rows, names }] = SHAPES[0]!;
    await open(null);
    const choosing = page.waitForEvent('filechooser'); // the browser hears of it while the focus is on its way
    await goTo('open');
    await page.keyboard.press('Enter');
    const chooser = await choosing;
    await chooser.setFiles({ name: 'plan.xlsx', mimeType: 'application/octet-stream', buffer: Buffer.from(await writeWorkbook(planOf(rows))) });
    await expectText('#status', /^Opened plan\.xlsx/);
    await expectPane(/Found on the sheet Plan, 3 rows/);

    await goTo('pane');
    await tabTo('Use this plan');
    await page.keyboard.press('Enter');
    await expectPane('The plan is stored in the workbook.');

    await goTo('pane');
    await tabTo('Plan');
    await page.keyboard.press('ArrowRight');
    await expect.poll(() => tab('Columns').getAttribute('aria-selected')).toBe('true');
    await tabTo('Check clear, tight, crosses or too wide');
    await page.keyboard.press('Space');
    await tabTo('Insert 5 columns');
    await page.keyboard.press('Enter');
    await expectPane(/Inserted 5 columns at D3:H6/);
    await tabTo('Undo');
    await page.keyboard.press('Enter');
    await expectPane('Undone: the workbook is as it was before.');
    await tabTo('Insert 5 columns');
    await page.keyboard.press('Enter');
    await expectPane(/Inserted 5 columns at D3:H6/);

    await goTo('sheet'); // which stands on A1
    await page.keyboard.press('ArrowRight');
    await page.keyboard.type('500');
    await page.keyboard.press('Enter');
    await expectPane(/500 (works|does not work)/);
    const [download] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Control+s')]);
    const { workbook } = await readWorkbook(new Uint8Array(await readFile(await download.path())));
    expect(workbook.names).toEqual(names);
    expect(workbook.sheets[0]!.cells[3]![5]!.value).toBe(call('ZONE', 127.5, 500)[0]![0]);
  });
});

describe('the pane for everyone', () => {
  const THEMES = [
    ['light', {}],
    ['dark', { colorScheme: 'dark' }],
    ['forced colours', { forcedColors: 'active' }],
    ['dark forced colours', { forcedColors: 'active', colorScheme: 'dark' }],
  ] as const;
  const SECTIONS = ['Plan', 'Columns', 'Pictures', 'Hand over'];

  interface Finding { id: string; nodes: { target: string[]; failureSummary: string }[] }
  const findings = async () => {
    await page.evaluate(axe);
    return page.evaluate(async () => {
      const { violations } = await (window as unknown as { axe: { run(selector: string): Promise<{ violations: Finding[] }> } }).axe.run('#pane');
      return violations.map(({ id, nodes }) => ({ id, nodes: nodes.map(({ target, failureSummary }) => `${target.join(' ')}: ${failureSummary}`) }));
    });
  };

  it.each(THEMES)('leaves a checker of accessibility nothing to find, on any section, in %s', async (_theme, options) => {
    await open(null, options);
    for (const section of SECTIONS) {
      await tab(section).click();
      await expect.poll(() => page.locator('#pane [role=tabpanel]:visible').innerText()).not.toBe('');
      expect([section, await findings()]).toEqual([section, []]);
    }
  });

  it('leaves it nothing to find where a plan is still to be set up, and where something is wrong', async () => {
    const [, { rows }] = SHAPES[1]!;
    await open(planOf(rows));
    await expectPane(/Found on the sheet Plan/);
    expect(await findings()).toEqual([]);
    await page.getByLabel('Centres', { exact: true }).fill('nowhere');
    await button('Use this plan').click();
    await expectPane('“nowhere” is no address of cells');
    expect(await findings()).toEqual([]);
  });

  it.each([
    ['wide', {}],
    ['narrow', { viewport: { width: 320, height: 800 } }],
    ['dark', { colorScheme: 'dark' }],
    ['forced-colours', { forcedColors: 'active' }],
  ] as const)('has its picture taken: %s', async (name, options) => {
    await open(null, options);
    for (const section of SECTIONS) {
      await tab(section).click();
      await expect.poll(() => page.locator('#pane [role=tabpanel]:visible').innerText()).not.toBe('');
      await page.screenshot({ path: outputFile(`pane-${section.toLowerCase()}-${name}.png`), fullPage: true });
      expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true);
      expect(await page.evaluate(() => document.getElementById('pane')!.scrollWidth - document.getElementById('pane')!.clientWidth)).toBe(0);
    }
  });

  it('shows markup, formulas as text, emoji and writing from right to left as text', async () => {
    const hostile = ['<img src=x onerror="window.hit=1">', '=1+1', '📡 <script>window.hit=1</script>', 'שידור ימי'];
    const header = '<b onclick=alert(1)>Low</b>';
    await open({
      ...planOf([['Sample rate', 100], ['<i>Name</i>', header, 'High'], ...hostile.map((name, i) => [{ value: name }, 10 + i * 7, 12 + i * 7])],
        { Fold_Name: 'Plan!$A$3:$A$6', Fold_Low: 'Plan!$B$3:$B$6', Fold_High: 'Plan!$C$3:$C$6', Fold_Rate: 'Plan!$B$1' }),
    });
    await tab('Plan').click();
    await expectPane(/headed “<b onclick=alert\(1\)>Low<\/b>” in B2/);
    for (const section of ['Columns', 'Pictures']) {
      await tab(section).click();
      const content = () => page.locator('#pane [role=tabpanel]:visible').evaluate((panel) => panel.textContent);
      for (const name of hostile) await expect.poll(content).toContain(name);
    }
    expect(await page.evaluate(() => [(window as unknown as { hit?: number }).hit, document.querySelectorAll('#pane img, #pane script, #pane b, #pane i').length])).toEqual([undefined, 0]);
    await tab('Columns').click();
    await button('Insert 6 columns').click();
    await expectPane(/Inserted 6 columns at/);
    expect((await saved()).sheets[0]!.cells[3]![0]!.value).toBe('=1+1');
  });
});
