// The section Columns: results for every row of the plan, chosen, previewed, and inserted in one step that can be undone.

import { HostFault } from '../../host/port';
import { type Box, MOST_COLUMNS, addressOf, cellBox, columnLetters, parseAddress, referenceTo } from '../address';
import { attempts } from '../attempt';
import { type Tree, element, toDom } from '../element';
import type { PlanFigures } from '../figures';
import { filledCells } from '../free-cells';
import { noticeList } from '../page';
import type { MakeSection } from '../section';
import { slot } from '../slot';
import { type Insertion, type Wanted, type Way, formulaTexts, insertionOf } from './insertion';
import { columnFrom, meetsPlan, nextFree } from './placement';
import { previewTable } from './preview';
import { errorsIn } from './read-back';
import { type ResultKey, RESULT_KEYS, offered, tidy } from './results';
import { sentences } from './sentences';
import { type Survey, cellNames, survey } from './survey';

const WAYS: readonly Way[] = ['table', 'rows', 'spilled'];
/** How many filled cells are called by their address. */
const CELLS_TOLD = 3;

export const columnsSection: MakeSection = (surroundings) => {
  const { document, host, tell, refresh, version } = surroundings;
  const attempt = attempts(surroundings);

  let figures: PlanFigures | null = null;
  let known: Survey | null = null;
  /** null: the tidy choice. */
  let ticked: ResultKey[] | null = null;
  let way: Way | null = null;
  let ownNames = true;
  /** The first column as the user gave it; '' for the next that is free. */
  let chosen = '';
  let taken: string[] = [];
  let done: { undo: () => Promise<void>; sheet: string; box: Box; title: string; error: string | null } | null = null;

  // The page

  const place = document.createElement('div');
  place.className = 'columns';
  const lacking = slot(document, 'lacking');
  const body = document.createElement('div');
  body.hidden = true;
  const results = RESULT_KEYS.map((key) => {
    const { place: own, input } = choice('checkbox', '', sentences.titles[key], sentences.hints[key]);
    input.addEventListener('change', () => {
      ticked = RESULT_KEYS.filter((one) => (one === key ? input.checked : wantedResults().includes(one)));
      taken = [];
      draw();
    });
    return { key, place: own, input };
  });
  const ways = WAYS.map((one) => {
    const made = choice('radio', 'foldplan-way', '', '');
    made.input.addEventListener('change', () => {
      way = one;
      taken = [];
      draw();
    });
    return { way: one, ...made };
  });
  const names = choice('checkbox', '', '', '');
  names.input.addEventListener('change', () => {
    ownNames = names.input.checked;
    draw();
  });
  const columnField = toDom(document, element('div', { class: 'field' },
    element('label', { for: 'foldplan-column' }, sentences.place),
    element('p', { class: 'hint', id: 'foldplan-column-hint' }),
    element('div', { class: 'pick' },
      element('input', { id: 'foldplan-column', type: 'text', autocomplete: 'off', spellcheck: 'false', 'aria-describedby': 'foldplan-column-hint foldplan-column-problem' }),
      element('button', { type: 'button', 'aria-label': sentences.useSelectionFor }, sentences.useSelection)),
    element('p', { class: 'problem', id: 'foldplan-column-problem' }))) as HTMLElement;
  const columnInput = columnField.querySelector('input')!;
  columnInput.addEventListener('input', () => {
    chosen = columnInput.value.trim();
    taken = [];
    draw();
  });
  columnField.querySelector('button')!.addEventListener('click', () => void attempt(point));
  const conflict = slot(document, 'conflict');
  const preview = slot(document, 'preview-place');
  const inserting = button('main', () => insert(false));
  const overwriting = button('', () => insert(true), sentences.writeOver);
  const evading = button('', async () => {
    chosen = '';
    taken = [];
    await look();
    inserting.focus();
  });
  const undoing = button('', takeBack, sentences.undo);
  const buttons = group('div', 'buttons', inserting, evading, overwriting, undoing);
  body.append(
    fieldset(sentences.results, ...results.map((one) => one.place)), fieldset(sentences.ways, ...ways.map((one) => one.place)),
    columnField, names.place, conflict.place, buttons, preview.place,
  );
  place.append(lacking.place, body);

  function draw(): void {
    const plan = figures?.plan;
    const why = !plan || plan.missing.length > 0 ? sentences.noPlan : plan.table === null ? sentences.noTable : null;
    lacking.show(why === null ? [] : [element('p', {}, why)]);
    body.hidden = why !== null || known === null;
    if (body.hidden) return;
    const asked = wanted();
    const count = asked.results.length;
    for (const one of results) {
      one.place.hidden = !offered(figures!).includes(one.key);
      one.input.checked = asked.results.includes(one.key);
    }
    for (const one of ways) {
      one.place.hidden = one.way === 'table' && known!.structured === null;
      one.input.checked = one.way === asked.way;
      one.text.textContent = one.way === 'table' ? sentences.tableColumns(known!.structured?.table.name ?? '') : sentences[one.way];
    }
    const own = Object.values(known!.ownNames);
    names.place.hidden = own.length === 0;
    names.input.checked = ownNames;
    names.text.textContent = sentences.names(own);
    columnField.hidden = asked.way === 'table';
    if (columnInput.value.trim() !== chosen) columnInput.value = chosen;
    columnField.querySelector('.hint')!.textContent = sentences.placeHint(columnLetters(freeColumn()));
    const problem = placeProblem();
    columnField.querySelector('.problem')!.textContent = problem ?? '';
    columnInput.toggleAttribute('aria-invalid', false);
    if (problem !== null) columnInput.setAttribute('aria-invalid', 'true');
    conflict.show(taken.length > 0 ? [noticeList([takenSentence()])] : []);
    overwriting.hidden = taken.length === 0;
    evading.hidden = taken.length === 0;
    evading.textContent = sentences.nextFree(columnLetters(freeColumn()));
    inserting.textContent = sentences.insert(count);
    undoing.hidden = done === null;
    preview.show(count > 0 ? [element('h2', {}, sentences.preview), previewTable(figures!, asked.results), formulaList(asked)] : []);
  }

  function formulaList(asked: Wanted): Tree {
    const texts = formulaTexts(asked, figures!.plan.table!.first);
    return element('details', { 'data-keep': 'formulas' },
      element('summary', {}, asked.way === 'spilled' ? sentences.spilledFormulas : sentences.formulas),
      element('ul', { class: 'formulas' }, ...texts.map((text) => element('li', {}, element('code', {}, text)))));
  }

  // What is wanted

  const wantedResults = () => (ticked ?? tidy(figures!)).filter((key) => offered(figures!).includes(key));
  const wantedWay = (): Way => (way === null || (way === 'table' && known!.structured === null) ? (known!.structured ? 'table' : 'rows') : way);
  const freeColumn = () => nextFree(figures!.plan.table!, Math.max(1, wantedResults().length), known!.used);

  function wanted(over = false): Wanted {
    const { plan } = figures!;
    return {
      figures: figures!, results: wantedResults(), way: wantedWay(), names: cellNames(plan, known!.ownNames, ownNames),
      column: columnFrom(chosen) ?? freeColumn(), structured: known!.structured, over, version,
    };
  }

  function placeProblem(): string | null {
    if (wantedWay() === 'table' || chosen === '') return null;
    const column = columnFrom(chosen);
    if (column === null) return sentences.notColumn(chosen);
    if (column + wantedResults().length > MOST_COLUMNS) return sentences.noRoom(columnLetters(column), wantedResults().length, columnLetters(MOST_COLUMNS - 1));
    const met = meetsPlan(figures!.plan.table!, { row: 0, rows: 1, column, columns: wantedResults().length });
    return met === null ? null : sentences.holdsPlan(met);
  }

  const takenSentence = () => sentences.taken(taken.slice(0, CELLS_TOLD), Math.max(0, taken.length - CELLS_TOLD));

  async function point(): Promise<void> {
    const selection = await host.selection();
    const { sheet } = figures!.plan.table!;
    if (!selection) return tell(sentences.nothingSelected, 'fault');
    if (selection.sheet !== sheet) return tell(sentences.otherSheet(sheet), 'fault');
    const box = parseAddress(selection.address);
    chosen = box ? columnLetters(box.column) : selection.address.split(':')[0]!.replace('$', '');
    taken = [];
    draw();
  }

  // Changes of the workbook

  async function insert(over: boolean): Promise<void> {
    await refresh(); // what is inserted fits the plan as it is now
    await look();
    const problem = wantedResults().length === 0 ? sentences.nothingTicked : placeProblem();
    if (problem !== null) return tell(problem, 'fault');
    const asked = wanted(over);
    const { sheet } = figures!.plan.table!;
    const { change, box, written } = insertionOf(asked);
    taken = over || asked.way === 'table' ? [] : await filledCells(host, sheet, written);
    if (taken.length > 0) {
      draw();
      return tell(sentences.notWritten(takenSentence()), 'fault');
    }
    done = { undo: await host.change(change), sheet, box, title: titleIn(change), error: null };
    chosen = '';
    draw(); // the way back is there, whatever comes next
    await refresh();
    await look();
    tell(sentences.inserted(asked.results.length, addressOf(box)), 'news');
    try {
      await host.startWithWorkbook();
    } catch (fault) {
      if (!(fault instanceof HostFault)) throw fault;
      tell(fault.message, 'fault');
    }
    done.error = null; // an error in the new columns matters more, and is said again
    await readBack();
  }

  async function takeBack(): Promise<void> {
    const back = done;
    done = null; // once only, whatever becomes of it
    draw();
    inserting.focus();
    await back?.undo();
    await refresh();
    await look();
    tell(sentences.undone, 'news');
  }

  /** What stands in the new columns: an error is said, and columns that are gone can't be undone. */
  async function readBack(): Promise<void> {
    const of = done;
    if (!of) return;
    const [error, header] = await Promise.all([errorsIn(host, of.sheet, of.box), host.read(referenceTo(of.sheet, cellBox(of.box.row, of.box.column)))]);
    if (of !== done) return;
    if (of.title !== '' && header?.values[0]?.[0] !== of.title) {
      done = null;
      draw();
    } else if (error !== of.error) {
      of.error = error;
      tell(error ?? sentences.inserted(of.box.columns, addressOf(of.box)), error === null ? 'news' : 'fault');
    }
  }

  let looks = 0;
  async function look(): Promise<void> {
    const turn = ++looks;
    const { plan } = figures!;
    if (plan.table === null) return draw();
    const found = await survey(host, plan, plan.table);
    if (turn !== looks) return;
    known = found;
    draw();
  }

  // Elements

  function choice(type: 'checkbox' | 'radio', name: string, text: string, hint: string) {
    const made = toDom(document, element('label', { class: 'choice' },
      element('input', { type, ...(name && { name }) }), element('span', {}, element('span', { class: 'text' }, text), ...(hint ? [' ', element('span', { class: 'hint' }, hint)] : [])))) as HTMLElement;
    return { place: made, input: made.querySelector('input')!, text: made.querySelector<HTMLElement>('.text')! };
  }

  function button(className: string, work: () => Promise<void>, text = ''): HTMLButtonElement {
    const made = toDom(document, element('button', { type: 'button', class: className }, text)) as HTMLButtonElement;
    made.addEventListener('click', () => void attempt(work));
    return made;
  }

  function group(tag: string, className: string, ...parts: Element[]): Element {
    const made = toDom(document, element(tag, { class: className }));
    made.append(...parts);
    return made;
  }

  function fieldset(title: string, ...parts: Element[]): Element {
    return group('fieldset', 'choices', toDom(document, element('legend', {}, title)), ...parts);
  }

  return {
    title: sentences.title,
    place,
    show(now) {
      figures = now;
      if (now.plan.missing.length > 0 || now.plan.table === null) return draw();
      void look().then(readBack).catch((fault: unknown) => {
        if (!(fault instanceof HostFault)) throw fault;
        tell(fault.message, 'fault');
      });
    },
    close() {
      looks = Infinity;
    },
  };
};

/** The first header of an insertion, by which it is known again; '' where it has none. */
function titleIn({ cells, tableColumns }: Insertion['change']): string {
  const first = (tableColumns ?? cells)![0]!.cells[0]![0]!;
  return typeof first === 'string' ? first : '';
}
