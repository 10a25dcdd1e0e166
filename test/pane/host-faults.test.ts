// Each call of the host made to fail in turn: a sentence, and the workbook as it was.

import { afterEach, describe, expect, it } from 'vitest';
import { HostFault, type LiveHost } from '../../src/host/port';
import { columnsSection } from '../../src/pane/columns';
import type { MakeSection } from '../../src/pane/section';
import { planSection } from '../../src/pane/setup';
import { type Given, planOf } from '../support/workbook';
import { type Stage, stage } from './stage';

let open: Stage;
afterEach(() => open.host.dispose());

const SENTENCE = 'The sheet is protected.';
type Method = 'read' | 'formulas' | 'sheets' | 'tables' | 'names' | 'selection' | 'change' | 'startWithWorkbook';

interface Broken {
  host: LiveHost;
  /** Makes every call of a method fail from the one with this number on, counted from now. */
  break(method: Method, after: number): void;
  /** How often each method was called since. */
  calls: Partial<Record<Method, number>>;
  /** Whether the workbook was changed since. */
  changed(): boolean;
}

/** A host that does as another one does, until it is broken. */
function breakable(host: LiveHost): Broken {
  let broken: { method: Method; after: number } | null = null;
  let changed = false;
  const made: Broken = {
    calls: {},
    changed: () => changed,
    break: (method, after) => {
      broken = { method, after };
      changed = false;
      made.calls = {};
    },
    host: new Proxy(host, {
      get(target, property) {
        const own: unknown = Reflect.get(target, property, target);
        if (typeof own !== 'function') return own;
        return (...args: unknown[]) => {
          const method = property as Method;
          const count = made.calls[method] ?? 0;
          made.calls[method] = count + 1;
          if (broken?.method === method && count >= broken.after) return Promise.reject(new HostFault(SENTENCE));
          if (method === 'change') changed = true;
          return (own as (...all: unknown[]) => unknown).apply(target, args);
        };
      },
    }),
  };
  return made;
}

const ROWS: Given[][] = [['fs', 100], [], [], [], ['Name', 'Low', 'High'], ['a', 10, 20], ['b', 60, 70]];
const NAMES = { Fold_Name: 'Plan!$A$6:$A$7', Fold_Low: 'Plan!$B$6:$B$7', Fold_High: 'Plan!$C$6:$C$7', Fold_Rate: 'Plan!$B$1' };

async function start(make: MakeSection, names: Record<string, string>): Promise<Broken> {
  let broken!: Broken;
  open = await stage(planOf(ROWS, names), make, (host) => {
    broken = breakable(host);
    return broken.host;
  });
  await expect.poll(() => open.text()).toMatch(/Found on|Insert \d+ columns/);
  return broken;
}

/**
 * Does an action again and again, with the first call of a method failing, then the second and so on, until it makes no more of them.
 * Whatever fails before the change leaves the workbook as it was; what fails after it leaves the change, and its undo.
 */
async function failEachCall(method: Method, make: MakeSection, names: Record<string, string>, action: string, prepare: () => Promise<void>): Promise<void> {
  for (let after = 0; ; after++) {
    const broken = await start(make, names);
    await prepare();
    const before = open.host.save();
    broken.break(method, after);
    await open.press(action);
    await expect.poll(() => (broken.calls[method] ?? 0) > after ? open.told.fault : open.told.news).not.toBe('');
    if ((broken.calls[method] ?? 0) <= after) {
      expect([after > 0, open.told.fault]).toEqual([true, '']);
      return;
    }
    await expect.poll(() => [after, open.told.fault]).toEqual([after, SENTENCE]);
    if (broken.changed()) expect(open.text()).toContain('Undo');
    else expect([after, open.host.save()]).toEqual([after, before]);
    open.host.dispose();
  }
}

describe('setting a plan up', () => {
  const withGuard = async () => {
    await open.press('New cell for guard');
    await expect.poll(() => open.text()).toContain('will be written to');
  };

  it.each(['sheets', 'read', 'formulas', 'names', 'change'] as const)('says that %s failed, whichever call of it, and leaves no half of a change', (method) =>
    failEachCall(method, planSection, {}, 'Use this plan', withGuard));

  it('says that pointing failed, and keeps what was chosen', async () => {
    const broken = await start(planSection, {});
    broken.break('selection', 0);
    await open.press('Use selection for low edges');
    await expect.poll(() => open.told).toEqual({ news: '', fault: SENTENCE });
    expect(open.field('Low edges').value).toBe('B6:B7');
  });

  it('says that the search failed', async () => {
    const broken = await start(planSection, {});
    broken.break('sheets', 0);
    await open.press('Find the plan');
    await expect.poll(() => open.told).toEqual({ news: '', fault: SENTENCE });
  });

  it('says that undo failed, and does not offer it twice', async () => {
    await start(planSection, {});
    await open.press('Use this plan');
    await expect.poll(() => open.told.news).toMatch(/Stored/);
    await open.host.write('Plan!A1', [['other']]);
    await open.host.change({ names: { Fold_Low: 'Plan!$B$6' } });
    await open.press('Undo');
    await expect.poll(() => open.told.fault).toMatch(/changed since/);
    expect(open.text()).not.toContain('Undo');
  });
});

describe('inserting columns', () => {
  it.each(['names', 'tables', 'sheets', 'read', 'formulas', 'change', 'startWithWorkbook'] as const)('says that %s failed, whichever call of it, and leaves no half of a change', (method) =>
    failEachCall(method, columnsSection, NAMES, 'Insert 6 columns', async () => {}));

  it('keeps the columns, and their undo, where the functions cannot be told to start with the workbook', async () => {
    const broken = await start(columnsSection, NAMES);
    const before = open.host.save();
    broken.break('startWithWorkbook', 0);
    await open.press('Insert 6 columns');
    await expect.poll(() => open.told).toEqual({ news: 'Inserted 6 columns at D5:I7.', fault: SENTENCE });
    expect(open.host.save().sheets[0]!.cells[5]![3]!.formula).toBe('=FOLD.LOW(B6,C6,Fold_Rate)');
    await open.press('Undo');
    await expect.poll(() => open.told.news).toMatch(/^Undone/);
    expect(open.host.save()).toEqual(before);
  });
});
