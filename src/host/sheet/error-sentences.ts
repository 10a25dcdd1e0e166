// The sentences behind errors. The sheet keeps only the codes of errors, so the formulas behind them are computed once more while someone
// listens: what is told is always what the formula says now.

import type { Worksheet } from '@univerjs/core';
import { FORMULA_REF_TO_ARRAY_CACHE, FormulaDataModel, ICalculateFormulaService } from '@univerjs/engine-formula';
import { type CellRange, formatCell } from './address';
import { FunctionError, NAMESPACE } from './functions-runtime';
import type { OpenWorkbook } from './open-workbook';
import type { Listener } from './univer-functions';
import { formulaAt, spills } from './workbook-data';

export interface PlacedError {
  row: number;
  column: number;
  code: string;
}

export interface PlacedSentence {
  row: number;
  column: number;
  sentence: string;
}

/**
 * For those errors that a function of ours gave. No recalculation may be under way.
 * @param listener the one that the functions of the sheet were made with
 */
export async function errorSentences({ injector }: OpenWorkbook, listener: Listener, sheet: Worksheet, errors: PlacedError[]): Promise<PlacedSentence[]> {
  const formulas = injector.get(FormulaDataModel);
  const blocks = spills(sheet, formulas);
  const anchored = errors.map((error) => {
    const block = blocks.find((one) => holds(one, error));
    return { ...error, anchorRow: block?.startRow ?? error.row, anchorColumn: block?.startColumn ?? error.column };
  });
  const behind: Formulas = {};
  for (const { anchorRow, anchorColumn } of anchored) {
    const formula = formulaAt(sheet, formulas, anchorRow, anchorColumn);
    if (formula?.toUpperCase().includes(`${NAMESPACE}.`)) (behind[anchorRow] ??= {})[anchorColumn] = [formula];
  }
  const heard = await listenTo(injector.get(ICalculateFormulaService), listener, sheet, behind);
  return anchored.flatMap(({ row, column, code, anchorRow, anchorColumn }) => {
    const sentence = sentenceFor(code, heard.get(formatCell(anchorRow, anchorColumn)) ?? [], row - anchorRow, column - anchorColumn);
    return sentence === undefined ? [] : [{ row, column, sentence }];
  });
}

type Formulas = Record<number, Record<number, string[]>>;

/** What our functions return while formulas are computed, by cell, in the order in which they do. */
async function listenTo(service: ICalculateFormulaService, listener: Listener, sheet: Worksheet, formulas: Formulas): Promise<Map<string, unknown[][][]>> {
  const heard = new Map<string, unknown[][][]>();
  listener.heard = (rows, row, column) => {
    const cell = formatCell(row, column);
    heard.set(cell, [...heard.get(cell) ?? [], rows]);
  };
  try {
    await service.executeFormulas({ [sheet.getUnitId()]: { [sheet.getSheetId()]: formulas } });
  } finally {
    listener.heard = null;
    FORMULA_REF_TO_ARRAY_CACHE.clear(); // else the next recalculation would find the values of this one
  }
  return heard;
}

const holds = (range: CellRange, { row, column }: { row: number; column: number }): boolean =>
  row >= range.startRow && row <= range.endRow && column >= range.startColumn && column <= range.endColumn;

/** The last function called is the outermost; one inside may have given the error that it passed on. */
function sentenceFor(code: string, heard: unknown[][][], row: number, column: number): string | undefined {
  for (const rows of heard.toReversed()) {
    const cell = rows.length === 1 && rows[0]!.length === 1 ? rows[0]![0] : rows[row]?.[column];
    if (cell instanceof FunctionError && cell.code === code && cell.message) return cell.message;
  }
  return undefined;
}
