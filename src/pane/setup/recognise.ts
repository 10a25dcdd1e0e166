// Finds a plan in cells by what its headers and labels say. A proposal, with its reasons: the user decides.

import type { Block, CellValue, Place } from '../../host/port';
import { type Box, addressOf, cellBox, holdsBox, parseAddress, parseReference } from '../address';
import type { NameKey } from '../sentences';
import { type CellKind, type ColumnKind, cellOf, columnOf, frequencyUnit, isRelative, isUnit, unitOf } from './header-words';
import { sentences } from './sentences';

export interface Found extends Place {
  /** Why it was taken: what its header or label says, and where that stands. */
  why: string;
  unit: string | null;
}

export interface Proposal {
  /** What each name of the plan would stand for. A plan of tones has one column for both edges. */
  found: Partial<Record<NameKey, Found>>;
  /** What does not fit, a sentence each. */
  problems: string[];
}

/** Where the user is at: a plan that holds these cells comes first. */
export type Near = Place | null;

/** The plan that the blocks hold, of several the most telling one; null where no headers name the edges of bands. */
export function recognise(blocks: Block[], near: Near, names: Record<string, string> = {}): Proposal | null {
  const grids = blocks.flatMap((block) => gridOf(block) ?? []);
  const candidates = grids.flatMap(candidatesIn);
  const nearness = (one: Candidate) => (near && near.sheet === one.grid.sheet && holdsBox(extent(one), parseAddress(near.address) ?? cellBox(-1, -1)) ? 1000 : 0);
  const best = candidates.reduce<Candidate | null>((top, one) => (top === null || one.score + nearness(one) > top.score + nearness(top) ? one : top), null);
  if (!best) return null;
  const found = { ...columnsOf(best), ...singleCells(grids, best, names) };
  return { found, problems: [...ambiguities(best, candidates), ...unitProblems(found)] };
}

/** Rate, guard and tolerance by themselves, for a plan whose columns are known. */
export function recogniseCells(blocks: Block[], names: Record<string, string>): Proposal['found'] {
  return singleCells(blocks.flatMap((block) => gridOf(block) ?? []), null, names);
}

/** Frequencies in different units, and a tolerance in anything but ppm. */
export function unitProblems(found: Proposal['found']): string[] {
  const frequencies = (['low', 'high', 'centre', 'width', 'rate', 'guard'] as const)
    .flatMap((key) => (found[key]?.unit ? [{ key, place: found[key].address, unit: found[key].unit }] : []));
  const relative = frequencies.filter(({ unit }) => isRelative(unit));
  const units = new Set(frequencies.filter(({ unit }) => !isRelative(unit)).map(({ unit }) => frequencyUnit(unit)));
  const ppm = found.ppm?.unit;
  return [
    ...relative.map(({ key, place, unit }) => sentences.notFrequency(key, place, unit)),
    ...(units.size > 1 ? [sentences.unitsDiffer(frequencies)] : []),
    ...(ppm && ppm !== 'ppm' ? [sentences.notPpm(found.ppm!.address, ppm)] : []),
  ];
}

// The cells

interface Grid {
  sheet: string;
  box: Box;
  at(row: number, column: number): CellValue;
}

function gridOf({ sheet, address, values }: Block): Grid | null {
  const box = parseAddress(address);
  return box && { sheet, box, at: (row, column) => values[row - box.row]?.[column - box.column] ?? null };
}

const isText = (value: CellValue): value is string => typeof value === 'string' && value.trim() !== '';
const isBlank = (value: CellValue): boolean => value === null || (typeof value === 'string' && value.trim() === '');
const range = (first: number, count: number): number[] => Array.from({ length: Math.max(0, count) }, (_, i) => first + i);

// Columns under a row of headers

/** A row of headers that names the edges of bands, and the rows below it. */
interface Candidate {
  grid: Grid;
  header: number;
  /** The two columns that give the edges, and how; of a plan of tones it is one. */
  edges: ['low', 'high'] | ['centre', 'width'];
  columns: Partial<Record<'name' | 'low' | 'high' | 'centre' | 'width' | 'role', number>>;
  first: number;
  last: number;
  score: number;
}

function candidatesIn(grid: Grid): Candidate[] {
  return range(grid.box.row, grid.box.rows).flatMap((row) => candidatesAt(grid, row));
}

function candidatesAt(grid: Grid, header: number): Candidate[] {
  const named = range(grid.box.column, grid.box.columns).flatMap((column) => {
    const value = grid.at(header, column);
    const meaning = isText(value) ? columnOf(value) : null;
    return meaning ? [{ column, ...meaning }] : [];
  });
  const of = (kind: ColumnKind) => named.filter((one) => one.kind === kind).map(({ column }) => column);
  const bands = [
    ...of('low').map((low) => ({ edges: ['low', 'high'] as const, one: low, other: nearest(of('high'), low) })),
    ...[...of('centre'), ...of('frequency')].map((centre) => ({ edges: ['centre', 'width'] as const, one: centre, other: nearest(of('width'), centre) })),
  ].flatMap(({ other, ...rest }) => (other === null ? [] : [{ ...rest, other }]));
  const tones = bands.length > 0 ? [] : [...of('frequency'), ...of('centre')].map((tone) => ({ edges: ['low', 'high'] as const, one: tone, other: tone }));
  return [...bands, ...tones].flatMap(({ edges, one, other }) => {
    const rows = rowsBelow(grid, header, one, other);
    if (!rows) return [];
    const { name, role } = companions(grid, rows, named, [one, other]);
    const columns = { [edges[0]]: one, [edges[1]]: other, ...(name !== null && { name }), ...(role !== null && { role }) };
    // Both edges say more than a centre, and that more than tones alone.
    const kind = one === other ? 2 : edges[0] === 'low' ? 10 : 8;
    const apart = Math.min(4, Math.abs(other - one) - 1) / 2;
    const score = kind + (name === null ? 0 : 2) + (role === null ? 0 : 2) + Math.min(4, Math.log2(rows.last - rows.first + 1)) - Math.max(0, apart);
    return [{ grid, header, edges: [...edges] as Candidate['edges'], columns, ...rows, score }];
  });
}

/** The nearest column, of two as near the one to the right. */
function nearest(columns: number[], to: number): number | null {
  const distance = (column: number) => Math.abs(column - to) * 2 - (column > to ? 1 : 0) + (column < to ? 6 : 0);
  return columns.reduce<number | null>((best, one) => (best === null || distance(one) < distance(best) ? one : best), null);
}

/** More blank rows than this end a plan. */
const GAP = 2;

/** The rows that belong to a header: down to the last number before a gap or the next headers. A row of units below the header is none of them. */
function rowsBelow(grid: Grid, header: number, one: number, other: number): { first: number; last: number } | null {
  const edges = [one, other];
  const bottom = grid.box.row + grid.box.rows;
  let first: number | null = null;
  let last: number | null = null;
  let blank = 0;
  for (let row = header + 1; row < bottom && blank <= GAP; row++) {
    const cells = edges.map((column) => grid.at(row, column));
    if (cells.every((cell) => isText(cell) && columnOf(cell) !== null)) break;
    if (first === null && cells.some((cell) => isText(cell) && isUnit(cell))) continue;
    if (!cells.every((cell) => typeof cell === 'number') && holdsLabel(grid, row)) break;
    if (cells.some((cell) => typeof cell === 'number')) {
      first ??= row;
      last = row;
    }
    blank = cells.every(isBlank) ? blank + 1 : 0;
  }
  return first === null || last === null ? null : { first, last };
}

/** Whether a row is that of a rate or the like, below a plan. */
const holdsLabel = (grid: Grid, row: number): boolean => range(grid.box.column, grid.box.columns).some((column) => {
  const value = grid.at(row, column);
  return isText(value) && cellOf(value)?.weak === false;
});

const ROLES = ['wanted', 'unwanted', 'ignore'];

/** The columns of names and roles beside the edges. */
function companions(
  grid: Grid, { first, last }: { first: number; last: number }, named: { column: number; kind: ColumnKind; weak: boolean }[], edges: number[],
): { name: number | null; role: number | null } {
  const holding = (column: number) => range(first, last - first + 1).map((row) => grid.at(row, column)).filter((cell) => !isBlank(cell));
  const free = range(grid.box.column, grid.box.columns).filter((column) => !edges.includes(column));
  const beside = (columns: number[]) => [...columns].sort((a, b) => Math.abs(a - edges[0]!) - Math.abs(b - edges[0]!) || a - b)[0] ?? null;
  const of = (kind: ColumnKind, weak: boolean) => beside(named.filter((one) => one.kind === kind && one.weak === weak && !edges.includes(one.column)).map(({ column }) => column));
  const saysRoles = (column: number) => {
    const cells = holding(column);
    return cells.length > 0 && cells.every((cell) => isText(cell) && ROLES.includes(cell.trim().toLowerCase()));
  };
  const role = of('role', false) ?? beside(free.filter(saysRoles));
  const texts = (column: number) => {
    const cells = holding(column);
    return cells.length > 0 && cells.every(isText) && column !== role;
  };
  const notRole = (column: number | null) => (column === role ? null : column);
  const left = edges[0]! - 1;
  return { role, name: notRole(of('name', false)) ?? notRole(of('name', true)) ?? (free.includes(left) && texts(left) ? left : null) };
}

function extent({ grid, header, columns, last }: Candidate): Box {
  const all = Object.values(columns);
  const [left, right] = [Math.min(...all), Math.max(...all)];
  const within = Math.max(header - 1, grid.box.row);
  return { row: within, column: left, rows: last - within + 1, columns: right - left + 1 };
}

function columnsOf(candidate: Candidate): Proposal['found'] {
  const { grid, header, columns, first, last } = candidate;
  return Object.fromEntries(Object.entries(columns).map(([key, column]) => {
    const title = grid.at(header, column);
    const why = isText(title) ? sentences.headed(title.trim(), addressOf(cellBox(header, column))) : sentences.byContent;
    const found: Found = { sheet: grid.sheet, address: addressOf({ row: first, column, rows: last - first + 1, columns: 1 }), why, unit: unitAbove(grid, header, column) };
    return [key, found];
  }));
}

/** The unit that a header names, or the cell below it, or the header that it stands under, be that merged across several. */
function unitAbove(grid: Grid, header: number, column: number): string | null {
  const below = grid.at(header + 1, column);
  const own = unitIn(grid.at(header, column)) ?? (isText(below) && isUnit(below) ? unitOf(`(${below.replace(/[()[\]{}\s]/g, '')})`) : null);
  if (own) return own;
  for (let c = column; c >= grid.box.column; c--) {
    const above = grid.at(header - 1, c);
    if (!isBlank(above)) return c === column || isUnderHeader(grid, header, c, column) ? unitIn(above) : null;
  }
  return null;
}

/** A header above reaches as far as the headers below it go on without a blank. */
const isUnderHeader = (grid: Grid, header: number, from: number, to: number): boolean => range(from, to - from + 1).every((column) => isText(grid.at(header, column)));

const unitIn = (value: CellValue): string | null => (isText(value) ? unitOf(value) : null);

/** Other columns of the same row of headers that would do as well. */
function ambiguities(best: Candidate, all: Candidate[]): string[] {
  const [edge] = best.edges;
  const rivals = all.filter((one) => one !== best && one.grid === best.grid && one.header === best.header && one.edges[0] === edge && one.columns[edge] !== best.columns[edge]);
  const place = (one: Candidate) => addressOf(cellBox(one.header, one.columns[edge]!));
  return rivals.map((rival) => sentences.ambiguous(edge, place(best), place(rival)));
}

// Single cells beside their labels

interface Labelled {
  found: Found;
  rank: number;
}

function singleCells(grids: Grid[], plan: Candidate | null, names: Record<string, string>): Proposal['found'] {
  const best: Partial<Record<CellKind, Labelled>> = {};
  const offer = (kind: CellKind, found: Found, rank: number) => {
    if (!best[kind] || rank > best[kind].rank) best[kind] = { found, rank };
  };
  for (const grid of grids) {
    const here = plan === null || grid.sheet === plan.grid.sheet ? 4 : 0;
    const body = plan?.grid === grid ? { ...extent(plan), row: plan.header, rows: plan.last - plan.header + 1 } : null;
    for (const row of range(grid.box.row, grid.box.rows)) {
      for (const column of range(grid.box.column, grid.box.columns)) {
        const text = grid.at(row, column);
        const meaning = isText(text) && !(body && holdsBox(body, cellBox(row, column))) ? cellOf(text) : null;
        const value = meaning && valueBeside(grid, row, column, meaning.weak);
        if (!value) continue;
        const unit = unitIn(text) ?? unitBeside(grid, value.row, value.column);
        const found = { sheet: grid.sheet, address: addressOf(cellBox(value.row, value.column)), why: sentences.labelled((text as string).trim(), addressOf(cellBox(row, column))), unit };
        offer(meaning.kind, found, here + (value.filled ? 2 : 0) + (meaning.weak ? 0 : 1));
      }
    }
  }
  for (const [name, refersTo] of Object.entries(names)) {
    const meaning = /^fold_/i.test(name) ? null : cellOf(name);
    const place = parseReference(refersTo);
    if (!meaning || !place?.sheet || place.box.rows * place.box.columns !== 1) continue;
    const grid = grids.find(({ sheet }) => sheet === place.sheet);
    const label = grid && grid.at(place.box.row, place.box.column - 1);
    const unit = grid ? (label ? unitIn(label) : null) ?? unitBeside(grid, place.box.row, place.box.column) : null;
    // A name that somebody gave says more than a label.
    offer(meaning.kind, { sheet: place.sheet, address: addressOf(place.box), why: sentences.named(name), unit }, 10);
  }
  return Object.fromEntries(Object.entries(best).map(([kind, { found }]) => [kind, found]));
}

/** The number to the right of a label, with at most one blank cell between, or below it; else the blank cell beside it. */
function valueBeside(grid: Grid, row: number, column: number, weak: boolean): { row: number; column: number; filled: boolean } | null {
  for (const step of [1, 2]) {
    const value = grid.at(row, column + step);
    if (typeof value === 'number') return { row, column: column + step, filled: true };
    if (!isBlank(value)) break;
  }
  const below = grid.at(row + 1, column);
  if (!weak && typeof below === 'number') return { row: row + 1, column, filled: true };
  const [beside, beyond] = [grid.at(row, column + 1), grid.at(row, column + 2)];
  return !weak && isBlank(beside) && isBlank(below) && (isBlank(beyond) || (isText(beyond) && isUnit(beyond))) ? { row, column: column + 1, filled: false } : null;
}

function unitBeside(grid: Grid, row: number, column: number): string | null {
  const beside = grid.at(row, column + 1);
  return isText(beside) && isUnit(beside) ? unitOf(`(${beside.replace(/[()[\]{}\s]/g, '')})`) : null;
}
