// The add-in of a built site, opened in a browser under a page that plays the spreadsheet program on the web.

import type { Browser, Frame, Page } from 'playwright-core';
import { type Watched, siteFile, watch } from '../browser';
import { type Batch, type Root, Served, answerBatch } from './batch';
import { playWebHost } from './web-host-page';
import type { WorkbookModel } from './workbook-model';

/** How the program gets the result of a worksheet function. */
export type Outcome =
  | { succeeded: true; value: unknown }
  /** A function threw: the number of its error code, and the sentence. */
  | { succeeded: false; code: number; sentence: string };

export interface WebHost {
  page: Page;
  /** The add-in's page. */
  addIn: Frame;
  watched: Watched;
  /** Calls a worksheet function as a formula does. */
  call(id: string, args: unknown[]): Promise<Outcome>;
  close(): Promise<void>;
}

/** Objects that the library makes by name. */
const CUSTOM_FUNCTIONS = 'Microsoft.ExcelServices.CustomFunctions';
const ADD_IN = 'Microsoft.InternalService.AddinInternalService';
const START = 'Microsoft.AppRuntime.AppRuntimePersistenceService';

/** Kinds of messages to the add-in. */
const WORKBOOK_EVENT = 65536;
const FUNCTION_CALL = 1;

/**
 * @param folder the built site
 * @param base the address that it was built for; every request to it is answered from the folder, and no other is answered
 */
export async function openInWebHost(browser: Browser, folder: string, base: string, workbook: WorkbookModel, { usageReports = false } = {}): Promise<WebHost> {
  const functions = new CustomFunctionsService();
  const root: Root = { workbook, made: { [CUSTOM_FUNCTIONS]: functions, [ADD_IN]: new AddInService(), [START]: new StartService() }, kept: new Map() };
  const context = await browser.newContext();
  await context.route('**/*', async (route) => {
    const { origin, pathname } = new URL(route.request().url());
    if (`${origin}${pathname}` === `${base}/program`) return route.fulfill({ contentType: 'text/html', body: '<!doctype html><link rel="icon" href="data:,">' });
    const file = `${origin}${pathname}`.startsWith(`${base}/`) ? siteFile(`${origin}${pathname}`.slice(base.length), folder) : null;
    return file ? route.fulfill(file) : route.fulfill({ status: 404 });
  });
  const page = await context.newPage();
  const watched = watch(page, base);
  await page.exposeFunction('answerBatch', (body: string) => JSON.stringify(answerBatch(root, JSON.parse(body) as Batch)));
  await page.goto(`${base}/program`);
  const send = (entries: unknown[][]) => page.evaluate((all) => window.sendEvents(all), entries);
  workbook.listen(({ type, message }) => void send([[WORKBOOK_EVENT, type, 'Workbook', JSON.stringify(message), '', false]]));
  await page.evaluate(playWebHost, { addIn: `${base}/pane.html`, usageReports });
  await functions.ready;
  return {
    page,
    addIn: page.frames()[1]!,
    watched,
    call: async (id, args) => {
      const { entry, outcome } = functions.begin(id, args);
      await send([entry]);
      return outcome;
    },
    close: () => context.close(),
  };
}

/** The program's end of the custom functions runtime. */
class CustomFunctionsService extends Served {
  readonly ready: Promise<void>;
  private setReady!: () => void;
  private calls: ((outcome: Outcome) => void)[] = [];

  constructor() {
    super();
    this.ready = new Promise((ready) => {
      this.setReady = ready;
    });
  }

  /** The message that calls a function, and what will become of the call. */
  begin(id: string, args: unknown[]): { entry: unknown[]; outcome: Promise<Outcome> } {
    let settle!: (outcome: Outcome) => void;
    const outcome = new Promise<Outcome>((settled) => {
      settle = settled;
    });
    const number = this.calls.push(settle);
    const ERRORS_AS_INPUT = 4; // functions.json asks for it
    const call = [number, id, args, 'Plan!Z1', ERRORS_AS_INPUT, null];
    return { entry: [FUNCTION_CALL, 1000, '', JSON.stringify(call), '', false], outcome };
  }

  _SetOsfControlContainerReadyForCustomFunctions(): void {
    this.setReady();
  }

  _GetEnabledFeatures(): number[] {
    return [1, 2, 3, 4];
  }

  SetInvocationArrayResults(results: [number, boolean, unknown, number][]): void {
    for (const [number, succeeded, value, code] of results) {
      this.calls[number - 1]!(succeeded ? { succeeded, value } : { succeeded, code, sentence: String(value) });
    }
  }
}

class AddInService extends Served {
  NotifyActionHandlerReady(): void {}
}

/** Where an add-in asks to be started with the workbook. */
class StartService extends Served {
  SetAppRuntimeStartState(): void {}
}
