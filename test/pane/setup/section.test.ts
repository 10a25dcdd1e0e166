// The section Plan over the embedded sheet: it proposes, is corrected, stores names, and notices what becomes of them.

import { afterEach, describe, expect, it } from 'vitest';
import type { Workbook } from '../../../src/host/port';
import { planSection } from '../../../src/pane/setup';
import { type Given, planOf } from '../../support/workbook';
import { type Stage, stage } from '../stage';

let open: Stage;
afterEach(() => open.host.dispose());

async function start(workbook: Workbook): Promise<Stage> {
  open = await stage(workbook, planSection);
  await expect.poll(() => open.text()).toMatch(/Found on|No plan was found|is the plan that/);
  return open;
}

const BANDS: Given[][] = [['FM', 87.5, 108, 'unwanted'], ['Airband', 118, 137, 'wanted']];
const PLAN: Given[][] = [['Sample rate', 409.6, 'MHz'], ['Guard', 0.02], ['Clock tolerance', 20, 'ppm'], [], ['Name', 'Low (MHz)', 'High (MHz)', 'Role'], ...BANDS];
const STORED = {
  Fold_Name: 'Plan!$A$6:$A$7', Fold_Low: 'Plan!$B$6:$B$7', Fold_High: 'Plan!$C$6:$C$7', Fold_Role: 'Plan!$D$6:$D$7',
  Fold_Rate: 'Plan!$B$1', Fold_Guard: 'Plan!$B$2', Fold_Ppm: 'Plan!$B$3',
};
const said = () => expect.poll(() => open.told);

describe('the section Plan', () => {
  it('proposes a plan unasked, stores it as names, and takes that back in one step', async () => {
    const { press, host, field } = await start(planOf(PLAN));
    expect(field('Low edges').value).toBe('B6:B7');
    expect(open.text()).toContain('headed “Low (MHz)” in B5, in MHz');
    await press('Use this plan');
    await said().toEqual({ news: 'Stored the plan in the workbook.', fault: '' });
    expect(await host.names()).toEqual(STORED);
    expect(open.text()).toContain('This is the plan that the workbook holds.');
    await press('Undo');
    await said().toEqual({ news: 'Undone: the workbook is as it was before.', fault: '' });
    expect(await host.names()).toEqual({});
  });

  it('finds itself set up where the workbook holds names', async () => {
    const { field } = await start(planOf(PLAN, STORED));
    expect(['Names', 'Low edges', 'High edges', 'Roles', 'Sample rate', 'Guard', 'Clock tolerance'].map((label) => field(label).value)).toEqual(
      ['A6:A7', 'B6:B7', 'C6:C7', 'D6:D7', 'B1', 'B2', 'B3']);
  });

  it('is corrected by pointing: one cell stands for the rows of the other columns', async () => {
    const { press, host, field } = await start(planOf([['Name', 'Low', 'High', 'Other'], ['a', 1, 2, 3], ['b', 3, 4, 5], [], ['fs', 100]]));
    await host.select('Plan!D3');
    await press('Use selection for high edges');
    await expect.poll(() => field('High edges').value).toBe('D2:D3');
    await press('Use this plan');
    await said().toMatchObject({ news: 'Stored the plan in the workbook.' });
    expect(await host.names()).toMatchObject({ Fold_High: 'Plan!$D$2:$D$3', Fold_Rate: 'Plan!$B$5' });
  });

  it('takes the filled cells below where nothing else is chosen', async () => {
    const { press, host, field } = await start(planOf([['x', 'y'], [1, 2], [3, 4], [5, 6]]));
    expect(open.text()).toContain('No plan was found');
    await host.select('Plan!A1');
    await press('Use selection for low edges');
    await expect.poll(() => field('Low edges').value).toBe('A2:A4');
  });

  it('stores centre and width, and takes the names of edges away', async () => {
    const { press, host, tick, type } = await start(planOf([['fs', 100], ['Name', 'Low', 'High', 'Middle', 'Breadth'], ['a', 1, 3, 2, 2]], { Fold_Low: 'Plan!$B$3', Fold_High: 'Plan!$C$3', Fold_Rate: 'Plan!$B$1' }));
    tick('centre and width');
    type('Centres', 'D3');
    type('Widths', 'Plan!$E$3');
    await press('Use this plan');
    await said().toMatchObject({ news: 'Stored the plan in the workbook.' });
    expect(await host.names()).toEqual({ Fold_Centre: 'Plan!$D$3', Fold_Width: 'Plan!$E$3', Fold_Rate: 'Plan!$B$1' });
  });

  it('writes labelled cells above the plan for what the sheet lacks, and undoes cells and names in one step', async () => {
    const workbook = planOf([['A title'], [], [], [], [], ['Low (MHz)', 'High (MHz)'], [1, 2]]);
    const { press, host, type, values } = await start(workbook);
    const before = host.save();
    await press('New cell for sample rate');
    await expect.poll(() => open.text()).toContain('will be written to A4:C4');
    type('Sample rate to begin with', '409,6');
    await press('New cell for guard');
    await expect.poll(() => open.text()).toMatch(/“Sample rate”, and the value will be written to A3:C3(.|\n)*“Guard”, and the value will be written to A4:C4/);
    await press('Use this plan');
    await said().toMatchObject({ news: 'Stored the plan in the workbook.' });
    expect(await values('Plan!A1:C6')).toEqual([['A title', null, null], [null, null, null], ['Sample rate', 409.6, 'MHz'], ['Guard', 0, 'MHz'], [null, null, null], ['Low (MHz)', 'High (MHz)', null]]);
    expect(await host.names()).toEqual({ Fold_Low: 'Plan!$A$7', Fold_High: 'Plan!$B$7', Fold_Rate: 'Plan!$B$3', Fold_Guard: 'Plan!$B$4' });
    await press('Undo');
    await said().toMatchObject({ news: 'Undone: the workbook is as it was before.' });
    expect(host.save()).toEqual(before);
  });

  it('writes them beside the plan where there is no room above', async () => {
    const { press, host, type } = await start(planOf([['Low', 'High', null, 'x'], [1, 2, null, 'y']]));
    await press('New cell for sample rate');
    await expect.poll(() => open.text()).toContain('will be written to F1:H1');
    type('Sample rate to begin with', '100');
    await press('Use this plan');
    await said().toMatchObject({ news: 'Stored the plan in the workbook.' });
    expect(await host.names()).toMatchObject({ Fold_Rate: 'Plan!$G$1' });
  });
});

describe('the section Plan refuses, with a sentence', () => {
  it.each([
    ['text that is no address',  'Low edges',       'all of it',  'Low edges: “all of it” is no address of cells; write it like B8:B20 or Plan!B8:B20.'],
    ['a sheet that is missing',  'High edges',      'Old!C6:C7',  'High edges: the workbook has no sheet “Old”.'],
    ['several columns',          'High edges',      'C6:D7',      'High edges: C6:D7 must be one column.'],
    ['other rows',               'Roles',           'D5:D7',      'Roles: D5:D7 must be in the same rows as the edges, 6 to 7.'],
    ['no rate',                  'Sample rate',     '',           'Sample rate: say where it stands, like B3.'],
    ['several cells for a rate', 'Sample rate',     'B1:B2',      'Sample rate: B1:B2 must be one cell.'],
    ['text for a rate',          'Sample rate',     'A1',         'Sample rate: A1 holds “Sample rate” and no number.'],
  ])('%s', async (_what, label, text, sentence) => {
    const { press, type, host } = await start(planOf(PLAN));
    type(label, text);
    await press('Use this plan');
    await said().toEqual({ news: '', fault: sentence });
    expect(await host.names()).toEqual({});
  });

  it('a new rate without a number', async () => {
    const { press, type } = await start(planOf([[], [], ['Low', 'High'], [1, 2]]));
    await press('New cell for sample rate');
    await expect.poll(() => open.text()).toContain('will be written');
    type('Sample rate to begin with', 'fast');
    await press('Use this plan');
    await said().toEqual({ news: '', fault: 'Sample rate to begin with must be a number above 0; got “fast”.' });
  });
});

describe('the section Plan notices', () => {
  it('rows added below, and takes them in', async () => {
    const { press, host } = await start(planOf([...PLAN, ['AIS', 161.9, 162.1, 'wanted'], ['Beacon', 406, 406.1]], STORED));
    await press('Take in the rows down to 9');
    await said().toMatchObject({ news: 'The plan now reaches down to row 9.' });
    expect(await host.names()).toEqual(Object.fromEntries(Object.entries(STORED).map(([name, refersTo]) => [name, refersTo.replace('$7', '$9')])));
  });

  it('a header that is changed', async () => {
    const { host, refresh } = await start(planOf(PLAN, STORED));
    await host.write('Plan!B5', [['Channel power']]);
    await refresh();
    expect(open.text()).toContain('The header above Fold_Low, in B5, was “Low (MHz)” and is now “Channel power”.');
  });

  it('names with markup, formulas as text and other writing as what they are', async () => {
    const header = '<img src=x onerror=alert(1)> Low';
    const { host, place, refresh } = await start(planOf(PLAN, STORED));
    await host.write('Plan!B5', [[header]]);
    await refresh();
    expect(open.text()).toContain(header);
    expect(place.querySelector('img')).toBeNull();
  });
});
