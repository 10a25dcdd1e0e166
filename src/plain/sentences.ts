// What the plain copy says of itself.

/** Why a formula became a value: the end of "a value, because …". */
export const reasons = {
  noEquivalent: (name: string) => `no native formula does what ${name} does`,
  notNumber: 'an argument is no number',
  outOfRange: 'an argument is out of range',
  unknownWord: 'an argument is a word that is not known',
  missing: 'an argument is missing',
  count: (name: string) => `${name} takes another number of arguments`,
  together: 'its cells can only be computed together',
  sizes: 'its arguments do not have the size of the cells that it fills',
  random: 'an argument is drawn at random, and a native formula would draw it several times',
  long: 'the native formula would have more than 8192 characters',
  deep: 'the native formula would be nested more than 64 deep',
  lostName: (name: string) => `the name ${name} has no native form`,
} as const;

/** What is to be known of a formula that became native. */
export const notes = {
  rounds: 'Rounds at zone edges: see Rounding above.',
  repeats: 'An argument that is a longer expression is repeated.',
  cells: 'One formula for each cell; a longer column is not followed.',
  names: 'Refers to the cells that a spilled formula filled.',
} as const;

export const list = {
  sheet: 'Plain copy',
  columns: ['Sheet', 'Cells', 'Was', 'Became', 'Is now', 'Note'],
  /** In pixels. */
  widths: [110, 110, 280, 110, 420, 420],
  formula: 'native formula',
  value: 'value',
  reference: 'reference',
  removed: 'removed',
  values: (cells: number) => (cells === 1 ? 'its value' : `${cells} values`),
  because: (reason: string) => `Because ${reason}.`,
  name: (name: string) => `name ${name}`,
  nothing: 'The workbook had no FOLD formula.',
} as const;

/** What a reviewer needs to know a year later. */
export const record = (version: string, date: string): [string, string][] => [
  ['Made by', `Foldplan ${version}`],
  ['Date', date],
  ['What this is', 'A copy for programs without Foldplan. Each FOLD formula became a native formula with the same results, or its value; the list tells which.'],
  ['Guard', 'The smallest clear distance wanted between a wanted band and a zone edge, and between its image and any other image; in the unit of the frequencies.'],
  ['Tolerance', 'Parts per million (ppm) by which the sample rate may be off, either way; a margin is that of the worst case.'],
  ['Margin', 'The smaller distance from a band to the two edges of its zone, less the guard; negative where the band crosses an edge, by how much.'],
  ['Rounding', 'Native formulas compute in binary numbers. Where a result jumps, as at a zone edge, they round ratios to half the rate to 12 decimals: up to 1000 half rates that agrees with the exact answer on decimals of up to 12 digits, above that on fewer.'],
  ['Zone', 'Real sampling: counted from 1, each half a rate wide, even ones inverted. IQ sampling: counted from 0, each a rate wide. An edge counts to the zone above.'],
];
