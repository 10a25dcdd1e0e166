// The page in which the benchmark measures the pictures: the section Pictures on a host that only holds still.

import '../../src/pane/pane.css';
import type { LiveHost } from '../../src/host/port';
import { figuresOf } from '../../src/pane/figures';
import { picturesSection } from '../../src/pane/pictures';
import type { Plan } from '../../src/pane/plan';

/**
 * Milliseconds from a plan that was read to its pictures on the page, laid out: the fastest of some rounds, each at another rate.
 * @param rounds the first of them warms up
 */
function measurePictures(plan: Plan, rounds: number): { figures: number; section: number } {
  const section = picturesSection({ document, host: still, version: '', tell: () => {}, refresh: async () => {} });
  document.body.className = 'foldplan';
  document.body.replaceChildren(section.place);
  const fastest = { figures: Infinity, section: Infinity };
  for (let round = -1; round < rounds; round++) {
    const start = performance.now();
    const figures = figuresOf({ ...plan, rate: 100 + round });
    const computed = performance.now();
    section.show(figures, null);
    document.body.getBoundingClientRect(); // the browser's own layout belongs to it
    const drawn = performance.now();
    if (round < 0) continue;
    fastest.figures = Math.min(fastest.figures, computed - start);
    fastest.section = Math.min(fastest.section, drawn - computed);
  }
  section.close();
  return fastest;
}

/** Answers every question with nothing. */
const still = new Proxy({ cannot: {} }, { get: (host, name) => (name === 'cannot' ? host.cannot : () => Promise.resolve({})) }) as LiveHost;

Object.assign(window, { measurePictures });
