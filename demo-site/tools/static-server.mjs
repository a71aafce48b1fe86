import { createHash } from 'node:crypto';
import { realpathSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { createServer } from 'node:http';
import { extname, join, resolve, sep } from 'node:path';
import { contentSecurityPolicy } from '../policy.mjs';

/**
 * Serves one folder to this machine alone, as a careful agency's server would: right types, an ETag on every answer, the strict policy on
 * pages, nothing outside the folder.
 * @param root  absolute folder
 * @param port  first port to try; the next twenty are tried when it is taken; 0 takes any
 * @returns the listening node:http server
 */
export async function serveFolder(root, port) {
  const folder = realpathSync(root);
  const server = createServer((request, response) => {
    answer(folder, request, response).catch(() => refuse(response, 500, 'the server failed'));
  });
  for (let offset = 0; ; offset += 1) {
    try {
      await listen(server, port + offset);
      return server;
    } catch (reason) {
      if (reason.code !== 'EADDRINUSE' || offset >= 20 || port === 0) throw reason;
    }
  }
}

const types = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.csv': 'text/csv; charset=utf-8',
  '.txt': 'text/plain; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.ico': 'image/x-icon',
  '.webmanifest': 'application/manifest+json',
  '.woff2': 'font/woff2',
};

async function answer(folder, request, response) {
  if (request.method !== 'GET' && request.method !== 'HEAD') {
    response.setHeader('Allow', 'GET, HEAD');
    return refuse(response, 405, 'only GET and HEAD');
  }
  const asked = pathIn(folder, request.url ?? '/');
  if (asked === undefined) return refuse(response, 400, 'no such address');
  const found = await contents(folder, asked);
  if (found === undefined) return refuse(response, 404, 'not found');
  if (found.slashless) {
    response.writeHead(308, { Location: `${new URL(request.url, 'http://localhost').pathname}/` });
    return response.end();
  }

  const tag = `"${createHash('sha256').update(found.body).digest('base64url').slice(0, 27)}"`;
  const type = types[extname(found.path).toLowerCase()] ?? 'application/octet-stream';
  response.setHeader('ETag', tag);
  response.setHeader('Cache-Control', 'no-cache');
  response.setHeader('X-Content-Type-Options', 'nosniff');
  response.setHeader('Referrer-Policy', 'no-referrer');
  if (type.startsWith('text/html')) response.setHeader('Content-Security-Policy', contentSecurityPolicy);
  if (matches(request.headers['if-none-match'], tag)) {
    response.writeHead(304);
    return response.end();
  }
  response.writeHead(200, { 'Content-Type': type, 'Content-Length': found.body.length });
  return response.end(request.method === 'HEAD' ? undefined : found.body);
}

/** The absolute path an address names, or undefined where it names none inside the folder. */
function pathIn(folder, url) {
  let path;
  try {
    path = decodeURIComponent(url.split(/[?#]/, 1)[0]);
  } catch {
    return undefined;
  }
  if (!path.startsWith('/') || path.includes('\0') || path.includes('\\')) return undefined;
  if (path.split('/').some((part) => part.startsWith('.'))) return undefined;
  const absolute = resolve(folder, `.${path}`);
  return inside(folder, absolute) ? { absolute, slash: path.endsWith('/') } : undefined;
}

async function contents(folder, { absolute, slash }) {
  try {
    const path = slash ? join(absolute, 'index.html') : absolute;
    // A link inside the folder may point out of it.
    if (!inside(folder, realpathSync(path))) return undefined;
    return { path, body: await readFile(path) };
  } catch (reason) {
    if (reason.code === 'EISDIR') return { slashless: true };
    if (reason.code === 'ENOENT' || reason.code === 'ENOTDIR') return undefined;
    throw reason;
  }
}

const inside = (folder, path) => path === folder || path.startsWith(`${folder}${sep}`);

function matches(header, tag) {
  if (header === undefined) return false;
  return header.split(',').some((each) => each.trim() === '*' || each.trim().replace(/^W\//, '') === tag);
}

function refuse(response, status, words) {
  response.writeHead(status, { 'Content-Type': 'text/plain; charset=utf-8', 'X-Content-Type-Options': 'nosniff' });
  response.end(`${status} ${words}\n`);
}

function listen(server, port) {
  return new Promise((settle, fail) => {
    server.once('error', fail);
    server.listen(port, '127.0.0.1', () => {
      server.removeListener('error', fail);
      settle();
    });
  });
}
