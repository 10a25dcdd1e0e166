// What the command line computes with: the embedded sheet without a window, and the built functions.

import type { Calculator } from '../../../src/host/file';
import { calculate } from '../../../src/host/sheet/calculate';
import { unknownParts } from '../../../src/host/sheet/known-functions';
import { built } from '../../support/built-functions';

export const calculator: Calculator = { calculate: (workbook) => calculate(workbook, built), unknownParts };
