import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { addressKey } from '@/server/services/limits';
import { Jar } from '@/tests/support/cookies';
import { makeAgent, makeTestServer, testPassword, type TestServer } from '@/tests/support/server';

let server: TestServer;
const email = () => server.own.people.technician.email;

beforeEach(async () => {
  // Behind one proxy, so that a test can come from many addresses.
  server = await makeTestServer({
    config: { proxyHops: 1 },
    // Smaller than in earnest, so that the tests need fewer tries.
    limits: { signInAccount: { points: 20, durationS: 3600 }, signInAddress: { points: 30, durationS: 900 } },
  });
});
afterEach(() => server.close());

const from = (address: string, password: string, cookie = '', who = email()) =>
  makeAgent(server.app, () => cookie)
    .post('/api/session', { email: who, password })
    .set('X-Forwarded-For', address);

describe('wrong sign-ins', () => {
  it('are stopped after 10 from one address to one account, with the time to wait', async () => {
    for (let i = 0; i < 10; i += 1) expect((await from('203.0.113.1', 'wrong')).status).toBe(401);
    const stopped = await from('203.0.113.1', 'wrong');
    expect(stopped.status).toBe(429);
    expect(stopped.body.code).toBe('too_many');
    const wait = Number(stopped.headers['retry-after']);
    expect(wait).toBeGreaterThan(800);
    expect(wait).toBeLessThanOrEqual(900);
    // The right password is not even compared then.
    const compared = server.passwords.compared;
    expect((await from('203.0.113.1', testPassword)).status).toBe(429);
    expect(server.passwords.compared).toBe(compared);
  });

  it('sent all at once are counted as many', async () => {
    const answers = await Promise.all(Array.from({ length: 25 }, () => from('203.0.113.1', 'wrong')));
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(10);
    expect(answers.filter(({ status }) => status === 429)).toHaveLength(15);
  });

  it('are forgotten with the right one', async () => {
    for (let i = 0; i < 9; i += 1) await from('203.0.113.1', 'wrong');
    expect((await from('203.0.113.1', testPassword)).status).toBe(200);
    for (let i = 0; i < 9; i += 1) expect((await from('203.0.113.1', 'wrong')).status).toBe(401);
    expect((await from('203.0.113.1', testPassword)).status).toBe(200);
  });

  it('from 12 addresses do not lock the owner out, from another address or on a known device', async () => {
    const jar = new Jar();
    jar.take(await from('198.51.100.1', testPassword));
    const statuses: number[] = [];
    for (let i = 0; i < 12; i += 1)
      for (let tries = 0; tries < 4; tries += 1) statuses.push((await from(`203.0.113.${i}`, 'wrong')).status);
    // Once the account is under attack, an address has 3 tries instead of 10.
    expect(statuses.slice(-4)).toEqual([401, 401, 401, 429]);
    expect((await from('192.0.2.7', testPassword)).status).toBe(200);
    expect((await from('198.51.100.1', testPassword, jar.header())).status).toBe(200);
  });

  it('from the owner’s own address do not lock out the owner’s known device', async () => {
    const jar = new Jar();
    jar.take(await from('198.51.100.1', testPassword));
    for (let i = 0; i < 12; i += 1) await from('198.51.100.1', 'wrong');
    expect((await from('198.51.100.1', testPassword)).status).toBe(429);
    expect((await from('198.51.100.1', testPassword, jar.header())).status).toBe(200);
  });

  it('are stopped on a known device as well, after 10', async () => {
    const jar = new Jar();
    jar.take(await from('198.51.100.1', testPassword));
    for (let i = 0; i < 10; i += 1) expect((await from('198.51.100.1', 'wrong', jar.header())).status).toBe(401);
    expect((await from('198.51.100.1', testPassword, jar.header())).status).toBe(429);
  });

  it('gain nothing by a device cookie that is forged or belongs to another account', async () => {
    const jar = new Jar();
    jar.take(await from('198.51.100.1', testPassword, '', server.own.people.manager.email));
    const [number, accounts] = (jar.get('bidewell_device') ?? '').split('~');
    for (const cookie of [
      `bidewell_device=${jar.get('bidewell_device')}`,
      `bidewell_device=${number}~${accounts}~${'A'.repeat(43)}`,
      'bidewell_device=~~',
    ])
      for (let i = 0; i < 4; i += 1) await from('203.0.113.9', 'wrong', cookie);
    // 12 tries, 10 of them counted against the address as without a cookie.
    expect((await from('203.0.113.9', testPassword)).status).toBe(429);
  });

  it('to many accounts are stopped from one address after so many in all', async () => {
    for (let i = 0; i < 30; i += 1)
      expect((await from('203.0.113.1', 'wrong', '', `nobody${i}@example.com`)).status).toBe(401);
    expect((await from('203.0.113.1', 'wrong', '', 'nobody100@example.com')).status).toBe(429);
  });
});

describe('the address that counts', () => {
  it('is not what a client writes into X-Forwarded-For when no proxy is set', async () => {
    await server.close();
    server = await makeTestServer();
    for (let i = 0; i < 10; i += 1) await from(`203.0.113.${i}`, 'wrong');
    expect((await from('203.0.113.77', 'wrong')).status).toBe(429);
  });

  it('is the one the nearest proxy saw, whatever stood in the header before', async () => {
    for (let i = 0; i < 10; i += 1) await from(`10.9.9.${i}, 203.0.113.1`, 'wrong');
    expect((await from('10.9.9.77, 203.0.113.1', 'wrong')).status).toBe(429);
    expect((await from('203.0.113.1, 10.9.9.77', 'wrong')).status).toBe(401);
  });

  it.each([
    ['203.0.113.7', '203.0.113.7'],
    ['::ffff:203.0.113.7', '203.0.113.7'],
    ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
    ['2001:db8:1:2:ffff::1', '2001:db8:1:2::/64'],
    ['2001:0db8:0001::1', '2001:db8:1:0::/64'],
    ['::1', '0:0:0:0::/64'],
    [undefined, 'unknown'],
  ])('of %s is %s', (address, key) => {
    expect(addressKey(address)).toBe(key);
  });
});
