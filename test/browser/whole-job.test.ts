// The whole job in the built workbench, in a real browser, on plans of different shapes.

import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { type Site, type Watched, launchBrowser, serveSite, watch } from '../support/browser';
import { testWholeJob } from '../support/whole-job';
import { enter, goTo, openWorkbook, saved, startWorkbench } from '../support/workbench-page';
import { planOf } from '../support/workbook';

let browser: Browser;
let site: Site;
let page: Page;
let watched: Watched;

beforeAll(async () => {
  [browser, site] = await Promise.all([launchBrowser(), serveSite()]);
  page = await browser.newPage({ viewport: { width: 1400, height: 900 } });
  watched = watch(page, site.address);
  await startWorkbench(page, site.address);
});
afterAll(async () => {
  await browser.close();
  await site.close();
});

testWholeJob('the workbench', async (shape) => {
  await openWorkbook(page, planOf(shape.rows));
  return {
    page,
    pane: page.locator('#pane'),
    hasTables: false,
    enter: (cell, text) => enter(page, cell, text),
    // The sheet's own undo knows every step.
    async takeBack() {
      await goTo(page, shape.rateCell);
      await page.keyboard.press('Control+Z');
    },
    async held() {
      const everything = await saved(page);
      return { everything, names: everything.names, cell: (row, column) => everything.sheets[0]!.cells[row]?.[column] ?? { value: null } };
    },
  };
});

it('The workbench says nothing on the console all the while, and asks for nothing that the site does not hold', () => {
  expect(watched).toEqual({ console: [], strayRequests: [] });
});
