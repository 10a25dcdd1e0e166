// Makes Excel on this computer know the add-in of https://localhost:3000, for `npm run excel`: on a Mac as a file in the folder where
// Excel looks for such add-ins, on Windows as an entry of the user's registry. `node manifest/sideload.js --remove` takes it back.

import { execFileSync } from 'node:child_process';
import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { manifestFor } from './manifest-for.js';

const root = path.join(import.meta.dirname, '..');
const MAC_FOLDER = 'Library/Containers/com.microsoft.Excel/Data/Documents/wef';
const WINDOWS_KEY = 'HKCU\\SOFTWARE\\Microsoft\\Office\\16.0\\WEF\\Developer';

/**
 * @param {{ platform: string, home: string, cache: string, run: (program: string, args: string[]) => void, remove: boolean }} computer
 *   cache: folder for the file that Windows is pointed to
 * @returns {string} what was done, for the user
 * @throws {Error} with a sentence for the user
 */
export function sideload({ platform, home, cache, run, remove }) {
  const { version } = JSON.parse(readFileSync(path.join(root, 'package.json'), 'utf8'));
  const manifest = manifestFor('https://localhost:3000', version);
  const id = /<Id>(.*)<\/Id>/.exec(manifest)[1];
  if (platform !== 'darwin' && platform !== 'win32') {
    throw new Error('Excel runs on Windows and Mac; on this computer npm start opens the workbench instead.');
  }
  const folder = platform === 'darwin' ? path.join(home, MAC_FOLDER) : cache;
  const file = path.join(folder, `${id}.manifest.xml`);
  if (remove) {
    rmSync(file, { force: true });
    if (platform === 'win32') run('reg', ['delete', WINDOWS_KEY, '/v', id, '/f']);
    return 'Excel forgets the add-in when it starts next.';
  }
  mkdirSync(folder, { recursive: true });
  writeFileSync(file, manifest);
  if (platform === 'win32') run('reg', ['add', WINDOWS_KEY, '/v', id, '/t', 'REG_SZ', '/d', file, '/f']);
  return 'Once the server below has started, start Excel anew and choose Home > Add-ins > Foldplan, under Developer Add-ins.';
}

if (process.argv[1] === import.meta.filename) {
  try {
    const run = (program, args) => execFileSync(program, args, { stdio: ['ignore', 'ignore', 'inherit'] });
    const remove = process.argv.includes('--remove');
    console.log(sideload({ platform: process.platform, home: os.homedir(), cache: path.join(root, '.cache'), run, remove }));
  } catch (error) {
    console.error(error.message);
    process.exitCode = 1;
  }
}
