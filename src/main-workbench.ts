// The workbench: the embedded sheet with the worksheet functions, the pane beside it, and files in and out.

import './workbench/workbench.css';
import { demoPlan, demoPlanName } from './demo-plan';
import { openEmbedded } from './host/sheet/embedded';
import { type FunctionsMetadata, type WorksheetFunctions, createRuntime } from './host/sheet/functions-runtime';
import { mountPane } from './pane';
import { workbenchPage } from './workbench/page';

const page = workbenchPage(document, { open: () => {}, save: () => {}, unsaved: () => false });

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

async function start(): Promise<void> {
  const darkQuery = matchMedia('(prefers-color-scheme: dark)');
  const { host, setDark } = openEmbedded(await loadWorksheetFunctions(), page.sheet, darkQuery.matches);
  darkQuery.addEventListener('change', ({ matches }) => setDark(matches));
  await host.load(demoPlan());
  page.nameFile(demoPlanName, false);
  await mountPane(host, page.pane);
}

void start();
