// The candidate's handle: what a pointer takes hold of, and a slider for keys and screen readers.

import { element, toDom } from '../element';
import { exactFigure } from '../number-text';
import { sentences } from '../pictures/sentences';
import type { Flag } from './layout';
import type { RateWindow } from './window';

export interface Handle {
  place: HTMLElement;
  /** @param words what a screen reader says of the candidate */
  show(flag: Flag | null, window: RateWindow, rate: number, words: string): void;
}

export interface Moves {
  step(by: number): void;
  /** To the next usable range. */
  range(direction: 1 | -1): void;
  end(direction: 1 | -1): void;
  /** 0: the window as it was. */
  zoom(direction: 1 | 0 | -1): void;
}

export function candidateHandle(document: Document, moves: Moves): Handle {
  const place = toDom(document, element('div', {
    class: 'handle', role: 'slider', tabindex: 0, 'aria-label': sentences.candidateSlider, 'aria-orientation': 'horizontal',
  })) as HTMLElement;
  const keys: Record<string, (event: KeyboardEvent) => void> = {
    ArrowRight: ({ shiftKey }) => moves.step(shiftKey ? 10 : 1),
    ArrowUp: ({ shiftKey }) => moves.step(shiftKey ? 10 : 1),
    ArrowLeft: ({ shiftKey }) => moves.step(shiftKey ? -10 : -1),
    ArrowDown: ({ shiftKey }) => moves.step(shiftKey ? -10 : -1),
    PageUp: () => moves.range(1),
    PageDown: () => moves.range(-1),
    Home: () => moves.end(-1),
    End: () => moves.end(1),
    '+': () => moves.zoom(1),
    '=': () => moves.zoom(1),
    '-': () => moves.zoom(-1),
    0: () => moves.zoom(0),
  };
  place.addEventListener('keydown', (event) => {
    const act = keys[event.key];
    if (!act || event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    act(event);
  });
  return {
    place,
    show(flag, { from, to }, rate, words) {
      place.hidden = flag === null;
      if (flag) {
        place.style.left = `${flag.x}px`;
        place.style.top = `${flag.y}px`;
      }
      for (const [name, value] of Object.entries({ 'aria-valuemin': from, 'aria-valuemax': to, 'aria-valuenow': rate })) place.setAttribute(name, exactFigure(value));
      place.setAttribute('aria-valuetext', words);
    },
  };
}
