// The rungs of the zone ladder: one for each zone that holds an end of a band, the highest on top, and a note where zones are skipped.

import type { BandFigures, Section } from '../figures';
import { type BarLabel, type BarShape, type Frame, type Link, PAD, SMALL, SWING, type Stretch, type Text, inView, pack, stretch, text, trueFrequency } from './frame';
import { isolated, sentences } from '../sentences';

export interface Rung {
  zone: number;
  inverted: boolean;
  top: number;
  /** The line that the bars stand on. */
  line: number;
}

/** A part of a band on a rung, or across the zones between two rungs. */
export interface Piece {
  zone: number;
  lastZone: number;
  /** Of a band that holds 0: whether this is the side below it. */
  mirrored: boolean;
  shape: BarShape;
  label: BarLabel | null;
}

export interface Rungs {
  rungs: Rung[];
  /** Where one rung goes on as the next. */
  links: Link[];
  /** The pieces of each band, from its low end up. */
  pieces: Map<BandFigures, Piece[]>;
  texts: Text[];
  bottom: number;
}

/**
 * The zones that get a rung, the highest first: those that a band in view doesn't merely pass through. Where the ends of a band that fills
 * many zones are out of view, the first and the last that it fills stand for them.
 */
export function drawnZones(bands: BandFigures[], view: Stretch): number[] {
  const sections = bands.flatMap((band) => band.sections.filter((one) => inView(view, one)));
  const zones = new Set(sections.filter((one) => one.zone === one.lastZone).map(({ zone }) => zone));
  for (const { zone, lastZone } of sections) {
    if (zone === lastZone) continue;
    if (!zones.has(zone - 1)) zones.add(zone);
    if (!zones.has(lastZone + 1)) zones.add(lastZone);
  }
  return [...zones].sort((a, b) => b - a);
}

/** How close rungs stand, and what is said on them. */
interface Density {
  /** Most tracks on a rung for bars with names, and for bars with numbers. */
  named: number;
  numbered: number;
  gap: number;
  /** Whether skipped zones are told in words. */
  words: boolean;
}

/** From the roomiest on, as far as the rungs need to move together. */
const DENSITIES: Density[] = [
  { named: 8, numbered: 10, gap: 10, words: true },
  { named: 3, numbered: 4, gap: 8, words: true },
  { named: 0, numbered: 1, gap: 6, words: false },
  { named: 0, numbered: 0, gap: 2, words: false },
];

/** Height beyond which rungs move together. The last density is squeezed into it. */
const MOST_HEIGHT = 1000;

export function layRungs(bands: BandFigures[], zones: number[], frame: Frame, top: number): Rungs {
  for (const density of DENSITIES) {
    const found = layDensity(bands, zones, frame, top, density);
    if (found.bottom - top <= MOST_HEIGHT) return found;
    if (density === DENSITIES.at(-1)) return squeeze(found, top);
  }
  throw new Error('unreachable: the last density is taken');
}

function layDensity(bands: BandFigures[], zones: number[], frame: Frame, top: number, density: Density): Rungs {
  const found: Rungs = { rungs: [], links: [], pieces: new Map(bands.map((band) => [band, []])), texts: [], bottom: top };
  zones.forEach((zone, i) => {
    const above = zones[i - 1];
    if (above !== undefined && above - zone > 1) laySkip(found, bands, zone + 1, above - 1, frame, density);
    else if (i > 0) found.bottom += density.gap;
    layRung(found, bands, zone, frame, density);
  });
  for (const pieces of found.pieces.values()) pieces.reverse();
  layEnds(found, frame);
  return found;
}

/** Hundreds of zones: everything moves together evenly. */
function squeeze(found: Rungs, top: number): Rungs {
  const factor = MOST_HEIGHT / (found.bottom - top);
  const y = (old: number) => top + (old - top) * factor;
  const squeezed = (piece: Piece): Piece => ({ ...piece, shape: { ...piece.shape, y: y(piece.shape.y), height: piece.shape.height * factor } });
  return {
    rungs: found.rungs.map((rung) => ({ ...rung, top: y(rung.top), line: y(rung.line) })),
    links: found.links.map((link) => ({ ...link, from: y(link.from), to: y(link.to) })),
    pieces: new Map([...found.pieces].map(([band, pieces]) => [band, pieces.map(squeezed)])),
    texts: found.texts.map((one) => ({ ...one, y: y(one.y) })),
    bottom: y(found.bottom),
  };
}

function layRung(found: Rungs, bands: BandFigures[], zone: number, frame: Frame, { named, numbered }: Density): void {
  const held = sectionsIn(bands, zone, zone, frame);
  const { placed, count, pitch, height, size } = pack(
    held.map(({ band, section }) => ({ ...stretch(frame, section.low, section.high), band, state: stateOf(band) })), frame, named, numbered,
  );
  const line = found.bottom + count * pitch + 3;
  held.forEach(({ band, section }, i) => {
    const { track, label } = placed[i]!;
    const { from, to } = stretch(frame, section.low, section.high);
    const y = line - 2 - (track + 0.5) * pitch;
    const shape: BarShape = { x: from, width: to - from, y, height, tall: zone % 2 === 1 ? 'right' : 'left' };
    found.pieces.get(band)!.push({ zone, lastZone: zone, mirrored: section.mirrored, shape, label: label && { ...label, y, size } });
  });
  found.rungs.push({ zone, inverted: zone % 2 === 0, top: found.bottom, line });
  found.texts.push(text('zone', PAD + frame.markWidth / 2, line, 'middle', String(zone), SMALL, frame.markWidth - 6));
  found.bottom = line;
}

/** The zones between two rungs: who fills them, if anyone. */
function laySkip(found: Rungs, bands: BandFigures[], zone: number, lastZone: number, frame: Frame, { words, gap }: Density): void {
  const { left, right } = frame;
  const through = sectionsIn(bands, zone, lastZone, frame);
  const y = found.bottom + (words ? 20 : gap);
  if (words) found.texts.push(text('skip', (left + right) / 2, y - 9, 'middle', skipWords(zone, lastZone, through.map(({ band }) => band)), SMALL, right - left));
  const thin = Math.min(5, 40 / through.length);
  through.forEach(({ band, section }, i) => {
    const shape: BarShape = { x: left, width: right - left, y: y + (i + 0.5) * thin, height: thin - 1, tall: 'none' };
    found.pieces.get(band)!.push({ zone, lastZone, mirrored: section.mirrored, shape, label: null });
  });
  found.bottom = y + through.length * thin;
}

function skipWords(zone: number, lastZone: number, through: BandFigures[]): string {
  const by = through.length === 1 ? isolated(through[0]!.row.name) : sentences.bands(through.length);
  if (zone === lastZone) return through.length === 0 ? sentences.emptyZone(String(zone)) : sentences.filledZone(String(zone), by);
  return through.length === 0
    ? sentences.emptyZones(String(zone), String(lastZone)) : sentences.filledZones(String(zone), String(lastZone), by);
}

const sectionsIn = (bands: BandFigures[], zone: number, lastZone: number, view: Stretch): { band: BandFigures; section: Section }[] =>
  bands.flatMap((band) => band.sections.filter((one) => one.zone <= zone && lastZone <= one.lastZone && inView(view, one)).map((section) => ({ band, section })));

/** What is said beside the name of a wanted band that is not clear. */
function stateOf({ row, state, check }: BandFigures): string {
  return row.role === 'wanted' && state !== 'clear' ? sentences.beside(check) : '';
}

/** The links between neighbouring rungs where the end of the axis is in view, and the true frequency at every end. */
function layEnds(found: Rungs, frame: Frame): void {
  const { rungs, links, texts } = found;
  const write = (side: Link['side'], zone: number, y: number) => {
    const [x, folded] = side === 'left' ? [frame.left - SWING - 3, frame.low] : [frame.right + SWING + 3, frame.high];
    texts.push(text('edge', x, y, side === 'left' ? 'end' : 'start', frame.write(trueFrequency(zone, folded, frame.rate)), SMALL));
  };
  rungs.forEach(({ zone, line }, i) => {
    const upper = upperSide(zone);
    const lower = upper === 'left' ? 'right' : 'left';
    const above = rungs[i - 1];
    if (above?.zone === zone + 1 && isEnd(frame, upper)) {
      links.push({ side: upper, from: above.line, to: line });
      write(upper, zone, (above.line + line) / 2);
    } else {
      write(upper, zone, line);
    }
    if (!(rungs[i + 1]?.zone === zone - 1 && isEnd(frame, lower))) write(lower, zone, line);
  });
}

/** Where the upper edge of a zone stands. */
export const upperSide = (zone: number): Link['side'] => (zone % 2 === 1 ? 'right' : 'left');

/** Whether a side of the picture is an end of the axis, where zones go on from one to the next. */
const isEnd = ({ low, high, half }: Frame, side: Link['side']): boolean => (side === 'left' ? low === 0 : high === half);

/** Where a band goes on from piece to piece. */
export function bandLinks(pieces: Piece[], frame: Frame): Link[] {
  const links: Link[] = [];
  const branches = [pieces.filter(({ mirrored }) => !mirrored), pieces.filter(({ mirrored }) => mirrored)] as const;
  for (const branch of branches) {
    branch.slice(1).forEach((piece, i) => {
      const before = branch[i]!;
      if (piece.zone === before.lastZone + 1) links.push({ side: upperSide(before.lastZone), from: piece.shape.y, to: before.shape.y });
    });
  }
  const [onwards, mirrored] = [branches[0][0], branches[1][0]];
  if (onwards?.zone === 1 && mirrored?.zone === 1) links.push({ side: 'left', from: onwards.shape.y, to: mirrored.shape.y });
  return links.filter(({ side }) => isEnd(frame, side));
}
