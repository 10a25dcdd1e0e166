// The rate ruler as an SVG tree. Colours are pictures.css's business; hatching, outlines and flags are drawn.

import { type Tree, element } from '../element';
import { exactFigure } from '../number-text';
import type { Flag, LaneLayout, Mark, RulerLayout, Text } from './layout';
import { sentences } from './sentences';

/** @param ranges one sentence on the usable ranges, for the description */
export function rulerPicture(layout: RulerLayout, now: number, ranges: string): Tree {
  const { width, height, left, right, usable, lanes, top, axis, window } = layout;
  const line = (className: string, flag: Flag | null) => (flag ? [element('path', { class: className, d: `M${round(flag.x)} ${round(flag.y + 6)}V${round(axis)}` })] : []);
  return element('svg', {
    class: 'ruler', viewBox: `0 0 ${round(width)} ${round(height)}`, width: round(width), height: round(height),
    role: 'img', 'aria-labelledby': 'ruler-title', 'aria-describedby': 'ruler-description',
  },
  element('title', { id: 'ruler-title' }, sentences.title(exactFigure(window.from), exactFigure(window.to))),
  element('desc', { id: 'ruler-description' }, sentences.description(ranges, exactFigure(now))),
  patterns(),
  element('rect', { class: 'lane-ground', ...rectangle(left, usable.top, right - left, usable.height) }),
  element('path', { class: 'grid', d: layout.ticks.map((x) => `M${round(x)} ${round(top)}V${round(axis)}`).join('') }),
  marksPath('usable', usable.marks, usable.top, usable.height, undefined),
  ...lanes.flatMap((lane) => laneParts(lane, left, right)),
  element('path', { class: 'axis', d: `M${round(left)} ${round(axis)}H${round(right)}${layout.ticks.map((x) => `M${round(x)} ${round(axis)}v4`).join('')}` }),
  ...line('now-line', layout.now),
  ...line('candidate-line', layout.candidate),
  ...(layout.now ? [element('path', { class: 'now-flag', d: squareFlag(layout.now) })] : []),
  ...(layout.candidate ? [element('path', { class: 'candidate-flag', d: roundFlag(layout.candidate) })] : []),
  ...layout.texts.map(textElement),
  ...layout.legend.map(({ kind, x, y }) => swatch(kind, x, y)));
}

function patterns(): Tree {
  return element('defs', {},
    element('pattern', { id: 'ruler-forbidden', width: 5, height: 5, patternUnits: 'userSpaceOnUse', patternTransform: 'rotate(45)' },
      element('rect', { class: 'forbidden-ground', width: 5, height: 5 }), element('path', { class: 'forbidden-stripe', d: 'M0 0V5' })));
}

function laneParts({ form, bound, y, height, marks }: LaneLayout, left: number, right: number): Tree[] {
  return [
    element('path', { class: 'lane-line', d: `M${round(left)} ${round(y + height)}H${round(right)}` }),
    marksPath(`forbidden ${form}${bound === 'none' ? '' : ' binding'}`, marks, y, height, form === 'kind' ? 'url(#ruler-forbidden)' : undefined),
  ];
}

function marksPath(className: string, marks: Mark[], y: number, height: number, fill: string | undefined): Tree {
  return element('path', { class: className, fill, d: marks.map(({ x, width }) => `M${round(x)} ${round(y)}h${round(width)}v${round(height)}h${round(-width)}z`).join('') });
}

const squareFlag = ({ x, y }: Flag): string => `M${round(x - 4)} ${round(y - 4)}h8v8h-8z`;
const roundFlag = ({ x, y }: Flag): string => `M${round(x - 6)} ${round(y)}a6 6 0 1 1 12 0a6 6 0 1 1 -12 0z`;

function textElement({ kind, x, y, anchor, text, size }: Text): Tree {
  return element('text', { class: kind, x: round(x), y: round(y + size * 0.35), 'font-size': size, 'text-anchor': anchor }, text);
}

function swatch(kind: RulerLayout['legend'][number]['kind'], x: number, y: number): Tree {
  const mark = [{ x, width: 18 }];
  switch (kind) {
    case 'usable': return marksPath('usable', mark, y - 5, 10, undefined);
    case 'kind': return marksPath('forbidden kind', mark, y - 5, 10, 'url(#ruler-forbidden)');
    case 'rule': return marksPath('forbidden rule', mark, y - 3.5, 7, undefined);
  }
}

const rectangle = (x: number, y: number, width: number, height: number) => ({ x: round(x), y: round(y), width: round(width), height: round(height) });

const round = (pixels: number): number => Math.round(pixels * 100) / 100;
