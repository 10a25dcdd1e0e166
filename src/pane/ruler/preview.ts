// What another rate would change: conflicts, margins and checks before and after.

import type { BandFigures, PlanFigures } from '../figures';
import { exactFigure } from '../number-text';
import { isolated } from '../sentences';
import { sentences } from './sentences';

export interface Change {
  before: BandFigures;
  after: BandFigures;
}

/** The wanted bands whose check differs between two rates, the smallest margin afterwards first. */
export function changesBetween(before: PlanFigures, after: PlanFigures): Change[] {
  return before.rows.flatMap(({ band }, i): Change[] => {
    const then = after.rows[i]?.band;
    return band && then && band.row.role === 'wanted' && band.check !== then.check ? [{ before: band, after: then }] : [];
  }).sort((a, b) => a.after.margin - b.after.margin);
}

/** The smallest margin of a wanted band, and whose it is. */
export function smallestMargin({ bands }: PlanFigures): string {
  const wanted = bands.filter(({ row }) => row.role === 'wanted');
  if (wanted.length === 0) return '';
  const least = wanted.reduce((a, b) => (b.margin < a.margin ? b : a));
  return sentences.marginOf(exactFigure(least.margin), isolated(least.row.name));
}
