// The formats of a file's cells as styles of the port: what differs from plain black text in the font that we write.

import type { Style } from '../port';
import type { Book } from './book';
import { Colours } from './colours';
import { BUILT_IN } from './number-formats';
import { type XmlElement, child, childrenOf, isOn } from './xml';

/** The font that a style without one has, here and in the files that we write. */
export const PLAIN_FONT = { name: 'Calibri', size: 11 };

/** Styles by the index that cells refer to; undefined where one is plain. */
export async function readStyles(book: Book): Promise<(Style | undefined)[]> {
  const part = (type: string) => book.relations.find((one) => one.type === type && book.archive.has(one.target))?.target;
  const stylesPart = part('styles');
  if (stylesPart === undefined) return [];
  const themePart = part('theme');
  const root = await book.archive.xml(stylesPart);
  const colours = new Colours(themePart === undefined ? null : await book.archive.xml(themePart), root);
  const list = (name: string, item: string) => childrenOf(child(root, name), item);
  const formats = new Map(list('numFmts', 'numFmt').map(({ attributes }) => [Number(attributes.numFmtId), attributes.formatCode ?? '']));
  const fonts = list('fonts', 'font').map((font) => fontStyle(font, colours));
  const fills = list('fills', 'fill').map((fill) => fillStyle(fill, colours));
  const borders = list('borders', 'border').map((border) => borderStyle(border, colours));
  return list('cellXfs', 'xf').map((format) => {
    const { numFmtId, fontId, fillId, borderId } = format.attributes;
    const numberFormat = formats.get(Number(numFmtId)) ?? BUILT_IN[Number(numFmtId)];
    const style: Style = {
      ...(numberFormat && numberFormat !== 'General' && { numberFormat }),
      ...fonts[Number(fontId ?? 0)],
      ...fills[Number(fillId ?? 0)],
      ...alignmentStyle(child(format, 'alignment')),
      ...borders[Number(borderId ?? 0)],
    };
    return Object.keys(style).length > 0 ? style : undefined;
  });
}

function fontStyle(font: XmlElement, colours: Colours): Style {
  const value = (name: string) => child(font, name)?.attributes.val;
  const flag = (name: string) => child(font, name) !== undefined && isOn(value(name), true);
  const name = value('name');
  const size = Number(value('sz') ?? PLAIN_FONT.size);
  const color = colours.of(child(font, 'color'));
  return {
    ...(name && name !== PLAIN_FONT.name && { fontName: name }),
    ...(size !== PLAIN_FONT.size && { fontSize: size }),
    ...(flag('b') && { bold: true }),
    ...(flag('i') && { italic: true }),
    ...(child(font, 'u') && value('u') !== 'none' && { underline: true }),
    ...(flag('strike') && { strike: true }),
    ...(color && color !== '#000000' && { color }),
  };
}

function fillStyle(fill: XmlElement, colours: Colours): Style {
  const pattern = child(fill, 'patternFill');
  const colour = pattern?.attributes.patternType === 'solid' ? colours.of(child(pattern, 'fgColor')) : undefined;
  return colour ? { fill: colour } : {};
}

function alignmentStyle(alignment: XmlElement | undefined): Style {
  const { horizontal = '', vertical = '', wrapText } = alignment?.attributes ?? {};
  return {
    ...(HORIZONTAL[horizontal] && { horizontal: HORIZONTAL[horizontal] }),
    ...(VERTICAL[vertical] && { vertical: VERTICAL[vertical] }),
    ...(isOn(wrapText, false) && { wrap: true }),
  };
}

const HORIZONTAL: Record<string, Style['horizontal']> = { left: 'left', center: 'center', right: 'right', centerContinuous: 'center' };
/** "bottom" says what is so anyway. */
const VERTICAL: Record<string, Style['vertical']> = { top: 'top', center: 'middle' };

type Border = NonNullable<Style['border']>;
type Line = NonNullable<Border['top']>['style'];

function borderStyle(border: XmlElement, colours: Colours): Style {
  const sides: Border = {};
  for (const side of ['top', 'right', 'bottom', 'left'] as const) {
    const line = child(border, side);
    const style = LINES[line?.attributes.style ?? ''];
    if (style) sides[side] = { style, color: colours.of(child(line, 'color')) ?? '#000000' };
  }
  return Object.keys(sides).length > 0 ? { border: sides } : {};
}

/** The file format has more lines than the port; each is shown as the one that looks most like it. */
const LINES: Record<string, Line> = {
  thin: 'thin', hair: 'dotted', dotted: 'dotted', dashed: 'dashed', dashDot: 'dashed', dashDotDot: 'dashed', slantDashDot: 'dashed',
  medium: 'medium', mediumDashed: 'dashed', mediumDashDot: 'dashed', mediumDashDotDot: 'dashed', thick: 'thick', double: 'double',
};
