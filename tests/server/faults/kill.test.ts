/**
 * The server that is really started, killed without warning while charges go over its channels and alerts go out to
 * stand-ins of the services: what it has said yes to is there, once, and every alert arrives.
 */
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { seededRandom } from '@/calc/index';
import { databaseFile } from '@/server/data-files';
import { alertCauses } from '@/shared/contract/alert-settings';
import type { StatusDto } from '@/shared/contract/status';
import { bundleServer } from '@/server/cli/bundle.mjs';
import { startMailCatcher, type MailCatcher } from '@/server/demo/outside/mail-catcher';
import { startPhoneService, type FakePhoneService } from '@/server/demo/outside/phone-service';
import { startPushService, type FakePushService } from '@/server/demo/outside/push-service';
import { kept, makeBench, minute } from '../charges/bench';
import { dueIn, impossibleIn, readBooks, transitionsIn } from './books';
import { makeLane, type Lane } from './lane';
import { startMortal, type MortalServer } from './mortal-server';
import { makeClient, type RepeatingClient } from './repeating-client';

const transitionsWanted = 200;
const killsWanted = 16;
const roles = ['technician', 'foreman', 'manager'] as const;

const bundle = path.join(process.cwd(), 'node_modules/.cache/bidewell-kill-test');
const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-kill-'));
const certificate = path.join(folder, 'push-service.pem');
const random = seededRandom(17);
let push: FakePushService;
let phones: FakePhoneService;
let mail: MailCatcher;
let server: MortalServer;
let client: RepeatingClient;
/** The next message to this service kills the server: it is sent, and nobody has noted so. */
let killAtMessageTo: 'push' | 'phones' | 'mail' | null = null;
const kills = { 'during acts': 0, 'while time goes on': 0, 'between a message and its note': 0 };

const killAt = (service: typeof killAtMessageTo) => () => {
  if (killAtMessageTo !== service) return;
  killAtMessageTo = null;
  kills['between a message and its note'] += 1;
  server.kill();
};

beforeAll(async () => {
  await bundleServer(bundle, { 'set-clock': 'tests/support/set-clock.mjs' });
  push = await startPushService(killAt('push'));
  phones = await startPhoneService(killAt('phones'));
  mail = await startMailCatcher(killAt('mail'));
  fs.writeFileSync(certificate, push.certificate);
}, 120_000);
afterAll(async () => {
  await server?.stop();
  await Promise.all([push.close(), phones.close(), mail.close()]);
  fs.rmSync(bundle, { recursive: true, force: true });
  fs.rmSync(folder, { recursive: true, force: true });
});

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** A workshop with people, a charger, spares and a plan that nobody starts, in a data folder of its own. */
async function furnish(dataDir: string) {
  const bench = await makeBench();
  try {
    const spares: string[] = [];
    for (let n = 1; n <= 40; n += 1) spares.push(await bench.spare(`S-${n}`));
    const idle = await kept(bench, { spareId: await bench.spare('S-0') });
    fs.mkdirSync(dataDir);
    await bench.server.deps.dataSource.query(`VACUUM INTO '${databaseFile(dataDir)}'`);
    const { meterId, channels, server } = bench;
    return { spares, idleId: idle.id, meterId, channels, now: server.clock.now() };
  } finally {
    await bench.server.close();
  }
}

/** Everybody has a browser and a phone; the technician gets every cause by every way. */
async function equipPeople(): Promise<void> {
  for (const role of roles) {
    const { endpoint, keys } = push.subscribe(role);
    const browser = { kind: 'browser', endpoint, keys };
    const phone = { kind: 'phone', token: `ExponentPushToken[${role}]` };
    for (const device of [browser, phone])
      expect((await client.post('/api/me/push-devices', device, {}, role)).status).toBe(201);
  }
  const ways = alertCauses.map((cause) => ({ ...cause, ways: ['app', 'browser-push', 'phone-push', 'e-mail'] }));
  expect((await client.patch('/api/me/alert-settings', { ways }, 'technician')).status).toBe(200);
}

/** Every message that has come, by the name that the outbox has for it, as often as it came. */
const arrived = (): Record<string, string[]> => ({
  'browser-push': push.taken.map(({ notice, browser }) => `${notice.id} ${notice.turn} ${browser}`),
  'phone-push': phones.taken.map(({ data, to }) => `${data.id} ${data.turn} ${/\[(.*)\]/.exec(to)![1]!}`),
  'e-mail': mail.caught.map(({ headers, to }) => {
    const [, id, turn] = /^<(.+)\.(\d+)@/.exec(headers['message-id'] ?? '')!;
    return `${id} ${turn} ${to[0]!.split('@')[0]!}`;
  }),
});

async function untilNothingWaits(): Promise<void> {
  for (let tries = 0; tries < 600; tries += 1) {
    const { outbox } = (await client.get('/api/status', 'manager')).body as StatusDto;
    if (outbox.waiting === 0) return;
    await pause(50);
  }
  throw new Error(`The outbox is not empty after 30 s:\n${server.output()}`);
}

/**
 * Until the server has looked at whatever fell due: a person who says that the current is off before it has needs no alert
 * that it ended, and gets none.
 */
async function untilNothingIsDue(dataDir: string): Promise<void> {
  for (let tries = 0; tries < 1200; tries += 1) {
    if (dueIn(dataDir, server.now()) === 0) return;
    await pause(50);
  }
  throw new Error(`Charges are due and not looked at for 60 s:\n${server.output()}`);
}

/** Kills the server at a moment from now on; the kind of moment goes round. */
function plotKill(during: 'acts' | 'time'): void {
  const service = (['push', 'phones', 'mail'] as const)[Math.floor(random() * 3)]!;
  if (random() < 0.35) killAtMessageTo = service;
  else {
    kills[during === 'acts' ? 'during acts' : 'while time goes on'] += 1;
    if (during === 'acts') client.strikeNextWrite(() => server.kill());
    else setTimeout(() => server.kill(), random() * 200);
  }
}

async function work(lanes: Lane[], dataDir: string, idleId: string): Promise<void> {
  let rounds = 0;
  let nextKill = 4;
  let bells = 0;
  const killed = () => server.kills();
  while (transitionsIn(dataDir) < transitionsWanted || killed() < killsWanted) {
    rounds += 1;
    if (rounds > 2000) throw new Error('It gets nowhere.');
    const due = rounds >= nextKill && killAtMessageTo === null && killed() < killsWanted;
    if (due) nextKill = rounds + 3 + Math.floor(random() * 7);
    const timeGoesOn = random() < 0.5;
    if (due && !timeGoesOn) plotKill('acts');
    const acted = await Promise.all(lanes.map((lane) => lane.act()));
    if (acted.some(Boolean) && !timeGoesOn) continue;
    const instants = (await Promise.all(lanes.map((lane) => lane.nextAt()))).filter((at) => at !== null);
    const next = Math.min(...instants, server.now() + (10 + 35 * random()) * minute);
    if (due && timeGoesOn) plotKill('time');
    server.advance(next + 1000 - server.now());
    // The sleeper hears of a write that time has passed; else it looks every half minute.
    const bell = { code: 'isolation', answer: 'yes' };
    await client.post(`/api/charges/${idleId}/checks`, bell, { key: `kill-test-bell-${(bells += 1)}` });
    await untilNothingIsDue(dataDir);
    await untilNothingWaits();
  }
}

test(`killed ${killsWanted} times during ${transitionsWanted} transitions of charges, the server loses none, doubles none, and every alert arrives once by its id`, async () => {
  const dataDir = path.join(folder, 'data');
  const shop = await furnish(dataDir);
  server = await startMortal(bundle, dataDir, shop.now + minute, {
    BIDEWELL_LOCAL_PUSH: 'on',
    BIDEWELL_SMTP_URL: mail.url,
    BIDEWELL_MAIL_FROM: 'Bidewell <alerts@bench.example.com>',
    EXPO_BASE_URL: phones.url,
    NODE_EXTRA_CA_CERTS: certificate,
  });
  client = makeClient(server, dataDir, random);
  await equipPeople();
  const parts = { client, meterId: shop.meterId, random, now: () => server.now(), takeSpare: () => shop.spares.pop()! };
  const { A1, B1, C1 } = shop.channels;
  const lanes = [
    makeLane({ ...parts, channelId: A1!, finish: 'over-and-settle' }),
    makeLane({ ...parts, channelId: B1!, finish: 'on-the-mark' }),
    makeLane({ ...parts, channelId: C1!, finish: 'over-and-settle' }),
  ];
  const begunAt = Date.now();
  await work(lanes, dataDir, shop.idleId);
  killAtMessageTo = null;
  await untilNothingWaits();
  expect(await server.stop()).toBe(0);

  const seconds = Math.round((Date.now() - begunAt) / 1000);
  const books = readBooks(dataDir);
  const lives = lanes.flatMap((lane) => lane.lives);

  // No act was lost or done twice: the history of each charge is what its person was told is done, in that order.
  expect(books.charges.size).toBe(lives.length + 1);
  for (const { id, did } of lives) {
    const { history, stretches, checks, alerts } = books.charges.get(id)!;
    const times = (kind: string): number => history.filter((line) => line.kind === kind).length;
    expect(history.filter(({ by }) => by !== null).map(({ kind }) => kind)).toEqual(did);
    expect(impossibleIn(history)).toEqual([]);
    expect(stretches).toBe(times('started') + times('resumed'));
    expect(checks).toBe(times('ready'));
    // What the clock has brought was told once.
    expect(alerts.filter((kind) => kind === 'charge-done')).toHaveLength(times('resting'));
    expect(alerts.filter((kind) => kind === 'check-due')).toHaveLength(times('check-due'));
  }
  expect(books.doubledCauses).toEqual([]);
  expect(books.damage).toEqual([]);

  // Every message of the outbox is at its service, by its id once; what is there more often is no more than the kills.
  expect(books.entries.filter(({ state }) => state !== 'sent' && state !== 'dropped')).toEqual([]);
  // What did not go out was settled before: nothing else keeps a message in the house.
  const dropped = books.entries.filter(({ state }) => state === 'dropped');
  expect(dropped.filter(({ reason, alertCleared }) => reason !== 'Its cause is gone.' || !alertCleared)).toEqual([]);
  const written = new Set(books.entries.map(({ name }) => name.split(' ')[0]!));
  expect(books.alertIds.filter((id) => !written.has(id))).toEqual([]);
  const doubled: Record<string, number> = {};
  for (const [way, names] of Object.entries(arrived())) {
    const own = books.entries.filter((entry) => entry.way === way);
    const there = new Set(names);
    const missing = own.filter(({ name, state }) => state === 'sent' && !there.has(name));
    expect(missing, `missing by ${way}`).toEqual([]);
    const known = new Set(own.map(({ name }) => name));
    expect(
      [...there].filter((name) => !known.has(name)),
      `of nobody by ${way}`,
    ).toEqual([]);
    doubled[way] = names.length - there.size;
    expect(doubled[way], `more than once by ${way}`).toBeLessThanOrEqual(server.kills());
  }
  const ids = new Set(Object.values(arrived()).flatMap((names) => names.map((name) => name.split(' ')[0]!)));
  console.info(
    JSON.stringify({
      ...{ seconds, transitions: transitionsIn(dataDir), charges: lives.length, kills, ...client.unanswered },
      ...{
        alerts: books.alertIds.length,
        arrivedIds: ids.size,
        messages: books.entries.length,
        dropped: dropped.length,
        doubled,
      },
    }),
  );
}, 400_000);
