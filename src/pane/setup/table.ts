// The plan as a table in its sheet: its rows and headers, and what has happened to it since it was set up.

import type { CellValue, LiveHost } from '../../host/port';
import { type Box, MOST_ROWS, addressOf, cellBox, parseAddress, referenceTo } from '../address';
import type { Edges, Places } from '../plan';
import { NAMES, type NameKey } from '../sentences';
import { type ColumnKind, columnOf, isUnit, unitOf } from './header-words';
import { unitProblems } from './recognise';
import { sentences } from './sentences';

/** Columns that lie in the same rows of one sheet. Rows and columns count from 0. */
export interface PlanTable {
  sheet: string;
  /** The first row of the plan, and how many there are. */
  first: number;
  rows: number;
  /** The row of headers above, null where there is none; units may stand in a row of their own below it. */
  header: number | null;
  columns: Partial<Record<NameKey, { column: number; title: string; unit: string | null }>>;
  /** The unit that the headers agree on, null where they name none. */
  unit: string | null;
  /** The last of further rows below that hold numbers where the plan has edges, null where there are none. */
  lastBelow: number | null;
}

/** Names of a plan whose cells were deleted, a sentence each, and those that can be read. */
export function deletedAndOther(names: Record<string, string>): { gone: string[]; readable: Set<NameKey> } {
  const gone: string[] = [];
  const readable = new Set<NameKey>();
  for (const [name, refersTo] of Object.entries(names)) {
    const key = (Object.keys(NAMES) as NameKey[]).find((one) => NAMES[one].name.toLowerCase() === name.toLowerCase());
    if (!key) continue;
    if (refersTo.includes('#REF!')) gone.push(sentences.gone(NAMES[key].name));
    else readable.add(key);
  }
  return { gone, readable };
}

/** How far below a plan is looked for more of its rows. */
const LOOK_BELOW = 200;
/** How many rows above it can hold its headers. */
const HEADERS = 2;

export async function readTable(host: LiveHost, edges: Edges, places: Places): Promise<{ table: PlanTable | null; notices: string[] }> {
  const columns = columnsIn(edges, places);
  if (!columns) return { table: null, notices: [] };
  const { sheet, boxes } = columns;
  const [[edge, { row, rows }], ...others] = boxes as [[NameKey, Box], ...[NameKey, Box][]];
  const astray = others.filter(([, box]) => box.row !== row || box.rows !== rows);
  if (astray.length > 0) {
    // Lengths alone are said where the rows are read.
    const moved = astray.filter(([, box]) => box.row !== row);
    return { table: null, notices: moved.map(([key, box]) => sentences.rowsDiffer(NAMES[key].name, addressOf(box), NAMES[edge].name, places[edge]!.address)) };
  }
  const all = boxes.map(([, { column }]) => column);
  const [left, right] = [Math.min(...all), Math.max(...all)];
  const top = Math.max(0, row - HEADERS);
  const strip = async (from: number, count: number) =>
    (count <= 0 ? [] : (await host.read(referenceTo(sheet, { row: from, column: left, rows: count, columns: right - left + 1 })))?.values ?? []);
  const [above, below] = await Promise.all([strip(top, row - top), strip(row + rows, Math.min(LOOK_BELOW, MOST_ROWS - row - rows))]);
  return describeTable({ sheet, first: row, rows, left, boxes, above, below, edges });
}

interface Strips {
  sheet: string;
  first: number;
  rows: number;
  left: number;
  boxes: [NameKey, Box][];
  /** The cells right above and right below the plan. */
  above: CellValue[][];
  below: CellValue[][];
  edges: Edges;
}

function describeTable({ sheet, first, rows, left, boxes, above, below, edges }: Strips): { table: PlanTable; notices: string[] } {
  const text = (value: CellValue | undefined) => (typeof value === 'string' ? value.trim() : '');
  const lineAbove = (distance: number) => above[above.length - distance];
  const edgeColumns = boxes.filter(([key]) => (edges as readonly NameKey[]).includes(key)).map(([, { column }]) => column);
  const isHeader = (line: CellValue[] | undefined) => line !== undefined && edgeColumns.some((column) => text(line[column - left]) !== '');
  const isUnits = (line: CellValue[] | undefined) => isHeader(line) && edgeColumns.every((column) => text(line![column - left]) === '' || isUnit(text(line![column - left])));
  const units = isUnits(lineAbove(1)) && isHeader(lineAbove(2)) ? lineAbove(1) : undefined;
  const distance = units ? 2 : isHeader(lineAbove(1)) ? 1 : null;
  const titles = distance === null ? undefined : lineAbove(distance);
  const header = distance === null ? null : first - distance;

  const columns = Object.fromEntries(boxes.map(([key, { column }]) => {
    const title = text(titles?.[column - left]);
    return [key, { column, title, unit: unitOf(title) ?? unitOf(`(${text(units?.[column - left])})`) }];
  })) as PlanTable['columns'];
  const known = Object.values(columns).flatMap(({ unit }) => (unit ? [unit] : []));
  const more = below.findIndex((line) => !edgeColumns.every((column) => typeof line[column - left] === 'number'));
  const further = more < 0 ? below.length : more;
  const table: PlanTable = {
    sheet, first, rows, header, columns,
    unit: new Set(known).size === 1 ? known[0]! : null,
    lastBelow: further > 0 ? first + rows + further - 1 : null,
  };
  return { table, notices: [...contradictions(table), ...mixedUnits(table), ...(further > 0 ? [sentences.moreRows(further, table.lastBelow! + 1)] : [])] };
}

/** Sheet and cells of the edges, and of the other columns on the same sheet, the edges first; null where they are no columns of one sheet. */
function columnsIn(edges: Edges, places: Places): { sheet: string; boxes: [NameKey, Box][] } | null {
  const first = places[edges[0]];
  const boxes = [...edges, 'name' as const, 'role' as const].flatMap((key): [NameKey, Box][] => {
    const place = places[key];
    const box = place && place.sheet === first?.sheet ? parseAddress(place.address) : null;
    return box && box.columns === 1 ? [[key, box]] : [];
  });
  return first && boxes[0]?.[0] === edges[0] && boxes[1]?.[0] === edges[1] ? { sheet: first.sheet, boxes } : null;
}

/** What each header may say above a column of the plan. */
const FITS: Partial<Record<NameKey, readonly ColumnKind[]>> = {
  low: ['low', 'frequency', 'centre'], high: ['high', 'frequency', 'centre'], centre: ['centre', 'frequency'], width: ['width'],
};

/** Headers that say something else than the name: the column was moved, or the header changed. A header that says nothing known is the user's own affair. */
function contradictions({ header, columns }: PlanTable): string[] {
  return Object.entries(columns).flatMap(([key, { column, title }]) => {
    const fits = FITS[key as NameKey];
    const says = columnOf(title);
    return fits && says && !fits.includes(says.kind) ? [sentences.contradicts(NAMES[key as NameKey].name, addressOf(cellBox(header!, column)), title)] : [];
  });
}

function mixedUnits({ sheet, first, rows, columns }: PlanTable): string[] {
  return unitProblems(Object.fromEntries(Object.entries(columns).map(([key, { column, unit }]) =>
    [key, { sheet, address: addressOf({ row: first, column, rows, columns: 1 }), why: '', unit }])));
}

/** Headers that were changed since the plan was last looked at. */
export function renamedHeaders(before: PlanTable, now: PlanTable): string[] {
  if (before.sheet !== now.sheet || now.header === null) return [];
  return (Object.keys(now.columns) as NameKey[]).flatMap((key) => {
    const [was, is] = [before.columns[key], now.columns[key]!];
    return was && was.title !== '' && was.title !== is.title ? [sentences.renamed(NAMES[key].name, addressOf(cellBox(now.header!, is.column)), was.title, is.title)] : [];
  });
}
