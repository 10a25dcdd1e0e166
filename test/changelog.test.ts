// The list of changes is what a reviewer asks when a number differs from last year's.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';

const read = (file: string) => readFileSync(path.join(import.meta.dirname, '..', file), 'utf8');
const { version } = JSON.parse(read('package.json')) as { version: string };
const changes = read('CHANGELOG.md');
const versions = [...changes.matchAll(/^## (.*)$/gm)].map(([, heading]) => heading!);

describe('the list of changes', () => {
  it('states the rule on results first', () => {
    const [, rule] = changes.split('\n\n');
    expect(rule!.replace(/\s+/g, ' ')).toContain('The results of worksheet functions never change within a major version without a line here');
  });

  it('begins with the version of package.json', () => {
    expect(versions[0]).toBe(version);
  });

  it('goes from the newest version to the oldest, each once and in three numbers', () => {
    for (const one of versions) expect(one).toMatch(/^\d+\.\d+\.\d+$/);
    const sorted = [...new Set(versions)].sort((a, b) => b.localeCompare(a, 'en', { numeric: true }));
    expect(versions).toEqual(sorted);
  });

  it('says something of each version', () => {
    for (const section of changes.split(/^## /m).slice(1)) expect(section.split('\n').slice(1).join('').trim(), section).not.toBe('');
  });
});
