import { createHash } from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import zlib from 'node:zlib';
import request from 'supertest';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { makeTestServer, type TestServer } from '@/tests/support/server';

const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-web-'));
const script = 'window.started = Date.now();';
const page = `<!doctype html><html><head><script>${script}</script><script src="/_expo/static/js/web/entry-1.js" defer></script></head><body><div id="root"></div></body></html>`;
const entry = '/_expo/static/js/web/entry-0123456789abcdef0123456789abcdef.js';
const code = `console.log(${JSON.stringify('x'.repeat(2000))});`;

beforeAll(() => {
  const put = (name: string, content: string | Buffer) => {
    const file = path.join(folder, name);
    fs.mkdirSync(path.dirname(file), { recursive: true });
    fs.writeFileSync(file, content);
  };
  put('index.html', page);
  put('index.html.br', zlib.brotliCompressSync(page));
  put('index.html.gz', zlib.gzipSync(page));
  put(entry, code);
  put(`${entry}.br`, zlib.brotliCompressSync(code));
  put(`${entry}.gz`, zlib.gzipSync(code));
  put('assets/assets/images/mark.0123456789abcdef0123456789abcdef.png', Buffer.from([0x89, 0x50]));
  put('sw.js', 'self.addEventListener("push", () => {});');
  put('manifest.webmanifest', '{}');
  put('fonts/num-600.woff2', Buffer.from([1, 2]));
  put('.stamp', 'secret of the build');
});
afterAll(() => fs.rmSync(folder, { recursive: true, force: true }));

let server: TestServer;
afterEach(() => server.close());
const start = async () => {
  server = await makeTestServer({ config: { webDir: folder } });
  return request(server.app);
};
describe('the web app’s files', () => {
  it.each([
    ['br, gzip', 'br'],
    ['gzip, deflate, br, zstd', 'br'],
    ['gzip', 'gzip'],
    ['br;q=0, gzip', 'gzip'],
    ['identity', undefined],
    ['br;q=0, gzip;q=0', undefined],
  ])('to a browser that takes %s are sent as %s', async (accepted, encoding) => {
    const agent = await start();
    const answer = await agent.get(entry).set('Accept-Encoding', accepted);
    expect(answer.status).toBe(200);
    expect(answer.headers['content-encoding']).toBe(encoding);
    expect(answer.headers.vary).toContain('Accept-Encoding');
    expect(answer.headers['content-type']).toBe('text/javascript; charset=utf-8');
    if (encoding !== 'br') expect(answer.text).toBe(code);
    const sizes = {
      br: fs.statSync(path.join(folder, `${entry}.br`)).size,
      gzip: fs.statSync(path.join(folder, `${entry}.gz`)).size,
    };
    expect(Number(answer.headers['content-length'])).toBe(encoding ? sizes[encoding as 'br' | 'gzip'] : code.length);
  });

  it('named by their content never change; all others are asked about every time', async () => {
    const agent = await start();
    const cache = async (address: string) => (await agent.get(address)).headers['cache-control'];
    expect(await cache(entry)).toBe('public, max-age=31536000, immutable');
    expect(await cache('/assets/assets/images/mark.0123456789abcdef0123456789abcdef.png')).toBe(
      'public, max-age=31536000, immutable',
    );
    for (const address of ['/', '/sw.js', '/manifest.webmanifest', '/fonts/num-600.woff2'])
      expect(await cache(address)).toBe('no-cache');
  });

  it('unchanged are answered with 304 and no content', async () => {
    const agent = await start();
    const { headers } = await agent.get('/sw.js');
    const again = await agent.get('/sw.js').set('If-None-Match', headers.etag ?? '');
    expect(again.status).toBe(304);
  });

  it('end where the export ends: no dot files, no climbing out, no listing, no compressed twins by name', async () => {
    const agent = await start();
    for (const address of [
      '/.stamp',
      '/../package.json',
      '/..%2fpackage.json',
      '/%2e%2e/package.json',
      '/_expo/',
      '/_expo/static',
      `${entry}.br`,
      '/index.html.gz',
      '/assets/missing.png',
      '/missing.js',
    ]) {
      const answer = await agent.get(address).set('Accept', '*/*');
      expect([address, answer.status, answer.type]).toEqual([address, 404, 'application/problem+json']);
    }
  });

  it('a broken address is answered with 400', async () => {
    const agent = await start();
    expect((await agent.get('/%E0%A4%A')).status).toBe(400);
  });
});

it('answers of the API that are large are sent compressed, small ones as they are', async () => {
  const agent = await start();
  const encoding = async (path: string) =>
    (await server.agentFor('manager').get(path).set('Accept-Encoding', 'gzip')).headers['content-encoding'];
  for (let i = 0; i < 12; i += 1)
    await server.agentFor('manager').post('/api/meters', { name: `Meter ${i}`, offsetMillivolts: 0, checkedAt: null });
  expect(await encoding('/api/meters')).toBe('gzip');
  expect(await encoding('/api/front-door')).toBeUndefined();
  expect((await agent.get('/api/front-door')).status).toBe(200);
});

describe('the page', () => {
  it.each(['/', '/wall', '/estimate', '/charges/abc', '/join'])('is there for the screen %s', async (address) => {
    const agent = await start();
    const answer = await agent.get(address).set('Accept', 'text/html');
    expect(answer.status).toBe(200);
    expect(answer.text).toBe(page);
  });

  it.each(['/api/nothing', '/api', '/_expo/x', '/assets/x', '/charges/abc.json'])(
    'is not there for %s',
    async (address) => {
      const agent = await start();
      const answer = await agent.get(address).set('Accept', 'text/html');
      expect(answer.status).toBe(404);
      expect(answer.type).toBe('application/problem+json');
    },
  );

  it('that is not built says what to do', async () => {
    server = await makeTestServer();
    const answer = await request(server.app).get('/').set('Accept', 'text/html');
    expect(answer.status).toBe(503);
    expect(JSON.parse(answer.text).detail).toContain('npm run build');
  });
});

describe('the security headers', () => {
  const hash = `'sha256-${createHash('sha256').update(script).digest('base64')}'`;
  const policy = (sockets: string) =>
    [
      "default-src 'self'",
      `script-src 'self' ${hash}`,
      "script-src-attr 'none'",
      "style-src 'self' 'unsafe-inline'",
      "img-src 'self' data: blob:",
      "font-src 'self' data:",
      "media-src 'self' data: blob:",
      `connect-src 'self' ${sockets}`,
      "worker-src 'self'",
      "manifest-src 'self'",
      "object-src 'none'",
      "base-uri 'self'",
      "form-action 'self'",
      "frame-ancestors 'none'",
    ].join(';');
  const common = {
    'cross-origin-resource-policy': 'same-origin',
    'permissions-policy': 'camera=(self), screen-wake-lock=(self), geolocation=(), microphone=(), payment=()',
    'referrer-policy': 'same-origin',
    'x-content-type-options': 'nosniff',
    'x-dns-prefetch-control': 'off',
    'x-download-options': 'noopen',
    'x-frame-options': 'DENY',
    'x-permitted-cross-domain-policies': 'none',
    'x-xss-protection': '0',
  };
  const security = (headers: Record<string, string>) =>
    Object.fromEntries(
      Object.entries(headers).filter(([name]) =>
        /^(content-security|cross-origin|origin-agent|permissions|referrer|strict-transport|x-(?!request-id))/.test(
          name,
        ),
      ),
    );

  it.each(['/', entry, '/api/front-door', '/api/nothing', '/healthz'])('over plain http, of %s', async (address) => {
    const agent = await start();
    const { headers } = await agent.get(address).set('Host', 'bench.example.com');
    expect(security(headers)).toEqual({ ...common, 'content-security-policy': policy('ws://bench.example.com') });
  });

  it('over https add HSTS and the upgrade of plain links', async () => {
    server = await makeTestServer({ config: { webDir: folder, proxyHops: 1 } });
    const { headers } = await request(server.app)
      .get('/')
      .set({ Host: 'bench.example.com', 'X-Forwarded-Proto': 'https' });
    expect(security(headers)).toEqual({
      ...common,
      'content-security-policy': `${policy('wss://bench.example.com')};upgrade-insecure-requests`,
      'cross-origin-opener-policy': 'same-origin',
      'strict-transport-security': 'max-age=31536000',
    });
  });

  it('on this machine’s own name leave HSTS out, which would hold for all its ports', async () => {
    server = await makeTestServer({ config: { webDir: folder, proxyHops: 1 } });
    const { headers } = await request(server.app)
      .get('/')
      .set({ Host: 'localhost:4300', 'X-Forwarded-Proto': 'https' });
    expect(headers['strict-transport-security']).toBeUndefined();
    expect(headers['content-security-policy']).toContain('wss://localhost:4300');
  });

  it('cannot be written into by a host that is none', async () => {
    const agent = await start();
    const { headers } = await agent.get('/').set('Host', "x; script-src 'unsafe-inline'");
    expect(headers['content-security-policy']).toContain("connect-src 'self' 'self'");
    expect(headers['content-security-policy']).not.toContain("script-src 'unsafe-inline'");
  });

  it('keep answers of the API out of every cache', async () => {
    const agent = await start();
    for (const address of ['/api/front-door', '/api/session', '/api/nothing'])
      expect((await agent.get(address)).headers['cache-control']).toBe('no-store');
  });
});
