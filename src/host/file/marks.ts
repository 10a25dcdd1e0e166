// Marks on numbers below 0: conditional formats of a file that look as ours do.

import { areaAddress, parseArea } from '../../formula/address';
import { NEGATIVE } from '../port';
import type { Book } from './book';
import { Colours } from './colours';
import type { SheetPart } from './sheet-part';
import { type XmlElement, attributeText, child, childrenOf } from './xml';

/** Which differential formats of a file have the colours of a mark and nothing else, by their index. */
export async function markFormats({ archive, relations }: Book): Promise<Set<number>> {
  const part = relations.find(({ type, target }) => type === 'styles' && archive.has(target))?.target;
  if (part === undefined) return new Set();
  const root = await archive.xml(part);
  const colours = new Colours(null, root);
  const isMark = (format: XmlElement) => {
    const [font, fill] = [child(format, 'font'), child(child(format, 'fill'), 'patternFill')];
    return format.children.length === 2 && font?.children.length === 1 && fill?.children.length === 1
      && colours.of(child(font, 'color')) === NEGATIVE.color && colours.of(child(fill, 'bgColor')) === NEGATIVE.fill;
  };
  return new Set(childrenOf(child(root, 'dxfs'), 'dxf').flatMap((format, i) => (isMark(format) ? [i] : [])));
}

/** Addresses of the ranges that a sheet marks. */
export const marksOf = ({ root }: SheetPart, formats: ReadonlySet<number>): string[] => childrenOf(root, 'conditionalFormatting')
  .filter((element) => isMark(element, formats))
  .flatMap(({ attributes: { sqref = '' } }) => sqref.split(/\s+/).flatMap((address) => {
    const area = parseArea(address);
    return area ? [areaAddress(area)] : [];
  }));

export function isMark(element: XmlElement, formats: ReadonlySet<number>): boolean {
  const [rule, ...others] = childrenOf(element, 'cfRule');
  const { type, operator, dxfId } = rule?.attributes ?? {};
  return others.length === 0 && type === 'cellIs' && operator === 'lessThan' && formats.has(Number(dxfId)) && child(rule, 'formula')?.text.trim() === '0';
}

/** The only differential format of a file that we write. */
export const markFormatXml = `<dxfs count="1"><dxf><font><color rgb="${argb(NEGATIVE.color)}"/></font><fill><patternFill><bgColor rgb="${argb(NEGATIVE.fill)}"/></patternFill></fill></dxf></dxfs>`;

export const marksXml = (addresses: readonly string[]): string => addresses.map((sqref, i) => `<conditionalFormatting${attributeText({ sqref })}>`
  + `<cfRule type="cellIs" dxfId="0" priority="${i + 1}" operator="lessThan"><formula>0</formula></cfRule></conditionalFormatting>`).join('');

function argb(color: string): string {
  return `FF${color.slice(1).toUpperCase()}`;
}
