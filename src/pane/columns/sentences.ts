// What the section Columns says, and what it writes into headers and notes.

const counted = (count: number, one: string, many = `${one}s`) => (count === 1 ? `one ${one}` : `${count} ${many}`);

export const sentences = {
  title: 'Columns',
  noPlan: 'Columns need a plan: choose its cells under Plan.',
  noTable: 'Columns need a plan whose columns lie in the same rows of one sheet; look under Plan.',
  results: 'Results',
  titles: {
    folded: 'Folded frequency', low: 'Folded low', high: 'Folded high', zone: 'Zone', inverted: 'Inverted', margin: 'Margin', check: 'Check',
  },
  hints: {
    folded: 'where the centre lands', low: 'lower end of the image', high: 'upper end of the image', zone: 'Nyquist zone of the centre', inverted: 'whether the spectrum is reversed',
    margin: 'to the zone’s edges, less guard and tolerance', check: 'clear, tight, crosses or too wide',
  },
  ways: 'Insert as',
  rows: 'one formula in every row',
  spilled: 'one formula for each column, which fills it',
  tableColumns: (table: string) => `columns of the table ${table}`,
  place: 'First column',
  placeHint: (place: string) => `next free: ${place}`,
  useSelection: 'Use selection',
  useSelectionFor: 'Use selection for the first column',
  names: (names: string[]) => `Use the workbook’s own names: ${names.join(', ')}`,
  preview: 'Preview',
  previewCaption: (rows: number, all: number) => (rows < all ? `First ${rows} of ${all} rows` : `All ${all === 1 ? 'of one row' : `${all} rows`}`),
  nameColumn: 'Name',
  formulas: 'Formulas of the first row',
  spilledFormulas: 'Formulas',
  insert: (count: number) => `Insert ${counted(count, 'column')}`,
  undo: 'Undo',
  nextFree: (letters: string) => `Take column ${letters} instead`,
  writeOver: 'Write over them',
  yes: 'TRUE',
  no: 'FALSE',

  // What can't be done

  nothingTicked: 'Tick a result first.',
  notColumn: (text: string) => `The first column must be letters such as K, or a cell such as K7; got “${[...text].slice(0, 40).join('')}”.`,
  otherSheet: (sheet: string) => `The columns go beside the plan, on the sheet ${sheet}; select a cell there.`,
  nothingSelected: 'No cells are selected; select some in the sheet first.',
  noRoom: (letters: string, count: number, last: string) => `From column ${letters} on there is no room for ${count} columns: the sheet ends with ${last}. Choose another first column.`,
  holdsPlan: (letters: string) => `Column ${letters} holds the plan itself; choose another first column.`,
  taken: (cells: string[], more: number) => `${cells.join(', ')}${more > 0 ? ` and ${counted(more, 'cell')} more` : ''} ${cells.length + more === 1 ? 'holds' : 'hold'} something already.`,
  notWritten: (sentence: string) => `Nothing was written: ${sentence}`,

  // What was done

  inserted: (count: number, place: string) => `Inserted ${counted(count, 'column')} at ${place}.`,
  undone: 'Undone: the workbook is as it was before.',
  errors: (cell: string, code: string, message: string | undefined, more: number) =>
    `${cell} shows ${code}${message ? `: ${message.replace(/\.$/, '')}` : code === '#NAME?' ? ': the worksheet functions, or a name in the formula, are not known here' : ''}.${more > 0 ? ` So ${more === 1 ? 'does one cell' : `do ${more} cells`} more.` : ''}`,

  // What is written

  withUnit: (title: string, unit: string | null) => (unit ? `${title} (${unit})` : title),
  note: (lines: string[]) => lines.join('\n'),
  meaning: (unit: string | null) => ({
    folded: `Where the centre of the band lands after sampling${inUnit(unit)}.`,
    low: `Lower end of the band’s image after sampling${inUnit(unit)}.`,
    high: `Upper end of the band’s image after sampling${inUnit(unit)}.`,
    zone: 'Nyquist zone of the band’s centre, counted from 1; zones are half the rate wide.',
    inverted: 'TRUE where the spectrum is reversed: in even zones.',
    margin: `Distance from the band to the nearer edge of its zone${inUnit(unit)}; negative where the band crosses it.`,
    check: 'clear; tight: fits, but not with guard and tolerance; crosses: the zone edge that lies in the band; too wide: no zone of this rate holds it.',
  }),
  guardNote: (guard: string | null) => (guard ? `The guard (${guard}) is taken off: the smallest clear distance wanted.` : 'No guard is taken off.'),
  ppmNote: (ppm: string | null) => (ppm ? `Worst case over the clock tolerance (${ppm}): the rate may be off by so many ppm either way.` : 'The clock is taken as exact.'),
  rateNote: (rate: string) => `At the sample rate in ${rate}.`,
  versionNote: (version: string) => `Foldplan ${version}`,
} as const;

const inUnit = (unit: string | null) => (unit ? `, in ${unit}` : '');
