// A formula of the file, as a sheet writes it, and what it depends on.
//
// What an embedded sheet doesn't know becomes plain addresses: structured references, references to a whole spill, and the cell that
// an ordinary formula takes from a range beside it.

import { parseA1Ref, parseStructRef, tokenTypes, tokenize, translateTokensToA1, translateTokensToR1C1 } from '@borgar/fx/xlsx';
import { type Area, LAST_COLUMN, LAST_ROW, areaAddress, cellAddress, columnsOf, isSingle, rowsOf, sheetPrefix, singleCell } from '../../formula/address';
import { isOfSingleValues } from '../../formula/array-arguments';
import { type Book, findName, sheetNamed } from './book';
import { type Call, type Node, argumentsOf, formulaTree, isCall, isOperator, isReference, isSpace, treeOf } from '../../formula/formula-tree';
import { isOurs, sheetFunctionName } from '../../formula/function-names';
import type { FileFormula } from './sheet-part';
import { structuredArea } from './tables';

/** A cell. */
export interface Place {
  sheet: string;
  row: number;
  column: number;
}

export interface SheetArea {
  sheet: string;
  area: Area;
}

export interface Translation {
  /** With "=". */
  formula: string;
  reads: SheetArea[];
  /** Whether it may read any cell, as INDIRECT does. */
  readsAnything: boolean;
  /** Names of its functions as a sheet shows them, those of its names included. */
  functions: Set<string>;
  callsFold: boolean;
  /** The formulas whose whole spill it refers to. */
  spills: Place[];
  /** Why it can't be computed from this file alone. */
  obstacle?: 'another workbook' | 'several sheets';
}

export interface TranslationOptions {
  /** Defined names stay, or what they stand for takes their place: a name may be that of a function, which not every engine can tell apart. */
  names: 'keep' | 'replace';
  /** The cells that the formula of a cell fills now. */
  spillOf(place: Place): Area;
}

export function toSheetFormula(book: Book, { text, kind }: Pick<FileFormula, 'text' | 'kind'>, at: Place, options: TranslationOptions): Translation {
  const tree = formulaTree(text);
  const translator = new Translator(book, at, options);
  const { found } = translator;
  // Our functions came after formulas learnt to spill: theirs is never the old meaning.
  const oldMeaning = kind === 'ordinary' && !callsFold(book, tree, at.sheet, []);
  found.formula = `=${translator.list(tree, { single: oldMeaning, within: [] })}`;
  found.callsFold = [...found.functions].some(isOurs);
  return found;
}

/** The cells that a reference means by itself: an address, a name, or a structured reference; null where it means none. */
export function referencedArea(book: Book, reference: string, at: Place): SheetArea | null {
  const translator = new Translator(book, at, { names: 'replace', spillOf: ({ row, column }) => singleCell(row, column) });
  return translator.areaMeant(formulaTree(reference), []);
}

function callsFold(book: Book, nodes: readonly Node[], sheet: string, within: string[]): boolean {
  return nodes.some((node) => {
    if (isCall(node)) return isOurs(sheetFunctionName(node.name)) || callsFold(book, node.items, sheet, within);
    const name = node.type === tokenTypes.REF_NAMED && findName(book, node.value, sheet);
    return name && !within.includes(name.name) && callsFold(book, formulaTree(name.text), sheet, [...within, name.name]);
  });
}

interface Scope {
  /** Whether a range means the cell of it that stands beside the formula. */
  single: boolean;
  /** The names whose meaning is being read. */
  within: string[];
}

/** A piece of the translated formula, and the cells that it means where it is a reference. */
interface Piece {
  text: string;
  meant?: SheetArea;
  /** The node it came from, where that has not been made into something else. */
  node?: Node;
}

const MAY_READ_ANYTHING = ['INDIRECT', 'OFFSET'];

class Translator {
  readonly found: Translation = { formula: '', reads: [], readsAnything: false, functions: new Set(), callsFold: false, spills: [] };

  constructor(private readonly book: Book, private readonly at: Place, private readonly options: TranslationOptions) {}

  list(nodes: readonly Node[], scope: Scope): string {
    let pieces = nodes.map((node) => this.#piece(node, scope));
    pieces = this.#wholeSpills(pieces);
    pieces = this.#ranges(pieces);
    pieces = this.#intersections(pieces, scope);
    for (const { meant } of pieces) if (meant) this.found.reads.push(meant);
    return pieces.map(({ text }) => text).join('');
  }

  /** The cells that nodes mean, where they are one reference. */
  areaMeant(nodes: readonly Node[], within: string[]): SheetArea | null {
    const terms = nodes.filter((node) => !isSpace(node));
    if (terms.some((node) => isCall(node) || !(isReference(node) || isOperator(node, ':')))) return null;
    const [piece, ...more] = this.#ranges(terms.map((node) => this.#piece(node, { single: false, within })));
    return more.length === 0 ? piece?.meant ?? null : null;
  }

  #piece(node: Node, scope: Scope): Piece {
    if (isCall(node)) return this.#call(node, scope);
    if (!isReference(node)) return { text: node.value, node };
    if (node.type === tokenTypes.REF_STRUCT) return this.#structured(node.value);
    if (node.type === tokenTypes.REF_NAMED) return this.#name(node.value, scope);
    return this.#address(node.value);
  }

  #call(call: Call, scope: Scope): Piece {
    const name = sheetFunctionName(call.name);
    const args = argumentsOf(call);
    if (name.toUpperCase() === 'ANCHORARRAY') return this.#wholeSpill(args[0]!.map((node) => this.#piece(node, scope)));
    if (name.toUpperCase() === 'SINGLE') return this.#beside(args[0]!.map((node) => this.#piece(node, { ...scope, single: false })));
    if (name !== '') this.found.functions.add(name.toUpperCase());
    if (MAY_READ_ANYTHING.includes(name.toUpperCase())) this.found.readsAnything = true;
    const inside = { ...scope, single: scope.single && (name === '' || isOfSingleValues(name)) };
    return { text: `${name}(${args.map((nodes) => this.list(nodes, inside)).join(',')}${call.closed ? ')' : ''}`, node: call };
  }

  #address(text: string): Piece {
    const reference = parseA1Ref(text);
    if (!reference || !('range' in reference)) return { text };
    const { workbookName, sheetName, range } = reference;
    if (workbookName) return this.#outside(text, 'another workbook');
    if (sheetName?.includes(':')) return this.#outside(text, 'several sheets');
    const sheet = sheetName ? sheetNamed(this.book, sheetName)?.name : this.at.sheet;
    if (sheet === undefined) return { text };
    const area = { top: range.top ?? 0, left: range.left ?? 0, bottom: range.bottom ?? LAST_ROW, right: range.right ?? LAST_COLUMN };
    return { text, meant: { sheet, area } };
  }

  #structured(text: string): Piece {
    const reference = parseStructRef(text);
    if (!reference) return { text };
    if (reference.workbookName) return this.#outside(text, 'another workbook');
    const meant = structuredArea(this.book.tables, reference, this.at);
    if (!meant) return { text: '#REF!' };
    const { area: { top, left, bottom, right } } = meant;
    // Moved to another row, the formula means that row's cell; and the same columns wherever it goes.
    const fixed = reference.sections?.includes('this row') ? '' : '$';
    const corner = (row: number, column: number) => `$${cellAddress(row, column).replace(/(?=\d)(?<!\d)/, fixed)}`;
    const address = isSingle(meant.area) ? corner(top, left) : `${corner(top, left)}:${corner(bottom, right)}`;
    return { text: this.#onSheet(meant.sheet, address), meant };
  }

  #name(text: string, { within }: Scope): Piece {
    if (/^_xlpm\./i.test(text)) return { text: text.slice('_xlpm.'.length) };
    const reference = parseA1Ref(text);
    if (!reference || !('name' in reference)) return { text };
    if (reference.workbookName) return this.#outside(text, 'another workbook');
    const sheet = reference.sheetName || this.at.sheet;
    const defined = findName(this.book, reference.name, sheet);
    if (!defined) return this.book.tables.some(({ name }) => name.toLowerCase() === text.toLowerCase()) ? this.#structured(`${text}[]`) : { text };
    if (within.includes(defined.name)) return { text: '#NAME?' };
    // What a name refers to is written as seen from A1.
    const tokens = translateTokensToR1C1(tokenize(defined.text), 'A1');
    const tree = treeOf(translateTokensToA1(tokens, cellAddress(this.at.row, this.at.column)));
    const inside = { single: false, within: [...within, defined.name] };
    const meant = this.areaMeant(tree, inside.within);
    const shown = this.options.names === 'keep' ? text : null;
    if (meant) return { text: shown ?? this.#qualified(meant), meant };
    const replaced = this.list(tree, inside);
    return { text: shown ?? `(${replaced})` };
  }

  #outside(text: string, obstacle: NonNullable<Translation['obstacle']>): Piece {
    this.found.obstacle ??= obstacle;
    return { text };
  }

  /** `A1#` */
  #wholeSpills(pieces: Piece[]): Piece[] {
    const done: Piece[] = [];
    for (const piece of pieces) {
      if (!isOperator(piece.node, '#')) done.push(piece);
      else {
        while (done.length > 0 && isSpaceOf(done.at(-1)!)) done.pop();
        done.push(this.#wholeSpill(done.splice(-1)));
      }
    }
    return done;
  }

  #wholeSpill(pieces: Piece[]): Piece {
    const meant = pieces.find((piece) => piece.meant)?.meant;
    if (!meant || !isSingle(meant.area)) return { text: '#REF!' };
    const place = { sheet: meant.sheet, row: meant.area.top, column: meant.area.left };
    this.found.spills.push(place);
    const whole = { sheet: meant.sheet, area: this.options.spillOf(place) };
    return { text: this.#qualified(whole), meant: whole };
  }

  /** `A1:Last`: a range between references that are known is one, any other may reach anywhere. */
  #ranges(pieces: Piece[]): Piece[] {
    const done: Piece[] = [];
    for (let i = 0; i < pieces.length; i++) {
      const piece = pieces[i]!;
      if (!isOperator(piece.node, ':')) {
        done.push(piece);
        continue;
      }
      const [before, after] = [done.at(-1)?.meant, pieces[i + 1]?.meant];
      if (before && after && before.sheet === after.sheet) {
        const area = {
          top: Math.min(before.area.top, after.area.top), left: Math.min(before.area.left, after.area.left),
          bottom: Math.max(before.area.bottom, after.area.bottom), right: Math.max(before.area.right, after.area.right),
        };
        const whole = { sheet: before.sheet, area };
        done.splice(-1, 1, { text: this.#qualified(whole), meant: whole });
        i++;
      } else {
        this.found.readsAnything = true;
        done.push(piece);
      }
    }
    return done;
  }

  /** `@A1:A9`, and every range where the formula is of the old kind that fills one cell. */
  #intersections(pieces: Piece[], { single }: Scope): Piece[] {
    const done: Piece[] = [];
    for (let i = pieces.length - 1; i >= 0; i--) {
      const piece = pieces[i]!;
      if (isOperator(piece.node, '@')) {
        const operand = done.findIndex((one) => !isSpaceOf(one));
        if (operand >= 0) done.splice(0, operand + 1, this.#beside([done[operand]!]));
      } else {
        const partOfRange = isOperator(pieces[i - 1]?.node, ':') || isOperator(pieces[i + 1]?.node, ':');
        done.unshift(single && piece.meant && !partOfRange ? this.#beside([piece]) : piece);
      }
    }
    return done;
  }

  /** The one cell of a range that stands in the formula's row or column. */
  #beside(pieces: Piece[]): Piece {
    const operand = pieces.find((piece) => !isSpaceOf(piece));
    if (!operand) return { text: '' };
    const { meant, text } = operand;
    if (!meant) return { text: this.options.names === 'keep' ? `@${text}` : `INDEX(${text},1,1)` };
    if (isSingle(meant.area)) return operand;
    const area = besideIn(meant.area, this.at);
    const cell = area && { sheet: meant.sheet, area };
    if (this.options.names === 'keep') return { text: `@${text}`, meant: cell ?? meant };
    return cell ? { text: this.#qualified(cell), meant: cell } : { text: '#VALUE!' };
  }

  #qualified({ sheet, area }: SheetArea): string {
    return this.#onSheet(sheet, areaAddress(area));
  }

  #onSheet(sheet: string, address: string): string {
    return sheet === this.at.sheet ? address : `${sheetPrefix(sheet)}!${address}`;
  }
}

const isSpaceOf = ({ node }: Piece): boolean => node !== undefined && isSpace(node);

function besideIn(area: Area, { row, column }: Place): Area | null {
  const { top, left, bottom, right } = area;
  if (columnsOf(area) === 1 && row >= top && row <= bottom) return singleCell(row, left);
  if (rowsOf(area) === 1 && column >= left && column <= right) return singleCell(top, column);
  return null;
}
