import { afterEach, describe, expect, it } from 'vitest';
import type { CellValue, LiveHost, Workbook } from '../../../src/host/port';
import { handOverSection } from '../../../src/pane/handover';
import { coastPlan } from '../../../src/demo/coast';
import { type Stage, stage } from '../stage';
import { planOf } from '../../support/workbook';

let at: Stage;
afterEach(() => at.host.dispose());

const until = (look: () => unknown) => expect.poll(look, { timeout: 15_000 });
const formulasOf = (workbook: Workbook, name: string) => Object.values(workbook.sheets.find((sheet) => sheet.name === name)!.cells)
  .flatMap((line) => Object.values(line).flatMap(({ formula }) => (formula === undefined ? [] : [formula])));
const valuesOf = (workbook: Workbook, name: string) => Object.fromEntries(Object.entries(workbook.sheets.find((sheet) => sheet.name === name)!.cells).flatMap(([row, line]) =>
  Object.entries(line).filter(([, { value }]) => value !== null && value !== '').map(([column, { value }]) => [`${row},${column}`, typeof value === 'number' ? Number(value.toPrecision(12)) : value])));

describe('a plain copy of a sheet', () => {
  it('shows what the sheet shows, without a FOLD formula; the sheet stays, and a list tells of it', async () => {
    at = await stage(coastPlan(), handOverSection);
    await until(() => at.text()).toContain('Make a plain copy');
    const before = at.host.save();
    await at.press('Make a plain copy');
    await until(() => at.told.news).toBe('The sheet Plan, plain is a plain copy: 78 FOLD formulas became native, none a value. The sheet Plain copy lists them.');
    await at.host.settled();
    const after = at.host.save();
    expect(after.sheets.map(({ name }) => name)).toEqual(['Plan', 'Choosing a rate', 'Rates and images', 'Plan, plain', 'Plain copy']);
    expect(formulasOf(after, 'Plan, plain').filter((formula) => formula.includes('FOLD'))).toEqual([]);
    expect(formulasOf(after, 'Plan, plain')).toHaveLength(78);
    expect(valuesOf(after, 'Plan, plain')).toEqual(valuesOf(before, 'Plan'));
    expect(after.sheets.slice(0, 3)).toEqual(before.sheets);
    const list = Object.values(valuesOf(after, 'Plain copy'));
    expect(list).toEqual(expect.arrayContaining(['Made by', 'Foldplan 1.2.3', 'Guard', 'Plan', 'E8:E20', '=FOLD.LOW(B8,C8,Rate)']));
  });

  it('makes values of what has no native formula, and follows the rate cell with the rest', async () => {
    at = await stage(planOf([['rate', 100], [60, 90, '=FOLD.MARGIN(A2,B2,Rate)', '=FOLD.RATES(A2,B2,50,150)']], { Rate: 'Plan!$B$1' }), handOverSection);
    await until(() => at.text()).toContain('Make a plain copy');
    await at.press('Make a plain copy');
    await until(() => at.told.news).toContain('one FOLD formula became native, one a value');
    await at.host.write('Rate', [[120]]);
    await at.host.settled();
    expect(await at.values("'Plan, plain'!C2:E3")).toEqual([[0, 'Zone', 'Lowest rate'], [null, 3, 60]]);
    expect(await at.values('Plan!C2')).toEqual([[0]]);
  });

  it('is taken back by one click', async () => {
    at = await stage(coastPlan(), handOverSection);
    await until(() => at.text()).toContain('Make a plain copy');
    const before = at.host.save();
    await at.press('Make a plain copy');
    await until(() => at.told.news).toContain('is a plain copy');
    await at.press('Undo');
    await until(() => at.told.news).toBe('Undone: the workbook is as it was before.');
    await at.host.settled();
    expect(at.host.save()).toEqual(before);
  });

  it('can be cancelled while it is made, and leaves nothing behind', async () => {
    const rows = Array.from({ length: 2000 }, (_, i) => [i, `=FOLD.ZONE(A${i + 1},100)`]);
    at = await stage(planOf(rows, {}), handOverSection);
    await until(() => at.text()).toContain('Make a plain copy');
    const before = at.host.save();
    await at.press('Make a plain copy');
    await at.press('Cancel');
    await until(() => at.told.news).toBe('Cancelled: nothing was added.');
    expect(at.host.save()).toEqual(before);
  });

  it('finds names for its sheets that are free and short enough', async () => {
    const long = 'A sheet with quite a long name!';
    const plan = planOf([[70, '=FOLD.FREQ(A1,100)']], {});
    plan.sheets[0]!.name = long;
    plan.sheets.push({ ...structuredClone(plan.sheets[0]!), name: 'A sheet with quite a long name,' }, { ...structuredClone(plan.sheets[0]!), name: 'plain copy' });
    at = await stage(plan, handOverSection);
    await until(() => at.text()).toContain('Make a plain copy');
    await at.press('Make a plain copy');
    await until(() => at.told.news).toContain('The sheet A sheet with quite a long nam 2 is a plain copy');
    const names = at.host.save().sheets.map(({ name }) => name);
    expect(names.filter((name) => name.length > 31)).toEqual([]);
    expect(new Set(names.map((name) => name.toLowerCase())).size).toBe(5);
  });

  it('is not offered where no sheet has a FOLD formula', async () => {
    at = await stage(planOf([[1, '=A1*2']], {}), handOverSection);
    await until(() => at.text()).toContain('No sheet of this workbook holds a FOLD formula, so it can be handed over as it is.');
    expect(at.text()).not.toContain('Make a plain copy');
  });
});

describe('FOLD cells in error', () => {
  const plan = () => planOf([[70, '=FOLD.FREQ(A1,100)', '=FOLD.FREQ("fast",100)', '=NA()']], {});

  it('are told with their sentence, others are not', async () => {
    at = await stage(plan(), handOverSection);
    await until(() => at.text()).toContain('Plan!C1 shows #VALUE!: frequency must be a number; got "fast".');
    expect(at.text()).not.toContain('D1');
  });

  it('that do not know their function are entered again by one click', async () => {
    let unknown = true;
    at = await stage(plan(), handOverSection, (host) => reading(host, 'B1', () => (unknown ? { error: '#NAME?' } : null), () => {
      unknown = false;
    }));
    await until(() => at.text()).toContain('One FOLD cell (Plan!B1) shows #NAME?.');
    await at.press('Enter it again');
    await until(() => at.told.news).toBe('Entered one formula again.');
    expect(at.text()).not.toContain('#NAME?');
    await until(() => at.values('Plan!B1')).toEqual([[30]]);
  });

  it('are said to be unknown still where that did not help', async () => {
    at = await stage(plan(), handOverSection, (host) => reading(host, 'B1', () => ({ error: '#NAME?' }), () => {}));
    await until(() => at.text()).toContain('Enter it again');
    await at.press('Enter it again');
    await until(() => at.told.fault).toBe('Plan!B1 still shows #NAME?: a function or a name in the formula is not known here.');
  });
});

/** A host in which one cell of the plan shows something else, until something is changed. */
function reading(host: LiveHost, cell: string, shows: () => CellValue, onChange: () => void): LiveHost {
  const column = cell.charCodeAt(0) - 65;
  return new Proxy(host, {
    get(target, key: keyof LiveHost) {
      if (key === 'read') {
        return async (reference: string) => {
          const block = await target.read(reference);
          const shown = shows();
          if (block && shown !== null && block.values[0]!.length > column) block.values[0]![column] = shown;
          return block;
        };
      }
      if (key === 'change') {
        return async (...args: Parameters<LiveHost['change']>) => {
          onChange();
          return target.change(...args);
        };
      }
      const value: unknown = target[key];
      return typeof value === 'function' ? value.bind(target) : value;
    },
  });
}
