// A place in the page whose content is redrawn as a whole, and only when it differs.

import { type Tree, toDom } from './element';

export interface Slot {
  place: HTMLElement;
  /** Shows these trees. What was opened stays open, and what had the focus keeps it, as far as it is still there. */
  show(trees: Tree[]): void;
}

/**
 * Makes an empty slot. Across redraws a row is known by its `data-row`, and any other part that opens or has the focus by its `data-keep`.
 */
export function slot(document: Document, className: string, attributes: Tree['attributes'] = {}): Slot {
  const place = toDom(document, { tag: 'div', attributes: { class: className, ...attributes }, children: [] }) as HTMLElement;
  let shown = '[]';
  return {
    place,
    show(trees) {
      const wanted = JSON.stringify(trees);
      if (wanted === shown) return;
      shown = wanted;
      const opened = [...place.querySelectorAll('details[open][data-keep]')].map((part) => part.getAttribute('data-keep'));
      const focused = focusedPart(document, place);
      place.replaceChildren(...trees.map((tree) => toDom(document, tree)));
      for (const part of place.querySelectorAll('details[data-keep]')) part.toggleAttribute('open', opened.includes(part.getAttribute('data-keep')));
      if (focused) place.querySelector<HTMLElement>(focused)?.focus({ preventScroll: true });
    },
  };
}

/** A selector for what has the focus within a place. */
function focusedPart(document: Document, place: Element): string | null {
  const active = document.activeElement;
  if (!active || !place.contains(active)) return null;
  const row = active.getAttribute('data-row');
  if (row !== null) return `[data-row="${row}"]`;
  const own = active.getAttribute('data-keep');
  if (own !== null) return `[data-keep="${own}"]`;
  const kept = active.tagName.toLowerCase() === 'summary' ? active.parentElement?.getAttribute('data-keep') : null;
  return kept ? `[data-keep="${kept}"] > summary` : null;
}
