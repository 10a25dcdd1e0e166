// The icons are pictures of two drawings: assets/icon.svg, and assets/outline.svg in white. After a change of a drawing, UPDATE_ICONS=1 draws them
// anew; look at them.

import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser } from './support/browser';

const assets = path.join(import.meta.dirname, '../assets');
const ICONS = [...[16, 20, 24, 32, 40, 48, 64, 80, 192].map((size) => ['icon', size] as const), ['outline', 32] as const];

let browser: Browser;
let page: Page;
beforeAll(async () => {
  browser = await launchBrowser();
  page = await browser.newPage();
});
afterAll(() => browser.close());

describe('the icons', () => {
  it.each(ICONS)('%s of %i pixels shows the drawing', async (name, size) => {
    const drawing = `data:image/svg+xml;base64,${readFileSync(path.join(assets, `${name}.svg`)).toString('base64')}`;
    const file = path.join(assets, `${name}-${size}.png`);
    if (process.env.UPDATE_ICONS) writeFileSync(file, Buffer.from((await page.evaluate(drawn, [drawing, size] as const)).png, 'base64'));
    expect(existsSync(file), `${file} is missing: UPDATE_ICONS=1 npx vitest run test/icons.test.ts`).toBe(true);
    const icon = await page.evaluate(drawn, [`data:image/png;base64,${readFileSync(file).toString('base64')}`, size] as const);
    const wanted = await page.evaluate(drawn, [drawing, size] as const);
    expect(icon.natural).toEqual([size, size]);
    expect(new Set(wanted.pixels).size).toBeGreaterThan(2);
    // Browsers differ in how they smooth edges: by a step or two of 255, not more.
    const off = wanted.pixels.filter((value, i) => Math.abs(value - icon.pixels[i]!) > 8).length;
    expect(off / wanted.pixels.length).toBeLessThan(0.02);
  });
});

/** Runs in the page: a picture at a size, its pixels as red, green, blue and opacity in turn. */
async function drawn([source, size]: readonly [string, number]): Promise<{ natural: [number, number]; pixels: number[]; png: string }> {
  const picture = new Image();
  picture.src = source;
  await picture.decode();
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = size;
  const context = canvas.getContext('2d')!;
  context.drawImage(picture, 0, 0, size, size);
  return {
    natural: [picture.naturalWidth, picture.naturalHeight],
    pixels: [...context.getImageData(0, 0, size, size).data],
    png: canvas.toDataURL('image/png').split(',')[1]!,
  };
}
