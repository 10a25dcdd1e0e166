// Recalculations of the embedded sheet that overlap, as they do where the page is busy when the tenth of a second is over.

import { type ICommandInfo, ICommandService, IUniverInstanceService, UniverInstanceType, type Workbook as UniverWorkbook } from '@univerjs/core';
import {
  type ISetFormulaCalculationNotificationMutation, FormulaExecuteStageType, SetFormulaCalculationNotificationMutation, SetFormulaCalculationStartMutation,
} from '@univerjs/engine-formula';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openHeadless } from '../../../src/host/sheet/headless';
import type { SheetHost } from '../../../src/host/sheet/sheet-host';
import { built, call } from '../../support/built-functions';
import { planOf } from '../../support/workbook';

const ROWS = 1200; // of which the sheet computes 500 at a time

describe('a recalculation that begins while another is under way', () => {
  let host: SheetHost;
  let commands: ICommandService;
  beforeEach(async () => {
    host = openHeadless(built);
    await host.load(planOf([[100], ...Array.from({ length: ROWS }, (_, i) => [i * 0.5, `=FOLD.FREQ(A${i + 2},Rate)`])], { Rate: 'Plan!$A$1' }));
    commands = host.univer.__getInjector().get(ICommandService);
  });
  afterEach(() => host.dispose());

  /** Calls `act` the first time that a recalculation is at this stage. */
  function at(stage: FormulaExecuteStageType, act: () => void): void {
    const subscription = commands.onCommandExecuted(({ id, params }: Readonly<ICommandInfo>) => {
      if (id !== SetFormulaCalculationNotificationMutation.id || (params as ISetFormulaCalculationNotificationMutation).stageInfo?.stage !== stage) return;
      subscription.dispose();
      act();
    });
  }

  /** What the sheet itself does a tenth of a second after the rate has changed. */
  function recalculate(): void {
    const unit = host.univer.__getInjector().get(IUniverInstanceService).getCurrentUnitOfType<UniverWorkbook>(UniverInstanceType.UNIVER_SHEET)!;
    const rateCell = { unitId: unit.getUnitId(), sheetId: unit.getActiveSheet().getSheetId(), range: { startRow: 0, endRow: 0, startColumn: 0, endColumn: 0 } };
    void commands.executeCommand(SetFormulaCalculationStartMutation.id, { dirtyRanges: [rateCell] }, { onlyLocal: true });
  }

  it.each([
    ['before the first formula', FormulaExecuteStageType.START_CALCULATION],
    ['among the formulas', FormulaExecuteStageType.CURRENTLY_CALCULATING],
  ])('is waited for, and told of when its own results are there: %s', async (_when, stage) => {
    const results = async () => (await host.read(`B2:B${ROWS + 1}`))!.values;
    const due = Array.from({ length: ROWS }, (_, i) => call('FREQ', i * 0.5, 70)[0]);
    const told: unknown[][][] = [];
    await host.onRecalculated(() => void results().then((values) => told.push(values)));
    at(stage, () => {
      void host.write('A1', [[70]]);
      recalculate();
    });
    await host.write('A1', [[90]]);
    await host.settled();
    expect(await results()).toEqual(due);
    expect(told.at(-1)).toEqual(due);
  });
});
