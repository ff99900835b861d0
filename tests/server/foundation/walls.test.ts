import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { Wall } from '@/server/entities/wall';
import { WallCode } from '@/server/entities/wall-code';
import { userCodeLetters } from '@/shared/contract/wall';
import { cookiesOf, Jar } from '@/tests/support/cookies';
import { makeAgent, makeTestServer, type TestAgent, type TestServer } from '@/tests/support/server';

let server: TestServer;
let jar: Jar;
let screen: TestAgent;
const minute = 60_000;

beforeEach(async () => {
  server = await makeTestServer();
  jar = new Jar();
  screen = makeAgent(server.app, () => jar.header());
});
afterEach(() => server.close());

const ask = async () => (await screen.post('/api/wall/codes')).body;
const poll = async (deviceCode: string) => jar.take(await screen.post('/api/wall/token', { deviceCode }));
const approve = (userCode: string, name = 'Wall by the lift') =>
  server
    .agentFor('foreman')
    .post('/api/wall/approvals', { userCode, name, diagonalInches: '55 in', distanceMetres: 7 });

async function pair() {
  const { deviceCode, userCode } = await ask();
  const { body } = await approve(userCode);
  await poll(deviceCode);
  return body as { id: string };
}

describe('pairing a wall (RFC 8628)', () => {
  it('shows eight letters without vowels, good for 10 minutes, to be asked about every 5 s', async () => {
    const answer = await screen.post('/api/wall/codes');
    expect(answer.status).toBe(201);
    const { userCode, deviceCode, expiresAt, intervalS, verificationUrlComplete } = answer.body;
    expect(userCode).toMatch(new RegExp(`^[${userCodeLetters}]{4}-[${userCodeLetters}]{4}$`));
    // 20 letters, 8 of them: 34.6 bits; the device's own code has 256.
    expect(Math.log2(userCodeLetters.length ** 8)).toBeGreaterThan(34);
    expect(Buffer.from(deviceCode, 'base64url')).toHaveLength(32);
    expect(Date.parse(expiresAt) - server.clock.now()).toBe(10 * minute);
    expect(intervalS).toBe(5);
    expect(verificationUrlComplete).toContain(userCode);
    const rows = JSON.stringify(await server.deps.dataSource.query('SELECT * FROM wall_code'));
    expect(rows).not.toContain(deviceCode);
  });

  it('a foreman sees who asks, approves, and the screen gets its cookie with the next poll', async () => {
    const { deviceCode, userCode } = await ask();
    expect((await poll(deviceCode)).body).toMatchObject({ status: 400, code: 'authorization_pending' });
    const typed = userCode.toLowerCase().replace('-', ' ');
    const request = await server.agentFor('foreman').get(`/api/wall/requests/${encodeURIComponent(typed)}`);
    expect(request.body).toEqual({
      userCode,
      askedAt: new Date(server.clock.now()).toISOString(),
      expiresAt: new Date(server.clock.now() + 10 * minute).toISOString(),
      device: 'Unknown device',
    });
    const approved = await approve(typed);
    expect(approved.status).toBe(201);
    expect(approved.body).toMatchObject({
      name: 'Wall by the lift',
      diagonalInches: 55,
      distanceMetres: 7,
      approvedBy: 'Foreman of own',
      lastHeardAt: null,
    });
    server.clock.advance(5000);
    const collected = await poll(deviceCode);
    expect(collected.status).toBe(204);
    const cookie = cookiesOf(collected).bidewell_wall;
    expect(cookie?.attributes).toEqual(
      expect.arrayContaining(['HttpOnly', 'SameSite=Strict', 'Path=/', `Max-Age=${400 * 24 * 3600}`]),
    );
    expect((await screen.get('/api/wall/me')).body).toEqual({
      id: approved.body.id,
      name: 'Wall by the lift',
      diagonalInches: 55,
      distanceMetres: 7,
      workshop: { id: 'workshop-own', name: 'The own workshop', zone: 'Europe/Berlin' },
    });
    const rows = JSON.stringify(await server.deps.dataSource.query('SELECT * FROM wall'));
    expect(rows).not.toContain(jar.get('bidewell_wall'));
  });

  it('asked too soon is told to slow down, by 5 s more each time', async () => {
    const { deviceCode } = await ask();
    await poll(deviceCode);
    server.clock.advance(2000);
    const first = await poll(deviceCode);
    expect(first.body).toMatchObject({ status: 400, code: 'slow_down' });
    expect(first.headers['retry-after']).toBe('10');
    server.clock.advance(6000);
    const second = await poll(deviceCode);
    expect(second.body.code).toBe('slow_down');
    expect(second.headers['retry-after']).toBe('15');
    server.clock.advance(15_000);
    expect((await poll(deviceCode)).body.code).toBe('authorization_pending');
  });

  it('ends after 10 minutes: expired for the screen, unknown to the foreman', async () => {
    const { deviceCode, userCode } = await ask();
    server.clock.advance(10 * minute);
    expect((await poll(deviceCode)).body).toMatchObject({ status: 400, code: 'expired_token' });
    const approved = await approve(userCode);
    expect(approved.status).toBe(404);
    expect(approved.body.code).toBe('no_such_code');
  });

  it('an invented device code is an expired one', async () => {
    expect((await poll('A'.repeat(43))).body).toMatchObject({ status: 400, code: 'expired_token' });
  });

  it('refused by a foreman, the screen hears access_denied', async () => {
    const { deviceCode, userCode } = await ask();
    expect((await server.agentFor('foreman').delete(`/api/wall/requests/${userCode}`)).status).toBe(204);
    expect((await poll(deviceCode)).body).toMatchObject({ status: 400, code: 'access_denied' });
    expect((await approve(userCode)).status).toBe(404);
  });

  it('gives the right once: a lost answer is given again within a minute, later it is over', async () => {
    const { deviceCode, userCode } = await ask();
    await approve(userCode);
    await poll(deviceCode);
    const lost = jar.get('bidewell_wall') ?? '';
    server.clock.advance(5000);
    expect((await poll(deviceCode)).status).toBe(204);
    const kept = jar.get('bidewell_wall') ?? '';
    expect((await screen.get('/api/wall/me')).status).toBe(200);
    jar.set('bidewell_wall', lost);
    expect((await screen.get('/api/wall/me')).status).toBe(401);
    jar.set('bidewell_wall', kept);
    server.clock.advance(minute);
    expect((await poll(deviceCode)).body.code).toBe('expired_token');
  });

  it('the same code is approved once, by one workshop', async () => {
    const { userCode } = await ask();
    const answers = await Promise.all([
      approve(userCode),
      server.agentFor('manager', server.other).post('/api/wall/approvals', {
        userCode,
        name: 'Theirs',
        diagonalInches: null,
        distanceMetres: null,
      }),
    ]);
    expect(answers.map(({ status }) => status).sort()).toEqual([201, 404]);
    expect(await server.deps.dataSource.manager.count(Wall)).toBe(1);
  });

  it('guessing codes is stopped after 15 wrong ones by one person', async () => {
    const foreman = server.agentFor('foreman');
    for (let i = 0; i < 15; i += 1) expect((await foreman.get('/api/wall/requests/BCDF-GHJK')).status).toBe(404);
    expect((await foreman.get('/api/wall/requests/BCDF-GHJK')).status).toBe(429);
    const { userCode } = await ask();
    expect((await server.agentFor('manager').get(`/api/wall/requests/${userCode}`)).status).toBe(200);
  });

  it('asking for codes is stopped after 20 in 10 minutes from one address', async () => {
    for (let i = 0; i < 20; i += 1) expect((await screen.post('/api/wall/codes')).status).toBe(201);
    expect((await screen.post('/api/wall/codes')).status).toBe(429);
  });

  it('old codes are cleaned away', async () => {
    await ask();
    server.clock.advance(2 * 60 * minute);
    await ask();
    expect(await server.deps.dataSource.manager.count(WallCode)).toBe(1);
  });
});

describe('a paired wall', () => {
  it('keeps its right for years without being used, and renews its cookie whenever it starts', async () => {
    await pair();
    server.clock.advance(800 * 24 * 60 * minute);
    const answer = await screen.get('/api/wall/me');
    expect(answer.status).toBe(200);
    expect(cookiesOf(answer).bidewell_wall?.attributes).toContain(`Max-Age=${400 * 24 * 3600}`);
  });

  it('shows in the list when it was last heard of', async () => {
    const { id } = await pair();
    server.clock.advance(5 * minute);
    await screen.get('/api/wall/me');
    const { body } = await server.agentFor('manager').get('/api/walls');
    expect(body).toEqual([expect.objectContaining({ id, lastHeardAt: new Date(server.clock.now()).toISOString() })]);
    expect((await server.agentFor('foreman', server.other).get('/api/walls')).body).toEqual([]);
  });

  it('loses its right at once when it is taken back, and its sockets are closed', async () => {
    const { id } = await pair();
    expect((await server.agentFor('foreman').delete(`/api/walls/${id}`)).status).toBe(204);
    const answer = await screen.get('/api/wall/me');
    expect(answer.status).toBe(401);
    expect(answer.body.code).toBe('not_paired');
    expect(server.hub.of('end')).toEqual([{ wallId: id, reason: 'revoked' }]);
    expect((await server.agentFor('foreman').get('/api/walls')).body).toEqual([]);
    expect((await server.agentFor('foreman').delete(`/api/walls/${id}`)).status).toBe(404);
  });

  it('taken back before it was collected is denied', async () => {
    const { deviceCode, userCode } = await ask();
    const { body } = await approve(userCode);
    await server.agentFor('foreman').delete(`/api/walls/${body.id}`);
    expect((await poll(deviceCode)).body.code).toBe('access_denied');
  });
});
