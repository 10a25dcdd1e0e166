// What every host of the port must do, run once for each of them.

import fc from 'fast-check';
import { afterEach, describe, expect, it } from 'vitest';
import { type CellInput, type Change, type Host, type LiveHost, type Look, HostFault, type Workbook } from '../../src/host/port';

export interface OpenHost {
  host: Host;
  /** Waits until the host has recalculated and told its listeners. */
  settle(): Promise<void>;
  close(): Promise<void>;
}

export interface OpenLiveHost extends OpenHost {
  host: LiveHost;
  /** All that the workbook holds: what an undo must restore, and a change that fails must leave as it was. */
  state(): unknown;
}

/** A small plan with a rate cell, three low edges and a formula, and a second sheet whose name needs quotes. */
export const contractWorkbook: Workbook = {
  sheets: [
    {
      name: 'Plan',
      cells: {
        0: { 0: { value: 'rate' }, 1: { value: 100 } },
        2: { 0: { value: 70 }, 1: { value: 30, formula: '=FOLD.FREQ(A3,Rate)' } },
        3: { 0: { value: 61.44 }, 1: { value: 38.56, formula: '=FOLD.FREQ(A4,Rate)' } },
        4: { 0: { value: true }, 1: { value: null } },
      },
      columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 },
    },
    { name: "Clock's tree", cells: { 0: { 0: { value: 'reference' }, 1: { value: 10 } } }, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } },
  ],
  names: { Rate: 'Plan!$B$1', Fold_Low: 'Plan!$A$3:$A$5', Reference: "'Clock''s tree'!$B$1" },
};

export function testHost(name: string, open: (workbook: Workbook) => Promise<OpenHost>): void {
  describe(`the port of ${name}`, () => {
    let opened: OpenHost;
    const start = async () => {
      opened = await open(structuredClone(contractWorkbook));
      return opened;
    };
    afterEach(() => opened.close());

    it('reads a defined name, and tells where it is', async () => {
      const { host } = await start();
      expect(await host.read('Fold_Low')).toEqual({ sheet: 'Plan', address: 'A3:A5', values: [[70], [61.44], [true]] });
      expect(await host.read('Reference')).toEqual({ sheet: "Clock's tree", address: 'B1', values: [[10]] });
    });

    it('reads an address of a sheet, quoted or not', async () => {
      const { host } = await start();
      expect(await host.read('Plan!A1:B1')).toEqual({ sheet: 'Plan', address: 'A1:B1', values: [['rate', 100]] });
      expect((await host.read("'Clock''s tree'!A1"))?.values).toEqual([['reference']]);
      expect((await host.read('Plan!B5'))?.values).toEqual([[null]]);
    });

    it('has no answer for a name or a sheet that the workbook lacks', async () => {
      const { host } = await start();
      expect(await host.read('Fold_Nothing')).toBeNull();
      expect(await host.read('Missing!A1')).toBeNull();
    });

    it('writes a number to a name, and formulas follow', async () => {
      const { host, settle } = await start();
      await host.write('Rate', [[50]]);
      await settle();
      expect((await host.read('Plan!B1'))?.values).toEqual([[50]]);
      expect((await host.read('Plan!B3:B4'))?.values).toEqual([[20], [11.44]]);
    });

    it('writes text as text, whatever it begins with', async () => {
      const { host, settle } = await start();
      await host.write('Plan!D1:D3', [['=1+1'], ['-2 dB'], ['007']]);
      await settle();
      expect((await host.read('Plan!D1:D3'))?.values).toEqual([['=1+1'], ['-2 dB'], ['007']]);
    });

    it('writes a formula as a formula', async () => {
      const { host, settle } = await start();
      await host.write('Plan!D1:E1', [[{ formula: '=FOLD.FREQ(A3,Rate)' }, null]]);
      await settle();
      expect((await host.read('Plan!D1:E1'))?.values).toEqual([[30, null]]);
    });

    it('writes nothing of a block that does not fit', async () => {
      const { host } = await start();
      await expect(host.write('Plan!A3:A5', [[1], [2]])).rejects.toThrow(HostFault);
      await expect(host.write('Fold_Nothing', [[1]])).rejects.toThrow(HostFault);
      expect((await host.read('Plan!A3:A4'))?.values).toEqual([[70], [61.44]]);
    });

    it('tells of a recalculation, until it is asked to stop', async () => {
      const { host, settle } = await start();
      let told = 0;
      const stop = await host.onRecalculated(() => told++);
      await host.write('Rate', [[50]]);
      await settle();
      expect(told).toBeGreaterThan(0);
      await stop();
      told = 0;
      await host.write('Rate', [[60]]);
      await settle();
      expect(told).toBe(0);
    });
  });
}

/** The contract's workbook with a blank sheet, a spilled column, and one of all that can be lost: text like a formula, a format, a width, a note, a mark. */
const liveWorkbook = (): Workbook => {
  const { sheets: [plan, tree], names } = structuredClone(contractWorkbook);
  plan!.cells[2]![3] = { value: 30, formula: '=FOLD.FREQ(A3:A4,Rate)', spill: { rows: 2, columns: 1 } };
  plan!.cells[3]![3] = { value: 38.56 };
  plan!.cells[6] = { 5: { value: '=no formula' }, 6: { value: 1.5, style: { numberFormat: '0.00', bold: true } }, 7: { value: '007', style: { numberFormat: '@' } } };
  Object.assign(plan!, { columns: { 6: { width: 90 } }, notes: { G7: 'kept' }, marksNegative: ['A3:A4'] });
  return { sheets: [plan!, tree!, { name: 'Blank', cells: {}, columns: {}, rows: {}, merges: [], frozen: { rows: 0, columns: 0 } }], names };
};

/** Something of each kind. */
const wholeChange: Change = {
  sheets: [{ name: 'Copy', copyOf: 'Plan' }, { name: 'New one' }],
  cells: [
    { reference: 'Plan!F1:G3', cells: [['Folded', 'Zone'], [{ formula: '=FOLD.FREQ(A3:A4,Rate)' }, { formula: '=FOLD.ZONE(A3,Rate)' }], [null, -1]] },
    { reference: "'New one'!B2", cells: [['=text']] },
    { reference: 'Rate', cells: [[50]] },
  ],
  looks: [
    { reference: 'Plan!F1:G1', look: { bold: true, width: 120, note: 'Folded edges in MHz' } },
    { reference: 'Plan!F2:G3', look: { numberFormat: '0.000', marksNegative: true } },
    { reference: 'Plan!G7', look: { numberFormat: '0.0', bold: false, width: 70, note: 'replaced' } },
  ],
  names: { Fold_Rate: 'Plan!$B$1', Fold_Low: 'Plan!$A$3:$A$4', Reference: null },
};

export function testLiveHost(name: string, open: (workbook: Workbook) => Promise<OpenLiveHost>): void {
  describe(`the port of ${name}, where someone works in it`, () => {
    let opened: OpenLiveHost;
    const start = async () => {
      opened = await open(liveWorkbook());
      await opened.settle();
      return opened;
    };
    afterEach(() => opened.close());

    it('reads the formulas of cells, and none where another cell fills one', async () => {
      const { host } = await start();
      expect(await host.formulas('Plan!A3:D4')).toEqual({
        sheet: 'Plan', address: 'A3:D4',
        formulas: [[null, '=FOLD.FREQ(A3,Rate)', null, '=FOLD.FREQ(A3:A4,Rate)'], [null, '=FOLD.FREQ(A4,Rate)', null, null]],
      });
      expect(await host.formulas('Plan!F7:G7')).toEqual({ sheet: 'Plan', address: 'F7:G7', formulas: [[null, null]] });
      expect((await host.formulas('Rate'))?.address).toBe('B1');
      expect(await host.formulas('Fold_Nothing')).toBeNull();
    });

    it('tells the blocks that formulas fill', async () => {
      const { host } = await start();
      expect(await host.spills('Plan')).toEqual(['D3:D4']);
      expect(await host.spills("Clock's tree")).toEqual([]);
      expect(await host.spills('Missing')).toEqual([]);
    });

    it.each([
      ['inside a block',        'Plan!A4',    'A3:B5'],
      ['on its edge',           'Plan!B3',    'A3:B5'],
      ['a part of it',          'Plan!A3:A4', 'A3:B5'],
      ['a name',                'Rate',       'A1:B1'],
      ['what a formula fills',  'Plan!D4',    'D3:D4'],
    ])('knows what surrounds cells: %s', async (_what, reference, address) => {
      const { host } = await start();
      const block = await host.surroundings(reference);
      expect(block).toEqual(await host.read(`Plan!${address}`));
    });

    it('knows that cells which touch at a corner belong together', async () => {
      const { host, settle } = await start();
      await host.write('Blank!C3:E5', [[1, null, null], [null, 2, null], [null, null, 3]]);
      await settle();
      expect((await host.surroundings('Blank!D4'))?.address).toBe('C3:E5');
    });

    it('knows that nothing surrounds blank cells', async () => {
      const { host } = await start();
      expect(await host.surroundings('Plan!C7')).toBeNull();
      expect(await host.surroundings('Blank!A1:B2')).toBeNull();
      expect(await host.surroundings('Fold_Nothing')).toBeNull();
    });

    it('lists the sheets and what they use, and the names', async () => {
      const { host } = await start();
      expect(await host.sheets()).toEqual([{ sheet: 'Plan', address: 'A1:H7' }, { sheet: "Clock's tree", address: 'A1:B1' }, { sheet: 'Blank', address: '' }]);
      expect(await host.names()).toEqual(contractWorkbook.names);
    });

    it('selects cells, on another sheet too, and tells what is selected', async () => {
      const { host } = await start();
      await host.select('Fold_Low');
      expect(await host.selection()).toEqual({ sheet: 'Plan', address: 'A3:A5' });
      await host.select("'Clock''s tree'!B1");
      expect(await host.selection()).toEqual({ sheet: "Clock's tree", address: 'B1' });
      expect((await host.read('A1'))?.sheet).toBe("Clock's tree");
      await expect(host.select('Fold_Nothing')).rejects.toThrow(HostFault);
    });

    it('tells of a selection, until it is asked to stop', async () => {
      const { host, settle } = await start();
      let told = 0;
      const stop = await host.onSelected(() => told++);
      await host.select('Plan!A4');
      await settle();
      expect(told).toBeGreaterThan(0);
      await stop();
      told = 0;
      await host.select('Plan!A5');
      await settle();
      expect(told).toBe(0);
    });

    it('tells of an edit, until it is asked to stop', async () => {
      const { host, settle } = await start();
      let told = 0;
      const stop = await host.onEdited(() => told++);
      await host.change({ cells: [{ reference: 'Blank!A1', cells: [[1]] }] });
      await settle();
      expect(told).toBeGreaterThan(0);
      await stop();
      told = 0;
      await host.write('Blank!A1', [[2]]);
      await settle();
      expect(told).toBe(0);
    });

    it('makes a change of many parts', async () => {
      const { host, settle } = await start();
      await host.change(wholeChange);
      await settle();
      expect(await host.sheets()).toEqual([
        { sheet: 'Plan', address: 'A1:H7' }, { sheet: "Clock's tree", address: 'A1:B1' }, { sheet: 'Blank', address: '' }, { sheet: 'Copy', address: 'A1:H7' },
        { sheet: 'New one', address: 'B2' },
      ]);
      expect((await host.read('Plan!F1:G3'))?.values).toEqual([['Folded', 'Zone'], [20, 3], [11.44, -1]]);
      expect((await host.formulas('Plan!F1:G3'))?.formulas).toEqual([[null, null], ['=FOLD.FREQ(A3:A4,Rate)', '=FOLD.ZONE(A3,Rate)'], [null, null]]);
      expect((await host.read("'New one'!B2"))?.values).toEqual([['=text']]);
      expect((await host.read('Copy!A3:B4'))?.values).toEqual([[70, 20], [61.44, 11.44]]);
      expect((await host.formulas('Copy!B3:D3'))?.formulas).toEqual([['=FOLD.FREQ(A3,Rate)', null, '=FOLD.FREQ(A3:A4,Rate)']]);
      expect(await host.names()).toEqual({ Rate: 'Plan!$B$1', Fold_Rate: 'Plan!$B$1', Fold_Low: 'Plan!$A$3:$A$4' });
    });

    it('takes a change back, to what exactly was', async () => {
      const { host, settle, state } = await start();
      const before = state();
      const undo = await host.change(wholeChange);
      await settle();
      expect(state()).not.toEqual(before);
      await undo();
      await settle();
      expect(state()).toEqual(before);
    });

    it('takes back changes in any order, as long as they don\'t meet', async () => {
      const { host, settle, state } = await start();
      const before = state();
      const undoOne = await host.change({ cells: [{ reference: 'Plan!J1:J2', cells: [[1], [{ formula: '=FOLD.ZONE(A3,Rate)' }]] }], looks: [{ reference: 'Plan!J1', look: { bold: true } }] });
      const undoOther = await host.change({ cells: [{ reference: 'Rate', cells: [[60]] }], names: { Fold_Rate: 'Plan!$B$1' } });
      await settle();
      await undoOne();
      await undoOther();
      await settle();
      expect(state()).toEqual(before);
    });

    it('takes back looks, whatever their cells hold by then', async () => {
      const { host, settle, state } = await start();
      await host.write('Plan!J1', [[5]]);
      await settle();
      const written = state();
      await host.write('Plan!J1', [[4]]);
      const undo = await host.change({ looks: [{ reference: 'Plan!J1', look: { numberFormat: '0.0', bold: true, width: 33, note: 'note', marksNegative: true } }] });
      await host.write('Plan!J1', [[5]]);
      await undo();
      await settle();
      expect(state()).toEqual(written);
    });

    it.each<[string, Change, string, CellInput]>([
      ['a written cell',         { cells: [{ reference: 'Plan!J1:J2', cells: [[1], [2]] }] }, 'Plan!J2',       3],
      ['a cell that was blank',  { cells: [{ reference: 'Plan!A3', cells: [[null]] }] },      'Plan!A3',       5],
      ['a cell of a new sheet',  { sheets: [{ name: 'New', copyOf: 'Plan' }] },               'New!Z9',        'mine'],
    ])('does not take a change back over what came later: %s', async (_what, change, reference, value) => {
      const { host, settle, state } = await start();
      const undo = await host.change(change);
      await host.write(reference, [[value]]);
      await settle();
      const since = state();
      await expect(undo()).rejects.toThrow(HostFault);
      expect(state()).toEqual(since);
    });

    it('does not take back a name that came to mean something else', async () => {
      const { host, state } = await start();
      const undo = await host.change({ names: { Fold_Rate: 'Plan!$B$1' } });
      await host.change({ names: { Fold_Rate: 'Plan!$A$1' } });
      const since = state();
      await expect(undo()).rejects.toThrow(HostFault);
      expect(state()).toEqual(since);
    });

    it('changes nothing where nothing is asked', async () => {
      const { host, state } = await start();
      const before = state();
      const undo = await host.change({});
      await undo();
      expect(state()).toEqual(before);
    });

    it.each<[string, Change]>([
      ['an unknown reference',        { cells: [{ reference: 'Fold_Nothing', cells: [[1]] }] }],
      ['an unknown sheet',            { cells: [{ reference: 'Missing!A1', cells: [[1]] }] }],
      ['a block of another size',     { cells: [{ reference: 'Plan!J1:J2', cells: [[1]] }] }],
      ['no number',                   { cells: [{ reference: 'Plan!J1', cells: [[NaN]] }] }],
      ['a look on an unknown name',   { looks: [{ reference: 'Fold_Nothing', look: { bold: true } }] }],
      ['a sheet that exists',         { sheets: [{ name: 'PLAN' }] }],
      ['a copy of an unknown sheet',  { sheets: [{ name: 'New', copyOf: 'Missing' }] }],
      ['a sheet without a name',      { sheets: [{ name: '' }] }],
      ['a sheet with a wrong name',   { sheets: [{ name: 'a/b' }] }],
      ['an unknown table',            { tableColumns: [{ table: 'Missing', cells: [['Zone'], [1]] }] }],
    ])('makes nothing of a change with %s', async (_what, wrong) => {
      const { host, state, settle } = await start();
      const before = state();
      const change: Change = {
        sheets: [...wholeChange.sheets!, ...wrong.sheets ?? []], tableColumns: wrong.tableColumns ?? [], cells: [...wholeChange.cells!, ...wrong.cells ?? []],
        looks: [...wholeChange.looks!, ...wrong.looks ?? []], names: wholeChange.names!,
      };
      await expect(host.change(change)).rejects.toThrow(HostFault);
      await settle();
      expect(state()).toEqual(before);
    });

    it('keeps a formula a formula in a cell for text', async () => {
      const { host, settle } = await start();
      await host.change({ cells: [{ reference: 'Plan!H7', cells: [[{ formula: '=FOLD.ZONE(A3,Rate)' }]] }] });
      await settle();
      expect((await host.read('Plan!H7'))?.values).toEqual([[2]]);
    });

    it('takes back whatever it can change', async () => {
      const { host, settle, state } = await start();
      const before = state();
      await fc.assert(fc.asyncProperty(anyChange, async (change) => {
        const undo = await host.change(change);
        await settle();
        await undo();
        await settle();
        expect(state()).toEqual(before);
      }), { numRuns: 12 });
    });

    it('lets the functions start with the workbook', async () => {
      const { host } = await start();
      await expect(host.startWithWorkbook()).resolves.toBeUndefined();
    });
  });
}

// Changes at random: small blocks over what there is, twice over the same cells too

const anyBlock = fc.tuple(fc.constantFrom('Plan', 'Blank'), fc.nat(7), fc.nat(8), fc.integer({ min: 1, max: 2 }), fc.integer({ min: 1, max: 2 }));
const cellName = (row: number, column: number) => `${String.fromCharCode(65 + column)}${row + 1}`;
const anyInput: fc.Arbitrary<CellInput> = fc.oneof(
  fc.constantFrom(null, '', 'text', '=text', '007', true, { formula: '=FOLD.ZONE(A3,Rate)' }, { formula: '=FOLD.FREQ(A3:A4,Rate)' }), fc.integer({ min: -99, max: 99 }),
);
const anyCells = anyBlock.chain(([sheet, row, column, rows, columns]) => fc.array(fc.array(anyInput, { minLength: columns, maxLength: columns }), { minLength: rows, maxLength: rows })
  .map((cells) => ({ reference: `${sheet}!${cellName(row, column)}:${cellName(row + rows - 1, column + columns - 1)}`, cells })));
const anyLook: fc.Arbitrary<{ reference: string; look: Look }> = fc.tuple(anyBlock, fc.record({
  numberFormat: fc.constantFrom('0.000', '@', 'General'), bold: fc.boolean(), width: fc.constantFrom(40, 64, 120), note: fc.constantFrom('a note', ''), marksNegative: fc.boolean(),
}, { requiredKeys: [] })).map(([[sheet, row, column, rows, columns], look]) => ({ reference: `${sheet}!${cellName(row, column)}:${cellName(row + rows - 1, column + columns - 1)}`, look }));
const anyChange: fc.Arbitrary<Change> = fc.record({
  sheets: fc.constantFrom([], [{ name: 'New' }], [{ name: 'New', copyOf: 'Plan' }]), cells: fc.array(anyCells, { maxLength: 3 }), looks: fc.array(anyLook, { maxLength: 3 }),
  names: fc.dictionary(fc.constantFrom('Fold_Low', 'Fold_Rate', 'Reference'), fc.constantFrom('Plan!$A$3', 'Blank!$B$2', null), { noNullPrototype: true }),
}, { requiredKeys: [] });
