import request from 'supertest';
import { afterEach, describe, expect, it } from 'vitest';
import type { Config } from '@/server/config';
import { makeTestServer, type TestServer } from '@/tests/support/server';

let server: TestServer;
afterEach(() => server.close());

/** A harmless write: an unknown sign-in. 401 when it was let through, 403 when it was refused for its origin. */
async function write(config: Partial<Config>, headers: Record<string, string>): Promise<number> {
  server = await makeTestServer({ config });
  const answer = await request(server.app)
    .post('/api/session')
    .set({ Host: 'bench.example.com', ...headers })
    .send({ email: 'nobody@example.com', password: 'x' });
  if (answer.status === 403) expect(answer.body.code).toBe('other_origin');
  return answer.status;
}
const through = 401;
const refused = 403;

describe('a write is let through by where it comes from', () => {
  it.each<[string, Partial<Config>, Record<string, string>, number]>([
    ['our own page', {}, { Origin: 'http://bench.example.com' }, through],
    ['no browser', {}, {}, through],
    ['another site', {}, { Origin: 'http://evil.example' }, refused],
    ['our host over another scheme', {}, { Origin: 'https://bench.example.com' }, refused],
    ['our host on another port', {}, { Origin: 'http://bench.example.com:81' }, refused],
    ['our host, its port said', {}, { Origin: 'http://bench.example.com:80' }, through],
    ['a host that begins like ours', {}, { Origin: 'http://bench.example.com.evil.example' }, refused],
    ['a part of our host', {}, { Origin: 'http://example.com' }, refused],
    ['a sandboxed page', {}, { Origin: 'null' }, refused],
    ['rubbish', {}, { Origin: 'bench.example.com' }, refused],
    ['no origin, but another site by the browser’s word', {}, { 'Sec-Fetch-Site': 'cross-site' }, refused],
    ['no origin, a neighbour host', {}, { 'Sec-Fetch-Site': 'same-site' }, refused],
    ['no origin, our own page by the browser’s word', {}, { 'Sec-Fetch-Site': 'same-origin' }, through],
    [
      'our page behind a proxy that speaks https',
      { proxyHops: 1 },
      { Origin: 'https://bench.example.com', 'X-Forwarded-Proto': 'https' },
      through,
    ],
    [
      'our page behind a proxy that keeps the host apart',
      { proxyHops: 1 },
      {
        Host: 'inner:4300',
        Origin: 'https://bench.example.com',
        'X-Forwarded-Proto': 'https',
        'X-Forwarded-Host': 'bench.example.com',
      },
      through,
    ],
    [
      'another site that claims to be a proxy, where none is set',
      {},
      { Origin: 'http://evil.example', 'X-Forwarded-Host': 'evil.example' },
      refused,
    ],
    [
      'the address the operator has set',
      { publicUrl: 'https://bidewell.example.com' },
      { Origin: 'https://bidewell.example.com' },
      through,
    ],
    [
      'an address like the one set',
      { publicUrl: 'https://bidewell.example.com' },
      { Origin: 'http://bidewell.example.com' },
      refused,
    ],
  ])('%s', async (_name, config, headers, status) => {
    expect(await write(config, headers)).toBe(status);
  });

  it.each(['post', 'put', 'patch', 'delete'] as const)('whatever the method: %s', async (method) => {
    server = await makeTestServer();
    const answer = await request(server.app)[method]('/api/session').set('Origin', 'http://evil.example');
    expect(answer.status).toBe(403);
  });

  it('a read is answered to any page, which cannot see it: no CORS header is ever sent', async () => {
    server = await makeTestServer();
    const answer = await request(server.app).get('/api/front-door').set('Origin', 'http://evil.example');
    expect(answer.status).toBe(200);
    expect(Object.keys(answer.headers).filter((name) => name.startsWith('access-control'))).toEqual([]);
    const preflight = await request(server.app)
      .options('/api/session')
      .set({ Origin: 'http://evil.example', 'Access-Control-Request-Method': 'POST' });
    expect(Object.keys(preflight.headers).filter((name) => name.startsWith('access-control'))).toEqual([]);
  });
});
