// The section Columns over the embedded sheet: what it offers, shows, inserts and takes back.

import { afterEach, describe, expect, it } from 'vitest';
import type { Workbook } from '../../../src/host/port';
import { columnsSection } from '../../../src/pane/columns';
import { type Given, planOf } from '../../support/workbook';
import { call } from '../../support/built-functions';
import { type Stage, stage } from '../stage';

let open: Stage;
afterEach(() => open.host.dispose());

async function start(workbook: Workbook): Promise<Stage> {
  open = await stage(workbook, columnsSection);
  await expect.poll(() => open.text()).toMatch(/Insert \d+ column|need a plan/);
  return open;
}

async function said(news: RegExp | string): Promise<void> {
  await expect.poll(() => open.told).toEqual({ news: typeof news === 'string' ? news : expect.stringMatching(news), fault: '' });
  await open.host.settled();
}

const complained = (fault: RegExp | string) => expect.poll(() => open.told).toEqual({ news: '', fault: typeof fault === 'string' ? fault : expect.stringMatching(fault) });

const EDGES: Given[][] = [['fs', 245.76], ['Guard', 0.5], ['ppm', 20], ['Name', 'Low (MHz)', 'High (MHz)'], ['Airband', 118, 137], ['AIS', 161.9625, 162.0375], ['Beacon', 122, 124]];
const NAMES = { Fold_Name: 'Plan!$A$5:$A$7', Fold_Low: 'Plan!$B$5:$B$7', Fold_High: 'Plan!$C$5:$C$7', Fold_Rate: 'Plan!$B$1', Fold_Guard: 'Plan!$B$2', Fold_Ppm: 'Plan!$B$3' };
const edgesPlan = () => planOf(EDGES, NAMES);
const column = (rows: unknown[][]) => rows.map(([cell]) => cell);

describe('the section Columns', () => {
  it('shows the first rows before anything is inserted, by the engine', async () => {
    const { place } = await start(edgesPlan());
    const rows = [...place.querySelectorAll('.first-rows tbody tr')].map((row) => [...row.querySelectorAll('th, td')].map((cell) => cell.textContent));
    const [low, high] = [[118, 161.9625, 122], [137, 162.0375, 124]];
    expect(rows.map((row) => Number(row[1]))).toEqual(column(call('LOW', low, high, 245.76)));
    expect(rows.map((row) => Number(row[2]))).toEqual(column(call('HIGH', low, high, 245.76)));
    expect(rows.map((row) => [row[0], row[6]])).toEqual([['Airband', 'crosses 122.88'], ['AIS', 'clear'], ['Beacon', 'crosses 122.88']]);
  });

  it('inserts one formula per row in one step, with formats, widths, notes and marks, and undoes all of it', async () => {
    const { press, host, values } = await start(edgesPlan());
    const before = host.save();
    await press('Insert 6 columns');
    await said('Inserted 6 columns at D4:I7.');
    expect((await host.formulas('Plan!D5:I5'))!.formulas).toEqual([[
      '=FOLD.LOW(B5,C5,Fold_Rate)', '=FOLD.HIGH(B5,C5,Fold_Rate)', '=FOLD.ZONE((B5+C5)/2,Fold_Rate)', '=FOLD.INVERTED((B5+C5)/2,Fold_Rate)',
      '=FOLD.MARGIN(B5,C5,Fold_Rate,Fold_Guard,Fold_Ppm)', '=FOLD.CHECK(B5,C5,Fold_Rate,Fold_Guard,Fold_Ppm)',
    ]]);
    const [low, high] = [[118, 161.9625, 122], [137, 162.0375, 124]];
    expect(await values('Plan!D4:I4')).toEqual([['Folded low (MHz)', 'Folded high (MHz)', 'Zone', 'Inverted', 'Margin (MHz)', 'Check']]);
    expect(column((await values('Plan!D5:D7'))!)).toEqual(column(call('LOW', low, high, 245.76)));
    expect(column((await values('Plan!H5:H7'))!)).toEqual(column(call('MARGIN', low, high, 245.76, 0.5, 20)));
    const { cells, columns } = host.save().sheets[0]!;
    expect(cells[4]![3]!.style!.numberFormat).toBe('0.0000');
    expect(cells[4]![7]!.style!.numberFormat).toBe('0.0000000');
    expect(cells[3]![3]!.style!.bold).toBe(true);
    expect(columns[3]!.width).toBeGreaterThan(90);
    await press('Undo');
    await said('Undone: the workbook is as it was before.');
    expect(host.save()).toEqual(before);
  });

  it('inserts one spilled column each, by the names of the plan', async () => {
    const { press, host, tick, values } = await start(edgesPlan());
    tick('one formula for each column');
    await press('Insert 6 columns');
    await said('Inserted 6 columns at D4:I7.');
    expect((await host.formulas('Plan!D5:D6'))!.formulas).toEqual([['=FOLD.LOW(Fold_Low,Fold_High,Fold_Rate)'], [null]]);
    expect(column((await values('Plan!F5:F7'))!)).toEqual([2, 2, 2].map((_, i) => call('ZONE', [127.5, 162, 123], 245.76)[i]![0]));
  });

  it.each([
    ['one formula in every row', '=FOLD.LOW(B2-C2/2,B2+C2/2,Fold_Rate)', '=FOLD.ZONE(B2,Fold_Rate)'],
    ['one formula for each column', '=FOLD.LOW(Fold_Centre-Fold_Width/2,Fold_Centre+Fold_Width/2,Fold_Rate)', '=FOLD.ZONE(Fold_Centre,Fold_Rate)'],
  ])('gives a plan with centre and width formulas with those expressions: %s', async (way, low, zone) => {
    const { press, host, tick, values } = await start(planOf([['Name', 'Centre', 'Width', null], ['a', 127.5, 19, null], ['b', 162, 0.075, 100]],
      { Fold_Centre: 'Plan!$B$2:$B$3', Fold_Width: 'Plan!$C$2:$C$3', Fold_Rate: 'Plan!$D$3' }));
    tick(way);
    await press('Insert 6 columns');
    await said('Inserted 6 columns at E1:J3.');
    expect((await host.formulas('Plan!E2:G2'))!.formulas[0]).toEqual([low, expect.any(String), zone]);
    expect(column((await values('Plan!E2:E3'))!)).toEqual(column(call('LOW', [118, 161.9625], [137, 162.0375], 100)));
    expect(column((await values('Plan!I2:I3'))!)).toEqual(column(call('MARGIN', [118, 161.9625], [137, 162.0375], 100)));
  });

  it('leaves blank rows blank, in every column', async () => {
    const rows: Given[][] = [...EDGES.slice(0, 5), [], ...EDGES.slice(5)];
    const names = Object.fromEntries(Object.entries(NAMES).map(([name, refersTo]) => [name, refersTo.replace('$7', '$8')]));
    for (const way of ['one formula in every row', 'one formula for each column']) {
      const { press, tick, values, host } = await start(planOf(rows, names));
      tick(way);
      await press('Insert 6 columns');
      await said(/^Inserted/);
      expect((await values('Plan!D6:I6'))![0]!.map((value) => value ?? '')).toEqual(['', '', '', '', '', '']);
      expect((await values('Plan!F5:F8'))!.map(([value]) => value ?? '')).toEqual([2, '', 2, 2]);
      if (way === 'one formula in every row') host.dispose();
    }
  });

  it('offers one folded frequency for a plan of tones, and numbers without decimals where it has none', async () => {
    const { press, host, values } = await start(planOf([['Tone', 'Frequency (Hz)'], ['a', 70], ['b', 130], ['fs', 100]], { Fold_Low: 'Plan!$B$2:$B$3', Fold_High: 'Plan!$B$2:$B$3', Fold_Rate: 'Plan!$B$4' }));
    await press('Insert 5 columns');
    await said('Inserted 5 columns at C1:G3.');
    expect((await host.formulas('Plan!C2:D2'))!.formulas).toEqual([['=FOLD.FREQ(B2,Fold_Rate)', '=FOLD.ZONE(B2,Fold_Rate)']]);
    expect(await values('Plan!C1:C3')).toEqual([['Folded frequency (Hz)'], [30], [30]]);
    expect(host.save().sheets[0]!.cells[1]![2]!.style!.numberFormat).toBe('0');
  });

  it('uses the workbook’s own names for the cells, or Foldplan’s where that is wished', async () => {
    const { press, tick, host } = await start(planOf(EDGES, { ...NAMES, Rate: 'Plan!$B$1', Spare: 'Plan!$B$2' }));
    expect(open.text()).toContain('=FOLD.MARGIN(B5,C5,Rate,Spare,Fold_Ppm)');
    tick('Use the workbook’s own names: Rate, Spare');
    expect(open.text()).toContain('=FOLD.MARGIN(B5,C5,Fold_Rate,Fold_Guard,Fold_Ppm)');
    tick('Use the workbook’s own names: Rate, Spare');
    await press('Insert 6 columns');
    await said(/^Inserted/);
    expect((await host.formulas('Plan!D5'))!.formulas).toEqual([['=FOLD.LOW(B5,C5,Rate)']]);
  });

  it('leaves guard and tolerance out where the plan has none', async () => {
    const { Fold_Name, Fold_Low, Fold_High, Fold_Rate, Fold_Ppm } = NAMES;
    await start(planOf(EDGES, { Fold_Name, Fold_Low, Fold_High, Fold_Rate, Fold_Ppm }));
    expect(open.text()).toContain('=FOLD.MARGIN(B5,C5,Fold_Rate,0,Fold_Ppm)');
    open.host.dispose();
    await start(planOf(EDGES, { Fold_Name, Fold_Low, Fold_High, Fold_Rate }));
    expect(open.text()).toContain('=FOLD.MARGIN(B5,C5,Fold_Rate)');
  });
});

describe('the section Columns never writes over content unasked', () => {
  const crowded = () => planOf(EDGES.map((row, i) => (i === 5 ? [...row, null, 'keep'] : row)), NAMES);

  it('begins at the next columns that are free', async () => {
    const { press } = await start(crowded());
    await press('Insert 6 columns');
    await said('Inserted 6 columns at F4:K7.');
  });

  it('says which cells hold something, and takes other columns instead', async () => {
    const { press, type, host } = await start(crowded());
    const before = host.save();
    type('First column', 'D');
    await press('Insert 6 columns');
    await complained('Nothing was written: E6 holds something already.');
    expect(host.save()).toEqual(before);
    await press('Take column F instead');
    await expect.poll(() => open.text()).not.toContain('Take column');
    await press('Insert 6 columns');
    await said('Inserted 6 columns at F4:K7.');
  });

  it.each(['one formula in every row', 'one formula for each column'])('writes over them when told so, and brings them back: %s', async (way) => {
    const { press, type, tick, host, values } = await start(crowded());
    const before = host.save();
    tick(way);
    type('First column', 'D7');
    await press('Insert 6 columns');
    await complained(/E6 holds something/);
    await press('Write over them');
    await said('Inserted 6 columns at D4:I7.');
    expect((await values('Plan!E6'))![0]![0]).toBeCloseTo(83.7975, 9);
    await press('Undo');
    await said(/^Undone/);
    expect(host.save()).toEqual(before);
  });

  it.each([
    ['the plan itself', 'B',    'Column B holds the plan itself; choose another first column.'],
    ['too near the end', 'XFB', 'From column XFB on there is no room for 6 columns: the sheet ends with XFD. Choose another first column.'],
    ['no column',       '12!',  'The first column must be letters such as K, or a cell such as K7; got “12!”.'],
  ])('refuses %s', async (_what, text, sentence) => {
    const { press, type, host } = await start(edgesPlan());
    const before = host.save();
    type('First column', text);
    await press('Insert 6 columns');
    await complained(sentence);
    expect(host.save()).toEqual(before);
  });
});

describe('the section Columns says', () => {
  it('what it needs where there is no plan', async () => {
    await start(planOf([['x']]));
    expect(open.text()).toContain('Columns need a plan: choose its cells under Plan.');
  });

  it('which inserted cell shows an error, and why', async () => {
    const { press } = await start(planOf(EDGES.map((row, i) => (i === 5 ? ['AIS', 'low', 162] : row)), NAMES));
    await press('Insert 6 columns');
    await expect.poll(() => open.told.fault).toBe('D6 shows #VALUE!: low must be a number; got "low". So do 5 cells more.');
  });

  it('no undo for columns that the user took back', async () => {
    const { press, host, refresh, text } = await start(edgesPlan());
    await press('Insert 6 columns');
    await said(/^Inserted/);
    expect(text()).toContain('Undo');
    await host.write('Plan!D4', [[null]]);
    await refresh();
    await expect.poll(() => text()).not.toContain('Undo');
  });
});
