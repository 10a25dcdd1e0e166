// When the sheet has recalculated, and what it leaves undone.

import type { ICommandService, IRange, IUnitRange } from '@univerjs/core';
import { type FormulaDataModel, SetTriggerFormulaCalculationStartMutation } from '@univerjs/engine-formula';
import type { FormulaCalculationSessionService } from '@univerjs/sheets-formula';

type State = FormulaCalculationSessionService['state'];

/** Follows the recalculations of a sheet. Univer numbers them; each begins a tenth of a second after the change that asks for it. */
export class Recalculation {
  /** Number of the recalculation that will have seen the last change. */
  private due = 0;
  /** Whether that one is sure to come: a change of styles asks for none. */
  private certain = false;
  private readonly blocks: BlockFollower;

  constructor(private readonly session: FormulaCalculationSessionService, formulas: FormulaDataModel, commands: ICommandService) {
    this.blocks = new BlockFollower(formulas, commands);
    this.onDone(() => this.blocks.follow());
  }

  /** A workbook has been opened, which is certain to be computed. */
  opened(): void {
    this.blocks.forget();
    this.due = this.session.state.id + 1;
    this.certain = true;
  }

  /** A cell, a name or something else has changed. */
  changed(): void {
    this.due = this.session.state.id + 1;
  }

  /** Calls `listener` once after every recalculation, when its results stand in the cells, until the returned function is called. */
  onDone(listener: () => void): () => void {
    let told = this.session.state.id;
    const subscription = this.session.state$.subscribe((state) => {
      if (state.id === told || !isDone(state)) return;
      told = state.id;
      listener();
    });
    return () => subscription.unsubscribe();
  }

  /** Calls `listener` whenever a recalculation has come further, until the returned function is called. */
  onProgress(listener: (done: number, total: number) => void): () => void {
    let told = '';
    const subscription = this.session.state$.subscribe(({ progress }) => {
      const [done, total] = [progress?.completedFormulasCount ?? 0, progress?.totalFormulasToCalculate ?? 0];
      if (done === 0 || told === `${done}/${total}`) return;
      told = `${done}/${total}`;
      listener(done, total);
    });
    return () => subscription.unsubscribe();
  }

  /** Resolves when everything that has changed so far is computed. */
  async settled(): Promise<void> {
    await this.until(() => !this.isRunning() && this.session.state.id >= this.due && !this.blocks.pending);
    this.certain = false;
  }

  /** Resolves when no recalculation is under way. */
  idle(): Promise<void> {
    return this.until(() => !this.isRunning());
  }

  /** Gives up where nothing moves for half a second, or for two seconds where something is sure to: a sheet that is stuck must not hold up its user. */
  private async until(isOver: () => boolean): Promise<void> {
    let seen = this.session.state;
    for (let looks = 0; !isOver() && looks < this.patience(); looks++) {
      await pause();
      const { state } = this.session;
      if (state !== seen) looks = 0;
      seen = state;
    }
  }

  private patience(): number {
    return this.certain || (this.isRunning() && !this.session.state.stopped) ? 400 : 100;
  }

  private isRunning(): boolean {
    const { state } = this.session;
    return state.started && !isDone(state);
  }
}

const pause = () => new Promise((resume) => setTimeout(resume, 5));

/** One that was stopped, for a change that came meanwhile, goes on under its own number or under the next. */
const isDone = ({ started, resultApplied, completed, resultEmitted, stopped }: State): boolean => started && resultApplied && (completed || resultEmitted) && !stopped;

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
