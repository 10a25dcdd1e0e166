// Workbook files as other programs write them, from the XML of their cells.

import JSZip from 'jszip';

export interface RawSheet {
  /** What stands in `sheetData`. */
  rows: string;
  /** Elements behind it. */
  after?: string;
  /** The whole part, where it is not as usual. */
  xml?: string;
  /** A structured table's XML. */
  table?: string;
}

export interface RawWorkbook {
  sheets: Record<string, RawSheet>;
  /** Elements of the workbook behind its sheets. */
  after?: string;
  /** Further parts of the workbook: name in `xl/` -> its XML and the last word of its relation's type. */
  parts?: Record<string, { xml: string; type: string }>;
}

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const OFFICE = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006';

export function rawWorkbook({ sheets, after = '', parts = {} }: RawWorkbook): Promise<Uint8Array> {
  const zip = new JSZip();
  const relations = (list: [type: string, target: string][]) => `<Relationships xmlns="${PACKAGE}/relationships">${list.map(([type, target], i) =>
    `<Relationship Id="rId${i + 1}" Type="${OFFICE}/${type}" Target="${target}"/>`).join('')}</Relationships>`;
  const names = Object.keys(sheets);
  const overrides = Object.keys(parts).map((part) => `<Override PartName="/xl/${part}" ContentType="application/xml"/>`).join('');
  zip.file('[Content_Types].xml', `<Types xmlns="${PACKAGE}/content-types"><Default Extension="xml" ContentType="application/xml"/>${overrides}</Types>`);
  zip.file('_rels/.rels', relations([['officeDocument', 'xl/workbook.xml']]));
  zip.file('xl/workbook.xml', `<workbook xmlns="${MAIN}" xmlns:r="${OFFICE}"><sheets>${names.map((name, i) => `<sheet name="${name}" sheetId="${i + 1}" r:id="rId${i + 1}"/>`).join('')}</sheets>${after}</workbook>`);
  zip.file('xl/_rels/workbook.xml.rels', relations([
    ...names.map((_, i): [string, string] => ['worksheet', `worksheets/sheet${i + 1}.xml`]), ...Object.entries(parts).map(([part, { type }]): [string, string] => [type, part]),
  ]));
  for (const [part, { xml }] of Object.entries(parts)) zip.file(`xl/${part}`, xml);
  Object.values(sheets).forEach((sheet, i) => {
    zip.file(`xl/worksheets/sheet${i + 1}.xml`, sheet.xml ?? `<worksheet xmlns="${MAIN}"><sheetData>${sheet.rows}</sheetData>${sheet.after ?? ''}</worksheet>`);
    if (sheet.table === undefined) return;
    zip.file(`xl/worksheets/_rels/sheet${i + 1}.xml.rels`, relations([['table', '../tables/table1.xml']]));
    zip.file('xl/tables/table1.xml', sheet.table);
  });
  return zip.generateAsync({ type: 'uint8array' });
}

/** The XML of a part. */
export async function partOf(bytes: Uint8Array, part: string): Promise<string | null> {
  return (await JSZip.loadAsync(bytes)).file(part)?.async('string') ?? null;
}
