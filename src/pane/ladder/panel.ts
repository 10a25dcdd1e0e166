// The zone ladder on the page: its picture, what it shows of the plan, and how a band is picked.

import { element, toDom } from '../element';
import type { PlanFigures } from '../figures';
import { exactFigure, figureWriter } from '../number-text';
import { button, box, group } from '../pictures/buttons';
import { sentences } from '../pictures/sentences';
import { type Picture, takeOut } from '../pictures/take-out';
import type { Surroundings } from '../section';
import { slot } from '../slot';
import { headline, verdictOf } from '../words';
import { place as placeOf } from './frame';
import { type LadderLayout, ladderLayout } from './layout';
import { ladderPicture } from './picture';
import { stepThroughBands } from './stepping';
import { type LadderView, WHOLE, panned, zoomed } from './view';

export interface LadderPanel {
  place: HTMLElement;
  show(figures: PlanFigures | null, selected: number | null): void;
  resize(width: number): void;
}

const IN = 0.6;
/** Width of a picture that leaves the pane. */
const TAKEN_OUT = 760;
/** Objections that an alternative text has room for. */
const TOLD = 3;

/** @param pick told the row of a band that was picked, as its place in the columns */
export function ladderPanel(surroundings: Surroundings, pick: (row: number) => void): LadderPanel {
  const { document } = surroundings;
  const picture = slot(document, 'picture');
  const stepping = stepThroughBands(document, picture.place, pick);
  const axis = box(document, { class: 'quiet axis-words', role: 'status' }, 'span');

  let figures: PlanFigures | null = null;
  let view: LadderView = WHOLE;
  let width = 0;
  let drawn: LadderLayout | null = null;

  const look = (changed: Partial<LadderView>) => {
    view = { ...view, ...changed };
    draw();
  };
  const whole = () => look({ from: 0, to: 1 });
  const tools = {
    zoomOut: button(document, sentences.zoomOut, () => look(zoomed(view, 1 / IN)), '−'),
    zoomIn: button(document, sentences.zoomIn, () => look(zoomed(view, IN)), '+'),
    left: button(document, sentences.left, () => look(panned(view, -0.5)), '◂'),
    right: button(document, sentences.right, () => look(panned(view, 0.5)), '▸'),
    reset: button(document, sentences.reset, whole),
  };
  const roles = roleChoice(document, (role) => look({ role }));
  const out = takeOut(surroundings, sentences.takeOut.ladder, () => pictureToTake(figures, view));
  const place = box(document, { class: 'panel' }, 'section');
  place.append(
    group(document, sentences.ladderTools, roles, tools.zoomOut, tools.zoomIn, tools.left, tools.right, tools.reset, axis),
    stepping.readout, picture.place, toDom(document, element('p', { class: 'quiet' }, sentences.ladderKeys)), out.place,
  );

  function draw(): void {
    place.hidden = figures === null;
    if (figures === null || width === 0) return;
    const half = figures.plan.rate! / 2;
    const write = figureWriter(half);
    const [from, to] = [write(view.from * half, 5), write(view.to * half, 5)];
    drawn = ladderLayout(figures, width, view);
    picture.show([drawn ? ladderPicture(drawn, verdictOf(figures)) : element('p', { class: 'problem' }, sentences.nothingInView(from, to, view.role))]);
    stepping.renew();
    const all = view.from === 0 && view.to === 1;
    const words = all ? '' : sentences.axis(from, to);
    if (axis.textContent !== words) axis.textContent = words;
    for (const [tool, off] of [[tools.zoomOut, all], [tools.left, view.from === 0], [tools.right, view.to === 1], [tools.reset, all]] as const) tool.disabled = off;
    out.able(drawn !== null);
  }

  const stage = picture.place;
  stage.addEventListener('wheel', (event) => {
    if (!event.ctrlKey || !drawn) return;
    event.preventDefault();
    const x = event.clientX - stage.getBoundingClientRect().left;
    look(zoomed(view, event.deltaY > 0 ? 1 / IN : IN, fractionAt(drawn, x)));
  }, { passive: false });
  stage.addEventListener('keydown', (event) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const act = {
      '+': () => look(zoomed(view, IN)), '=': () => look(zoomed(view, IN)), '-': () => look(zoomed(view, 1 / IN)), '0': whole,
      ...(event.shiftKey ? { ArrowLeft: () => look(panned(view, -0.25)), ArrowRight: () => look(panned(view, 0.25)) } : {}),
    }[event.key];
    if (!act) return;
    event.preventDefault();
    act();
  });

  return {
    place,
    show(now, selected) {
      if (now === figures && selected === view.selected) return;
      figures = now;
      look({ selected });
    },
    resize(now) {
      if (now === width || now === 0) return;
      width = now;
      draw();
    },
  };
}

/** The share of half the rate that a point of the picture stands for. */
function fractionAt({ frame }: LadderLayout, x: number): number {
  const [left, right] = [placeOf(frame, frame.low), placeOf(frame, frame.high)];
  const share = Math.min(Math.max((x - left) / (right - left), 0), 1);
  return (frame.low + share * (frame.high - frame.low)) / frame.half;
}

function roleChoice(document: Document, take: (role: LadderView['role']) => void): HTMLElement {
  const place = toDom(document, element('div', { class: 'view-choice' }, element('label', { for: 'ladder-role' }, sentences.role),
    element('select', { id: 'ladder-role' }, ...Object.entries(sentences.roles).map(([role, words]) => element('option', { value: role }, words))))) as HTMLElement;
  const select = place.querySelector('select')!;
  select.addEventListener('change', () => take(select.value as LadderView['role']));
  return place;
}

function pictureToTake(figures: PlanFigures | null, view: LadderView): Picture | null {
  const layout = figures && ladderLayout(figures, TAKEN_OUT, { ...view, selected: null });
  if (!layout) return null;
  const { verdict, against, objections } = headline(figures);
  const rate = exactFigure(figures.plan.rate!);
  return {
    tree: ladderPicture(layout, verdict),
    facts: sentences.ladderFacts(rate, verdict, layout.bands.length, objections.slice(0, TOLD), Math.max(0, against - TOLD)),
    fileName: sentences.fileName.ladder(rate),
  };
}
