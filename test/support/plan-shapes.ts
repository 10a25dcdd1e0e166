// Plans of five shapes. All hold the same bands, so that the same results are due.

import type { Given } from './workbook';

export interface Shape {
  rows: Given[][];
  /** The address of the structured table, where the program has such tables. */
  table?: string;
  /** The names that the plan is stored under. */
  names: Record<string, string>;
  /** The first formula, by the addresses of cells and, in a structured table, by its column names. */
  formula: string;
  tableFormula?: string;
  /** The cell that it stands in: row and column from 0. */
  at: [row: number, column: number];
  rateCell: string;
  guard?: number;
}

export const BANDS = [
  { name: 'Airband', low: 118, high: 137 },
  { name: 'AIS', low: 161.9625, high: 162.0375 },
  { name: 'Amateur', low: 144, high: 146 },
] as const;

/** The rate that every plan begins with. */
export const RATE = 280;

/** What speaks against rates, the worst first: worked by hand. A guard of 0.5 changes nothing of it. */
export const OBJECTIONS: Record<number, string[]> = {
  280: ['Airband and Amateur overlap by 3.', 'Airband and AIS overlap by 0.0375.'], // 280 − 146 = 134 < 137; 280 − 161.9625 = 118.0375 > 118
  245.76: ['Airband crosses the zone edge 122.88 by 4.88.'], // 122.88 − 118 < 137 − 122.88
};

/** Rates between these work with any guard up to 2: 300 lands Airband on 118 to 137, AIS on 137.9625 to 138.0375, Amateur on 144 to 146. */
export const USABLE = { from: 299.0375, to: 305.9625 };

const edges = (row: Given[] = []): Given[][] => BANDS.map(({ name, low, high }) => [...row, name, low, high]);
const around = (): Given[][] => BANDS.map(({ name, low, high }) => [name, (low + high) / 2, high - low]);

export const SHAPES: [what: string, shape: Shape][] = [
  ['low and high', {
    rows: [['Sample rate', RATE], [], ['Name', 'Low', 'High'], ...edges()],
    names: { Fold_Name: 'Plan!$A$4:$A$6', Fold_Low: 'Plan!$B$4:$B$6', Fold_High: 'Plan!$C$4:$C$6', Fold_Rate: 'Plan!$B$1' },
    formula: '=FOLD.LOW(B4,C4,Fold_Rate)', at: [3, 3], rateCell: 'B1',
  }],
  ['centre and width', {
    rows: [['fs', RATE, 'MHz'], [], ['Channel', 'Centre (MHz)', 'BW (MHz)'], ...around()],
    names: { Fold_Name: 'Plan!$A$4:$A$6', Fold_Centre: 'Plan!$B$4:$B$6', Fold_Width: 'Plan!$C$4:$C$6', Fold_Rate: 'Plan!$B$1' },
    formula: '=FOLD.LOW(B4-C4/2,B4+C4/2,Fold_Rate)', at: [3, 3], rateCell: 'B1',
  }],
  ['units in the headers, and a guard', {
    rows: [['Signal', 'f_low / MHz', 'f_high / MHz'], ...edges(), [], ['Sampling rate (MS/s)', RATE], ['Guard (MHz)', 0.5]],
    names: { Fold_Name: 'Plan!$A$2:$A$4', Fold_Low: 'Plan!$B$2:$B$4', Fold_High: 'Plan!$C$2:$C$4', Fold_Rate: 'Plan!$B$6', Fold_Guard: 'Plan!$B$7' },
    formula: '=FOLD.LOW(B2,C2,Fold_Rate)', at: [1, 3], rateCell: 'B6', guard: 0.5,
  }],
  ['the columns of a table, with others among them', {
    rows: [
      ['No.', 'Service', 'From [MHz]', 'Via', 'To [MHz]', 'Use', 'Remark'],
      ...BANDS.map(({ name, low, high }, i) => [i + 1, name, low, null, high, 'wanted', 'checked']),
      [], ['Rate', RATE],
    ],
    table: 'Plan!A1:G4',
    names: { Fold_Name: 'Plan!$B$2:$B$4', Fold_Low: 'Plan!$C$2:$C$4', Fold_High: 'Plan!$E$2:$E$4', Fold_Role: 'Plan!$F$2:$F$4', Fold_Rate: 'Plan!$B$6' },
    formula: '=FOLD.LOW(C2,E2,Fold_Rate)', tableFormula: "=FOLD.LOW([@[From '[MHz']]],[@[To '[MHz']]],Fold_Rate)", at: [1, 7], rateCell: 'B6',
  }],
  ['a title above, from C7 on', {
    rows: [[], [null, null, 'Receiver plan'], [null, null, 'Sample rate', RATE], [], [], [], [null, null, 'Name', 'Lower edge', 'Upper edge'], ...edges([null, null])],
    names: { Fold_Name: 'Plan!$C$8:$C$10', Fold_Low: 'Plan!$D$8:$D$10', Fold_High: 'Plan!$E$8:$E$10', Fold_Rate: 'Plan!$D$3' },
    formula: '=FOLD.LOW(D8,E8,Fold_Rate)', at: [7, 5], rateCell: 'D3',
  }],
];
