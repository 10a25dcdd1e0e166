import { describe, expect, it } from 'vitest';
import { calculate } from '../../../src/host/sheet/calculate';
import { built } from '../../support/built-functions';
import { type Given, planOf, sheetOf, valuesOf } from '../../support/workbook';

/** Values of the one sheet once it is calculated. */
async function calculated(rows: Given[][], names: Record<string, string> = {}) {
  const workbook = await calculate(planOf(rows, names), built);
  return valuesOf(workbook.sheets[0]!);
}

describe('a workbook recalculated without a window', () => {
  it('computes our functions and native ones that depend on them', async () => {
    expect(await calculated([
      [100, '=FOLD.FREQ(70,A1)', '=B1*2', '=IF(FOLD.INVERTED(70,A1),"mirrored","straight")'],
      [70, '=FOLD.ZONE(A2,A1)', '=SUM(B1:B2)', '=FOLD.CHECK(60,90,A1)'],
    ])).toEqual([
      [100, 30, 60, 'mirrored'],
      [70, 2, 32, 'clear'],
    ]);
  });

  it('keeps every digit of a result', async () => {
    expect(await calculated([['=FOLD.FREQ(0.3,0.2)', 1227.60000000001, '=FOLD.FREQ(B1,100)', '=FOLD.FREQ(3.14159265358979,100)']])).toEqual([
      [0.1, 1227.60000000001, 27.60000000001, 3.14159265358979],
    ]);
  });

  it('gives arguments left out as left out, in the middle and at the end', async () => {
    expect(await calculated([['=FOLD.MARGIN(60,90,100,,1000)', '=FOLD.MARGIN(60,90,100,1)', '=FOLD.MARGIN(60,90,100,,,"real")']])).toEqual([[9.9, 9, 10]]);
  });

  it('reads ranges, array constants and results of other functions as arguments', async () => {
    expect(await calculated([
      [70, 30, '=FOLD.FREQ({70,80},100)', null, '=SUM(FOLD.FREQ(A1:A2,100))'],
      [80, '', '=FOLD.FREQ(A1+A2,100)', '=FOLD.FREQ(A1:A2,100)'],
    ])).toEqual([
      [70, 30, 30, 20, 50],
      [80, '', 50, 30, null],
      [null, null, null, 20, null],
    ]);
  });

  it('tells how much a formula fills, and empties what it no longer fills', async () => {
    const before = planOf([
      [70, { value: 1, formula: '=FOLD.FREQ(A1:A3,100)', spill: { rows: 5, columns: 1 } }],
      [80, 2], [90, 3], [null, { value: 4, style: { bold: true } }], [null, 5],
    ]);
    const [sheet] = (await calculate(before, built)).sheets;
    expect(sheet!.cells[0]![1]).toEqual({ value: 30, formula: '=FOLD.FREQ(A1:A3,100)', spill: { rows: 3, columns: 1 } });
    expect([1, 2, 3, 4].map((row) => sheet!.cells[row]![1])).toEqual([{ value: 20 }, { value: 10 }, { value: null, style: { bold: true } }, { value: null }]);
  });

  it('says so where a result does not fit', async () => {
    expect(await calculated([['=FOLD.FREQ({70;80},100)'], ['in the way']])).toEqual([[{ error: '#SPILL!' }], ['in the way']]);
  });

  it('follows blocks that are made from blocks, however deep and in whatever order', async () => {
    const column = (letter: string, last: number) => `=FOLD.FREQ(${letter}2:${letter}${last},1000)`;
    expect(await calculated([
      ['=SUM(A4:A5)', column('C', 5), column('D', 6), column('E', 7), column('F', 8), 1],
      ['=FOLD.FREQ(B2:B4,1000)', null, null, null, null, 2],
      [null, null, null, null, null, 3], [null, null, null, null, null, 4], [null, null, null, null, null, 5], [null, null, null, null, null, 6],
      [null, null, null, null, null, 7], [null, null, null, null, null, 8],
    ])).toEqual([
      [8, 5, 4, 3, 2, 1],
      [6, 6, 5, 4, 3, 2],
      [7, 7, 6, 5, 4, 3],
      [8, 8, 7, 6, 5, 4],
      [null, null, 8, 7, 6, 5],
      [null, null, null, 8, 7, 6],
      [null, null, null, null, 8, 7],
      [null, null, null, null, null, 8],
    ]);
  });

  it('comes to an end where a block changes whenever it is computed', async () => {
    const [row] = await calculated([['=RANDARRAY(2,1)', '=FOLD.FREQ({70;80},100)']]);
    expect(row![1]).toBe(30);
  });

  it('keeps an error in its row, and tells the sentence behind each of ours', async () => {
    const sentence = 'frequency must be a number; got "fast".';
    expect(await calculated([
      [70, '=FOLD.FREQ(A1:A4,100)', '=FOLD.FREQ(A1,100)'],
      ['fast', null, '=FOLD.FREQ(A2,100)'],
      ['=1/0', null, '=FOLD.FREQ(A3,100)'],
      [80, null, '=FOLD.FREQ(A4,100)'],
    ])).toEqual([
      [70, 30, 30],
      ['fast', { error: '#VALUE!', message: sentence }, { error: '#VALUE!', message: sentence }],
      [{ error: '#DIV/0!' }, { error: '#DIV/0!' }, { error: '#DIV/0!' }],
      [80, 20, 20],
    ]);
  });

  it('tells the sentence of a function inside another, and none where the error is caught', async () => {
    expect(await calculated([
      ['=FOLD.FREQ(FOLD.FREQ("fast",100),100)', '=IFERROR(FOLD.FREQ("fast",100),0)', '=FOLD.RATES(2,1)', '=FOLD.FREQ(70)', '=FOLD.NONE(1)', '=FOLD.FREQ(Gone!A1,100)'],
    ])).toEqual([[
      { error: '#VALUE!', message: 'frequency must be a number; got "fast".' },
      0,
      { error: '#VALUE!', message: 'low must not be above high; got 2 and 1.' },
      { error: '#VALUE!', message: 'FOLD.FREQ takes 2 to 3 arguments; got 1.' },
      { error: '#NAME?' },
      { error: '#REF!' },
    ]]);
  });

  it('tells the sentence where the cause is a cell that another formula fills', async () => {
    expect(await calculated([
      [1, '=IF(A1:A2=1,70,"fast")', '=FOLD.FREQ(B2,100)', '=FOLD.FREQ(B1:B2,100)'],
      [2],
    ])).toEqual([
      [1, 70, { error: '#VALUE!', message: 'frequency must be a number; got "fast".' }, 30],
      [2, 'fast', null, { error: '#VALUE!', message: 'frequency must be a number; got "fast".' }],
    ]);
  });

  it('tells names from functions that are spelled like them', async () => {
    expect(await calculated(
      [['=FOLD.FREQ(70,Rate)', 100, '=RATE(10,-100,800)', '=Rate*2', '="Rate "&rate', '=SUM(Rate,Sum)'], [7]],
      { Rate: 'Plan!$B$1', Sum: 'Plan!$A$2' },
    )).toEqual([[30, 100, expect.closeTo(0.0427749780351, 12), 200, 'Rate 100', 107], [7, null, null, null, null, null]]);
  });

  it('reads the names of each workbook, though formulas are spelled alike', async () => {
    const rows: Given[][] = [['=FOLD.FREQ(70,Rate)', 100, 50]];
    expect(await calculated(rows, { Rate: 'Plan!$B$1' })).toEqual([[30, 100, 50]]);
    expect(await calculated(rows, { Rate: 'Plan!$C$1' })).toEqual([[20, 100, 50]]);
  });

  it('reads cells of other sheets, quoted names and all', async () => {
    const workbook = { sheets: [sheetOf('Plan', [["=FOLD.FREQ(70,'Clock''s tree'!A1)", '=FOLD.FREQ(70,Rate)']]), sheetOf("Clock's tree", [[100]])], names: { Rate: "'Clock''s tree'!$A$1" } };
    expect(valuesOf((await calculate(workbook, built)).sheets[0]!)).toEqual([[30, 30]]);
  });

  it('leaves formulas that it does not know as they were, and computes with what they gave', async () => {
    expect(await calculated([
      [{ value: 70, formula: '=GETPIVOTDATA("f",A9)' }, '=FOLD.FREQ(A1,100)'],
      [{ value: 80, formula: "='[other.xlsx]Sheet1'!A1" }, '=FOLD.FREQ(A2,100)'],
    ])).toEqual([[70, 30], [80, 20]]);
  });

  // A blank cell is equal to 0 and to "", which are not equal to each other: common practice.
  it('compares cells as spreadsheet programs do, whatever they were compared with before', async () => {
    const cells = [[0], [null], [5], ['x']];
    const asked = ['=5', '=""', '=0', '="x"', '<>""', '<>0'];
    const computed = await calculate(planOf(cells.map(([cell], row) => [cell!, ...asked.map((question) => `=A${row + 1}${question}`)])), built);
    expect(cells.map((_, row) => asked.map((_question, i) => computed.sheets[0]!.cells[row]![i + 1]!.value))).toEqual([
      [false, false, true,  false, true,  false],
      [false, true,  true,  false, false, false],
      [true,  false, false, false, true,  true],
      [false, false, false, true,  true,  true],
    ]);
  });

  it('touches nothing but values', async () => {
    const before = planOf([[{ value: 'low', style: { bold: true, fill: '#dfe9ee' } }, 61.44], [null, { value: null, formula: '=FOLD.FREQ(B1,Rate)', style: { numberFormat: '0.000' } }]], { Rate: 'Plan!$B$1' });
    Object.assign(before.sheets[0]!, { columns: { 0: { width: 120 } }, rows: { 1: { height: 31 } }, merges: ['A3:B3'], frozen: { rows: 1, columns: 1 } });
    const asGiven = structuredClone(before);
    const after = await calculate(before, built);
    expect(before).toEqual(asGiven);
    asGiven.sheets[0]!.cells[1]![1]!.value = 0;
    expect(after).toEqual(asGiven);
  });

  it('tells how far it is', async () => {
    const told: [number, number][] = [];
    await calculate(planOf(Array.from({ length: 1200 }, (_, i) => [`=FOLD.FREQ(${i},100)`])), built, (done, total) => told.push([done, total]));
    expect(told).toEqual([[1, 1200], [501, 1200], [1001, 1200]]);
  });
});
