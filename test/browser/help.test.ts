// The function reference as a reader sees it, served from the built site.

import type { Browser, Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { type Site, type Watched, launchBrowser, outputFile, serveSite, watch } from '../support/browser';

let browser: Browser;
let site: Site;
let page: Page;
let watched: Watched;

beforeAll(async () => {
  [browser, site] = await Promise.all([launchBrowser(), serveSite()]);
});
beforeEach(async () => {
  page = await browser.newPage({ viewport: { width: 900, height: 800 } });
  watched = watch(page, site.address);
  await page.goto(`${site.address}/help.html`);
});
afterEach(() => page.close());
afterAll(() => Promise.all([browser?.close(), site?.close()]));

const shown = () => page.locator('section[data-function]:visible').evaluateAll((sections) => sections.map(({ id }) => id));

describe('the function reference', () => {
  it('finds functions by every word, in names, arguments and examples', async () => {
    await page.getByLabel('Search').fill('aperture');
    expect(await shown()).toEqual([]);
    await page.getByLabel('Search').fill('jitter');
    expect(await shown()).toEqual(['JITTERSNR', 'JITTERLIMIT']);
    await page.getByLabel('Search').fill('RECORD length');
    expect(await shown()).toEqual(['COHERENT', 'CYCLES']);
    expect(await page.locator('output').textContent()).toMatch(/^2 of 40 functions/);
    expect(await page.locator('nav h2:visible').count()).toBe(1);
  });

  it('finds a sentence and what it means', async () => {
    await page.getByLabel('Search').fill('number typed as text');
    expect(await page.locator('.sentences dt:visible').allTextContents()).toEqual(['#VALUE! argument must be a number; got value.']);
  });

  it('comes back to a function that a link asks for', async () => {
    await page.getByLabel('Search').fill('jitter');
    await page.evaluate(() => {
      location.hash = '#ZONE';
    });
    await page.locator('#ZONE').waitFor();
    expect(await page.getByLabel('Search').inputValue()).toBe('');
  });

  it('reads without its script, in the dark and on a narrow page, and says nothing on the console', async () => {
    expect(watched).toEqual({ console: [], strayRequests: [] });
    await page.screenshot({ path: outputFile('help-wide.png') });
    const narrow = await browser.newContext({ javaScriptEnabled: false, viewport: { width: 320, height: 640 }, colorScheme: 'dark' });
    const plain = await narrow.newPage();
    await plain.goto(`${site.address}/help.html#RATES`);
    expect(await plain.locator('section[data-function]:visible').count()).toBe(40);
    expect(await plain.locator('form').isVisible()).toBe(false);
    const overflow = await plain.evaluate('document.documentElement.scrollWidth');
    await plain.screenshot({ path: outputFile('help-narrow-dark.png') });
    await narrow.close();
    expect(overflow).toBe(320);
  });
});
