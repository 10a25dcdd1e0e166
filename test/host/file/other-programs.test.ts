// Files in the many forms that other programs give them: each is computed, and stays in its form.

import { describe, expect, it } from 'vitest';
import { WorkbookFile, readWorkbook } from '../../../src/host/file';
import type { CellInput } from '../../../src/host/port';
import { type RawWorkbook, partOf, rawWorkbook } from '../../support/raw-workbook';
import { calculator } from './calculator';

const SHEET = 'xl/worksheets/sheet1.xml';

/** Recalculates after some cells were written. */
async function recalculated(raw: RawWorkbook, written: Record<string, CellInput> = {}) {
  const file = await WorkbookFile.open(await rawWorkbook(raw));
  for (const [reference, value] of Object.entries(written)) await file.write(reference, [[value]]);
  const { errors, kept } = await file.recalculate(calculator);
  const read = async (reference: string) => (await file.read(reference))!.values;
  const saved = await file.save();
  return { read, errors, kept, saved, xml: (await partOf(saved, SHEET))! };
}

/** One sheet called Plan with these rows. */
const plan = (rows: string, rest: Partial<RawWorkbook> = {}, sheet: { after?: string; table?: string } = {}): RawWorkbook => ({ sheets: { Plan: { rows, ...sheet } }, ...rest });

const number = (address: string, value: number) => `<c r="${address}"><v>${value}</v></c>`;
const text = (address: string, value: string) => `<c r="${address}" t="inlineStr"><is><t>${value}</t></is></c>`;
const fold = (address: string, call: string, attributes = '') => `<c r="${address}"><f${attributes}>_xldudf_FOLD_${call}</f></c>`;

describe('formulas', () => {
  it('that are stored once for many cells are computed in each, and stay as they are stored', async () => {
    const rows = `<row r="1">${number('A1', 70)}<c r="B1"><f t="shared" ref="B1:B3" si="0">_xldudf_FOLD_FREQ(A1,$C$1)</f><v>0</v></c>${number('C1', 100)}</row>`
      + `<row r="2">${number('A2', 130)}<c r="B2"><f t="shared" si="0"/><v>0</v></c></row><row r="3">${number('A3', 270)}<c r="B3"><f t="shared" si="0"/><v>0</v></c></row>`;
    const { read, xml } = await recalculated(plan(rows));
    expect(await read('B1:B3')).toEqual([[30], [30], [30]]);
    expect(xml).toBe((await partOf(await rawWorkbook(plan(rows)), SHEET))!.replace(/<v>0<\/v>/g, '<v>30</v>'));
  });

  it('that were entered for a fixed block fill it, repeat over it and end in #N/A', async () => {
    const rows = `<row r="1">${number('A1', 70)}${fold('B1', 'FREQ(A1:A2,100)', ' t="array" ref="B1:B3"')}${fold('C1', 'FREQ(A1,100)', ' t="array" ref="C1:C3"')}</row><row r="2">${number('A2', 90)}</row>`;
    const { read, xml } = await recalculated(plan(rows));
    expect(await read('B1:C3')).toEqual([[30, 30], [10, 30], [expect.objectContaining({ error: '#N/A' }), 30]]);
    expect(xml).not.toContain('cm=');
  });

  it('use names of the workbook, and before them those of their sheet', async () => {
    const names = '<definedNames><definedName name="Rate">Plan!$B$1</definedName><definedName name="Rate" localSheetId="1">Other!$B$1</definedName></definedNames>';
    const row = (rate: number) => `<row r="1">${fold('A1', 'FREQ(70,rate)')}${number('B1', rate)}</row>`;
    const { read } = await recalculated({ sheets: { Plan: { rows: row(100) }, Other: { rows: row(45) } }, after: names });
    expect([await read('Plan!A1'), await read('Other!A1')]).toEqual([[[30]], [[20]]]);
  });

  it('use the columns of a structured table', async () => {
    const table = '<table xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main" id="1" name="Bands" displayName="Bands" ref="A1:C3"><tableColumns count="3">'
      + '<tableColumn id="1" name="Low"/><tableColumn id="2" name="High (MHz)"/><tableColumn id="3" name="Zone"/></tableColumns></table>';
    const line = (row: number, low: number) => `<row r="${row}">${number(`A${row}`, low)}${number(`B${row}`, low + 5)}${fold(`C${row}`, 'ZONE((Bands[[#This Row],[Low]]+Bands[[#This Row],[High (MHz)]])/2,100)')}</row>`;
    const { read } = await recalculated(plan(`<row r="1">${text('A1', 'Low')}${text('B1', 'High (MHz)')}${text('C1', 'Zone')}</row>${line(2, 60)}${line(3, 110)}<row r="5"><c r="A5"><f>SUM(Bands[Zone])</f></c></row>`, {}, { table }));
    expect(await read('C2:C3')).toEqual([[2], [3]]);
    expect(await read('A5')).toEqual([[5]]);
  });

  it('that nobody here can compute keep their values, which is said; a formula of ours that leans on such a one is an error', async () => {
    const rows = `<row r="1"><c r="A1"><f>_xll.THEIRS(B1)</f><v>70</v></c>${number('B1', 1)}${fold('C1', 'FREQ(A1,100)')}<c r="D1"><f>_xldudf_FOLD_FREQ(_xll.THEIRS(B1),100)</f><v>7</v></c></row>`;
    const { read, kept, errors } = await recalculated(plan(rows), { B1: 2 });
    expect(await read('A1:D1')).toEqual([[70, 2, 30, 7]]);
    expect(kept).toEqual([{ sheet: 'Plan', address: 'A1', message: expect.stringMatching(/^keeps what it had: .*THEIRS.* can't be computed here$/) }]);
    expect(errors).toEqual([{ sheet: 'Plan', address: 'D1', code: '', message: expect.stringMatching(/^keeps what it had: .*THEIRS/) }]);
  });

  it('are all computed where the file says that its values are stale', async () => {
    const rows = '<row r="1"><c r="A1"><f>1+1</f><v>5</v></c></row>';
    expect(await (await recalculated(plan(rows))).read('A1')).toEqual([[5]]);
    expect(await (await recalculated(plan(rows, { after: '<calcPr fullCalcOnLoad="1"/>' }))).read('A1')).toEqual([[2]]);
  });
});

describe('a formula that spills', () => {
  const dynamic = {
    'metadata.xml': {
      type: 'sheetMetadata',
      xml: '<metadata xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main" xmlns:xda="http://schemas.microsoft.com/office/spreadsheetml/2017/dynamicarray">'
        + '<metadataTypes count="1"><metadataType name="XLDAPR" minSupportedVersion="120000" cellMeta="1"/></metadataTypes><futureMetadata name="XLDAPR" count="1"><bk><extLst>'
        + '<ext uri="{bdbb8cdc-fa1e-496e-a857-3c3f30c029c3}"><xda:dynamicArrayProperties fDynamic="1" fCollapsed="0"/></ext></extLst></bk></futureMetadata>'
        + '<cellMetadata count="1"><bk><rc t="1" v="0"/></bk></cellMetadata></metadata>',
    },
  };
  const images = (address: string, ref: string) => `<c r="${address}" cm="1"><f t="array" ref="${ref}">_xldudf_FOLD_IMAGES(30,100,0,$C$1,,FALSE)</f><v>30</v></c>`;

  it('fills fewer cells when there is less, and the cells that it leaves are blank', async () => {
    const rows = `<row r="1">${number('C1', 150)}${images('E1', 'E1:G3')}</row><row r="2">${number('E2', 70)}</row><row r="3"><c r="E3" s="0"><v>130</v></c>${number('F3', 3)}</row>`;
    const { read, xml } = await recalculated(plan(rows, { parts: dynamic }), { C1: 80 });
    expect(await read('E1:G3')).toEqual([[30, 1, false], [70, 2, true], [null, null, null]]);
    expect(xml).toContain('<c r="E1" cm="1"><f t="array" ref="E1:G2">');
    expect(xml).toContain('<row r="3"><c r="E3" s="0"/><c r="F3"/></row>');
  });

  it('fills more cells when there is more', async () => {
    const { read, xml } = await recalculated(plan(`<row r="1">${images('E1', 'E1')}</row><row r="2">${number('Z2', 1)}</row>`, { parts: dynamic }), { C1: 80 });
    expect(await read('E1:G2')).toEqual([[30, 1, false], [70, 2, true]]);
    expect(xml).toMatch(/<row r="2"><c r="E2"><v>70<\/v><\/c><c r="F2"><v>2<\/v><\/c><c r="G2" t="b"><v>1<\/v><\/c><c r="Z2">/);
  });

  it.each([
    ['a value',      '<row r="2"><c r="E2"><v>5</v></c></row>', '', undefined],
    ['merged cells', '',                                        '<mergeCells count="1"><mergeCell ref="E2:F2"/></mergeCells>', undefined],
    ['a table',      '',                                        '', '<table xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main" id="1" name="T" displayName="T" ref="E2:E4"><tableColumns count="1"><tableColumn id="1" name="x"/></tableColumns></table>'],
  ])('covers no other cells: %s in its way makes it #SPILL!, which the file holds as #VALUE!', async (_what, rows, after, table) => {
    const { errors, xml } = await recalculated(plan(`<row r="1">${fold('E1', 'FREQ(A1:A3,100)')}</row>${rows}`, {}, { after, table }), { A1: 70, A2: 80, A3: 90 });
    expect(errors).toEqual([{ sheet: 'Plan', address: 'E1', code: '#SPILL!', message: 'Other cells stand where the result belongs.' }]);
    expect(xml).toContain('<c r="E1" cm="1" t="e"><f t="array" ref="E1">_xldudf_FOLD_FREQ(A1:A3,100)</f><v>#VALUE!</v></c>');
    expect(xml).not.toContain('<v>20</v>');
  });
});

describe('the form of a file', () => {
  it('with prefixes on its elements, and rows and cells that do not say where they are, is kept', async () => {
    const xml = '<x:worksheet xmlns:x="http://schemas.openxmlformats.org/spreadsheetml/2006/main"><x:sheetData>'
      + '<x:row><x:c><x:v>70</x:v></x:c><x:c><x:f>_xldudf_FOLD_FREQ(A1,100)</x:f></x:c></x:row><x:row><x:c><x:v>5</x:v></x:c></x:row></x:sheetData></x:worksheet>';
    const saved = (await recalculated({ sheets: { Plan: { rows: '', xml } } })).xml;
    expect(saved).toBe(xml.replace('<x:c><x:f>_xldudf_FOLD_FREQ(A1,100)</x:f></x:c>', '<x:c r="B1"><x:f>_xldudf_FOLD_FREQ(A1,100)</x:f><x:v>30</x:v></x:c>'));
  });

  it('that lists the order of its formulas loses the list where a formula begins to spill, and keeps it otherwise', async () => {
    const order = { 'calcChain.xml': { type: 'calcChain', xml: '<calcChain xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"><c r="B1" i="1"/></calcChain>' } };
    const after = async (call: string) => {
      const { saved } = await recalculated(plan(`<row r="1">${number('A1', 70)}${fold('B1', call)}</row>`, { parts: order }));
      return [(await partOf(saved, 'xl/calcChain.xml')) !== null, (await partOf(saved, '[Content_Types].xml'))!.includes('calcChain'), (await partOf(saved, 'xl/_rels/workbook.xml.rels'))!.includes('calcChain')];
    };
    expect(await after('FREQ(A1,100)')).toEqual([true, true, true]);
    expect(await after('FREQ(A1:A2,100)')).toEqual([false, false, false]);
  });

  it('with macros, and with parts that nobody knows, keeps them as they are', async () => {
    const parts = { 'vbaProject.bin': { type: 'vbaProject', xml: '\u0000\u0001 no XML \uffff' }, 'theirs/own.xml': { type: 'theirs', xml: '<own  a = "1"/>' } };
    const raw = plan(`<row r="1">${fold('A1', 'FREQ(70,100)')}</row>`, { parts });
    const { saved, read } = await recalculated(raw);
    expect(await read('A1')).toEqual([[30]]);
    for (const part of Object.keys(parts)) expect(await partOf(saved, `xl/${part}`)).toBe(await partOf(await rawWorkbook(raw), `xl/${part}`));
  });

  it('with text of several formats, line ends, escapes and characters of every kind reads as the text', async () => {
    const strings = '<sst xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"><si><r><t>Low </t></r><r><rPr><b/></rPr><t>edge</t></r><rPh sb="0" eb="1"><t>no</t></rPh></si><si><t xml:space="preserve"> &lt;b&gt; &amp;amp; _x000D__x005F_x0041_ 😀 </t></si></sst>';
    const rows = '<row r="1"><c r="A1" t="s"><v>0</v></c><c r="B1" t="s"><v>1</v></c><c r="C1" t="b"><v>1</v></c><c r="D1" t="e"><v>#DIV/0!</v></c><c r="E1" t="d"><v>2026-12-01</v></c></row>';
    const bytes = await rawWorkbook(plan(rows, { parts: { 'sharedStrings.xml': { type: 'sharedStrings', xml: strings } } }));
    const { workbook } = await readWorkbook(bytes);
    expect(Object.values(workbook.sheets[0]!.cells[0]!).map(({ value }) => value)).toEqual(['Low edge', ' <b> &amp; \r_x0041_ 😀 ', true, { error: '#DIV/0!' }, 46357]);
  });
});

describe('a file that can not be read says why', () => {
  const good = plan(`<row r="1">${number('A1', 1)}</row>`);
  const corrupted = async (change: (bytes: Uint8Array) => Uint8Array) => change(await rawWorkbook(good));
  it.each<[what: string, make: () => Promise<Uint8Array>, sentence: string]>([
    ['a sheet that is cut off', () => rawWorkbook({ sheets: { Plan: { rows: '', xml: '<worksheet><sheetData><row' } } }), 'The file is damaged: its part xl/worksheets/sheet1.xml can\'t be read.'],
    ['a workbook without sheets', () => rawWorkbook({ sheets: {} }), 'This workbook has no worksheet.'],
    ['an archive of something else', async () => new Uint8Array(Buffer.from('UEsFBgAAAAAAAAAAAAAAAAAAAAAAAA==', 'base64')), 'There is no workbook in this file.'],
    ['a changed byte', () => corrupted((bytes) => bytes.map((byte, i) => (i === Math.floor(bytes.length / 2) ? byte ^ 0xff : byte))), 'The file is damaged: its archive is incomplete or changed.'],
    ['a missing end', () => corrupted((bytes) => bytes.subarray(0, bytes.length - 30)), 'The file is damaged: its archive is incomplete or changed.'],
  ])('%s', async (_what, make, sentence) => {
    await expect(make().then((bytes) => WorkbookFile.open(bytes))).rejects.toThrow(expect.objectContaining({ name: 'HostFault', message: sentence }));
  });
});
