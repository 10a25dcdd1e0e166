// Colours of a file, which may be given as such, by the theme, or by an old palette.

import { type XmlElement, child } from './xml';

/** Reads colours as `#rrggbb`. */
export class Colours {
  readonly #theme: string[];
  readonly #palette: string[];

  constructor(theme: XmlElement | null, styles: XmlElement | null) {
    this.#theme = theme ? themeColours(theme) : STANDARD_THEME;
    const own = child(child(styles ?? undefined, 'colors'), 'indexedColors')?.children.map(({ attributes }) => hex(attributes.rgb ?? ''));
    this.#palette = own ?? OLD_PALETTE;
  }

  /** Undefined where the element gives no colour of its own. */
  of(element: XmlElement | undefined): string | undefined {
    if (!element) return undefined;
    const { rgb, theme, indexed, tint } = element.attributes;
    const colour = rgb !== undefined ? hex(rgb) : theme !== undefined ? this.#theme[Number(theme)] : indexed !== undefined ? this.#palette[Number(indexed)] : undefined;
    return colour && (tint === undefined ? colour : tinted(colour, Number(tint)));
  }
}

const hex = (argb: string): string => `#${argb.slice(-6).toLowerCase()}`;

/** A theme lists dark before light, and is referred to the other way round. */
const THEME_ORDER = ['lt1', 'dk1', 'lt2', 'dk2', 'accent1', 'accent2', 'accent3', 'accent4', 'accent5', 'accent6', 'hlink', 'folHlink'];

function themeColours(theme: XmlElement): string[] {
  const scheme = child(child(theme, 'themeElements'), 'clrScheme');
  return THEME_ORDER.map((name, i) => {
    const [colour] = child(scheme, name)?.children ?? [];
    const rgb = colour?.attributes.lastClr ?? colour?.attributes.val;
    return rgb !== undefined && /^[\da-f]{6}$/i.test(rgb) ? hex(rgb) : STANDARD_THEME[i]!;
  });
}

const STANDARD_THEME = ['#ffffff', '#000000', '#e7e6e6', '#44546a', '#4472c4', '#ed7d31', '#a5a5a5', '#ffc000', '#5b9bd5', '#70ad47', '#0563c1', '#954f72'];

const OLD_PALETTE = `
  000000 ffffff ff0000 00ff00 0000ff ffff00 ff00ff 00ffff 000000 ffffff ff0000 00ff00 0000ff ffff00 ff00ff 00ffff
  800000 008000 000080 808000 800080 008080 c0c0c0 808080 9999ff 993366 ffffcc ccffff 660066 ff8080 0066cc ccccff
  000080 ff00ff ffff00 00ffff 800080 800000 008080 0000ff 00ccff ccffff ccffcc ffff99 99ccff ff99cc cc99ff ffcc99
  3366ff 33cccc 99cc00 ffcc00 ff9900 ff6600 666699 969696 003366 339966 003300 333300 993300 993366 333399 333333
  000000 ffffff
`.trim().split(/\s+/).map((rgb) => `#${rgb}`);

/** A colour made lighter (towards 1) or darker (towards -1); hue and saturation stay. */
function tinted(colour: string, tint: number): string {
  const rgb = [1, 3, 5].map((at) => parseInt(colour.slice(at, at + 2), 16) / 255);
  const [most, least] = [Math.max(...rgb), Math.min(...rgb)];
  const light = (most + least) / 2;
  const target = tint < 0 ? light * (1 + tint) : light * (1 - tint) + tint;
  const chroma = most - least;
  const saturation = chroma === 0 ? 0 : chroma / (1 - Math.abs(2 * light - 1));
  const range = (1 - Math.abs(2 * target - 1)) * saturation;
  const channel = (value: number) => (chroma === 0 ? target : target + ((value - light) / chroma) * range);
  return `#${rgb.map((value) => Math.round(channel(value) * 255).toString(16).padStart(2, '0')).join('')}`;
}
