// A spreadsheet program in its strictest form: doubles as they are, no result nudged to a whole number. The programs at hand are more
// lenient, each in its own way, so they can't show that a native formula rounds where it must. Knows what native formulas use.

import { type AstExpression, parse, tokenize } from '@borgar/fx/xlsx';
import type { Row } from './random-rows';

type Value = Row[number] | { error: string };

/** The result of a formula over the cells of its row: A, B, C and so on. */
export function strictly(formula: string, row: Row): Value {
  return run(parse(tokenize(formula)), (reference) => row['ABCDEF'.indexOf(reference[0]!)] ?? null);
}

type Cells = (reference: string) => Value;

const VALUE = { error: '#VALUE!' };

const isError = (value: Value): value is { error: string } => typeof value === 'object' && value !== null;

function run(node: AstExpression, cells: Cells): Value {
  switch (node.type) {
    case 'Literal': return node.value as Value;
    case 'ErrorLiteral': return { error: node.value };
    case 'ReferenceIdentifier': return cells(node.value);
    case 'UnaryExpression': return numeric([run(node.arguments[0]!, cells)], (x) => -x!);
    case 'BinaryExpression': return operate(node.operator, run(node.arguments[0]!, cells), run(node.arguments[1]!, cells));
    case 'CallExpression': return call((node.callee as { name: string }).name, node.arguments as AstExpression[], cells);
    default: throw new Error(`A native formula has no ${node.type}.`);
  }
}

function call(name: string, args: AstExpression[], cells: Cells): Value {
  if (name === 'IF') {
    const condition = run(args[0]!, cells);
    return isError(condition) ? condition : run(args[condition ? 1 : 2]!, cells);
  }
  if (name === 'COUNT') return args.filter((arg) => typeof run(arg, cells) === 'number').length;
  if (name === 'NA') return { error: '#N/A' };
  const values = args.map((arg) => run(arg, cells));
  const wrong = values.find(isError);
  if (wrong) return wrong;
  const [first = null] = values;
  switch (name) {
    case 'AND': return values.every(Boolean);
    case 'OR': return values.some(Boolean);
    case 'LEN': return String(first ?? '').length;
    case 'LOWER': return String(first ?? '').toLowerCase();
    case 'TRIM': return String(first ?? '').trim();
    case 'N': return typeof first === 'number' ? first : 0;
    default: return numeric(values, NUMERIC[name]!);
  }
}

const NUMERIC: Record<string, (...values: number[]) => number | boolean> = {
  ABS: Math.abs, INT: Math.floor, MIN: Math.min, MAX: Math.max, LOG10: Math.log10, SIN: Math.sin, PI: () => Math.PI, ROUND: rounded,
  ISODD: (x) => Math.abs(x) % 2 === 1,
};

/** Half away from zero, by the digits of the number. */
function rounded(x: number, places: number): number {
  const [digits, exponent = '0'] = String(Math.abs(x)).split('e');
  const shifted = Number(`${digits}e${Number(exponent) + places}`);
  const whole = Math.round(shifted);
  const [back, power = '0'] = String(whole).split('e');
  return Math.sign(x) * Number(`${back}e${Number(power) - places}`);
}

function numeric(values: Value[], compute: (...values: number[]) => number | boolean): Value {
  const wrong = values.find(isError);
  if (wrong) return wrong;
  if (values.some((value) => typeof value === 'string')) return VALUE;
  const result = compute(...values.map(Number));
  return typeof result === 'boolean' || Number.isFinite(result) ? result : { error: '#NUM!' };
}

function operate(sign: string, a: Value, b: Value): Value {
  if (isError(a)) return a;
  if (isError(b)) return b;
  if (sign === '&') return `${String(a ?? '')}${String(b ?? '')}`;
  if (/[<>=]/.test(sign)) return compare(sign, a, b);
  if (sign === '/' && Number(b) === 0) return { error: '#DIV/0!' };
  return numeric([a, b], ARITHMETIC[sign]!);
}

const ARITHMETIC: Record<string, (x: number, y: number) => number> = {
  '+': (x, y) => x + y, '-': (x, y) => x - y, '*': (x, y) => x * y, '/': (x, y) => x / y, '^': (x, y) => x ** y,
};

/** Numbers come before texts, texts before TRUE; an empty cell is what it is compared with. */
function compare(sign: string, a: Value, b: Value): boolean {
  const rank = (value: Value) => (typeof value === 'boolean' ? 2 : typeof value === 'string' ? 1 : 0);
  const empty = (other: Value) => (typeof other === 'string' ? '' : 0);
  const [x, y] = [a ?? empty(b), b ?? empty(a)];
  const order = rank(x) !== rank(y) ? rank(x) - rank(y) : x < y ? -1 : x > y ? 1 : 0;
  return { '=': order === 0, '<>': order !== 0, '<': order < 0, '>': order > 0, '<=': order <= 0, '>=': order >= 0 }[sign]!;
}
