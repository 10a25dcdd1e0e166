// The row functions of the noise family as native formulas.

import { type Equivalent, type Expression, NONE, NoEquivalent, WRONG, areNumbers, byWord, compares, isEmpty, optionalNumber, settled, unlessBlank, where } from './native';
import { reasons } from './sentences';

export const JITTERSNR: Equivalent = {
  least: 2,
  most: 2,
  rounds: false,
  write: (f, jitter) => unlessBlank(f, where(
    [areNumbers(f, jitter), compares(f, '>', 0), compares(jitter, '>', 0)], `-20*LOG10(2*PI()*${f.text}*${jitter.text})`, WRONG)),
};

export const JITTERLIMIT: Equivalent = {
  least: 2,
  most: 2,
  rounds: false,
  write: (f, snr) => unlessBlank(f, where([areNumbers(f, snr), compares(f, '>', 0)], `10^(-${snr.text}/20)/(2*PI()*${f.text})`, WRONG)),
};

export const QUANTSNR: Equivalent = {
  least: 1,
  most: 3,
  rounds: false,
  write(bits, rate, bandwidth) {
    const ideal = `10*LOG10(1.5)+10*LOG10(4)*${bits.text}`;
    return unlessBlank(bits, where([areNumbers(bits), compares(bits, '>=', 1), ...optionalNumber(rate).conditions], `${ideal}${processingGain(rate, bandwidth)}`, WRONG));
  },
};

/** Added where there is a bandwidth. A 0 leaves it out. */
function processingGain(rate: Expression, bandwidth: Expression): string {
  const kept = optionalNumber(bandwidth);
  if (kept.value === null) return '';
  if (rate.text === '') throw new NoEquivalent(reasons.missing);
  const gain = where(
    [...kept.conditions, areNumbers(rate), compares(rate, '>', 0), compares(bandwidth, '>', 0), `${kept.value}<=${rate.text}/2`],
    `10*LOG10(${rate.text}/(2*${kept.value}))`, WRONG);
  return typeof bandwidth.literal === 'number' ? `+${gain}` : `+IF(OR(${isEmpty(bandwidth.text)},${bandwidth.text}=0),0,${gain})`;
}

export const ENOB: Equivalent = {
  least: 1,
  most: 1,
  rounds: false,
  write: (snr) => unlessBlank(snr, where([areNumbers(snr)], `(${snr.text}-10*LOG10(1.5))/(10*LOG10(4))`, WRONG)),
};

export const NOISEFOLD: Equivalent = {
  least: 1,
  most: 2,
  rounds: false,
  write(zones, rejection) {
    const { value, conditions } = optionalNumber(rejection);
    const others = value === null ? `(${zones.text}-1)` : `(${zones.text}-1)*10^(-${value}/10)`;
    const whole = `${zones.text}=INT(${zones.text})`;
    return unlessBlank(zones, where([areNumbers(zones), compares(zones, '>=', 1), whole, ...conditions], `10*LOG10(1+${others})`, WRONG));
  },
};

export const DROOP: Equivalent = {
  least: 2,
  most: 3,
  rounds: true,
  write: (f, r, hold) => unlessBlank(f, where([areNumbers(f, r), compares(f, '>=', 0), compares(r, '>', 0)], byWord(hold, ['nrz', 'rz', 'doublet'], (word) => {
    const turns = `${settled(`${f.text}/${r.text}`, `${f.text}/${r.text}`)}${word === 'nrz' ? '' : '/2'}`;
    const angle = word === 'nrz' ? `(PI()*${f.text}/${r.text})` : `(PI()*${f.text}/${r.text}/2)`;
    const level = {
      nrz: `20*LOG10(ABS(SIN${angle}/${angle}))`,
      rz: `20*LOG10(ABS(SIN${angle}/${angle})/2)`,
      doublet: `20*LOG10(SIN${angle}^2/${angle})`,
    }[word];
    const atZero = { nrz: '0', rz: '20*LOG10(0.5)', doublet: NONE }[word];
    // Whole turns cancel.
    return `IF(${f.text}=0,${atZero},IF(${turns}=INT(${turns}),${NONE},${level}))`;
  }), WRONG)),
};
