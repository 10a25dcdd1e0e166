// Several commands as one step of the user's undo, all of them or none.

import { type IMutationInfo, type IUndoRedoItem, type Injector, ICommandService, IUndoRedoService, generateRandomId, sequenceExecute } from '@univerjs/core';
import { faults } from './sheet-faults';

export class Step {
  private readonly id = generateRandomId();
  private readonly item: IUndoRedoItem;
  private readonly commands: ICommandService;
  private readonly history: IUndoRedoService;

  private constructor(injector: Injector, private readonly unitId: string) {
    this.item = { unitID: unitId, id: this.id, undoMutations: [], redoMutations: [] };
    this.commands = injector.get(ICommandService);
    this.history = injector.get(IUndoRedoService);
  }

  /** Does the work. What it had done is undone where it throws, and nothing of it stays in the user's undo. */
  static of(injector: Injector, unitId: string, work: (step: Step) => void): Step {
    const step = new Step(injector, unitId);
    const batch = step.history.__tempBatchingUndoRedo(unitId);
    try {
      step.history.pushUndoRedo(step.item); // commands put theirs into it
      work(step);
    } catch (error) {
      step.history.rollback(step.id, unitId);
      throw error;
    } finally {
      batch.dispose();
    }
    return step;
  }

  /** Runs a command of the sheet. */
  run(command: { id: string }, params: object, what = 'the cells'): void {
    const { undoMutations } = this.item;
    const before = undoMutations.length;
    if (!this.commands.syncExecuteCommand(command.id, { unitId: this.unitId, ...params })) throw faults.refused(what);
    undoMutations.unshift(...undoMutations.splice(before)); // the last is undone first
  }

  /** Changes something for which the sheet has no command. */
  apply(redo: IMutationInfo, undo: IMutationInfo): void {
    if (!this.commands.syncExecuteCommand(redo.id, redo.params)) throw faults.refused('the cells');
    this.item.redoMutations.push(redo);
    this.item.undoMutations.unshift(undo);
  }

  /** Takes the step back, as a step that the user can take back in turn. */
  undo(): void {
    const { undoMutations, redoMutations } = this.item;
    if (!sequenceExecute(undoMutations, this.commands).result) throw faults.refused('the cells');
    this.history.pushUndoRedo({ unitID: this.unitId, undoMutations: redoMutations, redoMutations: undoMutations });
  }
}
