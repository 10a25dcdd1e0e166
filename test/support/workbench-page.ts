// The built workbench in a browser, as its user handles it.

import { readFile } from 'node:fs/promises';
import type { Page } from 'playwright-core';
import { expect } from 'vitest';
import { readWorkbook, writeWorkbook } from '../../src/host/file';
import type { Workbook } from '../../src/host/port';

export async function startWorkbench(page: Page, address: string): Promise<void> {
  await page.goto(`${address}/workbench.html`);
  await page.getByText(/^A demo plan/).waitFor({ timeout: 40_000 });
}

let opened = 0;

/** Opens a file, whatever becomes of the workbook that is open. Gives its name. */
export async function openWorkbook(page: Page, workbook: Workbook): Promise<string> {
  const name = `plan ${++opened}.xlsx`; // its own, so that what is said of it is new
  await page.locator('#chosen-file').setInputFiles({ name, mimeType: 'application/octet-stream', buffer: Buffer.from(await writeWorkbook(workbook)) });
  const discard = page.getByRole('button', { name: 'Open without saving' });
  await expect.poll(async () => {
    if (await discard.isVisible()) await discard.click();
    return page.locator('#status').innerText();
  }, { timeout: 40_000 }).toMatch(`Opened ${name}`);
  return name;
}

export async function goTo(page: Page, cell: string): Promise<void> {
  const nameBox = page.getByLabel('Selected cell');
  await nameBox.fill(cell);
  await nameBox.press('Enter');
}

export async function enter(page: Page, cell: string, text: string): Promise<void> {
  await goTo(page, cell);
  await page.keyboard.type(text);
  await page.keyboard.press('Enter');
}

/** The workbook as it is saved. */
export async function saved(page: Page): Promise<Workbook> {
  const [download] = await Promise.all([page.waitForEvent('download'), page.locator('#save').click()]);
  return (await readWorkbook(new Uint8Array(await readFile(await download.path())))).workbook;
}
