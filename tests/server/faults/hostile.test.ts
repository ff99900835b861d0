/** The server that is really started, on a full disk, a locked database, and before clients that mean it no good. */
import Database from 'better-sqlite3';
import fc from 'fast-check';
import fs from 'node:fs';
import http from 'node:http';
import net from 'node:net';
import { createRequire } from 'node:module';
import os from 'node:os';
import path from 'node:path';
import type { WebSocket } from 'ws';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { bundleServer } from '@/server/cli/bundle.mjs';
import { databaseFile } from '@/server/data-files';
import { signAccessToken } from '@/server/services/access-token';
import { loadSecrets, type Secrets } from '@/server/services/secrets';
import { repairForm } from '@/tests/support/repaired';
import { kept, makeBench } from '../charges/bench';
import { startMortal, type MortalServer } from './mortal-server';

const REQUESTS = 4000;
const RAW = 3000;
const FRAMES = 3000;
const LORISES = 40;
const seed = 20_261_203;

const bundle = path.join(process.cwd(), 'node_modules/.cache/bidewell-hostile-test');
const root = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-hostile-'));
const folder = path.join(root, 'data');
const diskFull = path.join(root, 'disk-is-full');
let server: MortalServer;
let secrets: Secrets;
let port: number;
let chargeId: string;

beforeAll(async () => {
  const preloads = { 'set-clock': 'tests/support/set-clock.mjs', 'full-disk': 'tests/server/faults/full-disk.ts' };
  await bundleServer(bundle, preloads);
  const bench = await makeBench();
  try {
    chargeId = (await kept(bench, { spareId: await bench.spare('S-1') })).id;
    fs.mkdirSync(folder, { recursive: true });
    await bench.server.deps.dataSource.query(`VACUUM INTO '${databaseFile(folder)}'`);
    server = await startMortal(bundle, folder, bench.server.clock.now(), {
      NODE_OPTIONS: `--import ${path.join(bundle, 'full-disk.js')}`,
      DISK_FULL_WHILE: diskFull,
    });
  } finally {
    await bench.server.close();
  }
  await server.ready();
  secrets = loadSecrets(folder);
  port = Number(new URL(server.url).port);
}, 120_000);
afterAll(async () => {
  // It ran to the end of all this, and ends as it should.
  expect(await server?.stop()).toBe(0);
  fs.rmSync(bundle, { recursive: true, force: true });
  fs.rmSync(root, { recursive: true, force: true });
}, 60_000);

const cookie = (): string => {
  const who = { personId: 'own-technician', workshopId: 'workshop-own', sessionId: 'session-own-technician' };
  return `bidewell_access=${signAccessToken(secrets, who, server.now())}`;
};
const read = (address: string) => fetch(`${server.url}${address}`, { headers: { cookie: cookie() } });
let keys = 0;
const newKey = (): string => `hostile-test-key-${(keys += 1)}`;
const book = (key: string, note = 'x'.repeat(1900)) =>
  fetch(`${server.url}/api/repairs`, {
    method: 'POST',
    headers: { cookie: cookie(), 'content-type': 'application/json', 'idempotency-key': key },
    body: JSON.stringify({ ...repairForm(null), note }),
  });
/** What another process sees: only what is committed. */
function committed(): number {
  const database = new Database(databaseFile(folder), { readonly: true });
  const { n } = database.prepare('SELECT count(*) AS n FROM repair').get() as { n: number };
  database.close();
  return n;
}

test('a full disk: a 503 that says so, reads go on, and with room again the very write that was refused is taken, once', async () => {
  expect((await book(newKey())).status).toBe(201);
  fs.writeFileSync(diskFull, '');
  let key = newKey();
  let refused = await book(key);
  for (let n = 0; n < 60 && refused.status === 201; n += 1) refused = await book((key = newKey()));
  expect(refused.status).toBe(503);
  expect(await refused.json()).toMatchObject({
    code: 'disk_full',
    detail: expect.stringContaining('disk of the server is full') as string,
  });
  const before = committed();
  for (const address of ['/api/board', '/api/repairs', `/api/charges/${chargeId}`])
    expect((await read(address)).status, address).toBe(200);
  expect((await book(newKey())).status).toBe(503);
  expect(committed()).toBe(before);
  fs.rmSync(diskFull);
  expect((await book(key)).status).toBe(201);
  expect((await book(key)).status).toBe(201);
  expect(committed()).toBe(before + 1);
});

test(
  'another process that holds the write lock: a 503, reads go on, and afterwards the refused write is taken, once',
  { timeout: 60_000 },
  async () => {
    const before = committed();
    const other = new Database(databaseFile(folder), { timeout: 0 });
    other.exec('BEGIN IMMEDIATE');
    const key = newKey();
    const refused = await book(key);
    expect(refused.status).toBe(503);
    expect(await refused.json()).toMatchObject({ code: 'database_busy' });
    expect((await read('/api/board')).status).toBe(200);
    expect(committed()).toBe(before);
    other.exec('ROLLBACK');
    other.close();
    expect((await book(key)).status).toBe(201);
    expect((await book(key)).status).toBe(201);
    expect(committed()).toBe(before + 1);
  },
);

const agent = new http.Agent({ keepAlive: true, maxSockets: 8 });
interface Sent {
  method: string;
  path: string;
  headers: Record<string, string>;
  body: string;
}
const send = (sent: Sent): Promise<{ status: number; id: string }> =>
  new Promise((resolve, reject) => {
    const { method, path: address, headers } = sent;
    const request = http.request({ agent, host: '127.0.0.1', port, method, path: address, headers }, (response) => {
      response.resume();
      const id = String(response.headers['x-request-id'] ?? '');
      response.on('end', () => resolve({ status: response.statusCode ?? 0, id }));
      response.on('error', reject);
    });
    request.on('error', (error: NodeJS.ErrnoException) => {
      // A connection whose body nobody wants to read to its end is closed: 0. A server that is gone would refuse it.
      if (error.code === 'ECONNRESET' || error.code === 'EPIPE') resolve({ status: 0, id: '' });
      else reject(new Error(`${method} ${address}: ${error.message}`));
    });
    request.end(method === 'GET' ? undefined : sent.body);
  });

const odd = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 60 }),
  fc.json(),
  fc.constantFrom('{', '[[[[', '{"__proto__":{"a":1}}', 'null', '"', '1e999', '\u0000', `{"a":${'['.repeat(5000)}`),
);
const encoded = (text: string): string => encodeURIComponent(Buffer.from(text).toString('utf8'));

/** All until it is closed or has said its first line. */
const raw = (bytes: Buffer): Promise<string> =>
  new Promise((resolve) => {
    const socket = net.connect(port, '127.0.0.1');
    let heard = '';
    socket.on('data', (chunk) => {
      heard += chunk.toString('latin1');
      socket.destroy();
    });
    socket.on('error', () => socket.destroy());
    socket.on('close', () => resolve(heard.split('\r\n')[0] ?? ''));
    socket.end(bytes);
  });

const requireFrom = createRequire(createRequire(import.meta.url).resolve('engine.io-client'));
const { WebSocket: Bare } = requireFrom('ws') as { WebSocket: typeof WebSocket };
/** A web socket without the library's manners; signed in. */
async function openBare(): Promise<WebSocket> {
  const socket = new Bare(`ws://127.0.0.1:${port}/socket.io/?EIO=4&transport=websocket`, {
    headers: { cookie: cookie() },
  });
  socket.on('error', () => socket.terminate());
  await new Promise((resolve) => socket.once('open', resolve));
  socket.send('40{"as":"member"}');
  return socket;
}

test(
  `${REQUESTS} requests, ${RAW} connections and ${FRAMES} socket frames that are none as they should be end nothing, and no 500 goes unlogged`,
  { timeout: 300_000 },
  async () => {
    const addresses = [
      '/api/repairs',
      '/api/charges',
      `/api/charges/${chargeId}/start`,
      '/api/plans',
      '/api/sign-in',
      '/api/board',
    ];
    const request = fc.record({
      method: fc.constantFrom('GET', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'),
      path: fc.oneof(
        fc.tuple(fc.constantFrom(...addresses), odd).map(([address, text]) => `${address}?${encoded(text)}`),
        odd.map((text) => `/api/charges/${encoded(text)}`),
        odd.map((text) => `/${encoded(text)}`),
      ),
      type: fc.constantFrom(
        'application/json',
        'text/plain',
        'application/json; charset=utf-16',
        'multipart/form-data',
        '',
      ),
      rev: fc.constantFrom('"1"', '*', 'W/"1"', '""', 'x'),
      body: odd,
    });
    const answers: { status: number; id: string }[] = [];
    const all = fc.sample(request, { numRuns: REQUESTS, seed });
    for (let from = 0; from < all.length; from += 8)
      answers.push(
        ...(await Promise.all(
          all.slice(from, from + 8).map(({ method, path: address, type, rev, body }) =>
            send({
              ...{ method, path: address, body },
              headers: {
                cookie: cookie(),
                'if-match': rev,
                'idempotency-key': newKey(),
                ...(type ? { 'content-type': type } : {}),
              },
            }),
          ),
        )),
      );
    expect(answers.filter(({ status, id }) => status >= 500 && (id === '' || !server.output().includes(id)))).toEqual(
      [],
    );
    // They got past the front: bodies were read and refused for what they are.
    expect(answers.filter(({ status }) => status === 400).length).toBeGreaterThan(REQUESTS / 10);

    const bytes = fc.oneof(
      fc.uint8Array({ maxLength: 300 }).map((list) => Buffer.from(list)),
      fc
        .tuple(fc.constantFrom('GET', 'POST', 'BREW', ''), odd, fc.constantFrom('HTTP/1.1', 'HTTP/9', ''), odd)
        .map(([method, address, version, head]) =>
          Buffer.from(`${method} ${address} ${version}\r\n${head}: x\r\n\r\n`),
        ),
      fc
        .nat(1e6)
        .map((size) => Buffer.from(`POST /api/repairs HTTP/1.1\r\nHost: a\r\nContent-Length: ${size}\r\n\r\n{`)),
    );
    const lines: string[] = [];
    const connections = fc.sample(bytes, { numRuns: RAW, seed });
    for (let from = 0; from < connections.length; from += 50)
      lines.push(...(await Promise.all(connections.slice(from, from + 50).map(raw))));
    expect(lines.filter((line) => line !== '' && !/^HTTP\/1\.1 (200|4\d\d) /.test(line))).toEqual([]);

    const frame = fc.oneof(
      fc
        .tuple(fc.constantFrom('', '0', '1', '2', '4', '40', '41', '42', '43', '451-', '46', '9'), odd)
        .map(([kind, text]) => kind + text),
      fc.uint8Array({ maxLength: 300 }).map((list) => Buffer.from(list)),
    );
    const frames = fc.sample(frame, { numRuns: FRAMES, seed });
    // Most end their socket at once, so that each few need one of their own.
    for (let from = 0; from < frames.length; from += 5) {
      const socket = await openBare();
      for (const one of frames.slice(from, from + 5)) if (socket.readyState === socket.OPEN) socket.send(one);
      socket.close();
    }
    expect((await read('/api/board')).status).toBe(200);
    expect(server.kills()).toBe(0);
    expect(server.output()).not.toMatch(/uncaught|unhandled/i);
  },
);

test(
  `${LORISES} connections that send their heads byte by byte are closed, and others are served meanwhile`,
  { timeout: 90_000 },
  async () => {
    const closed = Array.from({ length: LORISES }, async () => {
      const socket = net.connect(port, '127.0.0.1');
      socket.on('error', () => socket.destroy());
      socket.resume();
      socket.write('GET /api/board HTTP/1.1\r\nHost: a\r\nX-Slow: ');
      const drip = setInterval(() => socket.writable && socket.write('a'), 200);
      await new Promise((resolve) => socket.once('close', resolve));
      clearInterval(drip);
    });
    for (let n = 0; n < 20; n += 1) expect((await read('/api/board')).status).toBe(200);
    await Promise.all(closed);
    expect((await read('/api/board')).status).toBe(200);
  },
);

test('bodies, heads and socket messages that are too large are refused, not kept', async () => {
  const body = JSON.stringify({ ...repairForm(null), note: 'x'.repeat(2_000_000) });
  const headers = { cookie: cookie(), 'content-type': 'application/json', 'idempotency-key': newKey() };
  expect((await send({ method: 'POST', path: '/api/repairs', headers, body })).status).toBe(413);
  const head = Object.entries(headers)
    .map(([name, value]) => `${name}: ${value}\r\n`)
    .join('');
  // Origin and host are those of the page, so that nothing else refuses it first; what it announces never comes.
  const from = `Host: a\r\nOrigin: http://a\r\n${head}`;
  const asked = Date.now();
  const announced = await raw(
    Buffer.from(`POST /api/repairs HTTP/1.1\r\n${from}Content-Length: 10000000000\r\n\r\n{"note": "x`),
  );
  expect(announced).toMatch(/^HTTP\/1\.1 413 /);
  // Far from the three minutes that a body may take.
  expect(Date.now() - asked).toBeLessThan(20_000);
  const long = await raw(Buffer.from(`GET /api/board HTTP/1.1\r\nHost: a\r\nX-Long: ${'a'.repeat(100_000)}\r\n\r\n`));
  expect(long).toMatch(/^HTTP\/1\.1 431 /);
  const socket = await openBare();
  const ended = new Promise<number>((resolve) => socket.once('close', resolve));
  socket.send(`42["clock:ask","${'x'.repeat(50_000)}"]`);
  // RFC 6455, 7.4.1: 1009 is "too big to process".
  expect(await ended).toBe(1009);
  expect((await read('/api/board')).status).toBe(200);
});
