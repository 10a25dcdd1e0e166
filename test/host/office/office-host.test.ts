import { describe, expect, it } from 'vitest';
import { OfficeHost } from '../../../src/host/office/office-host';
import { type CellInput, type Workbook, HostFault } from '../../../src/host/port';
import { evaluate } from '../../support/evaluate';
import { contractWorkbook, testHost, testLiveHost } from '../../support/host-contract';
import { connect } from '../../support/played-excel/client-library';
import { WorkbookModel } from '../../support/played-excel/workbook-model';

testHost('the spreadsheet program', async (workbook) => ({ ...open(workbook), close: async () => {} }));

testLiveHost('the spreadsheet program', async (workbook) => {
  const opened = open(workbook);
  return { ...opened, state: () => structuredClone(opened.workbook.snapshot()), close: async () => {} };
});

describe('reading from the spreadsheet program', () => {
  it('tells blank cells, empty texts, errors and texts that look like errors apart', async () => {
    const { host } = open(planWith({
      0: { 0: { value: null }, 1: { value: '#N/A' }, 2: { value: { error: '#N/A' } }, 3: { value: null, formula: '=FOLD.FREQ(A1,Rate)' } },
      1: { 0: { value: 0 }, 1: { value: false }, 2: { value: 'wanted' }, 3: { value: null, formula: '=FOLD.FREQ(C2,Rate)' } },
    }));
    expect((await host.read('Plan!A1:D2'))?.values).toEqual([
      [null, '#N/A', { error: '#N/A' }, ''],
      [0,    false,  'wanted',          { error: '#VALUE!' }],
    ]);
  });

  it('reads what a formula spilled', async () => {
    const { host } = open(planWith({ 0: { 0: { value: 70 }, 1: { value: null, formula: '=FOLD.FREQ(A1:A3,Rate)' } }, 1: { 0: { value: 'fast' } }, 2: { 0: { value: 130 } } }));
    expect((await host.read('Plan!B1:B3'))?.values).toEqual([[30], [{ error: '#VALUE!' }], [30]]);
  });

  it.each([
    ['a column',              '$A:$A',           'A1:A5'],
    ['columns',               'A:C',             'A1:C5'],
    ['the rest of a column',  '$A$3:$A$1048576', 'A3:A5'],
    ['a row',                 '3:3',             'A3:B3'],
    ['an unused column',      'F:F',             'F1:F5'],
    ['what lies below all',   'A9:A1048576',     'A9'],
  ])('reads %s as far as the sheet is used', async (_what, refersTo, address) => {
    const { host } = open({ ...contractWorkbook, names: { ...contractWorkbook.names, Everything: `Plan!${refersTo}` } });
    const direct = await host.read(`Plan!${refersTo}`);
    expect(direct?.address).toBe(address);
    expect(await host.read('Everything')).toEqual(direct);
  });

  it('reads a whole column of an empty sheet as one blank cell', async () => {
    const { host } = open(planWith({}));
    expect(await host.read('Plan!B:B')).toEqual({ sheet: 'Plan', address: 'B1', values: [[null]] });
  });

  it('reads the active sheet where none is named', async () => {
    const { host } = open(contractWorkbook);
    expect(await host.read('$A$3')).toEqual({ sheet: 'Plan', address: 'A3', values: [[70]] });
  });

  it('takes no name for a column, however short', async () => {
    const { host } = open({ ...contractWorkbook, names: { ...contractWorkbook.names, Low: 'Plan!$A$3' } });
    expect((await host.read('Low'))?.values).toEqual([[70]]);
  });
});

describe('writing to the spreadsheet program', () => {
  const texts = [
    '=1+1', '+1', '-2 dB', '@Rate', "'quoted", "''", '007', '1e5', '12:30', '3-4', '1/2', '50 %', '€ 5', '(5)', 'May 5', 'TRUE', 'true', '#N/A', ' ', ' 7',
    '=HYPERLINK("https://plan.example")', 'wanted', 'Folded low', '<b>',
  ];

  it.each(['General', '@', '0.000'])('keeps every text a text in cells of the format %s', async (format) => {
    const { host, workbook } = open(planWith({}));
    const reference = `Plan!A1:A${texts.length}`;
    workbook.range(reference)!.NumberFormat = texts.map(() => [format]);
    await host.write(reference, texts.map((text) => [text]));
    expect((await host.read(reference))?.values).toEqual(texts.map((text) => [text]));
    expect(new Set(workbook.range(reference)!.ValueTypes.flat())).toEqual(new Set(['String']));
    expect(new Set(workbook.range(reference)!.NumberFormat.flat())).toEqual(new Set([format]));
  });

  it('makes numbers and formulas of what is written to cells for text, which stay as they are beside them', async () => {
    const { host, workbook } = open(contractWorkbook);
    workbook.range('Plan!D1:F1')!.NumberFormat = [['@', '@', '0.0']];
    await host.write('Plan!D1:F1', [[{ formula: '=FOLD.FREQ(A3,Rate)' }, 'wanted', 5]]);
    expect((await host.read('Plan!D1:F1'))?.values).toEqual([[30, 'wanted', 5]]);
    expect(workbook.range('Plan!D1:F1')!.NumberFormat).toEqual([['General', '@', '0.0']]);
  });

  it('clears the cells that are to be blank', async () => {
    const { host } = open(contractWorkbook);
    await host.write('Plan!A3:B3', [[null, '']]);
    expect((await host.read('Plan!A3:B3'))?.values).toEqual([[null, null]]);
  });
});

describe('what the spreadsheet program refuses', () => {
  it.each<[string, string, CellInput[][], string]>([
    ['an unknown name',   'Fold_Nothing', [[1]],         'This workbook has no name or sheet that Fold_Nothing could stand for.'],
    ['an unknown sheet',  'Missing!A1',   [[1]],         'This workbook has no name or sheet that Missing!A1 could stand for.'],
    ['no address',        'Plan!here',    [[1]],         'Plan!here is no address of cells.'],
    ['deleted cells',     'Gone',         [[1]],         'Gone stands for no cells; they may have been deleted.'],
    ['too few rows',      'Plan!A3:A5',   [[1], [2]],    'Plan!A3:A5 has 3 × 1 cells; 2 × 1 were to be written.'],
    ['ragged rows',       'Plan!A3:B4',   [[1, 2], [3]], 'Plan!A3:B4 has 2 × 2 cells; 2 × 2 or 1 were to be written.'],
    ['no rows',           'Plan!A3',      [],            'Plan!A3 has 1 × 1 cells; 0 × 0 were to be written.'],
    ['no number',         'Plan!A3',      [[NaN]],       'Plan!A3 was not written: no cell can hold NaN.'],
    ['no finite number',  'Plan!A3',      [[-Infinity]], 'Plan!A3 was not written: no cell can hold -Infinity.'],
    ['a broken formula',  'Plan!A3',      [[{ formula: '=FOLD.FREQ(' }]], 'Plan!A3 was not written: The formula is not correct (InvalidArgument).'],
  ])('%s: one clear sentence, and nothing is written', async (_what, reference, cells, sentence) => {
    const { host, workbook } = open({ ...contractWorkbook, names: { ...contractWorkbook.names, Gone: '#REF!' } });
    const before = workbook.snapshot();
    await expect(host.write(reference, cells)).rejects.toThrow(new HostFault(sentence));
    expect(workbook.snapshot()).toEqual(before);
  });

  it('tells of deleted cells and wrong addresses on reading too', async () => {
    const { host } = open({ ...contractWorkbook, names: { Gone: '#REF!' } });
    await expect(host.read('Gone')).rejects.toThrow(new HostFault('Gone stands for no cells; they may have been deleted.'));
    await expect(host.read('Plan!here')).rejects.toThrow(new HostFault('Plan!here is no address of cells.'));
  });

  it('tells that a sheet is protected', async () => {
    const { host, workbook } = open(contractWorkbook);
    workbook.sheets[0]!.isProtected = true;
    const before = workbook.snapshot();
    await expect(host.write('Rate', [[50]])).rejects.toThrow(new HostFault('Rate was not written: the sheet is protected, or the workbook can only be read.'));
    expect(workbook.snapshot()).toEqual(before);
  });

  it('tells in its own words what the program says in a code', async () => {
    const { host, failAt } = open(contractWorkbook);
    failAt(0, 'InvalidOperationInCellEditMode');
    await expect(host.read('Rate')).rejects.toThrow(new HostFault('Rate was not read: a cell is being edited; finish it with Enter and try again.'));
    failAt(0, 'ConnectionFailure');
    await expect(host.read('Rate')).rejects.toThrow(/^Rate was not read: the connection to the spreadsheet program is lost/);
    failAt(0, 'ActivityLimitReached');
    await expect(host.onRecalculated(() => {})).rejects.toThrow(new HostFault('Recalculation cannot be followed: the spreadsheet program is busy; try again in a moment.'));
  });
});

describe('when the spreadsheet program fails half-way', () => {
  /** Everything that is easily lost: a spilled column and its neighbours, texts like formulas, values in cells for text, errors, blanks. */
  const precious = (): ReturnType<typeof open> => {
    const opened = open(planWith({
      0: { 0: { value: 70 }, 1: { value: null, formula: '=FOLD.FREQ(A1:A3,Rate)' }, 2: { value: '=1+1' }, 3: { value: { error: '#N/A' } } },
      1: { 0: { value: 130 }, 2: { value: '007' }, 3: { value: true } },
      2: { 0: { value: 170 }, 2: { value: '#N/A' } },
    }));
    opened.workbook.range('Plan!C1:D3')!.NumberFormat = [['@', 'General'], ['0.0', '@'], ['@', '0.0']];
    return opened;
  };
  const reference = 'Plan!A1:D3';
  const good: CellInput[][] = [[1, 2, 3, 4], ['a', 'b', { formula: '=FOLD.FREQ(A1,Rate)' }, null], [null, null, 5, '6']];
  const broken: CellInput[][] = [[1, 2, 3, 4], ['a', 'b', 'c', 'd'], [null, 5, { formula: '=FOLD.FREQ(' }, 6]];

  const rows = async (host: OfficeHost) => (await host.read(reference))?.values;

  it('puts back what a formula that it refuses would have cost', async () => {
    const { host, workbook } = precious();
    const before = [workbook.snapshot(), await rows(host)];
    await expect(host.write(reference, broken)).rejects.toThrow(new HostFault(`${reference} was not written: The formula is not correct (InvalidArgument).`));
    expect([workbook.snapshot(), await rows(host)]).toEqual(before);
  });

  it.each(['GeneralException', 'ConnectionFailure'])('leaves the workbook as it was, whichever step of a write meets a %s', async (code) => {
    let steps = 0;
    for (let failed = true; failed; steps++) {
      const { host, workbook, failAt, hasFailed } = precious();
      const before = workbook.snapshot();
      failAt(steps, code);
      const fault = await host.write(reference, good).then(() => null, (error: unknown) => error);
      failed = hasFailed();
      if (!failed || fault === null) continue; // the steps after the last write tidy up, and may fail
      expect(fault).toBeInstanceOf(HostFault);
      expect((fault as HostFault).message).toMatch(/^Plan!A1:D3 was not written: [^.]+\.$/);
      expect(workbook.snapshot()).toEqual(before);
    }
    expect(steps).toBeGreaterThan(4);
  });

  it.each(['GeneralException', 'ConnectionFailure'])('says so when a %s keeps it from putting back', async (code) => {
    let saidSo = 0;
    for (let step = 0, failed = true; failed; step++) {
      const { host, workbook, failAt, hasFailed } = precious();
      const before = JSON.stringify(workbook.snapshot());
      failAt(step, code);
      const fault = await host.write(reference, broken).then(() => null, (error: unknown) => error);
      failed = hasFailed();
      expect(fault).toBeInstanceOf(HostFault);
      const { message } = fault as HostFault;
      if (message.includes('may be written in part')) saidSo++;
      else expect(JSON.stringify(workbook.snapshot()), `step ${step}: ${message}`).toBe(before);
    }
    expect(saidSo).toBeGreaterThan(0);
  });

  it('follows nothing when it could not follow all', async () => {
    let steps = 0;
    for (let failed = true; failed; steps++) {
      const { host, workbook, failAt, hasFailed, settle } = open(contractWorkbook);
      let told = 0;
      failAt(steps, 'GeneralException');
      const stop = await host.onRecalculated(() => told++).catch(() => null);
      failed = hasFailed();
      workbook.range('Rate')!.Formulas = [[50]];
      await settle();
      expect(told > 0, `step ${steps}`).toBe(stop !== null);
    }
    expect(steps).toBeGreaterThan(2);
  });
});

function open(workbook: Workbook) {
  const model = new WorkbookModel(structuredClone(workbook), evaluate);
  return { host: new OfficeHost(), workbook: model, ...connect(model) };
}

/** The contract's workbook with other cells on its first sheet, and a rate of 100. */
function planWith(cells: Workbook['sheets'][number]['cells']): Workbook {
  const [plan, other] = contractWorkbook.sheets;
  return { sheets: [{ ...plan!, cells }, { ...other!, cells: { 0: { 0: { value: 100 } } } }], names: { Rate: "'Clock''s tree'!$A$1" } };
}
