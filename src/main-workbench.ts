// The workbench: the embedded sheet with the worksheet functions, the pane beside it, and files in and out.

import './workbench/workbench.css';
import { demoFor } from './demo';
import { HostFault, type Workbook } from './host/port';
import { openEmbedded } from './host/sheet/embedded';
import { type FunctionsMetadata, type WorksheetFunctions, createRuntime } from './host/sheet/functions-runtime';
import { unknownParts } from './host/sheet/known-functions';
import type { SheetHost } from './host/sheet/sheet-host';
import { cellsOf } from './host/sheet/workbook-data';
import { mountPane } from './pane';
import { type Page, workbenchPage } from './workbench/page';
import { sentences } from './workbench/sentences';

const XLSX = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

const demo = demoFor(new URLSearchParams(location.search).get('demo'));

/** Put in by the build. */
declare const FOLDPLAN_VERSION: string;

/** Takes the pane away that is there. */
let closePane = () => {};

/** The file that the sheet shows. */
const current = { name: demo.name, unsaved: false };

void start();

async function start(): Promise<void> {
  let host: SheetHost | null = null;
  const page = workbenchPage(document, {
    open: (file) => host && void open(page, host, file),
    save: () => host && void save(page, host),
    savePlain: () => host && void savePlain(page, host),
    unsaved: () => current.unsaved,
  });
  page.busy(true);
  try {
    const dark = matchMedia('(prefers-color-scheme: dark)');
    const sheet = openEmbedded(await loadWorksheetFunctions(), page.sheet, dark.matches);
    dark.addEventListener('change', ({ matches }) => sheet.setDark(matches));
    await sheet.host.load(demo.make());
    host = sheet.host;
    await host.onEdited(() => nameCurrent(page, current.name, true));
    followSelection(page, host);
    nameCurrent(page, demo.name, false);
    page.tell(sentences.welcome);
    page.busy(false);
  } catch {
    page.complain(sentences.cannotStart);
    return;
  }
  await showPane(page, host);
}

/** Another workbook is another pane: nothing of what was begun in the old one goes on in the new one. */
async function showPane(page: Page, host: SheetHost): Promise<void> {
  closePane();
  try {
    closePane = await mountPane(host, page.pane, FOLDPLAN_VERSION);
  } catch {
    page.complain(sentences.noPane);
  }
}

/** The contract of every host, loaded as a page loads it. */
async function loadWorksheetFunctions(): Promise<WorksheetFunctions> {
  const runtime = createRuntime();
  Object.assign(globalThis, { CustomFunctions: runtime.customFunctions });
  const script = document.createElement('script');
  script.src = 'functions.js';
  const [metadata] = await Promise.all([
    fetch('functions.json').then((response) => response.json() as Promise<FunctionsMetadata>),
    new Promise((loaded, failed) => {
      script.addEventListener('load', loaded);
      script.addEventListener('error', failed);
      document.head.append(script);
    }),
  ]);
  return runtime.functions(metadata);
}

/** What stood in the sheet stays there unless the file could be read. */
async function open(page: Page, host: SheetHost, file: File): Promise<void> {
  if (current.unsaved && !(await page.mayDiscard(sentences.mayDiscard(current.name, file.name)))) return;
  page.busy(true);
  page.tell(sentences.opening(file.name));
  try {
    const { readWorkbook } = await import('./host/file');
    const { workbook, notKept } = await readWorkbook(new Uint8Array(await file.arrayBuffer()));
    await host.load(workbook, (done, total) => page.tell(sentences.computing(file.name, done, total)));
    nameCurrent(page, file.name, false);
    await showPane(page, host);
    page.tell(whatWasOpened(file.name, workbook, notKept));
  } catch (error) {
    page.complain(error instanceof HostFault ? `${file.name}: ${error.message}` : sentences.cannotOpen(file.name));
  } finally {
    page.busy(false);
  }
}

function whatWasOpened(name: string, workbook: Workbook, notKept: string[]): string {
  const formulas = workbook.sheets.flatMap((sheet) => [...cellsOf(sheet)]).flatMap(([, , { formula }]) => (formula === undefined ? [] : [formula]));
  const unknown = formulas.map(unknownParts).filter((parts) => parts.length > 0);
  return [
    sentences.opened(name, workbook.sheets.length, formulas.length),
    ...(notKept.length > 0 ? [sentences.notKept(notKept)] : []),
    ...(unknown.length > 0 ? [sentences.unknownParts(unknown.length, [...new Set(unknown.flat())])] : []),
  ].join(' ');
}

async function save(page: Page, host: SheetHost): Promise<void> {
  const name = current.name.replace(/(\.xlsx)?$/i, '.xlsx');
  page.busy(true);
  page.tell(sentences.saving(name));
  try {
    const { writeWorkbook } = await import('./host/file');
    await host.settled();
    const bytes = await writeWorkbook(host.save());
    page.download(name, new Blob([bytes as Uint8Array<ArrayBuffer>], { type: XLSX }));
    nameCurrent(page, name, false);
    page.tell(sentences.saved(name));
  } catch (error) {
    page.complain(error instanceof HostFault ? error.message : sentences.cannotSave(name));
  } finally {
    page.busy(false);
  }
}

/** The workbook as a file for programs without our functions; what the sheet shows stays. */
async function savePlain(page: Page, host: SheetHost): Promise<void> {
  const name = current.name.replace(/(\.xlsx)?$/i, ' plain.xlsx');
  const cancel = new AbortController();
  page.busy(true, () => cancel.abort());
  page.tell(sentences.saving(name));
  try {
    const [{ WorkbookFile, writeWorkbook }, { cancellable, plainCopy }] = await Promise.all([import('./host/file'), import('./plain')]);
    await host.settled();
    const file = await WorkbookFile.open(await writeWorkbook(host.save()));
    const copy = await plainCopy(await file.formulas(), { version: FOLDPLAN_VERSION, date: new Date().toISOString().slice(0, 10) },
      cancellable(cancel.signal, (done, total) => page.tell(sentences.looking(done, total))));
    await file.replaceFormulas(copy);
    page.download(name, new Blob([(await file.save()) as Uint8Array<ArrayBuffer>], { type: XLSX }));
    const sum = (of: 'formulas' | 'values') => copy.counts.reduce((all, one) => all + one[of], 0);
    page.tell(sentences.savedPlain(name, sum('formulas'), sum('values')));
  } catch (error) {
    if (error === cancel.signal.reason) page.tell(sentences.cancelled);
    else page.complain(error instanceof HostFault ? error.message : sentences.cannotSave(name));
  } finally {
    page.busy(false);
  }
}

function nameCurrent(page: Page, name: string, unsaved: boolean): void {
  if (current.name !== name || current.unsaved !== unsaved) Object.assign(current, { name, unsaved });
  page.nameFile(name, unsaved);
}

/** Tells about the selected cell, and the sentence behind its error. */
function followSelection(page: Page, host: SheetHost): void {
  let asked = 0;
  const show = async () => {
    const turn = ++asked;
    const cell = await host.selectedCell();
    if (turn !== asked || !cell) return;
    const value = cell.values[0]![0]!;
    const failed = typeof value === 'object' && value !== null;
    page.showCell(failed ? '' : sentences.cell(cell.address, value), failed ? sentences.cellError(cell.address, value.error, value.message) : null);
  };
  void host.onSelected(() => void show());
  void host.onRecalculated(() => void show());
}
