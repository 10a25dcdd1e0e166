// When the sheet has recalculated, and what it leaves undone.

import type { ICommandInfo, ICommandService, IRange, IUnitRange } from '@univerjs/core';
import {
  type FormulaDataModel, type ISetFormulaCalculationNotificationMutation, FormulaExecuteStageType, SetFormulaCalculationNotificationMutation,
  SetFormulaCalculationStartMutation, SetTriggerFormulaCalculationStartMutation,
} from '@univerjs/engine-formula';

type Progress = (done: number, total: number) => void;

/**
 * Follows the recalculations of a sheet. Each begins a tenth of a second after the change that asks for it, also while another is still
 * under way: that one is then stopped, or goes on to its end before the new one takes its turn. So both beginnings and ends are counted;
 * Univer's own account tells the two apart by the latest number, and takes the end of the first for that of the second.
 */
export class Recalculation {
  private begun = 0;
  private ended = 0;
  /** Whether the one under way has said that nothing is left to compute; its results stand in the cells with the next notice. */
  private ending = false;
  /** How many must have begun for one to have seen the last change. */
  private due = 0;
  /** Whether that one is sure to come: a change of styles asks for none. */
  private certain = false;
  /** Counts all that is heard. */
  private heard = 0;
  private readonly doneListeners = new Set<() => void>();
  private readonly progressListeners = new Set<Progress>();
  private readonly blocks: BlockFollower;

  constructor(formulas: FormulaDataModel, commands: ICommandService) {
    this.blocks = new BlockFollower(formulas, commands);
    commands.onCommandExecuted((command) => this.hear(command));
    this.onDone(() => this.blocks.follow());
  }

  /** A workbook has been opened, which is certain to be computed. */
  opened(): void {
    this.blocks.forget();
    this.due = this.begun + 1;
    this.certain = true;
  }

  /** A cell, a name or something else has changed. */
  changed(): void {
    this.due = this.begun + 1;
  }

  /** Calls `listener` when recalculations have come to an end, with their results in the cells, until the returned function is called. */
  onDone(listener: () => void): () => void {
    return addTo(this.doneListeners, listener);
  }

  /** Calls `listener` whenever a recalculation has come further, until the returned function is called. */
  onProgress(listener: Progress): () => void {
    return addTo(this.progressListeners, listener);
  }

  /** Resolves when everything that has changed so far is computed. */
  async settled(): Promise<void> {
    await this.until(() => !this.isRunning() && this.begun >= this.due && !this.blocks.pending);
    this.certain = false;
  }

  /** Resolves when no recalculation is under way. */
  idle(): Promise<void> {
    return this.until(() => !this.isRunning());
  }

  private hear({ id, params }: Readonly<ICommandInfo>): void {
    if (id === SetFormulaCalculationStartMutation.id) {
      this.heard++;
      this.begun++;
    } else if (id === SetFormulaCalculationNotificationMutation.id) {
      this.heard++;
      this.hearNotice(params as ISetFormulaCalculationNotificationMutation);
    }
  }

  private hearNotice({ stageInfo, functionsExecutedState }: ISetFormulaCalculationNotificationMutation): void {
    if (stageInfo) {
      const { stage, completedFormulasCount, totalFormulasToCalculate } = stageInfo;
      this.ending = stage === FormulaExecuteStageType.CALCULATION_COMPLETED;
      if (stage === FormulaExecuteStageType.CURRENTLY_CALCULATING) for (const listener of this.progressListeners) listener(completedFormulasCount, totalFormulasToCalculate);
    } else if (functionsExecutedState !== undefined && this.ending) {
      this.ending = false;
      this.ended++;
      if (!this.isRunning()) for (const listener of this.doneListeners) listener();
    }
  }

  /** Gives up where nothing moves for half a second, or for two seconds where something is sure to: a sheet that is stuck must not hold up its user. */
  private async until(isOver: () => boolean): Promise<void> {
    let heard = this.heard;
    for (let looks = 0; !isOver() && looks < this.patience(); looks++) {
      await pause();
      if (this.heard !== heard) looks = 0;
      heard = this.heard;
    }
  }

  private patience(): number {
    return this.certain || this.isRunning() ? 400 : 100;
  }

  private isRunning(): boolean {
    return this.ended < this.begun;
  }
}

const pause = () => new Promise((resume) => setTimeout(resume, 5));

function addTo<T>(listeners: Set<T>, listener: T): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/**
 * A formula may fill a block of cells. Univer follows such blocks two deep in one recalculation: a block made from a block that is made
 * from a block is left as it was. So the cells that depend on a changed block are computed again, until no block changes.
 */
class BlockFollower {
  /** Whether another recalculation has been asked for. */
  pending = false;
  /** What changed in each pass since something else than this class asked for a recalculation. */
  private passes: string[] = [];
  private known = new Map<string, string>();

  constructor(private readonly formulas: FormulaDataModel, private readonly commands: ICommandService) {}

  forget(): void {
    this.pending = false;
    this.passes = [];
    this.known = new Map();
  }

  /** To be called after every recalculation. */
  follow(): void {
    this.pending = false;
    const blocks = this.blocks();
    const changed = [...blocks].filter(([key, values]) => this.known.get(key) !== values).map(([key]) => key);
    const gone = [...this.known.keys()].filter((key) => !blocks.has(key));
    this.known = blocks;
    this.passes.push([...changed, ...gone].join());
    const several = blocks.size > 1; // one block alone depends on no other
    if (this.passes.at(-1) === '' || !several || this.passes.length === MOST_PASSES || changesEveryTime(this.passes)) {
      this.passes = [];
      return;
    }
    this.pending = true;
    const params = { forceCalculation: false, dirtyRanges: [...changed, ...gone].map((key) => JSON.parse(key) as IUnitRange), ...NOTHING_ELSE };
    this.commands.syncExecuteCommand(SetTriggerFormulaCalculationStartMutation.id, params, { onlyLocal: true });
  }

  /** Where each block is (as text), and what it holds. */
  private blocks(): Map<string, string> {
    const found = new Map<string, string>();
    for (const [unitId, sheets] of Object.entries(this.formulas.getArrayFormulaRange() ?? {})) {
      for (const [sheetId, rows] of Object.entries(sheets ?? {})) {
        const cells = this.formulas.getArrayFormulaCellData()?.[unitId]?.[sheetId];
        for (const line of Object.values(rows ?? {})) {
          for (const range of Object.values(line ?? {}) as IRange[]) {
            const values = [];
            for (let r = range.startRow; r <= range.endRow; r++) for (let c = range.startColumn; c <= range.endColumn; c++) values.push(cells?.[r]?.[c]?.v);
            found.set(JSON.stringify({ unitId, sheetId, range }), JSON.stringify(values));
          }
        }
      }
    }
    return found;
  }
}

/** More than any plan needs. */
const MOST_PASSES = 20;

/** Blocks of random numbers change whenever they are computed, and would never come to an end. */
const changesEveryTime = (passes: string[]): boolean => passes.length > 2 && new Set(passes.slice(-3)).size === 1;

const NOTHING_ELSE = { dirtyNameMap: {}, dirtyDefinedNameMap: {}, dirtyUnitFeatureMap: {}, dirtyUnitOtherFormulaMap: {}, clearDependencyTreeCache: {} };
