/** The demo has mailboxes, browsers and phones of its own: what it sends is to be seen there, and nothing leaves the machine. */
import dns from 'node:dns';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import request from 'supertest';
import { DateTime } from 'luxon';
import { afterAll, afterEach, beforeAll, describe, expect, test, vi } from 'vitest';
import { OutboxEntry } from '@/server/entities/outbox-entry';
import { makeLog } from '@/server/middleware/request-log';
import { demoZone } from '@/server/demo/hours';
import { startServer, type RunningServer } from '@/server/start-server';
import type { AlertDto } from '@/shared/contract/alert';
import type { AlertSettingsDto, PushKeyDto } from '@/shared/contract/alert-settings';
import type { BoardDto } from '@/shared/contract/board';
import type { ChargerDto } from '@/shared/contract/equipment';
import type { MailboxDto, MailboxEntryDto } from '@/shared/contract/mailbox';
import type { Role } from '@/shared/contract/roles';
import { cookiesOf } from '@/tests/support/cookies';
import { testConfig } from '@/tests/support/server';

const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-outside-'));
/** Every host that a connection was made to, or a name was looked up of. */
const hosts = new Set<string>();
let server: RunningServer;

const start = () =>
  startServer(
    {
      ...testConfig,
      dataDir: folder,
      demo: true,
      // Settings of a real workshop: the demo heeds none of them.
      mail: { url: 'smtp://mail.example.com:587', from: 'Bidewell <alerts@example.com>' },
      expoToken: 'a-token',
    },
    makeLog('silent'),
  );

beforeAll(async () => {
  const connect = net.Socket.prototype.connect;
  vi.spyOn(net.Socket.prototype, 'connect').mockImplementation(function (this: net.Socket, ...given: unknown[]) {
    const [first] = given.flat() as { host?: string; path?: string; port?: number }[];
    if (typeof first === 'object' && first !== null && first.path === undefined) hosts.add(first.host ?? 'localhost');
    return (connect as (...all: unknown[]) => net.Socket).apply(this, given);
  });
  const lookup = dns.lookup;
  vi.spyOn(dns, 'lookup').mockImplementation(((name: string, ...rest: unknown[]) => {
    hosts.add(name);
    return (lookup as (...all: unknown[]) => void)(name, ...rest);
  }) as typeof dns.lookup);
  server = await start();
});
afterAll(async () => {
  await server.stop();
  vi.restoreAllMocks();
  fs.rmSync(folder, { recursive: true, force: true });
});

async function as(role: Role) {
  const answer = await request(server.address).post('/api/demo/sign-in').send({ role }).expect(200);
  const cookie = Object.entries(cookiesOf(answer))
    .map(([name, { value }]) => `${name}=${value}`)
    .join('; ');
  return {
    get: async <Dto>(address: string) =>
      (await request(server.address).get(`/api${address}`).set('Cookie', cookie).expect(200)).body as Dto,
    delete: (address: string) => request(server.address).delete(`/api${address}`).set('Cookie', cookie),
    post: (address: string, body: object = {}) =>
      request(server.address).post(`/api${address}`).set('Cookie', cookie).send(body),
  };
}
type Person = Awaited<ReturnType<typeof as>>;

const entriesOf = async (person: Person, alertId: string): Promise<MailboxEntryDto[]> =>
  (await person.get<MailboxDto>('/demo/mailbox')).entries.filter((one) => one.alertId === alertId);

/** A browser and a phone of whoever it is, at the services of the demo. */
async function withDevices(person: Person): Promise<void> {
  const { demo } = await person.get<PushKeyDto>('/push-key');
  await person.post('/me/push-devices', { kind: 'browser', ...demo }).expect(201);
  expect((await person.post('/demo/phone').expect(200)).body).toMatchObject({ hasPhone: true });
  // The phone is beside the browser that asked for it: stopping pushes here leaves it alone.
  const { devices } = await person.get<AlertSettingsDto>('/me/alert-settings');
  expect(devices.map(({ kind, here }) => [kind, here])).toEqual(
    expect.arrayContaining([
      ['browser', true],
      ['phone', false],
    ]),
  );
  expect(devices.find(({ kind }) => kind === 'phone')?.name).toBe('Phone of the demo');
}

/** The alarm of the channel that fails under a running charge of the technician; it works again from then on. */
async function alarm(technician: Person): Promise<AlertDto> {
  const me = await technician.get<{ person: { id: string } }>('/session');
  const { charges } = await technician.get<BoardDto>('/board');
  const mine = charges.find(
    ({ stage, person, channelNames }) =>
      (stage === 'charging' || stage === 'tapering') && person?.id === me.person.id && channelNames.length > 0,
  );
  const chargers = await technician.get<ChargerDto[]>('/chargers');
  const channel = chargers.flatMap(({ channels }) => channels).find(({ name }) => name === mine?.channelNames[0]);
  await technician.post(`/channels/${channel?.id}/fault`, { seen: 'Smoke' }).expect(200);
  const alerts = await technician.get<AlertDto[]>('/alerts');
  const open = alerts.find((one) => one.kind === 'channel-fault' && one.clearedAt === null);
  expect(open).toMatchObject({ level: 'alarm', chargeId: mine?.id, for: { id: me.person.id } });
  return open!;
}
/** So that the next test finds a sound channel; the alert is over. */
async function mended(): Promise<void> {
  const foreman = await as('foreman');
  const chargers = await foreman.get<ChargerDto[]>('/chargers');
  for (const { id, fault } of chargers.flatMap(({ channels }) => channels))
    if (fault !== null) await foreman.post(`/channels/${id}/works`).expect(200);
}
afterEach(mended);

/** Of the week before last there is none, and that of the last one is written on Monday at 07:00. */
const inDemo = DateTime.now().setZone(demoZone());
const beforeLetter = inDemo.weekday === 1 && inDemo.hour < 8;

describe('what the demo sends', () => {
  test.skipIf(beforeLetter)('the weekly letter comes to its manager, with its three facts as HTML', async () => {
    const manager = await as('manager');
    const { entries } = await vi.waitFor(
      async () => {
        const mailbox = await manager.get<MailboxDto>('/demo/mailbox');
        expect(mailbox.entries.some(({ title }) => title.startsWith('Waits of '))).toBe(true);
        return mailbox;
      },
      { timeout: 20_000, interval: 100 },
    );
    const letters = entries.filter(({ title }) => title.startsWith('Waits of '));
    expect(letters).toHaveLength(1);
    expect(letters[0]).toMatchObject({ way: 'e-mail', alertId: null, again: false });
    expect(letters[0]!.html!.match(/<li>/g)).toHaveLength(3);
    expect(letters[0]!.html).toMatch(/No more of these letters|switched off/);
  });

  test('an alarm comes as a letter, to the browser and to the phone of whoever has it, each with its id, and nothing leaves the machine', async () => {
    const technician = await as('technician');
    await withDevices(technician);
    hosts.clear();
    const alert = await alarm(technician);
    await vi.waitFor(
      async () => {
        const ways = (await entriesOf(technician, alert.id)).filter(({ to }) => to.name === alert.for?.name);
        expect(ways.map(({ way }) => way).sort()).toEqual(['browser-push', 'e-mail', 'phone-push']);
      },
      { timeout: 20_000, interval: 100 },
    );
    const letter = (await entriesOf(technician, alert.id)).find(({ way }) => way === 'e-mail')!;
    expect(letter.title).toBe(`Channel out of order: ${alert.title}`);
    expect(letter.text).toContain(alert.seen);
    expect(letter.html).toContain('<h1');
    expect(letter.again).toBe(false);
    expect([...hosts].filter((host) => !['127.0.0.1', '::1', 'localhost'].includes(host))).toEqual([]);
    expect(hosts.size).toBeGreaterThan(0);
  });

  test('even a push to an address of a real service ends here, and one that was sent twice is marked', async () => {
    const technician = await as('technician');
    const { devices } = await technician.get<AlertSettingsDto>('/me/alert-settings');
    for (const { id } of devices) await technician.delete(`/me/push-devices/${id}`).expect(204);
    const { demo } = await technician.get<PushKeyDto>('/push-key');
    hosts.clear();
    const real = { kind: 'browser', endpoint: 'https://push.example.com/somebody', keys: demo!.keys };
    await technician.post('/me/push-devices', real).expect(201);
    const alert = await alarm(technician);
    await vi.waitFor(async () => expect((await entriesOf(technician, alert.id)).length).toBeGreaterThan(0), {
      timeout: 20_000,
    });
    const rows = server.deps.dataSource.getRepository(OutboxEntry);
    // It was sent, and the stand-in could not open what was sealed for another one's browser.
    await vi.waitFor(
      async () => {
        const [push] = await rows.findBy({ alertId: alert.id, way: 'browser-push' });
        expect(push).toMatchObject({ state: 'dead', reason: expect.stringContaining('400') });
      },
      { timeout: 20_000, interval: 100 },
    );
    const [entry] = await rows.findBy({ alertId: alert.id, way: 'e-mail', state: 'sent' });
    // As after a kill between sending and marking.
    await rows.update(entry!.id, { state: 'waiting', reached: [], endedAt: null, dueAt: Date.now() });
    server.deps.outbox.poke();
    await vi.waitFor(
      async () => {
        const letters = (await entriesOf(technician, alert.id)).filter(({ way }) => way === 'e-mail');
        expect(letters.filter(({ again }) => again)).toHaveLength(1);
        // Newest first.
        expect(letters[0]?.again).toBe(true);
      },
      { timeout: 20_000, interval: 100 },
    );
    expect([...hosts].filter((host) => !['127.0.0.1', '::1', 'localhost'].includes(host))).toEqual([]);
  });

  test('a browser that has subscribed before a restart still gets its pushes', async () => {
    const technician = await as('technician');
    const before = (await technician.get<PushKeyDto>('/push-key')).demo;
    await technician.post('/me/push-devices', { kind: 'browser', ...before }).expect(201);
    await server.stop();
    server = await start();
    expect((await technician.get<PushKeyDto>('/push-key')).demo).toEqual(before);
    const alert = await alarm(technician);
    await vi.waitFor(
      async () => {
        const pushes = (await entriesOf(technician, alert.id)).filter(({ way }) => way === 'browser-push');
        expect(pushes.some(({ to }) => to.address === before?.endpoint)).toBe(true);
      },
      { timeout: 20_000 },
    );
  });

  test('of a real workshop there is no mailbox, signed in or not, and its browsers ask their maker’s service', async () => {
    const own = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-real-'));
    const real = await startServer({ ...testConfig, dataDir: own, demo: false }, makeLog('silent'));
    const created = await request(real.address)
      .post('/api/workshops')
      .send({
        ...{ workshopName: 'Quay Street Cells', zone: 'Europe/Lisbon', name: 'Alva Reis' },
        ...{ email: 'alva@example.com', password: 'seven lamps over the slipway' },
      });
    const cookie = Object.entries(cookiesOf(created))
      .map(([name, { value }]) => `${name}=${value}`)
      .join('; ');
    const get = (address: string) => request(real.address).get(address).set('Cookie', cookie);
    await request(real.address).get('/api/demo/mailbox').expect(404);
    await get('/api/demo/mailbox').expect(404);
    await request(real.address).post('/api/demo/phone').set('Cookie', cookie).send({}).expect(404);
    expect((await get('/api/push-key').expect(200)).body).toMatchObject({ demo: null });
    await real.stop();
    fs.rmSync(own, { recursive: true, force: true });
  });
});
