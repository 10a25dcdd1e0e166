// The zone ladder as an SVG tree. Colours and lines are pane.css's business; what must not depend on colour is drawn: hatching,
// slopes, brackets, outlines.

import { type Tree, element } from '../element';
import type { BarLabel, BarShape, Link, Text } from './frame';
import { PAD, SWING } from './frame';
import type { BandLayout, LadderLayout, LegendEntry } from './layout';
import type { Rung } from './rungs';
import { bandSentence } from '../words';
import { exactFigure } from '../number-text';
import { sentences } from '../sentences';

/**
 * The picture. Each band is one focusable group, in the order of the plan, that carries its row in `data-row`.
 * @param verdict one sentence on the rate, for the description
 */
export function ladderPicture(layout: LadderLayout, verdict: string): Tree {
  const { width, height, frame } = layout;
  return element('svg', {
    class: 'ladder', viewBox: `0 0 ${round(width)} ${round(height)}`, width: round(width), height: round(height),
    role: 'group', 'aria-labelledby': 'ladder-title', 'aria-describedby': 'ladder-description',
  },
  element('title', { id: 'ladder-title' }, sentences.ladderTitle(exactFigure(frame.rate))),
  element('desc', { id: 'ladder-description' }, sentences.ladderDescription(exactFigure(frame.half), verdict)),
  patterns(),
  element('g', { class: 'ground', 'aria-hidden': 'true' }, ...ground(layout)),
  ...layout.bands.map((band) => bandGroup(band, layout)),
  element('g', { class: 'words', 'aria-hidden': 'true' }, ...overlapBrackets(layout), ...layout.texts.map(textElement), ...layout.legend.map(legendSwatch)));
}

/** The lines that a pattern is made of take their colours from pane.css, through their classes. */
function patterns(): Tree {
  const stripes = (id: string, angle: number, size: number, ...lines: Tree[]) =>
    element('pattern', { id, width: size, height: size, patternUnits: 'userSpaceOnUse', patternTransform: `rotate(${angle})` }, ...lines);
  return element('defs', {},
    stripes('ladder-unwanted', 45, 5, element('rect', { class: 'unwanted-ground', width: 5, height: 5 }), element('path', { class: 'unwanted-stripe', d: 'M0 0V5' })),
    stripes('ladder-overlap', -45, 4, element('path', { class: 'overlap-stripe', d: 'M0 0V4M0 0H4' })));
}

// Ground: what lies behind the bands

function ground(layout: LadderLayout): Tree[] {
  const { frame: { left, right }, top, axis, guards, ticks, rungs, links, overlaps, outputTop } = layout;
  const marked = new Set(layout.texts.flatMap(({ kind, y }) => (kind === 'zone' ? [y] : [])));
  return [
    ...rungs.map((rung) => element('rect', { class: rung.inverted ? 'rung inverted' : 'rung', ...rectangle(left, rung.top, right - left, rung.line - rung.top) })),
    element('rect', { class: 'rung output', ...rectangle(left, outputTop, right - left, axis - outputTop) }),
    ...guards.map(({ x, width }) => element('rect', { class: 'guard', ...rectangle(x, top, width, axis - top) })),
    element('path', { class: 'grid', d: ticks.map((x) => `M${round(x)} ${round(top)}V${round(axis)}`).join('') }),
    ...overlaps.map(({ x, width }) => element('rect', { class: 'overlap', fill: 'url(#ladder-overlap)', ...rectangle(x, outputTop, width, axis - outputTop) })),
    ...rungs.map((rung) => element('path', { class: 'line', d: rungLine(rung, left, right) })),
    ...links.map((link) => element('path', { class: 'line', d: swing(link, left, right) })),
    ...rungs.filter(({ line }) => marked.has(line)).map((rung) => element('rect', {
      class: rung.inverted ? 'mark inverted' : 'mark', ...rectangle(PAD, rung.line - 7.5, layout.frame.markWidth, 15), rx: 3,
    })),
    element('path', { class: 'axis', d: `M${round(left)} ${round(axis)}H${round(right)}${ticks.map((x) => `M${round(x)} ${round(axis)}v4`).join('')}` }),
  ];
}

/** A rung with an arrowhead at its upper end. */
function rungLine({ line, inverted }: Rung, left: number, right: number): string {
  const [x, back] = inverted ? [left, 5] : [right, -5];
  return `M${round(left)} ${round(line)}H${round(right)}M${round(x + back)} ${round(line - 3)}L${round(x)} ${round(line)}l${back} 3`;
}

function swing({ side, from, to }: Link, left: number, right: number): string {
  const [x, out] = side === 'left' ? [left, -SWING * 1.3] : [right, SWING * 1.3];
  return `M${round(x)} ${round(from)}C${round(x + out)} ${round(from)} ${round(x + out)} ${round(to)} ${round(x)} ${round(to)}`;
}

// Bands

function bandGroup({ figures, selected, pieces, links, image }: BandLayout, { frame: { left, right } }: LadderLayout): Tree {
  const { row, state } = figures;
  const words = bandSentence(figures);
  const shownState = row.role === 'wanted' ? state.replace(' ', '-') : 'clear';
  return element('g', {
    class: `band ${row.role} ${shownState}${selected ? ' selected' : ''}`, 'data-row': row.index, tabindex: -1,
    role: 'button', 'aria-pressed': selected ? 'true' : 'false',
  },
    element('title', {}, words),
    ...pieces.filter(({ zone, lastZone }) => zone === lastZone).map(({ shape }) =>
      element('rect', { class: 'strip', ...rectangle(shape.x, shape.y, shape.width, image.shape.y - shape.y) })),
    ...links.map((link) => element('path', { class: 'goes-on', d: swing(link, left, right) })),
    ...pieces.map(({ shape }) => bar(shape, row.role)),
    bar(image.shape, row.role),
    ...(selected ? [...pieces.map(({ shape }) => shape), image.shape].map(corners) : []),
    ...image.marks.map(({ x, width }) =>
      element('rect', { class: 'shared', fill: 'url(#ladder-overlap)', ...rectangle(x, image.shape.y - image.shape.height / 2, width, image.shape.height) })),
    ...[...pieces.map(({ label }) => label), image.label].flatMap((label) => (label ? [labelElement(label)] : [])));
}

/** A bar whose slope tells the direction: the high edge stands taller. */
function bar({ x, width, y, height, tall }: BarShape, role: string): Tree {
  const [leftHeight, rightHeight] = { left: [1, 0.55], right: [0.55, 1], none: [1, 1] }[tall] as [number, number];
  const bottom = y + height / 2;
  const d = `M${round(x)} ${round(bottom)}V${round(bottom - leftHeight * height)}L${round(x + width)} ${round(bottom - rightHeight * height)}V${round(bottom)}Z`;
  return element('path', { class: 'bar', fill: role === 'unwanted' ? 'url(#ladder-unwanted)' : undefined, d });
}

/** Corners around a bar: the mark of the selected row. */
function corners({ x, width, y, height }: BarShape): Tree {
  const [left, right, top, bottom] = [x - 3, x + width + 3, y - height / 2 - 2.5, y + height / 2 + 2.5].map(round) as [number, number, number, number];
  const d = `M${left + 4} ${top}H${left}V${bottom}H${left + 4}M${right - 4} ${top}H${right}V${bottom}H${right - 4}`;
  return element('path', { class: 'picked', d });
}

/** The band's title says more; a label that stands twice would only blur it. */
function labelElement({ x, y, anchor, inside, text, suffix, size }: BarLabel): Tree {
  return element('text', { 'aria-hidden': 'true', class: inside ? 'label inside' : 'label', x: round(x), y: round(baseline(y, size)), 'font-size': size, 'text-anchor': anchor },
    text, ...(suffix === '' ? [] : [element('tspan', { class: 'state' }, suffix)]));
}

// Words

function textElement({ kind, x, y, anchor, text, size }: Text): Tree {
  return element('text', { class: kind, x: round(x), y: round(baseline(y, size)), 'font-size': size, 'text-anchor': anchor }, text);
}

function overlapBrackets({ overlaps, bracket }: LadderLayout): Tree[] {
  return overlaps.map(({ x, width }) => element('path', { class: 'bracket', d: `M${round(x)} ${round(bracket + 3)}v-4h${round(width)}v4` }));
}

function legendSwatch({ kind, x, y }: LegendEntry): Tree {
  const shape: BarShape = { x, width: 18, y, height: 10, tall: 'right' };
  const rect = rectangle(x, y - 5, 18, 10);
  switch (kind) {
    case 'wanted':
    case 'unwanted': return element('g', { class: `band ${kind}` }, bar({ ...shape, tall: 'none' }, kind));
    case 'tall': return element('g', { class: 'band outline' }, bar(shape, kind));
    case 'overlap': return element('rect', { class: 'overlap', fill: 'url(#ladder-overlap)', ...rect });
    case 'inverted': return element('rect', { class: 'mark inverted', ...rect, rx: 3 });
    case 'guard': return element('rect', { class: 'guard', ...rect });
  }
}

const rectangle = (x: number, y: number, width: number, height: number) => ({ x: round(x), y: round(y), width: round(width), height: round(height) });

/** Where the foot of the letters stands when their middle is at y. */
const baseline = (y: number, size: number): number => y + size * 0.35;

const round = (pixels: number): number => Math.round(pixels * 100) / 100;
