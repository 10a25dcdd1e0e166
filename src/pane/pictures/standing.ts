// How a rate stands to the plan: what it breaks, and how far it may move.

import { type Conflict, Fault, conflicts, headroom } from '../../engine';
import { exactFigure } from '../number-text';
import type { RulesOf } from '../ruler/rules';
import { sentences } from '../ruler/sentences';

export interface Standing {
  rate: number;
  conflicts: Conflict[];
  /** ppm either way before a rule breaks, the clock tolerance left out of account; 0 where one is broken. */
  headroom: number;
  /** Why the rules can't be tried at all, in one sentence. */
  problem: string | null;
}

export function standingOf({ plan, ppm }: RulesOf, rate: number): Standing {
  try {
    const broken = conflicts(plan, rate, ppm);
    // Without a tolerance, a rate that breaks a rule has no headroom.
    return { rate, conflicts: broken, headroom: broken.length > 0 && ppm === 0 ? 0 : headroom(plan, rate), problem: null };
  } catch (fault) {
    if (!(fault instanceof Fault)) throw fault;
    return { rate, conflicts: [], headroom: 0, problem: fault.message };
  }
}

export function standingWords({ rate, conflicts: broken, headroom: room, problem }: Standing): string {
  if (problem !== null) return problem;
  const shown = exactFigure(rate);
  if (broken.length === 0) return sentences.works(shown, ppmText(room));
  return room > 0 ? sentences.onlyNominal(shown, broken.length, ppmText(room)) : sentences.breaks(shown, broken.length);
}

/** Headroom to three digits, rounded down, since it is a promise. */
export function ppmText(ppm: number): string {
  if (ppm === 0) return '0';
  const unit = 10 ** (Math.floor(Math.log10(ppm)) - 2);
  return exactFigure(Number((Math.floor(ppm / unit) * unit).toPrecision(3)));
}
