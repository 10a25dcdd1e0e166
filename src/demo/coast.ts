// The plan that the workbench opens with: an invented observatory that listens to the coast with one converter. Its bands are public
// allocations, in MHz.

import type { Sheet, Workbook } from '../host/port';
import { FREQUENCY, HEADER, INPUT, type Line, NOTE, NUMBER_HEADER, TITLE, blanks, formula, look, sheet, styled } from './cells';
import { type BandOfPlan, planHeader, planLine } from './plan-lines';

export function coastPlan(): Workbook {
  return {
    sheets: [planSheet(), choiceSheet(), ratesSheet()],
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

const SIGNALS: BandOfPlan[] = [
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

const SUBTITLE = { bold: true };

const column = (letter: string) => `Plan!$${letter}$${FIRST}:$${letter}$${LAST}`;

function planSheet(): Sheet {
  const lines: Line[] = [];
  lines[1] = [styled('Gannet Ness coastal observatory: one converter on the mast', TITLE)];
  lines[2] = [styled('Frequencies in MHz. Change the rate and watch; an unwanted band matters where it folds onto a wanted one.', NOTE)];
  lines[3] = ['Sample rate', styled(409.6, { ...INPUT, numberFormat: '0.00####' }), 'MHz'];
  lines[4] = ['Guard', styled(0.02, { ...INPUT, numberFormat: '0.00####' }), 'MHz'];
  lines[5] = ['Clock tolerance', styled(20, INPUT), 'ppm'];
  lines[FIRST - 1] = planHeader('Signal');
  SIGNALS.forEach((signal, i) => {
    lines[FIRST + i] = planLine(FIRST + i, signal);
  });
  return sheet('Plan', lines, [176, 84, 84, 76, 100, 104, 52, 76, 80, 112], { rows: FIRST - 1, columns: 0 });
}

function choiceSheet(): Sheet {
  const lines: Line[] = [];
  lines[1] = [styled('Choosing a rate for the whole plan', TITLE)];
  lines[2] = ['From', styled(60, INPUT), 'MHz'];
  lines[3] = ['To', styled(1000, INPUT), 'MHz'];
  lines[4] = ['Step of the clock', styled(5.12, INPUT), 'MHz'];
  lines[6] = [
    styled('What the rate cell breaks', SUBTITLE), ...blanks(4), styled('Usable ranges', SUBTITLE), ...blanks(5), styled('Best rates on the step', SUBTITLE),
  ];
  lines[7] = [
    formula('=FOLD.CONFLICTS(Fold_Low,Fold_High,Rate,Fold_Role,Guard,Ppm,,,Fold_Name)', HEADER), ...blanks(4),
    formula('=FOLD.PLANRATES(Fold_Low,Fold_High,Fold_Role,B2,B3,Guard,Ppm)', NUMBER_HEADER), ...blanks(5),
    formula('=FOLD.RANKRATES(Fold_Low,Fold_High,B4,Fold_Role,B2,B3,Guard,Ppm,,,5)', NUMBER_HEADER),
  ];
  const made = sheet('Choosing a rate', lines, [144, 72, 128, 84, 28, 96, 96, 84, 96, 108, 28, 84, 108, 96, 196], { rows: 7, columns: 0 });
  look(made, [6, 6], [1, 2, 14], HEADER);
  look(made, [6, 6], [3, 6, 7, 8, 9, 12, 13], NUMBER_HEADER);
  look(made, [7, 40], [3, 5, 6, 7, 8, 11, 13], FREQUENCY);
  look(made, [7, 40], [9, 12], { numberFormat: '0.0' });
  return made;
}

function ratesSheet(): Sheet {
  const airband = `Plan!B${FIRST + 2},Plan!C${FIRST + 2}`;
  const lines: Line[] = [];
  lines[1] = [styled('Rates that hold the airband in one zone', TITLE), ...blanks(5), styled('What lands on one frequency', TITLE)];
  lines[2] = ['From', styled(60, INPUT), 'MHz', ...blanks(3), 'Seen at', styled(3.55, INPUT), 'MHz'];
  lines[3] = ['To', styled(300, INPUT), 'MHz', ...blanks(3), 'Up to', styled(1000, INPUT), 'MHz'];
  lines[5] = [formula(`=FOLD.RATES(${airband},B2,B3,Guard,Ppm)`, NUMBER_HEADER), ...blanks(5), formula('=FOLD.IMAGES(H2,Rate,0,H3)', NUMBER_HEADER)];
  const made = sheet('Rates and images', lines, [92, 100, 100, 84, 72, 40, 92, 84, 72], { rows: 5, columns: 0 });
  look(made, [4, 4], [1, 2, 3, 4, 7, 8], NUMBER_HEADER);
  look(made, [5, 29], [1, 2, 3, 6], FREQUENCY);
  return made;
}
