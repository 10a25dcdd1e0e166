// Builds the site and the command line once, before any test: the tests run what users run.

import { execFileSync } from 'node:child_process';
import { rmSync } from 'node:fs';
import { selfHosted } from './self-hosted';

export default function buildOnce(): void {
  webpack();
  rmSync(selfHosted.folder, { recursive: true, force: true });
  webpack('--config-name', 'functions', '--config-name', 'site', '--env', 'officejs=self', '--env', `base=${selfHosted.base}`, '-o', selfHosted.folder);
}

const webpack = (...options: string[]) => execFileSync('npx', ['webpack', '--env', 'development', '--stats', 'errors-only', ...options], { stdio: 'inherit' });
