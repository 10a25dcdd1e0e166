// The rate ruler on the page: its picture, the candidate that moves over it, and the rate cell it is written to.

import { Fault, type ForbiddenRates } from '../../engine';
import { HostFault } from '../../host/port';
import { attempts } from '../attempt';
import { element } from '../element';
import { type PlanFigures, figuresOf } from '../figures';
import { exactFigure } from '../number-text';
import { button, box, group } from '../pictures/buttons';
import { type Field, field } from '../pictures/field';
import { later } from '../pictures/later';
import { sentences } from '../pictures/sentences';
import { type Standing, ppmText, standingOf, standingWords } from '../pictures/standing';
import { type Picture, takeOut } from '../pictures/take-out';
import type { Surroundings } from '../section';
import { NAMES } from '../sentences';
import { slot } from '../slot';
import { nextMiddle, onGrid, rangeOf, rateAt, roomiest, stepped } from './candidate';
import { type Findings, findingsIn, rangesBeyond } from './findings';
import { candidateHandle } from './handle';
import { type Lanes, forbidding, lanesOf } from './lanes';
import { type RulerInput, type RulerLayout, rulerLayout } from './layout';
import { rulerPicture } from './picture';
import { type RulesOf, ruleWords, rulesOf } from './rules';
import { sentences as ruler } from './sentences';
import { NOTHING_ASKED, type Settings, readSetting, remember, remembered } from './settings';
import { previewTable, rangesTable } from './tables';
import { type RateWindow, holding, pannedRates, windowAbout, zoomedRates } from './window';

export interface RulerPanel {
  place: HTMLElement;
  show(figures: PlanFigures | null): void;
  resize(width: number): void;
  close(): void;
}

/** Rules with a lane of their own. */
const LANES = 6;
const OFFERED = 6;
const IN = 0.6;
/** Width of a picture that leaves the pane. */
const TAKEN_OUT = 760;

/** @param stands told how the rate now stands, and null while that is being computed */
export function rulerPanel(surroundings: Surroundings, stands: (rate: number, rules: RulesOf, standing: Standing | null) => void): RulerPanel {
  const { document, host, tell, refresh } = surroundings;
  const attempt = attempts(surroundings);

  let figures: PlanFigures | null = null;
  let rules: RulesOf | null = null;
  let settings: Settings = NOTHING_ASKED;
  /** null while the window follows the rate. */
  let chosenWindow: RateWindow | null = null;
  /** null while the candidate is the rate itself. */
  let chosen: number | null = null;
  let width = 0;
  let written: { rate: number; was: number; takeBack: () => Promise<void> } | null = null;
  let formula: string | null = null;

  const findings = later<Findings>(() => draw());
  const nowStanding = later<Standing>(() => draw());
  const thenStanding = later<Standing>(() => draw());

  const now = () => figures!.plan.rate!;
  const candidate = () => chosen ?? now();
  const window = () => chosenWindow ?? windowAbout(now());
  const grid = () => ({ step: settings.step });
  const ranges = () => findings.value?.ranges ?? [];
  const reach = () => (window().to - window().from) / Math.max(width, 1);

  // Parts of the page

  const picture = slot(document, 'ruler-picture');
  const stage = box(document, { class: 'stage' });
  const handle = candidateHandle(document, {
    step: (by) => choose(stepped(candidate(), by, window().to - window().from, grid())),
    range: (direction) => void attempt(() => chooseNext(direction)),
    end: (direction) => choose(onGrid(direction < 0 ? window().from : window().to, grid())),
    zoom: (direction) => look(direction === 0 ? null : zoomedRates(window(), direction > 0 ? IN : 1 / IN, inWindow(candidate()))),
  });
  stage.append(picture.place, handle.place);

  const readout = box(document, { class: 'readout', 'aria-hidden': 'true' }, 'p');
  const standings = slot(document, 'standings', { 'aria-live': 'polite' });
  const preview = slot(document, 'changes');
  const offers = slot(document, 'offers');
  const table = slot(document, 'rows');
  const fields: Record<'from' | 'to' | 'candidate' | keyof Settings, Field> = {
    from: field(document, 'ruler-from', sentences.from, (typed) => typeEnd('from', typed)),
    to: field(document, 'ruler-to', sentences.to, (typed) => typeEnd('to', typed)),
    candidate: field(document, 'ruler-candidate', sentences.candidate, typeCandidate),
    step: field(document, 'ruler-step', sentences.step, (typed) => typeSetting('step', typed)),
    harmonics: field(document, 'ruler-harmonics', sentences.harmonics, (typed) => typeSetting('harmonics', typed)),
    cores: field(document, 'ruler-cores', sentences.cores, (typed) => typeSetting('cores', typed)),
  };
  const use = button(document, sentences.use, () => void attempt(useCandidate));
  const back = button(document, sentences.backToNow, () => choose(null));
  const undo = button(document, '', () => void attempt(takeBack));
  const out = takeOut(surroundings, sentences.takeOut.ruler, pictureToTake);
  const place = box(document, { class: 'panel' }, 'section');
  place.append(
    group(document, sentences.rulerTools,
      fields.from.place, fields.to.place,
      button(document, sentences.zoomOut, () => look(zoomedRates(window(), 1 / IN, inWindow(candidate()))), '−'),
      button(document, sentences.zoomIn, () => look(zoomedRates(window(), IN, inWindow(candidate()))), '+'),
      button(document, sentences.lower, () => look(pannedRates(window(), -0.5)), '◂'),
      button(document, sentences.higher, () => look(pannedRates(window(), 0.5)), '▸'),
      button(document, sentences.aboutRate, () => look(null))),
    group(document, sentences.rulerRules, fields.candidate.place, fields.step.place, fields.harmonics.place, fields.cores.place),
    stage, readout,
    group(document, sentences.choosing,
      button(document, sentences.lowerUsable, () => void attempt(() => chooseNext(-1))), button(document, sentences.higherUsable, () => void attempt(() => chooseNext(1))), back, use, undo),
    standings.place, preview.place, offers.place, table.place, out.place,
  );
  use.classList.add('main');

  // What the user does

  function choose(rate: number | null): void {
    chosen = rate === null || (figures !== null && rate === now()) ? null : rate;
    formula = null;
    fields.candidate.complain(null);
    if (chosenWindow !== null || (figures && chosen !== null && inWindow(chosen) !== chosen)) chosenWindow = holding(window(), candidate());
    draw();
  }

  /** What is in view first, then what lies beyond. */
  async function chooseNext(direction: 1 | -1): Promise<void> {
    const from = candidate();
    const next = (some: Findings['ranges']) => nextMiddle(from, direction, some, grid());
    try {
      const rate = next(ranges()) ?? next(await rangesBeyond(rules!, window(), direction, (some) => next(some) !== null));
      if (rate === null) tell(direction > 0 ? sentences.noneAbove : sentences.noneBelow, 'news');
      else choose(rate);
    } catch (fault) {
      if (!(fault instanceof Fault)) throw fault;
      tell(fault.message, 'fault');
    }
  }

  function look(at: RateWindow | null): void {
    chosenWindow = at;
    fields.from.complain(null);
    fields.to.complain(null);
    draw();
  }

  /** An end typed beyond the other takes the window along. */
  function typeEnd(end: 'from' | 'to', typed: string): void {
    const value = Number(typed);
    const { from, to } = window();
    if (!(value > 0 && value < Infinity)) fields[end].complain(sentences.rateNeeded(sentences[end], sentences.quoted(typed)));
    else if (end === 'from') look({ from: value, to: value < to ? to : value + to - from });
    else look({ from: from < value ? from : Math.max(value - to + from, value / 2), to: value });
  }

  function typeCandidate(typed: string): void {
    const value = Number(typed);
    if (value > 0 && value < Infinity) choose(onGrid(Number(value.toPrecision(15)), grid()));
    else fields.candidate.complain(sentences.rateNeeded(sentences.candidate, sentences.quoted(typed)));
  }

  function typeSetting(key: keyof Settings, typed: string): void {
    const read = readSetting(key, typed);
    fields[key].complain('sentence' in read ? read.sentence : null);
    if ('sentence' in read) return;
    settings = { ...settings, [key]: read.value };
    if (key === 'step' && chosen !== null) chosen = onGrid(chosen, grid());
    renewRules();
    draw();
    void attempt(() => remember(host, key, read.value));
  }

  /** A formula in the rate cell is replaced only when that was said. */
  async function useCandidate(): Promise<void> {
    const [rate, was] = [candidate(), now()];
    const found = (await host.formulas(NAMES.rate.name))?.formulas[0]?.[0] ?? null;
    if (found !== null && formula !== found) {
      formula = found;
      tell(sentences.holdsFormula(found), 'news');
      draw();
      return;
    }
    written = { rate, was, takeBack: await host.change({ cells: [{ reference: NAMES.rate.name, cells: [[rate]] }] }) };
    formula = null;
    tell(sentences.used(exactFigure(rate), exactFigure(was)), 'news');
    await refresh();
  }

  async function takeBack(): Promise<void> {
    if (!written) return;
    const { takeBack: restore, was } = written;
    await restore();
    written = null;
    tell(sentences.takenBack(exactFigure(was)), 'news');
    await refresh();
  }

  // Pointer: the axis is dragged along, everything above it moves the candidate.

  let layout: RulerLayout | null = null;
  const rateOf = (event: MouseEvent) => {
    const { left, right } = layout!;
    const { from, to } = layout!.window;
    const x = event.clientX - stage.getBoundingClientRect().left;
    return from + (Math.min(Math.max(x, left), right) - left) / (right - left) * (to - from);
  };
  let drag: { kind: 'candidate' } | { kind: 'axis'; x: number; window: RateWindow } | null = null;
  stage.addEventListener('pointerdown', (event) => {
    if (!layout || event.button !== 0) return;
    const y = event.clientY - stage.getBoundingClientRect().top;
    drag = y > layout.axis ? { kind: 'axis', x: event.clientX, window: window() } : { kind: 'candidate' };
    stage.setPointerCapture(event.pointerId);
    if (drag.kind === 'candidate') {
      event.preventDefault();
      handle.place.focus({ preventScroll: true });
      dragTo(event);
    }
  });
  stage.addEventListener('pointermove', (event) => {
    if (!layout) return;
    if (drag?.kind === 'candidate') dragTo(event);
    else if (drag) look(pannedRates(drag.window, (drag.x - event.clientX) / (layout.right - layout.left)));
    else tellOf(rateAt(rateOf(event), ranges(), reach(), { step: null }));
  });
  for (const end of ['pointerup', 'pointercancel'] as const) stage.addEventListener(end, () => { drag = null; });
  stage.addEventListener('pointerleave', () => { if (!drag) readout.textContent = hint(); });
  stage.addEventListener('wheel', (event) => {
    if (!event.ctrlKey || !layout) return;
    event.preventDefault();
    look(zoomedRates(window(), event.deltaY > 0 ? 1 / IN : IN, rateOf(event)));
  }, { passive: false });
  offers.place.addEventListener('click', (event) => {
    const rate = (event.target as Element).closest('[data-rate]')?.getAttribute('data-rate');
    if (rate) choose(Number(rate));
  });

  const inWindow = (rate: number) => Math.min(Math.max(rate, window().from), window().to);
  const hint = () => (settings.step === null ? ruler.hint : `${ruler.hint} ${ruler.stepHint(exactFigure(settings.step))}`);

  function dragTo(event: MouseEvent): void {
    const rate = rateAt(rateOf(event), ranges(), reach(), grid());
    choose(rate);
    tellOf(rate);
  }

  function tellOf(rate: number): void {
    const { value } = findings;
    if (!value || !rules) return;
    const range = rangeOf(rate, value.ranges);
    const against = range || !value.found ? [] : forbidding(value.found, rate);
    const some = against.slice(0, 3).map((one) => ruleWords(one, rules!, 'inWords'));
    readout.textContent = range ? ruler.inRange(exactFigure(rate), exactFigure(range.lowest), exactFigure(range.highest ?? range.lowest))
      : against.length > 0 ? ruler.forbiddenBy(exactFigure(rate), some, against.length - some.length) : ruler.nearRange(exactFigure(rate));
  }

  // Drawing

  let lanesFor: { found: ForbiddenRates; rate: number; lanes: Lanes } | null = null;
  /** They follow the candidate once it rests: lanes that change places under a drag can't be read. */
  function lanes(rests: boolean): Lanes | null {
    const { value } = findings;
    if (!value?.found) return null;
    if (lanesFor?.found !== value.found || (rests && lanesFor.rate !== candidate())) {
      lanesFor = { found: value.found, rate: candidate(), lanes: lanesOf(value.found, value.window, candidate(), LANES) };
    }
    return lanesFor.lanes;
  }

  let then: PlanFigures | null = null;

  function draw(): void {
    place.hidden = figures === null;
    if (figures === null || rules === null || width === 0) return;
    const [plan, key] = [rules, JSON.stringify([rules.plan, rules.ppm])];
    const [looked, rate] = [window(), candidate()];
    findings.ask(`${key}${looked.from},${looked.to}`, () => findingsIn(plan, looked));
    nowStanding.ask(`${key}${now()}`, () => standingOf(plan, now()));
    if (chosen !== null) thenStanding.ask(`${key}${rate}`, () => standingOf(plan, rate));

    const nowKnown = nowStanding.fresh ? nowStanding.value : null;
    const thenKnown = chosen === null ? nowKnown : thenStanding.fresh ? thenStanding.value : null;
    const input = rulerInput(thenKnown !== null);
    layout = rulerLayout(input, width);
    picture.show([rulerPicture(layout, now(), rangesWords())]);
    stage.classList.toggle('computing', !findings.fresh);
    const usableHere = rangeOf(rate, ranges());
    handle.show(layout.candidate, looked, rate, thenKnown ? standingWords(thenKnown) : exactFigure(rate));

    fields.from.show(exactFigure(looked.from));
    fields.to.show(exactFigure(looked.to));
    fields.candidate.show(exactFigure(rate));
    fields.step.show(settings.step === null ? null : exactFigure(settings.step));
    fields.harmonics.show(String(settings.harmonics));
    fields.cores.show(String(settings.cores));

    stands(now(), plan, nowKnown);
    showStandings(thenKnown);
    showPreview(nowKnown, thenKnown);
    showOffers(input.lanes);
    table.show(findings.fresh && findings.value ? rangesTable(ranges(), findings.value.window) : []);
    if (!drag && readout.textContent === '') readout.textContent = hint();

    const same = chosen === null;
    back.disabled = same;
    use.disabled = same;
    const words = formula !== null ? sentences.replaceFormula(formula) : usableHere || same || (thenKnown && thenKnown.conflicts.length === 0) ? sentences.use : sentences.useBroken;
    if (use.textContent !== words) use.textContent = words;
    undo.hidden = written === null || written.rate !== now();
    if (written) undo.textContent = sentences.takeBack(exactFigure(written.was));
    out.able(findings.value !== null);
  }

  function rulerInput(rests: boolean): RulerInput {
    return { window: window(), now: now(), candidate: candidate(), ranges: findings.value?.ranges ?? null, lanes: lanes(rests), rules: rules! };
  }

  const rangesWords = () => findings.value?.problem ?? (findings.value ? ruler.rangeCount(ranges().length) : sentences.computing);

  function showStandings(known: Standing | null): void {
    standings.show([element('p', { class: 'standing' }, known ? standingWords(known) : sentences.computing)]);
  }

  function showPreview(before: Standing | null, after: Standing | null): void {
    if (chosen === null) {
      preview.show([]);
      return;
    }
    if (then?.plan.rate !== chosen || then.plan.rows !== figures!.plan.rows || then.plan.guard !== figures!.plan.guard || then.plan.ppm !== figures!.plan.ppm) then = figuresOf({ ...figures!.plan, rate: chosen });
    preview.show(previewTable(figures!, before, then, after));
  }

  function showOffers(drawn: Lanes | null): void {
    const { value } = findings;
    if (!value) {
      offers.show([]);
      return;
    }
    const step = settings.step === null ? null : exactFigure(settings.step);
    const some = roomiest(value.ranges, grid(), OFFERED);
    const none = value.problem ?? (value.ranges.length > 0 && step !== null ? sentences.ofStepNone(step) : sentences.noneUsable);
    offers.show([
      ...(drawn && drawn.total > 0 ? [element('p', { class: 'quiet' }, ruler.notDrawn(drawn.drawn, drawn.total))] : []),
      some.length === 0
        ? element('p', { class: 'problem' }, none)
        : element('div', { class: 'offers-list', role: 'group', 'aria-label': step === null ? sentences.roomiest : sentences.roomiestStep(step) },
          element('p', {}, step === null ? sentences.roomiest : sentences.roomiestStep(step)),
          ...some.map(({ rate, headroom }) => element('button', { type: 'button', 'data-rate': rate, 'data-keep': `rate ${rate}` }, sentences.choose(exactFigure(rate), ppmText(headroom))))),
    ]);
  }

  function pictureToTake(): Picture | null {
    if (figures === null || rules === null || findings.value === null) return null;
    const looked = window();
    const rates = roomiest(ranges(), grid(), 3).map(({ rate }) => exactFigure(rate));
    return {
      tree: rulerPicture(rulerLayout(rulerInput(true), TAKEN_OUT), now(), rangesWords()),
      facts: sentences.rulerFacts(exactFigure(looked.from), exactFigure(looked.to), rangesWords(), exactFigure(now()), rates),
      fileName: sentences.fileName.ruler(exactFigure(now())),
    };
  }

  // What the workbook remembers

  let asked = 0;
  async function recall(): Promise<void> {
    const turn = ++asked;
    const { settings: found, notices } = await remembered(host);
    if (turn !== asked) return;
    settings = { ...settings, ...found };
    for (const notice of notices) tell(notice, 'fault');
    renewRules();
    draw();
  }

  function renewRules(): void {
    rules = figures && rulesOf(figures.plan, settings);
  }

  return {
    place,
    show(shown) {
      if (shown !== figures) {
        figures = shown;
        if (shown && chosen === shown.plan.rate) chosen = null;
        renewRules();
        draw();
      }
      if (shown) void recall().catch((fault: unknown) => {
        if (!(fault instanceof HostFault)) throw fault; // what can't be read is as if it were not remembered
      });
    },
    resize(given) {
      if (given === width || given === 0) return;
      width = given;
      draw();
    },
    close() {
      for (const work of [findings, nowStanding, thenStanding]) work.stop();
    },
  };
}
