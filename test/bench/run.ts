// `npm run bench`: seeded, everything measured in one run, printed as the tables that the README shows.

import { readFileSync } from 'node:fs';
import path from 'node:path';
import { loadFunctions } from '../../src/host/sheet/functions-runtime';
import { benchFamilies, familyTable } from './families';
import { benchFunctions } from './functions';
import { benchPictures } from './pictures';
import { benchPlans } from './plans';
import { benchSheet } from './sheet';
import { markdown } from './table';

const SEED = 20261201;

void run();

async function run(): Promise<void> {
  const dist = (file: string) => readFileSync(path.join(__dirname, '../dist', file), 'utf8');
  const functions = loadFunctions(JSON.parse(dist('functions.json')), dist('functions.js'));
  const rows = [...benchFunctions(SEED), ...benchPlans(SEED), ...(await benchSheet(SEED, functions)), ...(await benchPictures(SEED, functions, __dirname))];
  process.stdout.write(`seed ${SEED}, Node ${process.version}\n\n${markdown(rows)}\n\n${familyTable(benchFamilies(functions))}\n`);
}
