// Every sentence that a user can read from the engine or from a worksheet function stands here, and the one class that carries it.

/** Why there is no result. `input`: an argument is wrong. `none`: the question is fine and has no answer. */
export class Fault extends Error {
  override name = 'Fault';

  constructor(readonly kind: 'input' | 'none', sentence: string) {
    super(sentence);
  }
}

/** A value as the sentence shows it: text in quotes and cut short, numbers to the digits a cell shows. */
export function shown(value: unknown): string {
  if (value === null || value === undefined || value === '') return 'a blank cell';
  if (typeof value === 'boolean') return value ? 'TRUE' : 'FALSE';
  if (typeof value === 'number') return String(Number.isFinite(value) ? Number(value.toPrecision(15)) : value);
  const text = String(value);
  return `"${text.length > 40 ? `${text.slice(0, 39)}…` : text}"`;
}

/** An argument's name with the row of a plan that is meant, counted from 1. */
export const inRow = (argument: string, row: number): string => `${argument} (row ${row + 1})`;

const input = (sentence: string) => new Fault('input', sentence);
const none = (sentence: string) => new Fault('none', sentence);
const count = (n: bigint) => n.toString().replace(/\B(?=(\d{3})+$)/g, ' ');

export const faults = {
  notNumber: (argument: string, value: unknown) => input(`${argument} must be a number; got ${shown(value)}.`),
  notPositive: (argument: string, value: number) => input(`${argument} must be above 0; got ${shown(value)}.`),
  negative: (argument: string, value: number) => input(`${argument} must be 0 or more; got ${shown(value)}.`),
  unknownWord: (argument: string, value: unknown, accepted: readonly string[]) =>
    input(`${argument} must be ${accepted.map((word) => `"${word}"`).join(' or ')}; got ${shown(value)}.`),
  notFlag: (argument: string, value: unknown) => input(`${argument} must be TRUE or FALSE; got ${shown(value)}.`),
  notSingle: (argument: string, rows: number, columns: number) => input(`${argument} must be a single cell; got ${rows} × ${columns} cells.`),
  notVector: (argument: string, rows: number, columns: number) => input(`${argument} must be one column or one row of cells; got ${rows} × ${columns} cells.`),
  sizesDiffer: (argument: string, size: string, other: string, otherSize: string) =>
    input(`${argument} must be one cell or the size of ${other}, ${otherSize} cells; got ${size} cells.`),
  countsDiffer: (argument: string, got: number, other: string, wanted: number) =>
    input(`${argument} must have as many cells as ${other}, ${wanted}; got ${got}.`),
  edgesReversed: (low: string, lowValue: number, high: string, highValue: number) =>
    input(`${low} must not be above ${high}; got ${shown(lowValue)} and ${shown(highValue)}.`),
  ppmTooLarge: (value: number) => input(`ppm must be below 1000000; got ${shown(value)}.`),
  outsideSpectrum: (argument: string, value: number, lowest: number, highest: number, open: boolean) =>
    input(`${argument} must be from ${shown(lowest)} to ${open ? 'below ' : ''}${shown(highest)}, where this rate puts frequencies; got ${shown(value)}.`),
  zoneTooHigh: (frequency: number, rate: number) =>
    input(`rate must be large enough for a zone number that a cell can hold; got ${shown(rate)} for a frequency of ${shown(frequency)}.`),
  tooManyRows: (rows: bigint, how: string) => input(`The result would have ${count(rows)} rows and at most 10 000 are listed; ${how}.`),
  tooManyCandidates: (candidates: bigint) =>
    input(`from and to leave ${count(candidates)} candidates to compare and at most 100 000 are tried; bring them closer together.`),
  endlessRates: () => input('from must be above 0 for a tone without guard or tolerance, which is usable at rates down to 0; got a blank cell.'),

  notCount: (argument: string, value: unknown, most: number) =>
    input(`${argument} must be a whole number${most === Infinity ? ', 1 or more' : ` from 1 to ${most}`}; got ${shown(value)}.`),
  nothingWanted: () => input('role must be "wanted" or blank in at least one row; got no such row.'),
  tooManyRules: (rules: number) =>
    input(`The plan asks for ${count(BigInt(rules))} rules and at most 500 000 are tried; give fewer rows or a lower order of harmonics.`),
  tooMuchWork: () => input('The plan forbids too many separate rates between from and to; raise from, lower to, or give a guard.'),
  tooFewTones: (got: number) => input(`frequencies must hold at least two tones; got ${got}.`),
  tooManyProducts: (products: bigint) =>
    input(`The tones have ${count(products)} products up to this order and at most 200 000 are tried; lower order or give fewer tones.`),
  tooManyPairs: (pairs: bigint) =>
    input(`multiply and divide leave ${count(pairs)} ratios and at most 1 000 000 are tried; lower them or bring from and to closer together.`),
  outsideFirstZone: (argument: string, value: number, highest: number) =>
    input(`${argument} must be from 0 to ${shown(highest)}, half the rate; got ${shown(value)}.`),
  below: (argument: string, value: number, least: number) => input(`${argument} must be ${least} or more; got ${shown(value)}.`),
  missingWith: (argument: string, other: string) => input(`${argument} must be given with ${other}; got a blank cell.`),
  aboveHalf: (argument: string, value: number, rate: number) => input(`${argument} must be at most half the rate, ${shown(rate / 2)}; got ${shown(value)}.`),
  notFraction: (argument: string, value: number) => input(`${argument} must be above 0 and at most 1; got ${shown(value)}.`),
  noEdges: () => input('passHigh must be given for a low-pass, passLow for a high-pass, both for a band-pass; got two blank cells.'),
  edgesDiffer: (pass: string, stop: string) => input(`${pass} and ${stop} must both be given or both be blank.`),
  stopInside: (stop: string, value: number, where: string, pass: number) => input(`${stop} must be ${where}, ${shown(pass)}; got ${shown(value)}.`),
  attenuationBelowRipple: (attenuation: number, ripple: number) => input(`attenuation must be above ripple, ${shown(ripple)} dB; got ${shown(attenuation)}.`),
  noAttenuation: (response: string) => input(`attenuation must be given for the response "${response}"; got a blank cell.`),
  noOneImage: (low: number, high: number, rate: number) =>
    none(`The band from ${shown(low)} to ${shown(high)} crosses a zone edge of the rate ${shown(rate)}, so it overlaps its own mirror.`),
  noLevel: (frequency: number) => none(`The held output has nothing at ${shown(frequency)}.`),
  infiniteAttenuation: (frequency: number) => none(`The filter lets nothing through at ${shown(frequency)}.`),
  noLimit: () => input('to must be given where grid is a step; got a blank cell.'),
  badGrid: (value: unknown) => input(`grid must hold rates or one step, each above 0; got ${shown(value)}.`),

  nothingLands: (folded: number, from: number, to: number) =>
    none(`No frequency from ${shown(from)} to ${shown(to)} lands on ${shown(folded)}.`),
  nothingFits: (from: number, to: number) => none(`No frequency from ${shown(from)} to ${shown(to)} fits every observation.`),
  holdsZero: (low: number, high: number) =>
    none(`No rate is usable: the band from ${shown(low)} to ${shown(high)} holds 0, which is a zone edge at every rate.`),
  guardReachesZero: (edge: number, guard: number) =>
    none(`No rate is usable: the band begins at ${shown(edge)}, nearer to the zone edge at 0 than the guard of ${shown(guard)}.`),
  noRateInRange: (from: number, to: number | null) =>
    none(`No rate ${to === null ? `from ${shown(from)} up` : `from ${shown(from)} to ${shown(to)}`} holds the band within one zone.`),
  overlapBeforeSampling: (one: string, other: string) =>
    none(`No rate is usable: ${one} and ${other} overlap, or come nearer than the guard, before sampling.`),
  noPlanRate: (from: number, to: number | null) =>
    none(`No rate ${to === null ? `from ${shown(from)} up` : `from ${shown(from)} to ${shown(to)}`} keeps every wanted band clear.`),
  noGridRate: () => none('No rate of the grid keeps every wanted band clear.'),
  noClockRate: (from: number, to: number) => none(`No ratio gives a rate from ${shown(from)} to ${shown(to)}.`),
  nothingExplains: (observed: number, order: number, nearest: string, miss: number) =>
    none(`No product up to order ${order} lands on ${shown(observed)} within the tolerance; the nearest, ${nearest}, misses by ${shown(miss)}.`),
  noLowestRate: () => none('There is no lowest rate: a tone without guard or tolerance is usable at rates down to 0.'),
  rangesTooNarrow: () => none('The lowest usable ranges are narrower than a cell can show; give a guard or a tolerance.'),
} as const;
