/** What is due at the bench while the server's clock is set, summer time begins or ends, or the workshop moves. */
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import { Alert } from '@/server/entities/alert';
import { alertsOf, at, did, hour, makeBench, minute, running, seen, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const raised = (kind: Alert['kind'], one = bench) => one.server.deps.dataSource.manager.countBy(Alert, { kind });
const dueOf = (charge: ChargeDto) =>
  charge.lookIns.filter(({ doneAt }) => doneAt === null).map(({ dueAt }) => at(dueAt) - at(charge.startedAt));

describe('a server whose clock is set by an hour', () => {
  test('ahead: the look-in that has fallen due 30 min ago is told once, as missed; the later ones stay where they were', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(30 * minute, 5 * minute);
    await bench.pass(hour);
    const after = await seen(bench, charge.id);
    expect(at(after.nextLookInAt) - at(charge.startedAt)).toBe(hour);
    expect(await raised('look-in-missed')).toBe(1);
    expect(dueOf(after)).toEqual([hour, 2 * hour]);
    expect(after.startedAt).toBe(charge.startedAt);
  });

  test('back: a look-in that was made stays made and is asked for no second time; the next comes at its own instant', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(61 * minute, 5 * minute);
    const made = await did(bench, charge, 'look-ins', { note: 'cool' });
    expect(made.lookIns[0]!.doneAt).not.toBeNull();
    await bench.pass(-hour);
    await bench.live(hour + 30 * minute, 5 * minute);
    const after = await seen(bench, charge.id);
    expect(after.lookIns[0]).toEqual(made.lookIns[0]);
    expect(await raised('look-in-due')).toBe(1);
    expect(at(after.nextLookInAt) - at(charge.startedAt)).toBe(2 * hour);
    await bench.live(35 * minute, 5 * minute);
    expect(await raised('look-in-due')).toBe(2);
  });

  test('back, during which somebody looks in: the visit is kept, and no look-in is lost or doubled', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(70 * minute, 5 * minute);
    await bench.pass(-hour);
    const visited = await did(bench, charge, 'look-ins', { note: 'cool' });
    expect(visited.lookIns.filter(({ doneAt }) => doneAt !== null)).toHaveLength(1);
    await bench.live(2 * hour, 5 * minute);
    const times = (await seen(bench, charge.id)).lookIns.map(({ dueAt }) => dueAt);
    expect(new Set(times).size).toBe(times.length);
  });

  test('back and ahead again (a wrong setting that is undone): every due instant is where it was', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(20 * minute, 5 * minute);
    const before = await seen(bench, charge.id);
    await bench.pass(-hour);
    await bench.pass(hour);
    const after = await seen(bench, charge.id);
    for (const what of ['startedAt', 'currentEndAt', 'checkDueAt', 'nextLookInAt'] as const)
      expect(after[what], what).toBe(before[what]);
    expect(await raised('charge-done')).toBe(0);
  });
});

describe('a night of the change of summer time', () => {
  test.each([
    ['forward, 29 March 2026', '2026-03-28T23:40:00.000Z', ['01:40', '03:40']],
    ['back, 25 October 2026', '2026-10-24T23:40:00.000Z', ['02:40', '02:40']],
  ])('%s: look-ins come an hour apart, and are told by the clock on the wall', async (_, start, clocks) => {
    const night = await makeBench({ now: Date.parse(start) });
    try {
      const charge = await running(night, { spareId: await night.spare('S-1') });
      const first = at(charge.lookIns[0]!.dueAt);
      const told: string[] = [];
      const wall = new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Berlin', hour: '2-digit', minute: '2-digit' });
      for (let place = 0; place < 2; place++) {
        const due = first + place * hour;
        await night.live(due - night.server.clock.now() + 1000, 10 * minute);
        expect(await raised('look-in-due', night)).toBe(place + 1);
        const now = await seen(night, charge.id);
        expect(at(now.nextLookInAt)).toBe(due);
        told.push(wall.format(due));
        await did(night, now, 'look-ins', { note: null });
      }
      expect(told).toEqual(clocks);
    } finally {
      await night.server.close();
    }
  });
});

describe('a workshop that changes its zone while a charge runs', () => {
  test('moves no instant, and tells them by the new clock', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(10 * minute, 5 * minute);
    const before = await seen(bench, charge.id);
    const manager = bench.as('manager');
    const settings = (await manager.get('/api/workshop')).body as { rev: number };
    const moved = await manager
      .patch('/api/workshop', { zone: 'America/New_York' })
      .set('If-Match', `"${settings.rev}"`);
    expect(moved.status, JSON.stringify(moved.body)).toBe(200);
    const after = await seen(bench, charge.id);
    for (const what of ['startedAt', 'clipOnAt', 'currentEndAt', 'checkDueAt', 'nextLookInAt', 'ready'] as const)
      expect(after[what], what).toEqual(before[what]);
    expect(dueOf(after)).toEqual(dueOf(before));
    await bench.live(at(after.nextLookInAt) - bench.server.clock.now() + 1000, 5 * minute);
    expect(await raised('look-in-due')).toBe(1);
    // The alert at the end of current says when the check is due: by New York's clock, six hours behind Berlin's.
    await bench.live(at(after.currentEndAt) - bench.server.clock.now() + minute, 5 * minute);
    const done = (await alertsOf(bench)).find(({ kind }) => kind === 'charge-done')!;
    const hourOf = (zone: string) =>
      new Intl.DateTimeFormat('en-GB', { timeZone: zone, hour: '2-digit' }).format(at(after.checkDueAt));
    expect(`${done.seen} ${done.checkFirst}`).toContain(`check due ${hourOf('America/New_York')}:`);
    expect(`${done.seen} ${done.checkFirst}`).not.toContain(`${hourOf('Europe/Berlin')}:`);
  });
});

describe('a phone whose clock is 7 min off, uncorrected', () => {
  test('ahead: a reading of the future is refused with the clock’s time, not taken at a wrong one', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.pass(30 * minute);
    const ahead = new Date(bench.server.clock.now() + 7 * minute).toISOString();
    const answer = await bench
      .as('technician')
      .post(`/api/charges/${charge.id}/readings`, { amps: '10', at: ahead })
      .set('Idempotency-Key', 'ahead-by-7-minutes');
    expect(answer.status).toBe(400);
    expect((answer.body as { fields: Record<string, string> }).fields.at).toMatch(/^10:37 is still to come\./);
  });

  test('up to a minute off is the network’s: it is taken as now, and never before the start', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    const early = new Date(at(charge.startedAt) - 20_000).toISOString();
    const taken = await did(bench, charge, 'readings', { amps: '10', at: early });
    expect(taken.readings[0]!.at).toBe(charge.startedAt);
  });
});
