// What `npm run excel` does before it serves; Excel itself is not here.

import { mkdtempSync, readFileSync, readdirSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { sideload } from '../manifest/sideload.js';

let home: string;
beforeEach(() => {
  home = mkdtempSync(path.join(os.tmpdir(), 'foldplan-home-'));
});
afterEach(() => rmSync(home, { recursive: true }));

const computer = (platform: string, remove = false) => {
  const ran: string[] = [];
  return { platform, home, cache: path.join(home, 'cache'), remove, ran, run: (program: string, args: string[]) => void ran.push([program, ...args].join(' ')) };
};

describe('sideloading', () => {
  it('puts the manifest where Excel on a Mac looks for it, and takes it away again', () => {
    const folder = path.join(home, 'Library/Containers/com.microsoft.Excel/Data/Documents/wef');
    expect(sideload(computer('darwin'))).toMatch(/start Excel anew and choose Home > Add-ins > Foldplan/);
    const [file] = readdirSync(folder);
    expect(file).toMatch(/^[0-9a-f-]{36}\.manifest\.xml$/);
    expect(readFileSync(path.join(folder, file!), 'utf8')).toContain('DefaultValue="https://localhost:3000/pane.html"');
    sideload(computer('darwin', true));
    expect(readdirSync(folder)).toEqual([]);
  });

  it('tells the registry of Windows where the manifest is, and takes it back again', () => {
    const there = computer('win32');
    sideload(there);
    const [, id, file] = /^reg add HKCU\\SOFTWARE\\Microsoft\\Office\\16\.0\\WEF\\Developer \/v ([0-9a-f-]{36}) \/t REG_SZ \/d (.+) \/f$/.exec(there.ran[0]!)!;
    expect(file!.startsWith(path.join(home, 'cache'))).toBe(true);
    expect(readFileSync(file!, 'utf8')).toContain(`<Id>${id}</Id>`);
    const again = computer('win32', true);
    sideload(again);
    expect(again.ran).toEqual([`reg delete HKCU\\SOFTWARE\\Microsoft\\Office\\16.0\\WEF\\Developer /v ${id} /f`]);
    expect(() => readFileSync(file!)).toThrow('ENOENT');
  });

  it('says where Excel runs on a computer where it does not, and leaves that alone', () => {
    expect(() => sideload(computer('linux'))).toThrow('Excel runs on Windows and Mac; on this computer npm start opens the workbench instead.');
    expect(readdirSync(home)).toEqual([]);
  });
});
