// A change of the port in the spreadsheet program: all of it or nothing. What is there is read first; then everything is written in one
// request, after those that add sheets and table columns; and where one fails, what was is put back.

import type { Change } from '../port';
import { attempt } from './batches';
import { type Contents, checkFit, contentsOf, putBack, writeCells } from './contents';
import { readLooks, setLooks, takeBackLooks } from './looks';
import { askNames, defineNames, takeBackNames } from './names';
import { askNotes, setNotes } from './notes';
import { faults, isOfficeError } from './office-faults';
import { type Spot, findAll, rangeAt, spotOf } from './references';
import { addSheets, addTableColumns } from './structure';
import { type TakeBack, type Written, remains } from './taking-back';

/** @returns takes the change back, as long as what it wrote is still there */
export async function makeChange(change: Change): Promise<() => Promise<void>> {
  const { takeBacks, written, left } = await attempt('The change was not made', async (context) => {
    const begun: TakeBack[] = [];
    try {
      return await begin(context, change, begun);
    } catch (error) {
      await takeBackAll(context, begun, 'The workbook');
      throw error;
    }
  });
  return () => attempt('The change was not taken back', async (context) => {
    const now = await remains(context, written);
    for (const [i, { what, holds }] of left.entries()) if (now[i]!.holds !== holds) throw faults.changedSince(what);
    await takeBackAll(context, takeBacks, 'The workbook');
  });
}

interface Done {
  takeBacks: TakeBack[];
  written: Written;
  /** What it left there. */
  left: { what: string; holds: string }[];
}

/** @param takeBacks gets a function for each part before that part is made */
async function begin(context: Excel.RequestContext, { sheets = [], tableColumns = [], cells = [], looks = [], names = {} }: Change, takeBacks: TakeBack[]): Promise<Done> {
  const sheetIds = await addSheets(context, sheets, takeBacks);
  const columns = await addTableColumns(context, tableColumns, takeBacks);
  const found = await findAll(context, [...cells, ...looks].map(({ reference }) => reference));
  for (const [i, block] of cells.entries()) checkFit(block.reference, found[i]!.range, block.cells);

  const spots = found.map(spotOf);
  const blocks = spots.slice(0, cells.length);
  const wanted = looks.map(({ look }, i) => ({ spot: spots[cells.length + i]!, look }));
  const withNotes = wanted.filter(({ look: { note } }) => note !== undefined);
  const asked = { names: askNames(context, Object.keys(names)), notes: askNotes(context, withNotes.map(({ spot }) => spot)) };
  const contents = await contentsOf(context, blocks.map((spot) => rangeAt(context, spot)));
  const lookStates = await readLooks(context, wanted);
  const definitions = asked.names();

  takeBacks.push(takeBackCells(blocks, contents), takeBackLooks(lookStates), takeBackNames(definitions));
  for (const [i, spot] of blocks.entries()) writeCells(rangeAt(context, spot), cells[i]!.cells, contents[i]!);
  setLooks(context, wanted, lookStates);
  defineNames(context, definitions, definitions.map(({ name, ...rest }, i) => {
    const refersTo = Object.values(names)[i]!;
    return { ...rest, name, formula: refersTo === null ? null : `=${refersTo}` };
  }));
  await context.sync();
  await setNotes(context, asked.notes(), withNotes.map(({ look }) => look.note!), takeBacks);

  const written = { cells: [...blocks, ...columns], sheetIds, names: Object.keys(names) };
  return { takeBacks, written, left: await remains(context, written) };
}

const takeBackCells = (spots: Spot[], before: Contents[]): TakeBack => (context) =>
  putBack(context, spots.map((spot, i) => ({ range: rangeAt(context, spot), before: before[i]! })));

/** The last part first. */
async function takeBackAll(context: Excel.RequestContext, takeBacks: TakeBack[], what: string): Promise<void> {
  let failure: unknown = null;
  for (const takeBack of takeBacks.toReversed()) await takeBack(context).catch((error: unknown) => {
    failure ??= error;
  });
  if (failure !== null) throw isOfficeError(failure) ? faults.halfWritten(what, failure) : failure;
}
