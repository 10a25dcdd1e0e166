// The zone ladder as numbers: where every bar, line and text stands, in pixels. Pure.
//
// From top to bottom: a heading; a rung for each zone that holds an end of a band, the highest zone on top; what the converter puts
// out; the axis; a legend.

import type { BandFigures, PlanFigures } from '../figures';
import { type Box, type Frame, LABEL, type Link, PAD, SMALL, type Stretch, type Text, boxOf, collide, frameOf, halfOf, inView, place, text } from './frame';
import { type Image, layOutput } from './output';
import { type Piece, type Rung, bandLinks, drawnZones, layRungs } from './rungs';
import { exactFigure } from '../number-text';
import { sentences } from '../sentences';
import type { LadderView } from './view';

export interface LadderLayout {
  width: number;
  height: number;
  frame: Frame;
  /** Top of the first rung. */
  top: number;
  rungs: Rung[];
  links: Link[];
  /** The guard at either end of the axis, as far as it is in view and wide enough to be seen. */
  guards: { x: number; width: number }[];
  bands: BandLayout[];
  outputTop: number;
  axis: number;
  ticks: number[];
  overlaps: { x: number; width: number }[];
  /** Height of the brackets above the overlaps. */
  bracket: number;
  texts: Text[];
  legend: LegendEntry[];
}

/** A band: where it truly is, and where it lands. */
export interface BandLayout {
  figures: BandFigures;
  selected: boolean;
  pieces: Piece[];
  /** Where it goes on from rung to rung. */
  links: Link[];
  image: Image;
}

export interface LegendEntry {
  kind: keyof typeof sentences.legend;
  x: number;
  y: number;
}

export const NARROWEST = 280;
const SWATCH = 18;

/**
 * Lays the ladder out; null where none of the bands is in view. A picture narrower than 280 is laid out for 280. The plan has a rate.
 */
export function ladderLayout(figures: PlanFigures, width: number, view: LadderView): LadderLayout | null {
  const { plan } = figures;
  const half = halfOf(plan.rate!);
  const shown: Stretch = { low: view.from * half, high: view.to === 1 ? half : view.to * half };
  const bands = figures.bands.filter(({ row, sections }) => (view.role === 'all' || row.role === view.role) && sections.some((one) => inView(shown, one)));
  if (bands.length === 0) return null;
  const drawn = new Set(bands);
  const pairs = figures.pairs.filter((pair) => drawn.has(pair.first) && drawn.has(pair.second));
  const zones = drawnZones(bands, shown);
  const frame = frameOf(zones, plan.rate!, shown, Math.max(width, NARROWEST));
  const top = 44;
  const rungs = layRungs(bands, zones, frame, top);
  const output = layOutput(bands, pairs, frame, rungs.bottom + 18);
  const guards = layGuards(plan.guard, frame);
  const legend = layLegend(legendKinds(bands, rungs.rungs, guards.length > 0, output.overlaps.length > 0), frame, output.bottom + 12);
  return {
    width: frame.width,
    height: legend.bottom,
    frame, top,
    rungs: rungs.rungs,
    links: rungs.links,
    guards,
    bands: bands.map((band, i) => {
      const pieces = rungs.pieces.get(band)!;
      return { figures: band, selected: band.row.index === view.selected, pieces, links: bandLinks(pieces, frame), image: output.images[i]! };
    }),
    outputTop: output.top,
    axis: output.axis,
    ticks: output.ticks,
    overlaps: output.overlaps,
    bracket: output.bracket,
    texts: [...headingTexts(plan.rate!, frame, top), ...uncrowded(rungs.texts), ...output.texts, ...legend.texts],
    legend: legend.entries,
  };
}

/** Where texts would collide, the first one stays. */
function uncrowded(texts: Text[]): Text[] {
  const kept: { text: Text; box: Box }[] = [];
  for (const one of texts) {
    const box = boxOf(one);
    if (!kept.some((other) => collide(box, other.box))) kept.push({ text: one, box });
  }
  return kept.map((one) => one.text);
}

function layGuards(guard: number, frame: Frame): { x: number; width: number }[] {
  const reach = Math.min(guard, frame.half / 2);
  return [[0, reach], [frame.half - reach, frame.half]].flatMap(([low, high]) => {
    const from = Math.max(frame.left, place(frame, low!));
    const to = Math.min(frame.right, place(frame, high!));
    return to - from >= 1 ? [{ x: from, width: to - from }] : [];
  });
}

function headingTexts(rate: number, { width }: Frame, top: number): Text[] {
  const rateText = text('rate', width - PAD, 16, 'end', sentences.headingRate(exactFigure(rate)), LABEL);
  return [
    text('heading', PAD, 16, 'start', sentences.heading, 13, width - 2 * PAD - rateText.width - 8),
    rateText,
    text('column', PAD, top - 12, 'start', sentences.zoneColumn, SMALL),
  ];
}

function legendKinds(bands: BandFigures[], rungs: Rung[], guard: boolean, overlaps: boolean): LegendEntry['kind'][] {
  const shown: Record<LegendEntry['kind'], boolean> = {
    wanted: bands.some(({ row }) => row.role === 'wanted'),
    unwanted: bands.some(({ row }) => row.role === 'unwanted'),
    overlap: overlaps,
    inverted: rungs.some(({ inverted }) => inverted),
    guard,
    tall: true,
  };
  return (Object.keys(shown) as LegendEntry['kind'][]).filter((kind) => shown[kind]);
}

/** Entries in lines, as many to a line as have room. */
function layLegend(kinds: LegendEntry['kind'][], { width }: Frame, top: number): { entries: LegendEntry[]; texts: Text[]; bottom: number } {
  const entries: LegendEntry[] = [];
  const texts: Text[] = [];
  let x = PAD;
  let y = top;
  for (const kind of kinds) {
    const words = text('legend', 0, 0, 'start', sentences.legend[kind], SMALL, width - 2 * PAD - SWATCH - 5);
    const entryWidth = SWATCH + 5 + words.width;
    if (x > PAD && x + entryWidth > width - PAD) {
      x = PAD;
      y += 18;
    }
    entries.push({ kind, x, y });
    texts.push({ ...words, x: x + SWATCH + 5, y });
    x += entryWidth + 14;
  }
  return { entries, texts, bottom: y + 9 + PAD };
}
