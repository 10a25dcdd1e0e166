// The pane in the built workbench, in a real browser: by keyboard alone, in every look, with whatever text cells hold.

import { readFileSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { readWorkbook, writeWorkbook } from '../../src/host/file';
import type { Workbook } from '../../src/host/port';
import { type Site, type Watched, launchBrowser, outputFile, serveSite, watch } from '../support/browser';
import { call } from '../support/built-functions';
import { SHAPES } from '../support/plan-shapes';
import { openWorkbook, saved, startWorkbench } from '../support/workbench-page';
import { planOf } from '../support/workbook';

const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

let browser: Browser;
let site: Site;
/** One page for all that can do with another workbook in it: the workbench is slow to start. */
let page: Page;
let watched: Watched;
/** The workbook that the workbench starts with. */
let demo: Workbook;

beforeAll(async () => {
  [browser, site] = await Promise.all([launchBrowser(), serveSite()]);
  await open(null);
  demo = await saved(page);
});
afterAll(async () => {
  await browser.close();
  await site.close();
});
afterEach(() => {
  expect(watched).toEqual({ console: [], strayRequests: [] });
});

/** Opens a workbook, or the workbench anew. */
async function open(workbook: Workbook | null): Promise<void> {
  if (workbook) {
    await openWorkbook(page, workbook);
  } else {
    await page?.close();
    page = await browser.newPage();
    watched = watch(page, site.address);
    await startWorkbench(page, site.address);
  }
  await look({});
}

interface Look {
  width?: number;
  colorScheme?: 'light' | 'dark';
  forcedColors?: 'active' | 'none';
}

async function look({ width = 1400, colorScheme = 'light', forcedColors = 'none' }: Look): Promise<void> {
  await page.setViewportSize({ width, height: 900 });
  await page.emulateMedia({ colorScheme, forcedColors });
}

const expectText = (selector: string, text: RegExp | string) => expect.poll(() => page.locator(selector).innerText(), { timeout: 40_000 }).toMatch(text);
const expectPane = (text: RegExp | string) => expectText('#pane', text);
const tab = (name: string) => page.locator('#pane').getByRole('tab', { name, exact: true });
const button = (name: string) => page.locator('#pane').getByRole('button', { name, exact: true });

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
    await expectPane('Stored the plan in the workbook.');

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
  const LOOKS: [name: string, look: Look][] = [
    ['wide', {}],
    ['narrow', { width: 320 }],
    ['dark', { colorScheme: 'dark' }],
    ['forced-colours', { forcedColors: 'active' }],
    ['dark-forced-colours', { colorScheme: 'dark', forcedColors: 'active' }],
  ];
  const SECTIONS = ['Plan', 'Columns', 'Pictures', 'Hand over'];

  interface Finding { id: string; nodes: { target: string[]; failureSummary: string }[] }
  const findings = async () => {
    await page.evaluate(axe);
    return page.evaluate(async () => {
      const { violations } = await (window as unknown as { axe: { run(selector: string): Promise<{ violations: Finding[] }> } }).axe.run('#pane');
      return violations.map(({ id, nodes }) => ({ id, nodes: nodes.map(({ target, failureSummary }) => `${target.join(' ')}: ${failureSummary}`) }));
    });
  };

  it.each(LOOKS)('leaves a checker of accessibility nothing to find on any section, has room for it, and has its picture taken: %s', async (name, wanted) => {
    await open(demo);
    await look(wanted);
    for (const section of SECTIONS) {
      await tab(section).click();
      await expect.poll(() => page.locator('#pane [role=tabpanel]:visible').innerText()).not.toBe('');
      expect([section, await findings()]).toEqual([section, []]);
      await page.screenshot({ path: outputFile(`pane-${section.toLowerCase()}-${name}.png`), fullPage: true });
      expect(await page.evaluate(() => document.documentElement.scrollWidth <= window.innerWidth)).toBe(true);
      expect(await page.evaluate(() => document.getElementById('pane')!.scrollWidth - document.getElementById('pane')!.clientWidth)).toBe(0);
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
    expect((await saved(page)).sheets[0]!.cells[3]![0]!.value).toBe('=1+1');
  });
});
