// What the section Pictures says, apart from what stands in the pictures themselves.

import type { Conflict } from '../../engine';

const list = (names: readonly string[]) => names.join(', ');

export const sentences = {
  title: 'Pictures',

  // The ladder

  ladderTools: 'View of the zone ladder',
  role: 'Show',
  roles: { all: 'all bands', wanted: 'wanted bands', unwanted: 'unwanted bands' },
  zoomIn: 'Zoom in',
  zoomOut: 'Zoom out',
  reset: 'Show all',
  left: 'Go left',
  right: 'Go right',
  axis: (from: string, to: string) => `Axis ${from} to ${to}`,
  ladderKeys: 'Ctrl and the wheel zoom. In the picture: + and − zoom, 0 shows all, Shift with an arrow goes along the axis.',
  nothingInView: (from: string, to: string, role: 'all' | 'wanted' | 'unwanted') =>
    `No ${role === 'all' ? '' : `${role} `}band lands between ${from} and ${to}.`,
  noPictures: 'The pictures appear here once the plan has a rate and at least one band.',

  // The ruler

  rulerTools: 'Rates in view',
  rulerRules: 'Candidate and rules',
  from: 'From',
  to: 'To',
  lower: 'Lower rates',
  higher: 'Higher rates',
  aboutRate: 'About the rate',
  candidate: 'Candidate',
  step: 'Step',
  harmonics: 'Harmonics up to',
  cores: 'Cores',
  choosing: 'Choose a rate',
  lowerUsable: 'Next usable below',
  higherUsable: 'Next usable above',
  candidateSlider: 'Candidate rate',
  backToNow: 'Back to the rate now',
  use: 'Use this rate',
  useBroken: 'Use it all the same',
  replaceFormula: (formula: string) => `Replace the formula ${formula}`,
  holdsFormula: (formula: string) => `The rate cell holds the formula ${formula}; press again to put the number in its place.`,
  used: (rate: string, was: string) => `The rate cell was set to ${rate}; before, it held ${was}.`,
  takeBack: (was: string) => `Undo: back to ${was}`,
  takenBack: (rate: string) => `The rate cell was set back to ${rate}.`,
  computing: 'Computing …',
  noneUsable: 'No rate in view is usable.',
  noneAbove: 'No usable rate was found above the candidate, up to sixteen times the rates in view.',
  noneBelow: 'No usable rate was found below the candidate, down to a sixteenth of the rates in view.',
  roomiest: 'Usable rates with most headroom',
  roomiestStep: (step: string) => `Usable multiples of ${step} with most headroom`,
  choose: (rate: string, ppm: string) => `${rate}, ±${ppm} ppm`,
  ofStepNone: (step: string) => `No multiple of ${step} in view is usable.`,

  // Input

  rateNeeded: (what: string, got: string) => `${what} must be a number above 0; got ${got}.`,
  stepNeeded: (got: string) => `Step must be a number above 0, or blank for any rate; got ${got}.`,
  countNeeded: (what: string, most: number, got: string) => `${what} must be a whole number from 1 to ${most}; got ${got}.`,
  quoted: (text: string) => (text === '' ? 'nothing' : `"${text}"`),
  nameIgnored: (name: string, sentence: string) => `${name}: ${sentence} It is taken as ${name === 'Fold_Step' ? 'blank' : '1'}.`,

  // Conflicts

  conflictsHeading: 'What speaks against the rate',
  noConflicts: (rate: string) => `Nothing speaks against ${rate}.`,
  more: (count: number) => `${count} more`,
  conflict: {
    crosses: (band: string, at: string, by: string) => `${band} crosses the zone edge ${at} by ${by}.`,
    nearEdge: (band: string, at: string, gap: string) => `${band} is ${gap} from the zone edge ${at}, less than the guard.`,
    overlap: (band: string, other: string, by: string) => `${band} and ${other} overlap by ${by}.`,
    near: (band: string, other: string, gap: string) => `${band} and ${other} are ${gap} apart, less than the guard.`,
    edgeBefore: (band: string) => `${band} holds 0 or lies nearer to it than the guard, so no rate helps.`,
    before: (band: string, other: string) => `${band} and ${other} overlap, or come nearer than the guard, before sampling, so no rate helps.`,
  },
  other: {
    'zone edge': () => '',
    band: (against: string) => against,
    harmonic: (against: string, order: number, own: boolean) => `${own ? 'its own ' : ''}harmonic ${order}${own ? '' : ` of ${against}`}`,
    image: (against: string, order: number, own: boolean, cores: number) => `${own ? 'its own ' : ''}image ${order}/${cores}${own ? '' : ` of ${against}`}`,
    offset: (_: string, order: number, _own: boolean, cores: number) => `offset tone ${order}/${cores}`,
  } satisfies Record<Conflict['kind'], (against: string, order: number, own: boolean, cores: number) => string>,

  // Taking out

  takeOut: { ladder: 'Take out the zone ladder', ruler: 'Take out the rate ruler' },
  insert: 'Insert in the sheet',
  save: 'Save as SVG',
  copy: 'Copy as PNG',
  inserted: (place: string) => `The picture stands at ${place}.`,
  selectFirst: 'Select the cell where the picture is to stand, then insert it.',
  saved: (name: string) => `The picture is handed over as ${name}.`,
  copied: 'The picture is on the clipboard.',
  copyRefused: 'The browser did not let the picture onto the clipboard; save it as SVG instead.',
  notDrawn: 'The browser could not turn the picture into a PNG.',
  fileName: { ladder: (rate: string) => `Zone ladder at ${rate}.svg`, ruler: (rate: string) => `Rate ruler at ${rate}.svg` },
  ladderFacts: (rate: string, verdict: string, bands: number, objections: readonly string[], more: number) =>
    `Zone ladder of ${bands === 1 ? 'one band' : `${bands} bands`} at a rate of ${rate}. ${verdict} ${objections.join(' ')}${more > 0 ? ` And ${more} more.` : ''}`.trim(),
  rulerFacts: (from: string, to: string, ranges: string, rate: string, rates: readonly string[]) =>
    `Rate ruler from ${from} to ${to}, at a rate of ${rate}. ${ranges}${rates.length > 0 ? ` Those with most headroom are about ${list(rates)}.` : ''}`,
} as const;
