// How cells look: number formats, weight, widths, and marks on numbers below 0. Notes are set apart from these.

import { type Look, NEGATIVE } from '../port';
import { same } from './contents';
import { type Spot, rangeAt, withoutSheet } from './references';
import type { TakeBack } from './taking-back';

/** How the cells of a spot look, in those things that a look is to change. */
export interface LookState {
  spot: Spot;
  numberFormat?: string[][];
  bold?: boolean[][];
  widths?: { points: number; standard: boolean }[];
  /** Ids of our marks on exactly these cells, of marks there that were begun and not finished, and of all conditional formats that touch them. */
  marks?: { own: string[]; unfinished: string[]; all: string[] };
}

export interface Wanted {
  spot: Spot;
  look: Look;
}

/** The program counts widths in points. */
export const POINTS_PER_PIXEL = 0.75;

/** Reads in one request; in two where marks are asked for. */
export async function readLooks(context: Excel.RequestContext, wanted: Wanted[]): Promise<LookState[]> {
  if (wanted.length === 0) return [];
  const asked = wanted.map(({ spot, look: { numberFormat, bold, width, marksNegative } }) => {
    const range = rangeAt(context, spot);
    if (numberFormat !== undefined) range.load('numberFormat');
    const weights = bold === undefined ? null : range.getCellProperties({ format: { font: { bold: true } } });
    const columns = width === undefined ? [] : Array.from({ length: columnsIn(spot.address) }, (_, c) => range.getColumn(c).format);
    for (const format of columns) format.load('columnWidth,useStandardWidth');
    const rules = marksNegative === undefined ? null : range.conditionalFormats;
    rules?.load('items/id,items/type');
    return { range, weights, columns, rules };
  });
  await context.sync();
  const rules = asked.map(({ rules: found }) => (found?.items ?? []).filter(({ type }) => type === 'CellValue').map((rule) => {
    const place = rule.getRangeOrNullObject();
    const [{ font, fill }] = [rule.cellValue.format];
    rule.cellValue.load('rule');
    font.load('color');
    fill.load('color');
    place.load('address');
    return { id: rule.id, rule: rule.cellValue, font, fill, place };
  }));
  if (rules.some((found) => found.length > 0)) await context.sync();
  return asked.map(({ range, weights, columns, rules: found }, i) => {
    const { spot, look } = wanted[i]!;
    const here = rules[i]!.filter(({ place }) => !place.isNullObject && withoutSheet(place.address) === spot.address);
    const own = here.filter(({ rule: { rule }, font, fill }) => rule.operator === 'LessThan' && /^=?0$/.test(rule.formula1)
      && sameColor(font.color, NEGATIVE.color) && sameColor(fill.color, NEGATIVE.fill));
    const unfinished = here.filter(({ rule: { rule } }) => !rule?.formula1); // the rule is set last
    return {
      spot,
      ...(look.numberFormat !== undefined && { numberFormat: range.numberFormat as string[][] }),
      ...(weights && { bold: weights.value.map((row) => row.map(({ format }) => format!.font!.bold!)) }),
      ...(columns.length > 0 && { widths: columns.map(({ columnWidth, useStandardWidth }) => ({ points: columnWidth, standard: useStandardWidth })) }),
      ...(found && { marks: { own: idsOf(own), unfinished: idsOf(unfinished), all: idsOf(found.items) } }),
    };
  });
}

/** Queues the looks, in their order. */
export function setLooks(context: Excel.RequestContext, wanted: Wanted[], before: LookState[]): void {
  const removed = new Set<string>();
  for (const [i, { spot, look: { numberFormat, bold, width, marksNegative } }] of wanted.entries()) {
    const range = rangeAt(context, spot);
    const own = before[i]!.marks?.own ?? [];
    if (numberFormat !== undefined) range.numberFormat = before[i]!.numberFormat!.map((row) => row.map(() => numberFormat));
    if (bold !== undefined) range.format.font.bold = bold;
    if (width !== undefined) range.format.columnWidth = width * POINTS_PER_PIXEL;
    if (marksNegative && own.length === 0) addMark(range);
    if (marksNegative !== false) continue;
    for (const id of own) {
      if (!removed.has(id)) range.conditionalFormats.getItem(id).delete();
      removed.add(id);
    }
  }
}

export const takeBackLooks = (before: LookState[]): TakeBack => async (context) => {
  const now = await readLooks(context, before.map(({ spot, ...state }) => ({ spot, look: partsOf(state) })));
  const handled = new Set<string>();
  for (const [i, { spot, numberFormat, bold, widths, marks }] of before.entries()) {
    const range = rangeAt(context, spot);
    if (numberFormat && !same(numberFormat, now[i]!.numberFormat)) range.numberFormat = numberFormat;
    if (bold && !same(bold, now[i]!.bold)) range.setCellProperties(bold.map((row) => row.map((weight) => ({ format: { font: { bold: weight } } }))));
    for (const [c, { points, standard }] of (same(widths, now[i]!.widths) ? [] : widths!).entries()) {
      const { format } = range.getColumn(c);
      if (standard) format.useStandardWidth = true;
      else format.columnWidth = points;
    }
    for (const id of [...now[i]!.marks?.own ?? [], ...now[i]!.marks?.unfinished ?? []]) {
      if (!marks!.all.includes(id) && !handled.has(id)) range.conditionalFormats.getItem(id).delete();
      handled.add(id);
    }
    const missing = (marks?.own ?? []).filter((id) => !now[i]!.marks!.all.includes(id) && !handled.has(id));
    for (const id of missing) {
      addMark(range);
      handled.add(id);
    }
  }
  await context.sync();
};

/** A look that reads the same things again. */
const partsOf = ({ numberFormat, bold, widths, marks }: Omit<LookState, 'spot'>): Look => ({
  ...(numberFormat && { numberFormat: '' }), ...(bold && { bold: false }), ...(widths && { width: 0 }), ...(marks && { marksNegative: false }),
});

function addMark(range: Excel.Range): void {
  const { cellValue } = range.conditionalFormats.add('CellValue');
  cellValue.format.font.color = NEGATIVE.color;
  cellValue.format.fill.color = NEGATIVE.fill;
  cellValue.rule = { formula1: '0', operator: 'LessThan' };
}

const idsOf = (items: { id: string }[]): string[] => items.map(({ id }) => id);

const sameColor = (one: string | null, other: string): boolean => one?.toLowerCase() === other;

/** `B2:D9` => 3 */
function columnsIn(address: string): number {
  const [first, last] = address.split(':').map((cell) => [...cell.replace(/\d+$/, '')].reduce((n, letter) => n * 26 + letter.charCodeAt(0) - 64, 0));
  return (last ?? first!) - first! + 1;
}
