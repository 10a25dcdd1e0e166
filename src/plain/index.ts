// The plain copy's door.

export { EQUIVALENTS } from './equivalents';
export { type Maker, type OnProgress, type Outcome, type PlainCopy, type PlainSource, plainCopy } from './plain-copy';
