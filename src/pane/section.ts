// A section of the pane: Plan, Columns, Pictures, Hand over.

import type { LiveHost } from '../host/port';
import type { PlanFigures } from './figures';

/** What every section is given. */
export interface Surroundings {
  document: Document;
  host: LiveHost;
  /** Says what went wrong or what was done, in one sentence, where everyone sees and hears it. */
  tell(sentence: string, kind: 'news' | 'fault'): void;
  /** Reads the workbook anew and shows it in every section. */
  refresh(): Promise<void>;
}

export interface Section {
  /** The word on its tab. */
  title: string;
  /** What the pane puts on the page. */
  place: HTMLElement;
  /** Shows the plan as it now is; called after every recalculation, every edit and every change of the selection that matters. */
  show(figures: PlanFigures): void;
  /** Lets go of everything that it listens to. */
  close(): void;
}

export type MakeSection = (surroundings: Surroundings) => Section;
