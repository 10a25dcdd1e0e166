// The built worksheet functions, called as a host calls them.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import { FunctionError, callFunction, loadFunctions } from '../../src/host/sheet/functions-runtime';
import { dist } from './browser';
import { type Given, asCells } from './full-calls';

export const built = loadFunctions(JSON.parse(readFileSync(path.join(dist, 'functions.json'), 'utf8')), readFileSync(path.join(dist, 'functions.js'), 'utf8'));

/** The rows of cells that FOLD.id gives, an error as `#CODE! sentence`. */
export function call(id: string, ...args: Given[]): unknown[][] {
  const { metadata, implementations } = built;
  const { parameters } = metadata.find((one) => one.id === id)!;
  return callFunction(implementations.get(id)!, parameters, args.map(asCells)).map((line) =>
    line.map((cell) => (cell instanceof FunctionError ? [cell.code, cell.message].filter(Boolean).join(' ') : cell)));
}
