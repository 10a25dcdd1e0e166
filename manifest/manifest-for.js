// The manifests of one site: the templates with its address and its version.

import { readFileSync } from 'node:fs';
import path from 'node:path';

/**
 * @param {string} base address of the site, without a slash at the end
 * @param {string} version as in package.json
 * @param {'manifest.xml' | 'manifest.json'} file every version of the spreadsheet program takes the first, later ones the second too
 */
export function manifestFor(base, version, file = 'manifest.xml') {
  const template = readFileSync(path.join(import.meta.dirname, file), 'utf8');
  return template.replaceAll('{{base}}', base).replaceAll('{{version}}', version);
}

/**
 * The address of a site as manifests take it: https, and without a slash at the end.
 * @param {string} text
 * @throws {Error} with a sentence for the user
 */
export function siteAddress(text) {
  const address = URL.canParse(text) ? new URL(text) : null;
  // Nothing that would have to be written differently in XML.
  if (address?.protocol !== 'https:' || address.username || /[?#&'"<>\s]/.test(text)) {
    throw new Error(`base must be the https address of a site, such as https://tools.example/foldplan; got ${text}`);
  }
  return address.href.replace(/\/+$/, '');
}
