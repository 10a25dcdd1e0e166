// The choice of a plan's cells while it is being made: what stands in the fields, whether it can be used, and the names that it comes to.

import type { Place } from '../../host/port';
import { type Box, addressOf, fixedReference, parseReference, referenceTo } from '../address';
import type { Edges, Places } from '../plan';
import { NAMES, type NameKey } from '../sentences';
import type { Proposal } from './recognise';
import { sentences } from './sentences';

export interface Field {
  /** An address as the user reads and types it; '' for none. */
  text: string;
  /** Why it was taken. */
  why: string;
  /** What a cell that is made for it holds to begin with, as typed; null where it is a cell that exists. */
  starts: string | null;
}

export interface Draft {
  edges: Edges;
  /** The sheet that addresses without one are on. */
  sheet: string;
  fields: Record<NameKey, Field>;
}

export type CellKey = 'rate' | 'guard' | 'ppm';
export const COLUMN_KEYS = ['name', 'low', 'high', 'centre', 'width', 'role'] as const satisfies NameKey[];
export const CELL_KEYS = ['rate', 'guard', 'ppm'] as const satisfies CellKey[];
const KEYS: readonly NameKey[] = [...COLUMN_KEYS, ...CELL_KEYS];

const NOTHING: Field = { text: '', why: '', starts: null };

export function emptyDraft(sheet: string): Draft {
  return { edges: ['low', 'high'], sheet, fields: Object.fromEntries(KEYS.map((key) => [key, NOTHING])) as Draft['fields'] };
}

/** What the workbook's names say. */
export function draftOf(places: Places, edges: Edges, why: Partial<Record<NameKey, string>>): Draft {
  const sheet = (places[edges[0]] ?? places[edges[1]] ?? Object.values(places)[0])?.sheet ?? '';
  const draft = { ...emptyDraft(sheet), edges };
  for (const key of KEYS) if (places[key]) draft.fields[key] = { text: shown(places[key], sheet), why: why[key] ?? '', starts: null };
  return draft;
}

export function draftOfProposal({ found }: Proposal): Draft {
  const why = Object.fromEntries(Object.entries(found).map(([key, one]) => [key, one.unit ? `${one.why}, ${sentences.unit(one.unit)}` : one.why]));
  return draftOf(found, found.centre && found.width ? ['centre', 'width'] : ['low', 'high'], why);
}

export const withField = (draft: Draft, key: NameKey, field: Partial<Field>): Draft =>
  ({ ...draft, fields: { ...draft.fields, [key]: { ...draft.fields[key], ...field } } });

/** A place in a field: with its sheet where that is another one. */
export const shown = ({ sheet, address }: Place, home: string): string => (sheet === home ? address : referenceTo(sheet, address));

/** The keys that a draft has fields for: one pair of edges, not both. */
export const keysOf = ({ edges }: Draft): NameKey[] => ['name', ...edges, 'role', ...CELL_KEYS];

export interface Checked {
  /** Where each name's cells are, without those of cells that are yet to be made. */
  boxes: Partial<Record<NameKey, { sheet: string; box: Box }>>;
  /** What can't be used, by field. */
  problems: Partial<Record<NameKey, string>>;
}

const OPTIONAL: readonly NameKey[] = ['name', 'role', 'guard', 'ppm'];

/** @param sheets that the workbook has */
export function checkDraft(draft: Draft, sheets: string[]): Checked {
  const checked: Checked = { boxes: {}, problems: {} };
  for (const key of keysOf(draft)) {
    const { text, starts } = draft.fields[key];
    if (starts !== null) {
      const value = Number(starts.trim().replace(',', '.'));
      if (starts.trim() === '' || !Number.isFinite(value) || value < 0 || (key === 'rate' && value === 0)) checked.problems[key] = sentences.startNumber(key, starts);
      continue;
    }
    if (text.trim() === '') {
      if (!OPTIONAL.includes(key)) checked.problems[key] = sentences.needed(key);
      continue;
    }
    const place = parseReference(text);
    if (!place) checked.problems[key] = sentences.notAddress(key, text);
    else {
      const sheet = sheets.find((one) => one.toLowerCase() === (place.sheet ?? draft.sheet).toLowerCase());
      if (sheet === undefined) checked.problems[key] = sentences.noSheet(key, place.sheet ?? draft.sheet);
      else checked.boxes[key] = { sheet, box: place.box };
    }
  }
  checkShapes(draft, checked);
  return checked;
}

function checkShapes({ edges }: Draft, { boxes, problems }: Checked): void {
  const first = boxes[edges[0]];
  for (const [key, { sheet, box }] of Object.entries(boxes) as [NameKey, { sheet: string; box: Box }][]) {
    if ((CELL_KEYS as readonly NameKey[]).includes(key)) {
      if (box.rows * box.columns !== 1) problems[key] = sentences.oneCell(key, addressOf(box));
    } else if (box.columns !== 1) problems[key] = sentences.oneColumn(key, addressOf(box));
    else if (first && sheet !== first.sheet) problems[key] = sentences.otherSheet(key, first.sheet);
    else if (first && (box.row !== first.box.row || box.rows !== first.box.rows)) {
      problems[key] = sentences.otherRows(key, addressOf(box), `${first.box.row + 1} to ${first.box.row + first.box.rows}`);
    }
  }
}

/** The names that a draft comes to; null takes a name away that the workbook has. */
export function namesOf({ boxes }: Checked, existing: Record<string, string>): Record<string, string | null> {
  const has = new Set(Object.keys(existing).map((name) => name.toLowerCase()));
  return Object.fromEntries(KEYS.flatMap((key): [string, string | null][] => {
    const { name } = NAMES[key];
    const place = boxes[key];
    if (place) return [[name, fixedReference(place.sheet, place.box)]];
    return has.has(name.toLowerCase()) ? [[name, null]] : [];
  }));
}

/** The names of a plan that reaches down to a row, counted from 0. */
export function extendedNames(places: Places, edges: Edges, lastRow: number): Record<string, string> {
  return Object.fromEntries((['name', ...edges, 'role'] as const).flatMap((key) => {
    const place = places[key] && parseReference(referenceTo(places[key].sheet, places[key].address));
    return place ? [[NAMES[key].name, fixedReference(place.sheet!, { ...place.box, rows: lastRow - place.box.row + 1 })]] : [];
  }));
}
