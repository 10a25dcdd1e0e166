// A formula as a tree of calls and parentheses, as far as moving between a file and a sheet needs it.

import { type Token, tokenTypes, tokenize } from '@borgar/fx/xlsx';

/** A call, or a pair of parentheses: a call without a name. */
export interface Call {
  name: string;
  items: Node[];
  /** False where the formula ends before the parenthesis does. */
  closed: boolean;
}

export type Node = Token | Call;

export const isCall = (node: Node | undefined): node is Call => node !== undefined && 'items' in node;

export const isOperator = (node: Node | undefined, sign: string): boolean => node !== undefined && !isCall(node) && node.type === tokenTypes.OPERATOR && node.value === sign;

export const isSpace = (node: Node): boolean => !isCall(node) && (node.type === tokenTypes.WHITESPACE || node.type === tokenTypes.NEWLINE);

/** An address, a name or a structured reference. */
export const isReference = (node: Node): boolean =>
  !isCall(node) && [tokenTypes.REF_RANGE, tokenTypes.REF_BEAM, tokenTypes.REF_TERNARY, tokenTypes.REF_NAMED, tokenTypes.REF_STRUCT].some((type) => type === node.type);

/** Reads a formula, with or without its "=". */
export const formulaTree = (formula: string): Node[] => treeOf(tokenize(formula.replace(/^\s*=/, '')));

export function treeOf(tokens: readonly Token[]): Node[] {
  const root: Node[] = [];
  const open: Call[] = [];
  let name = '';
  for (const token of tokens) {
    const items = open.at(-1)?.items ?? root;
    if (token.type === tokenTypes.FUNCTION) name = token.value;
    else if (isOperator(token, '(')) {
      const call: Call = { name, items: [], closed: false };
      items.push(call);
      open.push(call);
      name = '';
    } else if (isOperator(token, ')') && open.length > 0) open.pop()!.closed = true;
    else items.push(token);
  }
  return root;
}

/** The arguments of a call; one that is left out has no nodes. */
export function argumentsOf({ items }: Call): Node[][] {
  const list: Node[][] = [[]];
  for (const item of items) {
    if (isOperator(item, ',')) list.push([]);
    else list.at(-1)!.push(item);
  }
  return list;
}

export const textOf = (nodes: readonly Node[]): string => nodes.map((node) => (isCall(node) ? `${node.name}(${textOf(node.items)}${node.closed ? ')' : ''}` : node.value)).join('');
