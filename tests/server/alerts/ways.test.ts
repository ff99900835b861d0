import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { loadPushKeys, pushSubject } from '@/server/alerts/vapid';
import type { Message } from '@/server/alerts/message';
import { letterOf } from '@/server/alerts/ways/letter';
import { isPublicAddress, isPushEndpoint, publicOnlyAgent } from '@/server/alerts/ways/public-address';
import { pushKeyFile } from '@/server/data-files';
import { PushDevice } from '@/server/entities/push-device';
import type { AlertSettingsDto, UndeliveredDto } from '@/shared/contract/alert-settings';
import { opened } from '@/server/demo/outside/push-service';
import { unregistered } from '@/server/demo/outside/phone-service';
import crypto from 'node:crypto';
import https from 'node:https';
import { hour, minute } from '../charges/bench';
import { checkDue, makePost, site, withBrowser, withPhone, wish, type Post } from './post';

let post: Post;
beforeEach(async () => {
  post = await makePost();
});
afterEach(() => post.close());

const devices = () => post.bench.server.deps.dataSource.manager.find(PushDevice);
const undelivered = async (): Promise<UndeliveredDto[]> =>
  (await post.bench.as('manager').get('/api/alerts/undelivered').expect(200)).body as UndeliveredDto[];

describe('a push to a browser', () => {
  test('the example of RFC 8291, section 5, opens as it says: the service of the tests opens what browsers open', () => {
    const ecdh = crypto.createECDH('prime256v1');
    ecdh.setPrivateKey(Buffer.from('q1dXpw3UpT5VOmu_cf_v6ih07Aems3njxI-JWgLcM94', 'base64url'));
    const body = Buffer.from(
      'DGv6ra1nlYgDCS1FRnbzlwAAEABBBP4z9KsN6nGRTbVYI_c7VJSPQTBtkgcy27mlmlMoZIIgDll6e3vCYLocInmYWAmS6TlzAC8wEqKK6PBru3jl7A_yl95bQpu6cVPTpK4Mqgkf1CXztLVBSt2Ks3oZwbuwXPXLWyouBWLVWGNWQexSgSxsj_Qulcy4a-fN',
      'base64url',
    );
    const auth = Buffer.from('BTBZMqHH6r4Tts7J_aSIgg', 'base64url');
    expect(opened(body, { ecdh, auth })).toBe('When I grow up, I want to be a watermelon');
  });

  test('is signed by this server, has the alert as its topic, and says what was seen and where it leads', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    await post.dispatcher.runDue();
    const [push] = post.push.taken;
    expect(push).toMatchObject({
      sender: post.ways.pushKey,
      subject: site,
      headers: { topic: alert.id.replaceAll('-', ''), urgency: 'high' },
      notice: {
        title: 'Check due: R-2409 at A1',
        url: `/charges/${alert.chargeId}`,
        tag: alert.id,
        id: alert.id,
        turn: 0,
      },
    });
    expect(push!.notice.body).toMatch(/^Rested 1\u00a0h\u00a000\. Check first: each group with the meter/);
    expect(push!.headers.topic).toMatch(/^[\w-]{1,32}$/);
    expect(push!.headers.ttl).toBe(12 * 3600);
  });

  test('whose subscription has ended is the last: the device is forgotten, and the manager sees the alert', async () => {
    await withBrowser(post, 'technician');
    await checkDue(post);
    post.push.ended.add('technician');
    await post.dispatcher.runDue();
    expect(await devices()).toEqual([]);
    expect(await undelivered()).toMatchObject([{ reason: 'The push service said 410.', tries: 1 }]);
    const { body } = await post.bench.as('technician').get('/api/me/alert-settings');
    expect((body as AlertSettingsDto).devices).toEqual([]);
  });

  test('a browser that signs in as somebody else is theirs alone', async () => {
    const { endpoint, keys } = post.push.subscribe('shared');
    for (const role of ['technician', 'foreman'] as const)
      await post.bench.as(role).post('/api/me/push-devices', { kind: 'browser', endpoint, keys }).expect(201);
    expect((await devices()).map(({ personId }) => personId)).toEqual(['own-foreman']);
  });
});

describe('addresses that a browser may name', () => {
  test.each([
    'https://127.0.0.1/push',
    'https://10.0.0.7/push',
    'https://[::1]/push',
    'https://[::ffff:192.168.1.1]/push',
    'https://169.254.169.254/latest',
    'https://push.example.com:8443/x',
    'https://localhost/x',
    'https://printer.local/x',
    'http://push.example.com/x',
  ])('%s is none of them', (endpoint) => expect(isPushEndpoint(endpoint)).toBe(false));

  test('a name of the internet is one, and so is a public address', () => {
    expect(isPushEndpoint('https://push.example.com/v1/abc')).toBe(true);
    expect(isPushEndpoint('https://93.184.216.34/v1/abc')).toBe(true);
    expect(isPublicAddress('2606:2800:220:1:248:1893:25c8:1946')).toBe(true);
  });

  test('a name that leads to this machine is not connected to', async () => {
    const agent = publicOnlyAgent();
    const failed = await new Promise<Error>((resolve) => {
      https.get('https://localhost:9/x', { agent }).on('error', resolve);
    });
    agent.destroy();
    expect(failed.message).toBe('localhost leads to no public address.');
  });

  test('the server that is not set up for a local service refuses one with a sentence', async () => {
    const strict = await makePost({ config: { localPush: false } });
    try {
      const { endpoint, keys } = strict.push.subscribe('x');
      const answer = await strict.bench
        .as('technician')
        .post('/api/me/push-devices', { kind: 'browser', endpoint, keys });
      expect(answer.status).toBe(400);
      expect(answer.body.fields.endpoint).toBe('This is no address of a push service on the internet.');
    } finally {
      await strict.close();
    }
  });
});

describe('a push to a phone', () => {
  test('carries the id of the alert, and its receipt is read 15 min later, once', async () => {
    await withPhone(post, 'technician');
    const { alert } = await checkDue(post);
    await post.dispatcher.runDue();
    expect(post.phones.taken).toMatchObject([
      {
        to: 'ExponentPushToken[technician]',
        title: 'Check due: R-2409 at A1',
        data: { id: alert.id, turn: 0, url: `/charges/${alert.chargeId}` },
        priority: 'high',
        collapseId: alert.id,
      },
    ]);
    const asked = () => post.phones.asked.flat().filter((id) => id === post.phones.tickets.at(-1)).length;
    post.bench.server.clock.advance(14 * minute);
    await post.dispatcher.runDue();
    expect(asked()).toBe(0);
    post.bench.server.clock.advance(minute);
    await post.dispatcher.runDue();
    expect(asked()).toBe(1);
    post.bench.server.clock.advance(hour);
    await post.dispatcher.runDue();
    expect(asked()).toBe(1);
  });

  test('whose receipt says that the phone is gone: its token is dropped, and the manager sees the alert', async () => {
    await withPhone(post, 'technician');
    const { alert } = await checkDue(post);
    await post.dispatcher.runDue();
    post.phones.receipts.set(post.phones.tickets.at(-1)!, unregistered);
    post.bench.server.clock.advance(15 * minute);
    await post.dispatcher.runDue();
    expect(await devices()).toEqual([]);
    expect(await undelivered()).toMatchObject([
      { alert: { id: alert.id }, way: 'phone-push', reason: unregistered.message },
    ]);
  });

  test('that is refused with its ticket: the token is dropped at once', async () => {
    await withPhone(post, 'technician');
    post.phones.unknown.add('ExponentPushToken[technician]');
    await checkDue(post);
    await post.dispatcher.runDue();
    expect(await devices()).toEqual([]);
    expect(post.phones.taken).toEqual([]);
  });

  test('whose receipt says that the phone’s service was too busy is sent again', async () => {
    await withPhone(post, 'technician');
    const { alert } = await checkDue(post);
    await post.dispatcher.runDue();
    post.phones.receipts.set(post.phones.tickets.at(-1)!, {
      ...{ status: 'error', message: 'Too many.', details: { error: 'MessageRateExceeded' } },
    });
    post.bench.server.clock.advance(15 * minute);
    await post.dispatcher.runDue();
    post.bench.server.clock.advance(minute);
    await post.dispatcher.runDue();
    expect(post.phones.taken.filter(({ data }) => data.id === alert.id)).toHaveLength(2);
  });

  test('is tried again where the service does not answer; receipts that are not there yet are asked for again', async () => {
    await withPhone(post, 'technician');
    const { alert } = await checkDue(post);
    post.phones.statuses.push(503);
    await post.dispatcher.runDue();
    expect(post.phones.taken).toEqual([]);
    post.bench.server.clock.advance(10_000);
    await post.dispatcher.runDue();
    expect(post.phones.taken.map(({ data }) => data.id)).toEqual([alert.id]);
    const ticket = post.phones.tickets.at(-1)!;
    post.phones.receipts.set(ticket, null);
    for (let quarter = 0; quarter < 3; quarter += 1) {
      post.bench.server.clock.advance(15 * minute);
      await post.dispatcher.runDue();
    }
    expect(post.phones.asked.flat().filter((id) => id === ticket)).toHaveLength(3);
  });
});

describe('a letter', () => {
  const byMail = () => wish(post, 'technician', { ways: [{ kind: 'check-due', level: 'amber', ways: ['e-mail'] }] });

  test('has the same words as text and as HTML, the workshop’s clock, a link, and an id that stays', async () => {
    await byMail();
    const { alert } = await checkDue(post);
    await post.dispatcher.runDue();
    const [letter] = post.mail.caught;
    expect(letter).toMatchObject({ to: ['technician@own.example.com'], from: 'alerts@bench.example.com' });
    expect(letter!.headers).toMatchObject({
      subject: 'Check due: R-2409 at A1',
      'message-id': `<${alert.id}.0@bench.example.com>`,
      'auto-submitted': 'auto-generated',
    });
    const raised = new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Berlin', timeStyle: 'short' }).format(
      Date.parse(alert.raisedAt),
    );
    for (const type of ['text/plain', 'text/html']) {
      const words = letter!.parts[type]!.replaceAll('&nbsp;', '\u00a0');
      expect(words).toContain('Rested 1\u00a0h\u00a000.');
      expect(words).toContain('Each group with the meter');
      expect(words).toContain(`Raised at ${raised}.`);
      expect(words).toContain(`${site}/charges/${alert.chargeId}`);
    }
  });

  test('that the mailbox refuses for good is given up at once, one that it puts off is tried again', async () => {
    await byMail();
    post.mail.refuse.push(451, 550);
    await checkDue(post);
    await post.dispatcher.runDue();
    expect(await undelivered()).toEqual([]);
    post.bench.server.clock.advance(minute);
    await post.dispatcher.runDue();
    expect(await undelivered()).toMatchObject([{ way: 'e-mail', tries: 2, reason: expect.stringMatching(/550/) }]);
  });

  test('is not sent where no mail server is set, and the settings say so', async () => {
    const without = await makePost({ mail: false });
    try {
      const { body } = await without.bench.as('technician').get('/api/me/alert-settings').expect(200);
      expect(body).toMatchObject({ eMail: { address: 'technician@own.example.com', on: false } });
      await wish(without, 'technician', { ways: [{ kind: 'check-due', level: 'amber', ways: ['e-mail'] }] });
      const { alert } = await checkDue(without);
      await without.dispatcher.runDue();
      const rows = (await without.entries()).filter((entry) => entry.alertId === alert.id);
      expect(rows.map(({ state, reason }) => [state, reason])).toEqual([['dropped', 'This server sends no e-mail.']]);
    } finally {
      await without.close();
    }
  });

  test('says what marks mean: a title with < and & does not become HTML, and without an address there is no link', () => {
    const message: Message = {
      ...{ alertId: 'a', turn: 0, level: 'alarm', name: 'Overdue', title: '<b>R&D</b>', seen: 'It’s late.' },
      ...{ checkFirst: '', late: '', path: '/charges/c', raised: 'Raised at 13:42.', workshop: 'Quay' },
    };
    const letter = letterOf(message, null);
    expect(letter.html).not.toContain('<b>');
    expect(letter.html).toContain('&#60;b&#62;R&#38;D');
    expect(letter.text).toContain('<b>R&D</b>');
    expect(`${letter.html}${letter.text}`).not.toContain('http');
  });
});

describe('the keys of this server', () => {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-keys-'));
  beforeAll(() => fs.mkdirSync(folder, { recursive: true }));
  afterAll(() => fs.rmSync(folder, { recursive: true, force: true }));

  test('are made with the first start, only their owner reads them, and they stay', () => {
    const first = loadPushKeys(folder);
    expect((fs.statSync(pushKeyFile(folder)).mode & 0o777).toString(8)).toBe('600');
    expect(Buffer.from(first.publicKey, 'base64url')).toHaveLength(65);
    expect(loadPushKeys(folder)).toEqual(first);
  });

  test('that are damaged stop the start with a sentence', () => {
    fs.writeFileSync(pushKeyFile(folder), '{"publicKey":"x"}');
    expect(() => loadPushKeys(folder)).toThrow(/push\.key is damaged\. Put it back from a backup/);
  });

  test('name whom a push service can ask: the address that people open, else the sender of letters', () => {
    expect(pushSubject('https://bench.example.com', null)).toBe('https://bench.example.com');
    expect(pushSubject('http://bench.local', 'Bidewell <alerts@bench.example.com>')).toBe(
      'mailto:alerts@bench.example.com',
    );
  });

  test('are told to who asks, the public one', async () => {
    const { body } = await post.bench.as('technician').get('/api/push-key').expect(200);
    expect(body).toEqual({ key: post.ways.pushKey, demo: null });
  });
});
