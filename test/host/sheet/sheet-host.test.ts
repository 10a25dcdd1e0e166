import { type Workbook as UniverWorkbook, Direction, ICommandService, IUniverInstanceService, RedoCommand, UndoCommand, UniverInstanceType } from '@univerjs/core';
import { InsertDefinedNameCommand, InsertRowCommand, RemoveDefinedNameCommand, RemoveRowCommand, SetDefinedNameCommand, SetWorksheetNameCommand } from '@univerjs/sheets';
import { afterEach, describe, expect, it } from 'vitest';
import { openHeadless } from '../../../src/host/sheet/headless';
import type { SheetHost } from '../../../src/host/sheet/sheet-host';
import { type CellInput, type Change, type Workbook, HostFault } from '../../../src/host/port';
import { coastPlan } from '../../../src/demo/coast';
import { built } from '../../support/built-functions';
import { testHost, testLiveHost } from '../../support/host-contract';
import { planOf } from '../../support/workbook';

testHost('the embedded sheet', async (workbook) => {
  const host = await open(workbook);
  return { host, settle: () => host.settled(), close: async () => host.dispose() };
});

testLiveHost('the embedded sheet', async (workbook) => {
  const host = await open(workbook);
  return { host, state: () => host.save(), settle: () => host.settled(), close: async () => host.dispose() };
});

async function open(workbook: Workbook): Promise<SheetHost> {
  const host = openHeadless(built);
  await host.load(workbook);
  return host;
}

describe('the embedded sheet', () => {
  let host: SheetHost;
  afterEach(() => host.dispose());

  const read = async (reference: string) => (await host.read(reference))?.values;
  const undo = async () => {
    const unit = host.univer.__getInjector().get(IUniverInstanceService);
    unit.focusUnit(unit.getCurrentUnitOfType(UniverInstanceType.UNIVER_SHEET)!.getUnitId());
    await host.univer.__getInjector().get(ICommandService).executeCommand(UndoCommand.id);
    await host.settled();
  };

  it('reads numbers to the last digit, booleans as booleans, blanks of formulas as ""', async () => {
    host = await open(planOf([[0.1, 122.88000000000001, true, false, '=FOLD.INVERTED(70,100)', '=FOLD.FREQ(Z1,100)', '=FOLD.FREQ(0.3,0.2)', null, 'text']]));
    expect(await read('A1:I1')).toEqual([[0.1, 122.88000000000001, true, false, true, '', 0.1, null, 'text']]);
  });

  it('reads errors as objects, with the sentence of our functions, and text that looks like one as text', async () => {
    host = await open(planOf([['fast', '=FOLD.FREQ(A1:A3,100)', '=1/0', { value: { error: '#N/A' } }, '#N/A'], [70], ['=C1']]));
    const sentence = 'frequency must be a number; got "fast".';
    expect(await read('B1:E1')).toEqual([[{ error: '#VALUE!', message: sentence }, { error: '#DIV/0!' }, { error: '#N/A' }, '#N/A']]);
    expect(await read('B1:B3')).toEqual([[{ error: '#VALUE!', message: sentence }], [30], [{ error: '#DIV/0!' }]]);
  });

  it('tells the sentence that is true now', async () => {
    host = await open(planOf([['fast', '=FOLD.FREQ(A1,Rate)', 100]], { Rate: 'Plan!$C$1' }));
    await host.write('A1', [['slow']]);
    await host.settled();
    expect(await read('B1')).toEqual([[{ error: '#VALUE!', message: 'frequency must be a number; got "slow".' }]]);
    await host.write('A1:C1', [[70, { formula: '=FOLD.FREQ(A1,Rate)' }, -1]]);
    await host.settled();
    expect(await read('B1')).toEqual([[{ error: '#VALUE!', message: 'rate must be above 0; got -1.' }]]);
  });

  it('reads what a formula fills beyond its own cell', async () => {
    host = await open(planOf([[70, '=FOLD.FREQ(A1:A3,Rate)', 100], [80], [90]], { Rate: 'Plan!$C$1' }));
    expect(await read('B1:B4')).toEqual([[30], [20], [10], [null]]);
    await host.write('Rate', [[50]]);
    await host.settled();
    expect(await read('B1:B4')).toEqual([[20], [20], [10], [null]]);
  });

  it.each<[string, CellInput]>([
    ['a formula', '=1+1'], ['a number with zeros before it', '007'], ['a date', '1-2'], ['a percentage', '5%'], ['a truth value', 'TRUE'], ['an error', '#N/A'],
    ['a quoted text', "'quoted"], ['an external command', '@SUM(1)'],
  ])('writes text that looks like %s as text', async (_what, text) => {
    host = await open(planOf([[1, '=A1&"!"']]));
    await host.write('A1', [[text]]);
    await host.settled();
    expect(await read('A1')).toEqual([[text]]);
    expect(host.save().sheets[0]!.cells[0]![0]).toEqual({ value: text });
  });

  it('undoes a write in one step, whatever it wrote', async () => {
    host = await open(planOf([[1, '=A1+1', 'text', true], ['=A1*10', 5, null, '']], {}));
    const before = await read('A1:D2');
    await host.write('A1:D2', [[2, { formula: '=A1*3' }, null, '=x'], [null, 'new', { formula: '=FOLD.FREQ(70,100)' }, false]]);
    await host.settled();
    expect(await read('A1:D2')).toEqual([[2, 6, null, '=x'], [null, 'new', 30, false]]);
    await undo();
    expect(await read('A1:D2')).toEqual(before);
  });

  it('grows where a write goes beyond the cells it has, and undoes that too', async () => {
    host = await open(planOf([[1]]));
    await host.write('ZZ30000', [['far']]);
    expect(await read('ZZ30000')).toEqual([['far']]);
    await undo();
    expect(await read('ZZ30000')).toEqual([[null]]);
  });

  it('knows sheets and names in any case', async () => {
    host = await open(planOf([[245.76]], { Rate: 'Plan!$A$1', Half: '=Plan!$A$1/2', Half_Rate: '122.88' }));
    expect((await host.read('RATE'))?.values).toEqual([[245.76]]);
    expect((await host.read('plan!a1'))?.sheet).toBe('Plan');
    expect(await host.read('Half')).toBeNull();
    expect(await host.read('Half_Rate')).toBeNull();
  });

  it('forgets the workbook before when another is loaded', async () => {
    host = await open(planOf([['=FOLD.FREQ(70,Rate)', 100]], { Rate: 'Plan!$B$1' }));
    await host.load(planOf([['=FOLD.FREQ(70,Rate)', null, 50]], { Rate: 'Plan!$C$1' }));
    expect(await read('A1:C1')).toEqual([[20, null, 50]]);
    let told = 0;
    await host.onRecalculated(() => told++);
    await host.write('Rate', [[60]]);
    await host.settled();
    expect(await read('A1')).toEqual([[10]]);
    expect(told).toBe(1);
  });

  it('tells of edits, and not of recalculations', async () => {
    host = await open(planOf([[1, '=A1+1']]));
    let edits = 0;
    const stop = await host.onEdited(() => edits++);
    await host.write('A1', [[2]]);
    const written = edits;
    await host.settled();
    expect(written).toBeGreaterThan(0);
    expect(edits).toBe(written);
    await stop();
    await host.write('A1', [[3]]);
    expect(edits).toBe(written);
  });
});

describe('a change of the embedded sheet', () => {
  let host: SheetHost;
  afterEach(() => host.dispose());

  const change: Change = {
    sheets: [{ name: 'Copy', copyOf: 'Plan' }],
    cells: [{ reference: 'Plan!B1:B2', cells: [['Folded'], [{ formula: '=FOLD.FREQ(A2:A3,Rate)' }]] }, { reference: 'Copy!A2', cells: [[80]] }],
    looks: [{ reference: 'Plan!B1:B3', look: { numberFormat: '0.00', bold: true, width: 99, note: 'MHz', marksNegative: true } }],
    names: { Rate: 'Plan!$C$2', Fold_Rate: 'Plan!$C$2' },
  };
  const history = async (command: { id: string }) => {
    const unit = host.univer.__getInjector().get(IUniverInstanceService);
    unit.focusUnit(unit.getCurrentUnitOfType(UniverInstanceType.UNIVER_SHEET)!.getUnitId());
    await host.univer.__getInjector().get(ICommandService).executeCommand(command.id);
    await host.settled();
  };
  const start = async () => {
    host = await open(planOf([['Low', null, 100], [70, null, 50], [130]], { Rate: 'Plan!$C$1' }));
    return host.save();
  };

  it('is one step of the user\'s undo and redo, sheets and names included', async () => {
    const before = await start();
    await host.change(change);
    await host.settled();
    const after = host.save();
    expect((await host.read('Plan!B1:B3'))?.values).toEqual([['Folded'], [20], [20]]);
    await history(UndoCommand);
    expect(host.save()).toEqual(before);
    await history(RedoCommand);
    expect(host.save()).toEqual(after);
  });

  it('comes again when the user takes its undo back', async () => {
    const before = await start();
    const undo = await host.change(change);
    await host.settled();
    const after = host.save();
    await undo();
    await host.settled();
    expect(host.save()).toEqual(before);
    await history(UndoCommand);
    expect(host.save()).toEqual(after);
  });

  it('leaves nothing in the user\'s undo when it fails', async () => {
    const before = await start();
    await host.write('A2', [[90]]);
    await expect(host.change({ ...change, looks: [{ reference: 'Fold_Nothing', look: { bold: true } }] })).rejects.toThrow(HostFault);
    await history(UndoCommand);
    expect(host.save()).toEqual(before);
  });

  it('sets looks that are saved, and copies them with their sheet', async () => {
    await start();
    await host.change(change);
    await host.change({ sheets: [{ name: 'Second', copyOf: 'Plan' }] });
    const [plan, , second] = host.save().sheets;
    expect(plan).toMatchObject({ columns: { 1: { width: 99 } }, notes: { B1: 'MHz' }, marksNegative: ['B1:B3'] });
    expect(plan!.cells[1]![1]).toMatchObject({ formula: '=FOLD.FREQ(A2:A3,Rate)', style: { numberFormat: '0.00', bold: true } });
    expect(second).toMatchObject({ columns: { 1: { width: 99 } }, notes: { B1: 'MHz' }, marksNegative: ['B1:B3'] });
  });

  it('makes no text of numbers in a format for text', async () => {
    await start();
    const undo = await host.change({ looks: [{ reference: 'Plan!A1:C3', look: { numberFormat: '@' } }] });
    expect((await host.read('A2:C2'))?.values).toEqual([[70, null, 50]]);
    await undo();
    expect((await host.read('A2:C2'))?.values).toEqual([[70, null, 50]]);
  });

  it('takes back a look without the values of that time', async () => {
    host = await open(planOf([[70, '=FOLD.FREQ(A1,Rate)', 100]], { Rate: 'Plan!$C$1' }));
    const undo = await host.change({ looks: [{ reference: 'Plan!B1', look: { numberFormat: '0.000' } }] });
    await host.write('Rate', [[50]]);
    await host.settled();
    await undo();
    await host.settled();
    expect(host.save().sheets[0]!.cells[0]![1]).toEqual({ value: 20, formula: '=FOLD.FREQ(A1,Rate)' });
  });

  it.each<[string, Change, string]>([
    ['a table',           { tableColumns: [{ table: 'Bands', cells: [['Zone']] }] },         'There is no table called Bands: the sheet of the workbench knows no tables.'],
    ['a sheet twice',     { sheets: [{ name: 'New' }, { name: 'new' }] },                    'The workbook has a sheet called new already.'],
    ['a slash in a name', { sheets: [{ name: 'In/Out' }] },                                  'A sheet can\'t be called "In/Out": a name has 1 to 31 characters, none of them [ ] : * ? / \\, and no \' at an end.'],
    ['another size',      { cells: [{ reference: 'Plan!A1:B2', cells: [[1, 2], [3]] }] },    'Plan!A1:B2 has 2 × 2 cells; got 2 × 1.'],
    ['no number',         { cells: [{ reference: 'Plan!A1', cells: [[Infinity]] }] },        'Plan!A1 was not written: no cell can hold Infinity.'],
    ['nowhere',           { looks: [{ reference: 'Fold_Nothing', look: {} }] },              'The workbook has no name, sheet or cells called Fold_Nothing.'],
  ])('is refused in one clear sentence: %s', async (_what, refused, sentence) => {
    await start();
    await expect(host.change(refused)).rejects.toThrow(new HostFault(sentence));
  });

  it('has no place for pictures, and says so', async () => {
    await start();
    await expect(host.addPicture()).rejects.toThrow(new HostFault(host.cannot.addPicture));
    expect(await host.tables()).toEqual([]);
  });
});

describe('names in the embedded sheet', () => {
  let host: SheetHost;
  afterEach(() => host.dispose());

  /** What a user does to the first sheet. */
  const run = async (command: { id: string }, params: object = {}) => {
    const injector = host.univer.__getInjector();
    const workbook = injector.get(IUniverInstanceService).getCurrentUnitOfType<UniverWorkbook>(UniverInstanceType.UNIVER_SHEET)!;
    await injector.get(ICommandService).executeCommand(command.id, { unitId: workbook.getUnitId(), subUnitId: workbook.getSheets()[0]!.getSheetId(), ...params });
    await host.settled();
  };
  const rows = (first: number, last = first) => ({ startRow: first, endRow: last, startColumn: 0, endColumn: 35 });
  const workbook = () => planOf([['rate', 100], [70, '=FOLD.FREQ(A2,Rate)', '=FOLD.FREQ(A2:A3,rate)'], [80, '=FOLD.FREQ(A3,Rate)']], { Rate: 'Plan!$B$1' });
  const results = async (reference: string) => (await host.read(reference))?.values;

  it('move with the cells that they name, and formulas follow', async () => {
    host = await open(workbook());
    await run(InsertRowCommand, { range: rows(0), direction: Direction.UP });
    expect(await results('B3:C4')).toEqual([[30, 30], [20, 20]]);
    expect((await host.read('Rate'))?.address).toBe('B2');
    await run(SetWorksheetNameCommand, { name: "Gannet's plan" });
    expect((await host.read('Rate'))?.sheet).toBe("Gannet's plan");
    await host.write('Rate', [[50]]);
    await host.settled();
    expect(await results('B3:C4')).toEqual([[20, 20], [20, 20]]);
    expect(host.save().names).toEqual({ Rate: "'Gannet''s plan'!$B$2" });
    expect(host.save().sheets[0]!.cells[2]![1]!.formula).toBe('=FOLD.FREQ(A3,Rate)');
  });

  it('make an error of formulas when their cells are gone', async () => {
    host = await open(workbook());
    await run(RemoveRowCommand, { range: rows(0) });
    expect(await results('B1:C1')).toEqual([[{ error: '#REF!' }, { error: '#REF!' }]]);
    expect(await host.read('Rate')).toBeNull();
  });

  it('may be given, pointed elsewhere and taken away while formulas use them', async () => {
    host = await open(planOf([[100, 50], [70, '=FOLD.FREQ(A2,Rate)', '=FOLD.FREQ(A2,Rate)+Rate']]));
    expect(await results('B2:C2')).toEqual([[{ error: '#NAME?' }, { error: '#NAME?' }]]);
    const name = { id: 'mine', name: 'Rate', localSheetId: 'AllDefaultWorkbook' };
    await run(InsertDefinedNameCommand, { ...name, formulaOrRefString: 'Plan!$A$1' });
    expect(await results('B2:C2')).toEqual([[30, 130]]);
    await run(SetDefinedNameCommand, { ...name, formulaOrRefString: 'Plan!$B$1' });
    expect(await results('B2:C2')).toEqual([[20, 70]]);
    await run(RemoveDefinedNameCommand, { ...name, formulaOrRefString: 'Plan!$B$1' });
    expect(await results('B2:C2')).toEqual([[{ error: '#REF!' }, { error: '#REF!' }]]);
  });
});

describe('a workbook loaded into the embedded sheet and saved from it', () => {
  const saved = async (workbook: Workbook) => {
    const host = await open(workbook);
    const result = host.save();
    host.dispose();
    return result;
  };

  it('is the same: values, formulas, styles, sizes, merges, frozen panes, notes, marks, names', async () => {
    const border = { style: 'thin', color: '#41616f' } as const;
    const workbook = planOf([
      [{ value: 'Title', style: { bold: true, italic: true, underline: true, strike: true, fontName: 'Georgia', fontSize: 14, color: '#102030', fill: '#dfe9ee' } }],
      [{ value: 1.5, style: { numberFormat: '#,##0.000', horizontal: 'right', vertical: 'middle', wrap: true } }, '=FOLD.FREQ(70,Rate)', 100],
      [
        { value: null, style: { border: { top: border, bottom: { style: 'double', color: '#000000' } } } }, '007', true, { value: { error: '#N/A' } },
        { value: 0.5, style: { numberFormat: '0%', border: { left: { style: 'dashed', color: '#ff0000' }, right: { style: 'thick', color: '#00ff00' } } } },
      ],
    ], { Rate: 'Plan!$C$2', Fold_Low: 'Plan!$A$2:$A$9' });
    Object.assign(workbook.sheets[0]!, {
      columns: { 0: { width: 120 }, 3: { width: 64, hidden: true }, 5: { hidden: true } }, rows: { 0: { height: 31 }, 7: { hidden: true } }, merges: ['A1:C1', 'A5:B6'],
      frozen: { rows: 1, columns: 2 }, notes: { A1: 'one line\nand another', B7: '=1' }, marksNegative: ['B2:B9', 'D1'],
    });
    workbook.sheets[0]!.cells[1]![1]!.value = 30;
    expect(await saved(workbook)).toEqual(workbook);
  });

  it('holds the values of what a formula fills, and takes them for no values of their own', async () => {
    const filled = planOf([
      [70, { value: 30, formula: '=FOLD.FREQ(A1:A2,100)', spill: { rows: 2, columns: 1 }, style: { bold: true } }],
      [80, { value: 20, style: { numberFormat: '0.0' } }],
    ]);
    expect(await saved(filled)).toEqual(filled);
  });

  it('is the demo plan and what it computes', async () => {
    const once = await saved(coastPlan());
    expect(once.names).toEqual(coastPlan().names);
    expect(await saved(once)).toEqual(once);
    const errors = once.sheets.flatMap((sheet) => Object.values(sheet.cells).flatMap((line) => Object.values(line))).filter(({ value }) => typeof value === 'object' && value !== null);
    expect(errors).toEqual([]);
  });
});
