// The built site in the spreadsheet program's own, unmodified runtime, under a page that plays the program on the web.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import type { Workbook } from '../../src/host/port';
import type { FunctionMetadata } from '../../src/host/sheet/functions-runtime';
import { launchBrowser, siteFile, watch } from '../support/browser';
import { call } from '../support/built-functions';
import { evaluate } from '../support/evaluate';
import { FULL_CALLS, asCells } from '../support/full-calls';
import { contractWorkbook } from '../support/host-contract';
import { SHAPES } from '../support/plan-shapes';
import { type Outcome, type WebHost, openInWebHost } from '../support/played-excel/web-host';
import { WorkbookModel } from '../support/played-excel/workbook-model';
import { pngSize } from '../support/png';
import { selfHosted } from '../support/self-hosted';
import { testWholeJob } from '../support/whole-job';
import { planOf } from '../support/workbook';

const { base: BASE, folder: site } = selfHosted;

let browser: Browser;
let functions: FunctionMetadata[];
beforeAll(async () => {
  functions = JSON.parse(readFileSync(path.join(site, 'functions.json'), 'utf8')).functions;
  browser = await launchBrowser();
});
afterAll(() => browser?.close());

/** What the calls of FULL_CALLS give: worked by hand from the definitions. */
const GIVES: Record<string, unknown[][]> = {
  FREQ:      [[30]],
  ZONE:      [[2]],
  INVERTED:  [[true]],
  LOW:       [[10]],
  HIGH:      [[40]],
  MARGIN:    [[7.9]],
  CHECK:     [['clear']],
  GAP:       [[-10]],
  BAND:      [[10, 40, 2, true, 7.9, 'clear']],
  IMAGES:    [[30, 1, false], [70, 2, true], [130, 3, false]],
  RESOLVE:   [[69.5, 70.5], [490.5, 490.5], [630.5, 630.5]],
  RATES:     [[3, 15.0668173348401, 17.3998260017399, 2.3330086668998, false], [2, 22.6002260022601, 34.7996520034799, 12.1994260012198, true]],
  MINRATE:   [[11.3001130011301]],
  TOLERANCE: [[80000]],
  // Bounds are 2·52.5, 2·53.75, 2·57.25, 2·64.75, 2·68.25, 2·69.5 and 2·74.5, moved in by 10 ppm.
  PLANRATES: [
    [105.001050010501, 107.498925010749, 2.497875000248, 106.249987510625, 11754.7072652512], [114.501145011451, 129.498705012949, 14.997560001498, 121.9999250122, 61465.4476221942],
    [136.501365013651, 138.998610013899, 2.497245000248, 137.749987513775, 9064.41098587495], [149.001490014901, 200, 50.998509985099, 174.50074500745, 146126.911902071],
  ],
  RANKRATES: [[84.5, 118343.195266272, 10, 'row 1: zone edge'], [32, 85937.5, 3.99984, 'row 1: zone edge'], [80, 68750, 5.9992, 'row 1: band against row 2']],
  CONFLICTS: [['Beacon', 'band', 'Blocker', -0.0007]], // 60 to 62 lands on 10 to 8, and 10 ppm of 70 nearer
  HEADROOM:  [[68750]],
  CLOCKRATES: [[60, 6, 1], [190 / 3, 19, 3], [65, 13, 2], [200 / 3, 20, 3], [70, 7, 1]],
  HARMONICS: [[1, 10, 12, 10, 12, 1, false, ''], [2, 20, 24, 20, 24, 1, false, 8], [3, 30, 36, 14, 20, 2, true, 2]],
  INTERLEAVING: [['image', 1, 35, 37, 23], ['image', 2, 38, 40, 26], ['image', 3, 13, 15, 1], ['offset', 1, 25, 25, 13], ['offset', 2, 50, 50, 38]],
  MIXING:    [[0, 1, 100, 100, 100, 100], [1, -1, 88, 90, 88, 90], [1, 1, 110, 112, 110, 112]],
  INTERMOD:  [['f2-f1', 2, 1, 1], ['2·f1', 2, 10, 6], ['f1+f2', 2, 11, 5], ['2·f2', 2, 12, 4]],
  SOURCES:   [['clock image 1/2', 1, 14, 0], ['2·carrier', 2, 14, 0]],
  DACIMAGES: [[1, 10, 20, false, expect.closeTo(-6.101117566707631, 12)], [2, 80, 90, true, expect.closeTo(-8.774745652676724, 12)], [3, 110, 120, false, expect.closeTo(-11.400323945463104, 12)]],
  STOPBAND:  [[40, 110, 20, 20]],
  FILTERORDER: [[7]], // acosh √(999999/0.2589) / acosh((110² − 60·90)/(110·30)) is 6.2
  ATTENUATION: [[expect.closeTo(14.1446446209097, 12)]], // 10·lg(1 + 0.2589·T₃(w)²) at w = (100² − 60·90)/(100·30)
  JITTERSNR: [[expect.closeTo(64.0364026328377, 12)]], // −20·lg(2π·10⁻⁴)
  JITTERLIMIT: [[expect.closeTo(1.00419980254158e-6, 18)]],
  QUANTSNR:  [[expect.closeTo(80.9978115932725, 12)]], // 20·lg(2¹²·√1.5) + 10·lg 5
  SUMSNR:    [[expect.closeTo(66.9897000433602, 12)]], // 70 − 10·lg 2
  ENOB:      [[expect.closeTo(11.9986527007227, 12)]],
  NOISEFOLD: [[expect.closeTo(0.128372247051722, 12)]], // 10·lg 1.03
  DROOP:     [[expect.closeTo(-6.24500441566178, 12)]],
  COHERENT:  [[10.05859375]], // 102.4 cycles; of the odd numbers 103 is nearest
  CYCLES:    [[103]],
  CHAIN:     [[-15, 15, 50, 7.5, true], [-15, 15, 25, -3.75, true]],
  TUNINGWORD: [[2 ** 30]],
  TUNED:     [[10.15625]], // 25.6 of 256; 26
};

/** Numbers of the codes with which a thrown error reaches the program. */
const INVALID_VALUE = 7;
const NOT_AVAILABLE = 1;

/** Rows of an outcome, an error as `#CODE! sentence`. */
function asText(outcome: Outcome): unknown[][] {
  if (!outcome.succeeded) return [[`${{ [INVALID_VALUE]: '#VALUE!', [NOT_AVAILABLE]: '#N/A' }[outcome.code]} ${outcome.sentence}`]];
  return (outcome.value as (string | number | boolean | { code: string; message: string })[][]).map((row) =>
    row.map((cell) => (typeof cell === 'object' ? `${cell.code} ${cell.message}` : cell)));
}

describe('the worksheet functions in the real runtime', () => {
  let host: WebHost;
  beforeAll(async () => {
    host = await openInWebHost(browser, site, BASE, played(contractWorkbook));
  });
  afterAll(() => host?.close());

  it('give what they should, each of them', async () => {
    const given = await Promise.all(functions.map(async ({ id, parameters }) => {
      const outcome = await host.call(id, parameters.map((_, i) => asCells(FULL_CALLS[id]![i] ?? null)));
      return [id, outcome.succeeded ? outcome.value : outcome];
    }));
    expect(Object.keys(GIVES), 'A new function wants a row in GIVES, worked by hand.').toEqual(functions.map(({ id }) => id));
    expect(Object.fromEntries(given)).toEqual(GIVES);
  });

  it('take every optional argument as left out, as they do elsewhere', async () => {
    for (const [id, rows, elsewhere] of await Promise.all(functions.map(async ({ id, parameters }) => {
      const given = parameters.map(({ optional }, i) => (optional ? null : FULL_CALLS[id]![i]!));
      return [id, asText(await host.call(id, given.map(asCells))), call(id, ...given)] as const;
    }))) expect([id, rows]).toEqual([id, elsewhere]);
  });

  const refusal = { code: '#VALUE!', errorType: 'Value', message: 'frequency must be a number; got "fast".' };

  it('keep an error, its sentence and blank cells in their rows of a spilled column', async () => {
    const column = [[70], ['fast'], [null], [''], [{ type: 'CustomFunctionError', code: '#REF!' }], [130]];
    expect(await host.call('FREQ', [column, [[100]], null])).toEqual({
      succeeded: true,
      value: [[30], [expect.objectContaining(refusal)], [''], [''], [expect.objectContaining({ code: '#REF!', errorType: 'Ref' })], [30]],
    });
  });

  it('pass the sentence on where the error is the only cell', async () => {
    expect(await host.call('FREQ', [[['fast']], [[100]], null])).toEqual({ succeeded: false, code: INVALID_VALUE, sentence: refusal.message });
  });

  it('pass the sentence on where a whole table is an error', async () => {
    expect(await host.call('RATES', [[[2]], [[1]], null, null, null, null, null, null])).toEqual(
      { succeeded: false, code: INVALID_VALUE, sentence: 'low must not be above high; got 2 and 1.' });
    expect(await host.call('IMAGES', [[[30]], [[100]], [[31]], [[69]], null, null])).toEqual(
      { succeeded: false, code: NOT_AVAILABLE, sentence: 'No frequency from 31 to 69 lands on 30.' });
  });

  it('give a spilled column of 10 000 rows in one call', async () => {
    const outcome = await host.call('FREQ', [Array.from({ length: 10_000 }, (_, i) => [i]), [[100]], null]);
    expect(outcome).toMatchObject({ succeeded: true });
    const rows = outcome.succeeded ? (outcome.value as number[][]) : [];
    expect([rows.length, rows[70], rows[9_999]]).toEqual([10_000, [30], [1]]);
  });

  it('say nothing on the console, and ask for nothing that the site does not hold', () => {
    expect(host.watched).toEqual({ console: [], strayRequests: [] });
  });
});

describe('the pane in the real runtime', () => {
  let host: WebHost;
  afterEach(async () => {
    expect(host.watched).toEqual({ console: [], strayRequests: [] });
    await host.close();
  });

  testWholeJob('the played program', async ({ rows, table }) => {
    const workbook = new WorkbookModel(planOf(rows), evaluate);
    if (table) workbook.Tables.put('Bands', workbook.range(table)!);
    host = await openInWebHost(browser, site, BASE, workbook);
    const pane = host.addIn.locator('#pane');
    const enter = async (cell: string, text: string) => {
      workbook.range(`Plan!${cell}`)!.Formulas = [[text]];
    };
    return {
      page: host.page,
      pane,
      hasTables: true,
      enter,
      async takeBack(step) {
        if ('cell' in step) return enter(step.cell, step.before);
        await pane.getByRole('tab', { name: step.section, exact: true }).click();
        await pane.getByRole('button', { name: step.button, exact: true }).click();
      },
      held: async () => ({ everything: workbook.snapshot(), names: workbook.Names.refersTo, cell: (row, column) => workbook.sheets[0]!.at(row, column) }),
    };
  });

  const TOLD: Record<string, unknown> = {
    'zone ladder': 'Zone ladder of 3 bands at a rate of 280. 280 does not work. Airband and Amateur overlap by 3, at 134 to 136. Airband and AIS overlap by 0.0375, at 118 to 118.0375.',
    'rate ruler': expect.stringMatching(/^Rate ruler from .* to .*, at a rate of 280\. \d+ ranges of rates in view are usable\. Those with most headroom are about /),
  };

  it('puts pictures on the sheet where the selection begins, told in words for those who do not see them', async () => {
    const [, { rows, names }] = SHAPES[0]!;
    const workbook = new WorkbookModel(planOf(rows, names), evaluate);
    host = await openInWebHost(browser, site, BASE, workbook);
    const pane = host.addIn.locator('#pane');
    const { Shapes: shapes } = workbook.sheets[0]!;
    const before = workbook.snapshot();
    workbook.select(workbook.range('Plan!B9:C12')!);
    for (const picture of ['zone ladder', 'rate ruler']) {
      await pane.getByRole('group', { name: `Take out the ${picture}` }).getByRole('button', { name: 'Insert in the sheet' }).click();
      await expect.poll(() => pane.innerText(), { timeout: 20_000 }).toContain('The picture stands at Plan!B9.');
      await expect.poll(() => shapes.all.length).toBe(1);
      const [shape] = shapes.all;
      expect(shape).toMatchObject({ Left: 48, Top: 8 * 15, AltTextDescription: TOLD[picture] });
      expect(pngSize(Buffer.from(shape!.base64, 'base64'))).toEqual([shape!.Width, shape!.Height].map((points) => 2 * points / 0.75)); // twice the pixels that it takes on the sheet
      shape!.Delete();
      expect(workbook.snapshot()).toEqual(before);
    }
  });
});

describe('a site that carries its own Office.js', () => {
  // How each program tells the client library what it is; the library then fetches its own parts.
  it.each([
    'Excel$Win32$16.01$en-US', 'Excel$Win32$16.01$de-DE', 'Excel$Mac$16.00$ja-JP', 'Excel$Web$16.01$sr-Cyrl-RS', 'Excel$Web$16.01$xx-XX',
  ])('holds every file that %s asks for', async (program) => {
    const page = await openPane(`?_host_Info=${encodeURIComponent(program)}$correlation$telemetry$$`);
    await page.waitForFunction(() => 'OfficeExtension' in window);
    expect(page.watched.strayRequests).toEqual([]);
    await page.context().close();
  });

  it('asks its own address alone where the program wants usage reports, and has no part that sends them', async () => {
    const host = await openInWebHost(browser, site, BASE, played(contractWorkbook), { usageReports: true });
    await host.addIn.locator('#pane').getByText('Sample rate', { exact: true }).waitFor();
    expect(host.watched.strayRequests).toEqual([`404 ${BASE}/office/telemetry/oteljs_agave.js`]);
    await host.close();
  });

  it('says what it is when it is opened outside a spreadsheet program', async () => {
    const page = await openPane('');
    await page.getByRole('alert').waitFor();
    expect(await page.locator('#pane').innerText()).toMatch(/^This page is the pane of the Foldplan add-in: it works inside a spreadsheet program\./);
    expect(page.watched.strayRequests).toEqual([]);
    await page.context().close();
  });

  it('says so when Office.js does not load', async () => {
    const page = await openPane('', (pathname) => pathname.endsWith('/office.js'));
    await page.getByRole('alert').waitFor();
    expect(await page.locator('#pane').innerText()).toMatch(/^Office\.js did not load, so the pane cannot reach the spreadsheet\./);
    await page.context().close();
  });

  /** The add-in's page by itself. */
  async function openPane(query: string, missing: (pathname: string) => boolean = () => false) {
    const context = await browser.newContext();
    await context.route('**/*', (route) => {
      const { href, pathname } = new URL(route.request().url());
      const file = href.startsWith(`${BASE}/`) && !missing(pathname) ? siteFile(pathname.slice(new URL(BASE).pathname.length), site) : null;
      return file ? route.fulfill(file) : route.fulfill({ status: 404 });
    });
    const page = await context.newPage();
    const watched = watch(page, BASE);
    await page.goto(`${BASE}/pane.html${query}`);
    return Object.assign(page, { watched });
  }
});

/** A workbook without formulas that need computing. */
const played = (workbook: Workbook): WorkbookModel => new WorkbookModel(structuredClone(workbook), () => [[0]]);
