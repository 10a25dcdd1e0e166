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

/** Each sentence, under what it means to the user: the function reference shows both. */
export const faults = {
  /** Text, TRUE, nothing at all or an infinite number stands where a number belongs. A number typed as text counts as text: enter it anew as a number. */
  notNumber: (argument: string, value: unknown) => input(`${argument} must be a number; got ${shown(value)}.`),
  /** The argument has to be greater than 0. */
  notPositive: (argument: string, value: number) => input(`${argument} must be above 0; got ${shown(value)}.`),
  /** The argument may be 0, but not less. */
  negative: (argument: string, value: number) => input(`${argument} must be 0 or more; got ${shown(value)}.`),
  /** The cell holds another word than those listed. Capitals and blanks around a word do not matter. */
  unknownWord: (argument: string, value: unknown, accepted: readonly string[]) =>
    input(`${argument} must be ${accepted.map((word) => `"${word}"`).join(' or ')}; got ${shown(value)}.`),
  /** The argument is a yes or a no: TRUE, FALSE, or left out. */
  notFlag: (argument: string, value: unknown) => input(`${argument} must be TRUE or FALSE; got ${shown(value)}.`),
  /** This argument is one value for the whole table; give one cell. */
  notSingle: (argument: string, rows: number, columns: number) => input(`${argument} must be a single cell; got ${rows} × ${columns} cells.`),
  /** This argument is a list; give cells of one column or of one row. */
  notVector: (argument: string, rows: number, columns: number) => input(`${argument} must be one column or one row of cells; got ${rows} × ${columns} cells.`),
  /** A row function goes through its columns side by side: each is one cell, which serves every row, or as large as the others. */
  sizesDiffer: (argument: string, size: string, other: string, otherSize: string) =>
    input(`${argument} must be one cell or the size of ${other}, ${otherSize} cells; got ${size} cells.`),
  /** Two columns that belong together differ in length; make the ranges equally long. */
  countsDiffer: (argument: string, got: number, other: string, wanted: number) =>
    input(`${argument} must have as many cells as ${other}, ${wanted}; got ${got}.`),
  /** The low edge of a band lies above its high edge; swap them, or mend the one that is wrong. */
  edgesReversed: (low: string, lowValue: number, high: string, highValue: number) =>
    input(`${low} must not be above ${high}; got ${shown(lowValue)} and ${shown(highValue)}.`),
  /** A clock that may be off by its whole rate has no tolerance to speak of. */
  ppmTooLarge: (value: number) => input(`ppm must be below 1000000; got ${shown(value)}.`),
  /** What a converter puts out lies in its own spectrum; a folded frequency beyond it cannot have been seen. */
  outsideSpectrum: (argument: string, value: number, lowest: number, highest: number, open: boolean) =>
    input(`${argument} must be from ${shown(lowest)} to ${open ? 'below ' : ''}${shown(highest)}, where this rate puts frequencies; got ${shown(value)}.`),
  /** The frequency is so many times the rate that a cell cannot show the number of its zone. */
  zoneTooHigh: (frequency: number, rate: number) =>
    input(`rate must be large enough for a zone number that a cell can hold; got ${shown(rate)} for a frequency of ${shown(frequency)}.`),
  /** A table that long helps nobody and would hold the sheet up. Ask for less of it as told. */
  tooManyRows: (rows: bigint, how: string) => input(`The result would have ${count(rows)} rows and at most 10 000 are listed; ${how}.`),
  /** Too many frequencies would have to be compared one by one. */
  tooManyCandidates: (candidates: bigint) =>
    input(`from and to leave ${count(candidates)} candidates to compare and at most 100 000 are tried; bring them closer together.`),
  /** A tone is usable at ever lower rates, without end; say where the list is to begin. */
  endlessRates: () => input('from must be above 0 for a tone without guard or tolerance, which is usable at rates down to 0; got a blank cell.'),

  /** The argument counts something. */
  notCount: (argument: string, value: unknown, most: number) =>
    input(`${argument} must be a whole number${most === Infinity ? ', 1 or more' : ` from 1 to ${most}`}; got ${shown(value)}.`),
  /** Without a wanted band there is nothing to keep clear. */
  nothingWanted: () => input('role must be "wanted" or blank in at least one row; got no such row.'),
  /** Every pair of rows, harmonic and image is a rule, and there are more of them than can be tried in good time. */
  tooManyRules: (rules: number) =>
    input(`The plan asks for ${count(BigInt(rules))} rules and at most 500 000 are tried; give fewer rows or a lower order of harmonics.`),
  /** The ranges in question are so many that the list would take too long; ask for a narrower span of rates. */
  tooMuchWork: () => input('The plan forbids too many separate rates between from and to; raise from, lower to, or give a guard.'),
  /** A product needs two tones to begin with. */
  tooFewTones: (got: number) => input(`frequencies must hold at least two tones; got ${got}.`),
  /** The number of products grows fast with the order and with the number of tones. */
  tooManyProducts: (products: bigint) =>
    input(`The tones have ${count(products)} products up to this order and at most 200 000 are tried; lower order or give fewer tones.`),
  /** Too many ratios would have to be tried. */
  tooManyPairs: (pairs: bigint) =>
    input(`multiply and divide leave ${count(pairs)} ratios and at most 1 000 000 are tried; lower them or bring from and to closer together.`),
  /** A converter generates its band in the first zone; its images are what the table lists. */
  outsideFirstZone: (argument: string, value: number, highest: number) =>
    input(`${argument} must be from 0 to ${shown(highest)}, half the rate; got ${shown(value)}.`),
  /** The argument is too small to mean anything. */
  below: (argument: string, value: number, least: number) => input(`${argument} must be ${least} or more; got ${shown(value)}.`),
  /** One argument makes sense only together with another. */
  missingWith: (argument: string, other: string) => input(`${argument} must be given with ${other}; got a blank cell.`),
  /** Half the rate is all the bandwidth that there is. */
  aboveHalf: (argument: string, value: number, rate: number) => input(`${argument} must be at most half the rate, ${shown(rate / 2)}; got ${shown(value)}.`),
  /** The argument is a share of a whole. */
  notFraction: (argument: string, value: number) => input(`${argument} must be above 0 and at most 1; got ${shown(value)}.`),
  /** The edges that are given tell the kind of filter; without any there is none. */
  noEdges: () => input('passHigh must be given for a low-pass, passLow for a high-pass, both for a band-pass; got two blank cells.'),
  /** On every side on which the pass band ends a stop band has to begin. */
  edgesDiffer: (pass: string, stop: string) => input(`${pass} and ${stop} must both be given or both be blank.`),
  /** The stop band begins inside the pass band or on its edge; leave room for a transition. */
  stopInside: (stop: string, value: number, where: string, pass: number) => input(`${stop} must be ${where}, ${shown(pass)}; got ${shown(value)}.`),
  /** The stop band has to lose more than the pass band may. */
  attenuationBelowRipple: (attenuation: number, ripple: number) => input(`attenuation must be above ripple, ${shown(ripple)} dB; got ${shown(attenuation)}.`),
  /** This response has ripples in its stop band, whose size is part of the filter. */
  noAttenuation: (response: string) => input(`attenuation must be given for the response "${response}"; got a blank cell.`),
  /** Part of the band comes out inverted on top of the rest: there is no band to go on with. Choose another rate. */
  noOneImage: (low: number, high: number, rate: number) =>
    none(`The band from ${shown(low)} to ${shown(high)} crosses a zone edge of the rate ${shown(rate)}, so it overlaps its own mirror.`),
  /** A null of the held pulse: the level is minus infinity in dB, which no cell can show. */
  noLevel: (frequency: number) => none(`The held output has nothing at ${shown(frequency)}.`),
  /** The attenuation is infinite, which no cell can show. */
  infiniteAttenuation: (frequency: number) => none(`The filter lets nothing through at ${shown(frequency)}.`),
  /** A step alone goes on for ever; say where the rates are to end. */
  noLimit: () => input('to must be given where grid is a step; got a blank cell.'),
  /** The grid is one number, a step, or a range of rates. */
  badGrid: (value: unknown) => input(`grid must hold rates or one step, each above 0; got ${shown(value)}.`),

  /** There is no such frequency in that range; widen it. */
  nothingLands: (folded: number, from: number, to: number) =>
    none(`No frequency from ${shown(from)} to ${shown(to)} lands on ${shown(folded)}.`),
  /** No frequency agrees with all the rates at once: give a tolerance, widen the range, or doubt one of the observations. */
  nothingFits: (from: number, to: number) => none(`No frequency from ${shown(from)} to ${shown(to)} fits every observation.`),
  /** Such a band overlaps its own mirror whatever the rate is. IQ sampling may do. */
  holdsZero: (low: number, high: number) =>
    none(`No rate is usable: the band from ${shown(low)} to ${shown(high)} holds 0, which is a zone edge at every rate.`),
  /** 0 is a zone edge at every rate, and the band begins too near to it. */
  guardReachesZero: (edge: number, guard: number) =>
    none(`No rate is usable: the band begins at ${shown(edge)}, nearer to the zone edge at 0 than the guard of ${shown(guard)}.`),
  /** Every rate of the range has a zone edge inside the band, or nearer than the guard. */
  noRateInRange: (from: number, to: number | null) =>
    none(`No rate ${to === null ? `from ${shown(from)} up` : `from ${shown(from)} to ${shown(to)}`} holds the band within one zone.`),
  /** Sampling cannot take apart what overlaps already. Filter one of the two away and set its role to ignore, or lower the guard. */
  overlapBeforeSampling: (one: string, other: string) =>
    none(`No rate is usable: ${one} and ${other} overlap, or come nearer than the guard, before sampling.`),
  /** Every rate of the range breaks a rule; CONFLICTS at one of them tells which. Widen the range, lower the guard, or ignore rows that a filter removes. */
  noPlanRate: (from: number, to: number | null) =>
    none(`No rate ${to === null ? `from ${shown(from)} up` : `from ${shown(from)} to ${shown(to)}`} keeps every wanted band clear.`),
  /** Every rate of the grid breaks a rule. Try a finer step or a wider range; PLANRATES lists what is there. */
  noGridRate: () => none('No rate of the grid keeps every wanted band clear.'),
  /** No ratio within the limits falls in the range; allow larger numbers or widen the range. */
  noClockRate: (from: number, to: number) => none(`No ratio gives a rate from ${shown(from)} to ${shown(to)}.`),
  /** The nearest product misses by more than the tolerance: raise the order or the tolerance, or add the tone that is missing from the list. */
  nothingExplains: (observed: number, order: number, nearest: string, miss: number) =>
    none(`No product up to order ${order} lands on ${shown(observed)} within the tolerance; the nearest, ${nearest}, misses by ${shown(miss)}.`),
  /** A tone fits ever lower rates, without end. */
  noLowestRate: () => none('There is no lowest rate: a tone without guard or tolerance is usable at rates down to 0.'),
  /** There are usable rates, but none that 15 digits can write down. */
  rangesTooNarrow: () => none('The lowest usable ranges are narrower than a cell can show; give a guard or a tolerance.'),
} as const;
