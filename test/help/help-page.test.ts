import { readFileSync } from 'node:fs';
import path from 'node:path';
import { Window } from 'happy-dom';
import { describe, expect, it } from 'vitest';
import { helpPage } from '../../src/help/help-page.js';
import { dist } from '../support/browser';
import { built } from '../support/built-functions';

const { document } = new Window();
document.write(readFileSync(path.join(dist, 'help.html'), 'utf8'));

describe('the help page', () => {
  it.each(built.metadata)('has FOLD.$id under its own anchor, with every argument', ({ id, description, parameters }) => {
    const section = document.getElementById(id)!;
    expect(section.querySelector('h2')!.textContent).toMatch(new RegExp(`^FOLD\\.${id}\\(`));
    expect(section.querySelector('p')!.textContent).toBe(description);
    expect([...section.querySelectorAll('dt')].map((term) => term.firstChild!.textContent!.trim())).toEqual(parameters.map(({ name }) => name));
    expect([...section.querySelectorAll('dd')].map((text) => text.textContent)).toEqual(parameters.map((parameter) => parameter.description));
    expect(document.querySelector(`nav a[href="#${id}"]`)).not.toBeNull();
  });

  it('is where the help address of each function points', () => {
    const { functions } = JSON.parse(readFileSync(path.join(dist, 'functions.json'), 'utf8')) as { functions: { id: string; helpUrl: string }[] };
    expect(functions.map(({ helpUrl }) => helpUrl)).toEqual(functions.map(({ id }) => `https://localhost:3000/help.html#${id}`));
  });

  it('shows text as text', () => {
    expect(helpPage({ functions: [{ id: 'X', description: '<script>alert("&")</script>', parameters: [] }] }, '1')).toContain('&lt;script&gt;alert(&quot;&amp;&quot;)&lt;/script&gt;');
  });
});
