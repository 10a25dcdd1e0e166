// Sections of which one is in view, behind a row of tabs: arrow keys go from tab to tab, the tab key goes on into the section.

import { element, toDom } from './element';

export interface Tabs {
  place: HTMLElement;
  /** Which section is in view. */
  current(): number;
  choose(index: number): void;
}

const STEPS: Record<string, (at: number, count: number) => number> = {
  ArrowRight: (at, count) => (at + 1) % count,
  ArrowLeft: (at, count) => (at + count - 1) % count,
  Home: () => 0,
  End: (_, count) => count - 1,
};

/** @param onChosen called after another section came into view */
export function tabs(document: Document, label: string, sections: { title: string; place: HTMLElement }[], onChosen: () => void): Tabs {
  const row = toDom(document, element('div', { class: 'tabs', role: 'tablist', 'aria-label': label })) as HTMLElement;
  const place = toDom(document, element('div', { class: 'sections' })) as HTMLElement;
  const parts = sections.map(({ title, place: content }, i) => {
    const tab = toDom(document, element('button', { type: 'button', role: 'tab', id: `foldplan-tab-${i}`, 'aria-controls': `foldplan-section-${i}` }, title)) as HTMLElement;
    const panel = toDom(document, element('div', { class: 'section', role: 'tabpanel', id: `foldplan-section-${i}`, 'aria-labelledby': `foldplan-tab-${i}` })) as HTMLElement;
    panel.append(content);
    panel.hidden = true;
    tab.addEventListener('click', () => choose(i));
    tab.addEventListener('keydown', (event) => {
      const step = STEPS[event.key];
      if (!step || event.altKey || event.ctrlKey || event.metaKey) return;
      event.preventDefault();
      const next = step(i, sections.length);
      choose(next);
      parts[next]!.tab.focus();
    });
    row.append(tab);
    place.append(panel);
    return { tab, panel };
  });
  place.prepend(row);

  let chosen = -1;
  function choose(index: number): void {
    if (index === chosen) return;
    chosen = index;
    parts.forEach(({ tab, panel }, i) => {
      tab.setAttribute('aria-selected', String(i === index));
      tab.setAttribute('tabindex', i === index ? '0' : '-1');
      panel.hidden = i !== index;
    });
    onChosen();
  }
  return { place, current: () => chosen, choose };
}
