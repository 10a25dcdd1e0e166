// When the sheet has recalculated, and what it leaves undone.

import type { ICommandService, IRange, IUnitRange } from '@univerjs/core';
import { type FormulaDataModel, SetTriggerFormulaCalculationStartMutation } from '@univerjs/engine-formula';
import type { FormulaCalculationSessionService } from '@univerjs/sheets-formula';

/** Calls `listener` once after every recalculation, when its results stand in the cells, until the returned function is called. */
export function onRecalculated(session: FormulaCalculationSessionService, listener: () => void): () => void {
  let told = session.state.id;
  const subscription = session.state$.subscribe(({ id, started, resultApplied, completed, resultEmitted }) => {
    if (id === told || !started || !resultApplied || !(completed || resultEmitted)) return;
    told = id;
    listener();
  });
  return () => subscription.unsubscribe();
}

/**
 * A formula may fill a block of cells. Univer follows such blocks two deep in one recalculation: a block made from a block that is made
 * from a block is left as it was. So the cells that depend on a changed block are computed again, until no block changes.
 */
export class BlockFollower {
  /** Whether another recalculation has been asked for. */
  pending = false;
  /** What changed in each pass since something else than this class asked for a recalculation. */
  private passes: string[] = [];
  private known = new Map<string, string>();

  constructor(session: FormulaCalculationSessionService, private readonly formulas: FormulaDataModel, private readonly commands: ICommandService) {
    onRecalculated(session, () => this.follow());
  }

  private follow(): void {
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
