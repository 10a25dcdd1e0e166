// What Univer is told to do otherwise, so that formulas mean and give what they do in spreadsheet programs.

import type { Univer } from '@univerjs/core';
import { CELL_INVERTED_INDEX_CACHE, LexerTreeBuilder } from '@univerjs/engine-formula';
import { FormulaLexer } from './formula-lexer';

/** To be called before a workbook is created. */
export function correct(univer: Univer): void {
  univer.__getInjector().replace([LexerTreeBuilder, { useClass: FormulaLexer }]);
  CELL_INVERTED_INDEX_CACHE.canUseCache = () => NOTHING_KNOWN;
}

/** Cells that were compared before are looked up in an index, which takes an empty text for 0. They are compared anew instead. */
const NOTHING_KNOWN: ReturnType<typeof CELL_INVERTED_INDEX_CACHE.canUseCache> = { rowsInCache: [], rowsNotInCache: [] };
