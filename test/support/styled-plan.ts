// A plan as an engineer's own workbook: written by another library, with looks, notes and rules that Foldplan has no part in.

import ExcelJS from 'exceljs';
import type { Random } from './random';

export interface StyledPlan {
  bytes: Uint8Array;
  bands: { low: number; high: number }[];
  rate: number;
  guard: number;
  ppm: number;
}

/** Row of the first band, as the sheet counts. */
export const FIRST = 8;

/** What a formula shows before it is computed: no formula here gives it. */
export const STALE = -1;

/**
 * Sheets: Plan, with a band in each row, formulas of ours and native ones beside it, and a margin column that wants to spill from H8;
 * Clock tree, which has nothing to do with the plan; Summary, native formulas over the results.
 */
export async function styledPlan(rows: number, random: Random): Promise<StyledPlan> {
  const [rate, guard, ppm] = [245.76, 0.5, 20];
  const bands = Array.from({ length: rows }, () => {
    const low = random.decimal(random.whole(2, 7), random.whole(0, 3));
    return { low, high: Number((low + random.decimal(3, random.whole(-2, 1))).toPrecision(12)) };
  });
  const workbook = new ExcelJS.Workbook();
  workbook.creator = 'Receiver group';
  workbook.created = workbook.modified = new Date(Date.UTC(2026, 0, 1));
  planSheet(workbook, bands, { rate, guard, ppm });
  clockSheet(workbook);
  summarySheet(workbook, FIRST + rows - 1);
  for (const [name, place] of [['Rate', 'Plan!$B$3'], ['Guard', 'Plan!$B$4'], ['Ppm', 'Plan!$B$5'], ['Spare_Rate', "'Clock tree'!$B$2"]] as const) workbook.definedNames.add(place, name);
  return { bytes: new Uint8Array(await workbook.xlsx.writeBuffer()), bands, rate, guard, ppm };
}

function planSheet(workbook: ExcelJS.Workbook, bands: StyledPlan['bands'], inputs: { rate: number; guard: number; ppm: number }): void {
  const sheet = workbook.addWorksheet('Plan', { views: [{ state: 'frozen', xSplit: 1, ySplit: FIRST - 1 }], properties: { tabColor: { argb: 'FF2A6F7F' } } });
  sheet.columns = [28, 12, 12, 14, 8, 12, 12, 14, 14].map((width) => ({ width }));
  sheet.mergeCells('A1:I1');
  sheet.getCell('A1').value = { richText: [{ text: 'North mast ', font: { bold: true, size: 16 } }, { text: '& its bands <MHz>', font: { italic: true } }] };
  sheet.getRow(1).height = 30;
  for (const [row, label, value] of [[3, 'Sample rate', inputs.rate], [4, 'Guard', inputs.guard], [5, 'Clock tolerance', inputs.ppm]] as const) {
    sheet.getCell(row, 1).value = label;
    Object.assign(sheet.getCell(row, 2), { value, numFmt: '0.00###', fill: filled('FFFFF2CC'), border: { bottom: { style: 'thin' } } });
  }
  sheet.getCell('B3').note = 'Agreed with the clock group.';
  sheet.getCell('B3').dataValidation = { type: 'decimal', operator: 'greaterThan', formulae: [0], showErrorMessage: true, error: 'A rate is above 0.' };
  sheet.getRow(FIRST - 1).values = ['Band', 'Low', 'High', 'Folded low', 'Zone', 'Where', 'Width', 'Margin', 'Twice'];
  sheet.getRow(FIRST - 1).font = { bold: true, color: { argb: 'FFFFFFFF' } };
  sheet.getRow(FIRST - 1).fill = filled('FF2A6F7F');
  bands.forEach(({ low, high }, i) => {
    const row = FIRST + i;
    sheet.getRow(row).values = [
      `Band ${i + 1}`, low, high, formula(`_xldudf_FOLD_LOW(B${row},C${row},Rate)`), formula(`_xldudf_FOLD_ZONE((B${row}+C${row})/2,$B$3)`),
      formula(`IF(E${row}>3,"far","near")`), formula(`C${row}-B${row}`), null, formula(`2*H${row}`),
    ];
    for (const column of [2, 3, 4]) sheet.getCell(row, column).numFmt = '#,##0.000';
    if (i % 2 === 1) sheet.getRow(row).eachCell({ includeEmpty: true }, (cell) => Object.assign(cell, { fill: filled('FFE8F0F2') }));
  });
  const last = FIRST + bands.length - 1;
  sheet.getCell(FIRST, 8).value = formula(`_xldudf_FOLD_MARGIN(B${FIRST}:B${last},C${FIRST}:C${last},Rate,Guard,Ppm)`);
  sheet.addConditionalFormatting({ ref: `H${FIRST}:H${last}`, rules: [{ type: 'cellIs', operator: 'lessThan', formulae: [0], priority: 1, style: { font: { color: { argb: 'FF8F1D14' } } } }] });
  const mast = workbook.addImage({ base64: DOT, extension: 'png' });
  sheet.addImage(mast, { tl: { col: 10, row: 1 }, ext: { width: 20, height: 20 } });
}

function clockSheet(workbook: ExcelJS.Workbook): void {
  const sheet = workbook.addWorksheet('Clock tree');
  sheet.addRows([['Reference', 10], ['Spare rate', 250], ['Ratio', formula('B2/B1')]]);
  sheet.getCell('B2').font = { name: 'Courier New', size: 9 };
}

function summarySheet(workbook: ExcelJS.Workbook, last: number): void {
  const sheet = workbook.addWorksheet('Summary');
  sheet.addRows([
    ['Least margin', formula(`MIN(Plan!H${FIRST}:H${last})`)],
    ['Far bands', formula(`COUNTIF(Plan!F${FIRST}:F${last},"far")`)],
    ['Sum of low edges', formula(`SUM(Plan!B${FIRST}:B${last})`)],
    ['Spare at 70', formula('_xldudf_FOLD_FREQ(70,Spare_Rate)')],
  ]);
}

const formula = (text: string): ExcelJS.CellFormulaValue => ({ formula: text, result: STALE, date1904: false });

const filled = (argb: string): ExcelJS.Fill => ({ type: 'pattern', pattern: 'solid', fgColor: { argb } });

/** A picture of one pixel. */
const DOT = 'iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==';
