/**
 * Walls are told what changed on their board and put it there themselves. After random changes, and disconnections at
 * random, every wall must show what `GET /api/board`, which is read from the database each time, gives to people.
 */
import http from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { Chance } from '@/tests/calc/reference/worlds';
import { openWall, type WallClient } from '@/tests/support/wall-client';
import { Wall } from '@/server/entities/wall';
import { makeSocketHub, type SocketHub } from '@/server/live/socket-hub';
import { onTheWall, wallOrder } from '@/server/services/board-order';
import { hashToken } from '@/server/services/tokens';
import type { ChargeDto } from '@/shared/contract/charge';
import { boardOf, key, kept, makeBench, minute, running, seen, type Bench } from '../charges/bench';

const WALLS = 8;
const ROUNDS = 12;
const CHANGES_A_ROUND = 12;

let bench: Bench;
let hub: SocketHub;
let web: http.Server;
let port: number;
let walls: WallClient[];
const names = ['A1', 'B1', 'C1', 'D1', 'E1', 'F1'];

beforeEach(async () => {
  bench = await makeBench({ channels: names.map((name) => ({ name })) });
  hub = makeSocketHub(bench.server.deps);
  bench.server.deps.hub = hub;
  web = http.createServer(bench.server.app);
  hub.attach(web);
  await new Promise<void>((resolve) => web.listen(0, '127.0.0.1', resolve));
  port = (web.address() as AddressInfo).port;
  walls = [];
});
afterEach(async () => {
  for (const wall of walls) wall.stop();
  await hub.close();
  await bench.server.close();
});

const pause = (ms: number): Promise<void> => new Promise((resolve) => setTimeout(resolve, ms));

async function addWall(number: number): Promise<WallClient> {
  await bench.server.deps.dataSource.manager.insert(Wall, {
    ...{ id: `wall-${number}`, workshopId: bench.server.own.id, name: `Wall ${number}` },
    ...{ tokenHash: hashToken(`token-${number}`), diagonalInches: null, distanceMetres: null },
    ...{ approvedById: 'own-foreman', createdAt: 0, lastHeardAt: null, revokedAt: null },
  });
  const wall = openWall({ port, cookie: `bidewell_wall=token-${number}`, comeBackMs: { first: 10, last: 100 } });
  walls.push(wall);
  return wall;
}

/** All are connected, ask for nothing, and show the newest revision. */
async function settled(some: readonly WallClient[] = walls): Promise<void> {
  await expect
    .poll(
      async () => {
        const { rev } = await boardOf(bench);
        return some.filter((one) => one.busy() || !one.socket.connected || one.board()?.rev !== rev).length;
      },
      { timeout: 20_000, interval: 20 },
    )
    .toBe(0);
}

/** What people are given, as a wall has to show it. */
async function expected() {
  const { at: _at, charges, ...rest } = await boardOf(bench);
  return { ...rest, charges: wallOrder(charges.filter((card) => onTheWall(card, bench.server.clock.now()))) };
}

async function expectAllToShowIt(what: string): Promise<void> {
  await settled();
  const board = await expected();
  walls.forEach((wall, at) => {
    const { at: _at, ...shown } = wall.board()!;
    expect(shown, `wall ${at + 1} ${what}`).toEqual(board);
  });
}

/** An act at this very instant: a card says what holds when it is read, so the clock stands still within a round. */
const act = (charge: ChargeDto, what: string, body: object = {}) =>
  bench
    .as('technician')
    .post(`/api/charges/${charge.id}/${what}`, body)
    .set('If-Match', `"${charge.rev}"`)
    .set('Idempotency-Key', key());

const logReading = (id: string, celsius: number) =>
  bench
    .as('technician')
    .post(`/api/charges/${id}/readings`, { terminalVolts: null, amps: null, celsius: String(celsius) })
    .set('Idempotency-Key', key());

/** Somebody plans a charge on a channel that is free, or on one that is not: then it waits. */
async function plan(ids: string[], count: number): Promise<number> {
  const spareId = await bench.spare(`N-${count}`);
  const free = (await boardOf(bench)).channels.find((one) => one.chargeTitle === null);
  ids.push((await kept(bench, { spareId }, { channel: free?.name ?? 'A1' })).id);
  return 201;
}

/** The manager changes what stands around the charges. */
async function rename(count: number): Promise<number> {
  const manager = bench.as('manager');
  const { body } = await manager.get('/api/workshop');
  const change = manager.patch('/api/workshop', { name: `The workshop, ${count}` }).set('If-Match', `"${body.rev}"`);
  return (await change).status;
}

type Change = (charge: ChargeDto, ids: string[], count: number) => Promise<number>;
const changes: [share: number, name: string, change: Change][] = [
  [...([0.4, 'reading'] as const), async ({ id }, _ids, count) => (await logReading(id, 18 + (count % 9))).status],
  [0.12, 'hold', async (charge) => (await act(charge, 'hold', { reason: 'The clip is warm' })).status],
  [0.26, 'resume', async (charge) => (await act(charge, 'resume')).status],
  [0.02, 'stop', async (charge) => (await act(charge, 'stop', { reason: 'The pack was collected' })).status],
  [0.06, 'workshop', (_charge, _ids, count) => rename(count)],
  [0.07, 'plan', (_charge, ids, count) => plan(ids, count)],
  [
    ...([0.07, 'person'] as const),
    async (_charge, _ids, count) =>
      (await bench.as('technician').patch('/api/me', { name: `Technician ${count}` })).status,
  ],
];

function drawn(chance: Chance): (typeof changes)[number] {
  let left = chance.uniform();
  return changes.find(([share]) => (left -= share) <= 0) ?? changes[0]!;
}

/** Charges that run, and walls that show them. @returns ids of the charges */
async function opened(): Promise<string[]> {
  const ids: string[] = [];
  for (const [at, name] of names.entries())
    ids.push((await running(bench, { spareId: await bench.spare(`S-${at}`) }, { channel: name })).id);
  for (let number = 1; number <= WALLS; number += 1) await addWall(number);
  await settled();
  return ids;
}

test(
  `${WALLS} walls show what people are given after each of ${ROUNDS} rounds of ${CHANGES_A_ROUND} random changes, every wall cut off now and then`,
  { timeout: 120_000 },
  async () => {
    const chance = new Chance(20_261_203);
    const ids = await opened();
    const taken = new Set<string>();
    const cuts = walls.map(() => 0);
    for (let round = 0; round < ROUNDS; round += 1) {
      await bench.pass(20 * minute);
      for (let n = 0; n < CHANGES_A_ROUND; n += 1) {
        const [, name, change] = drawn(chance);
        const charge = await seen(bench, ids[Math.floor(chance.uniform() * ids.length)]!);
        if ((await change(charge, ids, round * CHANGES_A_ROUND + n)) < 300) taken.add(name);
        if (chance.uniform() < 0.3) {
          const at = Math.floor(chance.uniform() * WALLS);
          cuts[at]! += 1;
          walls[at]!.socket.io.engine.close();
        }
        if (chance.uniform() < 0.2) await hub.beat();
        if (chance.uniform() < 0.5) await pause(chance.uniform() * 30);
      }
      await expectAllToShowIt(`after round ${round + 1}`);
    }
    // All kinds of change were taken, and no wall was left alone.
    expect([...taken].sort()).toEqual(changes.map(([, name]) => name).sort());
    expect(Math.min(...cuts)).toBeGreaterThan(0);
  },
);

test('20 changes while all are connected are put on the walls without their reading the board anew', async () => {
  const [first] = await opened();
  const read = () => walls.reduce((sum, { counts }) => sum + counts.read, 0);
  const before = read();
  for (let n = 0; n < 20; n += 1) await logReading(first!, 20 + (n % 5)).expect(200);
  await expectAllToShowIt('after 20 readings');
  // A heartbeat may come between a commit and its telling; it sends each wall to the board once.
  expect(read() - before).toBeLessThanOrEqual(WALLS);
});

test('a change of which nobody told is on the walls with the next one that is told', async () => {
  const [untold, told] = await opened();
  // Written by somebody whose announcement is lost: the revisions of the next one have a gap.
  bench.server.deps.hub = { ...hub, toWorkshop: () => {} };
  await act(await seen(bench, untold!), 'hold', { reason: 'The clip is warm' }).expect(200);
  bench.server.deps.hub = hub;
  await logReading(told!, 22).expect(200);
  await expectAllToShowIt('after a gap');
  expect(walls[0]!.board()!.charges.find(({ id }) => id === untold)?.stage).toBe('held');
});

test('a wall whose right is taken back among changes gets nothing more, whether it is connected or comes back', async () => {
  const [first] = await opened();
  const [revoked, away, ...others] = walls as [WallClient, WallClient, ...WallClient[]];
  const heard: string[] = [];
  revoked.socket.onAny((event: string) => heard.push(event));
  away.socket.disconnect();
  const shown = away.board()!.rev;
  // The change and the end are on their way together.
  await Promise.all([
    logReading(first!, 22).expect(200),
    bench.as('foreman').delete('/api/walls/wall-1').expect(204),
    bench.as('foreman').delete('/api/walls/wall-2').expect(204),
  ]);
  await expect.poll(() => revoked.socket.connected).toBe(false);
  const until = heard.length;
  expect(heard.at(-1)).toBe('session:ended');
  const refusal = new Promise<string>((resolve) =>
    away.socket.once('connect_error', (error) => resolve(error.message)),
  );
  away.socket.connect();
  expect(await refusal).toBe('signed_out');
  for (let n = 0; n < 5; n += 1) await logReading(first!, 23 + n).expect(200);
  await settled(others);
  expect(heard.slice(until)).toEqual([]);
  expect(away.board()!.rev).toBe(shown);
  for (const number of [1, 2]) {
    const answer = await fetch(`http://127.0.0.1:${port}/api/wall/board`, {
      headers: { cookie: `bidewell_wall=token-${number}` },
    });
    expect(answer.status).toBe(401);
    expect(await answer.text()).not.toContain('charges');
  }
});
