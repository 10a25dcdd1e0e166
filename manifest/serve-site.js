// A web server for the built site, as an example or for a small group: static files over https, and nothing else.

import { createReadStream, existsSync, readFileSync, statSync } from 'node:fs';
import { createServer } from 'node:https';
import path from 'node:path';
import { parseArgs } from 'node:util';

const HELP = `Serves the built site over https.

  node manifest/serve-site.js --cert site.crt --key site.key [--folder dist] [--port 443] [--path /tools/foldplan]

  --cert FILE    the certificate, with those that vouch for it, as PEM; the computers that use the add-in have to trust it
  --key FILE     its private key, as PEM
  --folder DIR   the built site (default: dist)
  --port NUMBER  (default: 443)
  --path PATH    where the site begins below the host (default: /)
  --help         shows this

Build the site for the address that this gives: npm run build -- --env base=https://tools.example/foldplan --env officejs=self
`;

const CONTENT_TYPES = {
  '.css': 'text/css; charset=utf-8',
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.map': 'application/json; charset=utf-8',
  '.png': 'image/png',
  '.svg': 'image/svg+xml',
  '.xml': 'application/xml; charset=utf-8',
  '.zip': 'application/zip',
};

/** A name that holds a hash of the content names that content for ever. Everything else is asked for anew, functions.js and functions.json above all. */
const cacheControl = (file) => (/\.[0-9a-f]{20}\.js$/.test(file) ? 'public, max-age=31536000, immutable' : 'no-cache');

/**
 * Answers requests with the files of a folder.
 * @param {string} folder
 * @param {string} base path below the host, without a slash at the end
 */
function siteHandler(folder, base = '') {
  const root = path.resolve(folder);
  return (request, response) => {
    const refuse = (code, headers = {}) => response.writeHead(code, { 'content-type': 'text/plain; charset=utf-8', ...headers }).end();
    if (request.method !== 'GET' && request.method !== 'HEAD') return refuse(405, { allow: 'GET, HEAD' });
    const file = requestedFile(root, base, request.url);
    if (file === null) return refuse(404);
    const { size, mtimeMs } = statSync(file);
    const etag = `"${size.toString(36)}-${Math.floor(mtimeMs).toString(36)}"`;
    const headers = {
      'content-type': CONTENT_TYPES[path.extname(file)] ?? 'application/octet-stream',
      'cache-control': cacheControl(file),
      etag,
      'x-content-type-options': 'nosniff',
      'access-control-allow-origin': '*', // Excel on the web reads functions.json from its own address
    };
    if (request.headers['if-none-match'] === etag) return response.writeHead(304, headers).end();
    response.writeHead(200, { ...headers, 'content-length': size });
    if (request.method === 'HEAD') return response.end();
    return createReadStream(file).on('error', () => response.destroy()).pipe(response);
  };
}

/** The file that an address asks for; null where there is none, or none that may be had. */
function requestedFile(root, base, url) {
  const asked = url.split(/[?#]/)[0];
  if (!asked.startsWith(`${base}/`)) return null;
  let name;
  try {
    name = decodeURIComponent(asked.slice(base.length + 1));
  } catch {
    return null;
  }
  const file = path.join(root, name);
  const inside = file.startsWith(root + path.sep) && !name.includes('\0') && !name.split(/[\\/]/).some((part) => part.startsWith('.'));
  return inside && statSync(file, { throwIfNoEntry: false })?.isFile() ? file : null;
}

/**
 * @param {string[]} args
 * @returns what to serve, or null where only help is wanted
 * @throws {Error} with a sentence for the user
 */
function readArguments(args) {
  const { values } = parseArgs({
    args,
    options: {
      cert: { type: 'string' }, key: { type: 'string' }, help: { type: 'boolean' },
      folder: { type: 'string', default: path.join(import.meta.dirname, '../dist') }, port: { type: 'string', default: '443' }, path: { type: 'string', default: '/' },
    },
  });
  if (values.help) return null;
  const port = Number(values.port);
  if (!/^\d+$/.test(values.port) || port > 65535) throw new Error(`port must be a whole number from 0 to 65535; got ${values.port}`);
  if (!existsSync(path.join(values.folder, 'manifest.xml'))) throw new Error(`There is no built site in ${values.folder}: run npm run build first.`);
  const [cert, key] = ['cert', 'key'].map((name) => {
    if (values[name] === undefined) throw new Error(`Name the file of the ${name === 'cert' ? 'certificate' : 'private key'} with --${name}; --help shows more.`);
    if (!existsSync(values[name])) throw new Error(`--${name}: there is no file ${values[name]}.`);
    return readFileSync(values[name]);
  });
  const base = `/${values.path}`.replace(/\/{2,}/g, '/').replace(/\/$/, '');
  return { cert, key, port, base, folder: values.folder };
}

function secureServer({ cert, key, folder, base }) {
  try {
    return createServer({ cert, key }, siteHandler(folder, base));
  } catch (error) {
    throw new Error(`The certificate and its key can't be used: ${error.message}`, { cause: error });
  }
}

const TROUBLE = { EADDRINUSE: 'another program uses that port', EACCES: 'this account may not use that port' };

if (process.argv[1] === import.meta.filename) {
  try {
    const site = readArguments(process.argv.slice(2));
    if (site === null) console.log(HELP.trimEnd());
    else {
      const server = secureServer(site);
      server.on('error', (error) => {
        console.error(`The site can't be served on port ${site.port}: ${TROUBLE[error.code] ?? error.message}.`);
        process.exitCode = 2;
      });
      server.listen(site.port, () => console.log(`Serving ${site.folder} on port ${server.address().port} at ${site.base}/ (stop it with Ctrl+C)`));
    }
  } catch (error) {
    console.error(error.message);
    process.exitCode = 2;
  }
}
