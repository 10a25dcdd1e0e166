// Ten workbooks of different shapes, each full of formulas of ours.

import ExcelJS from 'exceljs';
import { writeWorkbook } from '../../src/host/file';
import type { Style, Workbook } from '../../src/host/port';
import { type Given, planOf, sheetOf } from '../support/workbook';

const BANDS = [['A', 10, 12], ['B', 60, 90], ['C', 100, 102.5], ['D', null, null], ['E', 130.1, 140.2], ['F', 399.9, 410]] as const;

/** Rows of bands from row 2 on, each with formulas; `#` stands for the row. */
const bandRows = (titles: string[], ...formulas: string[]): Given[][] => [
  ['Band', 'Low', 'High', ...titles],
  ...BANDS.map(([name, low, high], i): Given[] => [name, low, high, ...formulas.map((formula) => formula.replaceAll('#', String(i + 2)))]),
];

const LAST = BANDS.length + 1;
const INPUTS: Given[] = ['Rate', 245.76, 'Guard', 0.5, 'Ppm', 20, 'Sampling', 'real'];

/** The inputs stand below the bands. */
function withInputs(rows: Given[][], names: Record<string, string> = {}): Workbook {
  const workbook = planOf(rows, { Rate: 'Plan!$B$20', Guard: 'Plan!$D$20', Ppm: 'Plan!$F$20', Sampling: 'Plan!$H$20', Empty: 'Plan!$Z$99', ...names });
  workbook.sheets[0]!.cells[19] = sheetOf('', [INPUTS]).cells[0]!;
  return workbook;
}

const styled = (workbook: Workbook, style: Style, isStyled: (row: number, column: number) => boolean): Workbook => {
  for (const [row, line] of Object.entries(workbook.sheets[0]!.cells)) {
    for (const [column, cell] of Object.entries(line)) if (isStyled(Number(row), Number(column))) cell.style = style;
  }
  return workbook;
};

/** Some programs show TRUE as 1 in a cell that is formatted as a number. */
const INVERTED = 5;

export const WORKBOOKS: Record<string, () => Promise<Uint8Array>> = {
  'formulas filled down, with formats': () => writeWorkbook(styled(withInputs(bandRows(
    ['Folded', 'Zone', 'Inverted', 'Low', 'High', 'Margin', 'Check'],
    '=FOLD.FREQ(B#,Rate)', '=FOLD.ZONE(B#,$B$20)', '=FOLD.INVERTED($B#,B$20)', '=FOLD.LOW(B#,C#,Rate)', '=FOLD.HIGH(B#,C#,Rate)',
    '=FOLD.MARGIN(B#,C#,Rate,Guard,Ppm)', '=FOLD.CHECK(B#,C#,Rate,Guard,Ppm,Sampling)',
  )), { numberFormat: '0.000', bold: true, fill: '#dfe9ee' }, (row, column) => row > 0 && row % 2 === 0 && column > 2 && column !== INVERTED)),

  'columns that spill, and formulas that refer to them': () => writeWorkbook(withInputs([
    ['Band', 'Low', 'High', 'Zone', 'Margin', 'Twice', 'Most', 'Sum'],
    ...BANDS.map(([name, low, high], i): Given[] => [name, low, high, ...(i > 0 ? [] : [
      '=FOLD.ZONE(Low,Rate)', `=FOLD.MARGIN(B2:B${LAST},C2:C${LAST},Rate,Guard,Empty)`, `=FOLD.FREQ(B2:B${LAST},Rate)*2+1`, '=MAX(D2#)', '=SUM(Margins)+COUNT(F2#)',
    ])]),
  ], { Low: `Plan!$B$2:$B$${LAST}`, Margins: 'Plan!$E$2#' })),

  'functions of ours inside larger formulas': () => writeWorkbook(withInputs(bandRows(
    ['Where', 'Nested', 'Text', 'Local'],
    '=IF(FOLD.ZONE(B#,Rate)>3,"far",IF(B#="","-","near"))', '=FOLD.FREQ(FOLD.FREQ(B#*2,Rate)+1,Rate/4)', '="zone "&FOLD.ZONE((B#+C#)/2,Rate)&", ""FOLD.ZONE"""',
    '=ROUND(SUM(FOLD.LOW(B#,C#,Rate),FOLD.HIGH(B#,C#,Rate))/2,6)',
  ))),

  'several sheets': () => {
    const workbook = withInputs(bandRows(['Zone'], "=FOLD.ZONE(B#,'Clock''s tree'!$A$1)"));
    workbook.sheets.push(sheetOf("Clock's tree", [[100, '=FOLD.MINRATE(Plan!B3,Plan!C3,Guard,Ppm)']]), sheetOf('Σ & <sum>', [['=SUM(Plan!D2:D4)', "=FOLD.GAP(Plan!B2,Plan!C2,Plan!B3,Plan!C3,'Clock''s tree'!A1)"]]), sheetOf('Plain copy', [['taken']]));
    return writeWorkbook(workbook);
  },

  'tables of results': () => writeWorkbook(withInputs([
    ['=FOLD.BAND(B12:B14,C12:C14,Rate,Guard,Ppm)', null, null, null, null, null, null, '=INDEX(FOLD.RATES(B13,C13),2,2)', '=SUM(FOLD.FREQ(B12:B14,Rate))', '=FOLD.HEADROOM(B12,C12,Rate)'],
    ...Array.from({ length: 10 }, (): Given[] => []),
    ['A', 10, 12], ['B', 60, 90], ['C', 300, 310],
  ])),

  'names that stand for formulas': () => writeWorkbook(withInputs([
    ['Band', 'Low', '=Here*2', '=Lowest+1', '=FOLD.ZONE(Here,Rate)'],
  ], { Here: 'FOLD.FREQ(70,Rate)', Lowest: 'INDEX(FOLD.RATES(60,90),2,2)' })),

  'mistakes and blanks': () => writeWorkbook(withInputs([
    ['fast', '=FOLD.FREQ(A1,Rate)', '=FOLD.MARGIN(90,60,Rate)', '=FOLD.MINRATE(-1,2)', '=FOLD.ZONE(A1:A6,Rate)'],
    [70, '=FOLD.FREQ(A2,0)', '=FOLD.CHECK(A2,80,Rate,-1)', '=FOLD.TOLERANCE(A2,80,Rate,Guard,"both")'],
    ['=1/0', '=FOLD.FREQ(A3,Rate)', '=IFERROR(FOLD.FREQ(A3,Rate),"none")', '=FOLD.NONE(1)'],
    [null, '=FOLD.FREQ(A4,Rate)', '=FOLD.LOW(A4,A4,Rate)', '=FOLD.GAP(A4,A4,1,2,Rate)'],
    [80, '=FOLD.FREQ(A5,Rate,Empty)', '=FOLD.MARGIN(A5,A5+2,Rate,Empty,Empty,Empty)', '=FOLD.CHECK(A5,A5+200,Rate)'],
    [0, '=FOLD.FREQ(A6,Rate)', '=FOLD.MARGIN(A6,20,Rate,1)', '=FOLD.CHECK(-2,20,Rate)'],
  ])),

  'the noise budget': () => writeWorkbook(withInputs([
    ['Frequency', 70, 0.0000005, 12, 14.25, 40],
    ['=FOLD.JITTERSNR(B1,C1)', '=FOLD.JITTERLIMIT(B1,64)', '=FOLD.QUANTSNR(D1)', '=FOLD.QUANTSNR(D1:E1,Rate,Empty)', null, '=FOLD.ENOB(B1)', '=FOLD.NOISEFOLD(4,F1)', '=FOLD.NOISEFOLD(3)'],
    ['=FOLD.DROOP(B1,Rate)', '=FOLD.DROOP(B1,Rate,"rz")', '=FOLD.DROOP(B1,Rate,"doublet")', '=FOLD.DROOP(Rate,Rate)', '=FOLD.SUMSNR(70,70)', '=FOLD.COHERENT(10,Rate,1024)', '=FOLD.DROOP(0,Rate)'],
  ])),

  'IQ sampling, mirrors and bands from 0': () => writeWorkbook(withInputs([
    [-70, -60, '=FOLD.ZONE(A1,Rate,"iq")', '=FOLD.FREQ(A1,Rate,I1)', '=FOLD.LOW(A1,B1,40,I1)', '=FOLD.HIGH(A1,B1,40,I1)', '=FOLD.MARGIN(A1,B1,40,0.5,100,I1)', '=FOLD.CHECK(A1,B1,40,0.5,100,"iq")', ' IQ '],
    [0, 20, '=FOLD.MARGIN(A2,B2,40)', '=FOLD.CHECK(A2,B2,40,,100)', '=FOLD.MINRATE(A2,B2)', '=FOLD.TOLERANCE(A2,B2,50)', '=FOLD.GAP(A1,B1,A2,B2,40,"iq")', '=FOLD.MINRATE(A1,B1,,10,"iq")'],
    [-20, -10, '=FOLD.ZONE(A3,20)', '=FOLD.INVERTED(A3,20)', '=FOLD.MARGIN(A3,B3,20)', '=FOLD.CHECK(A3,B3,20)', '=FOLD.LOW(A3,B3,20)', '=FOLD.HIGH(A3,B3,20)'],
  ])),

  'a structured table of another library': tableWorkbook,
};

async function tableWorkbook(): Promise<Uint8Array> {
  const workbook = new ExcelJS.Workbook();
  workbook.created = workbook.modified = new Date(Date.UTC(2026, 0, 1));
  const sheet = workbook.addWorksheet('Bands');
  const computed = (formula: string): ExcelJS.CellFormulaValue => ({ formula, result: 0, date1904: false });
  const rows = BANDS.map(([name, low, high]) => [name, low, high, computed('_xldudf_FOLD_ZONE(Bands[[#This Row],[Low]],Rate)'), computed('IF(_xldudf_FOLD_MARGIN(Bands[[#This Row],[Low]],Bands[[#This Row],[High]],Rate)<0,"bad","good")')]);
  sheet.addTable({ name: 'Bands', ref: 'B3', headerRow: true, style: { theme: 'TableStyleMedium2', showRowStripes: true }, columns: ['Band', 'Low', 'High', 'Zone', 'Fit'].map((name) => ({ name })), rows });
  sheet.getCell('B1').value = 122.88;
  sheet.getCell('B1').numFmt = '0.00';
  sheet.getCell('I1').value = computed('_xldudf_FOLD_FREQ(SUM(Bands[Low]),Rate)');
  sheet.mergeCells('I3:J3');
  sheet.addConditionalFormatting({ ref: 'C4:D9', rules: [{ type: 'expression', priority: 1, formulae: ['_xldudf_FOLD_ZONE($C4,Rate)>2'], style: { font: { bold: true } } }] });
  sheet.getCell('C4').note = 'Measured.';
  workbook.definedNames.add('Bands!$B$1', 'Rate');
  return new Uint8Array(await workbook.xlsx.writeBuffer());
}
