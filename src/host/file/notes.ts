// Notes on cells. A file keeps their texts in one part, and the boxes that show them in another.

import { cellAddress, parseArea } from '../../formula/address';
import type { Package } from './package';
import { type XmlElement, attributeText, child, childrenOf, decodeCellText, encodeCellText } from './xml';

/** Notes of a sheet by the address of their cell; what people discuss there is no note. */
export async function readNotes(archive: Package, sheetPart: string): Promise<Record<string, string>> {
  const notes: Record<string, string> = {};
  for (const { type, target } of await archive.relations(sheetPart)) {
    if (type !== 'comments' || !archive.has(target)) continue;
    const root = await archive.xml(target);
    const authors = childrenOf(child(root, 'authors'), 'author').map(({ text }) => text);
    for (const comment of childrenOf(child(root, 'commentList'), 'comment')) {
      const area = parseArea(comment.attributes.ref ?? '');
      if (area && !isDiscussion(authors[Number(comment.attributes.authorId)])) notes[cellAddress(area.top, area.left)] = textOf(child(comment, 'text'));
    }
  }
  return notes;
}

/** Programs that know no discussions find a note in its place. */
const isDiscussion = (author = ''): boolean => author.startsWith('tc=');

const textOf = (text: XmlElement | undefined): string => [...childrenOf(text, 't'), ...childrenOf(text, 'r').flatMap((run) => childrenOf(run, 't'))]
  .map((part) => decodeCellText(part.text)).join('');

export const notesXml = (notes: Record<string, string>): string => '<comments xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"><authors><author/></authors><commentList>'
  + `${Object.entries(notes).map(([ref, text]) => `<comment${attributeText({ ref, authorId: 0 })}><text><r><t xml:space="preserve">${encodeCellText(text)}</t></r></text></comment>`).join('')}</commentList></comments>`;

/** The boxes, hidden until the pointer is on the cell. */
export function noteBoxesXml(notes: Record<string, string>): string {
  const boxes = Object.keys(notes).map((address, i) => {
    const { top: row, left: column } = parseArea(address)!;
    return `<v:shape id="_x0000_s${FIRST_SHAPE + i}" type="#_x0000_t202" style="position:absolute;visibility:hidden;width:180pt;height:72pt" fillcolor="#ffffe1" o:insetmode="auto">`
      + '<v:fill color2="#ffffe1"/><v:path o:connecttype="none"/><v:textbox style="mso-direction-alt:auto"/><x:ClientData ObjectType="Note"><x:MoveWithCells/><x:SizeWithCells/>'
      + `<x:Anchor>${[column + 1, 15, Math.max(0, row - 1), 10, column + 4, 15, row + 4, 4].join(', ')}</x:Anchor>`
      + `<x:AutoFill>False</x:AutoFill><x:Row>${row}</x:Row><x:Column>${column}</x:Column></x:ClientData></v:shape>`;
  });
  return '<xml xmlns:v="urn:schemas-microsoft-com:vml" xmlns:o="urn:schemas-microsoft-com:office:office" xmlns:x="urn:schemas-microsoft-com:office:excel">'
    + '<o:shapelayout v:ext="edit"><o:idmap v:ext="edit" data="1"/></o:shapelayout><v:shapetype id="_x0000_t202" coordsize="21600,21600" o:spt="202" path="m,l,21600r21600,l21600,xe">'
    + `<v:stroke joinstyle="miter"/><v:path gradientshapeok="t" o:connecttype="rect"/></v:shapetype>${boxes.join('')}</xml>`;
}

/** Programs number the shapes of a sheet from here. */
const FIRST_SHAPE = 1025;
