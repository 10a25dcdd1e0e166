// One formula, as native formulas: one for each cell that it fills.

import { parseA1Ref, parseStructRef, tokenTypes } from '@borgar/fx/xlsx';
import { type Area, cellAddress, columnsOf, isSingle, parseArea, rowsOf, sheetPrefix } from '../formula/address';
import { givesArray, isOfSingleValues, takesRange } from '../formula/array-arguments';
import { type Call, type Node, argumentsOf, formulaTree, isCall, isOperator, isReference, isSpace, textOf } from '../formula/formula-tree';
import { isOurs, sheetFunctionName } from '../formula/function-names';
import { EQUIVALENTS } from './equivalents';
import { type Expression, NoEquivalent } from './native';
import { reasons } from './sentences';

export interface SheetArea {
  sheet: string;
  area: Area;
}

/** What a formula's surroundings say of it. */
export interface Surroundings {
  /** The cells that it fills; its own is the first. */
  fills: SheetArea;
  /** The cells that a reference means: an address, a name or a structured reference; null where it means something else. */
  areaOf(reference: string): SheetArea | null;
  /** The cells that the formula of a cell fills, and whether they get formulas or values of their own. */
  spillOf(sheet: string, row: number, column: number): { area: Area; dissolved: boolean };
  /** Whether a name has no native form, so that what uses it has none. */
  isLost(name: string): boolean;
}

export interface NativeFormulas {
  /** Row by row, without "="; a single one where none of ours was replaced. */
  formulas: string[][];
  replaces: boolean;
  /** Whether what replaces one of ours rounds. */
  rounds: boolean;
  /** Whether an argument that is a longer expression stands in it several times. */
  repeats: boolean;
}

/** More than that no program takes. */
const MOST_CHARACTERS = 8192;
const MOST_LEVELS = 64;

/** An argument that is longer is worth telling that it is repeated. */
const LONG = 24;

/**
 * The native formulas in place of one with functions of ours, or with a reference to the whole spill of one; null where it has neither.
 * Takes and gives formulas in the notation of a sheet or of a file: both may stand with their own names.
 * @throws NoEquivalent where there are none
 */
export function nativeFormulas(formula: string, surroundings: Surroundings): NativeFormulas | null {
  const tree = formulaTree(formula);
  const conversion = new Conversion(tree, surroundings);
  return conversion.isNeeded ? conversion.run() : null;
}

/** Whether a formula calls a function of ours itself. */
export const callsOurs = (formula: string): boolean => some(formulaTree(formula), (node) => isCall(node) && isOurs(sheetFunctionName(node.name)));

function some(nodes: readonly Node[], is: (node: Node, i: number, all: readonly Node[]) => boolean): boolean {
  return nodes.some((node, i) => is(node, i, nodes) || (isCall(node) && some(node.items, is)));
}

/** `element`: what stands here for one cell of the block. `whole`: what stands here as it is, for a function that takes all of it. */
type Manner = 'element' | 'whole';

/** A reference to a whole spill. */
interface Spill extends SheetArea {
  dissolved: boolean;
  /** What refers to its first cell, and the whole text. */
  reference: string;
  text: string;
}

class Conversion {
  readonly #rows: number;
  readonly #columns: number;
  readonly #result: NativeFormulas = { formulas: [], replaces: false, rounds: false, repeats: false };
  /** Whether nothing in the formula can be more than one value. */
  readonly #scalar: boolean;
  readonly #hasOurs: boolean;
  readonly #areas = new Map<string, SheetArea | null>();
  /** The cell of the block that is being written. */
  #row = 0;
  #column = 0;

  constructor(private readonly tree: Node[], private readonly surroundings: Surroundings) {
    this.#rows = rowsOf(surroundings.fills.area);
    this.#columns = columnsOf(surroundings.fills.area);
    this.#hasOurs = some(tree, (node) => this.#isOursOrLost(node));
    this.#scalar = this.#isOneCell && !some(tree, (node) => this.#isSeveral(node));
  }

  get isNeeded(): boolean {
    return this.#hasOurs || some(this.tree, (_node, i, all) => this.#spillAt(all, i)?.dissolved === true);
  }

  run(): NativeFormulas {
    if (!this.#hasOurs) return { ...this.#result, formulas: [[this.#checked(this.#list(this.tree, 'whole'))]] };
    for (this.#row = 0; this.#row < this.#rows; this.#row++) {
      const line: string[] = [];
      for (this.#column = 0; this.#column < this.#columns; this.#column++) line.push(this.#checked(this.#list(this.tree, 'element')));
      this.#result.formulas.push(line);
    }
    return this.#result;
  }

  get #isOneCell(): boolean {
    return this.#rows === 1 && this.#columns === 1;
  }

  #checked(formula: string): string {
    if (formula.length >= MOST_CHARACTERS) throw new NoEquivalent(reasons.long);
    let [depth, deepest] = [0, 0];
    for (const sign of formula.replace(/"(?:[^"]|"")*"|'(?:[^']|'')*'/g, '')) {
      if (sign === '(') deepest = Math.max(deepest, ++depth);
      if (sign === ')') depth--;
    }
    if (deepest > MOST_LEVELS) throw new NoEquivalent(reasons.deep);
    return formula;
  }

  // Writing

  #list(nodes: readonly Node[], manner: Manner): string {
    if (manner === 'element' && nodes.some((node) => isOperator(node, '{') || isOperator(node, ':') || isOperator(node, ','))) throw new NoEquivalent(reasons.together);
    let text = '';
    for (let i = 0; i < nodes.length; i++) {
      const node = nodes[i]!;
      const beside = isOperator(node, '@') ? nodes[i + 1] : undefined;
      const spill = this.#spillAt(nodes, i);
      if (beside) {
        text += this.#beside(textOf([beside]));
        i++;
      } else if (spill) {
        text += this.#spill(spill, manner);
        if (isOperator(nodes[i + 1], '#')) i++;
      } else text += this.#node(node, manner);
    }
    return text;
  }

  #node(node: Node, manner: Manner): string {
    if (!isCall(node)) return manner === 'element' && isReference(node) ? this.#element(node.value) : this.#kept(node.value);
    const name = sheetFunctionName(node.name);
    if (isOurs(name)) return this.#ours(name, node, manner);
    if (name.toUpperCase() === 'SINGLE') return this.#beside(textOf(node.items));
    const inside = manner === 'element' && (name === '' || isOfSingleValues(name)) ? 'element' : 'whole';
    if (manner === 'element' && inside === 'whole' && !this.#isOneCell && this.#mayGiveSeveral(node, name)) throw new NoEquivalent(reasons.together);
    return `${this.#kept(node.name)}(${argumentsOf(node).map((nodes) => this.#list(nodes, inside)).join(',')}${node.closed ? ')' : ''}`;
  }

  /** A name or a text that stays. */
  #kept(text: string): string {
    if (this.surroundings.isLost(text)) throw new NoEquivalent(reasons.lostName(text));
    return text;
  }

  #ours(name: string, call: Call, manner: Manner): string {
    const equivalent = EQUIVALENTS[name.slice('FOLD.'.length)];
    if (!equivalent) throw new NoEquivalent(reasons.noEquivalent(name));
    if (call.items.some((node) => isOperator(node, '{'))) throw new NoEquivalent(reasons.together);
    const given = argumentsOf(call);
    if (given.length < equivalent.least || given.length > equivalent.most) throw new NoEquivalent(reasons.count(name));
    if (manner === 'whole' && !this.#scalar && !given.every((nodes) => this.#isScalar(nodes))) throw new NoEquivalent(reasons.together);
    const args = Array.from({ length: equivalent.most }, (_, i) => this.#expression(given[i] ?? [], manner));
    this.#result.replaces = true;
    this.#result.rounds ||= equivalent.rounds;
    return equivalent.write(...args);
  }

  #expression(nodes: readonly Node[], manner: Manner): Expression {
    if (some(nodes, (node) => isCall(node) && RANDOM.includes(sheetFunctionName(node.name).toUpperCase()))) throw new NoEquivalent(reasons.random);
    const terms = nodes.filter((node) => !isSpace(node));
    const literal = literalOf(terms);
    if (literal) return literal;
    const text = this.#list(nodes, manner).trim();
    const isOneTerm = terms.length <= 1 || (terms.length === 2 && (isOperator(terms[0], '@') || isOperator(terms[1], '#')));
    if (text.length > LONG && !(terms.length === 1 && isReference(terms[0]!))) this.#result.repeats = true;
    return { text: isOneTerm ? text : `(${text})` };
  }

  /** The part of a reference that belongs to the cell of the block. */
  #element(reference: string): string {
    const kept = this.#kept(reference);
    const meant = this.#areaOf(reference);
    if (!meant) {
      if (this.#isOneCell) return kept;
      throw new NoEquivalent(reasons.together);
    }
    return isSingle(meant.area) ? kept : this.#cellOf(meant, reference);
  }

  #cellOf({ sheet, area }: SheetArea, reference: string): string {
    const { row, column } = { row: this.#step(rowsOf(area), this.#rows, this.#row), column: this.#step(columnsOf(area), this.#columns, this.#column) };
    const cell = cellAddress(area.top + row, area.left + column);
    const parsed = parseA1Ref(reference);
    if (parsed && 'range' in parsed) {
      const { $left, $top } = parsed.range;
      return `${reference.slice(0, reference.lastIndexOf('!') + 1)}${anchored(cell, $left === true, $top === true)}`;
    }
    const isName = parseStructRef(reference) === undefined;
    return `${sheet === this.surroundings.fills.sheet ? '' : `${sheetPrefix(sheet)}!`}${anchored(cell, isName, isName)}`;
  }

  /** One row or column serves all; as many as the block has serve one each. */
  #step(size: number, of: number, at: number): number {
    if (size === 1) return 0;
    if (size === of) return at;
    throw new NoEquivalent(reasons.sizes);
  }

  /** The one cell of a range that stands in the formula's row or column. */
  #beside(reference: string): string {
    const meant = this.#areaOf(reference);
    if (!meant) throw new NoEquivalent(reasons.together);
    const { top, left, bottom, right } = meant.area;
    const { top: row, left: column } = this.surroundings.fills.area;
    const prefix = meant.sheet === this.surroundings.fills.sheet ? '' : `${sheetPrefix(meant.sheet)}!`;
    if (isSingle(meant.area)) return `${prefix}${cellAddress(top, left)}`;
    if (left === right && row >= top && row <= bottom) return `${prefix}${anchored(cellAddress(row, left), true, false)}`;
    if (top === bottom && column >= left && column <= right) return `${prefix}${anchored(cellAddress(top, column), false, true)}`;
    throw new NoEquivalent(reasons.sizes);
  }

  // References to a whole spill: `A1#`, in a file ANCHORARRAY(A1)

  #spillAt(nodes: readonly Node[], i: number): Spill | null {
    const node = nodes[i]!;
    const isFunction = isCall(node) && sheetFunctionName(node.name).toUpperCase() === 'ANCHORARRAY';
    if (!isFunction && !(isReference(node) && isOperator(nodes[i + 1], '#'))) return null;
    const reference = textOf(isFunction ? node.items : [node]);
    const anchor = this.#areaOf(reference);
    if (!anchor || !isSingle(anchor.area)) return null;
    const { area, dissolved } = this.surroundings.spillOf(anchor.sheet, anchor.area.top, anchor.area.left);
    return { sheet: anchor.sheet, area, dissolved, reference, text: isFunction ? textOf([node]) : `${reference}#` };
  }

  #spill({ sheet, area, dissolved, reference, text }: Spill, manner: Manner): string {
    if (manner === 'element') return this.#cellOf({ sheet, area }, reference);
    if (!dissolved) return text;
    const parsed = parseA1Ref(reference);
    const { $left, $top } = parsed && 'range' in parsed ? parsed.range : { $left: true, $top: true };
    const corner = (row: number, column: number) => anchored(cellAddress(row, column), $left === true, $top === true);
    const address = isSingle(area) ? corner(area.top, area.left) : `${corner(area.top, area.left)}:${corner(area.bottom, area.right)}`;
    return `${sheet === this.surroundings.fills.sheet ? '' : `${sheetPrefix(sheet)}!`}${address}`;
  }

  #isOursOrLost(node: Node): boolean {
    return isCall(node) ? isOurs(sheetFunctionName(node.name)) || this.surroundings.isLost(node.name) : isReference(node) && this.surroundings.isLost(node.value);
  }

  // How much something is

  /** The cells that a reference means; those of other workbooks by their address alone. */
  #areaOf(reference: string): SheetArea | null {
    let area = this.#areas.get(reference);
    if (area === undefined) {
      area = this.surroundings.areaOf(reference) ?? outside(reference);
      this.#areas.set(reference, area);
    }
    return area;
  }

  /** Whether a node by itself may be more than one value. */
  #isSeveral(node: Node): boolean {
    if (isCall(node)) return givesArray(sheetFunctionName(node.name)) || sheetFunctionName(node.name).toUpperCase() === 'ANCHORARRAY';
    if (isOperator(node, '{') || isOperator(node, ':') || isOperator(node, '#')) return true;
    const meant = isReference(node) ? this.#areaOf(node.value) : null;
    return meant !== null && !isSingle(meant.area);
  }

  #isScalar(nodes: readonly Node[]): boolean {
    return nodes.every((node) => {
      if (isCall(node)) return !this.#isSeveral(node) && (takesRange(node.name, 0) || takesRange(node.name, 1) || this.#isScalar(node.items));
      return !this.#isSeveral(node) && !(isReference(node) && this.#areaOf(node.value) === null);
    });
  }

  /** Whether a function that is not computed cell by cell may give a block more than one value. */
  #mayGiveSeveral(call: Call, name: string): boolean {
    if (givesArray(name)) return true;
    return argumentsOf(call).some((nodes, place) => !takesRange(name, place) && some(nodes, (node) => this.#isSeveral(node)));
  }
}

/** The cells of an address whose sheet is not in this workbook. */
function outside(reference: string): SheetArea | null {
  const parsed = parseA1Ref(reference);
  const area = parsed && 'range' in parsed ? parseArea(reference.slice(reference.lastIndexOf('!') + 1)) : null;
  return area && { sheet: reference.slice(0, reference.lastIndexOf('!')), area };
}

const RANDOM = ['RAND', 'RANDBETWEEN', 'RANDARRAY'];

const anchored = (cell: string, left: boolean, top: boolean): string => cell.replace(/^([A-Z]+)(\d+)$/, `${left ? '$$' : ''}$1${top ? '$$' : ''}$2`);

/** A number or a text that is written out; null for anything else. */
function literalOf(terms: readonly Node[]): Expression | null {
  if (terms.length === 0) return { text: '' };
  const signs = terms.slice(0, -1);
  const last = terms.at(-1)!;
  if (isCall(last) || signs.some((node) => !isOperator(node, '-') && !isOperator(node, '+'))) return null;
  if (last.type === tokenTypes.NUMBER) {
    const value = signs.reduce((number, node) => (isOperator(node, '-') ? -number : number), Number(last.value));
    return { text: value < 0 ? `(${value})` : String(value), literal: value };
  }
  if (signs.length > 0) return null;
  if (last.type === tokenTypes.STRING) return { text: last.value, literal: last.value.slice(1, -1).replaceAll('""', '"') };
  return last.type === tokenTypes.BOOLEAN ? { text: last.value, literal: last.value } : null;
}
