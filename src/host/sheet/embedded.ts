// The embedded sheet with its window: cells, formula bar and tabs inside an element of a page.

import { LocaleType, LogLevel, ThemeService, Univer, mergeLocales } from '@univerjs/core';
import { UniverSheetsConditionalFormattingPreset } from '@univerjs/preset-sheets-conditional-formatting';
import marksEnUS from '@univerjs/preset-sheets-conditional-formatting/locales/en-US';
import '@univerjs/preset-sheets-conditional-formatting/lib/index.css';
import { UniverSheetsCorePreset } from '@univerjs/preset-sheets-core';
import enUS from '@univerjs/preset-sheets-core/locales/en-US';
import '@univerjs/preset-sheets-core/lib/index.css';
import { UniverSheetsNotePreset } from '@univerjs/preset-sheets-note';
import notesEnUS from '@univerjs/preset-sheets-note/locales/en-US';
import '@univerjs/preset-sheets-note/lib/index.css';
import { CalculationMode } from '@univerjs/sheets-formula';
import { defaultTheme } from '@univerjs/themes';
import { correct } from './corrections';
import { suggestNames } from './formula-suggestions';
import type { WorksheetFunctions } from './functions-runtime';
import { nameControls } from './labels';
import { SheetHost } from './sheet-host';
import { type Listener, univerFunctions } from './univer-functions';

/**
 * @param container the element that the sheet fills
 * @returns the host, and a switch between light and dark
 */
export function openEmbedded(functions: WorksheetFunctions, container: HTMLElement, dark: boolean): { host: SheetHost; setDark(dark: boolean): void } {
  const listener: Listener = { heard: null };
  const { classes, descriptions } = univerFunctions(functions, listener);
  const univer = new Univer({
    theme: defaultTheme, darkMode: dark, locale: LocaleType.EN_US, locales: { [LocaleType.EN_US]: mergeLocales(enUS, notesEnUS, marksEnUS) }, logLevel: LogLevel.SILENT,
  });
  const preset = UniverSheetsCorePreset({
    container,
    toolbar: false,
    footer: { statisticBar: false, menus: false, zoomSlider: false },
    formula: { function: classes, description: descriptions, initialFormulaComputing: CalculationMode.FORCED },
  });
  for (const plugin of [preset, UniverSheetsNotePreset(), UniverSheetsConditionalFormattingPreset()].flatMap(({ plugins }) => plugins)) {
    if (Array.isArray(plugin)) univer.registerPlugin(plugin[0], plugin[1]);
    else univer.registerPlugin(plugin);
  }
  correct(univer);
  void suggestNames(univer);
  nameControls(container);
  const theme = univer.__getInjector().get(ThemeService);
  return { host: new SheetHost(univer, listener), setDark: (on) => theme.setDarkMode(on) };
}
