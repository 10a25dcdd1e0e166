// Which formulas have to be computed again when cells change: those that read them, those that read these, and so on.

import { type Area, isSingle, overlap } from '../../formula/address';
import type { SheetArea, Translation } from './formula-to-sheet';

/** A formula as far as its place among the others goes. */
export interface Dependent {
  reads: Translation['reads'];
  readsAnything: boolean;
  /** The cells that it fills. */
  fills: SheetArea;
}

/** Finds, step by step, the formulas that changes reach. */
export class AffectedFormulas<T extends Dependent> {
  readonly found = new Set<T>();
  /** Formulas that read a single cell, by the cell. */
  readonly #cellReaders = new Map<string, T[]>();
  /** Formulas that read a range, by sheet and range, until a change reaches it. */
  readonly #rangeReaders = new Map<string, Map<string, { area: Area; readers: T[] }>>();
  #anythingReaders: T[] = [];

  constructor(formulas: Iterable<T>) {
    for (const formula of formulas) {
      if (formula.readsAnything) this.#anythingReaders.push(formula);
      for (const read of formula.reads) this.#note(formula, read);
    }
  }

  /** Adds a formula, and all that depend on it. */
  add(formula: T): void {
    this.#spread([formula]);
  }

  /** Adds the formulas that depend on cells. */
  addReadersOf(changed: SheetArea): void {
    this.#spread(this.#readersOf(changed));
  }

  #note(formula: T, { sheet, area }: SheetArea): void {
    if (isSingle(area)) {
      const key = cellKey(sheet, area.top, area.left);
      this.#cellReaders.set(key, [...this.#cellReaders.get(key) ?? [], formula]);
      return;
    }
    const ranges = this.#rangeReaders.get(sheet) ?? new Map<string, { area: Area; readers: T[] }>();
    this.#rangeReaders.set(sheet, ranges);
    const key = `${area.top},${area.left},${area.bottom},${area.right}`;
    const range = ranges.get(key) ?? { area, readers: [] };
    range.readers.push(formula);
    ranges.set(key, range);
  }

  #spread(first: T[]): void {
    const next = first;
    for (let formula = next.pop(); formula; formula = next.pop()) {
      if (this.found.has(formula)) continue;
      this.found.add(formula);
      next.push(...this.#readersOf(formula.fills));
    }
  }

  #readersOf({ sheet, area }: SheetArea): T[] {
    const readers = this.#anythingReaders;
    this.#anythingReaders = [];
    for (let row = area.top; row <= area.bottom; row++) {
      for (let column = area.left; column <= area.right; column++) readers.push(...this.#cellReaders.get(cellKey(sheet, row, column)) ?? []);
    }
    const ranges = this.#rangeReaders.get(sheet);
    for (const [key, range] of ranges ?? []) {
      if (!overlap(range.area, area)) continue;
      readers.push(...range.readers);
      ranges!.delete(key); // they are all found now
    }
    return readers;
  }
}

const cellKey = (sheet: string, row: number, column: number): string => `${row},${column},${sheet}`;
