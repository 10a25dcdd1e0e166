// The command line: recalculates the FOLD formulas of a workbook file, and what depends on them; and makes a plain copy of it.

import { randomBytes } from 'node:crypto';
import { rmSync } from 'node:fs';
import { access, constants, open, readFile, realpath, rename, rm, stat } from 'node:fs/promises';
import path from 'node:path';
import { setImmediate } from 'node:timers/promises';
import { parseArgs } from 'node:util';
import { type Calculator, type Recalculated, WorkbookFile } from './host/file';
import { type CellInput, HostFault } from './host/port';
import { type WorksheetFunctions, loadFunctions } from './host/sheet/functions-runtime';
import { type PlainCopy, plainCopy } from './plain';

const HELP = `Recalculates the FOLD formulas of a workbook, and the other formulas that depend on them.

  npm run recalc -- plan.xlsx --out done.xlsx [--set Rate=100]... [--plain]

  --out FILE              where the result goes; it may be the workbook itself, which is then replaced as a whole
  --set NAME=VALUE        puts a value into a cell first; NAME is a defined name or an address: Rate, Plan!B2, 'My plan'!B2.
                          VALUE is a number, TRUE, FALSE, or else text; nothing after "=" empties the cell. May be repeated.
  --plain                 makes a plain copy, for programs without Foldplan: after the recalculation each FOLD formula becomes a native formula
                          with the same results where there is one, else its value. A new last sheet lists what became what. FILE has to
                          be another file than the workbook, which is not touched
  --help                  shows this

What is computed: every formula that calls a FOLD function or has no value yet, and every formula that depends on one of those or on
a cell that --set changed. All other formulas keep their values; where the file itself asks for a full recalculation, all are computed.
A native formula that can't be computed here (a function that is not known here, another workbook) keeps its value too, and standard
error tells of it. Everything else in the file stays as it was.
A FOLD formula that needs more cells becomes one that spills. It never covers other cells, merged cells or tables: it is #SPILL! then,
which the file holds as #VALUE!, as spreadsheet programs write it.

Exit code: 0, or 1 where a FOLD cell shows an error or could not be computed (each is listed on standard error; the result is written),
or 2 where nothing was written: the workbook can't be read, an option is wrong, or --set names no cell. A run that is stopped leaves nothing.
`;

/** Nothing can be written, for a reason that is the user's to know. */
class Refusal extends Error {}

interface Job {
  input: string;
  output: string;
  settings: { reference: string; value: CellInput }[];
  plain: boolean;
}

async function run(args: string[]): Promise<number> {
  try {
    const job = readArguments(args);
    return job === 'help' ? tell(HELP.trimEnd()) : await recalculate(job);
  } catch (error) {
    complain(error instanceof Refusal ? error.message : `The workbook could not be recalculated: ${error instanceof Error ? error.message : String(error)}`);
    return 2;
  }
}

async function recalculate(job: Job): Promise<number> {
  const progress = new Progress();
  try {
    return await recalculateWith(progress, job);
  } finally {
    progress.end(); // a sentence that follows has a line of its own
  }
}

async function recalculateWith(progress: Progress, { input, output, settings, plain }: Job): Promise<number> {
  if (plain && await isSameFile(input, output)) throw new Refusal('A plain copy is another file than the workbook: give --out another name.');
  const bytes = await refusing(input, () => readFile(input));
  await refusing(output, () => checkPlace(output));
  const file = await refusing(input, () => WorkbookFile.open(bytes));
  for (const { reference, value } of settings) await set(file, reference, value);
  const result = await file.recalculate(await calculatorWith(progress));
  const copy = plain ? await makePlain(file, progress) : null;
  progress.end();
  await refusing(output, async () => replaceFile(output, await file.save()));
  const code = report(result);
  if (copy) reportPlain(copy);
  return code;
}

/** The sheet that computes is large: it is loaded when it is known to be needed. */
async function calculatorWith(progress: Progress): Promise<Calculator> {
  const functions = await builtFunctions();
  const { calculate } = await import(/* webpackMode: "eager" */ './host/sheet/calculate');
  const { unknownParts } = await import(/* webpackMode: "eager" */ './host/sheet/known-functions');
  return { calculate: (workbook) => calculate(workbook, functions, (done, total) => progress.tell(`Computed ${done} of ${total} formulas`)), unknownParts };
}

async function makePlain(file: WorkbookFile, progress: Progress): Promise<PlainCopy> {
  const { version } = JSON.parse(await readFile(path.join(__dirname, '../package.json'), 'utf8')) as { version: string };
  const copy = await plainCopy(await file.formulas(), { version, date: new Date().toISOString().slice(0, 10) }, async (done, total) => {
    progress.tell(`Looked at ${done} of ${total} formulas`);
    await setImmediate(); // lets a signal through
  });
  await file.replaceFormulas(copy);
  return copy;
}

function reportPlain({ counts, sheet }: PlainCopy): void {
  for (const { sheet: name, formulas, values } of counts) tell(`${name}: ${count(formulas, 'FOLD formula')} made native, ${count(values, 'other')} made values`);
  tell(`The sheet ${JSON.stringify(sheet.name)} lists them.`);
}

function report({ sheets, errors, kept }: Recalculated): number {
  for (const { name, fold, others } of sheets) {
    const failed = errors.filter(({ sheet }) => sheet === name).length;
    tell(`${name}: ${count(fold, 'FOLD formula')} computed, ${count(others, 'other formula')} followed, ${count(failed, 'FOLD cell')} in error`);
  }
  for (const { sheet, address, message } of kept) complain(`${sheet}!${address} ${message}`);
  for (const { sheet, address, code, message } of errors) complain([`${sheet}!${address}`, code, message].filter(Boolean).join(' '));
  return errors.length > 0 ? 1 : 0;
}

const count = (number: number, what: string): string => `${number} ${what}${number === 1 ? '' : 's'}`;

async function set(file: WorkbookFile, reference: string, value: CellInput): Promise<void> {
  const block = await file.read(reference);
  if (!block) throw new Refusal(`--set ${reference}: the workbook has no name, cell or sheet for that.`);
  const [rows, columns] = [block.values.length, block.values[0]!.length];
  if (rows !== 1 || columns !== 1) throw new Refusal(`--set ${reference}: that is ${rows} × ${columns} cells; only a single cell can be set.`);
  if (file.hasFormula(reference)) complain(`${block.sheet}!${block.address} held a formula; it holds a value now`);
  await refusing(`--set ${reference}`, () => file.write(reference, [[value]]));
}

// Arguments

function readArguments(args: string[]): Job | 'help' {
  const { values, positionals } = parsed(args);
  if (values.help) return 'help';
  if (positionals.length === 0) throw new Refusal('Name the workbook to recalculate, such as plan.xlsx; --help shows more.');
  if (positionals.length > 1) throw new Refusal(`Name one workbook, not ${positionals.length}: ${positionals.join(', ')}.`);
  if (!values.out) throw new Refusal(`Say where the result goes, such as --out done.xlsx${values.plain ? '' : '; it may be the workbook itself'}.`);
  if (values.out.length > 1) throw new Refusal('Name one file with --out.');
  const [input, output] = [resolve(positionals[0]!), resolve(values.out[0]!)];
  const kind = (file: string) => /\.xl(s|sx|sm|tx|tm|sb)$/i.exec(file)?.[0].toLowerCase();
  if (kind(input) && kind(input) !== kind(output)) {
    throw new Refusal(`The result is a file of the same kind as the workbook: give it a name that ends with ${kind(input)}.`);
  }
  return { input, output, settings: (values.set ?? []).map(readSetting), plain: values.plain ?? false };
}

function parsed(args: string[]) {
  try {
    return parseArgs({
      args,
      allowPositionals: true,
      options: { out: { type: 'string', multiple: true }, set: { type: 'string', multiple: true }, plain: { type: 'boolean' }, help: { type: 'boolean', short: 'h' } },
    });
  } catch (error) {
    throw new Refusal(`${(error as Error).message.split(/\.\s|\n/)[0]}. --help shows what is possible.`);
  }
}

function readSetting(text: string): Job['settings'][number] {
  const [, reference = '', value = ''] = /^((?:'(?:[^']|'')*')?[^=]*)=(.*)$/s.exec(text) ?? [];
  if (reference.trim() === '') throw new Refusal(`--set ${text}: write a name or an address, "=" and a value, such as --set Rate=100.`);
  return { reference: reference.trim(), value: readInput(value.trim()) };
}

function readInput(text: string): CellInput {
  if (text === '') return null;
  if (/^(true|false)$/i.test(text)) return text.toLowerCase() === 'true';
  const number = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text) ? Number(text) : NaN;
  return Number.isFinite(number) ? number : text;
}

/** npm runs its scripts in the package's folder, whatever folder the user is in. */
const resolve = (file: string): string =>
  path.resolve(process.env.npm_lifecycle_event === 'recalc' ? process.env.INIT_CWD ?? '.' : '.', file);

// Files

async function builtFunctions(): Promise<WorksheetFunctions> {
  const dist = path.join(__dirname, '../dist');
  const text = (name: string) => refusing(path.join(dist, name), () => readFile(path.join(dist, name), 'utf8'));
  return loadFunctions(JSON.parse(await text('functions.json')), await text('functions.js'));
}

async function isSameFile(one: string, other: string): Promise<boolean> {
  const [a, b] = await Promise.all([one, other].map((file) => realpath(file).catch(() => path.resolve(file))));
  return a === b;
}

/** A file that is not yet whole. */
let unfinished: string | null = null;

/** Tells before the work that its result can't be put there. */
async function checkPlace(file: string): Promise<void> {
  const target = await realpath(file).catch(() => file);
  if ((await stat(target).catch(() => null))?.isDirectory()) throw Object.assign(new Error(), { code: 'EISDIR' });
  await access(`${path.dirname(target)}/.`, constants.W_OK); // with the dot, a file is no folder
}

/** The file is replaced as a whole or not at all. */
async function replaceFile(file: string, bytes: Uint8Array): Promise<void> {
  const target = await realpath(file).catch(() => file);
  const before = await stat(target).catch(() => null);
  const beside = path.join(path.dirname(target), `.${path.basename(target)}.${randomBytes(6).toString('hex')}`);
  unfinished = beside;
  try {
    const handle = await open(beside, 'wx', before ? before.mode : 0o666);
    try {
      await handle.writeFile(bytes);
      await handle.sync();
    } finally {
      await handle.close();
    }
    await rename(beside, target);
  } catch (error) {
    await rm(beside, { force: true });
    throw error;
  } finally {
    unfinished = null;
  }
}

/** Does something with a file; what goes wrong is told in one sentence. */
async function refusing<T>(file: string, work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    if (error instanceof HostFault) throw new Refusal(`${shown(file)}: ${message}`);
    if (code !== undefined) throw new Refusal(`${shown(file)}: ${FILE_TROUBLE[code] ?? message}`);
    throw error;
  }
}

const shown = (file: string): string => (path.isAbsolute(file) ? path.relative(resolve('.'), file) : file);

const FILE_TROUBLE: Record<string, string> = {
  ENOENT: 'There is no such file or folder.',
  EISDIR: 'This is a folder.',
  ENOTDIR: 'There is no such folder.',
  EACCES: 'There is no permission to use this file.',
  EPERM: 'There is no permission to use this file.',
  ENOSPC: 'The disk is full.',
};

// Telling

function tell(line: string): 0 {
  process.stdout.write(`${line}\n`);
  return 0;
}

const complain = (line: string): void => void process.stderr.write(`${line}\n`);

/** Says how far a long run is: one line that changes on a terminal, a line now and then elsewhere. */
class Progress {
  readonly #terminal = process.stderr.isTTY;
  #next = Date.now() + 1000;
  #shown = false;

  tell(state: string): void {
    if (Date.now() < this.#next) return;
    this.#next = Date.now() + (this.#terminal ? 100 : 2000);
    this.#shown = true;
    process.stderr.write(this.#terminal ? `\r\x1b[K${state}` : `${state}\n`);
  }

  end(): void {
    if (this.#terminal && this.#shown) process.stderr.write('\r\x1b[K');
    this.#shown = false;
  }
}

for (const [signal, code] of [['SIGINT', 130], ['SIGTERM', 143]] as const) {
  // Not once: a second signal would end the program before the file is removed.
  process.on(signal, () => {
    if (unfinished !== null) rmSync(unfinished, { force: true });
    process.exit(code);
  });
}

void run(process.argv.slice(2)).then((code) => {
  process.exitCode = code;
});
