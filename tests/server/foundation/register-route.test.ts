import express from 'express';
import * as z from 'zod/mini';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { LevellingResistor } from '@/server/entities/levelling-resistor';
import { IdempotencyKey } from '@/server/entities/idempotency-key';
import { DomainError } from '@/server/errors/domain-error';
import { problems } from '@/server/middleware/problems';
import type { RoutesModule } from '@/server/routes/define-route';
import { makeRegistrar } from '@/server/routes/register-route';
import { newId } from '@/server/services/ids';
import { signAccessToken } from '@/server/services/access-token';
import { inTransaction } from '@/server/services/unit-of-work';
import { makeAgent, makeTestServer, type TestAgent, type TestServer } from '@/tests/support/server';

let server: TestServer;
let agent: TestAgent;
/** Lets a handler wait until the test says so. */
let gate: Promise<void>;
let calls: number;

const routes: RoutesModule = (route) => {
  route({
    method: 'post',
    path: '/things',
    policy: { kind: 'member' },
    idempotent: true,
    status: 201,
    body: z.object({ name: z.string().check(z.minLength(1, 'The name is missing.')), fail: z.optional(z.string()) }),
    handle: async ({ deps, member, body }) => {
      calls += 1;
      await gate;
      if (body.fail === 'before') throw new DomainError(409, 'taken', 'Taken.');
      const id = newId();
      await inTransaction(deps, async (manager) => {
        const { workshopId } = member;
        await manager.insert(LevellingResistor, { id, workshopId, name: body.name, ohm: 1, maxWatts: 1, rev: 1 });
        if (body.fail === 'within') throw new Error('the power went');
      });
      return { id, name: body.name };
    },
  });
  route({
    method: 'patch',
    path: '/things/:id',
    policy: { kind: 'member' },
    ifMatch: true,
    handle: async ({ rev, params }) => ({ rev, id: params.id }),
  });
  route({
    method: 'get',
    path: '/things',
    policy: { kind: 'public' },
    limit: 'estimate',
    query: z.object({ page: z.enum(['1', '2']) }),
    handle: async ({ query }) => query,
  });
};

beforeEach(async () => {
  server = await makeTestServer({ limits: { estimate: { points: 3, durationS: 60 } } });
  const app = express();
  app.use(express.json());
  const router = express.Router();
  routes(makeRegistrar(router, server.deps), router);
  app.use(router);
  app.use(problems(server.deps.log));
  agent = makeAgent(app, () => {
    const { id, sessionId } = server.own.people.technician;
    const claims = { personId: id, workshopId: server.own.id, sessionId };
    return `bidewell_access=${signAccessToken(server.deps.secrets, claims, server.clock.now())}`;
  });
  gate = Promise.resolve();
  calls = 0;
});
afterEach(() => server.close());

const post = (body: object, key?: string) => {
  const sent = agent.post('/api/things', body);
  return key === undefined ? sent : sent.set('Idempotency-Key', key);
};
const countThings = () => server.deps.dataSource.manager.count(LevellingResistor);

describe('a write with an Idempotency-Key', () => {
  it('is refused with 400 without one, or with one that is none', async () => {
    expect((await post({ name: 'R1' })).status).toBe(400);
    const odd = await post({ name: 'R1' }, 'a b');
    expect(odd.status).toBe(400);
    expect(odd.body.fields).toHaveProperty('Idempotency-Key');
    expect(await countThings()).toBe(0);
  });

  it('happens once; the same key gives the first answer again, whatever the order of the fields', async () => {
    const first = await post({ name: 'R1', fail: '' }, 'key-00000001');
    const again = await post({ fail: '', name: 'R1' }, 'key-00000001');
    expect(first.status).toBe(201);
    expect(again.status).toBe(201);
    expect(again.body).toEqual(first.body);
    expect(await countThings()).toBe(1);
  });

  it('is refused with 422 for the same key and another content', async () => {
    await post({ name: 'R1' }, 'key-00000001');
    const other = await post({ name: 'R2' }, 'key-00000001');
    expect(other.status).toBe(422);
    expect(other.body.code).toBe('key_reused');
    expect(await countThings()).toBe(1);
  });

  it('has one effect when it is sent twice at once: the second hears 409 while the first runs', async () => {
    let open: () => void = () => {};
    gate = new Promise((resolve) => (open = resolve));
    const first = post({ name: 'R1' }, 'key-00000001').then((answer) => answer);
    while (calls === 0) await new Promise((resolve) => setTimeout(resolve, 5));
    const second = await post({ name: 'R1' }, 'key-00000001');
    expect(second.status).toBe(409);
    expect(second.body.code).toBe('still_running');
    expect(second.headers['retry-after']).toBe('1');
    open();
    expect((await first).status).toBe(201);
    expect(await countThings()).toBe(1);
    expect(calls).toBe(1);
  });

  it('keeps no refusal, so that the corrected try may carry the same key', async () => {
    expect((await post({ name: 'R1', fail: 'before' }, 'key-00000001')).status).toBe(409);
    expect((await post({ name: 'R1' }, 'key-00000001')).status).toBe(201);
  });

  it('leaves neither effect nor key when its transaction fails', async () => {
    const failed = await post({ name: 'R1', fail: 'within' }, 'key-00000001');
    expect(failed.status).toBe(500);
    expect(failed.body.detail).not.toContain('power');
    expect(await countThings()).toBe(0);
    expect(await server.deps.dataSource.manager.count(IdempotencyKey)).toBe(0);
    expect((await post({ name: 'R1' }, 'key-00000001')).status).toBe(201);
  });

  it('that was committed before a crash lost its answer is not done again', async () => {
    await post({ name: 'R1' }, 'key-00000001');
    // What a crash between commit and answer leaves.
    await server.deps.dataSource.manager.update(IdempotencyKey, { key: 'key-00000001' }, { status: 0 });
    const again = await post({ name: 'R1' }, 'key-00000001');
    expect(again.status).toBe(409);
    expect(again.body.code).toBe('done_already');
    expect(await countThings()).toBe(1);
  });

  it('loses its answer after 24 h and is itself forgotten after 45 days', async () => {
    const kept = async () =>
      (await server.deps.dataSource.manager.find(IdempotencyKey, { order: { createdAt: 'ASC' } })).map(
        ({ key, status }) => [key.at(-1), status],
      );
    await post({ name: 'R1' }, 'key-00000001');
    server.clock.advance(24 * 3600_000 + 1);
    await post({ name: 'R2' }, 'key-00000002');
    expect(await kept()).toEqual([
      ['1', 0],
      ['2', 201],
    ]);
    server.clock.advance(44 * 24 * 3600_000);
    await post({ name: 'R3' }, 'key-00000003');
    expect(await kept()).toEqual([
      ['2', 0],
      ['3', 201],
    ]);
  });
});

describe('a write with If-Match', () => {
  it.each([
    ['"3"', 200],
    ['3', 200],
    ['W/"3"', 200],
    ['three', 400],
    ['*', 400],
    ['"-1"', 400],
  ])('takes %s with %i', async (header, status) => {
    const answer = await agent.patch('/api/things/x').set('If-Match', header);
    expect(answer.status).toBe(status);
    if (status === 200) expect(answer.body).toEqual({ rev: 3, id: 'x' });
  });

  it('is refused with 428 without it', async () => {
    const answer = await agent.patch('/api/things/x');
    expect(answer.status).toBe(428);
    expect(answer.body.code).toBe('revision_missing');
  });
});

describe('the shape of a request', () => {
  it('that is wrong is answered with 400 and a sentence per field', async () => {
    const missing = await post({}, 'key-00000001');
    expect(missing.status).toBe(400);
    expect(missing.type).toBe('application/problem+json');
    expect(missing.body).toMatchObject({ code: 'invalid', status: 400, fields: { name: 'This is missing.' } });
    const empty = await post({ name: '' }, 'key-00000001');
    expect(empty.body.fields).toEqual({ name: 'The name is missing.' });
    const number = await post({ name: 5 }, 'key-00000001');
    expect(number.body.fields).toEqual({ name: 'This must be of the type string.' });
    const page = await agent.get('/api/things?page=9');
    expect(page.body.fields).toEqual({ page: 'Choose one of: 1, 2.' });
  });

  it('that is no JSON is answered with 400, too much of it with 413', async () => {
    const broken = await agent.post('/api/things').set('Content-Type', 'application/json').send('{"name":');
    expect(broken.status).toBe(400);
    expect(broken.body.code).toBe('not_json');
    const large = await agent.post('/api/things', { name: 'x'.repeat(200_000) });
    expect(large.status).toBe(413);
  });
});

it('a throttled address hears 429 with the seconds to wait, and another one is served', async () => {
  for (let i = 0; i < 3; i += 1) expect((await agent.get('/api/things?page=1')).status).toBe(200);
  const refused = await agent.get('/api/things?page=1');
  expect(refused.status).toBe(429);
  expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
  expect(Number(refused.headers['retry-after'])).toBeLessThanOrEqual(60);
});

it('a transaction within a transaction is refused instead of waiting for itself', async () => {
  const nested = inTransaction(server.deps, () => inTransaction(server.deps, async () => 1));
  await expect(nested).rejects.toThrow(/within a transaction/);
});
