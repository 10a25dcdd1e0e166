// A section of the pane: Plan, Columns, Pictures, Hand over.

import type { LiveHost } from '../host/port';
import type { PlanFigures } from './figures';

/** What every section is given. */
export interface Surroundings {
  document: Document;
  host: LiveHost;
  /** The version of Foldplan that this pane belongs to. */
  version: string;
  /** Says what went wrong or what was done, in one sentence, where everyone sees and hears it. */
  tell(sentence: string, kind: 'news' | 'fault'): void;
  /** Reads the workbook anew and shows it in every section. */
  refresh(): Promise<void>;
}

export interface Section {
  /** The word on its tab. */
  title: string;
  /** What the pane puts on the page. It belongs to the section, which may be out of view: then it has no size. */
  place: HTMLElement;
  /**
   * Shows the plan as it now is: after every recalculation, every edit and every change of the selection while the section is in view,
   * and whenever it comes into view.
   * @param selected the row of the plan that the selection in the workbook begins in, as PlanRow.index; null where it is elsewhere
   */
  show(figures: PlanFigures, selected: number | null): void;
  /** Lets go of everything that it listens to. */
  close(): void;
}

export type MakeSection = (surroundings: Surroundings) => Section;
