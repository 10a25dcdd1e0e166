// Defined names of the whole workbook.

import type { TakeBack } from './taking-back';

export interface Definition {
  name: string;
  /** With "="; null where there is no such name. */
  formula: string | null;
  comment: string;
  visible: boolean;
}

/** Queues the question; ask the returned function after the next sync. */
export function askNames({ workbook }: Excel.RequestContext, names: string[]): () => Definition[] {
  const items = names.map((name) => workbook.names.getItemOrNullObject(name));
  for (const item of items) item.load('name,formula,comment,visible');
  return () => items.map((item, i) => (item.isNullObject
    ? { name: names[i]!, formula: null, comment: '', visible: true }
    : { name: item.name, formula: String(item.formula), comment: item.comment, visible: item.visible }));
}

/** Queues what makes of the names what `wanted` says; all that there is now must be known. */
export function defineNames({ workbook: { names } }: Excel.RequestContext, now: Definition[], wanted: Definition[]): void {
  for (const [i, { name, formula, comment, visible }] of wanted.entries()) {
    const known = now[i]!.formula;
    if (known === formula) continue;
    if (formula === null) names.getItem(name).delete();
    else if (known !== null) names.getItem(name).formula = formula;
    else {
      const added = names.add(name, formula, comment);
      if (!visible) added.visible = false;
    }
  }
}

export const takeBackNames = (before: Definition[]): TakeBack => async (context) => {
  const now = askNames(context, before.map(({ name }) => name));
  await context.sync();
  defineNames(context, now(), before);
  await context.sync();
};
