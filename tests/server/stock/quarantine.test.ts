import { afterEach, beforeEach, expect, test } from 'vitest';
import { ChannelHold } from '@/server/entities/channel-hold';
import type { ChargeDto } from '@/shared/contract/charge';
import type { SpareDto } from '@/shared/contract/spare';
import { act, answered, boardOf, did, hour, kept, makeBench, minute, seen, type Bench } from '../charges/bench';

let bench: Bench;
let spareId: string;
let queued: ChargeDto;
beforeEach(async () => {
  bench = await makeBench();
  spareId = await bench.spare('S-0408');
  const plan = await kept(bench, { spareId, repairRef: 'R-2418' });
  const clipOnAt = new Date(bench.server.clock.now() + 2 * hour).toISOString();
  queued = await did(bench, plan, 'queue', { clipOnAt });
});
afterEach(() => bench.server.close());

const spareNow = async (): Promise<SpareDto> =>
  (await bench.as('technician').get(`/api/spares/${spareId}`).expect(200)).body as SpareDto;

const aside = (body: object, rev = 1) =>
  bench
    .as('technician')
    .post(`/api/spares/${spareId}/quarantine`, { reason: 'Swollen', ...body })
    .set('If-Match', `"${rev}"`);

test('a queued spare is set aside in one act: its charge is off the queue with the reason, its channel free', async () => {
  const { charge, rev } = await spareNow();
  expect(charge).toEqual({ id: queued.id, title: 'R-2418', stage: 'queued', rev: queued.rev });
  bench.server.clock.advance(5 * minute);
  const told = bench.server.hub.told.length;
  const answer = await aside({ condition: 'swollen', shelfPlace: 'Outdoor box, place 2', charge }, rev).expect(200);
  expect(answer.body).toMatchObject({
    where: 'quarantine',
    condition: 'swollen',
    shelfPlace: 'Outdoor box, place 2',
    quarantine: { reason: 'Swollen', by: { name: 'Technician of own' } },
    charge: null,
    rev: rev + 1,
  });
  const stopped = await seen(bench, queued.id);
  expect(stopped).toMatchObject({
    stage: 'stopped',
    stopReason: 'Swollen',
    startedAt: null,
    segments: [],
    ready: null,
  });
  expect(stopped.events.at(-1)).toMatchObject({
    kind: 'stopped',
    by: { name: 'Technician of own' },
    text: 'Taken off before it began: Swollen. S-0408 is in quarantine. R-2418 has no charge now.',
  });
  const holds = await bench.server.deps.dataSource.manager.findBy(ChannelHold, { chargeId: queued.id });
  expect(holds.map(({ state, fromAt }) => [state, fromAt])).toEqual([['released', null]]);
  // Who waits for it sees it on the board for ten minutes; all of the room is told, once each.
  expect((await boardOf(bench)).charges.map(({ id, stage }) => [id, stage])).toEqual([[queued.id, 'stopped']]);
  const events = bench.server.hub.told.slice(told).map(({ workshopId, event }) => [workshopId, event]);
  const room = bench.server.own.id;
  expect(events).toEqual([
    [room, 'board:changed'],
    [room, 'charge:changed'],
    [room, 'stock:changed'],
    [room, 'equipment:changed'],
  ]);
  await bench.pass(11 * minute);
  expect((await boardOf(bench)).charges).toEqual([]);
  // What never ran is no wait, and asks for no new reading.
  const waits = await bench.as('foreman').get('/api/waits').expect(200);
  expect((waits.body as { charges: number }).charges).toBe(0);
});

test('what is left out stays: condition and place', async () => {
  const { charge } = await spareNow();
  expect((await aside({ charge }).expect(200)).body).toMatchObject({ condition: 'sound', shelfPlace: 'D3' });
});

test('a spare that was planned meanwhile is not set aside before its charge has been seen', async () => {
  const answer = await aside({ charge: null }).expect(409);
  expect(answer.body).toMatchObject({
    code: 'spare_on_charge',
    detail: 'S-0408 is queued for R-2418, which falls away with a quarantine. Look at it, then decide.',
    present: { id: spareId, charge: { id: queued.id } },
  });
  expect((await seen(bench, queued.id)).stage).toBe('queued');
});

test('a charge that was changed meanwhile is told with who did it, and neither of the two is touched', async () => {
  const { charge } = await spareNow();
  bench.server.clock.advance(30 * minute);
  const later = new Date(bench.server.clock.now() + 3 * hour).toISOString();
  const moved = await did(bench, queued, 'queue', { clipOnAt: later }, 'foreman');
  const answer = await aside({ charge }).expect(412);
  expect(answer.body).toMatchObject({
    detail: 'Foreman of own queued it at 10:30; this is how it stands now.',
    present: { id: spareId, charge: { rev: moved.rev }, quarantine: null },
    changed: { by: { name: 'Foreman of own' } },
  });
  expect(await seen(bench, queued.id)).toMatchObject({ stage: 'queued', rev: moved.rev });
});

test('a spare that was changed meanwhile answers 412, one whose charge has begun 409, and the charge goes on', async () => {
  const { charge } = await spareNow();
  expect((await aside({ charge }, 7)).status).toBe(412);
  await did(bench, await answered(bench, queued), 'start');
  const answer = await aside({ charge }).expect(409);
  expect(answer.body.detail).toBe('S-0408 is on R-2418. Stop that charge: the quarantine is set with it.');
  expect((await seen(bench, queued.id)).stage).toBe('charging');
});

test('a start and a quarantine at once: exactly one of them happens', async () => {
  const ready = await answered(bench, queued);
  const { charge } = await spareNow();
  const [start, set] = await Promise.all([act(bench, ready, 'start'), aside({ charge })]);
  const spare = await spareNow();
  const { stage } = await seen(bench, queued.id);
  expect([
    [200, 409, 'charging', 'charge'],
    [412, 200, 'stopped', 'quarantine'],
  ]).toContainEqual([start.status, set.status, stage, spare.where]);
});

test('a charge that was dropped meanwhile is no reason not to set the spare aside', async () => {
  const { charge } = await spareNow();
  await bench.as('technician').delete(`/api/charges/${queued.id}`).set('If-Match', `"${queued.rev}"`).expect(204);
  expect((await aside({ charge }).expect(200)).body).toMatchObject({ where: 'quarantine' });
});
