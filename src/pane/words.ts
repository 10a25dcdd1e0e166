// What the figures of a plan come to in words.

import type { BandFigures, Pair, PlanFigures } from './figures';
import { exactFigure } from './number-text';
import { isolated, sentences } from './sentences';

/** The rate at a glance. */
export interface Headline {
  /** `works`, only `narrowly` (without guard and tolerance), or `fails`; `open` where nothing is wanted. */
  outcome: 'works' | 'narrowly' | 'fails' | 'open';
  verdict: string;
  facts: { what: string; figure: string }[];
  /** How many things speak against the rate, and a sentence for each of the worst. */
  against: number;
  objections: string[];
  remarks: string[];
}

/** The rate in one sentence, for a plan whose rate is known. */
export const verdictOf = (figures: PlanFigures): string =>
  ({ open: sentences.nothingWanted, fails: sentences.fails, narrowly: sentences.worksNarrowly, works: sentences.works }[outcomeOf(figures)](exactFigure(figures.plan.rate!)));

function outcomeOf({ bands, pairs, drifting }: PlanFigures): Headline['outcome'] {
  const states = bands.filter(({ row }) => row.role === 'wanted').map(({ state }) => state);
  if (states.length === 0) return 'open';
  if (pairs.some(({ gap }) => gap < 0) || states.some((state) => state === 'crosses' || state === 'too wide')) return 'fails';
  return pairs.length + drifting.length > 0 || states.includes('tight') ? 'narrowly' : 'works';
}

/** For a plan whose rate is known. */
export function headline(figures: PlanFigures): Headline {
  const { plan, rows, bands, pairs, drifting } = figures;
  const wanted = bands.filter(({ row }) => row.role === 'wanted');
  const count = (...states: BandFigures['state'][]) => wanted.filter(({ state }) => states.includes(state)).length;
  const overlaps = pairs.filter(({ gap }) => gap < 0).length;
  const outcome = outcomeOf(figures);
  const rate = exactFigure(plan.rate!);
  const smallest = wanted.reduce<BandFigures | null>((least, band) => (least === null || band.margin < least.margin ? band : least), null);
  const unread = rows.length - bands.length;
  const { facts } = sentences;
  const objections = [...wanted.filter(({ state }) => state !== 'clear').map(bandObjection), ...pairs.map((pair) => pairObjection(pair, plan.guard)), ...drifting.map((pair) => driftObjection(pair, plan.ppm))];
  return {
    outcome,
    verdict: verdictOf(figures),
    facts: [
      { what: facts.rate, figure: rate },
      { what: facts.allowance, figure: sentences.allowance(exactFigure(plan.guard), exactFigure(plan.ppm)) },
      { what: facts.wanted, figure: String(wanted.length) },
      { what: facts.clear, figure: String(count('clear')) },
      { what: facts.tight, figure: String(count('tight')) },
      { what: facts.crossing, figure: String(count('crosses', 'too wide')) },
      { what: facts.overlaps, figure: String(overlaps) },
      ...(plan.guard > 0 ? [{ what: facts.near, figure: String(pairs.length - overlaps) }] : []),
      ...(smallest ? [{ what: facts.margin, figure: sentences.marginOf(exactFigure(smallest.margin), isolated(smallest.row.name)) }] : []),
    ],
    against: objections.length,
    objections: objections.sort((a, b) => a.severity - b.severity || a.by - b.by).slice(0, OBJECTIONS_TOLD).map(({ sentence }) => sentence()),
    remarks: unread > 0 ? [sentences.asFarAsRead(unread)] : [],
  };
}

/** A band in one sentence, with every figure exactly. */
export function bandSentence({ row, low, high, zone, inverted, imageLow, imageHigh, margin, check }: BandFigures): string {
  return sentences.band({
    name: isolated(row.name), role: row.role, low: exactFigure(low), high: exactFigure(high), zone: String(zone), inverted,
    imageLow: exactFigure(imageLow), imageHigh: exactFigure(imageHigh), margin: exactFigure(margin), check,
  });
}

/** What breaks comes before what is merely near; within that, the larger amount first. */
interface Objection {
  severity: 0 | 1;
  by: number;
  sentence(): string;
}

/** A plan of hundreds of bands can hold thousands of overlaps. */
const OBJECTIONS_TOLD = 50;

function bandObjection({ row, state, check, margin }: BandFigures): Objection {
  const sentence = () => {
    const name = isolated(row.name);
    if (state === 'tight') return sentences.tight(name, exactFigure(margin));
    return state === 'too wide' ? sentences.tooWide(name, exactFigure(margin)) : sentences.crosses(name, check.replace('crosses ', ''), exactFigure(margin));
  };
  return { severity: state === 'tight' ? 1 : 0, by: margin, sentence };
}

function pairObjection({ first, second, gap, low, high }: Pair, guard: number): Objection {
  const names = () => [isolated(first.row.name), isolated(second.row.name)] as const;
  return gap < 0
    ? { severity: 0, by: gap, sentence: () => sentences.overlap(...names(), exactFigure(-gap), exactFigure(low), exactFigure(high)) }
    : { severity: 1, by: gap - guard, sentence: () => sentences.near(...names(), exactFigure(gap), exactFigure(guard)) };
}

const driftObjection = ({ first, second, gap }: Pair, ppm: number): Objection =>
  ({ severity: 1, by: gap, sentence: () => sentences.drift(isolated(first.row.name), isolated(second.row.name), exactFigure(gap), exactFigure(ppm)) });
