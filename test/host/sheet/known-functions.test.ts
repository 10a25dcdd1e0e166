import { describe, expect, it } from 'vitest';
import { unknownParts } from '../../../src/host/sheet/known-functions';

describe('what the sheet does not know in a formula', () => {
  it.each([
    ['=SUM(A1:A3)*2', []],
    ['=FOLD.ZONE(B2,Rate)+fold.later(1)', []],
    ["=SUM('My (x) plan'!A1,Plan!B2)", []],
    ['=IF(A1="[x] GETPIVOTDATA(1)",1,#REF!)', []],
    ['=LET(f,2,f*A1)', []],
    ['=GETPIVOTDATA("f",A1)+getpivotdata("g",A1)', ['GETPIVOTDATA']],
    ['=foo (1)+Bar.baz(2)', ['FOO', 'BAR.BAZ']],
    ["='[other.xlsx]Sheet1'!A1", ["'[other.xlsx]Sheet1'!"]],
    ['=[1]Plan!A1', ['[1]']],
    ['=SUM(Table1[low])', ['Table1[low]']],
    ['=SUM(Jan:Dec!A1)', ['Jan:Dec!']],
    ['=SUM(A1#)', ['A1#']],
  ])('%s: %j', (formula, unknown) => {
    expect(unknownParts(formula)).toEqual(unknown);
  });
});
