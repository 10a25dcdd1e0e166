// Where a row of the plan stands in its sheet.

import { type Box, cellBox, parseAddress, referenceTo } from '../address';
import type { Plan } from '../plan';

/** A reference to the cells of a row of the plan, from its name to its role as far as they lie in line with its edges; null where that can't be told. */
export function rowReference({ places, edges }: Plan, index: number): string | null {
  const edge = places[edges[0]];
  const cellIn = (address: string): Box | null => {
    const box = parseAddress(address);
    return box && (box.rows === 1 && box.columns > 1 ? cellBox(box.row, box.column + index) : cellBox(box.row + index, box.column));
  };
  const first = edge && cellIn(edge.address);
  if (!first) return null;
  const sideways = parseAddress(edge.address)!.rows === 1 && parseAddress(edge.address)!.columns > 1;
  const inLine = (['name', ...edges, 'role'] as const).flatMap((key) => {
    const place = places[key];
    const cell = place?.sheet === edge.sheet ? cellIn(place.address) : null;
    return cell && (sideways ? cell.column === first.column : cell.row === first.row) ? [cell] : [];
  });
  const [row, column] = [Math.min(...inLine.map((cell) => cell.row)), Math.min(...inLine.map((cell) => cell.column))];
  const [lastRow, lastColumn] = [Math.max(...inLine.map((cell) => cell.row)), Math.max(...inLine.map((cell) => cell.column))];
  return referenceTo(edge.sheet, { row, column, rows: lastRow - row + 1, columns: lastColumn - column + 1 });
}
