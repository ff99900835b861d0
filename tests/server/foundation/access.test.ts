/**
 * Who may do what, walked over the routes of the running router: every route × every kind of asker, and every route with
 * another workshop's ids. What is expected is written by hand in route-fixtures.ts, so that a slip in a route's policy
 * and a route that nobody thought of both fail here.
 */
import fs from 'node:fs';
import { afterAll, describe, expect, it } from 'vitest';
import type { Response } from 'supertest';
import { photoFolder } from '@/server/data-files';
import { can, roles, type Role } from '@/shared/contract/roles';
import { furnish, idsOf, newKey } from '@/tests/support/furnished';
import type { Backups } from '@/server/services/backups';
import { outsideOfBoth } from '@/tests/support/outside';
import { makeAgent, makeTestServer, type TestAgent } from '@/tests/support/server';
import { walkRouter, type WalkedRoute } from '@/tests/support/walk-router';
import { routeFixtures, type Fit, type RouteFixture } from './route-fixtures';

const noLimit = { points: 1_000_000, durationS: 1 };
const limits = Object.fromEntries(
  [
    'open',
    'estimate',
    'papers',
    'backup',
    'createWorkshop',
    'join',
    'wallCode',
    'wallToken',
    'wallGuess',
    'signInDevice',
  ].map((name) => [name, noLimit]),
);
// With the demo on, so that its route is walked too.
/** A database in memory has no file to copy. */
const backups: Backups = {
  backUpNow: async () => ({ file: '', bytes: 0, photos: 0, newPhotos: 0, missing: [] }),
  state: () => ({ copies: [], failed: null }),
  start: () => {},
  stop: async () => {},
};
const server = await makeTestServer({ demo: true, limits, deps: { backups, outside: await outsideOfBoth() } });
const { own, other } = await furnish(server);
const routes = walkRouter(server.app);
const photos = photoFolder(server.deps.config.dataDir);
const photosKept = `${photos}-kept`;
fs.cpSync(photos, photosKept, { recursive: true });
afterAll(() => server.close());

const where = 'tests/server/foundation/route-fixtures.ts';
function fixtureOf(route: WalkedRoute): RouteFixture {
  const fixture = routeFixtures[route.name];
  if (!fixture) throw new Error(`${route.name} has no entry. Say in ${where} who it is for, and a request that fits.`);
  return fixture;
}

function ask(agent: TestAgent, route: WalkedRoute, fit: Fit) {
  const path = route.path.replace(/:(\w+)/g, (_all, name: string) => {
    const value = fit.params?.[name];
    if (value === undefined) throw new Error(`${route.name}: its entry in ${where} gives no ${name}.`);
    return encodeURIComponent(value);
  });
  const address = fit.query ? `${path}?${fit.query}` : path;
  const test = route.handler.asks?.file
    ? agent.upload(address, 'photo', fit.file ?? Buffer.alloc(0), 'photo.jpg')
    : route.method === 'get' || route.method === 'delete'
      ? agent[route.method](address)
      : agent[route.method](address, fit.body);
  if (route.handler.asks?.ifMatch) void test.set('If-Match', `"${fit.rev ?? 1}"`);
  if (route.handler.asks?.idempotent) void test.set('Idempotency-Key', newKey());
  return test;
}

/** Takes back whatever the work has changed, and lays back the files it has removed: the one connection nests every transaction of the server in this one. */
async function isolated<T>(work: () => Promise<T>): Promise<T> {
  const runner = server.deps.dataSource.createQueryRunner();
  await runner.startTransaction();
  try {
    return await work();
  } finally {
    await runner.rollbackTransaction();
    fs.cpSync(photosKept, photos, { recursive: true });
  }
}

const fitOf = (route: WalkedRoute, f = own): Fit => fixtureOf(route).fit?.(f) ?? {};
const wall = makeAgent(server.app, () => own.wallCookie);
const rank = (role: Role): number => roles.indexOf(role);
const tell = (answer: Response) => `${answer.status} ${JSON.stringify(answer.body).slice(0, 300)}`;

describe('the routes', () => {
  it('are found, each once, and each with a declared policy', () => {
    expect(routes.length).toBeGreaterThan(70);
    expect(new Set(routes.map(({ name }) => name)).size).toBe(routes.length);
    expect(routes.filter(({ handler }) => !handler.policy).map(({ name }) => name)).toEqual([]);
  });

  it(`are all in ${where}, and nothing else is there`, () => {
    expect(routes.map(({ name }) => name).sort()).toEqual(Object.keys(routeFixtures).sort());
  });

  it('that change something which two people may change ask for its revision', () => {
    // What is removed is removed as it was seen. Sessions, invitations, walls and devices only end; nobody changes them.
    const ended = [
      'session',
      'sessions',
      'invitations/:id',
      'walls/:id',
      'wall/requests/:userCode',
      'me/push-devices/:id',
    ];
    const patched = routes.filter(
      ({ method, name }) =>
        (method === 'patch' && !name.startsWith('PATCH /api/me')) ||
        (method === 'delete' && !ended.includes(name.replace('DELETE /api/', ''))),
    );
    // A reading is never changed: its correction is a row of its own.
    const without = patched.filter(({ handler }) => !handler.asks?.ifMatch).map(({ name }) => name);
    expect(without).toEqual(['PATCH /api/charges/:id/readings/:readingId']);
  });

  it('that book, start, stop or judge a charge carry an Idempotency-Key', () => {
    const carry = routes.filter(({ handler }) => handler.asks?.idempotent).map(({ name }) => name);
    expect(carry.sort()).toEqual([
      'POST /api/bench-plan/accept',
      'POST /api/bench-plan/move',
      'POST /api/bench-plan/undo/:id',
      'POST /api/charges',
      'POST /api/charges/:id/checks',
      'POST /api/charges/:id/current-off',
      'POST /api/charges/:id/fit',
      'POST /api/charges/:id/hold',
      'POST /api/charges/:id/look-ins',
      'POST /api/charges/:id/next-step',
      'POST /api/charges/:id/queue',
      'POST /api/charges/:id/readings',
      'POST /api/charges/:id/rest-check',
      'POST /api/charges/:id/resume',
      'POST /api/charges/:id/shelve',
      'POST /api/charges/:id/start',
      'POST /api/charges/:id/stop',
      'POST /api/repairs',
      'POST /api/repairs/:id/photos',
      'POST /api/repairs/:id/readings',
      'POST /api/repairs/:id/second-source',
      'POST /api/work',
      'POST /api/work/:id/stints/:stintId/begin',
      'POST /api/work/:id/stints/:stintId/done',
      'POST /api/work/:id/stints/:stintId/give-back',
      'POST /api/work/:id/take',
    ]);
  });
});

/** Routes whose fitting request was taken by somebody: being let in is then more than being refused for another reason. */
const taken = new Set<string>();

describe('who may', () => {
  it.each(routes.map((route) => [route.name, route] as const))('%s', async (_name, route) => {
    const { who, anyoneHears } = fixtureOf(route);
    const answers = async (agent: TestAgent) => isolated(async () => ask(agent, route, fitOf(route)));

    const nobody = await answers(server.anyone);
    const onWall = await answers(wall);
    if (nobody.ok || onWall.ok) taken.add(route.name);
    if (who === 'anyone') {
      for (const answer of [nobody, onWall])
        if (anyoneHears) expect(answer.status, tell(answer)).toBe(anyoneHears);
        else expect(answer.status, tell(answer)).toBeLessThan(300);
    } else {
      expect(nobody.status, tell(nobody)).toBe(401);
      if (who === 'wall') expect(onWall.status, tell(onWall)).toBe(200);
      else expect(onWall.status, tell(onWall)).toBe(401);
    }

    for (const role of roles) {
      const answer = await answers(server.agentFor(role));
      if (answer.ok) taken.add(route.name);
      if (who === 'anyone') continue;
      if (who === 'wall') expect(answer.status, tell(answer)).toBe(401);
      else if (rank(role) >= rank(who)) {
        expect([401, 403], `${role}: ${tell(answer)}`).not.toContain(answer.status);
        expect(answer.status, `${role}: ${tell(answer)}`).toBeLessThan(500);
      } else {
        expect(answer.status, `${role}: ${tell(answer)}`).toBe(403);
        expect(answer.body.detail).toContain(who);
      }
    }
    // And what the table says agrees with what the route declares.
    const { policy } = route.handler;
    if (policy?.kind === 'capability')
      for (const role of roles) expect(can(role, policy.capability)).toBe(rank(role) >= rank(who as Role));
    else expect(policy?.kind).toBe(who === 'anyone' ? 'public' : who === 'wall' ? 'wall' : 'member');
  });
});

/** What the furnished workshop cannot be in the state for; and the test, under tests/server, that sees its 2xx. */
const takenElsewhere = {
  'POST /api/charges/:id/log-file': 'charges/log-file.test.ts',
  'GET /metrics': 'operations/status.test.ts',
  'POST /api/demo/sign-in': 'foundation/front-door.test.ts',
  'POST /api/session/refresh': 'foundation/sessions.test.ts',
  'POST /api/reset': 'foundation/people.test.ts',
  'POST /api/wall/token': 'foundation/walls.test.ts',
  'DELETE /api/chargers/:id': 'equipment/chargers.test.ts',
  'DELETE /api/meters/:id': 'equipment/meters-and-resistors.test.ts',
  'POST /api/spares/:id/release': 'stock/readings.test.ts',
  'POST /api/charges': 'charges/keep-plan.test.ts',
  'DELETE /api/charges/:id': 'charges/keep-plan.test.ts',
  'POST /api/charges/:id/checks': 'charges/checks.test.ts',
  'POST /api/charges/:id/queue': 'charges/keep-plan.test.ts',
  'POST /api/charges/:id/start': 'charges/checks.test.ts',
  'POST /api/charges/:id/resume': 'charges/hold-and-stop.test.ts',
  'POST /api/charges/:id/next-step': 'charges/steps.test.ts',
  'POST /api/charges/:id/fit': 'charges/lifecycle.test.ts',
  'POST /api/charges/:id/shelve': 'charges/rest-check.test.ts',
  'POST /api/repairs/:id/fit': 'repairs/as-it-is.test.ts',
  'GET /api/bench-plan/places': 'bench-plan/moves.test.ts',
  'POST /api/bench-plan/accept': 'bench-plan/proposal.test.ts',
  'POST /api/bench-plan/move': 'bench-plan/moves.test.ts',
  'POST /api/bench-plan/undo/:id': 'bench-plan/proposal.test.ts',
};

describe('being let in', () => {
  it(`is a 2xx of every route here, but of ${Object.keys(takenElsewhere).length} that other tests see`, () => {
    const refused = routes.map(({ name }) => name).filter((name) => !taken.has(name));
    expect(refused.sort()).toEqual(Object.keys(takenElsewhere).sort());
  });
});

/** Everything the other workshop has, as the database holds it. */
async function othersRows(): Promise<string> {
  const rows: unknown[] = [];
  for (const { tableName, columns } of server.deps.dataSource.entityMetadatas) {
    const column = tableName === 'workshop' ? 'id' : 'workshop_id';
    if (!columns.some(({ databaseName }) => databaseName === column)) continue;
    rows.push([
      tableName,
      await server.deps.dataSource.query(`SELECT * FROM ${tableName} WHERE ${column} = ?`, [other.workshop.id]),
    ]);
  }
  return JSON.stringify(rows);
}

const othersIds = idsOf(other);
/** Fails where an answer holds anything of the other workshop, beyond what the request itself said. */
function expectNothingLeaked(answer: Response, said: string) {
  const text = `${answer.text ?? ''}${JSON.stringify(answer.headers)}`;
  for (const secret of [...othersIds, 'other’s', 'of other', 'other.example.com', 'The other workshop'])
    if (!said.includes(secret)) expect(text, `leaks ${secret}`).not.toContain(secret);
}

const membersRoutes = routes.filter(({ name }) => !['anyone', 'wall'].includes(routeFixtures[name]?.who ?? 'anyone'));

describe('another workshop’s ids', () => {
  const withParams = membersRoutes.filter(({ path, name }) => path.includes(':') && !routeFixtures[name]?.nobodys);
  it.each(withParams.map((route) => [route.name, route] as const))(
    'in the address of %s are not there',
    async (_name, route) => {
      const before = await othersRows();
      const theirs = fitOf(route, other).params ?? {};
      const mine = fitOf(route);
      // All of theirs, and each of theirs among mine.
      const mixes = [theirs, ...Object.entries(theirs).map(([name, value]) => ({ ...mine.params, [name]: value }))];
      for (const params of mixes)
        await isolated(async () => {
          const answer = await ask(server.agentFor('manager'), route, { ...mine, params });
          expect(answer.status, tell(answer)).toBe(404);
          expectNothingLeaked(answer, JSON.stringify(params));
          // The same as for an id that nobody has.
          const unknown = Object.fromEntries(
            Object.entries(params).map(([name, value]) => [
              name,
              othersIds.includes(value) ? 'nobody-has-this' : value,
            ]),
          );
          const invented = await ask(server.agentFor('manager'), route, { ...mine, params: unknown });
          const { requestId: _one, ...told } = answer.body;
          const { requestId: _two, ...toldOfNone } = invented.body;
          expect(told).toEqual(toldOfNone);
          expect(await othersRows()).toBe(before);
        });
    },
  );

  /** The bodies in which one of my ids is replaced by what stands in its place in theirs. */
  function foreignBodies(mine: unknown, theirs: unknown): unknown[] {
    if (typeof mine === 'string' && typeof theirs === 'string')
      return mine !== theirs && othersIds.includes(theirs) ? [theirs] : [];
    if (Array.isArray(mine) && Array.isArray(theirs))
      return mine.flatMap((part, at) => foreignBodies(part, theirs[at]).map((swapped) => mine.with(at, swapped)));
    if (mine !== null && theirs !== null && typeof mine === 'object' && typeof theirs === 'object')
      return Object.entries(mine).flatMap(([name, part]) =>
        foreignBodies(part, (theirs as Record<string, unknown>)[name]).map((swapped) => ({ ...mine, [name]: swapped })),
      );
    return [];
  }
  const named = membersRoutes.flatMap((route) =>
    foreignBodies(fitOf(route).body ?? {}, fitOf(route, other).body ?? {}).map(
      (body) => [route.name, route, body as object] as const,
    ),
  );
  it('stand in the bodies of more than ten requests', () => expect(named.length).toBeGreaterThan(10));
  it.each(named)('in the body of %s are refused', async (_name, route, body) => {
    const before = await othersRows();
    await isolated(async () => {
      const answer = await ask(server.agentFor('manager'), route, { ...fitOf(route), body });
      expect([400, 404], tell(answer)).toContain(answer.status);
      expectNothingLeaked(answer, JSON.stringify(body));
      expect(await othersRows()).toBe(before);
    });
  });
});

describe('what one’s own workshop is told', () => {
  const read = membersRoutes.filter(({ method }) => method === 'get');
  it.each(read.map((route) => [route.name, route] as const))('by %s holds nothing of another', async (name, route) => {
    const answer = await isolated(async () => ask(server.agentFor('manager'), route, fitOf(route)));
    // No better plan is no content; the one charge here is begun and has no other place.
    const expected = { 'GET /api/bench-plan/proposal': 204, 'GET /api/bench-plan/places': 409 }[name] ?? 200;
    expect(answer.status, tell(answer)).toBe(expected);
    expectNothingLeaked(answer, '');
  });

  it.each(['/api/wall/me', '/api/wall/board'])('on its wall by GET %s holds nothing of another', async (path) => {
    expectNothingLeaked(await wall.get(path), '');
  });

  it('the other one is told its own: the search for leaks finds what is there', async () => {
    for (const [path, secret] of [
      ['/api/people', 'of other'],
      ['/api/spares', 'other’s'],
      ['/api/charges?open=1', other.chargeId],
      ['/api/alerts', other.alertId],
      ['/api/board', other.workshop.id],
    ] as const) {
      const answer = await server.agentFor('manager', server.other).get(path);
      expect(answer.text).toContain(secret);
    }
  });
});
