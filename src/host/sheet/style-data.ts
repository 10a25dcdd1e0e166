// Styles of the port and of the embedded sheet.

import { type IBorderStyleData, type IStyleData, type Nullable, BooleanNumber, BorderStyleTypes, HorizontalAlign, VerticalAlign, WrapStrategy } from '@univerjs/core';
import type { Style } from '../port';

export function toStyleData(style: Style): IStyleData {
  return {
    ...(style.numberFormat && { n: { pattern: style.numberFormat } }),
    ...(style.fontName && { ff: style.fontName }),
    ...(style.fontSize && { fs: style.fontSize }),
    ...(style.bold && { bl: BooleanNumber.TRUE }),
    ...(style.italic && { it: BooleanNumber.TRUE }),
    ...(style.underline && { ul: { s: BooleanNumber.TRUE } }),
    ...(style.strike && { st: { s: BooleanNumber.TRUE } }),
    ...(style.color && { cl: { rgb: style.color } }),
    ...(style.fill && { bg: { rgb: style.fill } }),
    ...(style.horizontal && { ht: HORIZONTAL[style.horizontal] }),
    ...(style.vertical && { vt: VERTICAL[style.vertical] }),
    ...(style.wrap && { tb: WrapStrategy.WRAP }),
    ...(style.border && {
      bd: Object.fromEntries(Object.entries(style.border).map(([side, line]) => [SIDES[side as keyof Border], { s: LINES[line.style], cl: { rgb: line.color } }])),
    }),
  };
}

/** The part of a style that the port knows; undefined where that is nothing. */
export function fromStyleData(data: Nullable<IStyleData>): Style | undefined {
  if (!data) return undefined;
  const border = borderOf(data);
  const style: Style = {
    ...(data.n?.pattern && data.n.pattern !== 'General' && { numberFormat: data.n.pattern }),
    ...(data.ff && { fontName: data.ff }),
    ...(data.fs && { fontSize: data.fs }),
    ...(data.bl && { bold: true }),
    ...(data.it && { italic: true }),
    ...(data.ul?.s && { underline: true }),
    ...(data.st?.s && { strike: true }),
    ...(hex(data.cl?.rgb) && { color: hex(data.cl?.rgb) }),
    ...(hex(data.bg?.rgb) && { fill: hex(data.bg?.rgb) }),
    ...(data.ht && keyOf(HORIZONTAL, data.ht) && { horizontal: keyOf(HORIZONTAL, data.ht) }),
    ...(data.vt && keyOf(VERTICAL, data.vt) && { vertical: keyOf(VERTICAL, data.vt) }),
    ...(data.tb === WrapStrategy.WRAP && { wrap: true }),
    ...(border && { border }),
  };
  return Object.keys(style).length > 0 ? style : undefined;
}

type Border = NonNullable<Style['border']>;
type Line = NonNullable<Border['top']>;

const HORIZONTAL = { left: HorizontalAlign.LEFT, center: HorizontalAlign.CENTER, right: HorizontalAlign.RIGHT } as const;
const VERTICAL = { top: VerticalAlign.TOP, middle: VerticalAlign.MIDDLE, bottom: VerticalAlign.BOTTOM } as const;
const LINES: Record<Line['style'], BorderStyleTypes> = {
  thin: BorderStyleTypes.THIN,
  medium: BorderStyleTypes.MEDIUM,
  thick: BorderStyleTypes.THICK,
  dashed: BorderStyleTypes.DASHED,
  dotted: BorderStyleTypes.DOTTED,
  double: BorderStyleTypes.DOUBLE,
};
const SIDES = { top: 't', right: 'r', bottom: 'b', left: 'l' } as const;

function borderOf({ bd }: IStyleData): Border | undefined {
  if (!bd) return undefined;
  const border: Border = {};
  for (const [side, key] of Object.entries(SIDES) as [keyof Border, keyof typeof bd][]) {
    const line = lineOf(bd[key]);
    if (line) border[side] = line;
  }
  return Object.keys(border).length > 0 ? border : undefined;
}

function lineOf(data: Nullable<IBorderStyleData>): Line | undefined {
  if (!data?.s) return undefined;
  return { style: keyOf(LINES, data.s) ?? 'thin', color: hex(data.cl?.rgb) ?? '#000000' };
}

const keyOf = <K extends string>(words: Record<K, number>, value: number): K | undefined =>
  (Object.keys(words) as K[]).find((word) => words[word] === value);

/** `#rrggbb` of a colour in either notation of the sheet. */
function hex(color: Nullable<string>): string | undefined {
  if (!color) return undefined;
  if (/^#[0-9a-f]{6}$/i.test(color)) return color;
  if (/^#[0-9a-f]{3}$/i.test(color)) return `#${[...color.slice(1)].map((digit) => digit + digit).join('')}`;
  const parts = color.match(/^rgba?\(\s*(\d+)\s*,\s*(\d+)\s*,\s*(\d+)/);
  return parts ? `#${parts.slice(1, 4).map((part) => Number(part).toString(16).padStart(2, '0')).join('')}` : undefined;
}
