// From a recalculation to the new pictures, in a browser, beside the recalculation of the same plan in the embedded sheet.

import path from 'node:path';
import type { WorksheetFunctions } from '../../src/host/sheet/functions-runtime';
import { openHeadless } from '../../src/host/sheet/headless';
import type { Plan } from '../../src/pane/plan';
import { findingsIn } from '../../src/pane/ruler/findings';
import { rulesOf } from '../../src/pane/ruler/rules';
import { windowAbout } from '../../src/pane/ruler/window';
import { standingOf } from '../../src/pane/pictures/standing';
import { launchBrowser } from '../support/browser';
import { randomBands, recalculation, spilled, workbook } from './sheet';
import { type Row, race } from './table';

const ROUNDS = 7;
/** Channels as a plan has them, in thousandths: wide ones would all lie on one another. */
const WIDEST = 100;

/** @param folder where the benchmark's own page was built */
export async function benchPictures(seed: number, functions: WorksheetFunctions, folder: string): Promise<Row[]> {
  const browser = await launchBrowser();
  try {
    const page = await browser.newPage({ viewport: { width: 420, height: 1000 } });
    await page.setContent('<!doctype html><body></body>');
    await page.addStyleTag({ path: path.join(folder, 'bench-pictures.css') });
    await page.addScriptTag({ path: path.join(folder, 'bench-pictures.js') });
    const rows: Row[] = [];
    for (const size of [50, 500]) {
      const bands = randomBands(seed, size, WIDEST);
      const plan = planOf(bands);
      const recalculated = await timeOfSheet(bands, functions);
      const drawn = await page.evaluate(([given, rounds]) => (window as unknown as PicturesPage).measurePictures(given, rounds), [plan, ROUNDS] as const);
      const { ruler } = race(3, { ruler: () => rulerWork(plan) }) as { ruler: number };
      const comparedWith = 'recalculation';
      const row = (what: string, ms: number): Row => ({ what: `${what}, ${size} rows`, ms, ratio: ms / recalculated, comparedWith });
      rows.push(
        { what: `sheet of ${size} × 5 spilled FOLD columns, recalculated`, ms: recalculated, ratio: null, comparedWith },
        row('figures of the plan, in the browser', drawn.figures), row('pictures and table on the page, in the browser', drawn.section),
        row('rules of the ruler, afterwards and in tasks of its own', ruler),
      );
    }
    return rows;
  } finally {
    await browser.close();
  }
}

interface PicturesPage {
  measurePictures(plan: Plan, rounds: number): { figures: number; section: number };
}

function planOf(bands: [number, number][]): Plan {
  return {
    missing: [], edges: ['low', 'high'], rate: 100, guard: 0.02, ppm: 20, places: {}, table: null, notices: [],
    rows: bands.map(([low, high], index) => ({
      index, place: `A${index + 5}`, name: `Band ${index + 1}`, role: index % 2 === 0 ? 'unwanted' : 'wanted', low, high, centre: null, problem: null, usable: true,
    })),
  };
}

async function timeOfSheet(bands: [number, number][], functions: WorksheetFunctions): Promise<number> {
  const host = openHeadless(functions);
  await host.load(workbook(bands, spilled(bands.length)));
  let fastest = Infinity;
  for (let round = -1; round < ROUNDS; round++) {
    const spent = await recalculation(host, 100 + round);
    if (round >= 0) fastest = Math.min(fastest, spent);
  }
  host.dispose();
  return fastest;
}

/** What the ruler asks of the engine after a recalculation. */
function rulerWork(plan: Plan): void {
  const rules = rulesOf(plan, { harmonics: 1, cores: 1 });
  findingsIn(rules, windowAbout(plan.rate!));
  standingOf(rules, plan.rate!);
}
