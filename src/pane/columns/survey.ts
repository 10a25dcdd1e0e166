// What the columns need to know of the workbook beside the plan itself.

import type { Block, CellValue, LiveHost, Table } from '../../host/port';
import { type Box, fixedReference, holdsBox, parseAddress, parseReference, referenceTo } from '../address';
import { usedPart } from '../free-cells';
import type { Plan } from '../plan';
import { NAMES } from '../sentences';
import type { PlanTable } from '../setup/table';
import type { CellNames } from './insertion';
import { resultBox } from './placement';

export interface Survey {
  /** What stands in the rows of the plan. */
  used: Box & { values: CellValue[][] };
  structured: { table: Table; titles: string[] } | null;
  /** The workbook's own names for the cells of the plan, where it has some. */
  ownNames: Partial<Record<'rate' | 'guard' | 'ppm', string>>;
}

export async function survey(host: LiveHost, { places }: Plan, table: PlanTable): Promise<Survey> {
  const [used, tables, names] = await Promise.all([usedPart(host, table.sheet), host.tables(), host.names()]);
  const { row, rows } = resultBox(table, 0, 1);
  const strip = { row, rows, column: used?.column ?? 0, columns: used?.columns ?? 1 };
  const [block, structured] = await Promise.all([host.read(referenceTo(table.sheet, strip)), structuredTable(host, tables, table)]);
  const ownNames = Object.fromEntries((['rate', 'guard', 'ppm'] as const).flatMap((key) => {
    const own = ownName(names, places[key]);
    return own === null ? [] : [[key, own]];
  }));
  return { used: { ...strip, values: block?.values ?? [] }, structured, ownNames };
}

/** The table whose rows are those of the plan. */
async function structuredTable(host: LiveHost, tables: Table[], { sheet, first, rows, columns }: PlanTable): Promise<Survey['structured']> {
  const all = Object.values(columns).map(({ column }) => column);
  const plan = { row: first, rows, column: Math.min(...all), columns: Math.max(...all) - Math.min(...all) + 1 };
  const table = tables.find((one) => {
    const box = one.sheet === sheet ? parseAddress(one.address) : null;
    return box !== null && holdsBox(box, plan) && box.row < first;
  });
  if (!table) return null;
  const headers: Block | null = await host.read(referenceTo(sheet, { ...parseAddress(table.address)!, rows: 1 }));
  return { table, titles: headers?.values[0]?.map((title) => String(title ?? '')) ?? [] };
}

function ownName(names: Record<string, string>, place: { sheet: string; address: string } | undefined): string | null {
  const box = place && parseAddress(place.address);
  if (!box) return null;
  const wanted = fixedReference(place.sheet, box);
  const same = (refersTo: string) => {
    const there = parseReference(refersTo);
    return there?.sheet != null && fixedReference(there.sheet, there.box) === wanted;
  };
  return Object.keys(names).filter((name) => !/^fold_/i.test(name) && same(names[name]!)).sort()[0] ?? null;
}

/** The names that formulas use. */
export function cellNames({ places }: Plan, ownNames: Survey['ownNames'], own: boolean): CellNames {
  const of = (key: 'rate' | 'guard' | 'ppm') => (places[key] ? (own ? ownNames[key] : undefined) ?? NAMES[key].name : null);
  return { rate: of('rate') ?? NAMES.rate.name, guard: of('guard'), ppm: of('ppm') };
}
