// What the rules leave of a window of rates.

import { Fault, type ForbiddenRates, type PlanRange, forbiddenRates, planRates } from '../../engine';
import type { RulesOf } from './rules';
import type { RateWindow } from './window';

export interface Findings {
  window: RateWindow;
  /** Usable ranges, ascending. */
  ranges: PlanRange[];
  found: ForbiddenRates | null;
  /** Why there are no ranges, in the engine's words. */
  problem: string | null;
}

export function findingsIn(rules: RulesOf, window: RateWindow): Findings {
  const found = answer(() => forbiddenRates(rules.plan, window.from, window.to, rules.ppm));
  if (found instanceof Fault) return { window, ranges: [], found: null, problem: found.message };
  const ranges = rangesIn(rules, window);
  return ranges instanceof Fault ? { window, ranges: [], found, problem: ranges.message } : { window, ranges, found, problem: null };
}

/** How often a search beyond the window doubles or halves the rate. */
const OCTAVES = 4;

/**
 * The usable ranges of the first octave beyond a window that has any, the nearest first; none where there are none within a few octaves.
 * Each octave is a task of its own.
 * @throws Fault where the engine refuses the question
 */
export async function rangesBeyond(rules: RulesOf, window: RateWindow, direction: 1 | -1, accept: (ranges: PlanRange[]) => boolean): Promise<PlanRange[]> {
  for (let octave = 0; octave < OCTAVES; octave++) {
    const near = direction > 0 ? window.to * 2 ** octave : window.from / 2 ** octave;
    const ranges = rangesIn(rules, direction > 0 ? { from: near, to: near * 2 } : { from: near / 2, to: near });
    if (ranges instanceof Fault) {
      if (ranges.kind === 'input') throw ranges;
    } else if (accept(ranges)) {
      return ranges;
    }
    await new Promise((rested) => setTimeout(rested));
  }
  return [];
}

const rangesIn = ({ plan, ppm }: RulesOf, { from, to }: RateWindow): PlanRange[] | Fault =>
  answer(() => planRates(plan, Number(from.toPrecision(15)), Number(to.toPrecision(15)), ppm));

function answer<T>(work: () => T): T | Fault {
  try {
    return work();
  } catch (fault) {
    if (fault instanceof Fault) return fault;
    throw fault;
  }
}
