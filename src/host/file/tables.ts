// The tables of a sheet, for structured references.

import type { ReferenceStructXlsx } from '@borgar/fx/xlsx';
import { type Area, contains, parseArea } from '../../formula/address';
import { type XmlElement, child, childrenOf, decodeCellText } from './xml';

export interface Table {
  name: string;
  sheet: string;
  /** With its header and totals. */
  area: Area;
  headerRows: number;
  totalsRows: number;
  columns: string[];
}

export function readTable(sheet: string, root: XmlElement): Table | null {
  const { attributes } = root;
  const area = parseArea(attributes.ref ?? '');
  if (!area) return null;
  return {
    name: attributes.displayName ?? attributes.name ?? '',
    sheet,
    area,
    headerRows: Number(attributes.headerRowCount ?? 1),
    totalsRows: Number(attributes.totalsRowCount ?? 0),
    columns: childrenOf(child(root, 'tableColumns'), 'tableColumn').map((column) => decodeCellText(column.attributes.name ?? '')),
  };
}

/** The cells that a structured reference means in a formula at a place; null where it means none. */
export function structuredArea(tables: Table[], reference: ReferenceStructXlsx, at: { sheet: string; row: number; column: number }): { sheet: string; area: Area } | null {
  const table = reference.table
    ? tables.find(({ name }) => name.toLowerCase() === reference.table!.toLowerCase())
    : tables.find(({ sheet, area }) => sheet === at.sheet && contains(area, at.row, at.column));
  if (!table) return null;
  const columns = columnsMeant(table, reference.columns ?? []);
  const rows = rowsMeant(table, reference.sections ?? [], at.row);
  return columns && rows && { sheet: table.sheet, area: { ...columns, ...rows } };
}

function columnsMeant(table: Table, names: string[]): Pick<Area, 'left' | 'right'> | null {
  if (names.length === 0) return { left: table.area.left, right: table.area.right };
  const places = names.map((name) => table.columns.findIndex((column) => column.toLowerCase() === name.toLowerCase()));
  if (places.includes(-1)) return null;
  return { left: table.area.left + Math.min(...places), right: table.area.left + Math.max(...places) };
}

function rowsMeant({ area, headerRows, totalsRows }: Table, sections: string[], row: number): Pick<Area, 'top' | 'bottom'> | null {
  const first = area.top + headerRows;
  const last = area.bottom - totalsRows;
  if (sections.includes('this row')) return row >= first && row <= last ? { top: row, bottom: row } : null;
  const wants = (section: string) => sections.includes(section) || sections.includes('all');
  const data = sections.length === 0 || wants('data');
  const top = wants('headers') ? area.top : data ? first : last + 1;
  const bottom = wants('totals') ? area.bottom : data ? last : first - 1;
  return top <= bottom ? { top, bottom } : null;
}
