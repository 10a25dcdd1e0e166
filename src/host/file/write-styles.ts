// The formats of a file that we write.

import type { Style } from '../port';
import { markFormatXml } from './marks';
import { BUILT_IN, FIRST_OWN } from './number-formats';
import { PLAIN_FONT } from './read-styles';
import { attributeText } from './xml';

/** Collects styles, each of them once. */
export class StyleSheet {
  readonly #formats = new Entries(FIRST_OWN);
  readonly #fonts = new Entries();
  readonly #fills = new Entries();
  readonly #borders = new Entries();
  readonly #cells = new Entries();
  readonly #known = new Map<string, number>();

  constructor() {
    // The first of each is what cells without a style have; of the fills a second one is set by the format.
    this.indexOf({});
    this.#fills.add('<fill><patternFill patternType="gray125"/></fill>');
  }

  /** The index by which cells refer to a style. */
  indexOf(style: Style): number {
    const key = JSON.stringify(style);
    const index = this.#known.get(key) ?? this.#add(style);
    this.#known.set(key, index);
    return index;
  }

  toXml(): string {
    return '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n'
      + '<styleSheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">'
      + (this.#formats.size > 0 ? this.#formats.list('numFmts') : '')
      + this.#fonts.list('fonts') + this.#fills.list('fills') + this.#borders.list('borders')
      + '<cellStyleXfs count="1"><xf numFmtId="0" fontId="0" fillId="0" borderId="0"/></cellStyleXfs>'
      + this.#cells.list('cellXfs')
      + '<cellStyles count="1"><cellStyle name="Normal" xfId="0" builtinId="0"/></cellStyles>'
      + `${markFormatXml}</styleSheet>`;
  }

  #add(style: Style): number {
    const numFmtId = this.#formatId(style.numberFormat);
    const fontId = this.#fonts.add(fontXml(style));
    const fillId = this.#fills.add(fillXml(style));
    const borderId = this.#borders.add(borderXml(style));
    const alignment = alignmentXml(style);
    const applied = (is: boolean) => (is ? 1 : undefined);
    const attributes = attributeText({
      numFmtId, fontId, fillId, borderId, xfId: 0, applyNumberFormat: applied(numFmtId !== 0), applyFont: applied(fontId !== 0),
      applyFill: applied(fillId !== 0), applyBorder: applied(borderId !== 0), applyAlignment: applied(alignment !== ''),
    });
    return this.#cells.add(alignment === '' ? `<xf${attributes}/>` : `<xf${attributes}>${alignment}</xf>`);
  }

  #formatId(format: string | undefined): number {
    if (format === undefined) return 0;
    const known = Object.entries(BUILT_IN).find(([, code]) => code === format);
    if (known) return Number(known[0]);
    return this.#formats.add(format, (id) => `<numFmt${attributeText({ numFmtId: id, formatCode: format })}/>`);
  }
}

/** Elements in the order in which they were first wanted. */
class Entries {
  readonly #elements = new Map<string, string>();

  constructor(private readonly first = 0) {}

  get size(): number {
    return this.#elements.size;
  }

  /** The index of an element. */
  add(key: string, element: (index: number) => string = () => key): number {
    const index = [...this.#elements.keys()].indexOf(key);
    if (index >= 0) return this.first + index;
    this.#elements.set(key, element(this.first + this.size));
    return this.first + this.size - 1;
  }

  list(name: string): string {
    return `<${name} count="${this.size}">${[...this.#elements.values()].join('')}</${name}>`;
  }
}

function fontXml({ fontName = PLAIN_FONT.name, fontSize = PLAIN_FONT.size, bold, italic, underline, strike, color }: Style): string {
  return `<font>${bold ? '<b/>' : ''}${italic ? '<i/>' : ''}${strike ? '<strike/>' : ''}${underline ? '<u/>' : ''}`
    + `<sz val="${fontSize}"/>${color ? `<color rgb="${argb(color)}"/>` : ''}<name${attributeText({ val: fontName })}/></font>`;
}

const fillXml = ({ fill }: Style): string => (fill
  ? `<fill><patternFill patternType="solid"><fgColor rgb="${argb(fill)}"/><bgColor indexed="64"/></patternFill></fill>`
  : '<fill><patternFill patternType="none"/></fill>');

function borderXml({ border = {} }: Style): string {
  const side = (name: 'left' | 'right' | 'top' | 'bottom') => {
    const line = border[name];
    return line ? `<${name} style="${line.style}"><color rgb="${argb(line.color)}"/></${name}>` : `<${name}/>`;
  };
  return `<border>${side('left')}${side('right')}${side('top')}${side('bottom')}<diagonal/></border>`;
}

function alignmentXml({ horizontal, vertical, wrap }: Style): string {
  if (!horizontal && !vertical && !wrap) return '';
  return `<alignment${attributeText({ horizontal, vertical: vertical === 'middle' ? 'center' : vertical, wrapText: wrap ? 1 : undefined })}/>`;
}

/** A colour as the file has it; one that is none is black. */
const argb = (color: string): string => `FF${/^#[\da-f]{6}$/i.test(color) ? color.slice(1).toUpperCase() : '000000'}`;
