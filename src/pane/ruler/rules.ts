// The plan as the engine's rules ask for it, and rules in words.

import type { Forbidding, Plan as RulePlan } from '../../engine';
import type { Plan, PlanRow } from '../plan';
import { isolated } from '../sentences';
import { sentences } from './sentences';

export interface RulesOf {
  plan: RulePlan;
  ppm: number;
  /** The row behind each of the engine's bands. */
  rows: PlanRow[];
}

/** What the ruler asks of the plan besides its cells. */
export interface Orders {
  harmonics: number;
  cores: number;
}

export function rulesOf({ rows, guard, ppm }: Plan, { harmonics, cores }: Orders): RulesOf {
  const usable = rows.filter((row) => row.usable);
  return {
    plan: {
      low: usable.map(({ low }) => low!), high: usable.map(({ high }) => high!), role: usable.map(({ role }) => role), guard, harmonics, cores, sampling: 'real',
    },
    ppm, rows: usable,
  };
}

/** A rule as short as a lane needs it, or as part of a sentence. */
export function ruleWords({ kind, band, against, order }: Forbidding, { rows, plan }: RulesOf, form: 'rules' | 'inWords'): string {
  const name = (row: number) => isolated(rows[row]!.name);
  return sentences[form][kind](name(band), against === null ? '' : name(against), order, plan.cores);
}
