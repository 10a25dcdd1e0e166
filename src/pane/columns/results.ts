// The results that can be inserted: what each computes, and how its cells look.

import { foldedFrequency } from '../../engine';
import type { BandFigures, PlanFigures } from '../figures';
import type { Band } from './references';
import { sentences } from './sentences';

export type ResultKey = keyof typeof sentences.titles;

export interface Arguments extends Band {
  rate: string;
  /** null where the plan has none. */
  guard: string | null;
  ppm: string | null;
}

interface Result {
  formula(of: Arguments): string;
  /** What the engine says of a band. */
  value(band: BandFigures, rate: number): number | boolean | string;
  kind: 'frequency' | 'margin' | 'word';
}

const allowances = ({ guard, ppm }: Arguments): string => (ppm ? `,${guard ?? 0},${ppm}` : guard ? `,${guard}` : '');
/** To 15 digits, as a function reads a sum of cells. */
const centreOf = ({ low, high }: BandFigures): number => Number(((low + high) / 2).toPrecision(15));

/** In the order in which they are inserted. */
export const RESULTS: Record<ResultKey, Result> = {
  folded: { kind: 'frequency', formula: ({ centre, rate }) => `=FOLD.FREQ(${centre},${rate})`, value: (band, rate) => foldedFrequency(centreOf(band), rate) },
  low: { kind: 'frequency', formula: ({ low, high, rate }) => `=FOLD.LOW(${low},${high},${rate})`, value: ({ imageLow }) => imageLow },
  high: { kind: 'frequency', formula: ({ low, high, rate }) => `=FOLD.HIGH(${low},${high},${rate})`, value: ({ imageHigh }) => imageHigh },
  zone: { kind: 'word', formula: ({ centre, rate }) => `=FOLD.ZONE(${centre},${rate})`, value: ({ zone }) => zone },
  inverted: { kind: 'word', formula: ({ centre, rate }) => `=FOLD.INVERTED(${centre},${rate})`, value: ({ inverted }) => inverted },
  margin: { kind: 'margin', formula: (all) => `=FOLD.MARGIN(${all.low},${all.high},${all.rate}${allowances(all)})`, value: ({ margin }) => margin },
  check: { kind: 'word', formula: (all) => `=FOLD.CHECK(${all.low},${all.high},${all.rate}${allowances(all)})`, value: ({ check }) => check },
};

export const RESULT_KEYS = Object.keys(RESULTS) as ResultKey[];

const isTone = ({ low, high }: BandFigures): boolean => low === high;

/** What is offered: one folded frequency makes sense where there are tones. */
export const offered = ({ bands }: PlanFigures): ResultKey[] => RESULT_KEYS.filter((key) => key !== 'folded' || bands.some(isTone));

/** What is ticked to begin with: of a plan of tones, one folded frequency instead of two ends that are the same. */
export const tidy = ({ bands }: PlanFigures): ResultKey[] =>
  RESULT_KEYS.filter((key) => (bands.length > 0 && bands.every(isTone) ? key !== 'low' && key !== 'high' : key !== 'folded'));
