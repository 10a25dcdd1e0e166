// What all parts of the zone ladder share: the folded axis in pixels, texts, and bars with their labels.

import type { BandFigures } from '../figures';
import { figureWriter } from '../number-text';
import { isolated, sentences } from '../sentences';
import { fitText, textWidth } from '../text-width';
import { type PlacedBar, type PlacedLabel, placeInTracks } from './tracks';

export interface Frame {
  width: number;
  rate: number;
  /** Half the rate. */
  half: number;
  /** The stretch of the folded axis that is shown, 0 ≤ low < high ≤ half, and where its ends stand. */
  low: number;
  high: number;
  left: number;
  right: number;
  /** Width of the marks with the numbers of the zones. */
  markWidth: number;
  /** Writes a frequency as short as this picture needs it. */
  write(frequency: number): string;
}

export interface Text {
  kind: 'heading' | 'rate' | 'column' | 'edge' | 'zone' | 'skip' | 'output' | 'tick' | 'overlap' | 'legend';
  /** The point that the anchor stands on; y is the middle. */
  x: number;
  y: number;
  anchor: PlacedLabel['anchor'];
  text: string;
  width: number;
  size: number;
}

/** A text or a label as the rectangle that it fills. */
export function boxOf({ x, y, anchor, width, size }: Pick<Text, 'x' | 'y' | 'anchor' | 'width' | 'size'>): Box {
  const left = x - { start: 0, middle: width / 2, end: width }[anchor];
  return { left, right: left + width, top: y - size / 2, bottom: y + size / 2 };
}

export interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

export const collide = (a: Box, b: Box): boolean => a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;

export interface BarShape {
  x: number;
  width: number;
  /** The middle. */
  y: number;
  height: number;
  /** The end that is the band's high edge stands taller; none where a bar has no one direction. */
  tall: 'left' | 'right' | 'none';
}

export interface BarLabel extends PlacedLabel {
  y: number;
  size: number;
}

/** A line around the end of the rungs, from one height to another. */
export interface Link {
  side: 'left' | 'right';
  from: number;
  to: number;
}

export const PAD = 8;
export const LABEL = 11;
export const SMALL = 10;
/** How far a link swings out at the end of a rung. */
export const SWING = 9;

const NARROWEST_BAR = 2;
const WIDEST_MARK = 44;

/** The frame of a picture whose rungs are these zones. The fewer digits the ends of the rungs need, the more room is left to the axis. */
export function frameOf(zones: number[], rate: number, { low, high }: Stretch, width: number): Frame {
  const half = halfOf(rate);
  const writer = figureWriter(half);
  const markWidth = Math.max(18, ...zones.map((zone) => Math.min(WIDEST_MARK, textWidth(String(zone), SMALL) + 8)));
  for (let digits = 7; ; digits--) {
    const write = (frequency: number) => writer(frequency, digits);
    const widest = (ends: number[]) => Math.max(...ends.map((end) => textWidth(write(end), SMALL)));
    const leftEnds = widest(zones.map((zone) => trueFrequency(zone, low, rate)));
    const rightEnds = widest([high, ...zones.map((zone) => trueFrequency(zone, high, rate))]);
    const left = PAD + markWidth + 6 + leftEnds + 3 + SWING;
    const right = width - PAD - rightEnds - 3 - SWING;
    if (right - left >= width * 0.55 || digits === 4) return { width, rate, half, low, high, left, right, markWidth, write };
  }
}

/** A stretch of the folded axis. */
export interface Stretch {
  low: number;
  high: number;
}

export const halfOf = (rate: number): number => Number((rate / 2).toPrecision(15));

/** The frequency of a zone that lands on a folded frequency: even zones run from right to left. */
export function trueFrequency(zone: number, folded: number, rate: number): number {
  if (folded === 0 || folded === halfOf(rate)) return (rate * ((zone % 2 === 1) === (folded === 0) ? zone - 1 : zone)) / 2;
  return zone % 2 === 1 ? (rate * (zone - 1)) / 2 + folded : (rate * zone) / 2 - folded;
}

/** Pixels from a folded frequency. */
export const place = ({ left, right, low, high }: Frame, folded: number): number => left + ((folded - low) / (high - low)) * (right - left);

export const inView = (view: Stretch, { low, high }: Stretch): boolean => low <= view.high && view.low <= high;

/** The part in view of a stretch of the folded axis, in pixels, wide enough to be seen. */
export function stretch(frame: Frame, low: number, high: number): { from: number; to: number } {
  const from = place(frame, Math.min(Math.max(low, frame.low), frame.high));
  const to = place(frame, Math.min(Math.max(high, frame.low), frame.high));
  if (to - from >= NARROWEST_BAR) return { from, to };
  const start = Math.min(Math.max((from + to - NARROWEST_BAR) / 2, frame.left), frame.right - NARROWEST_BAR);
  return { from: start, to: start + NARROWEST_BAR };
}

export function text(kind: Text['kind'], x: number, y: number, anchor: Text['anchor'], words: string, size: number, most = Infinity): Text {
  const kept = fitText(words, size, most);
  return { kind, x, y, anchor, text: kept, width: textWidth(kept, size), size };
}

/** What a bar stands for. */
export interface BandBar {
  from: number;
  to: number;
  band: BandFigures;
  /** What is said beside its name. */
  state: string;
}

export interface Packed {
  placed: PlacedBar[];
  count: number;
  /** Height of a track, and of a bar in it. */
  pitch: number;
  height: number;
  size: number;
}

/** Bars in tracks, called by their names; by their numbers where names would take more tracks than `named`, by nothing beyond `numbered`. */
export function pack(bars: BandBar[], { left, right }: Frame, named: number, numbered: number): Packed {
  const mostName = Math.max(80, (right - left) / 2);
  const attempts = [
    { most: named, pitch: 15, size: LABEL, apart: 6, call: ({ band, state }: BandBar) => ({ text: isolated(fitText(band.row.name, LABEL, mostName)), suffix: state }) },
    { most: numbered, pitch: 13, size: SMALL, apart: 6, call: ({ band }: BandBar) => ({ text: sentences.numbered(band.number), suffix: '' }) },
  ];
  for (const { most, pitch, size, apart, call } of attempts) {
    const placed = most > 0 ? placeInTracks(bars.map((bar) => ({ from: bar.from, to: bar.to, ...call(bar) })), left, right, size, apart, most) : null;
    if (placed) return { placed, count: tracksOf(placed), pitch, height: pitch - 4, size };
  }
  const placed = placeInTracks(bars.map(({ from, to }) => ({ from, to, text: '', suffix: '' })), left, right, 0, 1)!;
  const count = tracksOf(placed);
  const pitch = Math.min(5, Math.max(1.5, 120 / count));
  return { placed, count, pitch, height: pitch * 0.8, size: 0 };
}

const tracksOf = (placed: PlacedBar[]): number => 1 + Math.max(-1, ...placed.map(({ track }) => track));
