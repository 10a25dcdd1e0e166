// FOLD formulas that were typed where their function was not known, entered once more.

import type { LiveHost } from '../../host/port';
import { referenceTo } from '../address';
import type { Surroundings } from '../section';
import { contentsOf } from './contents';
import { sentences } from './sentences';
import { type Trouble, isUnknown, placeOf, troublesIn } from './troubles';

export const unknownCells = async (host: LiveHost): Promise<Trouble[]> => troublesIn(await contentsOf(host)).filter(isUnknown);

/** All of them in one change; tells what became of it. */
export async function enterAgain({ host, tell, refresh }: Pick<Surroundings, 'host' | 'tell' | 'refresh'>): Promise<void> {
  const unknown = await unknownCells(host);
  await host.change({ cells: unknown.map(({ sheet, address, formula }) => ({ reference: referenceTo(sheet, address), cells: [[{ formula }]] })) });
  await refresh();
  const [left] = await unknownCells(host);
  if (left) tell(sentences.stillUnknown(placeOf(left)), 'fault');
  else tell(sentences.reentered(unknown.length), 'news');
}
