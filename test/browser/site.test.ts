// A site that was built for one address and carries its own Office.js, served from another by the example server, over https and below the host.

import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import type { IncomingMessage } from 'node:http';
import { request } from 'node:https';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { generateCertificates } from 'office-addin-dev-certs';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { launchBrowser, watch } from '../support/browser';
import { selfHosted } from '../support/self-hosted';

const root = path.join(import.meta.dirname, '../..');
const PATH = new URL(selfHosted.base).pathname;
const site = selfHosted.folder;
const certificates = mkdtempSync(path.join(tmpdir(), 'foldplan-'));
const certificate = (name: string) => path.join(certificates, name);

const serve = (...args: string[]) => [path.join(root, 'manifest/serve-site.js'), ...args];
const secured = () => ['--cert', certificate('site.crt'), '--key', certificate('site.key')];

let server: ChildProcess;
let port: number;
let browser: Browser;
beforeAll(async () => {
  const quiet = vi.spyOn(console, 'log').mockReturnValue();
  await generateCertificates(certificate('ca.crt'), certificate('site.crt'), certificate('site.key'), 2);
  quiet.mockRestore();
  writeFileSync(path.join(site, '.secret'), 'not to be served');
  server = spawn(process.execPath, serve('--folder', site, '--port', '0', '--path', PATH, ...secured()));
  port = await new Promise<number>((listening, failed) => {
    server.stdout!.on('data', (text: Buffer) => listening(Number(/on port (\d+)/.exec(text.toString())![1])));
    server.stderr!.on('data', (text: Buffer) => failed(new Error(text.toString())));
  });
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser?.close();
  server?.kill();
  rmSync(certificates, { recursive: true });
});

describe('the pages of the site', () => {
  // Outside of a spreadsheet program, Office.js says so, and after three seconds it tries to open a page of its vendor that collects reports:
  // the pane's policy forbids that. In the program it does neither, which the tests of the pane in the played program show.
  const OFFICE_JS = [/Office\.js is loaded outside of Office client/, /'https:\/\/telemetryservice\.firstpartyapps\.oaspapps\.com\/.*Content Security Policy/s];

  it.each<[name: string, sign: string, text: RegExp, console: RegExp[]]>([
    ['pane.html',      '#pane [role=alert]', /^This page is the pane of the Foldplan add-in/, OFFICE_JS],
    ['help.html',      '#ZONE',              /FOLD\.ZONE/,                                    []],
    ['about.html',     'main',               /^\s*About Foldplan/,                            []],
    ['workbench.html', '#status',            /^A demo plan/,                                  []],
  ])('%s comes up, asks no other address for anything, and has nothing of ours on the console', async (name, selector, text, console) => {
    const context = await browser.newContext({ ignoreHTTPSErrors: true });
    const page = await context.newPage();
    const address = `https://localhost:${port}${PATH}`;
    const watched = watch(page, address);
    await page.goto(`${address}/${name}`, { waitUntil: 'networkidle' });
    await expect.poll(() => page.locator(selector).textContent(), { timeout: 20_000 }).toMatch(text);
    await expect.poll(() => watched.console.length, { timeout: 20_000 }).toBeGreaterThanOrEqual(console.length);
    expect(watched).toEqual({ console: console.map((line) => expect.stringMatching(line)), strayRequests: [] });
    await context.close();
  });

  it('load everything from beside them, wherever they are', () => {
    for (const page of readdirSync(site).filter((file) => file.endsWith('.html'))) {
      const loaded = [...readFileSync(path.join(site, page), 'utf8').matchAll(/<(?:script|link|img|iframe)\b[^>]*\b(?:src|href)="([^"]*)"/g)].map(([, target]) => target!);
      expect(loaded.filter((target) => /^(\w+:)?\/|^data:/.test(target)), page).toEqual([]);
    }
  });
});

/** What the server answers. */
const answer = (target: string, { method = 'GET', headers = {} }: { method?: string; headers?: Record<string, string> } = {}) => new Promise<{ status: number; headers: IncomingMessage['headers']; body: Buffer }>((done, failed) => {
  const asked = request({ host: 'localhost', port, path: target, method, headers, ca: readFileSync(certificate('ca.crt')) }, (response) => {
    const parts: Buffer[] = [];
    response.on('data', (part: Buffer) => parts.push(part)).on('end', () => done({ status: response.statusCode!, headers: response.headers, body: Buffer.concat(parts) }));
  });
  asked.on('error', failed).end();
});

describe('the example server', () => {
  it.each([
    ['pane.html',          'text/html; charset=utf-8'],
    ['functions.js',       'text/javascript; charset=utf-8'],
    ['functions.json',     'application/json; charset=utf-8'],
    ['manifest.xml',       'application/xml; charset=utf-8'],
    ['manifest.json',      'application/json; charset=utf-8'],
    ['foldplan.zip',       'application/zip'],
    ['pane.css',           'text/css; charset=utf-8'],
    ['assets/icon-32.png', 'image/png'],
    ['assets/icon.svg',    'image/svg+xml'],
    ['office/office.js',   'text/javascript; charset=utf-8'],
  ])('sends %s as %s, to be asked for anew each time, and to be read by pages of other addresses', async (name, type) => {
    const { status, headers, body } = await answer(`${PATH}/${name}`);
    expect(status).toBe(200);
    expect(headers).toMatchObject({ 'content-type': type, 'cache-control': 'no-cache', 'x-content-type-options': 'nosniff', 'access-control-allow-origin': '*', 'content-length': String(body.length) });
    expect(body.equals(readFileSync(path.join(site, name)))).toBe(true);
    expect(await answer(`${PATH}/${name}`, { headers: { 'if-none-match': headers.etag! } })).toMatchObject({ status: 304, body: Buffer.alloc(0) });
  });

  it('lets a file be kept whose name changes with its content', async () => {
    const hashed = readdirSync(site).find((name) => /\.[0-9a-f]{20}\.js$/.test(name))!;
    expect((await answer(`${PATH}/${hashed}`)).headers['cache-control']).toBe('public, max-age=31536000, immutable');
  });

  it('answers HEAD without a body, and takes nothing', async () => {
    expect(await answer(`${PATH}/pane.html`, { method: 'HEAD' })).toMatchObject({ status: 200, body: Buffer.alloc(0) });
    expect(await answer(`${PATH}/pane.html`, { method: 'POST' })).toMatchObject({ status: 405, headers: { allow: 'GET, HEAD' } });
  });

  it.each([
    '/', '/pane.html', `${PATH}`, `${PATH}/`, `${PATH}/nothing.js`, `${PATH}/assets`, `${PATH}/../../package.json`, `${PATH}/..%2f..%2fpackage.json`, `${PATH}/%2e%2e/%2e%2e/package.json`,
    `${PATH}/.secret`, `${PATH}/pane.html%00.js`, `${PATH}/%`, `${PATH}x/pane.html`,
  ])('has nothing at %s', async (target) => {
    expect(await answer(target)).toMatchObject({ status: 404, body: Buffer.alloc(0) });
  });
});

describe('the arguments of the example server', () => {
  const run = (...args: string[]) => spawnSync(process.execPath, serve(...args), { encoding: 'utf8', cwd: certificates });

  it('are told with --help', () => {
    const { status, stdout } = run('--help');
    expect(status).toBe(0);
    for (const option of ['--cert', '--key', '--folder', '--port', '--path']) expect(stdout).toContain(option);
  });

  it.each<[args: () => string[], sentence: string | RegExp]>([
    [() => ['--folder', site],                                              'Name the file of the certificate with --cert; --help shows more.'],
    [() => ['--folder', site, '--cert', 'site.crt'],                        'Name the file of the private key with --key; --help shows more.'],
    [() => ['--folder', site, '--cert', 'site.crt', '--key', 'other.key'],  '--key: there is no file other.key.'],
    [() => ['--folder', 'nowhere', ...secured()],                           'There is no built site in nowhere: run npm run build first.'],
    [() => ['--folder', site, '--port', '-1', ...secured()],                /port/],
    [() => ['--folder', site, '--port', 'https', ...secured()],             'port must be a whole number from 0 to 65535; got https'],
    [() => ['--folder', site, '--port', String(port), ...secured()],        /^The site can't be served on port \d+: another program uses that port\.$/],
    [() => ['--folder', site, '--cert', 'site.key', '--key', 'site.crt'],   /^The certificate and its key can't be used: /],
  ])('that are wrong end with a sentence and exit code 2 (%#)', (args, sentence) => {
    const { status, stderr, stdout } = run(...args());
    expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
    expect(stderr.trim()).toMatch(sentence);
  });
});
