// The plan as the workbook's names give it, and what has become of them since.

import { afterEach, describe, expect, it } from 'vitest';
import type { Workbook } from '../../src/host/port';
import { openHeadless } from '../../src/host/sheet/headless';
import type { SheetHost } from '../../src/host/sheet/sheet-host';
import { type Plan, readPlan } from '../../src/pane/plan';
import { renamedHeaders } from '../../src/pane/setup/table';
import { built } from '../support/built-functions';
import { type Given, planOf } from '../support/workbook';

let host: SheetHost;
afterEach(() => host.dispose());

async function read(workbook: Workbook): Promise<Plan> {
  host = openHeadless(built);
  await host.load(workbook);
  return readPlan(host);
}

const ROWS: Given[][] = [['fs', 100, null, null], ['Name', 'Low', 'High', 'Role'], ['a', 10, 20, 'wanted'], ['b', 60, 70, 'unwanted']];
const NAMES = { Fold_Name: 'Plan!$A$3:$A$4', Fold_Low: 'Plan!$B$3:$B$4', Fold_High: 'Plan!$C$3:$C$4', Fold_Role: 'Plan!$D$3:$D$4', Fold_Rate: 'Plan!$B$1', Fold_Guard: 'Plan!$C$1' };

describe('a plan', () => {
  it('is read with its places, its headers and their unit', async () => {
    const plan = await read(planOf([ROWS[0]!, ['Name', 'Low (MHz)', 'High (MHz)', 'Role'], ...ROWS.slice(2)], NAMES));
    expect(plan.notices).toEqual([]);
    expect(plan.rows.map(({ name, role, low, high }) => [name, role, low, high])).toEqual([['a', 'wanted', 10, 20], ['b', 'unwanted', 60, 70]]);
    expect(plan.places).toMatchObject({ low: { sheet: 'Plan', address: 'B3:B4' }, rate: { sheet: 'Plan', address: 'B1' } });
    expect(plan.table).toMatchObject({ sheet: 'Plan', first: 2, rows: 2, header: 1, unit: 'MHz', lastBelow: null, columns: { low: { column: 1, title: 'Low (MHz)' } } });
  });

  it.each<[centre: Given, width: Given, low: number | null, high: number | null, problem: string | null]>([
    // centre, width, low, high, problem
    [100,     20,     90,    110,    null],
    [0.3,     0.2,    0.2,   0.4,    null],
    [100.1,   0.0002, 100.0999, 100.1001, null],
    [100,     null,   100,   100,    null],
    [100,     0,      100,   100,    null],
    [100,     -1,     null,  null,   'The width in C2 must be 0 or more; got -1.'],
    [null,    5,      null,  null,   'The centre in B2 is blank.'],
    ['fast',  5,      null,  null,   'The centre in B2 must be a number; got "fast".'],
    [100,     'wide', null,  null,   'The width in C2 must be a number; got "wide".'],
  ])('with centre %s and width %s has the edges %s and %s', async (centre, width, low, high, problem) => {
    const plan = await read(planOf([['fs', 100], ['a', centre, width, null], ['b', 50, 1]], { Fold_Centre: 'Plan!$B$2:$B$3', Fold_Width: 'Plan!$C$2:$C$3', Fold_Rate: 'Plan!$B$1' }));
    expect(plan.edges).toEqual(['centre', 'width']);
    expect(plan.rows[0]).toMatchObject({ low, high, problem, usable: problem === null, place: 'B2' });
  });

  it('without columns for names and roles and a cell for the guard says what it takes instead', async () => {
    const { Fold_Low, Fold_High, Fold_Rate } = NAMES;
    expect((await read(planOf(ROWS, { Fold_Low, Fold_High, Fold_Rate }))).notices).toEqual([
      'No cell is chosen for the guard, so it is taken as 0; choose one under Plan.',
      'No column of band names is chosen, so bands are called by their row; choose one under Plan.',
      'No column of roles is chosen, so every band counts as wanted; choose one under Plan.',
    ]);
  });

  it('of tones has one column for both edges', async () => {
    const plan = await read(planOf([['Tone', 'f'], ['a', 70], ['fs', 100]], { Fold_Low: 'Plan!$B$2', Fold_High: 'Plan!$B$2', Fold_Rate: 'Plan!$B$3' }));
    expect(plan.rows.map(({ low, high }) => [low, high])).toEqual([[70, 70]]);
    expect(plan.table).not.toBeNull();
  });

  it('has its units in a row of their own below the headers, or no headers at all', async () => {
    const units = await read(planOf([['fs', 100], ['Low', 'High'], ['kHz', 'kHz'], [1, 2]], { Fold_Low: 'Plan!$A$4', Fold_High: 'Plan!$B$4', Fold_Rate: 'Plan!$B$1' }));
    expect(units.table).toMatchObject({ header: 1, unit: 'kHz', first: 3 });
    host.dispose();
    const bare = await read(planOf([[1, 2, 100]], { Fold_Low: 'Plan!$A$1', Fold_High: 'Plan!$B$1', Fold_Rate: 'Plan!$C$1' }));
    expect(bare.table).toMatchObject({ header: null, unit: null, first: 0 });
  });
});

describe('what has become of a plan is said', () => {
  it.each<[what: string, rows: Given[][], names: Record<string, string>, notice: string]>([
    ['a column was deleted', ROWS, { ...NAMES, Fold_High: '#REF!' }, 'Fold_High stands for cells that were deleted. Point at the column of high edges again, under Plan.'],
    ['a column is missing', ROWS, Object.fromEntries(Object.entries(NAMES).filter(([name]) => name !== 'Fold_High')), 'The plan lacks the column of high edges (Fold_High); choose it under Plan.'],
    ['the columns changed places', [ROWS[0]!, ['Name', 'High', 'Low', 'Role'], ...ROWS.slice(2)], NAMES,
      'The header above Fold_Low, in B2, says “High”: look whether the name still stands for the right column, under Plan.'],
    ['a column begins elsewhere', ROWS, { ...NAMES, Fold_High: 'Plan!$C$2:$C$3' }, 'Fold_High (C2:C3) and Fold_Low (B3:B4) are not in the same rows.'],
    ['the lengths differ', ROWS, { ...NAMES, Fold_High: 'Plan!$C$3' }, 'The columns differ in length (Fold_Name 2, Fold_Low 2, Fold_High 1, Fold_Role 2); rows are matched from the top.'],
    ['rows were added below', [...ROWS, ['c', 80, 90]], NAMES, 'A row below the plan, down to row 5, holds numbers too and is not part of it; take them in under Plan.'],
    ['units were changed', [ROWS[0]!, ['Name', 'Low (MHz)', 'High (kHz)', 'Role'], ...ROWS.slice(2)], NAMES,
      'The plan mixes units: low edges (B3:B4) in MHz, high edges (C3:C4) in kHz. All frequencies must be in one unit; bring them to one in the sheet.'],
  ])('where %s', async (_what, rows, names, notice) => {
    expect((await read(planOf(rows, names))).notices).toContain(notice);
  });

  it('where a header was renamed', async () => {
    const before = await read(planOf(ROWS, NAMES));
    await host.write('Plan!B2:C2', [['Low', 'Zone']]);
    const after = await readPlan(host);
    expect(renamedHeaders(before.table!, after.table!)).toEqual(['The header above Fold_High, in C2, was “High” and is now “Zone”.']);
  });

  it('but not of a header in another language, nor of what is merely text below', async () => {
    const plan = await read(planOf([ROWS[0]!, ['Name', 'Von', 'Bis', 'Rolle'], ...ROWS.slice(2), ['', 'checked']], NAMES));
    expect(plan.notices).toEqual([]);
  });
});
