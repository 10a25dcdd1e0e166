// What the section Plan says.

import { NAMES, type NameKey } from '../sentences';

const STANDS: Record<NameKey, string> = {
  name: 'Names', low: 'Low edges', high: 'High edges', centre: 'Centres', width: 'Widths', role: 'Roles', rate: 'Sample rate', guard: 'Guard', ppm: 'Clock tolerance',
};

const within = (text: string) => `“${[...text].length > 40 ? `${[...text].slice(0, 39).join('')}…` : text}”`;

export const sentences = {
  title: 'Plan',
  intro: 'Which cells hold the plan. The choice is stored in the workbook, as names that formulas can use.',
  labels: STANDS,
  hints: {
    name: 'one column, may stay blank', low: 'one column', high: 'one column', centre: 'one column', width: 'one column',
    role: 'wanted, unwanted or ignore; may stay blank', rate: 'one cell, in the unit of the columns', guard: 'one cell, in the unit of the columns; may stay blank', ppm: 'one cell, in ppm; may stay blank',
  } satisfies Record<NameKey, string>,
  edges: 'The edges of a band are given by',
  lowHigh: 'low and high',
  centreWidth: 'centre and width',
  columns: 'Columns',
  cells: 'Cells',
  useSelection: 'Use selection',
  useSelectionFor: (key: NameKey) => `Use selection for ${STANDS[key].toLowerCase()}`,
  newCell: 'New cell',
  newCellFor: (key: NameKey) => `New cell for ${STANDS[key].toLowerCase()}`,
  startsAt: (key: NameKey) => `${STANDS[key]} to begin with`,
  newLabels: { rate: 'Sample rate', guard: 'Guard', ppm: 'Clock tolerance' },
  find: 'Find the plan',
  apply: 'Use this plan',
  revert: 'Back to the stored plan',
  undo: 'Undo',
  extend: (row: number) => `Take in the rows down to ${row}`,

  // Why something was taken

  headed: (title: string, place: string) => `headed ${within(title)} in ${place}`,
  byContent: 'by what the cells hold',
  labelled: (label: string, place: string) => `beside ${within(label)} in ${place}`,
  named: (name: string) => `named ${name}`,
  unit: (unit: string) => `in ${unit}`,
  willBeWritten: (label: string, place: string) => `A label, ${within(label)}, and the value will be written to ${place}.`,

  // What was found

  found: (sheet: string, rows: number) => `Found on the sheet ${sheet}, ${rows === 1 ? 'one row' : `${rows} rows`}. Correct what is wrong, then use it.`,
  notFound: 'No plan was found: no headers name low and high edges, centres and widths, or frequencies. Select the cells of each column and press “Use selection”.',
  stored: 'This is the plan that the workbook holds.',
  changed: 'Changed, and not stored yet.',
  applied: 'Stored the plan in the workbook.',
  extended: (row: number) => `The plan now reaches down to row ${row}.`,
  undone: 'Undone: the workbook is as it was before.',
  ambiguous: (edge: string, taken: string, other: string) => `The header in ${other} would do for the ${edge === 'low' ? 'low edge' : 'centre'} as well; ${taken} was taken.`,
  unitsDiffer: (all: { key: NameKey; place: string; unit: string }[]) =>
    `The plan mixes units: ${all.map(({ key, place, unit }) => `${STANDS[key].toLowerCase()} (${place}) in ${unit}`).join(', ')}. All frequencies must be in one unit; bring them to one in the sheet.`,
  notFrequency: (key: NameKey, place: string, unit: string) => `${STANDS[key]}: ${place} is in ${unit}, which is no unit of frequency; point at another cell.`,
  notPpm: (place: string, unit: string) => `The clock tolerance in ${place} is in ${unit}; it must be in ppm. Convert it in the sheet.`,

  // What can't be used

  nothingSelected: 'No cells are selected; select some in the sheet first.',
  notAddress: (key: NameKey, text: string) => `${STANDS[key]}: ${within(text)} is no address of cells; write it like B8:B20 or Plan!B8:B20.`,
  needed: (key: NameKey) => `${STANDS[key]}: say where ${key === 'rate' ? 'it stands' : 'they stand'}, like ${key === 'rate' ? 'B3' : 'B8:B20'}.`,
  noSheet: (key: NameKey, sheet: string) => `${STANDS[key]}: the workbook has no sheet ${within(sheet)}.`,
  oneColumn: (key: NameKey, address: string) => `${STANDS[key]}: ${address} must be one column.`,
  oneCell: (key: NameKey, address: string) => `${STANDS[key]}: ${address} must be one cell.`,
  otherRows: (key: NameKey, address: string, rows: string) => `${STANDS[key]}: ${address} must be in the same rows as the edges, ${rows}.`,
  otherSheet: (key: NameKey, sheet: string) => `${STANDS[key]}: must be on the sheet ${sheet}, like the other columns.`,
  startNumber: (key: NameKey, text: string) => `${STANDS[key]} to begin with must be a number${key === 'rate' ? ' above 0' : ' of 0 or more'}; got ${within(text)}.`,
  notFree: (place: string) => `Nothing was written: ${place} is not blank any more. Press “New cell” again.`,
  isText: (key: NameKey, place: string, value: string) => `${STANDS[key]}: ${place} holds ${value} and no number.`,

  // What has changed since the plan was stored

  gone: (name: string) => `${name} stands for cells that were deleted. Point at ${NAMES_STAND(name)} again, under Plan.`,
  contradicts: (name: string, place: string, title: string) => `The header above ${name}, in ${place}, says ${within(title)}: look whether the name still stands for the right column, under Plan.`,
  renamed: (name: string, place: string, before: string, now: string) => `The header above ${name}, in ${place}, was ${within(before)} and is now ${now === '' ? 'blank' : within(now)}.`,
  rowsDiffer: (name: string, place: string, other: string, otherPlace: string) => `${name} (${place}) and ${other} (${otherPlace}) are not in the same rows.`,
  moreRows: (rows: number, row: number) => `${rows === 1 ? 'A row' : `${rows} rows`} below the plan, down to row ${row}, ${rows === 1 ? 'holds' : 'hold'} numbers too and ${rows === 1 ? 'is' : 'are'} not part of it; take them in under Plan.`,
} as const;

const NAMES_STAND = (name: string): string => Object.values(NAMES).find((one) => one.name === name)?.stands ?? 'them';
