// Every sentence that the workbench says by itself.

export const sentences = {
  welcome: 'A demo plan. Change it, or open your own workbook: nothing leaves this machine.',
  opening: (file: string) => `Opening ${file}…`,
  computing: (file: string, done: number, total: number) => `Opening ${file}: ${done} of ${total} formulas computed.`,
  opened: (file: string, sheets: number, formulas: number) => `Opened ${file}: ${count(sheets, 'sheet')}, ${count(formulas, 'formula')}.`,
  notKept: (things: string[]) => `It also holds ${list(things)}: not shown here, and not in what you save from here.`,
  unknownParts: (formulas: number, parts: string[]) =>
    `${count(formulas, 'formula')} with ${list(parts)} cannot be computed here and ${formulas === 1 ? 'shows' : 'show'} an error; as ${formulas === 1 ? 'a formula it is' : 'formulas they are'} kept.`,
  cannotOpen: (file: string) => `${file} cannot be opened: it is damaged, or no workbook (.xlsx).`,
  saving: (file: string) => `Saving ${file}…`,
  saved: (file: string) => `Saved ${file} among your downloads.`,
  savedPlain: (file: string, formulas: number, values: number) =>
    `Saved ${file} among your downloads: ${count(formulas, 'FOLD formula')} made native, ${count(values, 'other')} made values. Its last sheet lists them.`,
  cancelled: 'Cancelled: no file was made.',
  looking: (done: number, total: number) => `Plain copy: looked at ${done} of ${total} formulas.`,
  cannotSave: (file: string) => `${file} could not be saved.`,
  mayDiscard: (file: string, next: string) => `${file} has changes that are not saved. Open ${next} all the same?`,
  cannotStart: 'The workbench could not start: a file of the site is missing or out of date.',
  noPane: 'The pane beside the sheet could not be shown.',
  cell: (address: string, value: string | number | boolean | null) => `${address} ${value === null || value === '' ? 'blank' : String(value)}`,
  cellError: (address: string, code: string, sentence: string | undefined) => `${address} ${code} ${sentence ?? MEANINGS[code] ?? ''}`.trim(),
};

/** What errors mean that no function of ours explains. */
const MEANINGS: Record<string, string> = {
  '#SPILL!': 'The result needs more free cells than there are here.',
  '#NAME?': 'A function or a name in the formula is not known here.',
  '#REF!': 'The formula points at cells that are gone.',
  '#DIV/0!': 'The formula divides by 0.',
  '#VALUE!': 'A cell that the formula uses holds an error, or something of another kind.',
  '#N/A': 'There is no answer.',
  '#NUM!': 'A number in the formula is out of range.',
  '#NULL!': 'The ranges in the formula have no cell in common.',
  '#CYCLE!': 'The formula depends on its own cell.',
};

const count = (n: number, what: string): string => `${n === 0 ? 'no' : n} ${what}${n === 1 ? '' : 's'}`;

function list(things: string[]): string {
  return things.length > 1 ? `${things.slice(0, -1).join(', ')} and ${things.at(-1)!}` : things.join();
}
