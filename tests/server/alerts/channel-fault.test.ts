/** A channel that somebody calls out of order: who hears of it, what is refused until it works again, and that it is told once. */
import { afterEach, beforeEach, expect, test } from 'vitest';
import type { AlertDto } from '@/shared/contract/alert';
import type { ChargeDto } from '@/shared/contract/charge';
import type { ChargerDto } from '@/shared/contract/equipment';
import type { PlanDto } from '@/shared/contract/plan';
import { alertsOf, did, key, kept, makeBench, minute, running, seen, wishOf, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const faults = async (): Promise<AlertDto[]> => (await alertsOf(bench)).filter(({ kind }) => kind === 'channel-fault');
const open = async () => (await faults()).filter(({ clearedAt }) => clearedAt === null);
const fails = (name = 'A1', words = 'No current though it is on') =>
  bench.as('technician').post(`/api/channels/${bench.channels[name]}/fault`, { seen: words });
const works = (name = 'A1') => bench.as('foreman').post(`/api/channels/${bench.channels[name]}/works`, {});
const berlin = (instant: number): string =>
  new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Berlin', timeStyle: 'short' }).format(instant);
const technician = () => bench.server.own.people.technician.name;

test('of a running charge it is an alarm to whoever has the charge, with who said what and when, and what to check first', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-2406' });
  await bench.live(10 * minute);
  const said = bench.server.clock.now();
  const answer = await fails();
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
  const [alert, ...others] = await open();
  expect(others).toEqual([]);
  expect(alert).toMatchObject({
    level: 'alarm',
    chargeId: charge.id,
    title: 'R-2406 at A1',
    seen: `A1 is out of order: No current though it is on. ${technician()} said so at ${berlin(said)}.`,
    checkFirst:
      'That A1 is off at the charger, then the clips and the module for warmth and smell, then hold or stop the charge.',
    lateByS: 0,
  });
  expect(alert!.for?.name).toBe(technician());
  const { events, channels } = await seen(bench, charge.id);
  expect(events.filter(({ kind }) => kind === 'channel-failed')).toMatchObject([
    { text: 'A1 is out of order: No current though it is on.' },
  ]);
  expect(channels).toMatchObject([{ name: 'A1', fault: { seen: 'No current though it is on' } }]);
});

test('said twice it stays one alert, and the second hears who was first', async () => {
  await running(bench, { spareId: await bench.spare('S-1') });
  const said = bench.server.clock.now();
  await fails();
  await bench.live(minute);
  const again = await fails('A1', 'Smoke');
  expect(again.status).toBe(409);
  expect((again.body as { detail: string }).detail).toContain(`${technician()} has said so at ${berlin(said)}`);
  expect(await faults()).toHaveLength(1);
});

test('of a charge that waits for the channel it is no alarm but asks for another channel, and it cannot be started there', async () => {
  const charge = await kept(bench, { spareId: await bench.spare('S-1') });
  await fails();
  expect(await open()).toMatchObject([
    { level: 'amber', chargeId: charge.id, checkFirst: 'Whether A1 works again, then plan it on another channel.' },
  ]);
  const { checks } = await seen(bench, charge.id);
  const ceiling = checks.find(({ code }) => code === 'ceiling');
  expect(ceiling).toMatchObject({ by: 'ruled-out' });
  expect(ceiling!.question).toContain('A1 is out of order');
  const start = await bench
    .as('technician')
    .post(`/api/charges/${charge.id}/start`, {})
    .set('If-Match', `"${(await seen(bench, charge.id)).rev}"`)
    .set('Idempotency-Key', key());
  expect(start.status).toBe(422);
  expect((start.body as { detail: string }).detail).toContain('A1 is out of order');
});

test('no plan offers it, each says why, and all do again once a foreman has said that it works', async () => {
  const spareId = await bench.spare('S-1');
  const plan = async () =>
    (await bench.as('technician').post('/api/plans', wishOf(bench, { spareId })).expect(200)).body as PlanDto;
  const offered = async () => (await plan()).plan.options.flatMap(({ channelIds }) => channelIds);
  expect(await offered()).toContain(bench.channels.A1);
  await fails();
  expect(await offered()).not.toContain(bench.channels.A1);
  expect((await plan()).plan.ruledOut.map(({ reason }) => reason)).toContain(
    'A1 is out of order: No current though it is on. It is offered again once somebody has said that it works.',
  );
  expect((await works()).status).toBe(200);
  expect(await offered()).toContain(bench.channels.A1);
});

test('a held charge is not resumed on it; once it works the alert is over and the charge goes on', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-1') });
  await bench.live(10 * minute);
  await fails();
  const held = await did(bench, await seen(bench, charge.id), 'hold', { reason: 'The channel has failed' });
  const act = (one: Pick<ChargeDto, 'id' | 'rev'>) =>
    bench
      .as('technician')
      .post(`/api/charges/${one.id}/resume`, {})
      .set('If-Match', `"${one.rev}"`)
      .set('Idempotency-Key', key());
  const refused = await act(held);
  expect([refused.status, (refused.body as { code: string }).code]).toEqual([409, 'ruled_out']);
  expect((refused.body as { detail: string }).detail).toContain('A1 is out of order');
  await works();
  expect(await open()).toEqual([]);
  expect((await act(await seen(bench, charge.id))).status).toBe(200);
});

test('a second fault of the same channel is told anew, and a restart of the sleeper tells neither again', async () => {
  await running(bench, { spareId: await bench.spare('S-1') });
  await fails();
  await bench.live(minute);
  await works();
  await bench.live(minute);
  await fails('A1', 'Its fan stands');
  await bench.sleeper.stop();
  await bench.sleeper.start();
  await bench.live(30 * minute);
  const all = await faults();
  expect(all).toHaveLength(2);
  expect(new Set(all.map(({ id }) => id)).size).toBe(2);
});

test('a technician cannot say that it works; it is not of another workshop; a channel without a fault works already', async () => {
  await fails();
  const path = `/api/channels/${bench.channels.A1}/works`;
  await bench.as('technician').post(path, {}).expect(403);
  const charger = (await works()).body as ChargerDto;
  expect(charger.channels.find(({ name }) => name === 'A1')).toMatchObject({ fault: null });
  expect((await works()).status).toBe(409);
  await bench.as('technician').post('/api/channels/unknown/fault', { seen: 'x' }).expect(404);
  await bench.as('technician').post(`/api/channels/${bench.channels.A1}/fault`, { seen: ' ' }).expect(400);
});
