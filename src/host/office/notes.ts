// Notes on cells. Older versions of the program have no way to set one, and neither has the client library that its vendor gives out for
// sites of one's own (1.1.110): there, a change leaves them out.

import { isOfficeError } from './office-faults';
import type { Spot } from './references';
import type { TakeBack } from './taking-back';

/** A note on the first cell of a spot; null where there is none. */
export interface NoteState {
  spot: Spot;
  text: string | null;
}

const canSetNotes = (): boolean => Office.context.requirements.isSetSupported('ExcelApi', '1.18') && 'notes' in Excel.Worksheet.prototype;

/** Queues the question; ask the returned function after the next sync. None are known where none can be set. */
export function askNotes(context: Excel.RequestContext, spots: Spot[]): () => NoteState[] {
  if (!canSetNotes()) return () => [];
  const notes = spots.map((spot) => noteAt(context, spot));
  for (const note of notes) note.load('content');
  return () => notes.map((note, i) => ({ spot: spots[i]!, text: note.isNullObject ? null : note.content }));
}

/** Sets notes in a request of its own: one that the program refuses, on a cell with a comment for instance, is left out. */
export async function setNotes(context: Excel.RequestContext, before: NoteState[], texts: string[], takeBacks: TakeBack[]): Promise<void> {
  if (before.length === 0) return;
  takeBacks.push(takeBackNotes(before));
  try {
    await makeNotes(context, before, before.map(({ spot }, i) => ({ spot, text: texts[i] || null })));
  } catch (error) {
    if (!isOfficeError(error)) throw error;
  }
}

const takeBackNotes = (before: NoteState[]): TakeBack => async (context) => {
  const now = askNotes(context, before.map(({ spot }) => spot));
  await context.sync();
  await makeNotes(context, now(), before);
};

async function makeNotes(context: Excel.RequestContext, now: NoteState[], wanted: NoteState[]): Promise<void> {
  const there = new Map(now.map(({ spot, text }) => [keyOf(spot), text]));
  for (const { spot, text } of wanted) {
    const known = there.get(keyOf(spot)) ?? null;
    if (known === text) continue;
    if (text === null) noteAt(context, spot).delete();
    else if (known !== null) noteAt(context, spot).content = text;
    else notesOf(context, spot).add(firstCell(spot), text);
    there.set(keyOf(spot), text);
  }
  await context.sync();
}

const noteAt = (context: Excel.RequestContext, spot: Spot): Excel.Note => notesOf(context, spot).getItemOrNullObject(firstCell(spot));
const notesOf = ({ workbook }: Excel.RequestContext, { sheetId }: Spot): Excel.NoteCollection => workbook.worksheets.getItem(sheetId).notes;
const firstCell = ({ address }: Spot): string => address.split(':')[0]!;
const keyOf = (spot: Spot): string => `${spot.sheetId} ${firstCell(spot)}`;
