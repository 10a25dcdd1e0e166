// The change that inserts columns: headers, formulas, looks and notes, all in one.

import type { CellInput, Change, Table } from '../../host/port';
import { type Box, cellBox, parseAddress, referenceTo } from '../address';
import type { PlanFigures } from '../figures';
import type { Plan } from '../plan';
import type { PlanTable } from '../setup/table';
import { textWidth } from '../text-width';
import { decimalsOf, formatOf, marginDecimalsOf } from './number-format';
import { headerRow, resultBox } from './placement';
import { type Band, bandOf, blankWhereBlank, cellOfRow, columnOfTable, nameOf } from './references';
import { type Arguments, type ResultKey, RESULTS } from './results';
import { sentences } from './sentences';

export type Way = 'rows' | 'spilled' | 'table';

/** How formulas call the single cells of the plan. */
export interface CellNames {
  rate: string;
  guard: string | null;
  ppm: string | null;
}

export interface Wanted {
  figures: PlanFigures;
  results: ResultKey[];
  way: Way;
  names: CellNames;
  /** The first column, counted from 0. */
  column: number;
  /** The structured table that holds the plan, null where none does. */
  structured: { table: Table; titles: string[] } | null;
  /** Whether cells that hold something may be written over. */
  over: boolean;
  version: string;
}

export interface Insertion {
  change: Change;
  /** All cells of the new columns, headers included. */
  box: Box;
  /** The cells that are written, which must be blank. */
  written: Box;
}

/** For a plan that lies in a table of its sheet. */
export function insertionOf(wanted: Wanted): Insertion {
  const { figures: { plan }, results, way, structured } = wanted;
  const table = plan.table!;
  if (way === 'table') {
    const box = besideTable(structured!.table, results.length);
    const titles = uniqueTitles(results.map((key) => titleOf(key, table)), structured!.titles);
    const cells = [titles, ...Array.from({ length: box.rows - 1 }, (_, i) => formulas(wanted, box.row + 1 + i))];
    return { box, written: box, change: { tableColumns: [{ table: structured!.table.name, cells }], looks: looksOf(wanted, box, box.row) } };
  }
  const box = resultBox(table, wanted.column, results.length);
  const cells: CellInput[][] = [...headers(wanted, table)];
  const rows = way === 'rows' ? table.rows : 1;
  for (let i = 0; i < rows; i++) cells.push(formulas(wanted, table.first + i));
  // A spilled column needs its cells blank.
  if (way === 'spilled' && wanted.over) for (let i = 1; i < table.rows; i++) cells.push(results.map(() => null));
  return {
    box, written: box,
    change: { cells: [{ reference: referenceTo(table.sheet, { ...box, rows: cells.length }), cells }], looks: looksOf(wanted, box, headerRow(table)) },
  };
}

/** The formula of each result, in one row. */
export function formulaTexts(wanted: Wanted, row: number): string[] {
  const all: Arguments = { ...bandFor(wanted, row), ...wanted.names };
  return wanted.results.map((key) => RESULTS[key].formula(all));
}

const formulas = (wanted: Wanted, row: number): CellInput[] => formulaTexts(wanted, row).map((formula) => ({ formula }));

function bandFor({ figures: { plan }, way, structured }: Wanted, row: number): Band {
  const table = plan.table!;
  const call = (key: Plan['edges'][number]): string => {
    if (way === 'spilled') return nameOf(key);
    const { column } = table.columns[key]!;
    return way === 'rows' ? cellOfRow(row, column) : columnOfTable(structured!.titles[column - parseAddress(structured!.table.address)!.column]!);
  };
  const same = table.columns[plan.edges[0]]!.column === table.columns[plan.edges[1]]!.column;
  const one = call(plan.edges[0]);
  const band = bandOf(plan.edges, one, same ? one : call(plan.edges[1]));
  return plan.rows.length < table.rows ? blankWhereBlank(band, one) : band;
}

// Headers

function headers({ results }: Wanted, table: PlanTable): CellInput[][] {
  const row = headerRow(table);
  if (row === null) return [];
  // Units stand where those of the plan do: in the header, or in a row below it.
  if (table.first - row === 2) return [results.map((key) => sentences.titles[key]), results.map((key) => (RESULTS[key].kind === 'word' ? null : table.unit))];
  return [results.map((key) => titleOf(key, table))];
}

const titleOf = (key: ResultKey, { unit }: PlanTable): string => sentences.withUnit(sentences.titles[key], RESULTS[key].kind === 'word' ? null : unit);

/** Columns of a structured table have different titles, whatever their case. */
function uniqueTitles(titles: string[], existing: string[]): string[] {
  const taken = new Set(existing.map((title) => title.toLowerCase()));
  return titles.map((title) => {
    let unique = title;
    for (let i = 2; taken.has(unique.toLowerCase()); i++) unique = `${title} ${i}`;
    taken.add(unique.toLowerCase());
    return unique;
  });
}

function besideTable({ address }: Table, count: number): Box {
  const box = parseAddress(address)!;
  return { row: box.row, column: box.column + box.columns, rows: box.rows, columns: count };
}

// Looks

const FONT_SIZE = 15;

function looksOf({ figures: { plan }, results, names, version }: Wanted, box: Box, header: number | null): NonNullable<Change['looks']> {
  const { sheet, unit } = plan.table!;
  const decimals = { frequency: decimalsOf(plan), margin: marginDecimalsOf(plan), word: null };
  return results.flatMap((key, i) => {
    const { kind } = RESULTS[key];
    const column = box.column + i;
    const first = header === null ? box.row : Math.max(plan.table!.first, header + 1);
    const cells = { row: first, column, rows: box.row + box.rows - first, columns: 1 };
    const places = decimals[kind];
    const width = Math.round(Math.max(72, textWidth(titleOf(key, plan.table!), FONT_SIZE) + 16));
    const top = referenceTo(sheet, cellBox(header ?? box.row, column));
    return [
      { reference: referenceTo(sheet, cells), look: { ...(places !== null && { numberFormat: formatOf(places) }), ...(kind === 'margin' && { marksNegative: true }) } },
      { reference: top, look: { ...(header !== null && { bold: true }), width, note: noteOf(key, names, unit, version) } },
    ].filter(({ look }) => Object.keys(look).length > 0);
  });
}

/** What the numbers mean, for whoever reads them later. */
function noteOf(key: ResultKey, { rate, guard, ppm }: CellNames, unit: string | null, version: string): string {
  const allowed = key === 'margin' || key === 'check' ? [sentences.guardNote(guard), sentences.ppmNote(ppm)] : [];
  return sentences.note([sentences.meaning(unit)[key], ...allowed, sentences.rateNote(rate), sentences.versionNote(version)]);
}
