// Notes on cells, and marks on numbers below 0, which the embedded sheet keeps beside its cells.

import { type IResources, type Worksheet, generateRandomId } from '@univerjs/core';
import { type ISheetNote, RemoveNoteMutation, SheetUpdateNoteCommand, SheetsNoteModel, UpdateNoteMutation } from '@univerjs/sheets-note';
import {
  type IConditionFormattingRule, AddCfCommand, AddConditionalRuleMutation, CFNumberOperator, CFRuleType, CFSubRuleType, ConditionalFormattingRuleModel, DeleteCfCommand,
  DeleteConditionalRuleMutation,
} from '@univerjs/sheets-conditional-formatting';
import { type Sheet, NEGATIVE } from '../port';
import { type CellRange, formatCell, formatRange, parseReference } from './address';
import type { Found, OpenWorkbook } from './open-workbook';
import type { Step } from './step';

// As parts of a change

export function setNote(step: Step, { id, injector }: OpenWorkbook, { sheet, range }: Found, text: string): void {
  const subUnitId = sheet.getSheetId();
  const known = injector.get(SheetsNoteModel).getNote(id, subUnitId, { row: range.startRow, col: range.startColumn });
  const note = noteData(range.startRow, range.startColumn, text, known?.id);
  if (text !== '') step.run(SheetUpdateNoteCommand, { subUnitId, sheetId: subUnitId, row: note.row, col: note.col, note });
  else if (known) {
    const at = { unitId: id, sheetId: subUnitId, row: known.row, col: known.col };
    step.apply({ id: RemoveNoteMutation.id, params: { ...at, noteId: known.id } }, { id: UpdateNoteMutation.id, params: { ...at, note: { ...known } } });
  }
}

export function markNegative(step: Step, workbook: OpenWorkbook, { sheet, range }: Found, marks: boolean): void {
  const subUnitId = sheet.getSheetId();
  const here = marksOf(workbook, sheet).filter((rule) => rule.ranges.length === 1 && formatRange(rule.ranges[0]!) === formatRange(range));
  if (marks && here.length === 0) step.run(AddCfCommand, { subUnitId, rule: markData([range]) });
  if (!marks) for (const { cfId } of here) step.run(DeleteCfCommand, { subUnitId, cfId });
}

/** @param copyId the sheet that is a copy */
export function copyNotesAndMarks(step: Step, workbook: OpenWorkbook, original: Worksheet, copyId: string): void {
  const { id: unitId, injector } = workbook;
  for (const known of notesOf(workbook, original)) {
    const note = { ...known, id: generateRandomId() };
    const params = { unitId, sheetId: copyId, row: note.row, col: note.col };
    step.apply({ id: UpdateNoteMutation.id, params: { ...params, note } }, { id: RemoveNoteMutation.id, params: { ...params, noteId: note.id } });
  }
  // The one added last comes first.
  for (const known of (injector.get(ConditionalFormattingRuleModel).getSubunitRules(unitId, original.getSheetId()) ?? []).toReversed()) {
    const rule = { ...structuredClone(known), cfId: generateRandomId() };
    const params = { unitId, subUnitId: copyId };
    step.apply({ id: AddConditionalRuleMutation.id, params: { ...params, rule } }, { id: DeleteConditionalRuleMutation.id, params: { ...params, cfId: rule.cfId } });
  }
}

// As plain data

/** What is loaded with a workbook, for its sheets by their ids. */
export function notesAndMarksData(sheets: [id: string, sheet: Sheet][]): IResources {
  const notes = sheets.map(([id, { notes: texts = {} }]) => [id, placed(Object.entries(texts).map(([address, text]) => {
    const { startRow, startColumn } = parseReference(address)!.range;
    return noteData(startRow, startColumn, text);
  }))]);
  const marks = sheets.map(([id, { marksNegative = [] }]) => [id, marksNegative.map((address) => markData([parseReference(address)!.range]))]);
  return [
    { name: 'SHEET_NOTE_PLUGIN', data: JSON.stringify(Object.fromEntries(notes)) },
    { name: 'SHEET_CONDITIONAL_FORMATTING_PLUGIN', data: JSON.stringify(Object.fromEntries(marks)) },
  ];
}

export function plainNotesAndMarks(workbook: OpenWorkbook, sheet: Worksheet): Pick<Sheet, 'notes' | 'marksNegative'> {
  const notes = Object.fromEntries(notesOf(workbook, sheet).map(({ row, col, note }) => [formatCell(row, col), note]));
  const marksNegative = marksOf(workbook, sheet).flatMap(({ ranges }) => ranges.map(formatRange));
  return { ...(Object.keys(notes).length > 0 && { notes }), ...(marksNegative.length > 0 && { marksNegative }) };
}

// Below both

const notesOf = ({ id, injector }: OpenWorkbook, sheet: Worksheet): ISheetNote[] =>
  [...injector.get(SheetsNoteModel).getSheetNotes(id, sheet.getSheetId())?.values() ?? []].sort((a, b) => a.row - b.row || a.col - b.col);

/** Rules that mark numbers below 0 as we do. */
function marksOf({ id, injector }: OpenWorkbook, sheet: Worksheet): IConditionFormattingRule[] {
  const rules = injector.get(ConditionalFormattingRuleModel).getSubunitRules(id, sheet.getSheetId()) ?? [];
  return rules.filter(({ rule }) => JSON.stringify(rule, sortedKeys) === JSON.stringify(RULE, sortedKeys));
}

const sortedKeys = (_key: string, value: unknown): unknown =>
  (typeof value === 'object' && value !== null && !Array.isArray(value) ? Object.fromEntries(Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1))) : value);

const noteData = (row: number, col: number, note: string, id = generateRandomId()): ISheetNote => ({ id, row, col, note, width: NOTE_WIDTH, height: NOTE_HEIGHT });

const NOTE_WIDTH = 240;
const NOTE_HEIGHT = 96;

const RULE = {
  type: CFRuleType.highlightCell, subType: CFSubRuleType.number, operator: CFNumberOperator.lessThan, value: 0,
  style: { cl: { rgb: NEGATIVE.color }, bg: { rgb: NEGATIVE.fill } },
} as const;

const markData = (ranges: CellRange[]): IConditionFormattingRule => ({ cfId: generateRandomId(), ranges, stopIfTrue: false, rule: structuredClone(RULE) });

/** Notes by row and column. */
function placed(notes: ISheetNote[]): Record<number, Record<number, ISheetNote>> {
  const rows: Record<number, Record<number, ISheetNote>> = {};
  for (const note of notes) (rows[note.row] ??= {})[note.col] = note;
  return rows;
}
