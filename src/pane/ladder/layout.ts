// The zone ladder as numbers: where every bar, line and text stands, in pixels. Pure.
//
// From top to bottom: a heading; a rung for each zone that holds an end of a band, the highest zone on top; what the converter puts
// out; the axis; a legend.

import type { BandFigures, PlanFigures } from '../figures';
import { type Frame, LABEL, type Link, PAD, SMALL, type Text, frameOf, text } from './frame';
import { type Image, layOutput } from './output';
import { type Piece, type Rung, bandLinks, drawnZones, layRungs } from './rungs';
import { exactFigure } from '../number-text';
import { sentences } from '../sentences';

export interface LadderLayout {
  width: number;
  height: number;
  frame: Frame;
  /** Top of the first rung. */
  top: number;
  rungs: Rung[];
  links: Link[];
  /** Width of the guard at either end of the axis; 0 where it is too narrow to see. */
  guard: number;
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

/** Lays the ladder out. The plan has at least one band that can be drawn; a picture narrower than 280 is laid out for 280. */
export function ladderLayout(figures: PlanFigures, width: number): LadderLayout {
  const { bands, plan } = figures;
  const zones = drawnZones(bands);
  const frame = frameOf(zones, plan.rate!, Math.max(width, NARROWEST));
  const top = 44;
  const rungs = layRungs(bands, zones, frame, top);
  const output = layOutput(figures, frame, rungs.bottom + 18);
  const guard = (Math.min(plan.guard / frame.half, 0.5)) * (frame.right - frame.left);
  const seenGuard = guard >= 1 ? guard : 0;
  const legend = layLegend(legendKinds(bands, rungs.rungs, seenGuard > 0, output.overlaps.length > 0), frame, output.bottom + 12);
  return {
    width: frame.width,
    height: legend.bottom,
    frame, top,
    rungs: rungs.rungs,
    links: rungs.links,
    guard: seenGuard,
    bands: bands.map((band, i) => {
      const pieces = rungs.pieces.get(band)!;
      return { figures: band, pieces, links: bandLinks(pieces), image: output.images[i]! };
    }),
    outputTop: output.top,
    axis: output.axis,
    ticks: output.ticks,
    overlaps: output.overlaps,
    bracket: output.bracket,
    texts: [...headingTexts(plan.rate!, frame, top), ...rungs.texts, ...output.texts, ...legend.texts],
    legend: legend.entries,
  };
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
