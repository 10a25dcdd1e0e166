// The plan as the workbook holds it, read through its defined names.

import type { Block, CellValue, Host } from '../host/port';
import { exactFigure } from './number-text';
import { type CellPlace, NAMES, type NameOfPlan, sentences } from './sentences';

export type Role = 'wanted' | 'unwanted';

/** One row of the plan that isn't blank and isn't ignored. */
export interface PlanRow {
  /** Place in the columns, from 0. */
  index: number;
  /** The cell of the low edge, as an address in its sheet. */
  place: string;
  name: string;
  role: Role;
  /** The edges as they stand in the cells; null where there is no number. */
  low: number | null;
  high: number | null;
  /** What is wrong with the row, in one sentence. */
  problem: string | null;
  /** Whether the row can be drawn all the same. */
  usable: boolean;
}

export interface Plan {
  /** Names without which there is nothing to draw. */
  missing: NameOfPlan[];
  /** null where the cell holds no rate; a notice says why. */
  rate: number | null;
  guard: number;
  ppm: number;
  rows: PlanRow[];
  /** What is wrong with the plan as a whole, a sentence each. */
  notices: string[];
}

/** What the defined names of a plan stand for in a workbook; null for a name that it lacks. */
export type PlanCells = Record<keyof typeof NAMES, Block | null>;

/** @throws HostFault where the host can't read */
export async function readPlan(host: Host): Promise<Plan> {
  const keys = Object.keys(NAMES) as (keyof typeof NAMES)[];
  const blocks = await Promise.all(keys.map((key) => host.read(NAMES[key].name)));
  return planFrom(Object.fromEntries(keys.map((key, i) => [key, blocks[i]])) as PlanCells);
}

/** The plan that these cells make. Whatever is wrong becomes a sentence, and the rest stays. */
export function planFrom(cells: PlanCells): Plan {
  const notices: string[] = [];
  const missing = (['low', 'high', 'rate'] as const).filter((key) => cells[key] === null).map((key) => NAMES[key]);
  const plan: Plan = { missing, rate: null, guard: 0, ppm: 0, rows: [], notices };
  if (missing.length > 0) return plan;
  plan.rate = readRate(cells.rate!, notices);
  plan.guard = readAllowance(NAMES.guard, 'the guard', cells.guard, Infinity, sentences.guardRange, notices);
  plan.ppm = readAllowance(NAMES.ppm, 'the clock tolerance', cells.ppm, 1e6, sentences.ppmRange, notices);
  if (cells.guard === null) notices.push(sentences.noGuard);
  if (cells.name === null) notices.push(sentences.noNames);
  plan.rows = readRows(cells, notices);
  return plan;
}

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

function readRows(cells: PlanCells, notices: string[]): PlanRow[] {
  const low = readColumn(NAMES.low, cells.low, notices);
  const high = readColumn(NAMES.high, cells.high, notices);
  if (!low || !high) return [];
  const names = readColumn(NAMES.name, cells.name, notices);
  const roles = readColumn(NAMES.role, cells.role, notices);
  const lengths = ([['name', names], ['low', low], ['high', high], ['role', roles]] as const)
    .flatMap(([key, column]) => (column ? [{ name: NAMES[key].name, cells: column.values.length }] : []));
  if (new Set(lengths.map((column) => column.cells)).size > 1) notices.push(sentences.lengthsDiffer(lengths));

  const rows: PlanRow[] = [];
  for (let index = 0; index < Math.max(low.values.length, high.values.length); index++) {
    const row = readRow(index, low, high, names, roles);
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

/** null for a row that is blank, holds two edges of 0 (some hosts deliver a blank cell so) or is ignored. */
function readRow(index: number, lows: Column, highs: Column, names: Column | null, roles: Column | null): PlanRow | null {
  const low = lows.values[index] ?? null;
  const high = highs.values[index] ?? null;
  if ((isBlank(low) || low === 0) && (isBlank(high) || high === 0)) return null;
  const { role, problem: roleProblem } = readRole(roles, index);
  if (role === 'ignore') return null;
  const lowPlace: CellPlace = { place: lows.placeOf(index), what: 'the low edge' };
  const highPlace: CellPlace = { place: highs.placeOf(index), what: 'the high edge' };
  const edgeProblem = badEdge(lowPlace, low) ?? badEdge(highPlace, high)
    ?? ((low as number) > (high as number) ? sentences.edgesReversed(lowPlace, low as number, highPlace, high as number) : null);
  return {
    index,
    place: lowPlace.place,
    name: shownName(names?.values[index] ?? null) || sentences.unnamed(lowPlace.place),
    role,
    low: typeof low === 'number' ? low : null,
    high: typeof high === 'number' ? high : null,
    problem: edgeProblem ?? roleProblem,
    usable: edgeProblem === null,
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
  const first = /^\$?([A-Z]{1,3})\$?(\d*)/i.exec(address);
  if (!first) return `row ${down + 1}`;
  return columnLetters(columnNumber(first[1]!) + right) + (Number(first[2] || 1) + down);
}

const columnNumber = (letters: string): number => [...letters.toUpperCase()].reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0);

function columnLetters(column: number): string {
  let letters = '';
  for (let rest = column; rest > 0; rest = Math.floor((rest - 1) / 26)) letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters;
  return letters;
}
