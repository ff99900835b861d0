import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { AlertDto } from '@/shared/contract/alert';
import type { AlertKind } from '@/shared/contract/alert-kinds';
import type { ChargeDto } from '@/shared/contract/charge';
import { alertsOf, at, did, hour, key, makeBench, minute, running, seen, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const until = (instant: number, step = minute) => bench.live(instant - bench.server.clock.now(), step);
const open = async (): Promise<AlertDto[]> => (await alertsOf(bench)).filter((alert) => alert.clearedAt === null);
const raisedCount = (kind: string): number =>
  new Set(
    (bench.server.hub.of('alert:raised') as AlertDto[]).filter((alert) => alert.kind === kind).map((alert) => alert.id),
  ).size;
async function checkDue(more: object = {}): Promise<ChargeDto> {
  const charge = await running(bench, { spareId: await bench.spare('S-0402'), repairRef: 'R-2409', ...more });
  await until(at(charge.currentEndAt) + minute, 5 * minute);
  const off = await did(bench, await seen(bench, charge.id), 'current-off');
  await until(at(off.checkDueAt), 5 * minute);
  return seen(bench, charge.id);
}

describe('one alert a cause', () => {
  test('check due is raised once at its instant, told again after 5 and 15 min under the same id, and cleared by the check', async () => {
    const charge = await checkDue();
    expect(charge.stage).toBe('check-due');
    const [alert] = await open();
    expect(alert).toMatchObject({
      kind: 'check-due',
      level: 'amber',
      title: 'R-2409 at A1',
      seen: 'Rested 1\u00a0h\u00a000.',
      for: { id: 'own-technician' },
      lateByS: 0,
    });
    // That it goes on to the foremen when nobody takes it is told to them alone.
    const told = () =>
      bench.server.hub.told.filter(
        ({ event, personId, payload }) =>
          event === 'alert:raised' && personId === undefined && (payload as AlertDto).id === alert!.id,
      ).length;
    expect(told()).toBe(1);
    await until(at(charge.checkDueAt) + 6 * minute);
    expect(told()).toBe(2);
    await until(at(charge.checkDueAt) + 14 * minute);
    expect(told()).toBe(2);
    await until(at(charge.checkDueAt) + 16 * minute);
    expect(told()).toBe(3);
    await until(at(charge.checkDueAt) + 60 * minute);
    expect(told()).toBe(3);
    expect(raisedCount('check-due')).toBe(1);
    await did(bench, await seen(bench, charge.id), 'rest-check', {
      groupVolts: [3.949, 3.949],
      celsius: 21,
      meterId: null,
    });
    expect(await open()).toEqual([]);
  });

  test('taken, it is not told again', async () => {
    const charge = await checkDue();
    const [alert] = await open();
    await bench.as('technician').post(`/api/alerts/${alert!.id}/take`).expect(200);
    await until(at(charge.checkDueAt) + 20 * minute);
    const told = (bench.server.hub.of('alert:raised') as AlertDto[]).filter((one) => one.id === alert!.id);
    expect(told).toHaveLength(1);
  });

  test('a check 12 min old is check due; after 15 min unattended it is overdue from then on', async () => {
    const charge = await checkDue();
    await until(at(charge.checkDueAt) + 12 * minute);
    expect((await seen(bench, charge.id)).overdueSince).toBeNull();
    await until(at(charge.checkDueAt) + 16 * minute);
    const late = await seen(bench, charge.id);
    expect(at(late.overdueSince)).toBe(at(charge.checkDueAt) + 15 * minute);
    expect((await open()).map((alert) => alert.kind).sort()).toEqual(['check-due', 'overdue']);
  });

  test('late against its plan: the alarm comes when the planned 90 % passes, once, with what was seen and what to check', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-2406' });
    const late = at(charge.plannedReady.late);
    await did(bench, charge, 'hold', { reason: 'no air' });
    await until(late - 2 * minute, 10 * minute);
    expect((await open()).filter((alert) => alert.kind === 'overdue')).toEqual([]);
    await until(late + 22 * minute);
    const now = await seen(bench, charge.id);
    expect(at(now.overdueSince)).toBe(late);
    const alarm = (await open()).find((alert) => alert.kind === 'overdue')!;
    expect(alarm).toMatchObject({ level: 'alarm', title: 'R-2406 at A1' });
    expect(alarm.seen).toMatch(/^It was to be ready by \d\d:\d\d\. Now \d\d:\d\d\.$/);
    expect(alarm.checkFirst).toBe('What R-2406 is held for, then resume or stop it.');
    expect(raisedCount('overdue')).toBe(1);
    await did(bench, now, 'stop', { reason: 'x' });
    expect(await open()).toEqual([]);
  });

  test('a wished time earlier than the plan’s 90 % counts as the promise', async () => {
    const readyBy = new Date(bench.server.clock.now() + 2 * hour).toISOString();
    const charge = await running(bench, { spareId: await bench.spare('S-1'), readyBy });
    expect(at(charge.plannedReady.late)).toBeGreaterThan(at(readyBy));
    await until(at(readyBy) + 3 * minute);
    expect(at((await seen(bench, charge.id)).overdueSince)).toBe(at(readyBy));
  });

  test('each look-in is asked for once, and a reading or a visit clears it', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await until(at(charge.startedAt) + 61 * minute);
    const [first] = (await open()).filter((alert) => alert.kind === 'look-in-due');
    expect(first).toMatchObject({ level: 'tell' });
    expect(first!.title).toBe(`Look-in at ${charge.title}`);
    expect(first!.seen).toMatch(/^A look-in is due\. 10\.0\u00a0A and 7\.\d\d\u00a0V are expected\.$/);
    await did(bench, charge, 'look-ins', { note: '23 °C, clips cool' });
    expect((await open()).filter((alert) => alert.kind === 'look-in-due')).toEqual([]);
    await until(at(charge.startedAt) + 121 * minute);
    expect((await open()).filter((alert) => alert.kind === 'look-in-due')).toHaveLength(1);
    expect(raisedCount('look-in-due')).toBe(2);
  });

  test('a look-in that nobody came for gives way to the next one: one is open', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await until(at(charge.startedAt) + 125 * minute, 5 * minute);
    expect((await open()).filter((alert) => alert.kind === 'look-in-due')).toHaveLength(1);
    expect(raisedCount('look-in-due')).toBe(2);
    const after = await seen(bench, charge.id);
    expect(
      after.lookIns.filter((lookIn) => lookIn.doneAt === null && at(lookIn.dueAt) < bench.server.clock.now()),
    ).toHaveLength(2);
  });

  test('a reading that shows the charge is not done takes the done alert back, and it comes again when it is', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await until(at(charge.currentEndAt) + minute, 5 * minute);
    expect((await open()).map((alert) => alert.kind)).toContain('charge-done');
    const early = new Date(at(charge.startedAt) + minute).toISOString();
    const post = (body: object) =>
      bench.as('technician').post(`/api/charges/${charge.id}/readings`, body).set('Idempotency-Key', key());
    await post({ amps: '6', at: early });
    const back = (await post({ amps: '6' })).body as ChargeDto;
    expect(back.stage).toBe('charging');
    expect(back.events.map((event) => event.kind)).toContain('back');
    expect((await open()).map((alert) => alert.kind)).not.toContain('charge-done');
    await until(at(back.currentEndAt) + minute, 5 * minute);
    expect((await open()).map((alert) => alert.kind)).toContain('charge-done');
    expect(raisedCount('charge-done')).toBe(2);
  });
});

describe('who has it', () => {
  test('one takes it; a colleague who comes second is told who has it', async () => {
    await checkDue();
    const [alert] = await open();
    const [mine, theirs] = await Promise.all([
      bench.as('technician').post(`/api/alerts/${alert!.id}/take`),
      bench.as('foreman').post(`/api/alerts/${alert!.id}/take`),
    ]);
    expect([mine.status, theirs.status].sort()).toEqual([200, 409]);
    const lost = mine.status === 409 ? mine : theirs;
    expect(lost.body).toMatchObject({ code: 'taken_already' });
    expect((await open())[0]!.takenBy).not.toBeNull();
    expect((bench.server.hub.of('alert:changed') as { id: string }[]).map((one) => one.id)).toContain(alert!.id);
  });

  test('passed on it is for the other, who has not taken it yet', async () => {
    await checkDue();
    const [alert] = await open();
    await bench.as('technician').post(`/api/alerts/${alert!.id}/take`).expect(200);
    const passed = await bench.as('technician').post(`/api/alerts/${alert!.id}/pass`, { personId: 'own-foreman' });
    expect(passed.body).toMatchObject({ for: { id: 'own-foreman' }, takenBy: null });
    expect(
      (await bench.as('technician').post(`/api/alerts/${alert!.id}/pass`, { personId: 'other-foreman' })).status,
    ).toBe(404);
  });

  // The look-ins that nobody made before have gone on to the foreman by themselves.
  const toldTo = (personId: string, kind: AlertKind = 'check-due'): AlertDto[] =>
    bench.server.hub.told
      .filter((one) => one.event === 'alert:raised' && one.personId === personId)
      .map((one) => one.payload as AlertDto)
      .filter((one) => one.kind === kind);

  test('passed on after 10 min it rings for the other alone, from then', async () => {
    await checkDue();
    const [alert] = await open();
    expect(alert!.passedAt).toBeNull();
    bench.server.clock.advance(10 * minute);
    const now = bench.server.clock.now();
    await bench.as('technician').post(`/api/alerts/${alert!.id}/pass`, { personId: 'own-foreman' }).expect(200);
    expect(toldTo('own-foreman')).toMatchObject([
      { id: alert!.id, for: { id: 'own-foreman' }, takenBy: null, raisedAt: alert!.raisedAt },
    ]);
    expect(at(toldTo('own-foreman')[0]!.passedAt)).toBe(now);
    expect((await open())[0]!.passedAt).toBe(new Date(now).toISOString());
    expect(toldTo('own-technician')).toEqual([]);
  });

  test('a charge handed over with an open alert rings once for whom it was given to, from then', async () => {
    const charge = await checkDue();
    const [alert] = await open();
    bench.server.clock.advance(3 * minute);
    const now = bench.server.clock.now() + 1;
    await did(bench, await seen(bench, charge.id), 'hand-over', { personId: 'own-foreman' });
    expect(toldTo('own-foreman')).toMatchObject([{ id: alert!.id, for: { id: 'own-foreman' } }]);
    expect(at(toldTo('own-foreman')[0]!.passedAt)).toBe(now);
    expect((bench.server.hub.of('alert:changed') as { id: string }[]).map((one) => one.id)).toContain(alert!.id);
    const again = await seen(bench, charge.id);
    await did(bench, again, 'hand-over', { personId: 'own-foreman' }, 'foreman');
    expect(toldTo('own-foreman')).toHaveLength(1);
  });

  test('nobody of another workshop takes it, or hears of it', async () => {
    await checkDue();
    const [alert] = await open();
    const stranger = bench.server.agentFor('manager', bench.server.other);
    await stranger.post(`/api/alerts/${alert!.id}/take`).expect(404);
    expect((await stranger.get('/api/alerts')).body).toEqual([]);
    const told = bench.server.hub.told.filter((one) => one.event === 'alert:raised');
    expect(new Set(told.map((one) => one.workshopId))).toEqual(new Set(['workshop-own']));
  });

  test('what is settled cannot be taken any more', async () => {
    const charge = await checkDue();
    const [alert] = await open();
    await did(bench, charge, 'rest-check', { groupVolts: [3.949, 3.949], celsius: 21, meterId: null });
    const answer = await bench.as('technician').post(`/api/alerts/${alert!.id}/take`);
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'alert_over' });
  });
});
