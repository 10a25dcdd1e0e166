// The section Plan: which cells of the workbook hold the plan. It proposes, the user corrects by pointing or typing, and the choice is
// stored as defined names, in one step that can be undone.

import type { LiveHost, Place } from '../../host/port';
import { type Box, addressOf, parseAddress, referenceTo } from '../address';
import { attempts } from '../attempt';
import { element, toDom } from '../element';
import type { PlanFigures } from '../figures';
import { filledCells, usedPart } from '../free-cells';
import { noticeList } from '../page';
import type { MakeSection } from '../section';
import type { NameKey } from '../sentences';
import { slot } from '../slot';
import {
  CELL_KEYS, type Checked, type Draft, checkDraft, draftOf, draftOfProposal, emptyDraft, extendedNames, namesOf, shown, withField,
} from './draft';
import { planForm } from './form';
import { newCells } from './new-cells';
import type { Proposal } from './recognise';
import { searchPlan } from './search';
import { sentences } from './sentences';
import { type PlanTable, renamedHeaders } from './table';

export const planSection: MakeSection = (surroundings) => {
  const { document, host, tell, refresh } = surroundings;
  const attempt = attempts(surroundings);

  let figures: PlanFigures | null = null;
  let draft: Draft = emptyDraft('');
  /** Where the draft comes from: the workbook's names, a search, or the user's own changes. */
  let origin: 'stored' | 'found' | 'user' = 'stored';
  let proposal: Proposal | null = null;
  let sheets: string[] = [];
  let checked: Checked = { boxes: {}, problems: {} };
  let undo: (() => Promise<void>) | null = null;
  /** The headers when the plan was first seen, for those that are changed later. */
  let remembered: PlanTable | null = null;

  // The page

  const place = document.createElement('div');
  place.className = 'set-up';
  const state = slot(document, 'state', { role: 'status' });
  const problems = slot(document, 'problems');
  const form = planForm(document, {
    typed: (key, text) => change(withField(draft, key, { text, why: '', starts: null })),
    started: (key, starts) => change(withField(draft, key, { starts })),
    edges: (edges) => change({ ...draft, edges }),
    pointed: (key) => void attempt(() => point(key)),
    newCell: (key) => void attempt(() => plan(key)),
  });
  const button = (text: string, className: string, work: () => Promise<void>) => {
    const made = toDom(document, element('button', { type: 'button', class: className }, text)) as HTMLButtonElement;
    made.addEventListener('click', () => void attempt(work));
    return made;
  };
  const applying = button(sentences.apply, 'main', apply);
  const finding = button(sentences.find, '', find);
  const reverting = button(sentences.revert, '', async () => {
    origin = 'stored';
    await refresh();
  });
  const undoing = button(sentences.undo, '', takeBack);
  const extending = button('', '', extend);
  const buttons = toDom(document, element('div', { class: 'buttons' }));
  buttons.append(applying, extending, undoing, finding, reverting);
  place.append(toDom(document, element('p', { class: 'intro' }, sentences.intro)), state.place, problems.place, form.place, buttons);

  function draw(): void {
    form.show(draft, origin === 'user' || figures?.plan.missing.length === 0 ? checked.problems : {});
    const stored = figures !== null && Object.keys(figures.plan.places).length > 0;
    const nothing = !Object.values(draft.fields).some(({ text, starts }) => text !== '' || starts !== null);
    const first = checked.boxes[draft.edges[0]];
    const words = origin === 'found' && nothing ? sentences.notFound
      : origin === 'found' ? sentences.found(draft.sheet, first?.box.rows ?? 0)
      : origin === 'user' ? sentences.changed
      : stored ? sentences.stored : '';
    state.show(words === '' ? [] : [element('p', {}, words)]);
    const said = [...(origin === 'stored' ? [] : proposal?.problems ?? []), ...renamed()];
    problems.show(said.length > 0 ? [noticeList(said)] : []);
    const lastBelow = origin === 'stored' ? figures?.plan.table?.lastBelow ?? null : null;
    extending.hidden = lastBelow === null;
    extending.textContent = lastBelow === null ? '' : sentences.extend(lastBelow + 1);
    applying.hidden = origin === 'stored';
    reverting.hidden = origin === 'stored' || !stored;
    undoing.hidden = undo === null;
  }

  const renamed = () => (origin === 'stored' && remembered && figures?.plan.table ? renamedHeaders(remembered, figures.plan.table) : []);

  // The draft

  function change(next: Draft, from: 'found' | 'user' = 'user'): void {
    draft = next;
    origin = from;
    checked = checkDraft(draft, sheets);
    draw();
  }

  function showStored({ plan }: PlanFigures): void {
    const why = Object.entries(plan.table?.columns ?? {}).flatMap(([key, { column, title, unit }]) => {
      const headed = title === '' ? '' : sentences.headed(title, addressOf({ row: plan.table!.header!, column, rows: 1, columns: 1 }));
      return headed === '' ? [] : [[key, unit ? `${headed}, ${sentences.unit(unit)}` : headed]];
    });
    draft = draftOf(plan.places, plan.edges, Object.fromEntries(why));
    proposal = null;
    checked = checkDraft(draft, sheets);
  }

  async function look(selection: Place | null): Promise<void> {
    const found = await searchPlan(host, selection);
    proposal = found;
    change(found ? draftOfProposal(found) : emptyDraft(await homeSheet()), 'found');
  }

  const homeSheet = async () => (await host.selection())?.sheet ?? sheets[0] ?? '';

  /** Looking again at every edit shows the plan as it grows; the latest look counts. */
  let looks = 0;
  async function lookUnasked(): Promise<void> {
    const turn = ++looks;
    sheets = (await host.sheets()).map(({ sheet }) => sheet);
    const found = await searchPlan(host, null);
    const home = found ? '' : await homeSheet();
    if (turn !== looks || origin === 'user' || !figures || Object.keys(figures.plan.places).length > 0) return;
    proposal = found;
    change(found ? draftOfProposal(found) : emptyDraft(home), 'found');
  }

  async function find(): Promise<void> {
    await readSheets();
    await look(await host.selection());
  }

  async function readSheets(): Promise<void> {
    sheets = (await host.sheets()).map(({ sheet }) => sheet);
  }

  async function point(key: NameKey): Promise<void> {
    await readSheets();
    const selection = await host.selection();
    if (!selection) return tell(sentences.nothingSelected, 'fault');
    if (draft.sheet === '') draft = { ...draft, sheet: selection.sheet };
    const isCell = (CELL_KEYS as readonly NameKey[]).includes(key);
    const address = isCell ? selection.address : await columnFrom(selection);
    change(withField(draft, key, { text: shown({ sheet: selection.sheet, address }, draft.sheet), why: '', starts: null }));
  }

  /** One cell, or a whole column, stands for the rows of the columns that are chosen already, or for what is filled from there down. */
  async function columnFrom({ sheet, address }: Place): Promise<string> {
    const [whole, letters] = /^\$?([A-Z]+):\$?\1$/i.exec(address) ?? [];
    const box = parseAddress(whole ? `${letters}1` : address);
    if (!box || box.columns !== 1 || box.rows !== 1) return address;
    const known = [...draft.edges, 'name' as const, 'role' as const].flatMap((key) => checked.boxes[key] ?? []).find((one) => one.sheet === sheet && one.box.columns === 1);
    if (known) return addressOf({ ...box, row: known.box.row, rows: known.box.rows });
    const used = await usedPart(host, sheet);
    if (!used || used.row + used.rows <= box.row) return address;
    const below = (await host.read(referenceTo(sheet, { ...box, rows: used.row + used.rows - box.row })))?.values.map(([value]) => value ?? null) ?? [];
    const first = below.findIndex((value) => typeof value === 'number');
    if (first < 0) return address;
    const end = below.findIndex((value, i) => i > first && value === null);
    return addressOf({ ...box, row: box.row + first, rows: (end < 0 ? below.length : end) - first });
  }

  async function plan(key: NameKey): Promise<void> {
    await readSheets();
    const next = withField(draft, key, { text: '', why: '', starts: draft.fields[key].starts ?? (key === 'rate' ? '' : '0') });
    const room = await roomFor(next);
    const made = CELL_KEYS.filter((one) => room?.values[one]);
    change(made.reduce((all, one) => withField(all, one, { why: sentences.willBeWritten(sentences.newLabels[one], addressOf(labelled(room!.values[one]!.box))) }), next));
    place.querySelector<HTMLInputElement>(`#foldplan-${key}-starts`)?.focus();
  }

  async function roomFor(of: Draft) {
    const { boxes } = checkDraft(of, sheets);
    const table = tableBox(of, boxes);
    return table && newCells(host, of, table.sheet, table.box, unitOfDraft());
  }

  const unitOfDraft = () => {
    const found = proposal?.found;
    return (origin === 'stored' ? figures?.plan.table?.unit : found?.low?.unit ?? found?.centre?.unit) ?? figures?.plan.table?.unit ?? null;
  };

  // Changes of the workbook

  async function apply(): Promise<void> {
    await readSheets();
    checked = checkDraft(draft, sheets);
    const made = await roomFor(draft);
    const wrong = Object.values(checked.problems)[0];
    draw();
    if (wrong !== undefined) {
      place.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
      return tell(wrong, 'fault');
    }
    const text = await cellWithText(host, checked);
    if (text) return tell(text, 'fault');
    const taken = made ? await filledCells(host, made.sheet, made.box) : [];
    if (made && taken.length > 0) return tell(sentences.notFree(taken[0]!), 'fault');
    const names = namesOf({ ...checked, boxes: { ...checked.boxes, ...made?.values } }, await host.names());
    undo = await host.change({ ...(made && { cells: [{ reference: referenceTo(made.sheet, made.box), cells: made.cells }] }), names });
    await stored(sentences.applied);
  }

  async function extend(): Promise<void> {
    const { plan: now } = figures!;
    if (!now.table?.lastBelow) return;
    const last = now.table.lastBelow;
    undo = await host.change({ names: extendedNames(now.places, now.edges, last) });
    await stored(sentences.extended(last + 1));
  }

  async function takeBack(): Promise<void> {
    const back = undo;
    undo = null; // once only, whatever becomes of it
    draw();
    await back?.();
    await stored(sentences.undone);
  }

  async function stored(sentence: string): Promise<void> {
    origin = 'stored';
    remembered = null;
    draw(); // the way back is there, whatever comes next
    await refresh();
    tell(sentence, 'news');
    // The button that was pressed may be gone.
    if (document.activeElement === null || document.activeElement === document.body) (undoing.hidden ? finding : undoing).focus();
  }

  return {
    title: sentences.title,
    place,
    show(now) {
      figures = now;
      remembered ??= now.plan.table;
      if (origin === 'user') return draw();
      if (Object.keys(now.plan.places).length === 0) {
        void lookUnasked().catch(() => {}); // the pane says that it can't read
        return draw();
      }
      origin = 'stored';
      sheets = [...new Set(Object.values(now.plan.places).map(({ sheet }) => sheet))];
      showStored(now);
      draw();
    },
    close() {
      looks = Infinity;
    },
  };
};

/** A new cell with its label and its unit on either side. */
const labelled = (value: Box): Box => ({ ...value, column: value.column - 1, columns: 3 });

/** The plan with a row for headers, for which room is kept. */
function tableBox({ edges }: Draft, boxes: Checked['boxes']): { sheet: string; box: Box } | null {
  const columns = [...edges, 'name' as const, 'role' as const].flatMap((key) => boxes[key] ?? []);
  if (columns.length === 0) return null;
  const [{ sheet }] = columns as [{ sheet: string; box: Box }];
  const all = columns.map(({ box }) => box);
  const [row, column] = [Math.max(0, Math.min(...all.map((box) => box.row)) - 1), Math.min(...all.map((box) => box.column))];
  return {
    sheet,
    box: { row, column, rows: Math.max(...all.map((box) => box.row + box.rows)) - row, columns: Math.max(...all.map((box) => box.column + box.columns)) - column },
  };
}

/** A sentence about a rate, guard or tolerance that is text. */
async function cellWithText(host: LiveHost, { boxes }: Checked): Promise<string | null> {
  for (const key of CELL_KEYS) {
    const chosen = boxes[key];
    const value = chosen && (await host.read(referenceTo(chosen.sheet, chosen.box)))?.values[0]?.[0];
    if (typeof value === 'string' && value.trim() !== '') return sentences.isText(key, addressOf(chosen!.box), `“${[...value].slice(0, 40).join('')}”`);
  }
  return null;
}
