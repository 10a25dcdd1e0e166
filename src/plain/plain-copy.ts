// A whole workbook without functions of ours: what has to change, and the list of it.

import { tokenize, translateTokensToR1C1 } from '@borgar/fx/xlsx';
import { type Area, areaAddress, cellAddress, columnsOf, rowsOf, singleCell } from '../formula/address';
import { type Node, formulaTree, isCall } from '../formula/formula-tree';
import { sheetFunctionName } from '../formula/function-names';
import type { CellInput } from '../host/port';
import { NoEquivalent } from './native';
import { type NativeFormulas, type SheetArea, type Surroundings, callsOurs, nativeFormulas } from './plain-formula';
import { list, notes, record } from './sentences';

/** What is read of a workbook, in the notation of a sheet or of a file. Formulas come without "=". */
export interface PlainSource {
  /** All formulas in cells, each with the cells that it fills. */
  formulas: readonly (SheetArea & { text: string })[];
  names: readonly { name: string; text: string; sheet?: string }[];
  /** Formulas elsewhere: in rules of conditional formats, in columns of tables. */
  others: readonly { sheet: string; where: string; text: string }[];
  sheets: readonly string[];
  /** Names that stay and call functions of ours: formulas that use them become values. */
  lost?: readonly string[];
  /** The cells that a reference means in a formula at a place, null where it means something else. */
  areaOf(reference: string, at: { sheet: string; row: number; column: number }): SheetArea | null;
}

/** What a formula becomes: a formula for each cell, another formula that fills what it filled, or the values that its cells show. */
export type Outcome = { kind: 'formulas'; formulas: string[][] } | { kind: 'reference'; formula: string } | { kind: 'values' };

export interface PlainCopy {
  cells: (SheetArea & { outcome: Outcome })[];
  /** The new text of names and of formulas elsewhere; null where they have to go. */
  names: { name: string; sheet?: string; text: string | null }[];
  others: { index: number; text: string | null }[];
  /** The sheet that tells of it: a name that is free, and what it holds. */
  sheet: { name: string; rows: CellInput[][]; widths: number[] };
  /** How many formulas of ours became formulas and how many became values, by sheet. */
  counts: { sheet: string; formulas: number; values: number }[];
}

export interface Maker {
  version: string;
  /** As the record shows it. */
  date: string;
}

/** Called now and then; what it throws ends the work, and nothing has been changed. */
export type OnProgress = (done: number, total: number) => void | Promise<void>;

/** Progress on a page: it is drawn, a click gets through, and the work ends once `signal` is aborted, with the signal's reason. */
export const cancellable = (signal: AbortSignal, tell: (done: number, total: number) => void): OnProgress => async (done, total) => {
  tell(done, total);
  await new Promise((resume) => setTimeout(resume));
  signal.throwIfAborted();
};

export async function plainCopy(source: PlainSource, maker: Maker, onProgress: OnProgress = () => {}): Promise<PlainCopy> {
  const copier = new Copier(source);
  copier.convertNames();
  for (const [i, formula] of source.formulas.entries()) {
    if (i % STEP === 0) await onProgress(i, source.formulas.length);
    copier.convertFormula(formula);
  }
  copier.convertOthers();
  return copier.result(maker);
}

const STEP = 200;

interface Entry {
  sheet: string;
  area: Area;
  /** What the list shows instead of an address. */
  where?: string;
  was: string;
  became: string;
  now: string;
  note: string;
  /** Formulas that are alike from row to row have one key. */
  key: string;
}

class Copier {
  readonly #cells: PlainCopy['cells'] = [];
  readonly #names: PlainCopy['names'] = [];
  readonly #others: PlainCopy['others'] = [];
  readonly #entries: Entry[] = [];
  readonly #counts: PlainCopy['counts'];
  readonly #lost = new Set<string>();
  /** The formulas that fill more than they will, by their first cell. */
  readonly #spills = new Map<string, { area: Area; dissolved: boolean }>();

  constructor(private readonly source: PlainSource) {
    for (const name of source.lost ?? []) this.#lost.add(name.toLowerCase());
    this.#counts = source.sheets.map((sheet) => ({ sheet, formulas: 0, values: 0 }));
    for (const { sheet, area, text } of source.formulas) this.#spills.set(place(sheet, area.top, area.left), { area, dissolved: callsOurs(text) });
  }

  /** A name that has no native form is lost, and so are those that use it. */
  convertNames(): void {
    for (let before = -1; before < this.#lost.size;) {
      before = this.#lost.size;
      for (const { name, text, sheet } of this.source.names) {
        if (this.#convertName(text, sheet) instanceof NoEquivalent) this.#lost.add(name.toLowerCase());
      }
    }
    for (const { name, text, sheet } of this.source.names) {
      const converted = this.#convertName(text, sheet);
      if (converted === null) continue;
      const now = converted instanceof NoEquivalent ? null : converted.formulas[0]![0]!;
      this.#names.push({ name, text: now, ...(sheet !== undefined && { sheet }) });
      this.#noteOther(sheet ?? '', list.name(name), text, converted);
    }
    for (const { sheet, area, text } of this.source.formulas) {
      const spill = this.#spills.get(place(sheet, area.top, area.left))!;
      spill.dissolved ||= this.#lost.size > 0 && this.#convert(text, { sheet, area }) instanceof NoEquivalent;
    }
  }

  convertFormula({ sheet, area, text }: PlainSource['formulas'][number]): void {
    const converted = this.#convert(text, { sheet, area });
    if (converted === null) return;
    const outcome = outcomeOf(converted);
    this.#cells.push({ sheet, area, outcome });
    const counts = this.#counts.find((one) => one.sheet === sheet);
    if (counts && outcome.kind === 'formulas') counts.formulas++;
    if (counts && outcome.kind === 'values') counts.values++;
    this.#entries.push({ sheet, area, key: `${areaAddress({ ...area, top: 0, bottom: area.bottom - area.top })}|${relative(text, area)}`, was: shown(text), ...told(converted, outcome, area) });
  }

  convertOthers(): void {
    for (const [index, { sheet, where, text }] of this.source.others.entries()) {
      const converted = this.#convert(text, { sheet, area: singleCell(0, 0) });
      if (converted === null) continue;
      this.#others.push({ index, text: converted instanceof NoEquivalent ? null : converted.formulas[0]![0]! });
      this.#noteOther(sheet, where, text, converted);
    }
  }

  result(maker: Maker): PlainCopy {
    return { cells: this.#cells, names: this.#names, others: this.#others, counts: this.#counts, sheet: { name: freeName(this.source.sheets), rows: this.#rows(maker), widths: [...list.widths] } };
  }

  #rows({ version, date }: Maker): CellInput[][] {
    const entries = this.#merged();
    const table = entries.map(({ sheet, area, where, was, became, now, note }) => [sheet, where ?? areaAddress(area), was, became, now, note]);
    return [[list.sheet], ...record(version, date), [], ...(table.length === 0 ? [[list.nothing]] : [[...list.columns], ...table])];
  }

  /** Entries of formulas that were filled down a column as one. */
  #merged(): Entry[] {
    const order = (a: Entry, b: Entry) => this.source.sheets.indexOf(a.sheet) - this.source.sheets.indexOf(b.sheet)
      || Number(a.where !== undefined) - Number(b.where !== undefined) || a.area.left - b.area.left || a.area.top - b.area.top;
    const merged: Entry[] = [];
    for (const entry of [...this.#entries].sort(order)) {
      const last = merged.at(-1);
      const follows = last && !entry.where && last.sheet === entry.sheet && last.key === entry.key && last.area.bottom + 1 === entry.area.top
        && last.became === entry.became && last.note === entry.note && rowsOf(entry.area) === 1;
      if (follows) last.area = { ...last.area, bottom: entry.area.bottom };
      else merged.push(entry);
    }
    return merged;
  }

  #noteOther(sheet: string, where: string, text: string, converted: NativeFormulas | NoEquivalent): void {
    const isLost = converted instanceof NoEquivalent;
    this.#entries.push({
      sheet, where, area: singleCell(0, 0), key: '', was: shown(text), became: isLost ? list.removed : converted.replaces ? list.formula : list.reference,
      now: isLost ? '' : shown(converted.formulas[0]![0]!), note: isLost ? list.because(converted.message) : noteOf(converted, 1),
    });
  }

  /** A name stands on no sheet: what it refers to is written with its sheet. */
  #convertName = (text: string, sheet = this.source.sheets[0] ?? '') => this.#convert(text, { sheet: '', area: singleCell(0, 0) }, sheet);

  /** @param from the sheet that references without one mean */
  #convert(text: string, fills: SheetArea, from = fills.sheet): NativeFormulas | NoEquivalent | null {
    const surroundings: Surroundings = {
      fills,
      areaOf: (reference) => this.source.areaOf(reference, { sheet: from, row: fills.area.top, column: fills.area.left }),
      spillOf: (sheet, row, column) => this.#spills.get(place(sheet, row, column)) ?? { area: singleCell(row, column), dissolved: false },
      isLost: (name) => this.#lost.has(name.toLowerCase()),
    };
    try {
      return nativeFormulas(text, surroundings);
    } catch (error) {
      if (error instanceof NoEquivalent) return error;
      throw error;
    }
  }
}

const place = (sheet: string, row: number, column: number): string => `${row},${column},${sheet.toLowerCase()}`;

function outcomeOf(converted: NativeFormulas | NoEquivalent): Outcome {
  if (converted instanceof NoEquivalent) return { kind: 'values' };
  return converted.replaces ? { kind: 'formulas', formulas: converted.formulas } : { kind: 'reference', formula: converted.formulas[0]![0]! };
}

function told(converted: NativeFormulas | NoEquivalent, outcome: Outcome, area: Area): Pick<Entry, 'became' | 'now' | 'note'> {
  if (converted instanceof NoEquivalent) return { became: list.value, now: list.values(rowsOf(area) * columnsOf(area)), note: list.because(converted.message) };
  return {
    became: outcome.kind === 'reference' ? list.reference : list.formula,
    now: shown(converted.formulas[0]![0]!),
    note: noteOf(converted, rowsOf(area) * columnsOf(area)),
  };
}

function noteOf({ replaces, rounds, repeats }: NativeFormulas, cells: number): string {
  if (!replaces) return notes.names;
  return [rounds && notes.rounds, repeats && notes.repeats, cells > 1 && notes.cells].filter((note) => note !== false).join(' ');
}

/** A formula as a sheet shows it. */
function shown(formula: string): string {
  const write = (nodes: readonly Node[]): string => nodes.map((node) => {
    if (!isCall(node)) return node.value.replace(/^_xlpm\./i, '');
    const [name, inside] = [sheetFunctionName(node.name), write(node.items)];
    if (name === 'ANCHORARRAY') return `${inside}#`;
    return name === 'SINGLE' ? `@${inside}` : `${name}(${inside}${node.closed ? ')' : ''}`;
  }).join('');
  return `=${write(formulaTree(formula))}`;
}

/** A formula as it is alike in every row that it was filled into. */
const relative = (formula: string, area: Area): string =>
  translateTokensToR1C1(tokenize(formula.replace(/^\s*=/, '')), cellAddress(area.top, area.left)).map(({ value }) => value).join('');

function freeName(sheets: readonly string[]): string {
  const taken = new Set(sheets.map((name) => name.toLowerCase()));
  let name: string = list.sheet;
  for (let number = 2; taken.has(name.toLowerCase()); number++) name = `${list.sheet} ${number}`;
  return name;
}
