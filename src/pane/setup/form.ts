// The fields of the section Plan as elements. They stay while their content changes, so that whoever types goes on typing.

import { type Tree, element, toDom } from '../element';
import { NAMES, type NameKey } from '../sentences';
import { CELL_KEYS, COLUMN_KEYS, type Draft, keysOf } from './draft';
import { sentences } from './sentences';

export interface Form {
  place: HTMLElement;
  show(draft: Draft, problems: Partial<Record<NameKey, string>>): void;
}

export interface FormActions {
  typed(key: NameKey, text: string): void;
  pointed(key: NameKey): void;
  newCell(key: NameKey): void;
  started(key: NameKey, text: string): void;
  edges(edges: Draft['edges']): void;
}

export function planForm(document: Document, actions: FormActions): Form {
  const fields = [...COLUMN_KEYS, ...CELL_KEYS].map((key) => field(document, key, actions));
  const edgeChoices = ([['low', 'high'], ['centre', 'width']] as const).map((edges) => {
    const choice = toDom(document, element('label', { class: 'choice' },
      element('input', { type: 'radio', name: 'foldplan-edges', value: edges[0] }), edges[0] === 'low' ? sentences.lowHigh : sentences.centreWidth)) as HTMLElement;
    const input = choice.querySelector('input')!;
    input.addEventListener('change', () => actions.edges(edges));
    return { choice, input, edges };
  });
  const group = (title: string, parts: Element[]) => {
    const made = toDom(document, element('fieldset', {}, element('legend', {}, title)));
    made.append(...parts);
    return made;
  };
  const choices = group(sentences.edges, edgeChoices.map(({ choice }) => choice));
  choices.classList.add('choices', 'beside');
  const place = document.createElement('div');
  const of = (keys: readonly NameKey[]) => fields.filter(({ key }) => keys.includes(key)).map(({ place: own }) => own);
  place.append(choices, group(sentences.columns, of(COLUMN_KEYS)), group(sentences.cells, of(CELL_KEYS)));
  return {
    place,
    show(draft, problems) {
      for (const { input, edges } of edgeChoices) input.checked = edges[0] === draft.edges[0];
      for (const one of fields) {
        one.place.hidden = !keysOf(draft).includes(one.key);
        one.show(draft.fields[one.key], problems[one.key]);
      }
    },
  };
}

function field(document: Document, key: NameKey, actions: FormActions) {
  const id = `foldplan-${key}`;
  const isCell = (CELL_KEYS as readonly NameKey[]).includes(key);
  const button = (className: string, text: string, label: string): Tree => element('button', { type: 'button', class: className, 'aria-label': label }, text);
  const place = toDom(document, element('div', { class: 'field', 'data-name': NAMES[key].name },
    element('label', { for: id }, sentences.labels[key]),
    element('p', { class: 'hint', id: `${id}-hint` }),
    element('div', { class: 'pick' },
      element('input', { id, type: 'text', autocomplete: 'off', spellcheck: 'false', 'aria-describedby': `${id}-hint ${id}-problem` }),
      button('use', sentences.useSelection, sentences.useSelectionFor(key)),
      ...(isCell ? [button('new', sentences.newCell, sentences.newCellFor(key))] : [])),
    ...(isCell ? [element('div', { class: 'starts' }, element('label', { for: `${id}-starts` }, sentences.startsAt(key)), element('input', { id: `${id}-starts`, type: 'text', inputmode: 'decimal', autocomplete: 'off', 'aria-describedby': `${id}-problem` }))] : []),
    element('p', { class: 'problem', id: `${id}-problem` }))) as HTMLElement;
  const part = <T extends HTMLElement>(selector: string) => place.querySelector<T>(selector)!;
  const input = part<HTMLInputElement>(`#${id}`);
  const starts = place.querySelector<HTMLInputElement>(`#${id}-starts`);
  input.addEventListener('input', () => actions.typed(key, input.value));
  part('.use').addEventListener('click', () => actions.pointed(key));
  place.querySelector('.new')?.addEventListener('click', () => actions.newCell(key));
  starts?.addEventListener('input', () => actions.started(key, starts.value));
  return {
    key,
    place,
    show(now: Draft['fields'][NameKey], problem: string | undefined) {
      if (input.value !== now.text) input.value = now.text;
      if (starts) {
        starts.parentElement!.hidden = now.starts === null;
        if (now.starts !== null && starts.value !== now.starts) starts.value = now.starts;
      }
      part('.hint').textContent = now.why === '' ? sentences.hints[key] : now.why;
      part('.problem').textContent = problem ?? '';
      for (const one of [input, starts]) one?.toggleAttribute('aria-invalid', false);
      if (problem !== undefined) (now.starts === null ? input : starts!).setAttribute('aria-invalid', 'true');
    },
  };
}
