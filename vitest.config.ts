import { availableParallelism } from 'node:os';
import path from 'node:path';
import { defineConfig } from 'vitest/config';

// The sheet's ES modules do not load in Node (one of their dependencies names exports that it lacks there); its CommonJS build does,
// which is also what the command line uses.
const sheet = (file: string) => path.join(import.meta.dirname, 'node_modules/@univerjs/$1/lib/cjs', `${file}.js`);

export default defineConfig({
  resolve: {
    alias: [
      { find: /^@univerjs\/([a-z-]+)$/, replacement: sheet('index') },
      { find: /^@univerjs\/([a-z-]+)\/facade$/, replacement: sheet('facade') },
    ],
  },
  test: {
    include: ['test/**/*.test.ts'],
    globalSetup: ['test/support/build-once.ts'],
    // Most browser tests wait for the browser more than they work.
    maxWorkers: Math.max(2, availableParallelism()),
    // Files leave nothing behind in the process; loading the sheet anew for each would take a fifth of the time.
    isolate: false,
    testTimeout: 60_000,
    hookTimeout: 120_000,
  },
});
