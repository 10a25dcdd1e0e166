// Every sentence and word that the pane shows stands here.

import { exactFigure } from './number-text';

/** A name of the plan and what it stands for. */
export interface NameOfPlan {
  name: string;
  stands: string;
}

export const NAMES = {
  name: { name: 'Fold_Name', stands: 'the column of band names' },
  low: { name: 'Fold_Low', stands: 'the column of low edges' },
  high: { name: 'Fold_High', stands: 'the column of high edges' },
  centre: { name: 'Fold_Centre', stands: 'the column of centres' },
  width: { name: 'Fold_Width', stands: 'the column of widths' },
  role: { name: 'Fold_Role', stands: 'the column of roles (wanted, unwanted or ignore)' },
  rate: { name: 'Fold_Rate', stands: 'the cell with the sample rate' },
  guard: { name: 'Fold_Guard', stands: 'the cell with the guard' },
  ppm: { name: 'Fold_Ppm', stands: 'the cell with the clock tolerance in ppm' },
} as const satisfies Record<string, NameOfPlan>;

/** What a name of the plan is called in the program. */
export type NameKey = keyof typeof NAMES;

/** A cell for a sentence: where it is and what it stands for. */
export interface CellPlace {
  place: string;
  what: string;
}

const at = ({ place, what }: CellPlace) => `${what} in ${place}`;

export const sentences = {
  // The plan as a whole

  noPlan: 'No plan is set up in this workbook yet: choose its cells under Plan.',
  missing: (names: NameOfPlan[]) => `The plan lacks ${list(names.map(({ stands, name }) => `${stands} (${name})`))}; choose ${names.length === 1 ? 'it' : 'them'} under Plan.`,
  noNames: 'No column of band names is chosen, so bands are called by their row; choose one under Plan.',
  noRoles: 'No column of roles is chosen, so every band counts as wanted; choose one under Plan.',
  noGuard: 'No cell is chosen for the guard, so it is taken as 0; choose one under Plan.',
  noBands: 'The plan holds no numbers yet; fill in the edges of a band, and the figures appear here.',
  noneReadable: 'No row of the plan can be drawn; the rows below say why.',
  notVector: (name: string, rows: number, columns: number) => `${name} must be one column; it is ${rows} rows by ${columns} columns.`,
  notSingle: (name: string, rows: number, columns: number) => `${name} must be one cell; it is ${rows} rows by ${columns} columns.`,
  lengthsDiffer: (lengths: { name: string; cells: number }[]) =>
    `The columns differ in length (${lengths.map(({ name, cells }) => `${name} ${cells}`).join(', ')}); rows are matched from the top.`,
  ratePositive: (cell: CellPlace, value: number) => `${upper(at(cell))} must be above 0; got ${exactFigure(value)}.`,
  guardRange: (cell: CellPlace, value: number) => `${upper(at(cell))} must be 0 or more; got ${exactFigure(value)}. It is taken as 0.`,
  ppmRange: (cell: CellPlace, value: number) => `${upper(at(cell))} must be from 0 to below 1000000; got ${exactFigure(value)}. It is taken as 0.`,
  takenAsZero: 'It is taken as 0.',
  pictureWaits: 'The picture needs it.',

  // One cell

  blank: (cell: CellPlace) => `${upper(at(cell))} is blank.`,
  notNumber: (cell: CellPlace, value: string) => `${upper(at(cell))} must be a number; got ${value}.`,
  cellError: (cell: CellPlace, code: string, message: string | undefined) => `${upper(at(cell))} shows ${code}${message ? `: ${message}` : '.'}`,
  widthNegative: (cell: CellPlace, value: number) => `${upper(at(cell))} must be 0 or more; got ${exactFigure(value)}.`,
  edgesReversed: (low: CellPlace, lowValue: number, high: CellPlace, highValue: number) =>
    `${upper(at(low))} must not be above ${at(high)}; got ${exactFigure(lowValue)} and ${exactFigure(highValue)}.`,
  unknownRole: (cell: CellPlace, value: string) => `${upper(at(cell))} must be wanted, unwanted or ignore; got ${value}. It is taken as wanted.`,
  zoneTooHigh: 'The band lies in a zone whose number is too high to draw.',
  unnamed: (place: string) => `band in ${place}`,

  // The host

  followsNot: (message: string) => `${message} The pane does not follow the sheet.`,
  lastPicture: (message: string) => `${message} What is shown is the last that could be read.`,
  failed: 'That did not work, and the reason is not known.',

  // The frame

  sections: 'Sections',
  reference: 'All worksheet functions',
  against: (count: number) => (count === 1 ? 'One thing speaks against it' : `${count} things speak against it`),
  unreadable: 'The plan could not be read.',

  // The rate in one line

  works: (rate: string) => `${rate} works: every wanted band is clear, and no image comes near it.`,
  worksNarrowly: (rate: string) => `${rate} works only without guard and clock tolerance.`,
  fails: (rate: string) => `${rate} does not work.`,
  nothingWanted: (rate: string) => `No band of the plan is wanted, so nothing speaks against ${rate}.`,
  facts: {
    rate: 'Rate',
    allowance: 'Guard, clock',
    wanted: 'Wanted bands',
    clear: 'clear',
    tight: 'tight',
    crossing: 'crossing',
    overlaps: 'Overlaps',
    near: 'Gaps below the guard',
    margin: 'Smallest margin',
  },
  allowance: (guard: string, ppm: string) => `${guard}, ±${ppm} ppm`,
  marginOf: (margin: string, name: string) => `${margin} (${name})`,
  asFarAsRead: (rows: number) => (rows === 1 ? 'One row could not be read.' : `${rows} rows could not be read.`),

  // What speaks against it

  tight: (name: string, margin: string) => `${name} is tight: its margin is ${margin}.`,
  crosses: (name: string, edge: string, margin: string) => `${name} crosses the zone edge ${edge}: its margin is ${margin}.`,
  tooWide: (name: string, margin: string) => `${name} is too wide for any zone of this rate: its margin is ${margin}.`,
  overlap: (first: string, second: string, by: string, low: string, high: string) =>
    `${first} and ${second} overlap by ${by}, at ${low === high ? low : `${low} to ${high}`}.`,
  drift: (first: string, second: string, gap: string, ppm: string) =>
    `${first} and ${second} come nearer than the guard within ±${ppm} ppm of the clock: ${gap.startsWith('-') ? `they overlap by ${gap.slice(1)}` : `${gap} apart`} at worst.`,
  near: (first: string, second: string, gap: string, guard: string) => `${first} and ${second} are ${gap} apart, less than the guard of ${guard}.`,
  andMore: (count: number) => `${count} more`,

  // The picture

  ladderTitle: (rate: string) => `Zone ladder at a rate of ${rate}`,
  ladderDescription: (half: string, verdict: string) =>
    `One rung for each zone that holds a band, ${half} wide, over a common axis of folded frequency from 0 to ${half}. Even zones run from right to left, ` +
    `so whatever lies on one vertical line lands on the same frequency. The lowest part is what the converter puts out. ${verdict}`,
  emptyZone: (zone: string) => `zone ${zone}: no band`,
  emptyZones: (from: string, to: string) => `zones ${from} to ${to}: no band`,
  filledZone: (zone: string, by: string) => `zone ${zone}: filled by ${by}`,
  filledZones: (from: string, to: string, by: string) => `zones ${from} to ${to}: filled by ${by}`,
  bands: (count: number) => `${count} bands`,
  beside: (state: string) => ` · ${state}`,
  numbered: (number: number) => `#${number}`,
  overlapMark: (by: string) => `overlap ${by}`,
  overlapsMark: (count: number) => `${count} overlaps`,
  selfMark: 'folds onto itself',
  legend: {
    wanted: 'wanted',
    unwanted: 'unwanted',
    tall: 'the taller end is the high edge',
    inverted: 'inverted zone',
    guard: 'guard',
    overlap: 'overlap',
  },
  heading: 'Zone ladder',
  headingRate: (rate: string) => `rate ${rate}`,
  zoneColumn: 'zone',
  output: 'Converter output, 0 to half the rate',

  readoutHint: 'Point at a band, or step through the picture with the arrow keys, for its figures.',

  // A band in one sentence, and in the table

  band: (band: { name: string; role: string; low: string; high: string; zone: string; inverted: boolean; imageLow: string; imageHigh: string; margin: string; check: string }) =>
    `${band.name}, ${band.role}: ${range(band.low, band.high)}. Zone ${band.zone}, ${band.inverted ? 'inverted' : 'not inverted'}, ` +
    `lands on ${range(band.imageLow, band.imageHigh)}. Margin ${band.margin}, ${band.check}.`,
  tableSummary: (rows: number) => (rows === 1 ? 'The figures of the band' : `The figures of all ${rows} rows`),
  tableCaption: (rate: string) => `Bands of the plan at a rate of ${rate}`,
  tableCaptionWithoutRate: 'Bands of the plan',
  columns: ['#', 'Name', 'Role', 'Low', 'High', 'Zone', 'Inverted', 'Folded low', 'Folded high', 'Margin', 'Check'],
  yes: 'yes',
  no: 'no',
} as const;

/** A name that may be written from right to left, so that it leaves the order of the words around it alone. */
export const isolated = (name: string): string => (RIGHT_TO_LEFT.test(name) ? `\u2068${name}\u2069` : name);

const RIGHT_TO_LEFT = /[\u0590-\u08ff\u200f\ufb1d-\ufdff\ufe70-\ufefc]|[\u{10800}-\u{10fff}]|[\u{1e800}-\u{1efff}]/u;

const range = (low: string, high: string) => (low === high ? low : `${low} to ${high}`);

const list = (words: string[]) => (words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`);

const upper = (sentence: string) => sentence.charAt(0).toUpperCase() + sentence.slice(1);
