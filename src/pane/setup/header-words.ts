// What a header or a label says: which part of a plan it names, and in which unit.

/** Columns of a plan; `frequency` is the one column of a plan of tones. */
export type ColumnKind = 'name' | 'low' | 'high' | 'centre' | 'width' | 'frequency' | 'role';

/** Single cells of a plan. */
export type CellKind = 'rate' | 'guard' | 'ppm';

export interface Header<Kind> {
  kind: Kind;
  /** Words that often mean something else: they count only where nothing says it better. */
  weak: boolean;
}

/** The unit in a header such as `Low (MHz)`, `f_low / kHz` or `Width [Hz]`, in the usual spelling; null where it names none. */
export function unitOf(header: string): string | null {
  return split(header).unit;
}

/** Whether a cell holds a unit and nothing else: `MHz`, `(MHz)`. */
export const isUnit = (text: string): boolean => UNITS.has(text.replace(/[()[\]{}\s]/g, '').toLowerCase());

/** The column that a header names, or null. */
export function columnOf(header: string): Header<ColumnKind> | null {
  return meaning(header, COLUMNS, NOISE);
}

/** The single cell that a label names, or null. What is given in parts of something is no frequency: `Clock (ppm)` is a tolerance. */
export function cellOf(label: string): Header<CellKind> | null {
  const found = meaning(label, CELLS, []);
  if (!found || found.kind === 'ppm' || !isRelative(unitOf(label))) return found;
  return found.kind === 'rate' ? { kind: 'ppm', weak: true } : null;
}

/** Whether a unit is one of parts of something. */
export const isRelative = (unit: string | null): boolean => RELATIVE_UNITS.some((one) => one === unit);

function meaning<Kind>(text: string, table: Map<string, Header<Kind>>, noise: readonly string[]): Header<Kind> | null {
  const words = wordsOf(split(text).words);
  if (words.length === 0 || words.length > 6) return null;
  const telling = words.filter((word) => !noise.includes(word));
  return table.get(words.join(' ')) ?? (telling.length > 0 ? table.get(telling.join(' ')) : undefined) ?? null;
}

const wordsOf = (text: string): string[] =>
  text.normalize('NFKC').replace(/(\p{Ll})(\p{Lu})/gu, '$1 $2').toLowerCase().replace(/center/g, 'centre').replace(/[\s_.,:;=?*#"'’\-–—/\\()[\]{}]+/gu, ' ').trim().split(' ').filter((word) => word !== '');

/** Splits the unit off. */
function split(text: string): { words: string; unit: string | null } {
  for (const pattern of UNIT_PLACES) {
    const [all, unit] = pattern.exec(text.trim()) ?? [];
    const known = unit === undefined ? undefined : UNITS.get(unit.replace(/\s/g, '').toLowerCase());
    if (all !== undefined && known !== undefined) return { words: text.trim().replace(all, ' '), unit: known };
  }
  return { words: text, unit: null };
}

const UNIT_PLACES = [
  /[([{]\s*(?:in\s+)?([a-zµμ%/\s]+?)\s*[)\]}]/iu, // Low (MHz)
  /[/,;:]\s*(?:in\s+)?([a-zµμ%]+(?:\/s)?)\s*[:=]?$/iu, // f_low / kHz
  /[\s_](?:in\s+)?([a-zµμ%]+(?:\/s)?)\s*[:=]?$/iu, // Low MHz, low_mhz
];

const UNITS = new Map<string, string>();
for (const prefix of ['', 'k', 'M', 'G', 'T']) {
  UNITS.set(`${prefix}hz`.toLowerCase(), `${prefix}Hz`);
  for (const samples of ['S/s', 'sps', 'SPS', 'sa/s']) UNITS.set(`${prefix}${samples}`.toLowerCase(), `${prefix}S/s`);
}
const RELATIVE_UNITS = ['ppm', 'ppb', '%'];
for (const unit of RELATIVE_UNITS) UNITS.set(unit, unit);

/** Units of samples per second go with those of frequency. */
export const frequencyUnit = (unit: string | null): string | null => unit?.replace('S/s', 'Hz') ?? null;

/** Words beside which the telling one stands: `lower band edge`, `start frequency`. */
const NOISE = [
  'frequency', 'frequencies', 'freq', 'freqs', 'f', 'edge', 'edges', 'limit', 'bound', 'boundary', 'end', 'side', 'band', 'bands', 'channel', 'signal', 'carrier', 'passband', 'pass',
  'rf', 'if', 'rx', 'tx', 'input', 'value', 'nominal', 'of', 'the', 'occupied',
];

const COLUMNS = new Map<string, Header<ColumnKind>>();
say(COLUMNS, 'low', 'low|lower|lowest|lo|min|minimum|from|start|starts|begin|begins|beginning|bottom|first|left|fl|flo|flow|fmin|fstart|f1|f 1|f l|lower edge|lfe');
say(COLUMNS, 'high', 'high|higher|highest|upper|hi|max|maximum|to|until|stop|stops|end|ends|top|last|right|fh|fu|fhi|fhigh|fmax|fstop|fend|f2|f 2|f h|f u|band end|frequency end|end frequency|freq end|end freq|f end|ufe');
say(COLUMNS, 'centre', 'centre|centres|mid|middle|fc|f c|f0|f 0|fcentre|fmid|cf|carrier|carrier frequency|carrier freq|centrefrequency');
say(COLUMNS, 'width', 'width|bandwidth|band width|bw|b|obw|ibw|span|channel width|occupied bandwidth|bw3db');
say(COLUMNS, 'frequency', 'frequency|frequencies|freq|f|tone|tones|tone frequency|rf frequency|rf|input frequency');
say(COLUMNS, 'name', 'name|names|band|bands|signal|signals|service|system|label|channel|band name|signal name|channel name|tone name|emitter|designation|station|carrier name|description|source');
say(COLUMNS, 'name', 'id|user|use|allocation|application|item|what|comment|notes|note|remark|remarks', true);
say(COLUMNS, 'role', 'role|wanted|wanted unwanted|unwanted|wanted or unwanted');
say(COLUMNS, 'role', 'type|kind|class|status|purpose|category|use', true);

const CELLS = new Map<string, Header<CellKind>>();
say(CELLS, 'rate', 'sample rate|samplerate|sampling rate|sample frequency|sampling frequency|sampling freq|sample freq|sample clock|sampling clock|fs|f s|fsample|f sample|fsamp|f samp|adc rate|adc clock|adc sample rate|adc sampling rate|converter rate|conversion rate|adc fs|fadc|f adc|fold rate');
say(CELLS, 'rate', 'rate|clock|clock rate|clock frequency|fclk|f clk', true);
say(CELLS, 'guard', 'guard|guard band|guardband|guard bands|guard frequency|guard width|guard distance|fold guard');
say(CELLS, 'guard', 'clearance|clear distance', true);
say(CELLS, 'ppm', 'clock tolerance|clock accuracy|clock error|clock stability|clock drift|clock ppm|ppm|rate tolerance|sample rate tolerance|sample clock tolerance|reference tolerance|reference accuracy|oscillator tolerance|fold ppm|tolerance ppm');
say(CELLS, 'ppm', 'tolerance|accuracy|stability|drift|frequency tolerance|frequency accuracy', true);

function say<Kind>(table: Map<string, Header<Kind>>, kind: Kind, phrases: string, weak = false): void {
  for (const phrase of phrases.split('|')) if (!table.has(phrase) || !weak) table.set(phrase, { kind, weak });
}
