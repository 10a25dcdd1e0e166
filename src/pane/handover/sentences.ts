// What the section Hand over says.

const counted = (count: number, one: string, many = `${one}s`) => (count === 1 ? `one ${one}` : `${count} ${many}`);

export const sentences = {
  title: 'Hand over',
  plain: 'Plain copy',
  about: 'A copy of a sheet for colleagues without Foldplan: each FOLD formula becomes a native formula with the same result, or its value where no native formula does the same. The sheet itself stays as it is, and a list tells what became what.',
  chosen: 'Sheet to copy',
  sheet: (name: string, count: number) => `${name} (${counted(count, 'FOLD formula')})`,
  none: 'No sheet of this workbook holds a FOLD formula, so it can be handed over as it is.',
  make: 'Make a plain copy',
  cancel: 'Cancel',
  undo: 'Undo',
  progress: (done: number, total: number) => `Looked at ${done} of ${total} formulas…`,
  copyOf: (sheet: string) => `${sheet}, plain`,
  made: (copy: string, list: string, formulas: number, values: number) =>
    `The sheet ${copy} is a plain copy: ${counted(formulas, 'FOLD formula')} became native, ${values === 0 ? 'none a value' : values === 1 ? 'one a value' : `${values} values`}. The sheet ${list} lists them.`,
  cancelled: 'Cancelled: nothing was added.',
  undone: 'Undone: the workbook is as it was before.',
  gone: (sheet: string) => `The workbook has no sheet ${sheet} any more.`,

  troubles: 'FOLD cells in error',
  noTroubles: 'No FOLD cell shows an error.',
  unknown: (count: number, where: string) =>
    `${upper(counted(count, 'FOLD cell'))} (${where}) ${count === 1 ? 'shows' : 'show'} #NAME?. Formulas that were entered before the add-in was there, or opened without it, wait until they are entered again.`,
  reenter: (count: number) => `Enter ${count === 1 ? 'it' : `all ${count}`} again`,
  reentered: (count: number) => `Entered ${counted(count, 'formula')} again.`,
  stillUnknown: (where: string) => `${where} still shows #NAME?: a function or a name in the formula is not known here.`,
  trouble: (where: string, code: string, message: string | null) => `${where} shows ${code}${message ? `: ${message}` : '.'}`,
  andMore: (count: number) => `and ${counted(count, 'more cell', 'more cells')}`,
} as const;

const upper = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);
