/**
 * 10,000 malformed messages, the same ones at every run: requests of every route with ids and bodies of any shape, lines
 * that are no HTTP, and packets that are no socket's. Nothing may end the process, and nothing may be a 500.
 */
import http from 'node:http';
import net, { type AddressInfo } from 'node:net';
import fc from 'fast-check';
import { io } from 'socket.io-client';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { makeHttpServer } from '@/server/http-server';
import { makeSocketHub, type SocketHub } from '@/server/live/socket-hub';
import { makeLog } from '@/server/middleware/request-log';
import { furnish, type Furnished } from '@/tests/support/furnished';
import { makeTestServer, type TestServer } from '@/tests/support/server';
import { walkRouter } from '@/tests/support/walk-router';

const REQUESTS = 6000;
const RAW = 2500;
const PACKETS = 1500;
const seed = 20_260_609;

const logged: string[] = [];
let server: TestServer;
let web: http.Server;
let hub: SocketHub;
let port: number;
let furnished: Furnished;
const unlimited = { points: 1e9, durationS: 1 };
const names = ['open', 'estimate', 'papers', 'createWorkshop', 'join', 'wallCode', 'wallToken', 'wallGuess'];

beforeAll(async () => {
  server = await makeTestServer({
    limits: Object.fromEntries(names.map((name) => [name, unlimited])),
    deps: { log: makeLog('error', { write: (line: string) => void logged.push(line) }) },
  });
  furnished = (await furnish(server)).own;
  // A database in memory has no file to copy.
  server.deps.backups.backUpNow = async () => ({ file: '', bytes: 0, photos: 0, newPhotos: 0, missing: [] });
  hub = makeSocketHub(server.deps);
  web = makeHttpServer({ tls: null }, server.app);
  hub.attach(web);
  await new Promise<void>((resolve) => web.listen(0, '127.0.0.1', resolve));
  port = (web.address() as AddressInfo).port;
}, 120_000);
afterAll(async () => {
  await hub.close();
  await server.close();
});

const agent = new http.Agent({ keepAlive: true, maxSockets: 8 });
interface Sent {
  method: string;
  path: string;
  headers: Record<string, string>;
  body: string | null;
}
interface Answer {
  status: number;
  id: string;
}
const send = ({ method, path, headers, body }: Sent): Promise<Answer> =>
  new Promise<Answer>((resolve, reject) => {
    const request = http.request({ agent, port, host: '127.0.0.1', method, path, headers }, (response) => {
      response.resume();
      response.on('end', () =>
        resolve({ status: response.statusCode ?? 0, id: String(response.headers['x-request-id'] ?? '') }),
      );
      response.on('error', reject);
    });
    request.on('error', (error) => {
      // Node closes a connection whose last body it has not read to its end; the next request on it comes too late.
      if (request.reusedSocket) resolve(send({ method, path, headers, body }));
      else reject(new Error(`${method} ${path}: ${error.message}`));
    });
    request.end(body ?? undefined);
  });

const oddText = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 40 }),
  fc.constantFrom(
    '',
    '..',
    '%00',
    '\u0000',
    '1e999',
    'null',
    '__proto__',
    'constructor',
    "' OR 1=1 --",
    '9'.repeat(400),
  ),
);
/** Ids that exist, so that bodies reach the services behind the schemas. */
const knownIds = () =>
  Object.entries(furnished).flatMap(([key, value]) => (/Id$/.test(key) && typeof value === 'string' ? [value] : []));
const oddValue = fc.oneof(
  { weight: 4, arbitrary: fc.jsonValue({ maxDepth: 2 }) },
  { weight: 3, arbitrary: fc.constantFrom(-1, 0, 1e300, -1e300, 1.5, '3,957', '3957', true, null, [], {}) },
  { weight: 2, arbitrary: oddText },
);
/** Names that the schemas know. */
const fieldNames = [
  ...[
    'spareId',
    'targetVolts',
    'groupVolts',
    'amps',
    'celsius',
    'terminalVolts',
    'at',
    'reason',
    'note',
    'rev',
    'text',
  ],
  ...['personId', 'meterId', 'code', 'answer', 'clipOnAt', 'name', 'email', 'password', 'role', 'zone', 'workingHours'],
  ...['vehicle', 'pack', 'groupCount', 'packTypeId', 'optionId', 'channels', 'toleranceMillivolts', 'readyBy', 'stage'],
];
const oddBody = fc.oneof(
  {
    weight: 6,
    arbitrary: fc.dictionary(fc.oneof(fc.constantFrom(...fieldNames), fc.string({ maxLength: 8 })), oddValue, {
      maxKeys: 8,
    }),
  },
  { weight: 1, arbitrary: oddValue },
);

/** Half a surrogate pair cannot be written into an address. */
const encoded = (text: string): string => encodeURIComponent(Buffer.from(text).toString('utf8'));

function requests(): Sent[] {
  const routes = walkRouter(server.app).filter(({ name }) => !/session|sign-in|sign-out/.test(name));
  const ids = knownIds();
  const one = fc
    .record({
      route: fc.constantFrom(...routes),
      id: fc.oneof({ weight: 3, arbitrary: fc.constantFrom(...ids) }, { weight: 1, arbitrary: oddText }),
      query: fc.option(fc.tuple(oddText, oddText)),
      body: fc.oneof(
        { weight: 5, arbitrary: oddBody.map((value) => JSON.stringify(value)) },
        { weight: 1, arbitrary: fc.string({ unit: 'binary', maxLength: 200 }) },
      ),
      type: fc.constantFrom(
        'application/json',
        'application/json',
        'text/plain',
        'application/json; charset=utf-16',
        '',
      ),
      rev: fc.constantFrom('"1"', '"2"', '*', 'W/"1"', '"-1"', '"1e9"', '""'),
      key: fc.integer({ min: 0, max: 1e9 }),
    })
    .map(({ route, id, query, body, type, rev, key }): Sent => {
      const path = route.path.replace(/:\w+/g, () => encoded(id));
      const search = query ? `?${query.map(encoded).join('=')}` : '';
      const writes = route.method !== 'get';
      return {
        method: route.method.toUpperCase(),
        path: `${path}${search}`,
        headers: {
          cookie: server.agentFor('manager').cookie(),
          ...(type ? { 'content-type': type } : {}),
          ...(writes ? { 'if-match': rev, 'idempotency-key': `fuzz-with-a-key-${key}` } : {}),
        },
        body: writes ? body : null,
      };
    });
  return fc.sample(one, { numRuns: REQUESTS, seed });
}

test(
  `${REQUESTS} requests of every route with ids and bodies of any shape are never a 500`,
  { timeout: 300_000 },
  async () => {
    const counts = new Map<number, number>();
    const failed: string[] = [];
    const all = requests();
    for (let from = 0; from < all.length; from += 8)
      await Promise.all(
        all.slice(from, from + 8).map(async (sent) => {
          const { status } = await send(sent);
          counts.set(status, (counts.get(status) ?? 0) + 1);
          if (status >= 500) failed.push(`${status} ${sent.method} ${sent.path} ${sent.body?.slice(0, 100)}`);
        }),
      );
    expect(failed, logged.slice(0, 3).join('\n')).toEqual([]);
    // They reach what they are to try: some are taken, many are refused by their shape.
    expect(counts.get(400)!).toBeGreaterThan(1000);
    expect(counts.get(200)!).toBeGreaterThan(300);
  },
);

/** What the port answers to bytes, until it closes or says its first line. */
const raw = (bytes: Buffer) =>
  new Promise<string>((resolve) => {
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

test(`${RAW} connections that speak no HTTP are answered with 4xx or closed`, { timeout: 120_000 }, async () => {
  const bytes = fc.oneof(
    fc.uint8Array({ maxLength: 300 }).map((list) => Buffer.from(list)),
    fc
      .tuple(fc.constantFrom('GET', 'POST', 'BREW', ''), oddText, fc.constantFrom('HTTP/1.1', 'HTTP/9', ''), oddText)
      .map(([method, path, version, head]) => Buffer.from(`${method} ${path} ${version}\r\n${head}: x\r\n\r\n`)),
    fc.nat(1e6).map((size) => Buffer.from(`POST /api/repairs HTTP/1.1\r\nHost: a\r\nContent-Length: ${size}\r\n\r\n{`)),
  );
  const lines: string[] = [];
  const all = fc.sample(bytes, { numRuns: RAW, seed });
  for (let from = 0; from < all.length; from += 50)
    lines.push(...(await Promise.all(all.slice(from, from + 50).map(raw))));
  expect(lines.filter((line) => line !== '' && !/^HTTP\/1\.1 (200|4\d\d) /.test(line))).toEqual([]);
});

test(
  `${PACKETS} packets of a signed-in socket that nobody foresaw close at most that socket`,
  { timeout: 120_000 },
  async () => {
    const packet = fc.tuple(
      fc.oneof(fc.constantFrom('clock:ask', 'board:changed', 'connect', 'disconnecting'), fc.string({ maxLength: 12 })),
      fc.array(oddValue, { maxLength: 3 }),
    );
    const all = fc.sample(packet, { numRuns: PACKETS, seed });
    const open = () =>
      io(`http://127.0.0.1:${port}`, {
        transports: ['websocket'],
        forceNew: true,
        auth: { as: 'member' },
        extraHeaders: { cookie: server.agentFor('technician').cookie() },
      });
    for (let from = 0; from < all.length; from += 100) {
      const socket = open();
      await new Promise((resolve) => socket.once('connect', resolve as () => void));
      for (const [name, values] of all.slice(from, from + 100)) {
        // The library keeps its own names for itself on the sender's side too: past it, as somebody else's client would.
        const { engine } = socket.io;
        engine.write(`2${JSON.stringify([name, ...values])}`);
      }
      await new Promise((resolve) => setTimeout(resolve, 20));
      socket.disconnect();
    }
    const socket = open();
    const reply = await new Promise<{ receivedAt: number }>((resolve) => {
      socket.on('connect', () => socket.emit('clock:ask', 1, resolve));
    });
    socket.disconnect();
    expect(reply.receivedAt).toBe(server.clock.now());
  },
);

test('a connection that sends its head byte by byte is closed before it is whole, and others are served meanwhile', async () => {
  const short = { headersTimeout: 400, requestTimeout: 800, connectionsCheckingInterval: 100 };
  const strict = makeHttpServer({ tls: null }, server.app, short);
  await new Promise<void>((resolve) => strict.listen(0, '127.0.0.1', resolve));
  const strictPort = (strict.address() as AddressInfo).port;
  const slow = net.connect(strictPort, '127.0.0.1');
  let heard = '';
  slow.on('data', (chunk) => (heard += chunk.toString('latin1')));
  slow.on('error', () => {});
  const closed = new Promise((resolve) => slow.once('close', resolve));
  const head = `GET /healthz HTTP/1.1\r\nHost: a\r\nX-Slow: ${'a'.repeat(5000)}`;
  let at = 0;
  const drip = setInterval(() => slow.writable && slow.write(head[(at += 1)] ?? 'a'), 20);
  slow.write('G');
  expect((await fetch(`http://127.0.0.1:${strictPort}/healthz`)).status).toBe(200);
  await closed;
  strict.closeAllConnections();
  strict.close();
  clearInterval(drip);
  expect(heard === '' || heard.startsWith('HTTP/1.1 408') || heard.startsWith('HTTP/1.1 400')).toBe(true);
});

test('a body of 2 MB is a 413, and one whose length is a lie is closed', async () => {
  const headers = { cookie: server.agentFor('manager').cookie(), 'content-type': 'application/json' };
  const body = JSON.stringify({ note: 'x'.repeat(2_000_000) });
  const key = { 'idempotency-key': 'a-body-far-too-large' };
  expect((await send({ method: 'POST', path: '/api/repairs', headers: { ...headers, ...key }, body })).status).toBe(
    413,
  );
  const line = await raw(
    Buffer.from(
      'POST /api/repairs HTTP/1.1\r\nHost: a\r\nContent-Type: application/json\r\nContent-Length: 99\r\n\r\n{}',
    ),
  );
  expect(line === '' || /^HTTP\/1\.1 4\d\d /.test(line)).toBe(true);
});
