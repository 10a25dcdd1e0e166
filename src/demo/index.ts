// The workbooks that the workbench can open on, by the word in its address: workbench.html?demo=front-end.

import type { Workbook } from '../host/port';
import { coastPlan } from './coast';
import { frontEnd } from './front-end';

export interface Demo {
  /** File name. */
  name: string;
  make(): Workbook;
}

const DEMOS: Record<string, Demo> = {
  coast: { name: 'Gannet Ness.xlsx', make: coastPlan },
  'front-end': { name: 'Skua Rigg.xlsx', make: frontEnd },
};

/** The demo of that word; the first one where there is no such word. */
export const demoFor = (word: string | null): Demo => DEMOS[word ?? ''] ?? DEMOS.coast!;
