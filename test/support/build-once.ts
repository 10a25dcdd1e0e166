// Builds the site and the command line once, before any test: the tests run what users run.

import { execFileSync } from 'node:child_process';

export default function buildOnce(): void {
  execFileSync('npx', ['webpack', '--env', 'development', '--stats', 'errors-only'], { stdio: 'inherit' });
}
