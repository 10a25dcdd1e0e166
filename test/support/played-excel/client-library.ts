// The spreadsheet program's own client library in Node, talking to a model of a workbook instead of the program.

import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import vm from 'node:vm';
import { type Batch, type Root, ProgramError, answerBatch } from './batch';
import { addNotes } from './later-library';
import type { WorkbookModel } from './workbook-model';

export interface Connection {
  /**
   * Makes the program fail once: at the step with this number, counted from the next one, with an action's error; or, for the code
   * ConnectionFailure, with the whole request lost on its way.
   */
  failAt(step: number, code: string): void;
  /** Whether that failure has happened. */
  hasFailed(): boolean;
  /** How many requests the program has got. */
  requests(): number;
  /** How the add-in was asked to start with the workbook; undefined where it was not asked. */
  startup(): string | undefined;
  /** Lets every event reach its listeners. */
  settle(): Promise<void>;
}

/**
 * Connects the library, which becomes the global `Excel` of this test file, with a workbook.
 * @param version of the library's requests that program and library know; notes came with 1.18
 */
export function connect(workbook: WorkbookModel, version = 1.18): Connection {
  const { OfficeExtension: library } = loadLibrary();
  addNotes(version >= 1.18);
  let startup: string | undefined;
  const office = {
    StartupBehavior: { load: 'Load' },
    context: { requirements: { isSetSupported: (set: string, wanted: string) => set === 'ExcelApi' && later(version) >= later(wanted) } },
    addin: { setStartupBehavior: async (behavior: string) => { startup = behavior; } },
  };
  Object.assign(globalThis, { Office: office });
  const root: Root = { workbook, made: {}, kept: new Map() };
  let failure: { step: number; code: string } | null = null;
  let failed = false;
  let requests = 0;
  const nextStep = (codes: (code: string) => boolean) => {
    if (!failure || !codes(failure.code) || failure.step-- > 0) return;
    const { code } = failure;
    failure = null;
    failed = true;
    throw new ProgramError(code);
  };
  const isLoss = (code: string) => code === 'ConnectionFailure';

  class Session extends library.SessionBase {
    _resolveRequestUrlAndHeaderInfo(): Promise<object> {
      return Promise.resolve({ url: 'https://program.test/', headers: {} });
    }

    getEventRegistration(id: string): unknown {
      return library.GenericEventRegistration.getGenericEventRegistration(id);
    }

    _createRequestExecutorOrNull(): object {
      return {
        async executeAsync(_data: unknown, _flags: number, message: { Body: Batch }) {
          requests++;
          try {
            nextStep(isLoss);
          } catch (error) {
            const { code, message: text } = error as ProgramError;
            return { HttpStatusCode: 500, ErrorCode: code, ErrorMessage: text, Headers: null, Body: null };
          }
          const batch = JSON.parse(JSON.stringify(message.Body)) as Batch;
          const answer = answerBatch(root, batch, () => nextStep((code) => !isLoss(code)));
          return { HttpStatusCode: 200, ErrorCode: '', ErrorMessage: '', Headers: {}, Body: JSON.parse(JSON.stringify(answer)) };
        },
      };
    }
  }

  library.SessionBase._overrideSession = new Session();
  library._testSetRichApiMessageReadyImpl(() => Promise.resolve());
  workbook.listen(({ type, message }) => queueMicrotask(() => library._testTriggerRichApiMessageEvent({
    entries: [{ messageCategory: 65536, messageType: type, targetId: 'Workbook', message: JSON.stringify(message), isRemoteOverride: false }],
  })));
  return {
    failAt(step, code) {
      failure = { step, code };
      failed = false;
    },
    hasFailed: () => failed,
    requests: () => requests,
    startup: () => startup,
    settle: () => new Promise((settled) => setTimeout(settled)),
  };
}

/** 1.9 comes before 1.18. */
const later = (version: number | string): number => Number(String(version).split('.')[1]);

/** The part of the library that its own tests use. */
interface Library {
  SessionBase: { new (): object; _overrideSession: object };
  GenericEventRegistration: { getGenericEventRegistration(id: string): unknown };
  _testSetRichApiMessageReadyImpl(ready: () => Promise<void>): void;
  _testTriggerRichApiMessageEvent(message: object): void;
}

interface Loaded {
  OfficeExtension: Library;
}

/** Once in a test file. The library expects a page around it: as little of one as it asks for. */
function loadLibrary(): Loaded {
  const page = globalThis as unknown as Record<string, unknown> & Loaded;
  if (page.OfficeExtension) return page;
  const nothing = () => {};
  const location = new URL('https://localhost/');
  const storage = { getItem: () => null, setItem: nothing, removeItem: nothing };
  const document = { URL: location.href, location, cookie: '', getElementsByTagName: () => [], createElement: () => ({ style: {}, setAttribute: nothing }), head: { appendChild: nothing } };
  const stubs = {
    window: page, self: page, parent: page, top: page, location, document, sessionStorage: storage, localStorage: storage, external: {},
    navigator: { userAgent: 'node', language: 'en-US' }, addEventListener: nothing,
  };
  for (const [name, value] of Object.entries(stubs)) Object.defineProperty(page, name, { value, configurable: true, writable: true });
  const file = createRequire(import.meta.url).resolve('@microsoft/office-js/dist/excel-win32-16.01.js');
  vm.runInThisContext(readFileSync(file, 'utf8'), { filename: file });
  return page;
}
