// A browser and the built site for tests: an installed Chrome, Edge or Chromium where there is one, else the one that npm brought.

import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import { type Browser, type Page, chromium } from 'playwright-core';

const root = rootAbove(import.meta.dirname);

/** The checkout, seen from the sources or from what is built of them. */
function rootAbove(folder: string): string {
  return existsSync(path.join(folder, 'package.json')) ? folder : rootAbove(path.dirname(folder));
}

/** The folder of the built site. */
export const dist = path.join(root, 'dist');

/** Where tests leave pictures for people to look at. */
export function outputFile(name: string): string {
  const folder = path.join(root, 'test/output');
  mkdirSync(folder, { recursive: true });
  return path.join(folder, name);
}

export async function launchBrowser(): Promise<Browser> {
  const installed = installedBrowser();
  if (installed) return chromium.launch({ executablePath: installed, args: ['--no-sandbox'] });
  const { executablePath, env } = await packedBrowser();
  return chromium.launch({ executablePath, env, args: ['--no-sandbox', '--disable-gpu'] });
}

export interface Site {
  /** Without a slash at the end. */
  address: string;
  close(): Promise<void>;
}

/** Serves a folder on this machine. */
export async function serveSite(folder = dist): Promise<Site> {
  const server = createServer((request, response) => {
    const file = siteFile(new URL(request.url ?? '/', 'http://localhost').pathname, folder);
    if (!file) {
      response.writeHead(404).end();
      return;
    }
    response.writeHead(200, { 'content-type': file.contentType, 'cache-control': 'max-age=3600' }).end(file.body);
  });
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  return {
    address: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    close: () => new Promise((closed) => {
      server.close(() => closed());
      server.closeAllConnections();
    }),
  };
}

/** A file of the site as a server sends it, null where there is none. For tests that answer requests themselves. */
export function siteFile(pathname: string, folder = dist): { body: Buffer; contentType: string } | null {
  const file = path.join(folder, path.normalize(decodeURIComponent(pathname)));
  if (!file.startsWith(folder + path.sep) || !existsSync(file)) return null;
  return { body: readFileSync(file), contentType: CONTENT_TYPES[path.extname(file)] ?? 'application/octet-stream' };
}

const CONTENT_TYPES: Record<string, string> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json',
  '.xml': 'application/xml',
  '.png': 'image/png',
  '.svg': 'image/svg+xml',
};

export interface Watched {
  /** What the console showed, errors that nobody caught included. */
  console: string[];
  /** Requests that leave the site, or that it could not answer. */
  strayRequests: string[];
}

/** Notes what a well-behaved page never does. Call it before the page goes anywhere. */
export function watch(page: Page, address: string): Watched {
  const watched: Watched = { console: [], strayRequests: [] };
  page.on('console', (message) => watched.console.push(`${message.type()}: ${message.text()}`));
  page.on('pageerror', (error) => watched.console.push(`uncaught: ${error.stack ?? error.message}`));
  page.on('request', (request) => {
    if (!/^(data|blob):/.test(request.url()) && !request.url().startsWith(`${address}/`)) watched.strayRequests.push(request.url());
  });
  page.on('response', (response) => {
    if (response.status() >= 400) watched.strayRequests.push(`${response.status()} ${response.url()}`);
  });
  return watched;
}

function installedBrowser(): string | undefined {
  const programs = {
    linux: ['/usr/bin/google-chrome', '/opt/google/chrome/chrome', '/usr/bin/microsoft-edge', '/usr/bin/chromium'],
    darwin: [
      '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome', '/Applications/Microsoft Edge.app/Contents/MacOS/Microsoft Edge',
      '/Applications/Chromium.app/Contents/MacOS/Chromium',
    ],
    win32: [
      'C:\\Program Files\\Google\\Chrome\\Application\\chrome.exe', 'C:\\Program Files (x86)\\Google\\Chrome\\Application\\chrome.exe',
      'C:\\Program Files (x86)\\Microsoft\\Edge\\Application\\msedge.exe',
    ],
  }[process.platform as string] ?? [];
  return programs.find((program) => existsSync(program));
}

/**
 * The browser inside the npm package (Linux on x64), with the libraries and fonts that it needs. Unpacked once per checkout: aside first,
 * then moved into place whole, because test files run side by side.
 */
async function packedBrowser(): Promise<{ executablePath: string; env: Record<string, string> }> {
  const { version } = JSON.parse(readFileSync(path.join(root, 'node_modules/@sparticuz/chromium/package.json'), 'utf8')) as { version: string };
  const folder = path.join(root, '.cache', `chromium-${version}`);
  if (!existsSync(folder)) {
    const aside = `${folder}.${process.pid}`;
    mkdirSync(aside, { recursive: true });
    await unpack(aside);
    writeFileSync(path.join(aside, 'fonts.conf'), fontList(folder));
    try {
      renameSync(aside, folder);
    } catch (error) {
      rmSync(aside, { recursive: true });
      if (!existsSync(folder)) throw error; // else another test file was first
    }
  }
  const libraries = [path.join(folder, 'al2023/lib'), process.env.LD_LIBRARY_PATH].filter(Boolean).join(':');
  return {
    executablePath: path.join(folder, 'chromium'),
    env: { ...process.env as Record<string, string>, LD_LIBRARY_PATH: libraries, FONTCONFIG_FILE: path.join(folder, 'fonts.conf') },
  };
}

/** The package unpacks into the folder for temporary files, and its libraries only where it believes to run as a cloud function. */
async function unpack(folder: string): Promise<void> {
  const before = { ...process.env };
  process.env.TMPDIR = folder;
  process.env.AWS_EXECUTION_ENV = 'AWS_Lambda_nodejs20.x';
  try {
    const { default: packed } = await import('@sparticuz/chromium');
    await packed.executablePath();
  } finally {
    for (const name of ['TMPDIR', 'AWS_EXECUTION_ENV', 'LD_LIBRARY_PATH', 'FONTCONFIG_PATH']) {
      if (before[name] === undefined) delete process.env[name];
      else process.env[name] = before[name];
    }
  }
}

const fontList = (folder: string) => `<?xml version="1.0"?>
<!DOCTYPE fontconfig SYSTEM "fonts.dtd">
<fontconfig>
  <dir>${folder}/fonts</dir>
  <dir>/usr/share/fonts</dir>
  <cachedir>${folder}/fonts-cache</cachedir>
</fontconfig>
`;
