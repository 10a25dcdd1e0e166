// Plans of many shapes, recognised by their headers and labels.

import { describe, expect, it } from 'vitest';
import type { Block, CellValue } from '../../../src/host/port';
import { addressOf } from '../../../src/pane/address';
import { type Proposal, recognise } from '../../../src/pane/setup/recognise';

/** Rows of a sheet from A1 on, as far as they go. */
function sheet(rows: CellValue[][], name = 'Plan'): Block {
  const columns = Math.max(...rows.map((row) => row.length));
  return { sheet: name, address: addressOf({ row: 0, column: 0, rows: rows.length, columns }), values: rows.map((row) => Array.from({ length: columns }, (_, c) => row[c] ?? null)) };
}

/** Moves rows down and to the right. */
const placed = (rows: CellValue[][], down: number, right: number): CellValue[][] => [
  ...Array.from({ length: down }, () => [] as CellValue[]), ...rows.map((row) => [...Array.from({ length: right }, () => null), ...row]),
];

const places = (proposal: Proposal | null): Record<string, string> | null =>
  proposal && Object.fromEntries(Object.entries(proposal.found).map(([key, { sheet: name, address }]) => [key, name === 'Plan' ? address : `${name}!${address}`]));

const bands: CellValue[][] = [['FM', 87.5, 108, 'unwanted'], ['Airband', 118, 137, 'wanted'], ['AIS', 161.9, 162.1, 'wanted']];
const [withoutRole, edgesOnly] = [bands.map((row) => row.slice(0, 3)), bands.map((row) => row.slice(1, 3))];
const centred: CellValue[][] = [['FM', 97.75, 20.5], ['Airband', 127.5, 19], ['AIS', 162, 0.2]];

type Shape = [what: string, rows: CellValue[][], found: Record<string, string>];

const SHAPES: Shape[] = [
  ['low and high',                        [['Name', 'Low', 'High', 'Role'], ...bands],                              { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4', role: 'D2:D4' }],
  ['lower and upper',                     [['Band', 'Lower', 'Upper'], ...withoutRole],                             { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['start and stop frequencies',          [['Signal', 'Start frequency', 'Stop frequency'], ...withoutRole],        { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['from and to, with units',             [['Service', 'From [MHz]', 'To [MHz]'], ...withoutRole],                  { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['minimum and maximum',                 [['System', 'Min. freq. (MHz)', 'Max. freq. (MHz)'], ...withoutRole],     { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['f_low and f_high',                    [['f_low / kHz', 'f_high / kHz'], ...edgesOnly],                          { low: 'A2:A4', high: 'B2:B4' }],
  ['fmin and fmax',                       [['fmin', 'fmax'], ...edgesOnly],                                         { low: 'A2:A4', high: 'B2:B4' }],
  ['f1 and f2',                           [['label', 'f1', 'f2'], ...withoutRole],                                  { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['lower band edge and upper band edge', [['ID', 'Lower band edge', 'Upper band edge'], ...withoutRole],           { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['camel case',                          [['bandName', 'lowEdge', 'highEdge'], ...withoutRole],                    { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['high before low',                     [['Name', 'High', 'Low'], ['FM', 108, 87.5], ['AIS', 162.1, 161.9]],      { name: 'A2:A3', low: 'C2:C3', high: 'B2:B3' }],
  ['centre and width',                    [['Name', 'Centre', 'Width'], ...centred],                                { name: 'A2:A4', centre: 'B2:B4', width: 'C2:C4' }],
  ['center frequency and bandwidth',      [['Name', 'Center frequency (MHz)', 'Bandwidth (MHz)'], ...centred],      { name: 'A2:A4', centre: 'B2:B4', width: 'C2:C4' }],
  ['fc and BW',                           [['', 'fc', 'BW'], ...centred],                                           { name: 'A2:A4', centre: 'B2:B4', width: 'C2:C4' }],
  ['frequency and bandwidth',             [['Channel', 'Frequency', 'Occupied bandwidth'], ...centred],             { name: 'A2:A4', centre: 'B2:B4', width: 'C2:C4' }],
  ['tones',                               [['Tone', 'Frequency / MHz'], ['Clock', 10], ['Pilot', 19]],              { low: 'B2:B3', high: 'B2:B3', name: 'A2:A3' }],
  ['a row of units below the headers',    [['Name', 'Low', 'High'], [null, 'MHz', 'MHz'], ...withoutRole],          { name: 'A3:A5', low: 'B3:B5', high: 'C3:C5' }],
  ['headers in two rows',                 [[null, 'Band edges (MHz)', null], ['Name', 'Low', 'High'], ...withoutRole], { name: 'A3:A5', low: 'B3:B5', high: 'C3:C5' }],
  ['a plan from C7 on, with a title',     placed([['Frequency plan, coast'], [], [], ['Name', 'Low', 'High', 'Role'], ...bands], 3, 2), { name: 'C8:C10', low: 'D8:D10', high: 'E8:E10', role: 'F8:F10' }],
  ['blank columns between',               [['Name', null, 'Low', null, null, 'High'], ...bands.map(([name, low, high]) => [name!, null, low!, null, null, high!])], { name: 'A2:A4', low: 'C2:C4', high: 'F2:F4' }],
  ['blank rows and text between',         [['Name', 'Low', 'High'], withoutRole[0]!, [], ['Wanted ones'], withoutRole[1]!, withoutRole[2]!], { name: 'A2:A6', low: 'B2:B6', high: 'C2:C6' }],
  ['roles by what they say',              [['Name', 'Low', 'High', 'Remark'], ...bands],                            { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4', role: 'D2:D4' }],
  ['a type that is no role',              [['Name', 'Low', 'High', 'Type'], ['FM', 1, 2, 'WFM'], ['AM', 3, 4, 'AM']], { name: 'A2:A3', low: 'B2:B3', high: 'C2:C3' }],
  ['results of an earlier insertion',     [['Folded low', 'Folded high', 'Name', 'Low', 'High'], ...withoutRole.map((row) => [1, 2, ...row])], { name: 'C2:C4', low: 'D2:D4', high: 'E2:E4' }],
  ['notes below the plan',                [['Name', 'Low', 'High'], ...withoutRole, [], [], [], ['Checked', 2026, 12]], { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['a rate below the plan',                 [['Name', 'Low', 'High'], ...withoutRole, [], ['fs', 409.6]],              { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4', rate: 'B6' }],
  ['a second table below',                [['Name', 'Low', 'High'], ...withoutRole, [], ['Name', 'Low', 'High'], ['LO', 1, 2]], { name: 'A2:A4', low: 'B2:B4', high: 'C2:C4' }],
  ['cells beside their labels',
    [['Sample rate', 409.6, 'MHz'], ['Guard', 0.02, 'MHz'], ['Clock tolerance', 20, 'ppm'], [], ['Name', 'Low', 'High'], ...withoutRole],
    { name: 'A6:A8', low: 'B6:B8', high: 'C6:C8', rate: 'B1', guard: 'B2', ppm: 'B3' }],
  ['abbreviated labels to the right',
    [['Low', 'High', null, 'fs =', 409.6], [87.5, 108, null, 'Guard band (MHz):', 0.02], [118, 137, null, 'ppm', null, 20]],
    { low: 'A2:A3', high: 'B2:B3', rate: 'E1', guard: 'E2', ppm: 'F3' }],
  ['a clock in ppm, which is no rate', [['ADC rate', 100], ['Clock ppm', 20], [], ['Low', 'High'], ...edgesOnly], { low: 'A5:A7', high: 'B5:B7', rate: 'B1', ppm: 'B2' }],
  ['a clock in ppm without a rate',    [['Speed', 100], ['Clock (ppm)', 20], [], ['Low', 'High'], ...edgesOnly], { low: 'A5:A7', high: 'B5:B7', ppm: 'B2' }],
  ['labels above their cells', [['ADC clock (MHz)', 'Guard'], [409.6, 0.02], [], ['Low', 'High'], ...edgesOnly], { low: 'A5:A7', high: 'B5:B7', rate: 'A2', guard: 'B2' }],
  ['a label whose cell is still blank', [['Sampling rate'], [], ['Low', 'High'], ...edgesOnly], { low: 'A4:A6', high: 'B4:B6', rate: 'B1' }],
];

describe('a plan is recognised', () => {
  it.each(SHAPES)('with %s', (_what, rows, found) => {
    const proposal = recognise([sheet(rows)], null);
    expect(places(proposal)).toEqual(found);
    expect(proposal!.problems).toEqual([]);
  });

  it.each([
    ['Low (MHz)', 'MHz'], ['f_low / kHz', 'kHz'], ['Low [Hz]', 'Hz'], ['Lower edge, GHz', 'GHz'], ['Low in MHz', 'MHz'], ['low_mhz', 'MHz'], ['Low', null], ['Low (edge)', null],
  ])('under “%s” in the unit %s', (header, unit) => {
    expect(recognise([sheet([[header, 'High'], [1, 2]])], null)!.found.low!.unit).toBe(unit);
  });

  it('with the unit that stands above several headers, or below one', () => {
    expect(recognise([sheet([['Name', 'Edges (kHz)', null], [null, 'Low', 'High'], ['a', 1, 2]])], null)!.found.high!.unit).toBe('kHz');
    expect(recognise([sheet([['Low', 'High'], ['(GHz)', '(GHz)'], [1, 2]])], null)!.found.low!.unit).toBe('GHz');
  });

  it('with reasons: what the header or the label says, and where', () => {
    const { found } = recognise([sheet([['fs', 100], [], ['Name', 'Low', 'High', 'x'], ...bands])], null)!;
    expect(found.low!.why).toBe('headed “Low” in B3');
    expect(found.rate!.why).toBe('beside “fs” in A1');
    expect(found.role!.why).toBe('headed “x” in D3');
  });

  it('around the selection where a workbook holds several', () => {
    const twice = [...sheet([['Name', 'Low', 'High'], ...withoutRole]).values, [], [], [], ['Low', 'High'], [1, 2], [3, 4]];
    expect(places(recognise([sheet(twice)], null))!.low).toBe('B2:B4');
    expect(places(recognise([sheet(twice)], { sheet: 'Plan', address: 'A10' }))!.low).toBe('A9:A10');
  });

  it('on whichever sheet it is, with labels on another one', () => {
    const found = places(recognise([sheet([['Sample rate', 100]], 'Clock'), sheet([['Low', 'High'], [1, 2]])], null));
    expect(found).toEqual({ low: 'A2', high: 'B2', rate: 'Clock!B1' });
  });

  it('with a cell that somebody named for what it is', () => {
    expect(places(recognise([sheet([[null, 100], ['Low', 'High'], [1, 2]])], null, { Fs: 'Plan!$B$1' }))!.rate).toBe('B1');
  });
});

describe('no plan is made up', () => {
  it.each<[string, CellValue[][]]>([
    ['of blank cells', [[null]]],
    ['without headers', edgesOnly],
    ['of headers without numbers', [['Name', 'Low', 'High'], ['a', 'b', 'c']]],
    ['of a list of prices', [['Item', 'Price', 'Count'], ['Amplifier', 12, 3]]],
    ['of low edges alone', [['Name', 'Low'], ['FM', 87.5]]],
    ['of Foldplan’s own results', [['Folded low', 'Folded high', 'Zone'], [1, 2, 3]]],
  ])('%s', (_what, rows) => {
    expect(recognise([sheet(rows)], null)).toBeNull();
  });
});

describe('what does not fit is said', () => {
  it('units that differ', () => {
    expect(recognise([sheet([['Centre (MHz)', 'Width (kHz)'], [100, 25]])], null)!.problems).toEqual([
      'The plan mixes units: centres (A2) in MHz, widths (B2) in kHz. All frequencies must be in one unit; bring them to one in the sheet.',
    ]);
  });

  it('a rate in parts of something', () => {
    const rows = [['Clock', 20, 'ppm'], [], ['Low', 'High'], [1, 2]];
    expect(recognise([sheet(rows)], null)!.problems).toEqual(['Sample rate: B1 is in ppm, which is no unit of frequency; point at another cell.']);
  });

  it('a guard in another unit than the plan, and a tolerance in anything but ppm', () => {
    const rows = [['Guard (kHz)', 20], ['Clock tolerance', 50, 'ppb'], [], ['Low (MHz)', 'High (MHz)'], [1, 2]];
    expect(recognise([sheet(rows)], null)!.problems.map((problem) => problem.split(':')[0])).toEqual(['The plan mixes units', 'The clock tolerance in B2 is in ppb; it must be in ppm. Convert it in the sheet.']);
  });

  it('samples per second go with the frequencies they are', () => {
    expect(recognise([sheet([['fs (MS/s)', 100], [], ['Low (MHz)', 'High (MHz)'], [1, 2]])], null)!.problems).toEqual([]);
  });

  it('two columns that could both be the low edge', () => {
    expect(recognise([sheet([['Low', 'High', 'Start', 'Stop'], [1, 2, 3, 4]])], null)!.problems).toEqual(['The header in C1 would do for the low edge as well; A1 was taken.']);
  });
});
