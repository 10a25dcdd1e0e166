// The pane: follows the workbook through the host port and draws what it finds.

import './pane.css';
import { type Host, HostFault } from '../host/port';
import { type PlanFigures, figuresOf } from './figures';
import { ladderLayout } from './ladder/layout';
import { ladderPicture } from './ladder/picture';
import { headlineSection, noticeList, setUpSection, tableSection } from './page';
import { type Plan, readPlan } from './plan';
import { sentences } from './sentences';
import { slot } from './slot';
import { stepThroughBands } from './ladder/stepping';
import { WHOLE } from './ladder/view';
import { headline } from './words';

/** Recalculations within this many milliseconds are read once. */
const BURST = 30;

/**
 * Draws the pane into an element and keeps it true to the workbook, until the returned function is called.
 * Colours follow the system; `data-theme="light"` or `"dark"` on the element, or above it, decides otherwise.
 */
export async function mountPane(host: Host, root: HTMLElement): Promise<() => void> {
  const document = root.ownerDocument;
  const view = document.defaultView!;
  const faults = slot(document, 'faults', { role: 'alert' });
  const notices = slot(document, 'plan-notices');
  const glance = slot(document, 'glance');
  const picture = slot(document, 'picture');
  const figures = slot(document, 'rows');
  const stepping = stepThroughBands(document, picture.place, () => {});
  root.classList.add('foldplan');
  root.replaceChildren(faults.place, notices.place, glance.place, stepping.readout, picture.place, figures.place);

  let drawn: PlanFigures | null = null;
  let width = 0;

  function draw(): void {
    const able = drawn !== null && drawn.bands.length > 0 ? drawn : null;
    const words = able && headline(able);
    const layout = able && ladderLayout(able, width, WHOLE);
    picture.show(layout ? [ladderPicture(layout, words!.verdict)] : []);
    stepping.renew();
  }

  function show(plan: Plan): void {
    if (drawn !== null && JSON.stringify(plan) === JSON.stringify(drawn.plan)) return;
    drawn = figuresOf(plan);
    const { rows, bands } = drawn;
    notices.show(plan.missing.length > 0 ? [setUpSection(plan.missing)] : noticesOf(drawn));
    glance.show(bands.length > 0 ? [headlineSection(headline(drawn))] : []);
    figures.show(rows.length > 0 ? [tableSection(drawn)] : []);
    draw();
  }

  // Reads may overtake one another: what was asked later is newer.
  let asked = 0;
  let answered = 0;
  async function refresh(): Promise<void> {
    const turn = ++asked;
    try {
      const plan = await readPlan(host);
      if (turn < answered) return;
      answered = turn;
      show(plan);
      say([]);
    } catch (fault) {
      if (turn < answered) return;
      answered = turn;
      const message = fault instanceof HostFault ? fault.message : sentences.unreadable;
      say([drawn === null ? message : sentences.lastPicture(message)]);
      if (!(fault instanceof HostFault)) throw fault;
    }
  }

  const lasting: string[] = [];
  function say(passing: string[]): void {
    const all = [...lasting, ...passing];
    faults.show(all.length > 0 ? [noticeList(all)] : []);
  }

  let waiting: ReturnType<typeof setTimeout> | undefined;
  const follow = () => {
    waiting ??= setTimeout(() => {
      waiting = undefined;
      void refresh();
    }, BURST);
  };

  const sizes = new view.ResizeObserver(() => {
    if (picture.place.clientWidth === width) return;
    width = picture.place.clientWidth;
    draw();
  });
  width = picture.place.clientWidth;
  sizes.observe(picture.place);

  const unfollow = await host.onRecalculated(follow).catch((fault: unknown) => {
    if (!(fault instanceof HostFault)) throw fault;
    lasting.push(sentences.followsNot(fault.message));
    return async () => {};
  });
  await refresh();

  return () => {
    answered = Infinity;
    clearTimeout(waiting);
    sizes.disconnect();
    void unfollow();
    root.replaceChildren();
    root.classList.remove('foldplan');
  };
}

function noticesOf({ plan, rows, bands }: PlanFigures) {
  const all = [
    ...plan.notices,
    ...(rows.length === 0 ? [sentences.noBands] : bands.length === 0 && plan.rate !== null ? [sentences.noneReadable] : []),
    ...rows.flatMap(({ problem }) => (problem ? [problem] : [])),
  ];
  return all.length > 0 ? [noticeList(all)] : [];
}
