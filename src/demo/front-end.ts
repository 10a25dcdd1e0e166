// One receive chain from its bands to the last decimation: an invented station that follows weather balloons. Frequencies in MHz, so jitter
// is in µs.

import type { Cell, Sheet, Workbook } from '../host/port';
import { FREQUENCY, HEADER, INPUT, type Line, NOTE, NUMBER_HEADER, TITLE, formula, look, sheet, styled } from './cells';
import { type BandOfPlan, planHeader, planLine } from './plan-lines';

export function frontEnd(): Workbook {
  return {
    sheets: [bandsSheet(), filterSheet(), noiseSheet(), converterSheet()],
    names: {
      Rate: 'Bands!$B$3', Guard: 'Bands!$B$4', Ppm: 'Bands!$B$5',
      Sonde_Low: 'Bands!$B$8', Sonde_High: 'Bands!$C$8',
      Fold_Name: column('A'), Fold_Low: column('B'), Fold_High: column('C'), Fold_Role: column('D'),
      Fold_Rate: 'Bands!$B$3', Fold_Guard: 'Bands!$B$4', Fold_Ppm: 'Bands!$B$5',
      Ripple: 'Filter!$B$3', Attenuation: 'Filter!$B$4',
    },
  };
}

const BANDS: BandOfPlan[] = [
  ['Radiosondes', 400.15, 406, 'wanted'],
  ['Emergency services, downlink', 390, 395, 'unwanted'],
  ['Amateur radio, 70 cm', 430, 440, 'unwanted'],
  ['PMR446', 446, 446.2, 'unwanted'],
  ['Television, UHF', 470, 694, 'unwanted'],
];
const FIRST = 8;
const LAST = FIRST + BANDS.length - 1;
const column = (letter: string) => `Bands!$${letter}$${FIRST}:$${letter}$${LAST}`;

const RESPONSES = ['butterworth', 'chebyshev', 'inverse chebyshev', 'elliptic'];

const DECIBELS = { numberFormat: '0.00' };

function bandsSheet(): Sheet {
  const lines: Line[] = [];
  lines[1] = [styled('Skua Rigg balloon station: bands at the converter', TITLE)];
  lines[2] = [styled('Frequencies in MHz, jitter in µs, levels in dB. The other sheets follow from these cells.', NOTE)];
  lines[3] = ['Sample rate', styled(122.88, { ...INPUT, ...FREQUENCY }), 'MHz'];
  lines[4] = ['Guard', styled(1, { ...INPUT, ...FREQUENCY }), 'MHz'];
  lines[5] = ['Clock tolerance', styled(10, INPUT), 'ppm'];
  lines[FIRST - 1] = planHeader('Band');
  BANDS.forEach((band, i) => {
    lines[FIRST + i] = planLine(FIRST + i, band);
  });
  return sheet('Bands', lines, [200, 84, 84, 84, 96, 96, 52, 76, 84, 112], { rows: FIRST - 1, columns: 0 });
}

function filterSheet(): Sheet {
  const lines: Line[] = [];
  lines[1] = [styled('Anti-alias filter before the converter', TITLE)];
  lines[2] = [styled('Whatever lands on the radiosondes has to be gone by the stop edges.', NOTE)];
  lines[3] = ['Ripple', styled(0.5, INPUT), 'dB'];
  lines[4] = ['Attenuation', styled(60, INPUT), 'dB'];
  lines[6] = [formula('=FOLD.STOPBAND(Sonde_Low,Sonde_High,Rate)', NUMBER_HEADER)];
  lines[9] = ['Response', 'Order', 'At the lower stop edge', 'At the upper stop edge', 'At 395', 'At 430', 'At 446'].map((title, i) => styled(title, i === 0 ? HEADER : NUMBER_HEADER));
  RESPONSES.forEach((response, i) => {
    const row = 10 + i;
    const at = (frequency: string): Cell => formula(`=FOLD.ATTENUATION(A${row},B${row},Sonde_Low,Sonde_High,Ripple,${frequency},Attenuation)`, DECIBELS);
    lines[row] = [
      response, formula(`=FOLD.FILTERORDER(A${row},Sonde_Low,Sonde_High,A7,B7,Ripple,Attenuation)`),
      at('$A$7'), at('$B$7'), at('Bands!$C$9'), at('Bands!$B$10'), at('Bands!$B$11'),
    ];
  });
  const made = sheet('Filter', lines, [148, 120, 164, 164, 96, 96, 96], { rows: 0, columns: 0 });
  look(made, [5, 5], [1, 2, 3], NUMBER_HEADER);
  look(made, [6, 6], [0, 1, 2, 3], FREQUENCY);
  return made;
}

function noiseSheet(): Sheet {
  const line = (what: string, cell: Cell | number, unit: string): Line => [what, typeof cell === 'number' ? styled(cell, INPUT) : cell, unit];
  const lines: Line[] = [];
  lines[1] = [styled('Noise budget in the radiosonde band', TITLE)];
  lines[3] = line('Centre of the band', formula('=(Sonde_Low+Sonde_High)/2', FREQUENCY), 'MHz');
  lines[4] = line('Bits of the converter', 12, '');
  lines[5] = line('Rms jitter of clock and converter', 2e-7, 'µs');
  lines[6] = line('SNR at the input', 68, 'dB');
  lines[7] = line('SNR to be kept', 60, 'dB');
  lines[9] = line('SNR by quantization, in the band', formula('=FOLD.QUANTSNR(B4,Rate,Sonde_High-Sonde_Low)', DECIBELS), 'dB');
  lines[10] = line('SNR by jitter', formula('=FOLD.JITTERSNR(B3,B5)', DECIBELS), 'dB');
  lines[11] = line('Loss by folded noise', formula('=FOLD.NOISEFOLD(FOLD.ZONE(B3,Rate),Attenuation)', { numberFormat: '0.000000' }), 'dB');
  lines[12] = line('SNR of all together', formula('=FOLD.SUMSNR(B6-B11,B9,B10)', DECIBELS), 'dB');
  lines[13] = line('Effective bits', formula('=FOLD.ENOB(B12)', DECIBELS), '');
  lines[14] = line('Largest jitter for the SNR to be kept', formula('=FOLD.JITTERLIMIT(B3,B7)', { numberFormat: '0.00E+00' }), 'µs');
  return sheet('Noise', lines, [260, 110, 60], { rows: 0, columns: 0 });
}

function converterSheet(): Sheet {
  const lines: Line[] = [];
  lines[1] = [styled('After the converter, and how to test it', TITLE)];
  lines[3] = ['Oscillator wanted', formula('=FOLD.FREQ((Sonde_Low+Sonde_High)/2,Rate)', FREQUENCY), 'MHz'];
  lines[4] = ['Bits of its accumulator', styled(32, INPUT), ''];
  lines[5] = ['Tuning word', formula('=FOLD.TUNINGWORD(B3,Rate,B4)'), ''];
  lines[6] = ['Oscillator as it is', formula('=FOLD.TUNED(B3,Rate,B4)', { numberFormat: '0.000000000' }), 'MHz'];
  lines[7] = ['Flat part of an output rate', styled(0.8, INPUT), ''];
  lines[9] = [styled('Decimation', NUMBER_HEADER), formula('=FOLD.CHAIN(Sonde_Low,Sonde_High,Rate,B3,A10:A13,B7)', NUMBER_HEADER)];
  [4, 2, 2, 2].forEach((decimation, i) => {
    lines[10 + i] = [styled(decimation, INPUT)];
  });
  lines[15] = ['Test tone wanted', styled(403, INPUT), 'MHz'];
  lines[16] = ['Record length', styled(16384, INPUT), ''];
  lines[17] = ['Coherent tone', formula('=FOLD.COHERENT(B15,Rate,B16)', { numberFormat: '0.000000' }), 'MHz'];
  lines[18] = ['Cycles in the record', formula('=FOLD.CYCLES(B15,Rate,B16)'), ''];
  const made = sheet('After the converter', lines, [180, 116, 116, 108, 88, 84], { rows: 0, columns: 0 });
  look(made, [8, 8], [2, 3, 4, 5], NUMBER_HEADER);
  look(made, [9, 12], [1, 2, 3, 4], FREQUENCY);
  return made;
}
