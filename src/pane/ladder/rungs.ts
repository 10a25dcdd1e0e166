// The rungs of the zone ladder: one for each zone that holds an end of a band, the highest on top, and a note where zones are skipped.

import type { BandFigures, Section } from '../figures';
import { type BarLabel, type BarShape, type Frame, type Link, SMALL, SWING, type Text, PAD, edgeAt, pack, stretch, text } from './frame';
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

/** The zones that get a rung, the highest first: those that a band doesn't merely pass through. */
export function drawnZones(bands: BandFigures[]): number[] {
  const zones = bands.flatMap(({ sections }) => sections.filter(({ zone, lastZone }) => zone === lastZone).map(({ zone }) => zone));
  return [...new Set(zones)].sort((a, b) => b - a);
}

export function layRungs(bands: BandFigures[], zones: number[], frame: Frame, top: number): Rungs {
  const found: Rungs = { rungs: [], links: [], pieces: new Map(bands.map((band) => [band, []])), texts: [], bottom: top };
  zones.forEach((zone, i) => {
    const above = zones[i - 1];
    if (above !== undefined && above - zone > 1) laySkip(found, bands, zone + 1, above - 1, frame);
    else if (i > 0) found.bottom += 10;
    layRung(found, bands, zone, frame);
  });
  for (const pieces of found.pieces.values()) pieces.reverse();
  layEnds(found, frame);
  return found;
}

function layRung(found: Rungs, bands: BandFigures[], zone: number, frame: Frame): void {
  const held = sectionsIn(bands, zone, zone);
  const { placed, count, pitch, height, size } = pack(
    held.map(({ band, section }) => ({ ...stretch(frame, section.low, section.high), band, state: stateOf(band) })), frame, 5, 8,
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
function laySkip(found: Rungs, bands: BandFigures[], zone: number, lastZone: number, frame: Frame): void {
  const { left, right } = frame;
  const through = sectionsIn(bands, zone, lastZone);
  const y = found.bottom + 11;
  found.texts.push(text('skip', (left + right) / 2, y, 'middle', skipWords(zone, lastZone, through.map(({ band }) => band)), SMALL, right - left));
  const thin = Math.min(5, 40 / through.length);
  through.forEach(({ band, section }, i) => {
    const shape: BarShape = { x: left, width: right - left, y: y + 9 + (i + 0.5) * thin, height: thin - 1, tall: 'none' };
    found.pieces.get(band)!.push({ zone, lastZone, mirrored: section.mirrored, shape, label: null });
  });
  found.bottom = y + 9 + through.length * thin;
}

function skipWords(zone: number, lastZone: number, through: BandFigures[]): string {
  const by = through.length === 1 ? isolated(through[0]!.row.name) : sentences.bands(through.length);
  if (zone === lastZone) return through.length === 0 ? sentences.emptyZone(String(zone)) : sentences.filledZone(String(zone), by);
  return through.length === 0
    ? sentences.emptyZones(String(zone), String(lastZone)) : sentences.filledZones(String(zone), String(lastZone), by);
}

const sectionsIn = (bands: BandFigures[], zone: number, lastZone: number): { band: BandFigures; section: Section }[] =>
  bands.flatMap((band) => band.sections.filter((one) => one.zone <= zone && lastZone <= one.lastZone).map((section) => ({ band, section })));

/** What is said beside the name of a wanted band that is not clear. */
function stateOf({ row, state, check }: BandFigures): string {
  return row.role === 'wanted' && state !== 'clear' ? sentences.beside(check) : '';
}

/** The links between neighbouring rungs, and the true frequency at every end. */
function layEnds(found: Rungs, frame: Frame): void {
  const { rungs, links, texts } = found;
  const write = (side: Link['side'], zone: number, y: number) => {
    const x = side === 'left' ? frame.left - SWING - 3 : frame.right + SWING + 3;
    texts.push(text('edge', x, y, side === 'left' ? 'end' : 'start', frame.write(edgeAt(side, zone, frame.rate)), SMALL));
  };
  rungs.forEach(({ zone, line }, i) => {
    const upper = upperSide(zone);
    const above = rungs[i - 1];
    const below = rungs[i + 1];
    if (above?.zone === zone + 1) {
      links.push({ side: upper, from: above.line, to: line });
      write(upper, zone, (above.line + line) / 2);
    } else {
      write(upper, zone, line);
    }
    if (below?.zone !== zone - 1) write(upper === 'left' ? 'right' : 'left', zone, line);
  });
}

/** Where the upper edge of a zone stands. */
export const upperSide = (zone: number): Link['side'] => (zone % 2 === 1 ? 'right' : 'left');

/** Where a band goes on from piece to piece. */
export function bandLinks(pieces: Piece[]): Link[] {
  const links: Link[] = [];
  const branches = [pieces.filter(({ mirrored }) => !mirrored), pieces.filter(({ mirrored }) => mirrored)] as const;
  for (const branch of branches) {
    branch.slice(1).forEach((piece, i) => links.push({ side: upperSide(branch[i]!.lastZone), from: piece.shape.y, to: branch[i]!.shape.y }));
  }
  const [onwards, mirrored] = [branches[0][0], branches[1][0]];
  if (onwards && mirrored) links.push({ side: 'left', from: onwards.shape.y, to: mirrored.shape.y });
  return links;
}
