import { readFileSync } from 'node:fs';
import path from 'node:path';
import { loadFunctions } from '../../../src/host/sheet/functions-runtime';
import { openHeadless } from '../../../src/host/sheet/headless';
import { dist } from '../../support/browser';
import { testHost } from '../../support/host-contract';

const functions = loadFunctions(JSON.parse(readFileSync(path.join(dist, 'functions.json'), 'utf8')), readFileSync(path.join(dist, 'functions.js'), 'utf8'));

testHost('the embedded sheet', async (workbook) => {
  const host = openHeadless(functions);
  await host.load(workbook);
  return { host, settle: () => host.settled(), close: async () => host.dispose() };
});
