// A call of each worksheet function, and how calls are written down.

import type { Argument } from '../../src/host/sheet/functions-runtime';

type Input = Argument[number][number];

/** One cell, a column of cells, or rows of cells; null is an argument left out. */
export type Given = Input | Input[] | Argument;

export const asCells = (given: Given): Argument | null => {
  if (given === null) return null;
  if (!Array.isArray(given)) return [[given]];
  return given.map((line) => (Array.isArray(line) ? line : [line]));
};

/** A call of each function with every argument given. Arguments of row functions are cells, so the result is one cell. */
export const FULL_CALLS: Record<string, Given[]> = {
  FREQ: [70, 100, 'real'],
  ZONE: [70, 100, 'real'],
  INVERTED: [70, 100, 'real'],
  LOW: [60, 90, 100, 'real'],
  HIGH: [60, 90, 100, 'real'],
  MARGIN: [60, 90, 100, 2, 1000, 'real'],
  CHECK: [60, 90, 100, 2, 1000, 'real'],
  GAP: [60, 90, 10, 20, 100, 'real'],
  BAND: [60, 90, 100, 2, 1000, 'real', false],
  IMAGES: [30, 100, 0, 150, 'real', false],
  RESOLVE: [[14, 10, 4], [56, 40, 33], 0, 1000, 0.5, 'real', false],
  RATES: [17.5, 22.5, 12, 40, 0.1, 10, 'real', false],
  MINRATE: [17.5, 22.5, 0.1, 10, 'real'],
  TOLERANCE: [60, 90, 100, 2, 'real'],
  PLANRATES: [[10, 60], [12, 62], ['wanted', 'unwanted'], 100, 200, 0.5, 10, 2, 2, 'real', false],
  RANKRATES: [[10, 60], [12, 62], [32, 80, 84.5], ['wanted', 'unwanted'], 30, 90, 0.5, 10, 1, 1, 3, 'real', false],
  CONFLICTS: [[10, 60], [12, 62], 70, ['wanted', 'unwanted'], 0.5, 10, 2, 2, ['Beacon', 'Blocker'], 'real', false],
  HEADROOM: [[10, 60], [12, 62], 80, ['wanted', 'unwanted'], 0.5, 2, 2, 'real'],
  CLOCKRATES: [10, 60, 70, 20, 3, false],
  HARMONICS: [10, 12, 50, 3, 'real', false],
  INTERLEAVING: [10, 12, 100, 4, false],
  MIXING: [10, 12, 100, 250, 1, 1, false],
  INTERMOD: [[5, 6], 16, 2, false],
  SOURCES: [6, 20, [7, 4], 3, 0.5, 2, ['carrier', 'clock'], false],
  DACIMAGES: [10, 20, 100, 3, 'rz', false],
  STOPBAND: [60, 90, 100, false],
  FILTERORDER: ['chebyshev', 60, 90, 40, 110, 1, 60],
  ATTENUATION: ['chebyshev', 3, 60, 90, 1, 100, 40],
  JITTERSNR: [100, 1e-6],
  JITTERLIMIT: [100, 64],
  QUANTSNR: [12, 100, 10],
  SUMSNR: [[70, 70]],
  ENOB: [74],
  NOISEFOLD: [4, 20],
  DROOP: [25, 100, 'rz'],
  COHERENT: [10, 100, 1024],
  CYCLES: [10, 100, 1024],
  CHAIN: [60, 90, 100, 25, [2, 2], 0.9, false],
  TUNINGWORD: [25, 100, 32],
  TUNED: [10, 100, 8],
};
