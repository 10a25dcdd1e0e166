// Calls per second of each family, one call in one cell: what a sheet of single formulas asks for.

import type { Argument, WorksheetFunctions } from '../../src/host/sheet/functions-runtime';
import { callFunction } from '../../src/host/sheet/functions-runtime';
import * as landing from '../../src/functions/landing';
import * as rates from '../../src/functions/rates';
import * as spurs from '../../src/functions/spurs';
import * as filter from '../../src/functions/filter';
import * as noise from '../../src/functions/noise';
import * as converter from '../../src/functions/converter';
import { FULL_CALLS, asCells } from '../support/full-calls';
import { figure } from './table';

const FAMILIES = { landing, rates, spurs, filter, noise, 'after the converter': converter };
const ROUNDS = 5;
/** Milliseconds that a round of one function takes at least. */
const ROUND = 20;

export interface FamilySpeed {
  family: string;
  /** Calls per second of its slowest and its fastest function, and their names. */
  slowest: { id: string; perSecond: number };
  fastest: { id: string; perSecond: number };
}

export function benchFamilies(functions: WorksheetFunctions): FamilySpeed[] {
  return Object.entries(FAMILIES).map(([family, members]) => {
    const speeds = Object.keys(members).map((name) => name.toUpperCase()).map((id) => ({ id, perSecond: callsPerSecond(functions, id) }));
    speeds.sort((a, b) => a.perSecond - b.perSecond);
    return { family, slowest: speeds[0]!, fastest: speeds.at(-1)! };
  });
}

/** The best of the rounds. */
function callsPerSecond({ metadata, implementations }: WorksheetFunctions, id: string): number {
  const { parameters } = metadata.find((one) => one.id === id)!;
  const implementation = implementations.get(id)!;
  const given: (Argument | null)[] = FULL_CALLS[id]!.map(asCells);
  let best = 0;
  for (let round = 0; round < ROUNDS; round++) {
    const start = performance.now();
    let calls = 0;
    let spent = 0;
    do {
      callFunction(implementation, parameters, given);
      calls++;
      spent = performance.now() - start;
    } while (spent < ROUND);
    best = Math.max(best, (calls / spent) * 1000);
  }
  return best;
}

/** As the second table of the README. */
export function familyTable(speeds: readonly FamilySpeed[]): string {
  const shown = ({ id, perSecond }: FamilySpeed['slowest']) => `${id}, ${figure(perSecond)}`;
  return ['| family | slowest, calls a second | fastest, calls a second |', '| --- | --- | --- |',
    ...speeds.map(({ family, slowest, fastest }) => `| ${family} | ${shown(slowest)} | ${shown(fastest)} |`)].join('\n');
}
