// The stretch of the rate axis that the ruler shows.

export interface RateWindow {
  /** Above 0. */
  from: number;
  to: number;
}

/** Beyond this ratio of its ends a window would hold more than anyone can read. */
const WIDEST_RATIO = 1000;
const NARROWEST_SHARE = 1e-9;

/** A window about a rate: its neighbours, not all that there is. */
export const windowAbout = (rate: number): RateWindow => ({ from: neat(rate * 0.85, 3), to: neat(rate * 1.15, 3) });

/** So many times as wide, with `about` where it was. */
export function zoomedRates(window: RateWindow, factor: number, about = (window.from + window.to) / 2): RateWindow {
  const width = Math.max((window.to - window.from) * factor, about * NARROWEST_SHARE);
  const share = (about - window.from) / (window.to - window.from);
  return tidy(about - share * width, about + (1 - share) * width);
}

/** Goes along by a share of the window. */
export function pannedRates({ from, to }: RateWindow, by: number): RateWindow {
  const shift = Math.max(by * (to - from), -from * 0.9);
  return tidy(from + shift, to + shift);
}

/** The window, moved only as far as it must to hold a rate. */
export function holding(window: RateWindow, rate: number): RateWindow {
  if (rate >= window.from && rate <= window.to) return window;
  const width = window.to - window.from;
  return tidy(rate - width / 2, rate + width / 2);
}

/** Ends in as few digits as tell them apart, so that they can be read and typed. */
function tidy(from: number, to: number): RateWindow {
  const lowest = Math.max(from, to / WIDEST_RATIO);
  const digits = Math.min(15, Math.max(3, 3 + Math.ceil(Math.log10(to / (to - lowest)))));
  return { from: neat(lowest, digits), to: neat(to, digits) };
}

const neat = (x: number, digits: number): number => Number(x.toPrecision(digits));
