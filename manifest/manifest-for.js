// The manifest of one site: the template with its address and its version.

import { readFileSync } from 'node:fs';
import path from 'node:path';

/**
 * @param {string} base address of the site, without a slash at the end
 * @param {string} version as in package.json: the spreadsheet program wants a fourth number
 */
export function manifestFor(base, version) {
  const template = readFileSync(path.join(import.meta.dirname, 'manifest.xml'), 'utf8');
  return template.replaceAll('{{base}}', base).replaceAll('{{version}}', `${version}.0`);
}
