import { describe, expect, it } from 'vitest';
import { makeApi, type ApiEnvironment } from '@/shared/client/api';
import { isOffline, isProblem, sentenceOf } from '@/shared/client/api-problem';

interface Call {
  path: string;
  method: string;
  headers: Record<string, string>;
  body: string | undefined;
}

/** A server of its own: access tokens run out, a refresh gives a new one. Cookies are shared by all tabs of a browser. */
function makeServer() {
  const calls: Call[] = [];
  const server = {
    calls,
    accessGood: true,
    refreshGood: true,
    now: 1000,
    memory: new Map<string, string>(),
    locked: Promise.resolve() as Promise<unknown>,
    answer: (call: Call): Response | null => (call.path === '/api/never' ? null : Response.json({ fine: true })),
    countOf: (path: string) => calls.filter((call) => call.path === path).length,
    tab(): ReturnType<typeof makeApi> {
      const env: ApiEnvironment = {
        fetch: async (path, init) => {
          server.now += 1;
          const call = {
            path,
            method: init.method ?? 'GET',
            headers: init.headers as Record<string, string>,
            body: init.body as string | undefined,
          };
          calls.push(call);
          // The answer takes a turn, so that two callers are really under way at once.
          await Promise.resolve();
          if (path === '/api/session/refresh') {
            if (!server.refreshGood) return problem(401, 'unauthenticated');
            server.accessGood = true;
            return new Response(null, { status: 204 });
          }
          if (!server.accessGood) return problem(401, 'unauthenticated');
          const response = server.answer(call);
          if (!response) throw new TypeError('Failed to fetch');
          return response;
        },
        alone: (_name, work) => {
          const run = server.locked.then(work, work);
          server.locked = run.catch(() => undefined);
          return run;
        },
        now: () => server.now,
        recall: (key) => server.memory.get(key) ?? null,
        remember: (key, value) => void (value === null ? server.memory.delete(key) : server.memory.set(key, value)),
      };
      return makeApi(env);
    },
  };
  return server;
}

const problem = (status: number, code: string, more: object = {}) =>
  new Response(JSON.stringify({ type: 'about:blank', title: code, status, detail: `${code}.`, code, ...more }), {
    status,
    headers: { 'content-type': 'application/problem+json' },
  });

describe('one refresh at a time', () => {
  it('refreshes once for five calls that are refused at the same time, and answers all five', async () => {
    const server = makeServer();
    const api = server.tab();
    server.accessGood = false;
    const answers = await Promise.all([1, 2, 3, 4, 5].map((n) => api.get(`/board/${n}`)));
    expect(answers).toEqual(Array(5).fill({ fine: true }));
    expect(server.countOf('/api/session/refresh')).toBe(1);
  });

  it('refreshes once for two tabs of one browser: the second takes the first one’s cookies', async () => {
    const server = makeServer();
    const [one, other] = [server.tab(), server.tab()];
    server.accessGood = false;
    await Promise.all([one.get('/board'), other.get('/board')]);
    expect(server.countOf('/api/session/refresh')).toBe(1);
  });

  it('refreshes again the next time the token runs out', async () => {
    const server = makeServer();
    const api = server.tab();
    for (let round = 0; round < 2; round++) {
      server.accessGood = false;
      await api.get('/board');
    }
    expect(server.countOf('/api/session/refresh')).toBe(2);
  });

  it('says once that the session has ended when the refresh is refused, and repeats nothing', async () => {
    const server = makeServer();
    const api = server.tab();
    let ended = 0;
    api.on({ heard: () => {}, unheard: () => {}, sessionEnded: () => ended++ });
    server.accessGood = false;
    server.refreshGood = false;
    const results = await Promise.allSettled([api.get('/board'), api.get('/alerts')]);
    expect(results.map((result) => result.status)).toEqual(['rejected', 'rejected']);
    expect(ended).toBe(1);
    expect(server.countOf('/api/board')).toBe(1);
  });

  it('does not refresh for a wrong password', async () => {
    const server = makeServer();
    const api = server.tab();
    server.answer = () => problem(401, 'wrong_password');
    await expect(api.post('/session', { email: 'a', password: 'b' }, { open: true })).rejects.toMatchObject({
      status: 401,
      code: 'wrong_password',
    });
    expect(server.countOf('/api/session/refresh')).toBe(0);
  });
});

describe('what goes out', () => {
  it('sends the revision as If-Match, the key of the act and JSON', async () => {
    const server = makeServer();
    await server.tab().post('/charges/c1/start', { at: null }, { rev: 7, idempotencyKey: 'k1' });
    expect(server.calls[0]).toMatchObject({
      method: 'POST',
      headers: { 'if-match': '"7"', 'idempotency-key': 'k1', 'content-type': 'application/json' },
      body: '{"at":null}',
    });
  });

  it('leaves empty filters out of the address', async () => {
    const server = makeServer();
    await server.tab().get('/spares', { query: { q: 'S 04&1', where: '', moduleTypeId: undefined } });
    expect(server.calls[0]!.path).toBe('/api/spares?q=S+04%261');
  });
});

describe('what comes back', () => {
  it('gives the sentences at their fields and the present state of what somebody else has changed', async () => {
    const server = makeServer();
    const api = server.tab();
    server.answer = () =>
      problem(412, 'stale', { fields: { 'groupVolts.1': 'Type three decimals.' }, present: { rev: 9 } });
    const error = await api.post('/charges/c1/hold', {}).catch((cause: unknown) => cause);
    expect(isProblem(error) && [error.fields, error.present, error.message]).toEqual([
      { 'groupVolts.1': 'Type three decimals.' },
      { rev: 9 },
      'stale.',
    ]);
  });

  it('turns a proxy’s page of error into a plain sentence', async () => {
    const server = makeServer();
    const api = server.tab();
    server.answer = () =>
      new Response('<html>Bad gateway</html>', { status: 502, headers: { 'content-type': 'text/html' } });
    const error = await api.get('/board').catch((cause: unknown) => cause);
    expect(sentenceOf(error)).toBe('The server answered with an error (502). Try again.');
  });

  it('tells a server that was not reached from one that refused', async () => {
    const server = makeServer();
    const api = server.tab();
    let unheard = 0;
    api.on({ heard: () => {}, unheard: () => unheard++, sessionEnded: () => {} });
    const error = await api.get('/never').catch((cause: unknown) => cause);
    expect(isOffline(error)).toBe(true);
    expect(unheard).toBe(1);
  });
});
