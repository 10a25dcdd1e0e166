// A picture or a piece of page as a plain tree, and the one step that turns it into the document's own elements.

export interface Tree {
  tag: string;
  /** An attribute that is undefined is left out. */
  attributes: Record<string, string | number | undefined>;
  /** A string is a text node: whatever it holds, it is shown as it stands. */
  children: (Tree | string)[];
}

export function element(tag: string, attributes: Tree['attributes'] = {}, ...children: Tree['children']): Tree {
  return { tag, attributes, children };
}

/** Makes the elements of a tree; `svg` and all below it are SVG. */
export function toDom(document: Document, { tag, attributes, children }: Tree, insideSvg = false): Element {
  const svg = insideSvg || tag === 'svg';
  const made = document.createElementNS(svg ? 'http://www.w3.org/2000/svg' : 'http://www.w3.org/1999/xhtml', tag);
  for (const [name, value] of Object.entries(attributes)) if (value !== undefined) made.setAttribute(name, String(value));
  for (const child of children) made.append(typeof child === 'string' ? document.createTextNode(child) : toDom(document, child, svg));
  return made;
}
