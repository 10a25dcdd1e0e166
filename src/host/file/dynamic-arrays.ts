// Formulas that spill: the file marks their cells with an index into a part of its own.

import type { Package, Relation } from './package';
import { type XmlElement, attributeText, child, childrenOf, isOn, prefixOf } from './xml';

const PART = 'xl/metadata.xml';
const RELATION = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships/sheetMetadata';
const CONTENT = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheetMetadata+xml';
const NAMESPACE = 'http://schemas.microsoft.com/office/spreadsheetml/2017/dynamicarray';
const TYPE = 'XLDAPR';

const TYPE_ATTRIBUTES = `name="${TYPE}" minSupportedVersion="120000" copy="1" pasteAll="1" pasteValues="1" merge="1" splitFirst="1" rowColShift="1"`
  + ' clearFormats="1" clearComments="1" assign="1" coerce="1" cellMeta="1"';

/** Which marks (`cm`) of a workbook's cells say that a formula spills. */
export class DynamicArrays {
  private constructor(private readonly part: string | null, private readonly marks: Set<string>) {}

  static async of(archive: Package, relations: Relation[]): Promise<DynamicArrays> {
    const part = relations.find(({ type, target }) => type === 'sheetMetadata' && archive.has(target))?.target ?? null;
    return new DynamicArrays(part, part === null ? new Set() : marksOf(await archive.xml(part)));
  }

  isDynamic(mark: string | undefined): boolean {
    return mark !== undefined && this.marks.has(mark);
  }

  /** The mark for a cell whose formula spills; the workbook learns it if it had none. */
  async mark(archive: Package, workbookPart: string): Promise<string> {
    const [known] = this.marks;
    if (known !== undefined) return known;
    let mark = '1';
    if (this.part === null) await archive.add(PART, metadataText, workbookPart, RELATION, CONTENT);
    else {
      await archive.edit(this.part, (xml, root) => {
        mark = String(childrenOf(child(root, 'cellMetadata'), 'bk').length + 1);
        return addType(xml, root);
      });
    }
    this.marks.add(mark);
    return mark;
  }
}

/** The part of a workbook that has formulas that spill and no other metadata; its mark is "1". */
export const metadataText = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>\n'
  + `<metadata xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main" xmlns:xda="${NAMESPACE}">`
  + `<metadataTypes count="1"><metadataType ${TYPE_ATTRIBUTES}/></metadataTypes>`
  + `<futureMetadata name="${TYPE}" count="1"><bk>${dynamic('')}</bk></futureMetadata>`
  + '<cellMetadata count="1"><bk><rc t="1" v="0"/></bk></cellMetadata></metadata>';

export const metadataRelation = RELATION;
export const metadataContentType = CONTENT;

function dynamic(prefix: string): string {
  return `<${prefix}extLst><${prefix}ext uri="{bdbb8cdc-fa1e-496e-a857-3c3f30c029c3}"><xda:dynamicArrayProperties xmlns:xda="${NAMESPACE}" fDynamic="1" fCollapsed="0"/></${prefix}ext></${prefix}extLst>`;
}

/** A mark counts the cellMetadata blocks from 1; a block names a type, from 1, and one of its blocks, from 0. */
function marksOf(root: XmlElement): Set<string> {
  const type = typesOf(root).indexOf(TYPE) + 1;
  const blocks = childrenOf(futureOf(root), 'bk').map(isDynamicBlock);
  const marks = new Set<string>();
  childrenOf(child(root, 'cellMetadata'), 'bk').forEach((block, i) => {
    const record = child(block, 'rc');
    if (type > 0 && Number(record?.attributes.t) === type && blocks[Number(record?.attributes.v)]) marks.add(String(i + 1));
  });
  return marks;
}

const typesOf = (root: XmlElement): (string | undefined)[] => childrenOf(child(root, 'metadataTypes'), 'metadataType').map(({ attributes }) => attributes.name);

const futureOf = (root: XmlElement): XmlElement | undefined => childrenOf(root, 'futureMetadata').find(({ attributes }) => attributes.name === TYPE);

function isDynamicBlock(block: XmlElement): boolean {
  const properties = child(child(block, 'extLst'), 'ext')?.children.find(({ name }) => name.endsWith('dynamicArrayProperties'));
  return isOn(properties?.attributes.fDynamic, false);
}

/** Adds the type, its block and a cell's record to metadata of other kinds. The order of the lists is fixed by the format. */
function addType(xml: string, root: XmlElement) {
  const p = prefixOf(xml, root);
  const types = child(root, 'metadataTypes');
  const future = futureOf(root);
  const cells = child(root, 'cellMetadata');
  const known = typesOf(root).indexOf(TYPE) + 1;
  const type = known || typesOf(root).length + 1;
  const record = `<${p}bk><${p}rc t="${type}" v="${childrenOf(future, 'bk').length}"/></${p}bk>`;
  const block = `<${p}bk>${dynamic(p)}</${p}bk>`;
  const before = (names: string[]) => root.children.find(({ name }) => names.includes(name))?.start ?? root.contentEnd;
  const insert = (names: string[], text: string) => {
    const start = before(names);
    return { start, end: start, text };
  };
  /** A list with one entry more. Its count is left out: it is optional. */
  const extended = (list: XmlElement, entry: string) => {
    const name = `${p}${list.name}`;
    const attributes = { ...list.attributes, count: undefined };
    const entries = list.selfClosing ? '' : xml.slice(list.end, list.contentEnd);
    return { start: list.start, end: list.elementEnd, text: `<${name}${attributeText(attributes)}>${entries}${entry}</${name}>` };
  };
  const edits = [];
  if (!known) {
    const entry = `<${p}metadataType ${TYPE_ATTRIBUTES}/>`;
    if (types) edits.push(extended(types, entry));
    else edits.push(insert(['metadataStrings', 'mdxMetadata', 'futureMetadata', 'cellMetadata', 'valueMetadata', 'extLst'], `<${p}metadataTypes>${entry}</${p}metadataTypes>`));
  }
  if (future) edits.push(extended(future, block));
  else edits.push(insert(['cellMetadata', 'valueMetadata', 'extLst'], `<${p}futureMetadata name="${TYPE}">${block}</${p}futureMetadata>`));
  if (cells) edits.push(extended(cells, record));
  else edits.push(insert(['valueMetadata', 'extLst'], `<${p}cellMetadata>${record}</${p}cellMetadata>`));
  return edits;
}
