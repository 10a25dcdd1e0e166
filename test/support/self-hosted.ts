// The site as an administrator builds it for a closed network: for an address of its own, with its own Office.js.

import { outputFile } from './browser';

export const selfHosted = { folder: outputFile('self-hosted'), base: 'https://plans.example.test/tools/fold' };
