import { Writable } from 'node:stream';
import request from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { makeLog } from '@/server/middleware/request-log';
import { Session } from '@/server/entities/session';
import { cookiesOf } from '@/tests/support/cookies';
import { makeTestServer, testPassword, type TestServer } from '@/tests/support/server';

let server: TestServer;
let text: string;
const sink = () =>
  new Writable({
    write(chunk: Buffer, _encoding, done) {
      text += chunk.toString();
      done();
    },
  });
const lines = () =>
  text
    .split('\n')
    .filter(Boolean)
    .map((line) => JSON.parse(line) as Record<string, unknown> & { req?: { id: string; url: string } });

beforeEach(async () => {
  text = '';
  server = await makeTestServer({ deps: { log: makeLog('debug', sink()) } });
});
afterEach(() => server.close());

describe('a proxy in front', () => {
  const forwarded = (app: typeof server.app) => request(app).get('/healthz').set('X-Forwarded-For', '198.51.100.4');
  const warned = () => lines().filter((line) => String(line.msg).includes('BIDEWELL_PROXY_HOPS'));

  it('whose forwarded addresses are not believed is said once, not with every request', async () => {
    await request(server.app).get('/healthz');
    expect(warned()).toEqual([]);
    await forwarded(server.app);
    await forwarded(server.app);
    expect(warned()).toHaveLength(1);
    expect(warned()[0]).toMatchObject({ level: 40 });
  });

  it('that is believed is not spoken of', async () => {
    const behind = await makeTestServer({ config: { proxyHops: 1 }, deps: { log: makeLog('debug', sink()) } });
    await forwarded(behind.app);
    expect(warned()).toEqual([]);
    await behind.close();
  });
});

describe('the log', () => {
  it('holds no password, token, cookie or link, whatever the request', async () => {
    const { email } = server.own.people.technician;
    const signedIn = await server.anyone.post('/api/session', { email, password: testPassword });
    const cookies = Object.values(cookiesOf(signedIn)).map(({ value }) => value);
    const cookie = Object.entries(cookiesOf(signedIn))
      .map(([name, { value }]) => `${name}=${value}`)
      .join('; ');
    await request(server.app).get('/api/session').set({ Cookie: cookie, Authorization: 'Bearer planted-bearer' });
    await server.anyone.post('/api/session', { email, password: 'planted-wrong-password' });
    await request(server.app)
      .post('/api/session')
      .set('Content-Type', 'application/json')
      .send('{"password":"planted-broken');
    const link = await server.agentFor('manager').post('/api/people/own-technician/reset-link');
    const token = new URL(link.body.url).searchParams.get('token') ?? 'none';
    await server.anyone.get(`/api/links/${token}`);
    await server.anyone.get(`/join?token=${token}&code=BCDF-GHJK`);
    const code = await server.anyone.post('/api/wall/codes');
    await server.anyone.post('/api/wall/token', { deviceCode: code.body.deviceCode });
    expect(lines().length).toBeGreaterThan(8);
    for (const secret of [
      testPassword,
      'planted',
      token,
      'BCDF-GHJK',
      code.body.deviceCode,
      ...cookies,
      ...cookies.map((value) => encodeURIComponent(value)),
    ])
      expect(text).not.toContain(secret);
  });

  it('leaves secrets out of objects that are logged, at any of the first four depths', () => {
    const secret = { password: 'planted', token: 'planted', cookie: 'planted', deviceCode: 'planted' };
    server.deps.log.info(secret);
    server.deps.log.info({ a: secret });
    server.deps.log.info({ a: { b: secret } });
    server.deps.log.info({ a: { b: { c: secret } } });
    expect(lines()).toHaveLength(4);
    expect(text).not.toContain('planted');
    expect(text.match(/left out/g)).toHaveLength(16);
  });

  it('tells of a failed query, but not with what', async () => {
    const row = { ...(await server.deps.dataSource.manager.findOneByOrFail(Session, {})), tokenHash: 'planted' };
    for (const name of ['err', 'error'] as const)
      await server.deps.dataSource.manager.insert(Session, row).catch((error: unknown) => {
        server.deps.log.error({ [name]: error }, 'failed');
      });
    expect(lines()).toHaveLength(2);
    for (const line of lines()) expect(JSON.stringify(line)).toContain('UNIQUE constraint failed');
    expect(text).not.toContain('planted');
  });

  it('names the request by the id that its answer carries, and takes a proxy’s id when it is harmless', async () => {
    const given = await request(server.app).get('/api/front-door').set('X-Request-Id', 'proxy-id-00042');
    expect(given.headers['x-request-id']).toBe('proxy-id-00042');
    const odd = await request(server.app).get('/api/session').set('X-Request-Id', 'a"b\\c d');
    expect(odd.headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
    expect(odd.body.requestId).toBe(odd.headers['x-request-id']);
    expect(lines().map((line) => line.req?.id)).toEqual(['proxy-id-00042', odd.headers['x-request-id']]);
    expect(lines()[1]).toMatchObject({
      level: 40,
      time: expect.stringMatching(/Z$/),
      req: { method: 'GET', url: '/api/session' },
    });
  });

  it('tells who was refused what', async () => {
    await server.agentFor('technician').get('/api/walls');
    expect(lines()).toContainEqual(
      expect.objectContaining({ msg: 'refused by role', personId: 'own-technician', capability: 'wall:approve' }),
    );
  });
});

describe('an error that nobody foresaw', () => {
  it('is logged with its stack, and the asker learns nothing but the id to ask about', async () => {
    await server.deps.dataSource.query('DROP TABLE session');
    const answer = await server.agentFor('manager').get('/api/people');
    expect(answer.status).toBe(500);
    expect(answer.body).toEqual({
      type: 'about:blank',
      title: 'Failed',
      status: 500,
      detail: expect.not.stringContaining('session'),
      code: 'failed',
      requestId: answer.headers['x-request-id'],
    });
    const logged = lines().find((line) => line.msg === 'request failed');
    expect(JSON.stringify(logged)).toContain('no such table: session');
    expect(logged?.req?.id).toBe(answer.headers['x-request-id']);
  });
});
