// Runs every @example of the engine's docstrings: `call // => result (remark)`.

import { readFileSync, readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import * as engine from '../../src/engine';

const folder = new URL('../../src/engine/', import.meta.url);

const examples = readdirSync(folder).flatMap((file) =>
  [...readFileSync(new URL(file, folder), 'utf8').matchAll(/@example (.+?) \/\/ => (.+?)(?: \(.*\))?$/gm)].map(([, call, result]) => ({ file, call: call!, result: result! })));

const evaluate = (code: string): unknown => new Function(...Object.keys(engine), `return (${code});`)(...Object.values(engine));

describe('examples in the docstrings of the engine give what they say', () => {
  it('and there are some', () => {
    expect(examples.length).toBeGreaterThanOrEqual(13);
  });

  it.each(examples)('$file: $call => $result', ({ call, result }) => {
    expect(evaluate(call)).toEqual(evaluate(result));
  });
});
