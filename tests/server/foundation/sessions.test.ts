import { createHmac, generateKeyPairSync } from 'node:crypto';
import jwt from 'jsonwebtoken';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Session } from '@/server/entities/session';
import { Person } from '@/server/entities/person';
import { cookiesOf, Jar } from '@/tests/support/cookies';
import { makeAgent, makeTestServer, testPassword, type TestAgent, type TestServer } from '@/tests/support/server';

let server: TestServer;
let jar: Jar;
let browser: TestAgent;
const minute = 60_000;
const day = 24 * 60 * minute;

beforeEach(async () => {
  server = await makeTestServer();
  jar = new Jar();
  browser = makeAgent(server.app, () => jar.header());
});
afterEach(() => server.close());

const email = () => server.own.people.technician.email;
const signIn = async (password = testPassword, address = email()) =>
  jar.take(await browser.post('/api/session', { email: address, password }));
const refresh = async () => jar.take(await browser.post('/api/session/refresh'));
const sessionStatus = async () => (await browser.get('/api/session')).status;

describe('signing in', () => {
  it('gives the session and puts the tokens into cookies that scripts cannot read', async () => {
    const answer = await signIn();
    expect(answer.status).toBe(200);
    expect(answer.body).toEqual({
      person: { id: 'own-technician', name: 'Technician of own', email: email(), role: 'technician' },
      workshop: { id: 'workshop-own', name: 'The own workshop', zone: 'Europe/Berlin' },
      capabilities: expect.arrayContaining(['board:read', 'charge:run']),
      expiresAt: new Date(server.clock.now() + 30 * day).toISOString(),
    });
    const cookies = cookiesOf(answer);
    expect(Object.keys(cookies).sort()).toEqual(['bidewell_access', 'bidewell_device', 'bidewell_refresh']);
    for (const { attributes } of Object.values(cookies)) {
      expect(attributes).toEqual(expect.arrayContaining(['HttpOnly', 'SameSite=Strict', 'Path=/']));
      expect(attributes).not.toContain('Secure');
    }
    expect(cookies.bidewell_access?.attributes).toContain('Max-Age=600');
    expect(cookies.bidewell_refresh?.attributes).toContain(`Max-Age=${30 * 24 * 3600}`);
    expect(await sessionStatus()).toBe(200);
  });

  it('over https behind a proxy marks the cookies Secure and binds them to this host', async () => {
    await server.close();
    server = await makeTestServer({ config: { proxyHops: 1 } });
    const answer = await server.anyone
      .post('/api/session', { email: email(), password: testPassword })
      .set('X-Forwarded-Proto', 'https');
    const cookies = cookiesOf(answer);
    expect(Object.keys(cookies).sort()).toEqual([
      '__Host-bidewell_access',
      '__Host-bidewell_device',
      '__Host-bidewell_refresh',
    ]);
    for (const { attributes } of Object.values(cookies)) {
      expect(attributes).toEqual(expect.arrayContaining(['Secure', 'HttpOnly', 'SameSite=Strict', 'Path=/']));
      expect(attributes.some((attribute) => attribute.startsWith('Domain'))).toBe(false);
    }
  });

  it('takes an address in any case and with spaces around it', async () => {
    expect((await signIn(testPassword, `  ${email().toUpperCase()} `)).status).toBe(200);
  });

  it('answers a wrong password and an unknown address alike, after the same work', async () => {
    const wrong = await browser.post('/api/session', { email: email(), password: 'not it at all' });
    const compared = server.passwords.compared;
    const unknown = await browser.post('/api/session', { email: 'nobody@example.com', password: 'not it at all' });
    expect(wrong.status).toBe(401);
    expect(unknown.status).toBe(401);
    const { requestId: _a, ...wrongBody } = wrong.body;
    const { requestId: _b, ...unknownBody } = unknown.body;
    expect(unknownBody).toEqual(wrongBody);
    expect(server.passwords.compared - compared).toBe(1);
    expect(compared).toBe(1);
    expect(Object.keys(unknown.headers).sort()).toEqual(Object.keys(wrong.headers).sort());
  });

  it('tells a switched-off person so only after the right password', async () => {
    await server.deps.dataSource.manager.update(Person, { id: 'own-technician' }, { disabledAt: 1 });
    expect((await signIn('not it at all')).status).toBe(401);
    const answer = await signIn();
    expect(answer.status).toBe(403);
    expect(answer.headers['set-cookie']).toBeUndefined();
  });

  it('keeps neither password nor token in the database', async () => {
    await signIn();
    const rows = JSON.stringify([
      await server.deps.dataSource.query('SELECT * FROM session'),
      await server.deps.dataSource.query('SELECT * FROM person'),
    ]);
    expect(rows).not.toContain(testPassword);
    expect(rows).not.toContain(jar.get('bidewell_refresh'));
    expect(rows).not.toContain(jar.get('bidewell_refresh')?.split('.')[1]);
  });
});

describe('a forged access token is nobody', () => {
  const now = () => Math.floor(server.clock.now() / 1000);
  const claims = () => ({
    sub: 'own-manager',
    ws: 'workshop-own',
    sid: 'session-own-manager',
    aud: 'bidewell',
    iat: now(),
    nbf: now(),
    exp: now() + 600,
  });
  const key = () => server.deps.secrets.accessKey;
  const header = { alg: 'HS256' as const, typ: 'at+jwt' };
  const sign = (payload: object, options: jwt.SignOptions = {}) =>
    jwt.sign(JSON.parse(JSON.stringify(payload)), key(), { algorithm: 'HS256', header, ...options });
  const part = (value: object) => Buffer.from(JSON.stringify(value)).toString('base64url');

  const forged: [string, () => string][] = [
    ['no signature, alg none', () => `${part({ alg: 'none', typ: 'at+jwt' })}.${part(claims())}.`],
    ['alg None in other letters', () => `${part({ alg: 'NoNe', typ: 'at+jwt' })}.${part(claims())}.`],
    ['another key', () => jwt.sign(claims(), 'x'.repeat(32), { algorithm: 'HS256', header })],
    [
      'an empty key',
      () => {
        const body = `${part(header)}.${part(claims())}`;
        return `${body}.${createHmac('sha256', '').update(body).digest('base64url')}`;
      },
    ],
    [
      'another algorithm with our key',
      () => sign(claims(), { algorithm: 'HS512', header: { alg: 'HS512', typ: 'at+jwt' } }),
    ],
    [
      'an asymmetric algorithm',
      () => {
        const { privateKey } = generateKeyPairSync('rsa', { modulusLength: 2048 });
        return jwt.sign(claims(), privateKey, { algorithm: 'RS256', header: { alg: 'RS256', typ: 'at+jwt' } });
      },
    ],
    ['another type', () => sign(claims(), { header: { alg: 'HS256', typ: 'JWT' } })],
    ['another audience', () => sign({ ...claims(), aud: 'elsewhere' })],
    ['no audience', () => sign({ ...claims(), aud: undefined })],
    ['an end that has passed', () => sign({ ...claims(), exp: now() - 1 })],
    ['no end', () => sign({ ...claims(), exp: undefined })],
    ['a beginning yet to come', () => sign({ ...claims(), nbf: now() + 60 })],
    ['a session of another workshop', () => sign({ ...claims(), ws: 'workshop-other' })],
    ['a session of another person', () => sign({ ...claims(), sub: 'own-technician' })],
    ['a session that is none', () => sign({ ...claims(), sid: 'nothing' })],
    ['claims that are no texts', () => sign({ ...claims(), sid: { $ne: null } })],
    [
      'a changed payload',
      () => {
        const [head, , signature] = sign(claims()).split('.');
        return `${head}.${part({ ...claims(), sub: 'own-foreman', sid: 'session-own-foreman' })}.${signature}`;
      },
    ],
    ['rubbish', () => 'rubbish'],
  ];
  it.each(forged)('%s', async (_name, make) => {
    jar.set('bidewell_access', make());
    expect(await sessionStatus()).toBe(401);
  });

  it('but the genuine one is somebody', async () => {
    jar.set('bidewell_access', sign(claims()));
    expect(await sessionStatus()).toBe(200);
  });

  it('and a refresh token is no access token', async () => {
    await signIn();
    jar.set('bidewell_access', jar.get('bidewell_refresh') ?? '');
    expect(await sessionStatus()).toBe(401);
  });
});

describe('a session', () => {
  it('needs a refresh after 10 minutes, and lives on with it', async () => {
    await signIn();
    server.clock.advance(10 * minute - 1000);
    expect(await sessionStatus()).toBe(200);
    server.clock.advance(2000);
    expect(await sessionStatus()).toBe(401);
    const answer = await refresh();
    expect(answer.status).toBe(200);
    expect(answer.body.person.id).toBe('own-technician');
    expect(await sessionStatus()).toBe(200);
  });

  it('gives a new refresh token each time, and the same one to a retry within 20 s', async () => {
    await signIn();
    const first = jar.get('bidewell_refresh');
    await refresh();
    const second = jar.get('bidewell_refresh');
    expect(second).not.toBe(first);
    jar.set('bidewell_refresh', first ?? '');
    server.clock.advance(19_000);
    expect((await refresh()).status).toBe(200);
    expect(jar.get('bidewell_refresh')).toBe(second);
  });

  it.each(['SQLITE_BUSY', 'SQLITE_BUSY_SNAPSHOT', 'SQLITE_IOERR_WRITE'])(
    'outlives a database that cannot be written for a moment (%s): 503, and the cookies stay',
    async (code) => {
      await signIn();
      const token = jar.get('bidewell_refresh');
      vi.spyOn(server.deps.dataSource, 'transaction').mockRejectedValueOnce(
        Object.assign(new Error('locked'), { code }),
      );
      const busy = await refresh();
      expect([busy.status, busy.body.code]).toEqual([503, 'database_busy']);
      expect(busy.headers['retry-after']).toBe('2');
      expect(jar.get('bidewell_refresh')).toBe(token);
      expect((await refresh()).status).toBe(200);
    },
  );

  it('survives two tabs that refresh at the same moment, with one successor for both', async () => {
    await signIn();
    const [one, two] = await Promise.all([browser.post('/api/session/refresh'), browser.post('/api/session/refresh')]);
    expect([one.status, two.status]).toEqual([200, 200]);
    expect(cookiesOf(one).bidewell_refresh?.value).toBe(cookiesOf(two).bidewell_refresh?.value);
    jar.take(two);
    expect((await refresh()).status).toBe(200);
  });

  it('ends for thief and owner alike when a replaced token is used after 20 s', async () => {
    await signIn();
    const stolen = jar.get('bidewell_refresh') ?? '';
    await refresh();
    const owners = jar.get('bidewell_refresh') ?? '';
    server.clock.advance(21_000);
    jar.set('bidewell_refresh', stolen);
    const theft = await refresh();
    expect(theft.status).toBe(401);
    expect(jar.get('bidewell_access')).toBeUndefined();
    jar.set('bidewell_refresh', owners);
    expect((await refresh()).status).toBe(401);
    expect(server.hub.of('end')).toContainEqual(expect.objectContaining({ reason: 'revoked' }));
  });

  it('ends as well when the token used is older than the last but one', async () => {
    await signIn();
    const stolen = jar.get('bidewell_refresh') ?? '';
    for (let i = 0; i < 3; i += 1) await refresh();
    const owners = jar.get('bidewell_refresh') ?? '';
    jar.set('bidewell_refresh', stolen);
    expect((await refresh()).status).toBe(401);
    jar.set('bidewell_refresh', owners);
    expect((await refresh()).status).toBe(401);
  });

  it('is not ended by a token that we never made', async () => {
    await signIn();
    const [id] = (jar.get('bidewell_refresh') ?? '').split('.');
    const good = jar.get('bidewell_refresh') ?? '';
    for (const forged of [`${id}.${'A'.repeat(43)}.${'B'.repeat(43)}`, `${id}.`, id ?? '', 'x', '..']) {
      jar.set('bidewell_refresh', forged);
      expect((await browser.post('/api/session/refresh')).status).toBe(401);
    }
    jar.set('bidewell_refresh', good);
    expect((await refresh()).status).toBe(200);
  });

  it('ends 30 days after sign-in, however much it is used, and after 14 days without use', async () => {
    await signIn();
    for (let days = 0; days < 29; days += 1) {
      server.clock.advance(day);
      expect((await refresh()).status).toBe(200);
    }
    server.clock.advance(day + 1);
    expect((await refresh()).status).toBe(401);

    await signIn();
    server.clock.advance(14 * day - 1000);
    expect((await refresh()).status).toBe(200);
    server.clock.advance(14 * day);
    expect((await refresh()).status).toBe(401);
  });

  it('ends at sign-out: neither token is good any more, and its sockets are closed', async () => {
    await signIn();
    const [access, token] = [jar.get('bidewell_access') ?? '', jar.get('bidewell_refresh') ?? ''];
    const out = jar.take(await browser.delete('/api/session'));
    expect(out.status).toBe(204);
    expect(jar.get('bidewell_access')).toBeUndefined();
    expect(jar.get('bidewell_refresh')).toBeUndefined();
    jar.set('bidewell_access', access);
    jar.set('bidewell_refresh', token);
    expect(await sessionStatus()).toBe(401);
    expect((await refresh()).status).toBe(401);
    expect(server.hub.of('end')).toEqual([{ sessionId: expect.any(String), reason: 'sign-out' }]);
  });

  it('is listed with its device; signing out everywhere ends them all', async () => {
    const phone = new Jar();
    const onPhone = makeAgent(server.app, () => phone.header());
    const userAgent =
      'Mozilla/5.0 (Linux; Android 14; Pixel 8) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/126.0 Mobile Safari/537.36';
    phone.take(
      await onPhone.post('/api/session', { email: email(), password: testPassword }).set('User-Agent', userAgent),
    );
    server.clock.advance(1000);
    await signIn();
    const { body } = await browser.get('/api/sessions');
    // The test's own agents have a session too.
    const listed = body.filter((session: { device: string }) => session.device !== 'Test');
    expect(listed).toHaveLength(2);
    expect(listed[0]).toMatchObject({ current: true, device: 'Unknown device' });
    expect(listed[1]).toMatchObject({ current: false, device: 'Chrome on Android' });
    expect((await browser.delete('/api/sessions')).status).toBe(204);
    expect((await onPhone.get('/api/session')).status).toBe(401);
    expect((await onPhone.post('/api/session/refresh')).status).toBe(401);
    const open = await server.deps.dataSource.manager.findBy(Session, { personId: 'own-technician' });
    expect(open.every((session) => session.endedAt !== null)).toBe(true);
    expect(server.hub.of('end')).toEqual([{ personId: 'own-technician', reason: 'sign-out' }]);
  });
});
