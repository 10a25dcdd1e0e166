// A tree as markup, an element a line, for snapshots that people read.

import type { Tree } from '../../src/pane/element';

export function markup({ tag, attributes, children }: Tree, indent = ''): string {
  const written = Object.entries(attributes).flatMap(([name, value]) => (value === undefined ? [] : [` ${name}="${escaped(String(value))}"`])).join('');
  if (children.length === 0) return `${indent}<${tag}${written}/>`;
  if (children.every((child) => typeof child === 'string')) return `${indent}<${tag}${written}>${escaped(children.join(''))}</${tag}>`;
  const inner = children.map((child) => (typeof child === 'string' ? `${indent}  ${escaped(child)}` : markup(child, `${indent}  `)));
  return [`${indent}<${tag}${written}>`, ...inner, `${indent}</${tag}>`].join('\n');
}

const escaped = (text: string) => text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');
