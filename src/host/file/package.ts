// The package of a workbook file: a zip archive of parts, and the relations between them.

import JSZip from 'jszip';
import { faults } from './faults';
import { type XmlElement, append, applyEdits, attributeText, childrenOf, parseXml, prefixOf } from './xml';

/** A part that another part points to. */
export interface Relation {
  id: string;
  /** The last word of its type: `worksheet`, `styles`. */
  type: string;
  /** Where the part is in the archive; empty for what lies outside of it. */
  target: string;
}

const TYPES = '[Content_Types].xml';

export class Package {
  /** Names of parts are one whatever their case; this is how the archive writes them. */
  readonly #names = new Map<string, string>();

  private constructor(private readonly zip: JSZip) {
    for (const name of Object.keys(zip.files)) this.#names.set(key(name), name);
  }

  /** @throws HostFault where the bytes are no archive that can be read */
  static async open(bytes: Uint8Array): Promise<Package> {
    if (bytes.length === 0) throw faults.empty();
    if (COMPOUND_FILE.every((byte, i) => bytes[i] === byte)) throw compoundFault(bytes);
    if (bytes[0] !== 0x50 || bytes[1] !== 0x4b) throw faults.notZip();
    try {
      return new Package(await JSZip.loadAsync(bytes, { checkCRC32: true }));
    } catch (error) {
      throw /encrypted/i.test(String(error)) ? faults.protectedByPassword() : faults.damagedArchive();
    }
  }

  get parts(): string[] {
    return [...this.#names.values()];
  }

  has(part: string): boolean {
    return this.#names.has(key(part));
  }

  async text(part: string): Promise<string> {
    const entry = this.zip.file(this.#names.get(key(part)) ?? '');
    if (!entry) throw faults.partMissing(part);
    return entry.async('string');
  }

  /** The root element of a small part. */
  async xml(part: string): Promise<XmlElement> {
    const text = await this.text(part);
    return readPart(part, () => parseXml(text));
  }

  /** What a part points to; the package itself without one. */
  async relations(part?: string): Promise<Relation[]> {
    const list = relationsPart(part);
    if (!this.has(list)) return [];
    return childrenOf(await this.xml(list), 'Relationship').map(({ attributes: { Id = '', Type = '', Target = '', TargetMode } }) => ({
      id: Id,
      type: Type.slice(Type.lastIndexOf('/') + 1),
      target: TargetMode === 'External' ? '' : resolve(part ?? '', Target),
    }));
  }

  /** Changes a part, and nothing else of the archive. */
  set(part: string, text: string): void {
    const name = this.#names.get(key(part)) ?? part;
    const date = this.zip.files[name]?.date ?? EPOCH;
    this.zip.file(name, text, { date, createFolders: false });
    this.#names.set(key(part), name);
  }

  /** Adds a part that `owner` points to. */
  async add(part: string, text: string, owner: string, relationType: string, contentType: string): Promise<void> {
    this.set(part, text);
    await this.edit(TYPES, (xml, root) => [append(xml, root, `<${prefixOf(xml, root)}Override${attributeText({ PartName: `/${part}`, ContentType: contentType })}/>`)]);
    const list = relationsPart(owner);
    await this.edit(list, (xml, root) => {
      const taken = new Set(root.children.map(({ attributes }) => attributes.Id));
      let number = root.children.length + 1;
      while (taken.has(`rId${number}`)) number++;
      return [append(xml, root, `<${prefixOf(xml, root)}Relationship${attributeText({ Id: `rId${number}`, Type: relationType, Target: `/${part}` })}/>`)];
    });
  }

  /** Removes a part and what points to it. */
  async remove(part: string, owner: string): Promise<void> {
    this.zip.remove(this.#names.get(key(part))!);
    this.#names.delete(key(part));
    const without = (gone: (element: XmlElement) => boolean) => (_xml: string, root: XmlElement) =>
      root.children.filter(gone).map(({ start, elementEnd }) => ({ start, end: elementEnd, text: '' }));
    await this.edit(TYPES, without(({ attributes: { PartName = '' } }) => key(PartName) === key(part)));
    await this.edit(relationsPart(owner), without(({ attributes: { Target = '' } }) => key(resolve(owner, Target)) === key(part)));
  }

  /** Changes places of a small part. */
  async edit(part: string, edits: (xml: string, root: XmlElement) => { start: number; end: number; text: string }[]): Promise<void> {
    const xml = await this.text(part);
    this.set(part, applyEdits(xml, edits(xml, await this.xml(part))));
  }

  save(): Promise<Uint8Array> {
    return this.zip.generateAsync({ type: 'uint8array', compression: 'DEFLATE' });
  }
}

/** Runs a reader of a part; what it can't read is a fault that names the part. */
export function readPart<T>(part: string, read: () => T): T {
  try {
    return read();
  } catch {
    throw faults.partDamaged(part);
  }
}

/** A new archive holds no time of its own: the same workbook gives the same bytes. */
const EPOCH = new Date(Date.UTC(1980, 0, 1));

const key = (part: string): string => part.replaceAll('\\', '/').replace(/^\/+/, '').toLowerCase();

function relationsPart(part = ''): string {
  const slash = part.lastIndexOf('/') + 1;
  return `${part.slice(0, slash)}_rels/${part.slice(slash)}.rels`;
}

/** A target as a place in the archive; relative to the part that points there. */
function resolve(from: string, target: string): string {
  const steps = target.startsWith('/') ? [] : from.split('/').slice(0, -1);
  for (const step of target.split('/')) {
    if (step === '..') steps.pop();
    else if (step !== '.' && step !== '') steps.push(step);
  }
  return steps.join('/');
}

/** How compound files begin: .xls, and .xlsx with a password. */
const COMPOUND_FILE = [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1];

/** A compound file's directory tells what is inside; its entries are named in UTF-16. */
function compoundFault(bytes: Uint8Array): Error {
  const text = new TextDecoder('latin1').decode(bytes);
  const holds = (entry: string) => text.includes([...entry].join('\0'));
  if (holds('EncryptedPackage')) return faults.protectedByPassword();
  return holds('Workbook') || holds('Book') ? faults.oldFormat() : faults.compound();
}
