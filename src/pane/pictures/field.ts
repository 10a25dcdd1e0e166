// A field for a number, with the sentence that says what it accepts when it gets something else.

import { element, toDom } from '../element';

export interface Field {
  place: HTMLElement;
  /** Shows a value unless the user is typing; null shows as blank. */
  show(value: string | null): void;
  /** Says what is wrong with what was typed, or takes that back. */
  complain(sentence: string | null): void;
}

/** @param take given what was typed, on Enter or when the field is left */
export function field(document: Document, id: string, label: string, take: (typed: string) => void): Field {
  const place = toDom(document, element('div', { class: 'number-field' },
    element('label', { for: id }, label),
    element('input', { id, type: 'text', inputmode: 'decimal', autocomplete: 'off', spellcheck: 'false', 'aria-describedby': `${id}-fault` }),
    element('p', { id: `${id}-fault`, class: 'fault', role: 'alert' }))) as HTMLElement;
  const input = place.querySelector('input')!;
  const fault = place.querySelector('p')!;
  let shown = '';
  let dirty = false;
  const commit = () => {
    if (!dirty) return;
    dirty = false;
    take(input.value.trim());
  };
  input.addEventListener('input', () => { dirty = true; });
  input.addEventListener('change', commit);
  input.addEventListener('keydown', (event) => {
    if (event.key === 'Enter') commit();
    if (event.key === 'Escape') {
      dirty = false;
      input.value = shown;
      complain(null);
    }
  });
  function complain(sentence: string | null): void {
    input.setAttribute('aria-invalid', sentence === null ? 'false' : 'true');
    if (fault.textContent !== (sentence ?? '')) fault.textContent = sentence ?? '';
  }
  return {
    place,
    show(value) {
      shown = value ?? '';
      const wrong = input.getAttribute('aria-invalid') === 'true';
      if (!dirty && !wrong && input.value !== shown) input.value = shown;
    },
    complain,
  };
}
