// What every host of the port must do, run once for each of them.

import { afterEach, describe, expect, it } from 'vitest';
import { type Host, HostFault, type Workbook } from '../../src/host/port';

export interface OpenHost {
  host: Host;
  /** Waits until the host has recalculated and told its listeners. */
  settle(): Promise<void>;
  close(): Promise<void>;
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
