// The section Hand over: a plain copy for colleagues without the add-in, and FOLD cells that show an error.

import { HostFault, type Workbook } from '../../host/port';
import { cancellable } from '../../plain';
import { referenceTo } from '../address';
import { attempts } from '../attempt';
import { type Tree, element, toDom } from '../element';
import { noticeList } from '../page';
import type { MakeSection } from '../section';
import { slot } from '../slot';
import { contentsOf } from './contents';
import { enterAgain } from './enter-again';
import { plainSheet, sheetsWithFormulas } from './plain-sheet';
import { sentences } from './sentences';
import { type Trouble, isUnknown, placeOf, troublesIn, unknownSentence } from './troubles';

/** How many cells in error are told one by one. */
const TOLD = 20;

export const handOverSection: MakeSection = (surroundings) => {
  const { document, host, tell, version } = surroundings;
  const attempt = attempts(surroundings);

  let contents: Workbook | null = null;
  let undo: (() => Promise<void>) | null = null;
  let cancel = new AbortController();

  // The page

  const place = document.createElement('div');
  place.className = 'hand-over';
  const none = slot(document, 'none');
  const select = toDom(document, element('select', { id: 'foldplan-copied-sheet' })) as HTMLSelectElement;
  const field = toDom(document, element('div', { class: 'field' }, element('label', { for: 'foldplan-copied-sheet' }, sentences.chosen))) as HTMLElement;
  field.append(select);
  const making = button('main', sentences.make, () => attempt(make));
  const cancelling = button('', sentences.cancel, () => cancel.abort());
  const undoing = button('', sentences.undo, () => attempt(takeBack));
  const buttons = toDom(document, element('div', { class: 'buttons' })) as HTMLElement;
  buttons.append(making, cancelling, undoing);
  const progress = slot(document, 'progress', { role: 'status' });
  const troubles = slot(document, 'troubles');
  const reentering = button('', '', () => attempt(reenter));
  place.append(
    toDom(document, element('h2', {}, sentences.plain)), toDom(document, element('p', { class: 'hint' }, sentences.about)),
    none.place, field, buttons, progress.place,
    toDom(document, element('h2', {}, sentences.troubles)), troubles.place, reentering,
  );
  cancelling.hidden = true;
  draw();

  function button(className: string, text: string, work: () => unknown): HTMLButtonElement {
    const made = toDom(document, element('button', { type: 'button', class: className }, text)) as HTMLButtonElement;
    made.addEventListener('click', work);
    return made;
  }

  function draw(): void {
    const sheets = contents ? sheetsWithFormulas(contents) : [];
    none.show(contents && sheets.length === 0 ? [element('p', {}, sentences.none)] : []);
    field.hidden = making.hidden = sheets.length === 0;
    undoing.hidden = undo === null;
    const chosen = select.value;
    select.replaceChildren(...sheets.map(({ sheet, count }) => toDom(document, element('option', { value: sheet }, sentences.sheet(sheet, count)))));
    select.value = sheets.some(({ sheet }) => sheet === chosen) ? chosen : sheets[0]?.sheet ?? '';
    const found = contents ? troublesIn(contents) : [];
    const unknown = found.filter(isUnknown).length;
    troubles.show(contents ? troubleList(found) : []);
    reentering.hidden = unknown === 0;
    reentering.textContent = sentences.reenter(unknown);
  }

  async function look(): Promise<void> {
    contents = await contentsOf(host);
    draw();
  }

  // Changes of the workbook

  async function make(): Promise<void> {
    const sheet = select.value;
    cancel = new AbortController();
    making.hidden = true;
    cancelling.hidden = false;
    cancelling.focus();
    try {
      await look();
      making.hidden = true;
      if (!contents!.sheets.some(({ name }) => name === sheet)) return tell(sentences.gone(sheet), 'fault');
      const copied = await plainSheet(contents!, sheet, { version, date: new Date().toISOString().slice(0, 10) }, cancellable(cancel.signal, (done, total) => {
        progress.show([element('p', {}, sentences.progress(done, total))]);
      }));
      undo = await host.change(copied.change);
      await host.select(referenceTo(copied.copy, 'A1'));
      tell(sentences.made(copied.copy, copied.list, copied.formulas, copied.values), 'news');
    } catch (fault) {
      if (fault !== cancel.signal.reason) throw fault;
      tell(sentences.cancelled, 'news');
    } finally {
      progress.show([]);
      cancelling.hidden = true;
      await look();
      (undo ? undoing : making).focus();
    }
  }

  async function takeBack(): Promise<void> {
    const back = undo;
    undo = null; // once only, whatever becomes of it
    await back?.();
    await look();
    making.focus();
    tell(sentences.undone, 'news');
  }

  async function reenter(): Promise<void> {
    await enterAgain(surroundings);
    await look();
  }

  return {
    title: sentences.title,
    place,
    show() {
      look().catch((fault: unknown) => {
        if (!(fault instanceof HostFault)) throw fault;
        tell(fault.message, 'fault');
      });
    },
    close() {
      cancel.abort();
    },
  };
};

function troubleList(troubles: Trouble[]): Tree[] {
  if (troubles.length === 0) return [element('p', {}, sentences.noTroubles)];
  const unknown = troubles.filter(isUnknown);
  const others = troubles.filter((one) => !isUnknown(one));
  return [noticeList([
    ...(unknown.length > 0 ? [unknownSentence(unknown)] : []),
    ...others.slice(0, TOLD).map((one) => sentences.trouble(placeOf(one), one.code, one.message)),
    ...(others.length > TOLD ? [sentences.andMore(others.length - TOLD)] : []),
  ])];
}
