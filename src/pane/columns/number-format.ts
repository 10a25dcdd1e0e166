// Formats of numbers from the decimals of the plan.

import { exactFigure } from '../number-text';
import type { Plan } from '../plan';

const MOST = 9;

/** Decimals that show every folded frequency of a plan exactly, as far as a column can: those of its edges, its rate and half of it. */
export function decimalsOf({ rows, rate }: Plan): number {
  const figures = [...rows.flatMap(({ low, high }) => [low, high]), rate, rate === null ? null : rate / 2];
  return Math.min(MOST, Math.max(0, ...figures.map((x) => (x === null ? 0 : placesOf(x)))));
}

/** Decimals for margins: the tolerance multiplies edges by millionths, of which three more digits show what matters. */
export function marginDecimalsOf(plan: Plan): number {
  return Math.min(MOST, Math.max(decimalsOf(plan), placesOf(plan.guard)) + (plan.ppm > 0 ? 3 : 0));
}

export const formatOf = (decimals: number): string => (decimals === 0 ? '0' : `0.${'0'.repeat(decimals)}`);

function placesOf(x: number): number {
  const [digits, exponent = '0'] = exactFigure(x).split('e') as [string, string?];
  return Math.max(0, (digits.split('.')[1]?.length ?? 0) - Number(exponent));
}
