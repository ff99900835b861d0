/** The server that is really started, before clients that announce more than they are let send, and then dawdle. */
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { bundleServer } from '@/server/cli/bundle.mjs';
import { databaseFile } from '@/server/data-files';
import { signAccessToken } from '@/server/services/access-token';
import { loadSecrets } from '@/server/services/secrets';
import { repairForm } from '@/tests/support/repaired';
import { makeBench } from '../charges/bench';
import { startMortal, type MortalServer } from './mortal-server';

const bundle = path.join(process.cwd(), 'node_modules/.cache/bidewell-unfinished-test');
const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-unfinished-'));
let server: MortalServer;
let cookie: string;
let repairId: string;

beforeAll(async () => {
  await bundleServer(bundle, { 'set-clock': 'tests/support/set-clock.mjs' });
  const bench = await makeBench();
  try {
    await bench.server.deps.dataSource.query(`VACUUM INTO '${databaseFile(folder)}'`);
    server = await startMortal(bundle, folder, bench.server.clock.now(), {});
  } finally {
    await bench.server.close();
  }
  await server.ready();
  const who = { personId: 'own-technician', workshopId: 'workshop-own', sessionId: 'session-own-technician' };
  cookie = `bidewell_access=${signAccessToken(loadSecrets(folder), who, server.now())}`;
  const booked = await fetch(`${server.url}/api/repairs`, {
    method: 'POST',
    headers: { cookie, 'content-type': 'application/json', 'idempotency-key': 'unfinished-test-booking' },
    body: JSON.stringify(repairForm(null)),
  });
  expect(booked.status).toBe(201);
  repairId = ((await booked.json()) as { id: string }).id;
}, 120_000);
afterAll(async () => {
  expect(await server?.stop()).toBe(0);
  fs.rmSync(bundle, { recursive: true, force: true });
  fs.rmSync(folder, { recursive: true, force: true });
}, 60_000);

/** Sends these bytes and leaves the connection open; what was heard until the other side ended it. */
const unfinished = (bytes: string): Promise<string> =>
  new Promise((resolve) => {
    const socket = net.connect(Number(new URL(server.url).port), '127.0.0.1');
    let heard = '';
    socket.on('data', (chunk) => (heard += chunk.toString('latin1')));
    socket.on('error', () => socket.destroy());
    socket.on('close', () => resolve(heard.split('\r\n')[0] ?? ''));
    socket.write(bytes);
  });

// A request that is not whole would be given up after 180 s: the tests' time is what a server that waits for it exceeds.
test.each([
  ['a form, of which nothing comes', () => '/api/repairs', 'application/json', ''],
  ['a form, of which next to nothing comes', () => '/api/repairs', 'application/json', '{"note": "x'],
  [
    'a photo, of which next to nothing comes',
    () => `/api/repairs/${repairId}/photos`,
    'multipart/form-data; boundary=b',
    '--b',
  ],
])(
  'a body announced with 10 GB, %s, is refused with 413 by its announced length, and its connection is closed',
  { timeout: 45_000 },
  async (_what, address, type, begin) => {
    const head = [
      `POST ${address()} HTTP/1.1`,
      'Host: a',
      `Cookie: ${cookie}`,
      `Content-Type: ${type}`,
      'Idempotency-Key: unfinished-test-key-1',
      'Content-Length: 10000000000',
    ];
    expect(await unfinished(`${head.join('\r\n')}\r\n\r\n${begin}`)).toMatch(/^HTTP\/1\.1 413 /);
  },
);
