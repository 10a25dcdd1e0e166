// The pane: follows the workbook through the host port, and shows it in sections in the order of the job.

import './pane.css';
import { HostFault, type LiveHost, type Place } from '../host/port';
import { parseAddress } from './address';
import { columnsSection } from './columns';
import { handOverSection } from './handover';
import { unknownBanner } from './handover/banner';
import { element, toDom } from './element';
import { type PlanFigures, figuresOf } from './figures';
import { headlineSection, noticeList } from './page';
import { picturesSection } from './pictures';
import { type Plan, readPlan } from './plan';
import type { MakeSection, Section } from './section';
import { sentences } from './sentences';
import { planSection } from './setup';
import { slot } from './slot';
import { tabs } from './tabs';
import { headline } from './words';

/** In the order of the job. */
const SECTIONS: MakeSection[] = [planSection, columnsSection, picturesSection, handOverSection];
const PLAN = SECTIONS.indexOf(planSection);
const PICTURES = SECTIONS.indexOf(picturesSection);

/** Events within this many milliseconds are answered once. */
const BURST = 30;

/**
 * Draws the pane into an element and keeps it true to the workbook, until the returned function is called.
 * Colours follow the system; `data-theme="light"` or `"dark"` on the element decides otherwise.
 */
export async function mountPane(host: LiveHost, root: HTMLElement, version: string): Promise<() => void> {
  const document = root.ownerDocument;
  const faults = slot(document, 'faults', { role: 'alert' });
  const news = slot(document, 'news', { role: 'status' });
  const notices = slot(document, 'plan-notices');
  const glance = slot(document, 'glance');

  let shown: PlanFigures | null = null;
  let selected: number | null = null;
  const surroundings = { document, host, version, tell, refresh };
  const sections = SECTIONS.map((make) => make(surroundings));
  const frame = tabs(document, sentences.sections, sections, () => {
    news.show([]); // which is of the section before
    showSection();
  });
  const banner = unknownBanner(surroundings);
  const foot = toDom(document, element('p', { class: 'foot' }, element('a', { href: 'help.html', target: '_blank', rel: 'noopener' }, sentences.reference)));
  root.classList.add('foldplan');
  root.replaceChildren(faults.place, notices.place, banner.place, glance.place, frame.place, news.place, foot);

  function inView(): Section | undefined {
    return sections[frame.current()];
  }

  function showSection(): void {
    if (shown) inView()?.show(shown, selected);
  }

  function show(plan: Plan): void {
    if (shown === null || JSON.stringify(plan) !== JSON.stringify(shown.plan)) {
      shown = figuresOf(plan);
      notices.show(noticesOf(shown));
      glance.show(shown.bands.length > 0 ? [headlineSection(headline(shown))] : []);
    }
    if (frame.current() >= 0) showSection();
    else frame.choose(plan.missing.length > 0 ? PLAN : PICTURES);
  }

  // Reads may overtake one another: what was asked later is newer.
  let asked = 0;
  let answered = 0;
  async function refresh(): Promise<void> {
    const turn = ++asked;
    try {
      const [plan, selection] = await Promise.all([readPlan(host), host.selection()]);
      if (turn < answered) return;
      answered = turn;
      selected = selectedRow(plan, selection);
      show(plan);
      unread = null;
    } catch (fault) {
      if (turn < answered) return;
      answered = turn;
      const message = fault instanceof HostFault ? fault.message : sentences.unreadable;
      unread = shown === null ? message : sentences.lastPicture(message);
      if (frame.current() < 0) frame.choose(PLAN);
      if (!(fault instanceof HostFault)) throw fault;
    } finally {
      showFaults();
    }
  }

  // What is wrong now: with following the host, with the last reading, with what was last done.
  const lasting: string[] = [];
  let unread: string | null = null;
  let failure: string | null = null;
  function showFaults(): void {
    const all = [...lasting, ...(unread ? [unread] : []), ...(failure ? [failure] : [])];
    faults.show(all.length > 0 ? [noticeList(all)] : []);
  }

  /** What went wrong stands beside what was done, until something else is done. */
  function tell(sentence: string, kind: 'news' | 'fault'): void {
    failure = kind === 'fault' ? sentence : null;
    if (kind === 'news') news.show(sentence === '' ? [] : [element('p', {}, sentence)]);
    showFaults();
  }

  async function followSelection(): Promise<void> {
    try {
      const selection = await host.selection();
      if (shown === null) return;
      selected = selectedRow(shown.plan, selection);
      showSection();
    } catch (fault) {
      if (!(fault instanceof HostFault)) throw fault;
      unread = sentences.lastPicture(fault.message);
      showFaults();
    }
  }

  const readAgain = inBursts(refresh);
  const selectAgain = inBursts(followSelection);
  const stops: (() => Promise<void>)[] = [];
  for (const listen of [() => host.onRecalculated(readAgain.ask), () => host.onEdited(readAgain.ask), () => host.onSelected(selectAgain.ask)]) {
    try {
      stops.push(await listen());
    } catch (fault) {
      if (!(fault instanceof HostFault)) throw fault;
      const sentence = sentences.followsNot(fault.message);
      if (!lasting.includes(sentence)) lasting.push(sentence);
    }
  }
  await refresh();
  void banner.look();

  return () => {
    answered = Infinity;
    readAgain.stop();
    selectAgain.stop();
    for (const stop of stops) void stop();
    for (const section of sections) section.close();
    root.replaceChildren();
    root.classList.remove('foldplan');
  };
}

/** Work that is done once for many requests that come close together. */
function inBursts(work: () => Promise<void>): { ask(): void; stop(): void } {
  let waiting: ReturnType<typeof setTimeout> | undefined;
  return {
    ask() {
      waiting ??= setTimeout(() => {
        waiting = undefined;
        void work();
      }, BURST);
    },
    stop: () => clearTimeout(waiting),
  };
}

/** The row of the plan that the selection begins in. */
function selectedRow({ table, rows }: Plan, selection: Place | null): number | null {
  const box = selection && table && selection.sheet === table.sheet ? parseAddress(selection.address) : null;
  const index = box ? box.row - table!.first : -1;
  return rows.some((row) => row.index === index) ? index : null;
}

function noticesOf({ plan, rows, bands }: PlanFigures) {
  const all = [
    ...plan.notices,
    ...(plan.missing.length > 0 ? [] : rows.length === 0 ? [sentences.noBands] : bands.length === 0 && plan.rate !== null ? [sentences.noneReadable] : []),
    ...rows.flatMap(({ problem }) => (problem ? [problem] : [])),
  ];
  return all.length > 0 ? [noticeList(all)] : [];
}
