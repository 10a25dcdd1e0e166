// The lowest part of the zone ladder: every image on the common axis, and where images land on one another.

import { ticks } from 'd3-array';
import type { BandFigures, Pair } from '../figures';
import { type BarLabel, type BarShape, type Frame, LABEL, PAD, SMALL, type Text, inView, pack, place, stretch, text } from './frame';
import { sentences } from '../sentences';
import { textWidth } from '../text-width';

export interface Output {
  top: number;
  /** The line of the axis. */
  axis: number;
  /** Where the ticks stand. */
  ticks: number[];
  /** One for each band, in their order. */
  images: Image[];
  /** Stretches that more than one image lands on. */
  overlaps: { x: number; width: number }[];
  /** Height of the brackets above them. */
  bracket: number;
  texts: Text[];
  bottom: number;
}

export interface Image {
  shape: BarShape;
  label: BarLabel | null;
  /** The parts of it that another image lands on, or that fold onto itself. */
  marks: { x: number; width: number }[];
}

export function layOutput(bands: BandFigures[], pairs: Pair[], frame: Frame, top: number): Output {
  const { left, right, low, high, width } = frame;
  const texts = [text('output', PAD, top + 8, 'start', sentences.output, LABEL, width - 2 * PAD)];
  let y = top + 18;

  const stretches = sharedStretches(bands, pairs).filter((one) => inView(frame, one));
  const shared = new Map<BandFigures, Shared[]>();
  for (const band of bands) shared.set(band, []);
  for (const one of stretches) for (const band of one.bands) shared.get(band)!.push(one);
  const regions = union(stretches);
  const bracket = y + 16;
  if (regions.length > 0) {
    texts.push(...overlapTexts(regions, frame, y + 7));
    y = bracket + 3;
  }

  const packed = pack(bands.map((band) => ({ ...stretch(frame, band.imageLow, band.imageHigh), band, state: '' })), frame, 16, 20);
  const axis = y + packed.count * packed.pitch + 3;
  const images = bands.map((band, i): Image => {
    const { track, label } = packed.placed[i]!;
    const { from, to } = stretch(frame, band.imageLow, band.imageHigh);
    const middle = axis - 2 - (track + 0.5) * packed.pitch;
    const tall = band.sections.length > 1 ? 'none' : band.inverted ? 'left' : 'right';
    return {
      shape: { x: from, width: to - from, y: middle, height: packed.height, tall },
      label: label && { ...label, y: middle, size: packed.size },
      marks: union(shared.get(band)!).map((one) => inPixels(frame, one.low, one.high)),
    };
  });

  const round = ticks(low, high, Math.max(2, Math.floor((right - left) / 60))).filter((tick) => tick > low && tick < high);
  const label = (folded: number) => text('tick', place(frame, folded), axis + 13, 'middle', frame.write(folded), SMALL);
  const ends = [label(low), label(high)];
  const between = round.map(label).filter((one) => ends.every((end) => Math.abs(end.x - one.x) >= (end.width + one.width) / 2 + 6));
  texts.push(...ends, ...between);

  return {
    top: y, axis, images, texts, bracket,
    ticks: [low, ...round, high].map((tick) => place(frame, tick)),
    overlaps: regions.map((region) => inPixels(frame, region.low, region.high)),
    bottom: axis + 20,
  };
}

/** A stretch of the folded axis that two images share, or that one band folds onto itself. */
interface Shared {
  low: number;
  high: number;
  bands: BandFigures[];
  pairs: Pair[];
}

function sharedStretches(bands: BandFigures[], pairs: Pair[]): Shared[] {
  const overlaps = pairs.filter(({ gap }) => gap < 0).map((pair): Shared => ({ low: pair.low, high: pair.high, bands: [pair.first, pair.second], pairs: [pair] }));
  const folds = bands.filter(({ row }) => row.role === 'wanted').flatMap((band) => band.sections.slice(1).map((section, i): Shared => {
    const before = band.sections[i]!;
    return { low: Math.max(before.low, section.low), high: Math.min(before.high, section.high), bands: [band], pairs: [] };
  }));
  return [...overlaps, ...folds];
}

/** Stretches that touch one another become one. */
function union(stretches: Shared[]): Shared[] {
  const joined: Shared[] = [];
  for (const one of [...stretches].sort((a, b) => a.low - b.low)) {
    const last = joined.at(-1);
    if (last && one.low <= last.high) {
      last.high = Math.max(last.high, one.high);
      last.bands.push(...one.bands);
      last.pairs.push(...one.pairs);
    } else {
      joined.push({ ...one, bands: [...one.bands], pairs: [...one.pairs] });
    }
  }
  return joined;
}

/** What the overlaps are, above their brackets: the widest first, in full where there is room, in short where not; the rest is in the list. */
function overlapTexts(regions: Shared[], frame: Frame, y: number): Text[] {
  const { left, right } = frame;
  const texts: Text[] = [];
  for (const region of [...regions].sort((a, b) => (b.high - b.low) - (a.high - a.low))) {
    const { from, to } = stretch(frame, region.low, region.high);
    for (const words of overlapWords(region, frame)) {
      const width = textWidth(words, SMALL);
      const x = Math.min(Math.max((from + to) / 2, left + width / 2), right - width / 2);
      if (texts.some((other) => Math.abs(other.x - x) < (other.width + width) / 2 + 6)) continue;
      texts.push(text('overlap', x, y, 'middle', words, SMALL));
      break;
    }
  }
  return texts;
}

function overlapWords({ pairs }: Shared, frame: Frame): string[] {
  if (pairs.length === 0) return [sentences.selfMark];
  if (pairs.length > 1) return [sentences.overlapsMark(pairs.length), String(pairs.length)];
  const by = frame.write(-pairs[0]!.gap);
  return [sentences.overlapMark(by), by];
}

function inPixels(frame: Frame, low: number, high: number): { x: number; width: number } {
  const { from, to } = stretch(frame, low, high);
  return { x: from, width: to - from };
}
