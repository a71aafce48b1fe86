import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { request, type Server } from 'node:http';
import { type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { contentSecurityPolicy } from '../../demo-site/policy.mjs';
import { serveFolder } from '../../demo-site/tools/static-server.mjs';

const outer = mkdtempSync(join(tmpdir(), 'rillage-server-'));
const root = join(outer, 'public');
let server: Server;

beforeAll(async () => {
  mkdirSync(join(root, 'desk'), { recursive: true });
  writeFileSync(join(outer, 'secret.txt'), 'secret');
  writeFileSync(join(root, 'index.html'), '<!doctype html><title>front</title>');
  writeFileSync(join(root, 'desk/index.html'), '<!doctype html><title>desk</title>');
  writeFileSync(join(root, 'page.js'), 'export {};');
  writeFileSync(join(root, 'station.json'), '{}');
  writeFileSync(join(root, '.hidden'), 'hidden');
  symlinkSync(join(outer, 'secret.txt'), join(root, 'link.txt'));
  server = await serveFolder(root, 0);
});
afterAll(() => {
  server.close();
  rmSync(outer, { recursive: true });
});

interface Answer {
  status: number | undefined;
  headers: Record<string, string | string[] | undefined>;
  body: string;
}

/** By node:http, which sends the path as it is; fetch would tidy it first. */
function ask(path: string, headers: Record<string, string> = {}, method = 'GET'): Promise<Answer> {
  const { port } = server.address() as AddressInfo;
  return new Promise((settle, fail) => {
    const asked = request({ host: '127.0.0.1', port, path, headers, method }, (response) => {
      let body = '';
      response.on('data', (part: Buffer) => (body += part.toString()));
      response.on('end', () => settle({ status: response.statusCode, headers: response.headers, body }));
    });
    asked.on('error', fail);
    asked.end();
  });
}

describe('serveFolder', () => {
  it('sends the front page with the strict policy', async () => {
    const { status, headers, body } = await ask('/');
    expect(status).toBe(200);
    expect(headers['content-type']).toBe('text/html; charset=utf-8');
    expect(headers['content-security-policy']).toBe(contentSecurityPolicy);
    expect(body).toContain('front');
  });

  it.each([
    ['/page.js', 'text/javascript; charset=utf-8'],
    ['/station.json', 'application/json; charset=utf-8'],
    ['/station.json?v=2', 'application/json; charset=utf-8'],
  ])('sends %s as %s', async (path, type) => {
    const { status, headers } = await ask(path);
    expect([status, headers['content-type']]).toEqual([200, type]);
  });

  it('answers 304 to the tag it gave, and 200 to another', async () => {
    const { headers } = await ask('/station.json');
    const again = await ask('/station.json', { 'if-none-match': `W/"other", ${String(headers['etag'])}` });
    expect([again.status, again.body]).toEqual([304, '']);
    expect((await ask('/station.json', { 'if-none-match': '"other"' })).status).toBe(200);
  });

  it.each([
    '/../secret.txt',
    '/%2e%2e/secret.txt',
    '/..%2fsecret.txt',
    '/desk/../../secret.txt',
    '/..\\secret.txt',
    '//../secret.txt',
    '/link.txt',
    '/.hidden',
    '/%00',
    '/%',
  ])('gives nothing outside the folder: %s', async (path) => {
    const { status, body } = await ask(path);
    expect([400, 404]).toContain(status);
    expect(body).not.toMatch(/secret|hidden/);
  });

  it('sends a folder to its own slash', async () => {
    const { status, headers } = await ask('/desk');
    expect([status, headers['location']]).toEqual([308, '/desk/']);
    expect((await ask('/desk/')).body).toContain('desk');
  });

  it('sends no body to HEAD and refuses POST', async () => {
    expect(await ask('/page.js', {}, 'HEAD')).toMatchObject({ status: 200, body: '' });
    expect((await ask('/page.js', {}, 'POST')).status).toBe(405);
    expect((await ask('/nothing.html')).status).toBe(404);
  });

  it('takes the next port where the first is taken', async () => {
    const { port } = server.address() as AddressInfo;
    const second = await serveFolder(root, port);
    expect((second.address() as AddressInfo).port).toBeGreaterThan(port);
    second.close();
  });
});
