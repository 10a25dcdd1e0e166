// The plan that the workbench opens with: an invented observatory that listens to the coast with one converter. Its bands are public
// allocations, in MHz.

import type { Cell, Sheet, Style, Workbook } from './host/port';

export const demoPlanName = 'Gannet Ness.xlsx';

export function demoPlan(): Workbook {
  return {
    sheets: [planSheet(), ratesSheet()],
    names: {
      Rate: 'Plan!$B$3',
      Guard: 'Plan!$B$4',
      Ppm: 'Plan!$B$5',
      Fold_Name: column('A'),
      Fold_Low: column('B'),
      Fold_High: column('C'),
      Fold_Role: column('D'),
      Fold_Rate: 'Plan!$B$3',
      Fold_Guard: 'Plan!$B$4',
      Fold_Ppm: 'Plan!$B$5',
    },
  };
}

const SIGNALS: [name: string, low: number, high: number, role: 'wanted' | 'unwanted'][] = [
  ['Reference clock, 10 MHz', 10, 10, 'unwanted'],
  ['FM broadcasting', 87.5, 108, 'unwanted'],
  ['Airband voice', 117.975, 137, 'wanted'],
  ['Marine channel 16', 156.7625, 156.8375, 'wanted'],
  ['Ship identification, AIS 1', 161.9625, 161.9875, 'wanted'],
  ['Ship identification, AIS 2', 162.0125, 162.0375, 'wanted'],
  ['DAB, band III', 174, 240, 'unwanted'],
  ['Distress beacons', 406, 406.1, 'wanted'],
  ['E-UTRA band 20', 791, 821, 'unwanted'],
  ['ISM 915', 902, 928, 'unwanted'],
  ['ADS-B', 1089, 1091, 'wanted'],
  ['GPS L2C', 1226.577, 1228.623, 'wanted'],
  ['GPS L1 C/A', 1574.397, 1576.443, 'wanted'],
];

/** Row of the first signal, as the sheet counts. */
const FIRST = 8;
const LAST = FIRST + SIGNALS.length - 1;

const column = (letter: string) => `Plan!$${letter}$${FIRST}:$${letter}$${LAST}`;

function planSheet(): Sheet {
  const lines: Line[] = [];
  lines[1] = [styled('Gannet Ness coastal observatory: one converter on the mast', TITLE)];
  lines[2] = [styled('Frequencies in MHz. Change the rate and watch; an unwanted band matters where it folds onto a wanted one.', NOTE)];
  lines[3] = ['Sample rate', styled(409.6, { ...INPUT, numberFormat: '0.00####' }), 'MHz'];
  lines[4] = ['Guard', styled(0.02, { ...INPUT, numberFormat: '0.00####' }), 'MHz'];
  lines[5] = ['Clock tolerance', styled(20, INPUT), 'ppm'];
  lines[FIRST - 1] = [
    ...['Signal', 'Low', 'High', 'Role', 'Folded low', 'Folded high', 'Zone', 'Inverted', 'Margin', 'Check'].map((title, i) => styled(title, i === 0 || i === 3 || i === 9 ? HEADER : NUMBER_HEADER)),
  ];
  SIGNALS.forEach(([name, low, high, role], i) => {
    const row = FIRST + i;
    const band = `B${row},C${row},Rate`;
    lines[row] = [
      name, styled(low, FREQUENCY), styled(high, FREQUENCY), role,
      formula(`=FOLD.LOW(${band})`, FREQUENCY), formula(`=FOLD.HIGH(${band})`, FREQUENCY),
      formula(`=FOLD.ZONE((B${row}+C${row})/2,Rate)`), formula(`=FOLD.INVERTED((B${row}+C${row})/2,Rate)`, { horizontal: 'right' }),
      formula(`=FOLD.MARGIN(${band},Guard,Ppm)`, FREQUENCY), formula(`=FOLD.CHECK(${band},Guard,Ppm)`),
    ];
  });
  return sheet('Plan', lines, [176, 84, 84, 76, 92, 92, 48, 72, 76, 104], { rows: FIRST - 1, columns: 0 });
}

function ratesSheet(): Sheet {
  const airband = `Plan!B${FIRST + 2},Plan!C${FIRST + 2}`;
  const lines: Line[] = [];
  lines[1] = [styled('Rates that hold the airband in one zone', TITLE), ...blanks(5), styled('What lands on one frequency', TITLE)];
  lines[2] = ['From', styled(60, INPUT), 'MHz', ...blanks(3), 'Seen at', styled(3.55, INPUT), 'MHz'];
  lines[3] = ['To', styled(300, INPUT), 'MHz', ...blanks(3), 'Up to', styled(1000, INPUT), 'MHz'];
  lines[5] = [formula(`=FOLD.RATES(${airband},B2,B3,Guard,Ppm)`, NUMBER_HEADER), ...blanks(5), formula('=FOLD.IMAGES(H2,Rate,0,H3)', NUMBER_HEADER)];
  const listed = sheet('Rates and images', lines, [92, 100, 100, 84, 72, 40, 92, 84, 72], { rows: 5, columns: 0 });
  for (const [first, count] of [[1, 4], [7, 2]] as const) for (let c = first; c < first + count; c++) put(listed, 4, c, { value: null, style: NUMBER_HEADER });
  for (let r = 5; r < 30; r++) for (const c of [1, 2, 3, 6]) put(listed, r, c, { value: null, style: FREQUENCY });
  return listed;
}

// Cells

type Line = (string | number | null | Cell)[];

const FREQUENCY: Style = { numberFormat: '0.0000' };
const TITLE: Style = { bold: true, fontSize: 14 };
const NOTE: Style = { italic: true, color: '#5c6670' };
const INPUT: Style = { fill: '#fff6dc', border: { bottom: { style: 'thin', color: '#b8860b' } } };
const HEADER: Style = { bold: true, fill: '#dfe9ee', border: { bottom: { style: 'thin', color: '#41616f' } } };
const NUMBER_HEADER: Style = { ...HEADER, horizontal: 'right' };

const styled = (value: string | number, style: Style): Cell => ({ value, style });

const formula = (text: string, style?: Style): Cell => ({ value: null, formula: text, ...(style && { style }) });

const blanks = (count: number): null[] => new Array<null>(count).fill(null);

/** @param lines by row as the sheet counts, from 1 */
function sheet(name: string, lines: Line[], widths: number[], frozen: Sheet['frozen']): Sheet {
  const made: Sheet = {
    name, cells: {}, columns: Object.fromEntries(widths.map((width, i) => [i, { width }])), rows: { 0: { height: 28 } }, merges: [], frozen,
  };
  lines.forEach((line, row) => line.forEach((cell, c) => {
    if (cell !== null) put(made, row - 1, c, typeof cell === 'object' ? cell : { value: cell });
  }));
  return made;
}

const put = (target: Sheet, row: number, column: number, cell: Cell): void => {
  (target.cells[row] ??= {})[column] = cell;
};
