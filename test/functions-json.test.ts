// The metadata of the worksheet functions is made from the comments in the source: what comes out is read, as a change to review.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { dist } from './support/browser';

interface Metadata {
  functions: {
    id: string;
    name: string;
    description: string;
    helpUrl: string;
    parameters: { name: string; description: string; type: string; dimensionality?: string; optional?: boolean }[];
  }[];
}

const read = (...file: string[]) => JSON.parse(readFileSync(path.join(...file), 'utf8')) as Metadata;
const built = read(dist, 'functions.json');
const { functions } = built;

/** Longer ones are cut off in the program's function dialogue. */
const LONGEST_DESCRIPTION = 255;

describe('functions.json', () => {
  it('is as it was when somebody last read it', () => {
    expect(built, 'Read the difference as its users will: names and order of arguments stand in their workbooks. Then accept it:\n'
      + '  cp dist/functions.json test/fixtures/functions.json\n').toEqual(read(import.meta.dirname, 'fixtures/functions.json'));
  });

  it('gives each function an id of its own, also in a file, where dots become underscores', () => {
    expect(functions.length).toBeGreaterThan(0);
    const plain = functions.map(({ id }) => id.replace(/[._]/g, '').toUpperCase());
    expect(new Set(plain).size).toBe(functions.length);
  });

  it('keeps to what the program takes for a name, and shows the id as the name', () => {
    for (const { id, name } of functions) {
      expect(id).toMatch(/^[A-Z][A-Z0-9._]{2,}$/);
      expect(name).toBe(id);
    }
  });

  it('describes every function and every argument, briefly enough to be shown', () => {
    for (const { id, description, parameters } of functions) {
      for (const [what, text] of [[id, description], ...parameters.map((one) => [`${id}, ${one.name}`, one.description])] as [string, string | undefined][]) {
        expect(text, what).toMatch(/^\S.*\S$/);
        expect(text!.length, what).toBeLessThanOrEqual(LONGEST_DESCRIPTION);
      }
    }
  });

  it('takes cells or columns for every argument, and optional ones last', () => {
    for (const { id, parameters } of functions) {
      for (const { name, type, dimensionality } of parameters) expect([id, name, type, dimensionality]).toEqual([id, name, 'any', 'matrix']);
      const optional = parameters.map((one) => one.optional === true);
      expect(optional, id).toEqual(optional.toSorted((a, b) => Number(a) - Number(b)));
      expect(new Set(parameters.map(({ name }) => name)).size, id).toBe(parameters.length);
    }
  });

  it('lets errors in cells reach the functions', () => {
    expect(built).toMatchObject({ allowErrorForDataTypeAny: true });
  });

  it('lists exactly the functions that functions.js registers while it loads', () => {
    const registered: string[] = [];
    const script = readFileSync(path.join(dist, 'functions.js'), 'utf8');
    new Function('CustomFunctions', script)({ associate: (id: string) => registered.push(id) });
    expect(registered.toSorted()).toEqual(functions.map(({ id }) => id).toSorted());
  });

  it('points every function to its own place on the help page', () => {
    const help = readFileSync(path.join(dist, 'help.html'), 'utf8');
    for (const { id, helpUrl } of functions) {
      expect(helpUrl).toBe(`https://localhost:3000/help.html#${id}`);
      expect(help).toMatch(new RegExp(` id="?${id.replace('.', '\\.')}"?[ >]`));
    }
  });
});
