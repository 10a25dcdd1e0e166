// The plain copy's door.

export { EQUIVALENTS } from './equivalents';
export { callsOurs } from './plain-formula';
export { workbookSource } from './workbook-source';
export { type Maker, type OnProgress, type Outcome, type PlainCopy, type PlainSource, cancellable, plainCopy } from './plain-copy';
