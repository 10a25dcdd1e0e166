// What the ruler asks besides the plan, remembered in the workbook where it has names for it.

import type { CellValue, LiveHost } from '../../host/port';
import { exactFigure } from '../number-text';
import { sentences } from '../pictures/sentences';

export interface Settings {
  /** The clock's step; null for any rate. */
  step: number | null;
  harmonics: number;
  cores: number;
}

export const NOTHING_ASKED: Settings = { step: null, harmonics: 1, cores: 1 };

export const SETTING_NAMES = { step: 'Fold_Step', harmonics: 'Fold_Harmonics', cores: 'Fold_Cores' } as const satisfies Record<keyof Settings, string>;

/** The engine's own limits. */
const MOST = { harmonics: 20, cores: 64 } as const;

/** What was typed or stands in a cell, as a setting, or the sentence that says what is accepted. */
export function readSetting(key: keyof Settings, value: CellValue): { value: number | null } | { sentence: string } {
  const blank = value === null || value === '';
  const x = typeof value === 'string' ? Number(value.trim()) : value;
  const got = typeof value === 'object' && value !== null ? value.error : typeof value === 'number' ? exactFigure(value) : sentences.quoted(String(value ?? ''));
  if (key === 'step') return blank ? { value: null } : typeof x === 'number' && x > 0 && x < Infinity ? { value: x } : { sentence: sentences.stepNeeded(got) };
  if (blank) return { value: 1 };
  return typeof x === 'number' && Number.isInteger(x) && x >= 1 && x <= MOST[key] ? { value: x } : { sentence: sentences.countNeeded(sentences[key], MOST[key], got) };
}

/** The settings that the workbook remembers, and what is wrong with them, a sentence each. Names that it lacks are left out. */
export async function remembered(host: LiveHost): Promise<{ settings: Partial<Settings>; notices: string[] }> {
  const known = new Set(Object.keys(await host.names()).map((name) => name.toLowerCase()));
  const found: { settings: Partial<Settings>; notices: string[] } = { settings: {}, notices: [] };
  for (const key of Object.keys(SETTING_NAMES) as (keyof Settings)[]) {
    if (!known.has(SETTING_NAMES[key].toLowerCase())) continue;
    const block = await host.read(SETTING_NAMES[key]);
    if (!block) continue;
    const read = readSetting(key, block.values[0]![0]!);
    if ('sentence' in read) found.notices.push(sentences.nameIgnored(SETTING_NAMES[key], read.sentence));
    Object.assign(found.settings, { [key]: 'sentence' in read ? NOTHING_ASKED[key] : read.value });
  }
  return found;
}

/** Writes a setting into the workbook where it has a name for it and no formula stands there. */
export async function remember(host: LiveHost, key: keyof Settings, value: number | null): Promise<void> {
  const name = SETTING_NAMES[key];
  const known = Object.keys(await host.names()).some((one) => one.toLowerCase() === name.toLowerCase());
  const there = known ? await host.formulas(name) : null;
  if (there && there.formulas.length === 1 && there.formulas[0]!.length === 1 && there.formulas[0]![0] === null) await host.write(name, [[value]]);
}
