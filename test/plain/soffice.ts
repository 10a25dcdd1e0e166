// The other spreadsheet program: opens a workbook without a window, computes all of it anew, and saves it again.

import { execFileSync, spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { pathToFileURL } from 'node:url';

/** Why it can't be used here; null where it can. */
export const noSoffice: string | null = spawnSync('soffice', ['--version']).status === 0 ? null : 'skipped: LibreOffice (soffice) is not installed';

/** Values in a file are computed anew when it is opened. */
const SETTINGS = `<?xml version="1.0" encoding="UTF-8"?>
<oor:items xmlns:oor="http://openoffice.org/2001/registry" xmlns:xs="http://www.w3.org/2001/XMLSchema" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">
<item oor:path="/org.openoffice.Office.Calc/Formula/Load"><prop oor:name="OOXMLRecalcMode" oor:op="fuse"><value>0</value></prop></item>
</oor:items>`;

/** The workbooks as it saves them, by their names, with all formulas computed anew. */
export const recomputed = (workbooks: Record<string, Uint8Array>): Record<string, Uint8Array> => savedElsewhere(workbooks, SETTINGS);

/** The workbooks as it saves them, by their names, with the values that it found in them. */
export const reopened = (workbooks: Record<string, Uint8Array>): Record<string, Uint8Array> => savedElsewhere(workbooks);

function savedElsewhere(workbooks: Record<string, Uint8Array>, settings?: string): Record<string, Uint8Array> {
  const folder = mkdtempSync(path.join(tmpdir(), 'foldplan-'));
  try {
    mkdirSync(path.join(folder, 'profile/user'), { recursive: true });
    if (settings !== undefined) writeFileSync(path.join(folder, 'profile/user/registrymodifications.xcu'), settings);
    const names = Object.keys(workbooks);
    for (const name of names) writeFileSync(path.join(folder, `${name}.xlsx`), workbooks[name]!);
    execFileSync('soffice', [
      `-env:UserInstallation=${pathToFileURL(path.join(folder, 'profile')).href}`, '--headless', '--convert-to', 'xlsx', '--outdir', path.join(folder, 'done'),
      ...names.map((name) => path.join(folder, `${name}.xlsx`)),
    ], { stdio: 'pipe' });
    return Object.fromEntries(names.map((name) => [name, readFileSync(path.join(folder, 'done', `${name}.xlsx`))]));
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
