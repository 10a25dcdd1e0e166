// Going from band to band in the picture and picking one: a stop for the tab key, arrow keys within, Enter or a click to pick, and the
// figures of the band at hand in words.

import { toDom, element } from '../element';
import { sentences } from '../sentences';

export interface Stepping {
  readout: HTMLElement;
  /** To be called whenever the picture was drawn anew. */
  renew(): void;
}

const STEPS: Record<string, (at: number, count: number) => number> = {
  ArrowRight: (at, count) => Math.min(at + 1, count - 1),
  ArrowDown: (at, count) => Math.min(at + 1, count - 1),
  ArrowLeft: (at) => Math.max(at - 1, 0),
  ArrowUp: (at) => Math.max(at - 1, 0),
  Home: () => 0,
  End: (_, count) => count - 1,
};

/** @param pick told the row of a band that was picked, as its place in the columns */
export function stepThroughBands(document: Document, picture: HTMLElement, pick: (row: number) => void): Stepping {
  // Screen readers get the same words from the band itself.
  const readout = toDom(document, element('p', { class: 'readout', 'aria-hidden': 'true' })) as HTMLElement;
  let current: string | null = null;
  const bands = () => [...picture.querySelectorAll<SVGElement>('.band[data-row]')];
  const bandOf = (target: EventTarget | null) => (target as Element | null)?.closest?.('.band[data-row]') ?? null;
  const tell = (band: Element | null) => {
    readout.textContent = band?.querySelector('title')?.textContent ?? (bands().length > 0 ? sentences.readoutHint : '');
  };
  const atHand = () => bandOf(document.activeElement);

  function renew(): void {
    const all = bands();
    const stop = all.find((band) => band.getAttribute('data-row') === current) ?? all[0];
    for (const band of all) band.setAttribute('tabindex', band === stop ? '0' : '-1');
    tell(atHand());
  }

  picture.addEventListener('focusin', (event) => {
    current = bandOf(event.target)?.getAttribute('data-row') ?? current;
    renew();
  });
  picture.addEventListener('focusout', () => tell(null));
  picture.addEventListener('pointerover', (event) => tell(bandOf(event.target) ?? atHand()));
  picture.addEventListener('pointerleave', () => tell(atHand()));
  const pickFrom = (band: Element | null) => {
    if (band) pick(Number(band.getAttribute('data-row')));
  };
  picture.addEventListener('click', (event) => pickFrom(bandOf(event.target)));
  picture.addEventListener('keydown', (event) => {
    const all = bands();
    const at = all.findIndex((band) => band === bandOf(event.target));
    if (at < 0 || event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
    const step = STEPS[event.key];
    if (step) all[step(at, all.length)]!.focus();
    else if (event.key === 'Enter' || event.key === ' ') pickFrom(all[at]!);
    else return;
    event.preventDefault();
  });
  return { readout, renew };
}
