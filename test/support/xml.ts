// XML as a tree, for tests that look into it.

import { SaxesParser } from 'saxes';

export interface Element {
  name: string;
  attributes: Record<string, string>;
  children: Element[];
  text: string;
}

/** @throws Error where the text is not well-formed, namespaces included */
export function parseXml(xml: string): Element {
  const parser = new SaxesParser({ xmlns: true });
  const root: Element = { name: '', attributes: {}, children: [], text: '' };
  const open = [root];
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', ({ name, attributes }) => {
    const values = Object.fromEntries(Object.entries(attributes).map(([key, { value }]) => [key, value]));
    const element: Element = { name, attributes: values, children: [], text: '' };
    open.at(-1)!.children.push(element);
    open.push(element);
  });
  parser.on('text', (text) => {
    open.at(-1)!.text += text;
  });
  parser.on('closetag', () => open.pop());
  parser.write(xml).close();
  return root.children[0]!;
}

/** An element and all within it. */
export function elements(within: Element): Element[] {
  return [within, ...within.children.flatMap(elements)];
}
