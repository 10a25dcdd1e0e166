// What of the plan the ladder shows: a stretch of its axis, bands of one role or all, and which of them is selected.

export interface LadderView {
  /** The stretch of the folded axis, as fractions of half the rate: 0 ≤ from < to ≤ 1. */
  from: number;
  to: number;
  role: 'all' | 'wanted' | 'unwanted';
  /** Row of the plan that is selected in the sheet, as its place in the columns; null for none. */
  selected: number | null;
}

export const WHOLE: LadderView = { from: 0, to: 1, role: 'all', selected: null };

const NARROWEST_SHARE = 1e-4;

/** Shows a stretch that is so many times as wide, with what lies at `about` (a fraction of half the rate) where it was. */
export function zoomed(view: LadderView, factor: number, about = (view.from + view.to) / 2): LadderView {
  const width = Math.min(1, Math.max(NARROWEST_SHARE, (view.to - view.from) * factor));
  const share = (about - view.from) / (view.to - view.from);
  return moved(view, about - share * width, width);
}

/** Goes along the axis by a share of the stretch in view. */
export const panned = (view: LadderView, by: number): LadderView => moved(view, view.from + by * (view.to - view.from), view.to - view.from);

function moved(view: LadderView, from: number, width: number): LadderView {
  const start = fine(Math.min(Math.max(from, 0), 1 - width));
  return { ...view, from: start, to: width === 1 ? 1 : Math.min(1, fine(start + width)) };
}

/** A billionth of the axis is finer than anyone can zoom, and coarser than what roundings leave. */
const fine = (share: number): number => Math.round(share * 1e9) / 1e9;
