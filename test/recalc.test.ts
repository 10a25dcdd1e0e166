// The built command line, run as a user runs it: on files, in a folder, by its exit code and what it says.

import { execFile, execFileSync, execSync, spawnSync } from 'node:child_process';
import { chmodSync, mkdirSync, mkdtempSync, readFileSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import JSZip from 'jszip';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { noSoffice, reopened } from './plain/soffice';
import { call } from './support/built-functions';
import { seeded } from './support/random';
import { FIRST, STALE, type StyledPlan, styledPlan } from './support/styled-plan';

const program = path.join(import.meta.dirname, '../dist-cli/recalc.cjs');

/** Why there is no terminal for a program that a test runs; null where there is one. */
const noTerminal: string | null = spawnSync('script', ['--version']).status === 0 ? null : 'skipped: the program script of util-linux is not installed';

interface Run {
  code: number;
  output: string[];
  complaints: string[];
}

/** Runs the command line in a folder. */
const recalc = (folder: string, ...args: string[]): Promise<Run> => new Promise((done) => {
  const child = execFile(process.execPath, [program, ...args], { cwd: folder }, (_error, stdout, stderr) =>
    done({ code: child.exitCode!, output: lines(stdout), complaints: lines(stderr).filter((line) => !/^Computed \d+ of \d+ formulas$/.test(line)) }));
});

const lines = (text: string): string[] => text.split('\n').filter((line) => line !== '');

const newFolder = (): string => mkdtempSync(path.join(tmpdir(), 'foldplan-'));

const file = (folder: string, name: string): Buffer => readFileSync(path.join(folder, name));

/** The parts of a workbook file, as bytes. */
async function partsOf(bytes: Uint8Array): Promise<Record<string, Buffer>> {
  const zip = await JSZip.loadAsync(bytes);
  const names = Object.keys(zip.files).filter((name) => !zip.files[name]!.dir);
  return Object.fromEntries(await Promise.all(names.map(async (name) => [name, await zip.file(name)!.async('nodebuffer')])));
}

type Shown = Record<string, number | string | boolean>;

/** What the cells of a sheet show, by address, taken from the XML itself. */
function shownIn(parts: Record<string, Buffer>, number: number): Shown {
  const texts = [...parts['xl/sharedStrings.xml']!.toString().matchAll(/<si>(.*?)<\/si>/g)].map(([, item]) => [...item!.matchAll(/<t[^>]*>(.*?)<\/t>/g)].map(([, text]) => text).join(''));
  const read = (type: string | undefined, text: string) => (type === 's' ? texts[Number(text)]! : type === 'b' ? text === '1' : type === 'str' || type === 'e' ? text : Number(text));
  const cells = parts[`xl/worksheets/sheet${number}.xml`]!.toString().matchAll(/<c r="(\w+)"([^>]*[^/])?>(?:<f[^>]*>[^<]*<\/f>)?<v>(.*?)<\/v><\/c>/g);
  return Object.fromEntries([...cells].map(([, address, attributes = '', text]) => [address!, read(/ t="(\w+)"/.exec(attributes)?.[1], text!)]));
}

/** What the plan's columns show at a rate, by the worksheet functions themselves. */
function expectedColumns({ bands, guard, ppm }: StyledPlan, rate: number) {
  const [low, high] = [bands.map((band) => band.low), bands.map((band) => band.high)];
  const column = (cells: unknown[][]) => cells.map(([cell]) => cell);
  const zones = column(call('ZONE', bands.map((band) => (band.low + band.high) / 2), rate)) as number[];
  const margins = column(call('MARGIN', low, high, rate, guard, ppm)) as number[];
  return { D: column(call('LOW', low, high, rate)), E: zones, F: zones.map((zone) => (zone > 3 ? 'far' : 'near')), H: margins, I: margins.map((margin) => 2 * margin) };
}

const columnsOf = (cells: Shown, { bands }: StyledPlan, letters = ['D', 'E', 'F', 'H', 'I']) =>
  Object.fromEntries(letters.map((letter) => [letter, bands.map((_, i) => cells[`${letter}${FIRST + i}`])]));

describe('a styled plan of 1 000 rows (seed 20261202)', () => {
  const folder = newFolder();
  const ROWS = 1000;
  const LAST = FIRST + ROWS - 1;
  let plan: StyledPlan;
  let transcript: string;
  let before: Record<string, Buffer>;
  let after: Record<string, Buffer>;
  beforeAll(async () => {
    plan = await styledPlan(ROWS, seeded(20261202));
    writeFileSync(path.join(folder, 'plan.xlsx'), plan.bytes);
    transcript = onTerminal(folder, 'plan.xlsx --out done.xlsx >output.txt');
    [before, after] = await Promise.all([partsOf(plan.bytes), partsOf(file(folder, 'done.xlsx'))]);
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  it('is counted sheet by sheet', () => {
    expect(lines(file(folder, 'output.txt').toString())).toEqual([
      'Plan: 2001 FOLD formulas computed, 2000 other formulas followed, 0 FOLD cells in error',
      'Clock tree: 0 FOLD formulas computed, 0 other formulas followed, 0 FOLD cells in error',
      'Summary: 1 FOLD formula computed, 2 other formulas followed, 0 FOLD cells in error',
    ]);
  });

  it.skipIf(noTerminal)(`shows on a terminal how far it is, in one line that is gone in the end${noTerminal ? ` (${noTerminal})` : ''}`, () => {
    expect(transcript).toMatch(/^(\r\x1b\[KComputed \d+ of \d+ formulas)+\r\x1b\[K$/);
  });

  it('shows what the worksheet functions give, and what native formulas make of it', () => {
    const expected = expectedColumns(plan, plan.rate);
    expect(columnsOf(shownIn(after, 1), plan)).toEqual(expected);
    expect(shownIn(after, 3)).toMatchObject({ B1: Math.min(...expected.H), B2: expected.F.filter((where) => where === 'far').length, B4: 70 });
  });

  it('keeps the values of formulas that have nothing to do with it', () => {
    expect(columnsOf(shownIn(after, 1), plan, ['G'])).toEqual({ G: Array(ROWS).fill(STALE) });
    expect([shownIn(after, 2).B3, shownIn(after, 3).B3]).toEqual([STALE, STALE]);
  });

  it('stores the column that spills as a dynamic array, and nothing else as one', () => {
    const sheet = after['xl/worksheets/sheet1.xml']!.toString();
    expect(sheet.match(/<c [^>]*cm=.*?<\/f>/g)).toEqual([
      `<c r="H${FIRST}" cm="1"><f t="array" ref="H${FIRST}:H${LAST}">_xldudf_FOLD_MARGIN(B${FIRST}:B${LAST},C${FIRST}:C${LAST},Rate,Guard,Ppm)</f>`,
    ]);
    expect(after['xl/metadata.xml']!.toString()).toMatch(/dynamicArrayProperties [^>]*fDynamic="1"/);
    expect(after['[Content_Types].xml']!.toString()).toContain('<Override PartName="/xl/metadata.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheetMetadata+xml"/>');
    expect(after['xl/_rels/workbook.xml.rels']!.toString()).toMatch(/<Relationship Id="\w+" Type="[^"]*\/sheetMetadata" Target="\/xl\/metadata\.xml"\/>/);
  });

  it('keeps every part byte for byte that need not change', () => {
    // What such a file is made of, so that this says something.
    expect(Object.keys(before)).toEqual(expect.arrayContaining(['xl/styles.xml', 'xl/theme/theme1.xml', 'xl/comments1.xml', 'xl/drawings/drawing1.xml', 'xl/media/image1.png', 'xl/sharedStrings.xml']));
    const changed = Object.keys(after).filter((part) => !before[part]?.equals(after[part]!));
    expect(changed.toSorted()).toEqual(['[Content_Types].xml', 'xl/_rels/workbook.xml.rels', 'xl/metadata.xml', 'xl/worksheets/sheet1.xml', 'xl/worksheets/sheet3.xml']);
    expect(Object.keys(before).filter((part) => !after[part])).toEqual([]);
  });

  it('changes in its sheets values alone', () => {
    /** A sheet without the contents of its cells, and without the unstyled cells that the spilled column fills. */
    const frame = (part: Buffer) => part.toString()
      .replace(/<c r="(\w+)"( s="\d+")?[^>]*?(?:\/>|>.*?<\/c>)/g, '<c $1$2>')
      .replace(/<c H\d+>/g, '')
      .replace(/ spans="[\d:]+"/g, ''); // a hint, and optional
    for (const part of ['xl/worksheets/sheet1.xml', 'xl/worksheets/sheet3.xml']) expect(frame(after[part]!)).toBe(frame(before[part]!));
    const formulas = (part: Buffer) => part.toString().match(/<f[ >].*?<\/f>/g)!.map((formula) => formula.replace(/<f[^>]*>/, '<f>'));
    expect(formulas(after['xl/worksheets/sheet1.xml']!)).toEqual(formulas(before['xl/worksheets/sheet1.xml']!));
  });

  it.skipIf(noSoffice)(`shows the same values in another spreadsheet program${noSoffice ? ` (${noSoffice})` : ''}`, async () => {
    const elsewhere = await partsOf(reopened({ done: file(folder, 'done.xlsx') }).done!);
    // That program computes array formulas when it opens a file, whatever it is told: the column that spills can't be compared.
    for (const letter of ['D', 'E', 'F', 'I']) expect(columnsOf(shownIn(elsewhere, 1), plan, [letter])).toEqual(columnsOf(shownIn(after, 1), plan, [letter]));
    expect(shownIn(elsewhere, 3)).toEqual(shownIn(after, 3));
  });
});

describe('a plan of 12 rows (seed 20261203)', () => {
  let plan: StyledPlan;
  let folder: string;
  beforeAll(async () => {
    plan = await styledPlan(12, seeded(20261203));
  });
  beforeEach(() => {
    folder = newFolder();
    writeFileSync(path.join(folder, 'plan.xlsx'), plan.bytes);
  });
  afterEach(() => rmSync(folder, { recursive: true }));

  const sheetsOf = async (name: string) => partsOf(file(folder, name));
  const all = 'Plan: 25 FOLD formulas computed, 24 other formulas followed, 0 FOLD cells in error';
  const one = 'Summary: 1 FOLD formula computed, 2 other formulas followed, 0 FOLD cells in error';

  it('is computed at another rate with --set, and the file that it came from stays as it was', async () => {
    const run = await recalc(folder, 'plan.xlsx', '--out', 'done.xlsx', '--set', 'Rate=100', '--set', "'Clock tree'!B2=49", '--set', 'Plan!A8=Beacon');
    expect(run).toEqual({ code: 0, output: [all, 'Clock tree: 0 FOLD formulas computed, 1 other formula followed, 0 FOLD cells in error', one], complaints: [] });
    const parts = await sheetsOf('done.xlsx');
    expect(columnsOf(shownIn(parts, 1), plan)).toEqual(expectedColumns(plan, 100));
    expect(shownIn(parts, 3).B4).toBe(21);
    expect(shownIn(parts, 2).B3).toBe(4.9);
    expect(parts['xl/worksheets/sheet1.xml']!.toString()).toMatch(/<c r="B3" s="\d+"><v>100<\/v><\/c>.*<c r="A8" t="inlineStr"><is><t xml:space="preserve">Beacon<\/t><\/is><\/c>/);
    expect(file(folder, 'plan.xlsx').equals(plan.bytes)).toBe(true);
    expect(readdirSync(folder).toSorted()).toEqual(['done.xlsx', 'plan.xlsx']);
  });

  it('is replaced as a whole where the result goes to its own file, and then comes out the same, byte for byte, again', async () => {
    chmodSync(path.join(folder, 'plan.xlsx'), 0o640);
    const { ino } = statSync(path.join(folder, 'plan.xlsx'));
    expect((await recalc(folder, 'plan.xlsx', '--out', './plan.xlsx')).code).toBe(0);
    const first = file(folder, 'plan.xlsx');
    expect(columnsOf(shownIn(await partsOf(first), 1), plan)).toEqual(expectedColumns(plan, plan.rate));
    const { ino: another, mode } = statSync(path.join(folder, 'plan.xlsx'));
    expect(another).not.toBe(ino); // a new file in its place, not the old one written over
    expect(mode & 0o777).toBe(0o640);
    expect((await recalc(folder, 'plan.xlsx', '--out', 'plan.xlsx')).code).toBe(0);
    expect(file(folder, 'plan.xlsx').equals(first)).toBe(true);
    expect(readdirSync(folder)).toEqual(['plan.xlsx']);
  });

  it('is written with its errors, each named with its cell and sentence, and the exit code says so', async () => {
    const run = await recalc(folder, 'plan.xlsx', '--out', 'done.xlsx', '--set', 'Plan!B9=fast', '--set', 'Plan!C10=-5', '--set', 'Spare_Rate=0');
    const low = plan.bands[2]!.low;
    expect(run).toEqual({
      code: 1,
      output: [
        'Plan: 25 FOLD formulas computed, 26 other formulas followed, 5 FOLD cells in error',
        'Clock tree: 0 FOLD formulas computed, 1 other formula followed, 0 FOLD cells in error',
        'Summary: 1 FOLD formula computed, 3 other formulas followed, 1 FOLD cell in error',
      ],
      complaints: [
        'Plan!H9 #VALUE! low must be a number; got "fast".', `Plan!H10 #VALUE! low must not be above high; got ${low} and -5.`,
        'Plan!D9 #VALUE! low must be a number; got "fast".', 'Plan!E9 #VALUE! The error comes from a cell or a function that the formula uses.',
        `Plan!D10 #VALUE! low must not be above high; got ${low} and -5.`,
        'Summary!B4 #VALUE! rate must be above 0; got 0.',
      ],
    });
    const cells = shownIn(await sheetsOf('done.xlsx'), 1);
    expect([cells.D9, cells.H9, cells.H10, cells.B9]).toEqual(['#VALUE!', '#VALUE!', '#VALUE!', undefined]);
    expect([cells.D8, cells.H8]).toEqual([expectedColumns(plan, plan.rate).D[0], expectedColumns(plan, plan.rate).H[0]]);
  });
});

describe('what can not be done ends with exit code 2, one sentence, and nothing written', () => {
  const folder = newFolder();
  let before: string[];
  const contents = () => readdirSync(folder, { recursive: true, withFileTypes: true })
    .map((entry) => path.join(entry.parentPath, entry.name)).map((name) => `${name} ${statSync(name).isDirectory() ? '' : readFileSync(name, 'base64')}`).toSorted();
  beforeAll(async () => {
    const { bytes } = await styledPlan(2, seeded(20261204));
    const put = (name: string, content: Uint8Array | string) => writeFileSync(path.join(folder, name), content);
    put('plan.xlsx', bytes);
    put('half.xlsx', bytes.subarray(0, bytes.length / 2));
    put('locked.xlsx', compoundFile('EncryptedPackage'));
    put('old.xls', compoundFile('Workbook'));
    put('plan.csv', 'Band,Low,High\nBeacon,60,90\n');
    put('empty.xlsx', '');
    mkdirSync(path.join(folder, 'folder.xlsx'));
    before = contents();
  });
  afterAll(() => rmSync(folder, { recursive: true }));

  const out = ['--out', 'done.xlsx'];
  it.concurrent.each<[what: string, args: string[], sentence: string]>([
    ['a damaged archive',              ['half.xlsx', ...out],                              'half.xlsx: The file is damaged: its archive is incomplete or changed.'],
    ['a workbook with a password',     ['locked.xlsx', ...out],                            'locked.xlsx: This workbook is protected by a password; save it without one first.'],
    ['the old format',                 ['old.xls', '--out', 'done.xls'],                   'old.xls: This is a workbook in the old .xls format; save it as .xlsx first.'],
    ['a text file',                    ['plan.csv', ...out],                               'plan.csv: This is not an .xlsx workbook.'],
    ['an empty file',                  ['empty.xlsx', ...out],                             'empty.xlsx: The file is empty.'],
    ['a folder',                       ['folder.xlsx', ...out],                            'folder.xlsx: This is a folder.'],
    ['no such file',                   ['missing.xlsx', ...out],                           'missing.xlsx: There is no such file or folder.'],
    ['a result in no folder',          ['plan.xlsx', '--out', 'nowhere/done.xlsx'],        'nowhere/done.xlsx: There is no such file or folder.'],
    ['a result inside a file',         ['plan.xlsx', '--out', 'plan.csv/done.xlsx'],       'plan.csv/done.xlsx: There is no such folder.'],
    ['a result that is a folder',      ['plan.xlsx', '--out', 'folder.xlsx'],              'folder.xlsx: This is a folder.'],
    ['a result of another kind',       ['plan.xlsx', '--out', 'done.csv'],                 'The result is a file of the same kind as the workbook: give it a name that ends with .xlsx.'],
    ['macros into a file without',     ['macros.xlsm', ...out],                            'The result is a file of the same kind as the workbook: give it a name that ends with .xlsm.'],
    ['no workbook',                    [],                                                 'Name the workbook to recalculate, such as plan.xlsx; --help shows more.'],
    ['two workbooks',                  ['plan.xlsx', 'more.xlsx', ...out],                 'Name one workbook, not 2: plan.xlsx, more.xlsx.'],
    ['no result',                      ['plan.xlsx'],                                      'Say where the result goes, such as --out done.xlsx; it may be the workbook itself.'],
    ['an option that is not known',    ['plan.xlsx', '--fast', ...out],                    "Unknown option '--fast'. --help shows what is possible."],
    ['a name that is not there',       ['plan.xlsx', ...out, '--set', 'Speed=100'],        '--set Speed: the workbook has no name, cell or sheet for that.'],
    ['a setting without a value',      ['plan.xlsx', ...out, '--set', 'Rate'],             '--set Rate: write a name or an address, "=" and a value, such as --set Rate=100.'],
    ['a setting of several cells',     ['plan.xlsx', ...out, '--set', 'Plan!B8:B9=1'],     '--set Plan!B8:B9: that is 2 × 1 cells; only a single cell can be set.'],
  ])('%s', async (_what, args, sentence) => {
    expect(await recalc(folder, ...args)).toEqual({ code: 2, output: [], complaints: [sentence] });
    expect(contents()).toEqual(before);
  });
});

/** The beginning of a file of the format that came before archives, with an entry in its directory. */
const compoundFile = (entry: string): Buffer => Buffer.concat([Buffer.from('d0cf11e0a1b11ae1', 'hex'), Buffer.alloc(1528), Buffer.from(entry, 'utf16le')]);

/** Runs the command line with a terminal for its standard error, where there is one to be had. Returns what it got. */
function onTerminal(folder: string, args: string): string {
  const line = `'${process.execPath}' '${program}' ${args}`;
  return noTerminal ? execSync(line, { cwd: folder, encoding: 'utf8', stdio: 'pipe' }) : execFileSync('script', ['-qec', line, '/dev/null'], { cwd: folder, encoding: 'utf8' });
}
