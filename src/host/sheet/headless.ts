// The embedded sheet without a window: the formula engine and the workbook, in Node.

import { LocaleType, LogLevel, Univer } from '@univerjs/core';
import { UniverFormulaEnginePlugin } from '@univerjs/engine-formula';
import { UniverSheetsPlugin } from '@univerjs/sheets';
import { UniverSheetsConditionalFormattingPlugin } from '@univerjs/sheets-conditional-formatting';
import { CalculationMode, UniverSheetsFormulaPlugin } from '@univerjs/sheets-formula';
import { UniverSheetsNotePlugin } from '@univerjs/sheets-note';
import { correct } from './corrections';
import type { WorksheetFunctions } from './functions-runtime';
import { SheetHost } from './sheet-host';
import { type Listener, univerFunctions } from './univer-functions';

export function openHeadless(functions: WorksheetFunctions): SheetHost {
  const listener: Listener = { heard: null };
  const univer = new Univer({ locale: LocaleType.EN_US, locales: { [LocaleType.EN_US]: {} }, logLevel: LogLevel.SILENT });
  univer.registerPlugin(UniverFormulaEnginePlugin, { function: univerFunctions(functions, listener).classes });
  univer.registerPlugin(UniverSheetsPlugin);
  univer.registerPlugin(UniverSheetsFormulaPlugin, { initialFormulaComputing: CalculationMode.FORCED });
  univer.registerPlugin(UniverSheetsNotePlugin);
  univer.registerPlugin(UniverSheetsConditionalFormattingPlugin);
  correct(univer);
  return new SheetHost(univer, listener);
}
