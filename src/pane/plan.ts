// The plan as the workbook holds it, read through its defined names.

import type { Block, CellValue, LiveHost, Place } from '../host/port';
import { addressOf, cellBox, parseAddress } from './address';
import { exactFigure } from './number-text';
import { type CellPlace, NAMES, type NameKey, type NameOfPlan, sentences } from './sentences';
import { type PlanTable, deletedAndOther, readTable } from './setup/table';

export type Role = 'wanted' | 'unwanted';

/** One row of the plan that isn't blank and isn't ignored. */
export interface PlanRow {
  /** Place in the columns, from 0. */
  index: number;
  /** The cell of the low edge or the centre, as an address in its sheet. */
  place: string;
  name: string;
  role: Role;
  /** The edges as the cells give them; null where there is no number. */
  low: number | null;
  high: number | null;
  /** What is wrong with the row, in one sentence. */
  problem: string | null;
  /** Whether the row can be drawn all the same. */
  usable: boolean;
}

export interface Plan {
  /** Names without which there is nothing to compute. */
  missing: NameOfPlan[];
  /** Which columns give the edges of a band. */
  edges: Edges;
  /** null where the cell holds no rate; a notice says why. */
  rate: number | null;
  guard: number;
  ppm: number;
  rows: PlanRow[];
  /** Where the cells of each name are, without those of names that the workbook lacks. */
  places: Places;
  /** The plan as a table in its sheet, null where its columns don't lie side by side in the same rows. */
  table: PlanTable | null;
  /** What is wrong with the plan as a whole, a sentence each. */
  notices: string[];
}

export type Edges = readonly ['low', 'high'] | readonly ['centre', 'width'];

export type Places = Partial<Record<NameKey, Place>>;

/** What the defined names of a plan stand for in a workbook; null for a name that it lacks. */
export type PlanCells = Record<NameKey, Block | null>;

/** @throws HostFault where the host can't read */
export async function readPlan(host: LiveHost): Promise<Plan> {
  const { gone, readable } = deletedAndOther(await host.names());
  const blocks = await Promise.all(KEYS.map((key) => (readable.has(key) ? host.read(NAMES[key].name) : null)));
  const plan = planFrom(Object.fromEntries(KEYS.map((key, i) => [key, blocks[i]])) as PlanCells);
  const { table, notices } = await readTable(host, plan.edges, plan.places);
  return { ...plan, table, notices: [...gone, ...plan.notices, ...notices] };
}

/** The plan that these cells make, as far as they alone can tell. Whatever is wrong becomes a sentence, and the rest stays. */
export function planFrom(cells: PlanCells): Plan {
  const notices: string[] = [];
  const edges: Edges = !(cells.low || cells.high) && (cells.centre || cells.width) ? ['centre', 'width'] : ['low', 'high'];
  const missing = [...edges, 'rate' as const].filter((key) => cells[key] === null).map((key) => NAMES[key]);
  const places = Object.fromEntries(KEYS.flatMap((key) => {
    const block = cells[key];
    return block ? [[key, { sheet: block.sheet, address: block.address }]] : [];
  })) as Places;
  const plan: Plan = { missing, edges, rate: null, guard: 0, ppm: 0, rows: [], places, table: null, notices };
  if (missing.length > 0) {
    if (Object.keys(places).length > 0) notices.push(sentences.missing(missing));
    return plan;
  }
  plan.rate = readRate(cells.rate!, notices);
  plan.guard = readAllowance(NAMES.guard, 'the guard', cells.guard, Infinity, sentences.guardRange, notices);
  plan.ppm = readAllowance(NAMES.ppm, 'the clock tolerance', cells.ppm, 1e6, sentences.ppmRange, notices);
  if (cells.guard === null) notices.push(sentences.noGuard);
  if (cells.name === null) notices.push(sentences.noNames);
  if (cells.role === null) notices.push(sentences.noRoles);
  plan.rows = readRows(cells, edges, notices);
  return plan;
}

const KEYS = Object.keys(NAMES) as NameKey[];

// Single cells

function readRate(block: Block, notices: string[]): number | null {
  const cell = singleCell(NAMES.rate.name, block, notices);
  if (!cell) return null;
  const what: CellPlace = { place: cell.place, what: 'the rate' };
  const { value } = cell;
  if (typeof value === 'number' && value > 0) return value;
  notices.push(`${typeof value === 'number' ? sentences.ratePositive(what, value) : notNumber(what, value)} ${sentences.pictureWaits}`);
  return null;
}

/** Guard or tolerance: 0 where the cell is blank or holds something else, which a notice says. */
function readAllowance(
  { name }: NameOfPlan, what: string, block: Block | null, below: number, outOfRange: (cell: CellPlace, value: number) => string, notices: string[],
): number {
  const cell = block && singleCell(name, block, notices);
  if (!cell || isBlank(cell.value)) return 0;
  const { place, value } = cell;
  if (typeof value !== 'number') notices.push(`${notNumber({ place, what }, value)} ${sentences.takenAsZero}`);
  else if (!(value >= 0 && value < below)) notices.push(outOfRange({ place, what }, value));
  else return value;
  return 0;
}

function singleCell(name: string, block: Block, notices: string[]): { place: string; value: CellValue } | null {
  const { values } = block;
  if (values.length === 1 && values[0]!.length === 1) return { place: placeOf(block, 0), value: values[0]![0]! };
  notices.push(sentences.notSingle(name, values.length, values[0]?.length ?? 0));
  return null;
}

// Rows

/** One column of the plan, or one row of cells where the plan lies on its side. */
interface Column {
  values: CellValue[];
  placeOf(index: number): string;
}

function readRows(cells: PlanCells, edges: Edges, notices: string[]): PlanRow[] {
  const [one, other] = edges.map((key) => readColumn(NAMES[key], cells[key], notices));
  if (!one || !other) return [];
  const names = readColumn(NAMES.name, cells.name, notices);
  const roles = readColumn(NAMES.role, cells.role, notices);
  const lengths = ([['name', names], [edges[0], one], [edges[1], other], ['role', roles]] as const)
    .flatMap(([key, column]) => (column ? [{ name: NAMES[key].name, cells: column.values.length }] : []));
  if (new Set(lengths.map((column) => column.cells)).size > 1) notices.push(sentences.lengthsDiffer(lengths));

  const rows: PlanRow[] = [];
  for (let index = 0; index < Math.max(one.values.length, other.values.length); index++) {
    const row = readRow(index, edges[0] === 'low' ? edgesOf(index, one, other) : edgesAround(index, one, other), names, roles);
    if (row) rows.push(row);
  }
  return rows;
}

function readColumn({ name }: NameOfPlan, block: Block | null, notices: string[]): Column | null {
  if (!block) return null;
  const { values } = block;
  const columns = values[0]?.length ?? 0;
  if (columns === 1) return { values: values.map((line) => line[0]!), placeOf: (index) => placeOf(block, index) };
  if (values.length === 1) return { values: values[0]!, placeOf: (index) => placeOf(block, 0, index) };
  notices.push(sentences.notVector(name, values.length, columns));
  return null;
}

/** What the two cells of a row give. */
interface RowEdges {
  blank: boolean;
  place: string;
  low: number | null;
  high: number | null;
  problem: string | null;
}

function edgesOf(index: number, lows: Column, highs: Column): RowEdges {
  const [low, high] = [lows.values[index] ?? null, highs.values[index] ?? null];
  const lowPlace: CellPlace = { place: lows.placeOf(index), what: 'the low edge' };
  const highPlace: CellPlace = { place: highs.placeOf(index), what: 'the high edge' };
  return {
    blank: isNothing(low) && isNothing(high),
    place: lowPlace.place,
    low: typeof low === 'number' ? low : null,
    high: typeof high === 'number' ? high : null,
    problem: badEdge(lowPlace, low) ?? badEdge(highPlace, high)
      ?? ((low as number) > (high as number) ? sentences.edgesReversed(lowPlace, low as number, highPlace, high as number) : null),
  };
}

/** A centre without a width is a tone, as in the arithmetic of a sheet. */
function edgesAround(index: number, centres: Column, widths: Column): RowEdges {
  const [centre, width] = [centres.values[index] ?? null, widths.values[index] ?? null];
  const centrePlace: CellPlace = { place: centres.placeOf(index), what: 'the centre' };
  const widthPlace: CellPlace = { place: widths.placeOf(index), what: 'the width' };
  const problem = badEdge(centrePlace, centre) ?? (isBlank(width) ? null : badEdge(widthPlace, width))
    ?? (typeof width === 'number' && width < 0 ? sentences.widthNegative(widthPlace, width) : null);
  const half = typeof width === 'number' ? width / 2 : 0;
  const edge = (side: 1 | -1) => (problem === null ? rounded15((centre as number) + side * half) : null);
  return { blank: isNothing(centre) && isNothing(width), place: centrePlace.place, low: edge(-1), high: edge(1), problem };
}

/** A sum of two cells as a worksheet function reads it: to 15 digits. */
const rounded15 = (x: number): number => Number(x.toPrecision(15));

/** Some hosts deliver a blank cell as 0, so a row of two zeros is blank. */
const isNothing = (value: CellValue): boolean => isBlank(value) || value === 0;

/** null for a row that is blank or ignored. */
function readRow(index: number, { blank, place, low, high, problem }: RowEdges, names: Column | null, roles: Column | null): PlanRow | null {
  if (blank) return null;
  const { role, problem: roleProblem } = readRole(roles, index);
  if (role === 'ignore') return null;
  return {
    index, place, role, low, high,
    name: shownName(names?.values[index] ?? null) || sentences.unnamed(place),
    problem: problem ?? roleProblem,
    usable: problem === null,
  };
}

function readRole(roles: Column | null, index: number): { role: Role | 'ignore'; problem: string | null } {
  const value = roles?.values[index] ?? null;
  if (isBlank(value)) return { role: 'wanted', problem: null };
  const word = typeof value === 'string' ? value.trim().toLowerCase() : '';
  if (word === 'wanted' || word === 'unwanted' || word === 'ignore') return { role: word, problem: null };
  const cell: CellPlace = { place: roles!.placeOf(index), what: 'the role' };
  return { role: 'wanted', problem: sentences.unknownRole(cell, shownValue(value)) };
}

function badEdge(cell: CellPlace, value: CellValue): string | null {
  if (isBlank(value)) return sentences.blank(cell);
  return typeof value === 'number' && Number.isFinite(value) ? null : notNumber(cell, value);
}

// Cells

const isBlank = (value: CellValue): boolean => value === null || (typeof value === 'string' && value.trim() === '');

function notNumber(cell: CellPlace, value: CellValue): string {
  if (isBlank(value)) return sentences.blank(cell);
  if (typeof value === 'object' && value !== null) return sentences.cellError(cell, value.error, value.message);
  return sentences.notNumber(cell, shownValue(value));
}

function shownValue(value: CellValue): string {
  if (typeof value === 'number') return exactFigure(value);
  if (typeof value === 'string') return `"${shownName([...value].length > 40 ? `${[...value].slice(0, 39).join('')}…` : value)}"`;
  return shownName(value);
}

/** A cell as one line of text, without characters that would change how the text around them reads. */
function shownName(value: CellValue): string {
  if (value === null) return '';
  if (typeof value === 'boolean') return value ? 'TRUE' : 'FALSE';
  const text = typeof value === 'object' ? value.error : String(value);
  return text.replace(DIRECTION_CONTROLS, '').replace(/[\p{Cc}\p{Zl}\p{Zp}\s]+/gu, ' ').trim();
}

/** Marks that embed, override or isolate a direction of writing. */
const DIRECTION_CONTROLS = /[\u202a-\u202e\u2066-\u2069]/g;

/** Address of a cell within a block: `B7`; where the block's own address can't be read, its place in words. */
function placeOf({ address }: Block, down: number, right = 0): string {
  const box = parseAddress(address);
  return box ? addressOf(cellBox(box.row + down, box.column + right)) : `row ${down + 1}`;
}
