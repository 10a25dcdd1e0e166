// The directions of the house: which part may import which. DEVELOPERS.md draws them.

import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';

const src = path.join(import.meta.dirname, '../src');

/** Parts of the house, and the parts that each may import besides itself. */
const MAY_IMPORT: Record<string, readonly string[]> = {
  engine: [],
  functions: ['engine'],
  'host/port': [],
  'host/office': ['host/port'],
  'host/sheet': ['host/port'],
  'host/file': ['host/port', 'formula'],
  formula: [],
  plain: ['host/port', 'formula'],
  pane: ['engine', 'host/port', 'plain'],
  help: [],
  workbench: [],
  demo: ['host/port'],
  main: ['engine', 'functions', 'host/port', 'host/office', 'host/sheet', 'host/file', 'plain', 'pane', 'workbench', 'demo'],
};

/** The part that a source file belongs to; undefined for a file that knows no room. */
const partOf = (file: string): string | undefined => {
  const name = file.replace(/\.(ts|js|css|html)$/, '');
  if (/^main-\w+$/.test(name)) return 'main';
  return Object.keys(MAY_IMPORT).find((part) => name === part || name.startsWith(`${part}/`));
};

const files = readdirSync(src, { recursive: true, encoding: 'utf8' }).map((file) => file.replaceAll(path.sep, '/')).filter((file) => /\.(ts|js)$/.test(file));

/** The modules that a file imports, statically, by name or by import(). */
const importsOf = (file: string): string[] => ts.preProcessFile(readFileSync(path.join(src, file), 'utf8'), true, true).importedFiles.map(({ fileName }) => fileName);

const insideSrc = (file: string, imported: string) => path.posix.normalize(path.posix.join(path.posix.dirname(file), imported));

describe('the directions of the house', () => {
  it.each(files)('%s belongs to a part and imports only what that part may', (file) => {
    const part = partOf(file);
    expect(part).toBeDefined();
    const wrong = importsOf(file).filter((imported) => {
      if (!imported.startsWith('.')) return part === 'engine' || part === 'host/port'; // no packages there
      const target = partOf(insideSrc(file, imported)) ?? (insideSrc(file, imported) === 'engine' ? 'engine' : undefined);
      return target !== part && !MAY_IMPORT[part!]!.includes(target ?? 'nowhere');
    });
    expect(wrong).toEqual([]);
  });

  it.each(files.filter((file) => partOf(file) !== 'engine'))('%s enters the engine by its one door', (file) => {
    const inner = importsOf(file).filter((imported) => imported.startsWith('.')).map((imported) => insideSrc(file, imported)).filter((target) => target.startsWith('engine/'));
    expect(inner).toEqual([]);
  });

  it('is tested on files that import something', () => {
    expect(importsOf('functions/landing.ts')).toEqual(['../engine', './cells']);
  });
});
