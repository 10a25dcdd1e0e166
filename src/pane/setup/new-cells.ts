// Labelled cells for the rate, the guard and the tolerance, where the sheet has none yet.

import type { CellInput, LiveHost } from '../../host/port';
import { type Box, cellBox, referenceTo } from '../address';
import { roomBy, usedPart } from '../free-cells';
import type { CellKey, Draft } from './draft';
import { CELL_KEYS } from './draft';
import { sentences } from './sentences';

export interface NewCells {
  sheet: string;
  box: Box;
  cells: CellInput[][];
  /** The cell of each value. */
  values: Partial<Record<CellKey, { sheet: string; box: Box }>>;
}

/** @param table the plan with its headers; @param unit of its frequencies, null where it is not known */
export async function newCells(host: LiveHost, draft: Draft, sheet: string, table: Box, unit: string | null): Promise<NewCells | null> {
  const keys = CELL_KEYS.filter((key) => draft.fields[key].starts !== null);
  if (keys.length === 0) return null;
  const used = (await usedPart(host, sheet)) ?? table;
  const values = (await host.read(referenceTo(sheet, used)))?.values ?? [];
  const box = roomBy(table, { ...used, values }, keys.length, 3);
  return {
    sheet, box,
    cells: keys.map((key) => [sentences.newLabels[key], Number(draft.fields[key].starts!.trim().replace(',', '.')), key === 'ppm' ? 'ppm' : unit]),
    values: Object.fromEntries(keys.map((key, i) => [key, { sheet, box: cellBox(box.row + i, box.column + 1) }])),
  };
}
