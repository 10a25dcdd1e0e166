// XML as text with positions, so that a part of a file can be changed in place and the rest of it stays as it was.

import { SaxesParser } from 'saxes';

/** A start tag. */
export interface Tag {
  /** Without the prefix that the root element has; with any other. */
  name: string;
  /** By their written names. */
  attributes: Record<string, string>;
  /** Where the tag begins and ends in the text. */
  start: number;
  end: number;
  selfClosing: boolean;
}

export interface XmlVisitor {
  open(tag: Tag): void;
  text(text: string): void;
  /** `start` and `end` are those of the end tag; of the start tag where it closes itself. */
  close(name: string, start: number, end: number): void;
}

/** An element of a small part, whole. */
export interface XmlElement extends Tag {
  children: XmlElement[];
  /** Own text, without that of the children. */
  text: string;
  /** Where the content ends and where the element does. */
  contentEnd: number;
  elementEnd: number;
}

/** A change of a text: what stands from `start` to `end` becomes `text`. */
export interface Edit {
  start: number;
  end: number;
  text: string;
}

/** Walks through the elements in order. Throws where the text is not well-formed. */
export function visitXml(xml: string, visitor: XmlVisitor): void {
  const parser = new SaxesParser({});
  let prefix: string | undefined;
  // "<" stands nowhere inside a tag, so the last one before a tag's end is its start.
  const tagStart = () => xml.lastIndexOf('<', parser.position - 1);
  const named = (name: string) => (prefix !== '' && name.startsWith(prefix!) ? name.slice(prefix!.length) : name);
  parser.on('error', (error) => {
    throw error;
  });
  parser.on('opentag', ({ name, attributes, isSelfClosing }) => {
    prefix ??= name.slice(0, name.indexOf(':') + 1);
    visitor.open({ name: named(name), attributes, start: tagStart(), end: parser.position, selfClosing: isSelfClosing });
  });
  parser.on('text', (text) => visitor.text(text));
  parser.on('cdata', (text) => visitor.text(text));
  parser.on('closetag', ({ name }) => visitor.close(named(name), tagStart(), parser.position));
  parser.write(xml).close();
}

/** The root element of a small part. */
export function parseXml(xml: string): XmlElement {
  const tree = new XmlTree();
  visitXml(xml, tree);
  return tree.root!;
}

/** A visitor that keeps what it sees. */
export class XmlTree implements XmlVisitor {
  root?: XmlElement;
  readonly #open: XmlElement[] = [];

  open(tag: Tag): void {
    const element: XmlElement = { ...tag, children: [], text: '', contentEnd: tag.end, elementEnd: tag.end };
    this.#open.at(-1)?.children.push(element);
    this.#open.push(element);
    this.root ??= element;
  }

  text(text: string): void {
    const inside = this.#open.at(-1);
    if (inside) inside.text += text;
  }

  close(_name: string, start: number, end: number): void {
    const element = this.#open.pop()!;
    if (!element.selfClosing) [element.contentEnd, element.elementEnd] = [start, end];
  }
}

export const child = (element: XmlElement | undefined, name: string): XmlElement | undefined => element?.children.find((one) => one.name === name);

export const childrenOf = (element: XmlElement | undefined, name: string): XmlElement[] => element?.children.filter((one) => one.name === name) ?? [];

/** An attribute that is on unless it says otherwise: `<b/>`, `<b val="0"/>`. */
export const isOn = (value: string | undefined, absent: boolean): boolean => (value === undefined ? absent : value === '1' || value === 'true');

/** The prefix that the element is written with, with its colon. */
export const prefixOf = (xml: string, tag: Tag): string => /^<([^\s/>]*:)?/.exec(xml.slice(tag.start, tag.end))![1] ?? '';

/** An edit that adds text at the end of an element's content. */
export function append(xml: string, element: XmlElement, text: string): Edit {
  if (!element.selfClosing) return { start: element.contentEnd, end: element.contentEnd, text };
  const name = /^<([^\s/>]+)/.exec(xml.slice(element.start, element.end))![1]!;
  return { start: element.end - 2, end: element.end, text: `>${text}</${name}>` };
}

/** The text after the edits, which must not overlap. Of several at one place the earlier stays first. */
export function applyEdits(text: string, edits: readonly Edit[]): string {
  const parts: string[] = [];
  let done = 0;
  for (const edit of [...edits].sort((a, b) => a.start - b.start || a.end - b.end)) {
    parts.push(text.slice(done, edit.start), edit.text);
    done = edit.end;
  }
  parts.push(text.slice(done));
  return parts.join('');
}

const ENTITIES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', '\t': '&#9;', '\n': '&#10;', '\r': '&#13;' };

export const escapeText = (text: string): string => legal(text).replace(/[&<>\r]/g, (sign) => ENTITIES[sign]!);

export const escapeAttribute = (text: string): string => legal(text).replace(/[&<>"\t\n\r]/g, (sign) => ENTITIES[sign]!);

/** Attributes as they stand in a tag, each after a space; those that are undefined are left out. */
export const attributeText = (attributes: Record<string, string | number | undefined>): string =>
  Object.entries(attributes).map(([name, value]) => (value === undefined ? '' : ` ${name}="${escapeAttribute(String(value))}"`)).join('');

/** Text without what XML can't hold. */
const legal = (text: string): string => text.replace(/[\x00-\x08\x0b\x0c\x0e-\x1f\ufffe\uffff]|\p{Surrogate}/gu, '\ufffd');

/** The text of a cell: the file format writes what XML can't hold as `_x0007_`. */
export const decodeCellText = (text: string): string => text.replace(/_x([0-9A-Fa-f]{4})_/g, (_all, code: string) => String.fromCharCode(parseInt(code, 16)));

/** The reverse of decodeCellText, escaped. */
export const encodeCellText = (text: string): string => escapeText(text
  .replace(/_(?=x[0-9A-Fa-f]{4}_)/g, '_x005F_')
  .replace(/[\x00-\x08\x0b-\x1f\ufffe\uffff]/g, (sign) => `_x${sign.charCodeAt(0).toString(16).toUpperCase().padStart(4, '0')}_`));
