// Every worksheet function that has a native equivalent, by its name without the namespace.

import { CHECK, FREQ, GAP, HIGH, INVERTED, LOW, MARGIN, ZONE } from './landing';
import type { Equivalent } from './native';
import { DROOP, ENOB, JITTERLIMIT, JITTERSNR, NOISEFOLD, QUANTSNR } from './noise';
import { MINRATE, TOLERANCE } from './rates';

export const EQUIVALENTS: Readonly<Record<string, Equivalent>> = {
  FREQ, ZONE, INVERTED, LOW, HIGH, MARGIN, CHECK, GAP, MINRATE, TOLERANCE, JITTERSNR, JITTERLIMIT, QUANTSNR, ENOB, NOISEFOLD, DROOP,
};
