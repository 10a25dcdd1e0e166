// Formulas of the played workbook: one call of a worksheet function, whose arguments are references, constants, and sums, differences,
// products and quotients of these.

import { type AstExpression, parse, tokenize } from '@borgar/fx';
import type { CellValue } from '../../../src/host/port';

/** Computes `FOLD.NAME(argument, …)`: rows of cells, an error as an object. */
export type Evaluate = (name: string, args: (CellValue[][] | null)[]) => CellValue[][];

/** Rows of cells of a reference as it stands in the formula; undefined where it means none. */
export type Cells = (reference: string) => CellValue[][] | undefined;

const UNKNOWN: CellValue[][] = [[{ error: '#NAME?' }]];

export function compute(formula: string, evaluate: Evaluate, cells: Cells): CellValue[][] {
  const node = read(formula);
  if (node.type !== 'CallExpression' || node.callee.type !== 'Identifier') return UNKNOWN;
  const [, name] = /^FOLD\.([A-Z]+)$/.exec(node.callee.name) ?? [];
  const args = node.arguments as (AstExpression | null)[]; // null where one is left out
  return name === undefined ? UNKNOWN : evaluate(name, args.map((argument) => argument && valueOf(argument, cells)));
}

/** Whether the program takes a formula. */
export function isFormula(text: string): boolean {
  try {
    read(text);
    return true;
  } catch {
    return false;
  }
}

/** Each formula is read once: the workbook computes all of them after every edit. */
function read(formula: string): AstExpression {
  if (!known.has(formula)) known.set(formula, parse(tokenize(formula)));
  return known.get(formula)!;
}

const known = new Map<string, AstExpression>();

function valueOf(node: AstExpression, cells: Cells): CellValue[][] {
  switch (node.type) {
    case 'Literal': return [[node.value as CellValue]];
    case 'ReferenceIdentifier': return cells(node.value) ?? UNKNOWN;
    case 'BinaryExpression': {
      const [left, right] = node.arguments.map((one) => Number(valueOf(one, cells)[0]![0]));
      const operate = OPERATORS[node.operator];
      return operate ? [[operate(left!, right!)]] : UNKNOWN;
    }
    default: return UNKNOWN;
  }
}

const OPERATORS: Record<string, (a: number, b: number) => number> = { '+': (a, b) => a + b, '-': (a, b) => a - b, '*': (a, b) => a * b, '/': (a, b) => a / b };
