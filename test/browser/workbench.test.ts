// The built workbench page in a real browser, driven as a user drives it: by keyboard, by files, by what stands on the page.

import { readFile } from 'node:fs/promises';
import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { coastPlan } from '../../src/demo/coast';
import { readWorkbook, writeWorkbook } from '../../src/host/file';
import type { CellValue, Sheet, Workbook } from '../../src/host/port';
import { calculate } from '../../src/host/sheet/calculate';
import { type Site, type Watched, launchBrowser, outputFile, serveSite, watch } from '../support/browser';
import { built, call } from '../support/built-functions';
import { enter as enterInto, goTo as goToCell, openWorkbook, startWorkbench } from '../support/workbench-page';
import { planOf, sheetOf } from '../support/workbook';

let browser: Browser;
let site: Site;
let page: Page;
let watched: Watched;

/** Starts the workbench and waits until the demo plan is computed. */
async function start(): Promise<void> {
  const context = await browser.newContext({ viewport: { width: 1400, height: 850 } }); // which outlives an attempt to leave the page
  page = await context.newPage();
  watched = watch(page, site.address);
  await startWorkbench(page, site.address);
}

beforeAll(async () => {
  [browser, site] = await Promise.all([launchBrowser(), serveSite()]);
  await start();
});
afterAll(async () => {
  await browser.close();
  await site.close();
});
afterEach(() => expect(watched).toEqual({ console: [], strayRequests: [] }));

// What a user does

const goTo = (cell: string) => goToCell(page, cell);
const enter = (cell: string, text: string) => enterInto(page, cell, text);

/** Saves, and reads the file that came out. */
async function saved(): Promise<{ name: string; bytes: Uint8Array; workbook: Workbook }> {
  const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'Save', exact: true }).click()]);
  await expectText('#status', /^Saved /);
  const bytes = new Uint8Array(await readFile(await download.path()));
  return { name: download.suggestedFilename(), bytes, workbook: (await readWorkbook(bytes)).workbook };
}

const asFile = (name: string, bytes: Uint8Array | string) => ({ name, mimeType: 'application/octet-stream', buffer: Buffer.from(bytes) });

const choose = (name: string, bytes: Uint8Array | string) => page.locator('#chosen-file').setInputFiles(asFile(name, bytes));

// What a user sees

const expectText = (selector: string, text: RegExp | string) => expect.poll(() => page.locator(selector).textContent(), { timeout: 40_000 }).toMatch(text);

const valueAt = (sheet: Sheet, address: string): CellValue => {
  const [, letter, row] = /^([A-Z])(\d+)$/.exec(address)!;
  return sheet.cells[Number(row) - 1]?.[letter!.charCodeAt(0) - 65]?.value ?? null;
};

const columnOf = (sheet: Sheet, letter: string): CellValue[] => Array.from({ length: 13 }, (_, i) => valueAt(sheet, `${letter}${8 + i}`));

/** What the worksheet functions say of the plan in a sheet. */
function foldedByFunctions(sheet: Sheet) {
  const [low, high] = [columnOf(sheet, 'B'), columnOf(sheet, 'C')] as [number[], number[]];
  const [rate, guard, ppm] = ['B3', 'B4', 'B5'].map((address) => valueAt(sheet, address)) as [number, number, number];
  const centres = low.map((edge, i) => (edge + high[i]!) / 2);
  const column = (rows: unknown[][]) => rows.map(([cell]) => cell);
  return {
    E: column(call('LOW', low, high, rate)), F: column(call('HIGH', low, high, rate)), G: column(call('ZONE', centres, rate)), H: column(call('INVERTED', centres, rate)),
    I: column(call('MARGIN', low, high, rate, guard, ppm)), J: column(call('CHECK', low, high, rate, guard, ppm)),
  };
}

const foldedInSheet = (sheet: Sheet) => Object.fromEntries(['E', 'F', 'G', 'H', 'I', 'J'].map((letter) => [letter, columnOf(sheet, letter)]));

describe('the workbench', () => {
  it('opens with a plan that is computed, and a picture of it', async () => {
    const { name, workbook } = await saved();
    expect(name).toBe('Gannet Ness.xlsx');
    const [plan, choice, rates] = workbook.sheets as [Sheet, Sheet, Sheet];
    expect(foldedInSheet(plan)).toEqual(foldedByFunctions(plan));
    expect(valueAt(rates, 'A5')).toBe('Zone');
    expect([valueAt(choice, 'A8'), valueAt(choice, 'F8'), valueAt(choice, 'L8')]).toEqual(['Distress beacons', 571.165756648467, 573.44]);
    expect(valueAt(rates, 'G6')).toBe(3.55);
    await expectText('#pane', '409.6');
    await page.screenshot({ path: outputFile('workbench-wide.png') });
  });
});

describe('a plan in the workbench', () => {
  beforeEach(() => openWorkbook(page, coastPlan()));

  it('follows the rate cell: every FOLD column, the lists on the other sheets, and the picture', async () => {
    await enter('B3', '575');
    await expectText('#pane', '575');
    const { workbook } = await saved();
    const [plan, choice, rates] = workbook.sheets as [Sheet, Sheet, Sheet];
    expect(valueAt(plan, 'B3')).toBe(575);
    expect(foldedInSheet(plan)).toEqual(foldedByFunctions(plan));
    expect(valueAt(choice, 'B8')).toBe('clear');
    expect(valueAt(rates, 'G7')).toBe(575 - 3.55);
  });

  it('keeps the error of a text frequency in its row, and tells the sentence behind it', async () => {
    await enter('B10', 'fast');
    await goTo('E10');
    await expectText('#cell-error', 'E10 #VALUE! low must be a number; got "fast".');
    await goTo('E11');
    await expectText('#cell-error', /^$/);
    const [plan] = (await saved()).workbook.sheets;
    const failed = Array.from({ length: 13 }, (_, i) => i === 2);
    for (const [letter, values] of Object.entries(foldedInSheet(plan!))) {
      expect(values.map((value) => typeof value === 'object' && value !== null), letter).toEqual(failed);
    }
  });

  it('suggests our functions with our descriptions while a formula is typed', async () => {
    await goTo('L8');
    await page.keyboard.type('=FOLD.Z', { delay: 30 });
    await page.getByText(built.metadata.find(({ id }) => id === 'ZONE')!.description!).waitFor();
  });

  it('takes a name that is spelled like a function, with Enter right after it', async () => {
    await goTo('L8');
    await page.keyboard.type('=B8*Rate', { delay: 30 });
    await page.waitForTimeout(600); // the sheet suggests what it has after a third of a second
    await page.keyboard.press('Enter');
    await goTo('L8');
    await expectText('#cell', 'L8 4096');
    const [plan] = (await saved()).workbook.sheets;
    expect(plan!.cells[7]![11]).toMatchObject({ value: 4096, formula: '=B8*Rate' });
  });

  it('undoes and redoes', async () => {
    await enter('B3', '500');
    await expectText('#pane', '500');
    await page.keyboard.press('Control+Z');
    await expectText('#pane', '409.6');
    await page.keyboard.press('Control+Y');
    await expectText('#pane', '500');
  });
});

describe('files in the workbench', () => {
  let name: string;
  beforeEach(async () => {
    name = await openWorkbook(page, coastPlan());
  });

  const styled: Workbook = {
    ...planOf([
      [{ value: 'Rate', style: { bold: true, fill: '#dfe9ee' } }, { value: 245.76, style: { numberFormat: '0.000' } }, '007', '=1+1'],
      [70, { value: null, formula: '=FOLD.FREQ(A2:A4,Rate)', style: { horizontal: 'left' } }, { value: null, formula: '=SUM(B2:B4)' }],
      [161.975], ['text'],
    ], { Rate: 'Plan!$B$1', Fold_Rate: 'Plan!$B$1' }),
  };
  styled.sheets[0]!.cells[0]![3] = { value: '=1+1' }; // text
  Object.assign(styled.sheets[0]!, { columns: { 0: { width: 150 } }, rows: { 0: { height: 30 } }, merges: ['D2:E3'], frozen: { rows: 1, columns: 1 } });
  styled.sheets.push(sheetOf("Clock's tree", [['=Plan!B2*2']]));

  it('opens a workbook, saves it, and opens that again: the same', async () => {
    const original = await writeWorkbook(styled);
    await choose('styled.xlsx', original);
    await expectText('#status', /^Opened styled\.xlsx: 2 sheets, 3 formulas\./);
    const first = await saved();
    expect(first.name).toBe('styled.xlsx');
    expect(first.workbook).toEqual(withoutSentences(await calculate((await readWorkbook(original)).workbook, built)));
    await choose('again.xlsx', first.bytes);
    await expectText('#status', /^Opened again\.xlsx/);
    expect((await saved()).workbook).toEqual(first.workbook);
  });

  it('opens a file that is dropped on it', async () => {
    const bytes = [...await writeWorkbook(styled)];
    const files = await page.evaluateHandle((content) => {
      const transfer = new DataTransfer();
      transfer.items.add(new File([new Uint8Array(content)], 'dropped.xlsx'));
      return transfer;
    }, bytes);
    await page.dispatchEvent('#sheet', 'dragover', { dataTransfer: files });
    await page.getByText('Drop a workbook (.xlsx) to open it.').waitFor();
    await page.dispatchEvent('#sheet', 'drop', { dataTransfer: files });
    await expectText('#status', /^Opened dropped\.xlsx/);
    expect(await page.locator('#drop-hint').isVisible()).toBe(false);
    expect((await saved()).workbook.names).toEqual(styled.names);
  });

  it('says why a file cannot be opened, and keeps the sheet', async () => {
    const before = (await saved()).workbook;
    for (const [file, content] of [['letter.xlsx', 'Dear colleague'], ['half.xlsx', (await writeWorkbook(styled)).slice(0, 900)]] as const) {
      await choose(file, content);
      await expectText('#status', new RegExp(`^${file.replace('.', '\\.')}`));
      expect(await page.locator('#status').getAttribute('data-kind')).toBe('fault');
      expect(await page.locator('#file-name').textContent()).toBe(name);
    }
    expect((await saved()).workbook).toEqual(before);
  });

  it('asks before changes are lost, and warns when the page is left', async () => {
    await enter('B4', '0.5');
    await expectText('#file-name', `${name}, changed`);
    const bytes = await writeWorkbook(styled);
    await choose('next.xlsx', bytes);
    await page.getByRole('button', { name: 'Keep working' }).click();
    expect(await page.locator('#file-name').textContent()).toBe(`${name}, changed`);
    const leaving = page.waitForEvent('dialog');
    await page.close({ runBeforeUnload: true });
    const warning = await leaving;
    expect(warning.type()).toBe('beforeunload');
    await warning.dismiss();
    await choose('next.xlsx', bytes);
    await page.getByRole('button', { name: 'Open without saving' }).click();
    await expectText('#file-name', /^next\.xlsx$/);
  });

  it('saves a plain copy beside the workbook: the same values, and not one FOLD formula', async () => {
    const plain = name.replace('.xlsx', ' plain.xlsx');
    const before = await saved();
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('button', { name: 'Save plain copy' }).click()]);
    expect(download.suggestedFilename()).toBe(plain);
    const { workbook } = await readWorkbook(new Uint8Array(await readFile(await download.path())));
    const formulas = workbook.sheets.flatMap((sheet) => Object.values(sheet.cells).flatMap((line) => Object.values(line).flatMap(({ formula }) => (formula === undefined ? [] : [formula]))));
    expect(formulas.length).toBeGreaterThan(70);
    expect(formulas.filter((formula) => formula.includes('FOLD'))).toEqual([]);
    expect(workbook.sheets.map(({ name }) => name)).toEqual([...before.workbook.sheets.map(({ name }) => name), 'Plain copy']);
    expect(foldedInSheet(workbook.sheets[0]!)).toEqual(foldedInSheet(before.workbook.sheets[0]!));
    await expectText('#status', `Saved ${plain} among your downloads: 78 FOLD formulas made native, 5 others made values. Its last sheet lists them.`);
  });

  it('makes no file where a plain copy is cancelled, and the next one is whole', async () => {
    const downloads: string[] = [];
    const note = (download: { suggestedFilename(): string }) => void downloads.push(download.suggestedFilename());
    page.on('download', note);
    const saving = page.getByRole('button', { name: 'Save plain copy' });
    await saving.focus();
    await page.evaluate(() => {
      document.getElementById('save-plain')!.click();
      (document.activeElement as HTMLElement).click(); // which has become the button that cancels
    });
    await expectText('#status', 'Cancelled: no file was made.');
    expect(await saving.evaluate((button) => button === document.activeElement)).toBe(true);
    expect(downloads).toEqual([]);
    await saving.click();
    await expectText('#status', /^Saved .* plain\.xlsx .*: 78 FOLD formulas made native/);
    expect(downloads).toEqual([name.replace('.xlsx', ' plain.xlsx')]);
    page.off('download', note);
  });

  it('counts as changed what is changed, not what is looked at, and as saved what is saved', async () => {
    await page.getByRole('tab', { name: 'Rates and images' }).click();
    await goTo('A6');
    await page.keyboard.press('F2');
    await page.keyboard.press('Escape');
    await page.locator('#sheet').getByRole('tab', { name: 'Plan' }).click();
    expect(await page.locator('#file-name').textContent()).toBe(name);
    await enter('B4', '0.5');
    await expectText('#file-name', 'changed');
    await saved();
    expect(await page.locator('#file-name').textContent()).toBe(name);
  });

  it('tells which formulas of a file it cannot compute', async () => {
    await choose('unknown.xlsx', await writeWorkbook(planOf([[{ value: 5, formula: '=GETPIVOTDATA("f",B1)' }]])));
    await expectText('#status', /1 formula with GETPIVOTDATA cannot be computed here/);
  });
});

describe('the workbench for everyone', () => {
  beforeAll(async () => {
    await page.close();
    await start();
  });

  it('goes from part to part with F6, and saves with Ctrl+S', async () => {
    const focused = () => page.evaluate(() => ['pane', 'open', 'sheet'].find((id) => document.getElementById(id)!.contains(document.activeElement)));
    const visited = [];
    for (let i = 0; i < 3; i++) {
      await page.keyboard.press('F6');
      visited.push(await focused());
    }
    expect(visited).toEqual(['pane', 'open', 'sheet']);
    await page.keyboard.press('ArrowDown');
    await expectText('#cell', 'A2 Frequencies in MHz');
    const [download] = await Promise.all([page.waitForEvent('download'), page.keyboard.press('Control+s')]);
    expect(download.suggestedFilename()).toBe('Gannet Ness.xlsx');
  });

  it('has named landmarks and controls', async () => {
    const names = await page.evaluate(() => [...document.querySelectorAll('header, main, aside#pane, button, input, a, [contenteditable]')]
      .filter((element) => element.checkVisibility())
      .filter((element) => element.tagName !== 'HEADER' && !(element.getAttribute('aria-label') ?? (element as HTMLInputElement).labels?.[0]?.textContent ?? element.textContent ?? '').trim())
      .map((element) => element.outerHTML.slice(0, 120)));
    expect(names).toEqual([]);
  });

  it('fits a window 320 pixels wide', async () => {
    await page.setViewportSize({ width: 320, height: 640 });
    await expect.poll(() => page.evaluate(() => document.documentElement.scrollWidth)).toBe(320);
    for (const button of await page.locator('.bar button:visible, .bar a:visible').all()) {
      const box = (await button.boundingBox())!;
      expect(box.x + box.width).toBeLessThanOrEqual(320);
    }
    const [sheet, pane] = [(await page.locator('#sheet').boundingBox())!, (await page.locator('#pane').boundingBox())!];
    expect(sheet.height).toBeGreaterThan(300);
    expect(pane.y).toBeGreaterThanOrEqual(sheet.y + sheet.height);
    await page.screenshot({ path: outputFile('workbench-narrow.png'), fullPage: true });
  });

  it('turns dark with the system', async () => {
    const brightness = async () => {
      const pixels = await page.evaluate(() => {
        const sheet = document.querySelector<HTMLCanvasElement>('canvas[id^="univer-sheet-main-canvas"]')!;
        const copy = new OffscreenCanvas(1, 1).getContext('2d', { willReadFrequently: true })!;
        copy.drawImage(sheet, 4, 4, 1, 1, 0, 0, 1, 1); // in the corner of the headings
        return [...copy.getImageData(0, 0, 1, 1).data];
      });
      return (pixels[0]! + pixels[1]! + pixels[2]!) / 3;
    };
    await expect.poll(brightness).toBeGreaterThan(200);
    await page.emulateMedia({ colorScheme: 'dark' });
    await expect.poll(brightness).toBeLessThan(60);
    expect(await page.evaluate(() => getComputedStyle(document.body).backgroundColor)).toBe('rgb(28, 32, 36)');
    await page.screenshot({ path: outputFile('workbench-dark.png') });
    await page.emulateMedia({ colorScheme: 'light', forcedColors: 'active' });
    await page.screenshot({ path: outputFile('workbench-forced-colours.png') });
  });
});

/** Files keep the codes of errors, not their sentences. */
function withoutSentences(workbook: Workbook): Workbook {
  const plain = (value: CellValue) => (typeof value === 'object' && value !== null ? { error: value.error } : value);
  const cells = (sheet: Sheet) => Object.fromEntries(Object.entries(sheet.cells).map(([row, line]) => [row, Object.fromEntries(Object.entries(line).map(([column, cell]) => [column, { ...cell, value: plain(cell.value) }]))]));
  return { ...workbook, sheets: workbook.sheets.map((sheet) => ({ ...sheet, cells: cells(sheet) })) };
}
