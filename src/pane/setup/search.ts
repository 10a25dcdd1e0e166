// Looks for a plan in the workbook, where the user is at or anywhere.

import type { Block, LiveHost, Place } from '../../host/port';
import { type Box, addressOf, parseAddress, referenceTo } from '../address';
import { type Proposal, recognise } from './recognise';

/** More cells than these of one sheet are not looked at. */
const MOST_ROWS = 5000;
const MOST_COLUMNS = 100;
/** Headers and titles may stand so far above what is selected. */
const ROWS_ABOVE = 3;

/**
 * The plan around the selection where that holds one, else the most telling one of the workbook; null where there is none. A selection of
 * several rows and columns says which cells they are.
 */
export async function searchPlan(host: LiveHost, selection: Place | null): Promise<Proposal | null> {
  const [sheets, names] = await Promise.all([host.sheets(), host.names()]);
  const blocks = (await Promise.all(sheets.map((place) => readUsed(host, place)))).flatMap((block) => block ?? []);
  const chosen = selection && parseAddress(selection.address);
  const cut = chosen && chosen.rows > 1 && chosen.columns > 1 ? blocks.find(({ sheet }) => sheet === selection.sheet) : undefined;
  const within = cut && recognise([...blocks.filter((block) => block !== cut), part(cut, above(chosen!))], { sheet: cut.sheet, address: addressOf(chosen!) }, names);
  return (within?.found.low ?? within?.found.centre)?.sheet === cut?.sheet && within ? within : recognise(blocks, selection, names);
}

async function readUsed(host: LiveHost, { sheet, address }: Place): Promise<Block | null> {
  const box = parseAddress(address);
  return box && host.read(referenceTo(sheet, { ...box, rows: Math.min(box.rows, MOST_ROWS), columns: Math.min(box.columns, MOST_COLUMNS) }));
}

function above(box: Box): Box {
  const row = Math.max(0, box.row - ROWS_ABOVE);
  return { ...box, row, rows: box.rows + box.row - row };
}

/** The cells of a block that lie in a box. */
function part({ sheet, address, values }: Block, box: Box): Block {
  const whole = parseAddress(address)!;
  const [row, column] = [Math.max(box.row, whole.row), Math.max(box.column, whole.column)];
  const kept = values.slice(row - whole.row, box.row + box.rows - whole.row).map((line) => line.slice(column - whole.column, box.column + box.columns - whole.column));
  return { sheet, address: addressOf({ row, column, rows: Math.max(1, kept.length), columns: Math.max(1, kept[0]?.length ?? 1) }), values: kept };
}
