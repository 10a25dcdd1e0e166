// How wide a text will be, without a browser. The estimate is on the wide side of the common sans-serif fonts, so that what is laid
// out by it does not collide in any of them; a browser test measures that.

const segmenter = new Intl.Segmenter('en', { granularity: 'grapheme' });

/** Width in pixels of a text in a sans-serif font of this size. */
export function textWidth(text: string, size: number): number {
  let ems = 0;
  for (const grapheme of graphemes(text)) ems += advance(grapheme);
  return ems * size;
}

/** The text, cut short with "…" where it is wider than `most`; "" where not even its first character has room. */
export function fitText(text: string, size: number, most: number): string {
  if (textWidth(text, size) <= most) return text;
  const room = most - textWidth('…', size);
  let kept = '';
  let used = 0;
  for (const grapheme of graphemes(text)) {
    used += advance(grapheme) * size;
    if (used > room) break;
    kept += grapheme;
  }
  return kept === '' ? '' : `${kept.trimEnd()}…`;
}

/** What a reader takes for one character each. Most texts are plain ones, for which no segmenter is needed. */
const graphemes = (text: string): Iterable<string> => (PLAIN.test(text) ? text : Array.from(segmenter.segment(text), ({ segment }) => segment));

const PLAIN = /^[ -~]*$/;

/** Width of one grapheme in ems. */
function advance(grapheme: string): number {
  if (grapheme.length === 1 && PLAIN.test(grapheme)) return BY_CHARACTER.get(grapheme) ?? (UPPER.test(grapheme) ? 0.78 : 0.66);
  if (INVISIBLE.test(grapheme)) return 0;
  if (PICTURE.test(grapheme)) return 1.4;
  if (WIDE.test(grapheme)) return 1.05;
  return BY_CHARACTER.get(grapheme[0]!) ?? (UPPER.test(grapheme) ? 0.78 : 0.66);
}

const INVISIBLE = /^[\p{Cf}\p{Mn}]+$/u;
const PICTURE = /\p{Extended_Pictographic}|\p{Regional_Indicator}|\u20e3/u;
const WIDE = /^[\p{Script=Han}\p{Script=Hiragana}\p{Script=Katakana}\p{Script=Hangul}\u3000-\u303f\uff01-\uff60]/u;
const UPPER = /^\p{Lu}/u;

const BY_CHARACTER = new Map<string, number>();
for (const [characters, width] of [
  ["ijl'", 0.28],
  [' .,:;|!I', 0.32],
  ['ftr()[]{}/\\"`-°·', 0.4],
  ['JLcsvxyzk?*', 0.56],
  ['0123456789abdeghnopqu#$_FETP', 0.62],
  ['ABKSVXYZRC+=<>~^', 0.7],
  ['…GDHNOQUw&', 0.83],
  ['MmW%@—', 1],
] as const) {
  for (const character of characters) BY_CHARACTER.set(character, width);
}
