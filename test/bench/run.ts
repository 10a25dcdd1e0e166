// `npm run bench`: seeded, everything measured in one run, printed as the table that the README shows.

import { benchFunctions } from './functions';
import { benchPlans } from './plans';
import { markdown } from './table';

const SEED = 20261201;

const rows = [...benchFunctions(SEED), ...benchPlans(SEED)];
process.stdout.write(`seed ${SEED}, Node ${process.version}\n\n${markdown(rows)}\n`);
