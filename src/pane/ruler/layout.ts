// The rate ruler as numbers: where every lane, mark and text stands, in pixels. Pure.
//
// From top to bottom: a heading; the flags of the rate now and of the candidate; the usable rates; a lane for each kind of rule, and under
// it one for each of its rules that matter most; the axis; a legend.

import { ticks } from 'd3-array';
import type { PlanRange } from '../../engine';
import { exactFigure, figureWriter } from '../number-text';
import { fitText, textWidth } from '../text-width';
import type { Bound, Lane, Lanes } from './lanes';
import { type RulesOf, ruleWords } from './rules';
import { sentences } from './sentences';
import type { RateWindow } from './window';

export interface RulerInput {
  window: RateWindow;
  now: number;
  candidate: number;
  /** null while they are being computed for the first time. */
  ranges: readonly PlanRange[] | null;
  lanes: Lanes | null;
  rules: RulesOf;
}

export interface RulerLayout {
  width: number;
  height: number;
  window: RateWindow;
  /** Where the ends of the window stand. */
  left: number;
  right: number;
  usable: { top: number; height: number; marks: Mark[] };
  lanes: LaneLayout[];
  /** Top of what the lines of the rates cross. */
  top: number;
  axis: number;
  ticks: number[];
  now: Flag | null;
  candidate: Flag | null;
  texts: Text[];
  legend: { kind: keyof typeof sentences.legend; x: number; y: number }[];
}

export interface Mark {
  x: number;
  width: number;
}

export interface LaneLayout {
  /** A kind of rule, or one rule. */
  form: 'kind' | 'rule';
  bound: Bound;
  y: number;
  height: number;
  marks: Mark[];
}

/** The line of a rate, and where its flag stands. */
export interface Flag {
  x: number;
  y: number;
}

export interface Text {
  kind: 'heading' | 'window' | 'lane' | 'rule' | 'flag' | 'tick' | 'legend';
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
  text: string;
  width: number;
  size: number;
}

export const NARROWEST = 280;
const PAD = 8;
const LABEL = 11;
const SMALL = 10;
const SWATCH = 18;
/** From this width on, labels stand beside their lanes, else above them. */
const BESIDE_FROM = 440;
const NARROWEST_MARK = 1.5;
/** Marks nearer than this are drawn as one. */
const JOINED = 0.5;

/** A picture narrower than 280 is laid out for 280. */
export function rulerLayout(input: RulerInput, given: number): RulerLayout {
  const { window, now, candidate } = input;
  const width = Math.max(given, NARROWEST);
  const labels = (input.lanes?.lanes ?? []).map((lane) => laneLabel(lane, input.rules));
  const beside = width >= BESIDE_FROM;
  const gutter = beside ? Math.min(width * 0.34, Math.max(60, ...labels.map((label) => textWidth(label, SMALL)))) + 8 : 0;
  const [left, right] = [PAD + gutter, width - PAD];
  const place = (rate: number) => left + ((rate - window.from) / (window.to - window.from)) * (right - left);
  const inside = (rate: number) => rate >= window.from && rate <= window.to;
  const writer = figureWriter(window.to);
  const texts: Text[] = [];
  const add = (kind: Text['kind'], x: number, y: number, anchor: Text['anchor'], words: string, size: number, most = Infinity) => {
    const kept = fitText(words, size, most);
    texts.push({ kind, x, y, anchor, text: kept, width: textWidth(kept, size), size });
    return texts.at(-1)!;
  };

  add('heading', PAD, 16, 'start', sentences.heading, 13, width - 2 * PAD);
  const flag = (rate: number, words: string, flagY: number): Flag | null => {
    if (!inside(rate)) {
      const below = rate < window.from;
      add('flag', below ? left : right, flagY, below ? 'start' : 'end', below ? sentences.outOfViewBelow(words) : sentences.outOfViewAbove(words), LABEL);
      return null;
    }
    const x = place(rate);
    const room = textWidth(words, LABEL);
    const toRight = x + 10 + room <= width - PAD;
    add('flag', toRight ? x + 10 : Math.max(x - 10, PAD + room), flagY, toRight ? 'start' : 'end', words, LABEL);
    return { x, y: flagY };
  };
  const flags = { candidate: flag(candidate, sentences.candidate(exactFigure(candidate)), 38), now: flag(now, sentences.now(exactFigure(now)), 55) };

  const top = 66;
  let y = top;
  const label = (words: string, kind: Text['kind'], height: number) => {
    if (beside) add(kind, left - 8, y + height / 2, 'end', words, SMALL, gutter - 8);
    else {
      add(kind, left, y + 6, 'start', words, SMALL, right - left);
      y += 13;
    }
  };
  label(sentences.usable, 'lane', 16);
  const usable = { top: y, height: 16, marks: marksOf((input.ranges ?? []).map(({ lowest, highest }) => ({ low: lowest, high: highest ?? window.to })), place, left, right) };
  y += 22;

  const lanes = (input.lanes?.lanes ?? []).map((lane, i): LaneLayout => {
    const form = lane.rule ? 'rule' : 'kind';
    const height = form === 'kind' ? 10 : 7;
    if (form === 'kind' && i > 0) y += 4;
    label(labels[i]!, form === 'kind' ? 'lane' : 'rule', height);
    const laid: LaneLayout = { form, bound: lane.bound, y, height, marks: marksOf(lane.stretches, place, left, right) };
    y += height + (beside ? 5 : 4);
    return laid;
  });

  const axis = y + 4;
  const round = ticks(window.from, window.to, Math.max(2, Math.floor((right - left) / 70))).filter((tick) => tick > window.from && tick < window.to);
  const digits = Math.min(15, Math.max(7, 2 + Math.ceil(Math.log10(window.to / (window.to - window.from)))));
  const ends = [add('tick', left, axis + 13, beside ? 'middle' : 'start', writer(window.from, digits), SMALL), add('tick', right, axis + 13, 'end', writer(window.to, digits), SMALL)];
  for (const tick of round) {
    const words = writer(tick, digits);
    const half = textWidth(words, SMALL) / 2;
    const x = place(tick);
    if (ends.every((end) => x + half + 6 <= startOf(end) || startOf(end) + end.width + 6 <= x - half)) ends.push(add('tick', x, axis + 13, 'middle', words, SMALL));
  }

  const legend = layLegend(input, axis + 32, width, add);
  return {
    width, window, left, right, usable, lanes, top, axis, texts,
    height: legend.bottom,
    ticks: [window.from, ...round, window.to].map(place),
    ...flags,
    legend: legend.entries,
  };
}

const startOf = ({ x, anchor, width }: Text): number => x - { start: 0, middle: width / 2, end: width }[anchor];

function laneLabel({ kind, rule, rules, bound }: Lane, of: RulesOf): string {
  if (!rule) return sentences.kindLane(sentences.kinds[kind], rules);
  const mark = sentences.bound[bound];
  return `${mark === '' ? '' : `${mark} `}${ruleWords(rule, of, 'rules')}`;
}

/** Stretches of rates in pixels, ascending, wide enough to be seen; those that no one could tell apart are one. */
function marksOf(stretches: { low: number; high: number }[], place: (rate: number) => number, left: number, right: number): Mark[] {
  const marks: Mark[] = [];
  for (const { low, high } of stretches) {
    const [begin, end] = [Math.max(place(low), left), Math.min(place(high), right)];
    if (end < begin) continue;
    const width = Math.max(end - begin, NARROWEST_MARK);
    const x = Math.min(Math.max((begin + end - width) / 2, left), right - width);
    const last = marks.at(-1);
    if (last && x - last.x - last.width < JOINED) last.width = Math.max(last.width, x + width - last.x);
    else marks.push({ x, width });
  }
  return marks;
}

function layLegend({ lanes, ranges, candidate }: RulerInput, top: number, width: number, add: (...text: [Text['kind'], number, number, Text['anchor'], string, number, number?]) => Text) {
  const shown: Record<keyof typeof sentences.legend, boolean> = {
    usable: (ranges?.length ?? 0) > 0, kind: (lanes?.total ?? 0) > 0, rule: (lanes?.drawn ?? 0) > 0,
  };
  const entries: RulerLayout['legend'] = [];
  let [x, y] = [PAD, top];
  for (const kind of Object.keys(shown) as (keyof typeof shown)[]) {
    if (!shown[kind]) continue;
    const words = sentences.legend[kind];
    const room = SWATCH + 5 + textWidth(words, SMALL);
    if (x > PAD && x + room > width - PAD) [x, y] = [PAD, y + 18];
    entries.push({ kind, x, y });
    add('legend', x + SWATCH + 5, y, 'start', words, SMALL, width - PAD - x - SWATCH - 5);
    x += room + 14;
  }
  if (lanes && lanes.lanes.some(({ bound }) => bound !== 'none')) {
    y += 18;
    add('legend', PAD, y, 'start', sentences.boundLegend(exactFigure(candidate)), SMALL, width - 2 * PAD);
  }
  return { entries, bottom: y + 9 + PAD };
}
