import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { helpPage } from '../../src/help/help-page.js';
import { dist } from '../support/browser';
import { built } from '../support/built-functions';

const page = readFileSync(path.join(dist, 'help.html'), 'utf8');

describe('the help page', () => {
  it.each(built.metadata)('has FOLD.$id under its own anchor, with every argument', ({ id, parameters }) => {
    const section = page.match(new RegExp(`<section id="${id}">[^]*?</section>`))![0];
    expect(section).toContain(`FOLD.${id}(`);
    for (const { name, description } of parameters) {
      expect(section).toContain(name);
      expect(section).toContain(description!.replaceAll('"', '&quot;'));
    }
  });

  it('is where the help address of each function points', () => {
    const { functions } = JSON.parse(readFileSync(path.join(dist, 'functions.json'), 'utf8')) as { functions: { id: string; helpUrl: string }[] };
    expect(functions.map(({ helpUrl }) => helpUrl)).toEqual(functions.map(({ id }) => `https://localhost:3000/help.html#${id}`));
  });

  it('shows text as text', () => {
    expect(helpPage({ functions: [{ id: 'X', description: '<script>alert("&")</script>', parameters: [] }] }, '1')).toContain('&lt;script&gt;alert(&quot;&amp;&quot;)&lt;/script&gt;');
  });
});
