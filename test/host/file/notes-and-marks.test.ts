// Notes and marks on numbers below 0, written to a file and read again.

import ExcelJS from 'exceljs';
import { describe, expect, it } from 'vitest';
import { WorkbookFile, readWorkbook, writeWorkbook } from '../../../src/host/file';
import { type Workbook, NEGATIVE } from '../../../src/host/port';
import { sheetOf } from '../../support/workbook';
import { calculator } from './calculator';

/** Notes on two of three sheets, one of them on a cell that holds nothing. */
function noted(): Workbook {
  const [plan, blank, rates] = [sheetOf('Plan', [['Margin'], [-1], [2]]), sheetOf('Blank', []), sheetOf('Rates', [[100]])];
  return {
    sheets: [
      { ...plan, notes: { A1: 'Distance to the zone\'s edge, in MHz.\nNegative: <beyond> & by how much ✓ _x0041_', C9: '=1+1' }, marksNegative: ['A2:A3', 'C1'] }, blank,
      { ...rates, notes: { A1: 'MHz' } },
    ],
    names: {},
  };
}

describe('notes and marks in a file', () => {
  it('are the same when it is read again, and nothing is missed', async () => {
    const { workbook, notKept } = await readWorkbook(await writeWorkbook(noted()));
    expect(workbook).toEqual(noted());
    expect(notKept).toEqual([]);
  });

  it('are the same after a recalculation', async () => {
    const file = await WorkbookFile.open(await writeWorkbook(noted()));
    await file.recalculate(calculator);
    expect((await readWorkbook(await file.save())).workbook).toEqual(noted());
  });

  it('are what another reader finds', async () => {
    const book = new ExcelJS.Workbook();
    await book.xlsx.load((await writeWorkbook(noted())).buffer as ArrayBuffer);
    const plan = book.getWorksheet('Plan')!;
    expect(plan.getCell('A1').note).toContain('Negative: <beyond> & by how much ✓');
    expect(book.getWorksheet('Rates')!.getCell('A1').note).toBe('MHz');
    const { conditionalFormattings } = plan as unknown as { conditionalFormattings: unknown };
    expect(conditionalFormattings).toMatchObject(['A2:A3', 'C1'].map((ref) => ({
      ref, rules: [{ type: 'cellIs', operator: 'lessThan', formulae: ['0'], style: { font: { color: { argb: `FF${NEGATIVE.color.slice(1).toUpperCase()}` } } } }],
    })));
  });

  it('of another program are read: a note in several formats, and its own rules are said to be missed', async () => {
    const book = new ExcelJS.Workbook();
    const sheet = book.addWorksheet('Plan');
    sheet.getCell('B2').value = -1;
    sheet.getCell('B2').note = { texts: [{ text: 'Band ', font: { bold: true } }, { text: 'one' }] };
    sheet.addConditionalFormatting({ ref: 'B2:B9', rules: [{ type: 'cellIs', operator: 'lessThan', priority: 1, formulae: [0], style: { font: { bold: true } } }] });
    const { workbook, notKept } = await readWorkbook(new Uint8Array(await book.xlsx.writeBuffer()));
    expect(workbook.sheets[0]).toMatchObject({ notes: { B2: 'Band one' } });
    expect(workbook.sheets[0]).not.toHaveProperty('marksNegative');
    expect(notKept).toEqual(['conditional formats']);
  });
});
