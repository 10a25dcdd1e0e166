// What the rate ruler says.

import type { Forbidding } from '../../engine';

type Kind = Forbidding['kind'];

const range = (low: string, high: string) => (low === high ? low : `${low} to ${high}`);

export const sentences = {
  heading: 'Rate ruler',
  usable: 'usable',
  now: (rate: string) => `now ${rate}`,
  candidate: (rate: string) => `candidate ${rate}`,
  outOfViewBelow: (flag: string) => `◂ ${flag}`,
  outOfViewAbove: (flag: string) => `${flag} ▸`,
  title: (from: string, to: string) => `Rate ruler from ${from} to ${to}`,
  description: (ranges: string, rate: string) => `${ranges} The rate is now ${rate}. Each lane below shows the rates that one kind of rule, or one rule, forbids.`,
  rangeCount: (count: number) => (count === 0 ? 'No rate in view is usable.' : count === 1 ? 'One range of rates in view is usable.' : `${count} ranges of rates in view are usable.`),
  legend: { usable: 'usable', kind: 'forbidden by a kind of rule', rule: 'forbidden by one rule' },

  // Rules

  kinds: { 'zone edge': 'zone edges', band: 'band against band', harmonic: 'harmonics', image: 'interleaving images', offset: 'offset tones' } satisfies Record<Kind, string>,
  kindLane: (kind: string, rules: number) => `${kind} (${rules})`,
  rules: {
    'zone edge': (band: string) => band,
    band: (band: string, against: string) => `${band} – ${against}`,
    harmonic: (band: string, against: string, order: number) => `${order} × ${against} – ${band}`,
    image: (band: string, against: string, order: number, cores: number) => `${against} + ${order}/${cores} – ${band}`,
    offset: (band: string, _: string, order: number, cores: number) => `${order}/${cores} – ${band}`,
  } satisfies Record<Kind, (band: string, against: string, order: number, cores: number) => string>,
  inWords: {
    'zone edge': (band: string) => `the zone edges of ${band}`,
    band: (band: string, against: string) => `${band} against ${against}`,
    harmonic: (band: string, against: string, order: number) => `harmonic ${order} of ${against} against ${band}`,
    image: (band: string, against: string, order: number, cores: number) => `image ${order}/${cores} of ${against} against ${band}`,
    offset: (band: string, _: string, order: number, cores: number) => `offset tone ${order}/${cores} against ${band}`,
  } satisfies Record<Kind, (band: string, against: string, order: number, cores: number) => string>,
  bound: { forbids: '✕', below: '◂', above: '▸', both: '◂▸', none: '' },
  boundLegend: (rate: string) => `At ${rate}: ✕ forbids it, ◂ limits it below, ▸ limits it above`,
  notDrawn: (drawn: number, total: number) =>
    (drawn === total ? `All ${total} rules in view have a lane.` : `${drawn} of ${total} rules in view have a lane of their own, those nearest to the candidate; the others are in the lane of their kind.`),

  // A rate in words

  works: (rate: string, ppm: string) => `${rate} works: the rate may move ${ppm} ppm either way before a rule breaks.`,
  breaks: (rate: string, conflicts: number) => (conflicts === 1 ? `${rate} breaks one rule.` : `${rate} breaks ${conflicts} rules.`),
  onlyNominal: (rate: string, conflicts: number, ppm: string) => `${rate} breaks ${conflicts === 1 ? 'one rule' : `${conflicts} rules`} under the clock tolerance; without it the rate may move ${ppm} ppm.`,
  inRange: (rate: string, low: string, high: string) => `${rate} lies in the usable range ${range(low, high)}.`,
  forbiddenBy: (rate: string, rules: string[], more: number) => `${rate} is forbidden by ${rules.join('; ')}${more > 0 ? `; and ${more} more` : ''}.`,
  nearRange: (rate: string) => `${rate} is usable at best on a rate too narrow to point at.`,
  hint: 'Point at the ruler for exact figures; drag the candidate, or step it with the arrow keys, Page Up and Page Down going from range to range.',
  stepHint: (step: string) => `The candidate keeps to multiples of ${step}.`,

  // Tables

  tableSummary: (ranges: number) => (ranges === 1 ? 'The usable range in view' : `The ${ranges} usable ranges in view`),
  tableShown: (shown: number, all: number) => `The first ${shown} of ${all} are listed; zoom in for the others.`,
  tableCaption: (from: string, to: string) => `Usable rates from ${from} to ${to}`,
  columns: ['Lowest rate', 'Highest rate', 'Width', 'Centre', 'Headroom ppm'],
  previewCaption: 'What changes',
  previewColumns: (now: string, then: string) => ['', `Now ${now}`, `At ${then}`],
  conflicts: 'Conflicts',
  headroom: 'Headroom ppm',
  smallest: 'Smallest margin',
  marginOf: (margin: string, name: string) => `${margin} (${name})`,
  checkOf: (check: string, margin: string) => `${check}, margin ${margin}`,
  notDrawable: 'not readable',
  unknown: '…',
  nothingChanges: 'No band’s check changes.',
  moreChanges: (count: number) => (count === 1 ? 'One more band changes' : `${count} more bands change`),
} as const;
