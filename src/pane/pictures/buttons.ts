// Buttons, and rows of them.

import { type Tree, element, toDom } from '../element';

/** A button that does something. @param sign what it shows where that is not its name */
export function button(document: Document, name: string, act: () => void, sign?: string): HTMLButtonElement {
  const made = toDom(document, element('button', { type: 'button', ...(sign === undefined ? {} : { 'aria-label': name, title: name, class: 'sign' }) }, sign ?? name)) as HTMLButtonElement;
  made.addEventListener('click', act);
  return made;
}

/** Controls side by side, under one name. */
export function group(document: Document, name: string, ...parts: HTMLElement[]): HTMLElement {
  const made = box(document, { class: 'tools', role: 'group', 'aria-label': name });
  made.append(...parts);
  return made;
}

export const box = (document: Document, attributes: Tree['attributes'], tag = 'div'): HTMLElement => toDom(document, element(tag, attributes)) as HTMLElement;
