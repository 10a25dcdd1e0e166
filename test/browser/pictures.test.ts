// The section Pictures in the built workbench, driven as a user drives it.

import { readFile } from 'node:fs/promises';
import type { Browser, BrowserContext, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Workbook } from '../../src/host/port';
import { type Site, type Watched, launchBrowser, outputFile, serveSite, watch } from '../support/browser';
import { openWorkbook, saved, startWorkbench } from '../support/workbench-page';

let browser: Browser;
let site: Site;
let context: BrowserContext;
let page: Page;
let watched: Watched;
/** The workbook that the workbench starts with: opened again it is another pane, and quicker there than another workbench. */
let demo: Workbook;

beforeAll(async () => {
  [browser, site] = await Promise.all([launchBrowser(), serveSite()]);
  context = await browser.newContext({ permissions: ['clipboard-read', 'clipboard-write'] });
  page = await context.newPage();
  watched = watch(page, site.address);
  await startWorkbench(page, site.address);
  demo = await saved(page);
});
afterAll(async () => {
  await browser.close();
  await site.close();
});

beforeEach(async () => {
  await page.setViewportSize({ width: 1500, height: 2400 });
  await page.emulateMedia({ colorScheme: 'light', forcedColors: 'none' });
  await openWorkbook(page, demo);
  await page.getByRole('tab', { name: 'Pictures' }).click();
  await settled('409.6');
});
afterEach(() => {
  expect(watched).toEqual({ console: [], strayRequests: [] });
});

// What a user does

const fill = async (label: string, text: string) => {
  await page.getByLabel(label, { exact: true }).fill(text);
  await page.getByLabel(label, { exact: true }).press('Enter');
};

const press = (name: string) => page.locator('.pictures').getByRole('button', { name, exact: true }).click();
const bar = (row: number) => page.locator(`.ladder .band[data-row="${row}"] .bar`).first();

// What a user sees

const expectText = (selector: string, text: RegExp | string) => expect.poll(() => page.locator(selector).textContent(), { timeout: 40_000 }).toMatch(text);
/** Waits until what is said of the candidate is computed. */
const settled = (rate: string) => expect.poll(() => page.locator('.standing').textContent(), { timeout: 40_000 }).toMatch(new RegExp(`^${rate.replace('.', '\\.')} (works|breaks)`));
const slider = () => page.getByRole('slider', { name: 'Candidate rate' });
const candidate = async () => Number(await slider().getAttribute('aria-valuenow'));

describe('the zone ladder in the workbench', () => {
  it('selects the row of a band that is clicked, or stepped to and entered, and marks the row that is selected', async () => {
    await bar(2).click();
    await expectText('#cell', 'A10 Airband voice');
    await expect.poll(() => page.locator('.band.selected').getAttribute('data-row')).toBe('2');
    await page.locator('.band.selected').focus();
    await page.keyboard.press('ArrowRight');
    await page.keyboard.press('Enter');
    await expectText('#cell', 'A11 Marine channel 16');
    await expect.poll(() => page.locator('.band.selected').getAttribute('data-row')).toBe('3');
    expect(await page.locator('.band.selected .picked').count()).toBeGreaterThan(1);
    await page.locator('.conflicts button').last().click();
    await expectText('#cell', 'A19 GPS L2C');
  });

  it('zooms by wheel, keys and buttons, goes along the axis, and shows one role', async () => {
    const inView = () => page.locator('.ladder .band[data-row]').count();
    expect(await inView()).toBe(13);
    await bar(4).hover();
    await page.keyboard.down('Control');
    for (let i = 0; i < 6; i++) await page.mouse.wheel(0, -100);
    await page.keyboard.up('Control');
    await expectText('.axis-words', /^Axis 15\d/);
    expect(await inView()).toBeLessThan(6);
    await page.locator('.ladder .band[tabindex="0"]').focus();
    await page.keyboard.press('0');
    await expectText('.axis-words', /^$/);
    await page.keyboard.press('+');
    await page.keyboard.press('Shift+ArrowRight');
    await expectText('.axis-words', /^Axis 71\.68 to 194\.56$/);
    await page.locator('.panel').first().getByRole('button', { name: 'Show all' }).click();
    await page.getByLabel('Show', { exact: true }).selectOption('unwanted');
    expect(await inView()).toBe(5);
  });
});

describe('the rate ruler in the workbench', () => {
  it('is worked by keys alone: range by range, step by step, on the grid of the clock', async () => {
    await slider().focus();
    await page.keyboard.press('PageUp');
    await expect.poll(candidate).toBe(574);
    await settled('574');
    await page.keyboard.press('ArrowRight');
    expect(await candidate()).toBe(574.1);
    await fill('Step', '0.64');
    await expect.poll(candidate).toBe(574.08);
    await slider().focus();
    await page.keyboard.press('ArrowLeft');
    expect(await candidate()).toBe(573.44);
    await page.keyboard.press('PageUp');
    await expect.poll(candidate).toBe(578.56);
    await settled('578.56');
    expect(await slider().getAttribute('aria-valuetext')).toMatch(/^578\.56 works/);
    await page.keyboard.press('Home');
    expect(Math.abs(await candidate() / 0.64 - Math.round(await candidate() / 0.64))).toBeLessThan(1e-9);
    await page.getByRole('button', { name: 'Next usable above' }).focus();
    await page.keyboard.press('Enter');
    await expect.poll(candidate).toBe(574.08);
    await page.getByRole('button', { name: 'Use this rate' }).focus();
    await page.keyboard.press('Enter');
    await expectText('.ladder .rate', 'rate 574.08');
    await page.getByRole('button', { name: 'Undo: back to 409.6' }).focus();
    await page.keyboard.press('Enter');
    await expectText('.ladder .rate', 'rate 409.6');
  });

  it('says what a field accepts, in one sentence beside it, and keeps what was', async () => {
    for (const [label, typed, sentence] of [
      ['Candidate', 'fast', 'Candidate must be a number above 0; got "fast".'],
      ['Step', '-1', 'Step must be a number above 0, or blank for any rate; got "-1".'],
      ['Harmonics up to', '2.5', 'Harmonics up to must be a whole number from 1 to 20; got "2.5".'],
      ['Cores', '99', 'Cores must be a whole number from 1 to 64; got "99".'],
      ['From', '0', 'From must be a number above 0; got "0".'],
    ] as const) {
      await fill(label, typed);
      expect(await page.locator('.number-field .fault').filter({ hasText: sentence }).count(), sentence).toBe(1);
      await page.getByLabel(label, { exact: true }).press('Escape');
    }
    expect(await candidate()).toBe(409.6);
  });

  it('shows a lane for each kind of rule, and what harmonics and cores add', async () => {
    const lanes = () => page.locator('.ruler text.lane').allTextContents();
    expect(await lanes()).toEqual(['usable', expect.stringMatching(/^zone edges \(\d+\)$/), expect.stringMatching(/^band against band \(\d+\)$/)]);
    await fill('Harmonics up to', '2');
    await fill('Cores', '2');
    await expect.poll(lanes).toEqual(['usable', ...['zone edges', 'band against band', 'harmonics', 'interleaving images', 'offset tones'].map((kind) => expect.stringMatching(new RegExp(`^${kind} `)))]);
  });

  it('tells exact figures under the pointer, and lists usable ranges as a table', async () => {
    await press('Next usable above');
    await settled('574');
    const usable = (await page.locator('.ruler .usable').first().boundingBox())!;
    await page.mouse.move(usable.x + 4, usable.y + 4);
    await expectText('.stage + .readout', /lies in the usable range 571\.165756648467 to 577\.034959300813\.$/);
    await page.mouse.move(usable.x - 10, usable.y + 4);
    await expectText('.stage + .readout', /is forbidden by .*Airband voice against/);
    await page.getByText('The 3 usable ranges in view').click();
    expect(await page.locator('[data-keep="ranges"] tbody tr').first().locator('td').allTextContents()).toEqual(['571.165756648467', '577.034959300813', '5.869202652346', '574.10035797464', '5110']);
  });
});

describe('pictures that leave the pane', () => {
  it('are saved as SVG of their own: colours written out, names as text, described', async () => {
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('group', { name: 'Take out the zone ladder' }).getByRole('button', { name: 'Save as SVG' }).click()]);
    expect(download.suggestedFilename()).toBe('Zone ladder at 409.6.svg');
    const text = await readFile(await download.path(), 'utf8');
    expect(text).toContain('<desc id="ladder-description">Zone ladder of 13 bands at a rate of 409.6. 409.6 does not work.');
    expect(text).not.toMatch(/var\(|class=|style=|tabindex|http:\/\/(?!www\.w3\.org)/);
    // On its own, in another page, it looks as it does in the pane: the unwanted bands are hatched in their colour.
    const alone = await context.newPage();
    await alone.setContent(`<body style="margin:0">${text}</body>`);
    expect(await alone.evaluate(() => getComputedStyle(document.querySelector('#ladder-unwanted path')!).stroke)).toBe('rgb(128, 105, 74)');
    await alone.screenshot({ path: outputFile('ladder-taken-out.png') });
    await alone.close();
  });

  it('are copied as PNG', async () => {
    await page.getByRole('group', { name: 'Take out the rate ruler' }).getByRole('button', { name: 'Copy as PNG' }).click();
    await expectText('.news', 'The picture is on the clipboard.');
    const size = await page.evaluate(async () => {
      const [item] = await navigator.clipboard.read();
      const image = await createImageBitmap(await item!.getType('image/png'));
      return [image.width, image.height];
    });
    expect(size[0]).toBe(1520);
    expect(size[1]).toBeGreaterThan(400);
  });

  it('cannot be inserted where the sheet has no room for pictures, which is said', async () => {
    const insert = page.getByRole('group', { name: 'Take out the zone ladder' }).getByRole('button', { name: 'Insert in the sheet' });
    expect(await insert.isDisabled()).toBe(true);
    expect(await page.locator(`#${await insert.getAttribute('aria-describedby')}`).textContent()).toMatch(/\.$/);
  });
});

describe('the pictures for everyone', () => {
  it('are readable from 320 pixels to wide, light, dark and in forced colours', async () => {
    await press('Next usable above');
    await settled('574');
    await bar(2).click();
    await expectText('#cell', 'A10');
    const shoot = async (name: string) => page.locator('.pictures').screenshot({ path: outputFile(`pictures-${name}.png`) });
    await shoot('wide');
    // The hatch of unwanted bands is drawn in their colour, on the ground of the page.
    const hatch = () => page.evaluate(() => ['path', 'rect'].map((part) => {
      const { stroke, fill } = getComputedStyle(document.querySelector(`.ladder #ladder-unwanted ${part}`)!);
      return part === 'path' ? stroke : fill;
    }));
    expect(await hatch()).toEqual(['rgb(128, 105, 74)', 'rgb(253, 253, 252)']);
    await page.emulateMedia({ colorScheme: 'dark' });
    await expect.poll(hatch).toEqual(['rgb(203, 177, 137)', 'rgb(28, 32, 36)']);
    await shoot('dark');
    await page.emulateMedia({ colorScheme: 'light', forcedColors: 'active' });
    await shoot('forced-colours');
    await page.emulateMedia({ forcedColors: 'none' });
    await page.setViewportSize({ width: 320, height: 4000 });
    await expect.poll(async () => Number(await page.locator('.ladder').getAttribute('width'))).toBeLessThan(321);
    expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBe(320);
    await shoot('320');
  });

  it('draw texts no wider than the layout reckons with', async () => {
    const tooWide = await page.evaluate(() => [...document.querySelectorAll<SVGTextElement>('.ladder text, .ruler text')].filter((text) => {
      const { x, width } = text.getBBox();
      return x < 0 || x + width > text.ownerSVGElement!.width.baseVal.value + 0.5;
    }).map((text) => text.textContent));
    expect(tooWide).toEqual([]);
  });
});
