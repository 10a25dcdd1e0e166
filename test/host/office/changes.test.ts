// Changes in the spreadsheet program that fail, and what only this host can do.

import { describe, expect, it } from 'vitest';
import { OfficeHost } from '../../../src/host/office/office-host';
import { type Change, type Workbook, HostFault, NEGATIVE } from '../../../src/host/port';
import { evaluate } from '../../support/evaluate';
import { connect } from '../../support/played-excel/client-library';
import { WorkbookModel } from '../../support/played-excel/workbook-model';
import { sheetOf } from '../../support/workbook';

/** A plan that is a table, cells of which everything is easily lost, and a sheet to copy. */
function plan(): Workbook {
  const sheet = sheetOf('Plan', [
    ['Band', 'Low',  null, '=FOLD.FREQ(B2:B3,Rate)', { value: '=1+1', style: { numberFormat: '@' } }],
    ['one',  70,     null, null,                     { value: '007' }],
    ['two',  61.44,  null, null,                     { value: { error: '#N/A' } }],
  ]);
  return {
    sheets: [{ ...sheet, columns: { 4: { width: 90 } }, notes: { E1: 'kept' }, marksNegative: ['E1:E3'] }, sheetOf('Rates', [[100]])],
    names: { Rate: 'Rates!$A$1', Gone: '#REF!', Fold_Low: 'Plan!$B$2:$B$3' },
  };
}

function open(version?: number) {
  const workbook = new WorkbookModel(plan(), evaluate);
  workbook.Tables.put('Bands', workbook.range('Plan!A1:B3')!);
  return { host: new OfficeHost(), workbook, ...connect(workbook, version) };
}

/** Something of each kind, over all that is there. */
const whole: Change = {
  sheets: [{ name: 'Copy', copyOf: 'Plan' }, { name: 'New' }],
  tableColumns: [{ table: 'Bands', cells: [['Zone'], [{ formula: '=FOLD.ZONE(B2,Rate)' }], [{ formula: '=FOLD.ZONE(B3,Rate)' }]] }],
  cells: [{ reference: 'Plan!D1:E3', cells: [[1, { formula: '=FOLD.FREQ(B2,Rate)' }], ['=text', null], [true, 5]] }, { reference: 'Copy!A9', cells: [['mine']] }],
  looks: [
    { reference: 'Plan!E1:E3', look: { numberFormat: '0.000', bold: true, width: 120, note: 'replaced', marksNegative: false } },
    { reference: 'Plan!D1:D3', look: { marksNegative: true, note: 'new', width: 50 } },
  ],
  names: { Fold_Rate: 'Rates!$A$1', Fold_Low: 'Plan!$B$2', Gone: null },
};
const broken: Change = { ...whole, cells: [...whole.cells!, { reference: 'Plan!G1', cells: [[{ formula: '=FOLD.FREQ(' }]] }] };

describe('a change in the spreadsheet program that meets a fault', () => {
  it.each(['GeneralException', 'ConnectionFailure'])('leaves the workbook as it was, whichever step meets a %s', async (code) => {
    let steps = 0;
    let faults = 0;
    for (let failed = true; failed; steps++) {
      const { host, workbook, failAt, hasFailed } = open();
      const before = JSON.stringify(workbook.snapshot());
      failAt(steps, code);
      const fault = await host.change(whole).then(() => null, (error: unknown) => error);
      failed = hasFailed();
      if (fault === null) continue; // a note that is left out, or what tidies up
      faults++;
      expect(fault).toBeInstanceOf(HostFault);
      expect((fault as HostFault).message).toMatch(/^The change was not made: [^.]+\.$/);
      expect(JSON.stringify(workbook.snapshot()), `step ${steps}`).toBe(before);
    }
    expect(faults).toBeGreaterThan(code === 'ConnectionFailure' ? 8 : 100);
  });

  it.each<[string, (workbook: WorkbookModel) => void, Change, string]>([
    ['a protected sheet',    (workbook) => { workbook.sheets[0]!.isProtected = true; },                                  whole,  'The change was not made: the sheet is protected, or the workbook can only be read.'],
    ['a filtered table',     (workbook) => { workbook.sheets[0]!.filtered = workbook.range('Plan!A1:E3')!.box; },        whole,  'The change was not made: a filter hides some of the cells; clear it and try again.'],
    ['a deleted name',       () => {}, { ...whole, looks: [{ reference: 'Gone', look: { bold: true } }] },                       'Gone stands for no cells; they may have been deleted.'],
    ['an unknown name',      () => {}, { ...whole, cells: [{ reference: 'Fold_Nothing', cells: [[1]] }] },                       'This workbook has no name or sheet that Fold_Nothing could stand for.'],
    ['no address',           () => {}, { ...whole, cells: [{ reference: 'Plan!here', cells: [[1]] }] },                          'Plan!here is no address of cells.'],
    ['a broken formula',     () => {}, broken,                                                                                   'The change was not made: The formula is not correct (InvalidArgument).'],
    ['an unknown table',     () => {}, { ...whole, tableColumns: [{ table: 'Missing', cells: [['Zone']] }] },                    'This workbook has no table called Missing.'],
    ['too short a column',   () => {}, { ...whole, tableColumns: [{ table: 'Bands', cells: [['Zone'], [1]] }] },                 'Bands with its header has 3 × 1 cells; 2 × 1 were to be written.'],
    ['a sheet that exists',  () => {}, { ...whole, sheets: [{ name: 'rates' }] },                                                'The workbook has a sheet called rates already.'],
    ['no sheet to copy',     () => {}, { ...whole, sheets: [{ name: 'New', copyOf: 'Missing' }] },                               'This workbook has no sheet called Missing.'],
  ])('%s: one clear sentence, and the workbook as before', async (_what, prepare, change, sentence) => {
    const { host, workbook } = open();
    prepare(workbook);
    const before = workbook.snapshot();
    await expect(host.change(change)).rejects.toThrow(new HostFault(sentence));
    expect(workbook.snapshot()).toEqual(before);
  });

  it.each(['GeneralException', 'ConnectionFailure'])('says so when a %s keeps it from putting back', async (code) => {
    let saidSo = 0;
    for (let step = 0, failed = true; failed; step++) {
      const { host, workbook, failAt, hasFailed } = open();
      const before = JSON.stringify(workbook.snapshot());
      failAt(step, code);
      const fault = await host.change(broken).then(() => null, (error: unknown) => error);
      failed = hasFailed();
      expect(fault).toBeInstanceOf(HostFault);
      if ((fault as HostFault).message.includes('may be written in part')) saidSo++;
      else expect(JSON.stringify(workbook.snapshot()), `step ${step}`).toBe(before);
    }
    expect(saidSo).toBeGreaterThan(0);
  });

  it.each(['GeneralException', 'ConnectionFailure'])('is still there, or said to be there in part, when a %s meets its being taken back', async (code) => {
    let wholly = 0;
    for (let step = 0, failed = true; failed; step++) {
      const { host, workbook, failAt, hasFailed } = open();
      const undo = await host.change(whole);
      const since = JSON.stringify(workbook.snapshot());
      failAt(step, code);
      const fault = await undo().then(() => null, (error: unknown) => error);
      failed = hasFailed();
      if (fault === null) continue;
      const { message } = fault as HostFault;
      if (message.includes('may be written in part')) continue;
      wholly++;
      expect(JSON.stringify(workbook.snapshot()), `step ${step}: ${message}`).toBe(since);
    }
    expect(wholly).toBeGreaterThan(0);
  });
});

describe('what the spreadsheet program can do', () => {
  it('takes back a change of every kind', async () => {
    const { host, workbook } = open();
    const before = structuredClone(workbook.snapshot());
    const undo = await host.change(whole);
    expect(workbook.snapshot()).not.toEqual(before);
    await undo();
    expect(workbook.snapshot()).toEqual(before);
  });

  it('asks for little, however many columns a change has', async () => {
    const { host, requests } = open();
    const columns = Array.from({ length: 12 }, (_, c) => String.fromCharCode(71 + c));
    const change: Change = {
      cells: columns.map((column) => ({ reference: `Plan!${column}1:${column}3`, cells: [['Zone'], [{ formula: '=FOLD.ZONE(B2,Rate)' }], [{ formula: '=FOLD.ZONE(B3,Rate)' }]] })),
      looks: columns.map((column) => ({ reference: `Plan!${column}1`, look: { bold: true, width: 80, note: 'Zone' } })), names: { Fold_Rate: 'Rates!$A$1' },
    };
    await host.change(change);
    expect(requests()).toBeLessThanOrEqual(9);
  });

  it('adds columns to a table, with formulas even beside a column for text', async () => {
    const { host, workbook } = open();
    workbook.range('Plan!B1:B3')!.NumberFormat = [['@'], ['@'], ['@']];
    await host.change({ tableColumns: whole.tableColumns! });
    expect(await host.tables()).toEqual([{ name: 'Bands', sheet: 'Plan', address: 'A1:C3' }]);
    expect((await host.read('Plan!C1:C3'))?.values).toEqual([['Zone'], [2], [2]]);
  });

  it('marks numbers below 0 once, and takes the marks away', async () => {
    const { host, workbook } = open();
    const look = (marksNegative: boolean): Change => ({ looks: [{ reference: 'Plan!B2:B3', look: { marksNegative } }] });
    const { marks } = workbook.sheets[0]!;
    await host.change(look(true));
    await host.change(look(true));
    expect(marks.slice(1)).toEqual([{ box: workbook.range('Plan!B2:B3')!.box, type: 'CellValue', rule: { formula1: '=0', operator: 'LessThan' }, color: NEGATIVE.color, fill: NEGATIVE.fill }]);
    await host.change(look(false));
    expect(marks.length).toBe(1);
  });

  it('sets widths in points', async () => {
    const { host, workbook } = open();
    await host.change({ looks: [{ reference: 'Plan!B1', look: { width: 100 } }] });
    expect(workbook.sheets[0]!.columns.get(1)!.ColumnWidth).toBe(75);
  });

  it('leaves notes out where the program knows none, and makes the rest of the change', async () => {
    const { host, workbook } = open(1.17);
    await host.change({ looks: [{ reference: 'Plan!B1', look: { bold: true, note: 'MHz' } }] });
    expect(workbook.range('Plan!B1')!.Format.Font.Bold).toBe(true);
    expect([...workbook.sheets[0]!.Notes.texts]).toEqual([['E1', 'kept']]);
  });

  it('leaves a note out that the cell cannot have', async () => {
    const { host, workbook } = open();
    workbook.sheets[0]!.Notes.commented.add('B1');
    const before = structuredClone(workbook.snapshot());
    const undo = await host.change({ looks: [{ reference: 'Plan!B1', look: { bold: true, note: 'MHz' } }] });
    expect(workbook.range('Plan!B1')!.Format.Font.Bold).toBe(true);
    await undo();
    expect(workbook.snapshot()).toEqual(before);
  });

  it('knows that no cells are selected while something else is', async () => {
    const { host, workbook } = open();
    workbook.selected = null;
    expect(await host.selection()).toBeNull();
  });

  it('starts the functions with the workbook', async () => {
    const { host, startup } = open();
    await host.startWithWorkbook();
    expect(startup()).toBe('Load');
    Office.addin.setStartupBehavior = () => Promise.reject(new Error('no'));
    await expect(host.startWithWorkbook()).rejects.toThrow(new HostFault('The functions could not be made to start with this workbook; opening the pane starts them.'));
  });

  it('tells of no selection when it could not follow all', async () => {
    for (let step = 0, failed = true; failed; step++) {
      const { host, workbook, failAt, hasFailed, settle } = open();
      let told = 0;
      failAt(step, 'GeneralException');
      const stop = await host.onSelected(() => told++).catch(() => null);
      failed = hasFailed();
      workbook.select(workbook.range('Rates!A1')!);
      await settle();
      expect(told > 0, `step ${step}`).toBe(stop !== null);
    }
  });
});

describe('a picture in the spreadsheet program', () => {
  const picture = { png: new Uint8Array([137, 80, 78, 71]), width: 640, height: 200, alternativeText: 'Zone ladder of the plan' };

  it('stands at the corner of its cells, in its own size, with a text for those who don\'t see it', async () => {
    const { host, workbook } = open();
    await host.addPicture('Plan!C4', picture);
    expect(workbook.sheets[0]!.Shapes.all).toMatchObject([
      { base64: 'iVBORw==', Left: 96, Top: 45, Width: 480, Height: 150, AltTextDescription: 'Zone ladder of the plan', LockAspectRatio: false },
    ]);
  });

  it.each(['GeneralException', 'ConnectionFailure'])('is not there at all when a %s meets one of its steps', async (code) => {
    let faults = 0;
    for (let step = 0, failed = true; failed; step++) {
      const { host, workbook, failAt, hasFailed } = open();
      failAt(step, code);
      const fault = await host.addPicture('Plan!C4', picture).then(() => null, (error: unknown) => error);
      failed = hasFailed();
      if (fault === null) continue;
      faults++;
      expect((fault as HostFault).message).toMatch(/^The picture was not inserted: /);
      expect(workbook.sheets[0]!.Shapes.all).toEqual([]);
    }
    expect(faults).toBeGreaterThan(2);
  });

  it('needs cells to stand at', async () => {
    const { host } = open();
    await expect(host.addPicture('Fold_Nothing', picture)).rejects.toThrow(new HostFault('This workbook has no name or sheet that Fold_Nothing could stand for.'));
  });
});
