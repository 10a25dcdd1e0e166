// One section of the pane on a page without a browser, over the embedded sheet without a window.

import { Window } from 'happy-dom';
import type { LiveHost, Workbook } from '../../src/host/port';
import { openHeadless } from '../../src/host/sheet/headless';
import type { SheetHost } from '../../src/host/sheet/sheet-host';
import { figuresOf } from '../../src/pane/figures';
import { readPlan } from '../../src/pane/plan';
import type { MakeSection } from '../../src/pane/section';
import { built } from '../support/built-functions';

export interface Stage {
  host: SheetHost;
  place: HTMLElement;
  /** What was said last, by kind. */
  told: { news: string; fault: string };
  /** Reads the workbook and shows it. */
  refresh(): Promise<void>;
  press(name: string): Promise<void>;
  type(label: string, text: string): void;
  tick(label: string): void;
  field(label: string): HTMLInputElement;
  text(): string;
  /** Values of cells, row by row. */
  values(reference: string): Promise<unknown[][] | undefined>;
}

/** @param between stands between the section and the sheet */
export async function stage(workbook: Workbook, make: MakeSection, between: (host: LiveHost) => LiveHost = (host) => host): Promise<Stage> {
  const host = openHeadless(built);
  await host.load(workbook);
  const document = new Window().document as unknown as Document;
  const told = { news: '', fault: '' };
  const used = between(host);
  const refresh = async () => section.show(figuresOf(await readPlan(used)), null);
  const section = make({
    document, host: used, version: '1.2.3', refresh,
    tell: (sentence, kind) => Object.assign(told, kind === 'fault' ? { fault: sentence } : { news: sentence, fault: '' }),
  });
  document.body.append(section.place);
  await refresh();
  await host.onRecalculated(() => void refresh());
  const { place } = section;
  const seen = (element: Element) => element.closest('[hidden]') === null;
  const named = <T extends HTMLElement>(tag: string, name: string): T => {
    const found = [...place.querySelectorAll<T>(tag)].filter(seen).find((one) => (one.getAttribute('aria-label') ?? one.textContent) === name);
    if (!found) throw new Error(`No ${tag} is called ${name}: ${[...place.querySelectorAll(tag)].filter(seen).map((one) => one.getAttribute('aria-label') ?? one.textContent).join(' | ')}`);
    return found;
  };
  const inputOf = (label: string) => {
    const found = [...place.querySelectorAll('label')].filter(seen).find((one) => one.textContent === label || one.textContent!.startsWith(label));
    const input = found && (found.querySelector('input') ?? place.querySelector<HTMLInputElement>(`[id="${found.getAttribute('for')}"]`));
    if (!input) throw new Error(`No field is called ${label}.`);
    return input;
  };
  const happen = (element: Element, type: string) => element.dispatchEvent(new (document.defaultView as unknown as { Event: typeof Event }).Event(type, { bubbles: true }));
  return {
    host, place, told, refresh,
    async press(name) {
      named('button', name).click();
      await host.settled();
    },
    type(label, text) {
      const input = inputOf(label);
      input.value = text;
      happen(input, 'input');
    },
    tick(label) {
      const input = inputOf(label);
      if (input.type === 'radio') input.checked = true;
      else input.checked = !input.checked;
      happen(input, 'change');
    },
    field: inputOf,
    text: () => [...place.querySelectorAll('p, li, td, th, code, button')].filter(seen).map((one) => one.textContent).join('\n'),
    values: async (reference) => (await host.read(reference))?.values,
  };
}
