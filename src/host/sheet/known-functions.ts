// Which formulas the sheet can compute.

import { ALL_IMPLEMENTED_FUNCTIONS_SET } from '@univerjs/engine-formula';
import { NAMESPACE } from './functions-runtime';

/**
 * What in a formula the sheet does not know: functions by name, references to other workbooks, to columns of a table, through several
 * sheets and to a spilled block (`A1#`). Empty where it can compute the formula. An unknown function of our own namespace is a mistake
 * in the formula and no gap of the sheet.
 */
export function unknownParts(formula: string): string[] {
  const code = formula.replace(/"(?:[^"]|"")*"/g, ' ');
  const references = code.match(ELSEWHERE) ?? [];
  const called = [...code.replace(/'(?:[^']|'')*'!/g, ' ').matchAll(/([\p{L}_][\p{L}\d_.]*)\s*\(/gu)].map(([, name]) => name!.toUpperCase());
  return [...new Set([...called.filter((name) => !isKnown(name)), ...references])];
}

const ELSEWHERE = /'(?:[^']|'')*[[\]:](?:[^']|'')*'!|[\p{L}_\\][\p{L}\d_.]*:[\p{L}_\\][\p{L}\d_.]*!|[\p{L}\d_.]*\[[^\]]*\]|[\p{L}\d_$]*[\p{L}\d)]#/gu;

const isKnown = (name: string): boolean => name.startsWith(`${NAMESPACE}.`) || (ALL_IMPLEMENTED_FUNCTIONS_SET as Set<string>).has(name);
