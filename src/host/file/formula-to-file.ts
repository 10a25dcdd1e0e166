// A formula of a sheet, as the file writes it.

import { parseA1Ref, parseStructRef, tokenTypes } from '@borgar/fx/xlsx';
import { computesArrays, givesArray, takesRange } from '../../formula/array-arguments';
import { type Call, type Node, argumentsOf, formulaTree, isCall, isOperator, isReference, isSpace } from '../../formula/formula-tree';
import { fileFunctionName, isOurs } from '../../formula/function-names';

export interface FileForm {
  /** Without "=". */
  text: string;
  /** Whether it can only fill one cell. If not, the file has to store it as one that spills, or its ranges would mean single cells. */
  fillsOneCell: boolean;
  /** Whether it has a function of ours. */
  callsFold: boolean;
}

/** @param names what the workbook's names refer to, without "=" */
export function toFileFormula(formula: string, names: Record<string, string> = {}): FileForm {
  const tree = formulaTree(formula);
  markLocals(tree, new Set());
  const lookUp = new Map(Object.entries(names).map(([name, text]) => [name.toLowerCase(), text]));
  const fillsOneCell = !mayFillMore(tree, null, lookUp);
  return { text: written(tree, fillsOneCell), fillsOneCell, callsFold: tree.some(callsOurs) };
}

const callsOurs = (node: Node): boolean => isCall(node) && (isOurs(node.name) || node.items.some(callsOurs));

/** The names that LET and LAMBDA give to values are marked in a file, so that nobody takes them for names of the workbook. */
function markLocals(nodes: readonly Node[], known: ReadonlySet<string>): void {
  for (const node of nodes) {
    if (isCall(node)) {
      const inside = new Set([...known, ...localsOf(node)]);
      if (known.has(node.name.toLowerCase())) node.name = `_xlpm.${node.name}`;
      markLocals(node.items, inside);
    } else if (node.type === tokenTypes.REF_NAMED && known.has(node.value.toLowerCase())) node.value = `_xlpm.${node.value}`;
  }
}

function localsOf(call: Call): string[] {
  const args = argumentsOf(call).slice(0, -1);
  const name = call.name.toUpperCase();
  const declaring = name === 'LET' ? args.filter((_arg, i) => i % 2 === 0) : name === 'LAMBDA' ? args : [];
  return declaring.flatMap((arg) => arg.filter((node) => !isCall(node) && node.type === tokenTypes.REF_NAMED).map((node) => (isCall(node) ? '' : node.value.toLowerCase())));
}

function written(nodes: readonly Node[], fillsOneCell: boolean): string {
  // "A1#" and "@A1:A9" are calls in a file.
  const units: { text: string; node: Node | null }[] = [];
  for (const node of nodes) {
    const operand = units.findLastIndex((unit) => unit.node === null || !isSpace(unit.node));
    if (isOperator(node, '#') && operand >= 0) units.splice(operand, units.length, { text: `${fileFunctionName('ANCHORARRAY')}(${units[operand]!.text})`, node: null });
    else units.push({ text: isCall(node) ? callText(node, fillsOneCell) : node.value, node });
  }
  for (let i = units.length - 2; i >= 0; i--) {
    if (!isOperator(units[i]!.node ?? undefined, '@')) continue;
    const [, operand] = units.splice(i, 2, { text: '', node: null });
    units[i]!.text = fillsOneCell ? operand!.text : `${fileFunctionName('SINGLE')}(${operand!.text})`;
  }
  return units.map(({ text }) => text).join('');
}

const callText = ({ name, items, closed }: Call, fillsOneCell: boolean): string =>
  `${name === '' ? '' : fileFunctionName(name)}(${written(items, fillsOneCell)}${closed ? ')' : ''}`;

/** Whether nodes, standing as an argument of a call or as the whole formula, may give more than one value. */
function mayFillMore(nodes: readonly Node[], argument: { of: string; place: number } | null, names: Map<string, string>): boolean {
  const terms = nodes.filter((node) => !isSpace(node));
  const asRange = argument !== null && takesRange(argument.of, argument.place);
  if (argument !== null && computesArrays(argument.of)) return false;
  return terms.some((node, i) => {
    if (isOperator(terms[i - 1], '@')) return false;
    if (isOperator(node, '{') || isOperator(node, ':')) return true;
    if (isOperator(node, '#')) return !(asRange && terms.length === 2);
    if (isCall(node)) {
      if (givesArray(node.name)) return !(asRange && terms.length === 1);
      return argumentsOf(node).some((arg, place) => mayFillMore(arg, { of: node.name, place }, names));
    }
    return isReference(node) && !isOperator(terms[i + 1], '#') && isSeveralCells(node.value, names) && !(asRange && terms.length === 1);
  });
}

/** Whether a reference may mean more than one cell. */
function isSeveralCells(reference: string, names: Map<string, string>): boolean {
  const struct = parseStructRef(reference);
  if (struct) return !(struct.sections?.includes('this row') && struct.columns?.length === 1);
  const parsed = parseA1Ref(reference);
  if (!parsed) return true;
  if ('range' in parsed) {
    const { top, left, bottom, right } = parsed.range;
    return top === null || left === null || top !== bottom || left !== right;
  }
  const meaning = names.get(parsed.name.toLowerCase());
  // A name of LET or LAMBDA holds what its own argument gave, which has been looked at there.
  if (meaning === undefined) return !/^_xlpm\./i.test(reference);
  const meant = parseA1Ref(meaning);
  return !(meant && 'range' in meant && meant.range.top !== null && meant.range.top === meant.range.bottom && meant.range.left === meant.range.right);
}
