// Whole workbooks: what is left of ours, whether every cell shows what it showed, and what another program makes of the copy.

import JSZip from 'jszip';
import { beforeAll, describe, expect, it } from 'vitest';
import { type ReadWorkbook, WorkbookFile, readWorkbook } from '../../src/host/file';
import type { CellValue, Workbook } from '../../src/host/port';
import { calculate } from '../../src/host/sheet/calculate';
import { type PlainCopy, plainCopy, workbookSource } from '../../src/plain';
import { calculator } from '../host/file/calculator';
import { planOf } from '../support/workbook';
import { noSoffice, recomputed } from './soffice';
import { WORKBOOKS } from './workbooks';

const maker = { version: '1.2.3', date: '2026-12-01' };

interface Copied {
  original: Uint8Array;
  /** The original, recalculated; and the copy of that. */
  before: Uint8Array;
  after: Uint8Array;
  copy: PlainCopy;
}

async function copied(original: Uint8Array): Promise<Copied> {
  const file = await WorkbookFile.open(original);
  await file.recalculate(calculator);
  const before = await file.save();
  const copy = await plainCopy(await file.formulas(), maker);
  await file.replaceFormulas(copy);
  return { original, before, after: await file.save(), copy };
}

type Cells = Record<string, CellValue>;

/** Every cell that shows something, without the messages of errors. */
function cellsOf({ sheets }: Workbook, only: (sheet: string) => boolean = () => true): Cells {
  return Object.fromEntries(sheets.filter(({ name }) => only(name)).flatMap(({ name, cells }) => Object.entries(cells).flatMap(([row, line]) =>
    Object.entries(line).map(([column, { value }]): [string, CellValue] => [`${name} ${row},${column}`, typeof value === 'object' && value !== null ? { error: value.error } : value]))));
}

const isBlank = (value: CellValue | undefined): boolean => value === undefined || value === null || value === '';

/** Cells that differ by more than the doubles of a native formula can help. */
const differing = (wanted: Cells, got: Cells): string[] => [...new Set([...Object.keys(wanted), ...Object.keys(got)])].flatMap((cell) => {
  const [a, b] = [wanted[cell], got[cell]];
  const alike = typeof a === 'number' && typeof b === 'number' ? Math.abs(a - b) <= 1e-9 * Math.max(1, Math.abs(a)) : isBlank(a) ? isBlank(b) : JSON.stringify(a) === JSON.stringify(b);
  return alike ? [] : [`${cell}: ${JSON.stringify(a)} became ${JSON.stringify(b)}`];
});

const stylesOf = ({ sheets }: Workbook, only: (sheet: string) => boolean) => sheets.filter(({ name }) => only(name)).map(({ cells, columns, rows, merges, frozen }) => [
  Object.entries(cells).map(([row, line]) => [row, Object.entries(line).filter(([, { style }]) => style).map(([column, { style }]) => [column, style])]), columns, rows, merges, frozen,
]);

describe.each(Object.keys(WORKBOOKS))('a plain copy of %s', (name) => {
  let original: Uint8Array;
  let asGiven: Uint8Array;
  let result: Copied;
  let before: ReadWorkbook;
  let after: ReadWorkbook;
  const isOld = (sheet: string) => before.workbook.sheets.some((one) => one.name === sheet);
  beforeAll(async () => {
    original = await WORKBOOKS[name]!();
    asGiven = original.slice();
    result = await copied(original);
    before = await readWorkbook(result.before);
    after = await readWorkbook(result.after);
  });

  it('holds no formula of ours', async () => {
    const { formulas, names, others } = await (await WorkbookFile.open(result.after)).formulas();
    expect([...formulas, ...names, ...others].filter(({ text }) => /fold[._]/i.test(text.replace(/"[^"]*"/g, '')))).toEqual([]);
    const before_ = await (await WorkbookFile.open(result.before)).formulas();
    expect(before_.formulas.filter(({ text }) => /fold[._]/i.test(text)).length).toBeGreaterThan(0);
  });

  it('shows in every cell what it showed, in the same looks', () => {
    expect(differing(cellsOf(before.workbook), cellsOf(after.workbook, isOld))).toEqual([]);
    expect(stylesOf(after.workbook, isOld)).toEqual(stylesOf(before.workbook, isOld));
  });

  it('keeps every other part of the file byte for byte, and the original whole', async () => {
    expect(original).toEqual(asGiven);
    const [old, now] = [await JSZip.loadAsync(result.before), await JSZip.loadAsync(result.after)];
    const touched = /^(\[Content_Types\].xml|xl\/workbook.xml|xl\/_rels\/workbook.xml.rels|xl\/worksheets\/[^/]*|xl\/tables\/[^/]*|xl\/calcChain.xml)$/;
    for (const part of Object.keys(old.files).filter((one) => !touched.test(one) && !old.files[one]!.dir)) {
      expect([part, await now.file(part)?.async('string')]).toEqual([part, await old.file(part)!.async('string')]);
    }
  });

  it('tells in a sheet of its own what became what, by which version and when', () => {
    const sheet = after.workbook.sheets.at(-1)!;
    expect(sheet.name).toBe(name === 'several sheets' ? 'Plain copy 2' : 'Plain copy');
    const texts = Object.values(sheet.cells).map((line) => Object.values(line).map(({ value }) => value));
    expect(texts.slice(0, 3)).toEqual([['Plain copy'], ['Made by', 'Foldplan 1.2.3'], ['Date', '2026-12-01']]);
    const listed = texts.slice(texts.findIndex(([first]) => first === 'Sheet') + 1);
    expect(listed.length).toBeGreaterThan(0);
    for (const line of listed) expect(line.slice(-3)[0]).toMatch(/^(native formula|value|reference|removed)$|^=/);
  });

  it('computes the same values without us in the embedded sheet', async () => {
    const computed = await calculate(after.workbook, { metadata: [], implementations: new Map() });
    expect(differing(cellsOf(before.workbook), cellsOf(computed, isOld))).toEqual([]);
  });
});

if (noSoffice) console.log(noSoffice);
it.skipIf(noSoffice !== null)('all the copies compute the same values in LibreOffice, and no cell shows an error that showed none', async () => {
  const copies = await Promise.all(Object.entries(WORKBOOKS).map(async ([name, make], i) => ({ name, key: `copy-${i}`, ...await copied(await make()) })));
  const done = recomputed(Object.fromEntries(copies.map(({ key, after }) => [key, after])));
  for (const { name, key, before } of copies) {
    const { workbook } = await readWorkbook(before);
    const isOld = (sheet: string) => workbook.sheets.some((one) => one.name === sheet);
    expect([name, differing(cellsOf(workbook), cellsOf((await readWorkbook(done[key]!)).workbook, isOld))]).toEqual([name, []]);
  }
});

describe('the conversion of a single formula', () => {
  /** What the formula in B2 of a plan becomes: formulas, or why it is a value. */
  async function converted(formula: string, names: Record<string, string> = {}, spill?: { rows: number; columns: number }): Promise<unknown> {
    const workbook = planOf([[], [null, { value: null, formula, ...(spill && { spill }) }]], { Rate: 'Plan!$H$1', Column: 'Plan!$A$2:$A$4', ...names });
    const copy = await plainCopy(workbookSource(workbook), maker);
    const [change] = copy.cells;
    if (!change) return null;
    const { outcome } = change;
    return outcome.kind === 'formulas' ? outcome.formulas.map((line) => line.map((text) => text.replaceAll(ENOB_OF, 'bits<$1>'))) : outcome.kind === 'reference' ? outcome.formula : copy.sheet.rows.at(-1)!.at(-1);
  }
  /** The shortest equivalent: it shows where its argument went. */
  const ENOB_OF = /IF\(LEN\(([^"=]+?)\)=0,"",IF\(COUNT\(\1\)=1,\(\1-10\*LOG10\(1\.5\)\)\/\(10\*LOG10\(4\)\),#VALUE!\)\)/g;

  it.each([
    ['=A2+1', null],
    ['="FOLD.ENOB(1)"', null],
    ['=FOLD.ENOB(A2)', [['bits<A2>']]],
    ['=fold.enob( $A2 )*2', [['bits<$A2>*2']]],
    ['=IF(FOLD.ENOB(A2)>3,"far",FOLD.ENOB(A$3))', [['IF(bits<A2>>3,"far",bits<A$3>)']]],
    ["=SUM(FOLD.ENOB('My plan'!A2),A5:A9)", [["SUM(bits<'My plan'!A2>,A5:A9)"]]],
    ['=FOLD.ENOB(A2-A3/2)', [['bits<(A2-A3/2)>']]],
    ['=FOLD.ENOB(INDEX(A2:A4,2))', [['bits<INDEX(A2:A4,2)>']]],
    ['=FOLD.ENOB(Rate)', [['bits<Rate>']]],
    ['=FOLD.ENOB(@A1:A4)', [['bits<$A2>']]],
    ['=LET(x,A2,FOLD.ENOB(x))', [['LET(x,A2,bits<x>)']]],
    ["=SUM(FOLD.ENOB([1]Plan!A2),'[2]a b'!A2:A3)", [["SUM(bits<[1]Plan!A2>,'[2]a b'!A2:A3)"]]],
    ['=MATCH(FOLD.ENOB(A2),{1,2,3},0)', [['MATCH(bits<A2>,{1,2,3},0)']]],
    ['=FOLD.LOW(0,0,100)', [['""']]],
    ['=FOLD.ENOB(70)', [['(70-10*LOG10(1.5))/(10*LOG10(4))']]],
  ])('%s', async (formula, expected) => {
    expect(await converted(formula)).toEqual(expected);
  });

  it.each([
    ['=FOLD.ENOB(A2:A4)', 3, 1, [['bits<A2>'], ['bits<A3>'], ['bits<A4>']]],
    ['=FOLD.ENOB($A$2:$A$4)+C2:C4', 3, 1, [['bits<$A$2>+C2'], ['bits<$A$3>+C3'], ['bits<$A$4>+C4']]],
    ['=FOLD.ENOB(Column)*Rate', 3, 1, [['bits<$A$2>*Rate'], ['bits<$A$3>*Rate'], ['bits<$A$4>*Rate']]],
    ['=FOLD.ENOB(A2:A3*C1:D1)', 2, 2, [['bits<(A2*C1)>', 'bits<(A2*D1)>'], ['bits<(A3*C1)>', 'bits<(A3*D1)>']]],
    ['=IF(A2:A3>MAX(A2:A3)-1,FOLD.ENOB(A2:A3),0)', 2, 1, [['IF(A2>MAX(A2:A3)-1,bits<A2>,0)'], ['IF(A3>MAX(A2:A3)-1,bits<A3>,0)']]],
  ])('%s that fills %d × %d cells', async (formula, rows, columns, expected) => {
    expect(await converted(formula, {}, { rows, columns })).toEqual(expected);
  });

  it.each([
    ['=FOLD.RATES(60,90)', 'Because no native formula does what FOLD.RATES does.'],
    ['=1+SUM(FOLD.RATES(60,90))', 'Because no native formula does what FOLD.RATES does.'],
    ['=SUM(FOLD.ENOB(A2:A4))', 'Because its cells can only be computed together.'],
    ['=FOLD.ENOB({1,2})', 'Because its cells can only be computed together.'],
    ['=FOLD.ENOB(A2:A4)', 'Because its arguments do not have the size of the cells that it fills.'],
    ['=FOLD.ENOB(RAND())', 'Because an argument is drawn at random, and a native formula would draw it several times.'],
    ['=FOLD.ENOB("70")', 'Because an argument is no number.'],
    ['=FOLD.ENOB()', 'Because an argument is no number.'],
    ['=FOLD.FREQ(70,0)', 'Because an argument is out of range.'],
    ['=FOLD.FREQ(70,A2,"both")', 'Because an argument is a word that is not known.'],
    ['=FOLD.FREQ(70)', 'Because FOLD.FREQ takes another number of arguments.'],
    [`=FOLD.MINRATE(${'A2+'.repeat(100)}1,C2,C3,C4,C5)`, 'Because the native formula would have more than 8192 characters.'],
    ['=Lost', 'Because the name Lost has no native form.'],
  ])('%s stays a value', async (formula, reason) => {
    expect(await converted(formula, { Lost: 'FOLD.RATES(60,90)' })).toBe(reason);
  });

  it('an ordinary row of a plan takes less than a thousand characters', async () => {
    const lengths = await Promise.all(['=FOLD.ZONE(A2,Rate)', '=FOLD.MARGIN(A2,C2,Rate,D1,D2)', '=FOLD.CHECK(A2,C2,Rate,D1)'].map(async (formula) => ((await converted(formula)) as string[][])[0]![0]!.length));
    expect(lengths.every((length) => length < 1000)).toBe(true);
  });

  it('a copy is ended by what its listener throws', async () => {
    const source = workbookSource(planOf(Array.from({ length: 500 }, (_, i) => [i, `=FOLD.ZONE(A${i + 1},Rate)`])));
    const told: number[] = [];
    await expect(plainCopy(source, maker, (done) => {
      told.push(done);
      if (done > 0) throw new Error('enough');
    })).rejects.toThrow('enough');
    expect(told).toEqual([0, 200]);
  });
});
