// Bars with their labels in as few tracks as keep them from touching.

import { fitText, textWidth } from '../text-width';

export interface Bar {
  from: number;
  to: number;
  /** What is cut short where room is scarce, and what stands behind it in full. */
  text: string;
  suffix: string;
}

export interface PlacedBar {
  /** From 0. */
  track: number;
  label: PlacedLabel | null;
}

export interface PlacedLabel {
  /** The point that the label's anchor stands on. */
  x: number;
  anchor: 'start' | 'middle' | 'end';
  inside: boolean;
  text: string;
  suffix: string;
  width: number;
}

/** Space between a bar and its label. */
const BESIDE = 5;

/**
 * Places bars between left and right, each in the lowest track where neither it nor its label touches another. A label stands
 * inside its bar where it has room there, else to the right of it, else to the left. null where that takes more than `most` tracks.
 * @param size of the labels' font
 * @param apart least space between one bar with its label and the next one
 */
export function placeInTracks(bars: Bar[], left: number, right: number, size: number, apart: number, most = Infinity): PlacedBar[] | null {
  const placed: PlacedBar[] = new Array(bars.length);
  const tracks: Extent[][] = [];
  const order = bars.map((_, i) => i).sort((i, j) => bars[i]!.from - bars[j]!.from || bars[j]!.to - bars[i]!.to || i - j);
  for (const i of order) {
    const bar = bars[i]!;
    const choices = labelChoices(bar, left, right, size).map((label) => ({ label, extent: extent(bar, label) }));
    for (let track = 0; placed[i] === undefined; track++) {
      if (track >= most) return null;
      const taken = (tracks[track] ??= []);
      const choice = choices.find((one) => isFree(taken, one.extent, apart));
      if (choice === undefined) continue;
      taken.push(choice.extent);
      placed[i] = { track, label: choice.label };
    }
  }
  return placed;
}

interface Extent {
  from: number;
  to: number;
}

/** What is in the way was mostly placed last. */
const isFree = (taken: Extent[], { from, to }: Extent, apart: number): boolean =>
  taken.findLast((other) => to + apart > other.from && other.to + apart > from) === undefined;

function extent({ from, to }: Bar, label: PlacedLabel | null): Extent {
  if (!label) return { from, to };
  const start = label.x - { start: 0, middle: label.width / 2, end: label.width }[label.anchor];
  return { from: Math.min(from, start), to: Math.max(to, start + label.width) };
}

/** Where the label may stand, best first; only null where there is no label or no room at all. */
function labelChoices(bar: Bar, left: number, right: number, size: number): (PlacedLabel | null)[] {
  const { from, to, text, suffix } = bar;
  if (text === '' && suffix === '') return [null];
  const whole = textWidth(text, size) + textWidth(suffix, size);
  const inside = to - from - 2 * BESIDE;
  const toRight = right - to - BESIDE;
  const toLeft = from - left - BESIDE;
  const places = [
    { room: inside, x: (from + to) / 2, anchor: 'middle', inside: true },
    { room: toRight, x: to + BESIDE, anchor: 'start', inside: false },
    { room: toLeft, x: from - BESIDE, anchor: 'end', inside: false },
  ] as const;
  const roomy = places.filter(({ room }) => whole <= room);
  if (roomy.length > 0) return roomy.map(({ room: _, ...place }) => ({ ...place, text, suffix, width: whole }));
  const { room, ...place } = places.reduce((most, one) => (one.room > most.room ? one : most));
  const kept = fitText(text, size, room - textWidth(suffix, size));
  if (kept !== '') return [{ ...place, text: kept, suffix, width: textWidth(kept, size) + textWidth(suffix, size) }];
  const short = fitText(text, size, room);
  return [short === '' ? null : { ...place, text: short, suffix: '', width: textWidth(short, size) }];
}
