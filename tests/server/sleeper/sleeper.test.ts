import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { seededRandom } from '@/calc/index';
import { makeDataSource } from '@/server/data-source';
import { instantOf, secondsOf } from '@/server/services/charge-clock';
import { Alert } from '@/server/entities/alert';
import { Charge } from '@/server/entities/charge';
import { makeSleeper } from '@/server/live/sleeper-loop';
import type { Deps } from '@/server/deps';
import { makeRecordingHub, makeTestClock } from '@/tests/support/server';
import type { AlertDto } from '@/shared/contract/alert';
import {
  alertsOf,
  answered,
  at,
  did,
  hour,
  kept,
  key,
  makeBench,
  minute,
  running,
  sameSamples,
  seen,
  type Bench,
} from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(async () => {
  vi.useRealTimers();
  await bench.server.close();
});

const openKinds = async (): Promise<string[]> =>
  (await alertsOf(bench)).filter((alert) => alert.clearedAt === null).map((alert) => alert.kind);

describe('a restart', () => {
  /** The same database under a new process: nothing but the rows is left. */
  function restarted() {
    const hub = makeRecordingHub();
    const deps: Deps = { ...bench.server.deps, hub };
    const sleeper = makeSleeper(deps);
    return { hub, sleeper };
  }

  test('in the middle of the current: the next process goes on, and raises each alert once', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    bench.server.clock.set(at(charge.currentEndAt) + minute);
    const first = restarted();
    await first.sleeper.runDue();
    expect((await seen(bench, charge.id)).stage).toBe('resting');
    const second = restarted();
    await second.sleeper.runDue();
    await second.sleeper.runDue();
    const raised = [...first.hub.of('alert:raised'), ...second.hub.of('alert:raised')] as AlertDto[];
    expect(raised.filter((alert) => alert.kind === 'charge-done')).toHaveLength(1);
    expect(await bench.server.deps.dataSource.manager.countBy(Alert, { kind: 'charge-done' })).toBe(1);
  });

  test('off for 5 h over end of current and rest: what is due is told once and marked late; the log has each instant', async () => {
    const again = await running(bench, { spareId: await bench.spare('S-2') }, { channel: 'B1', finish: 'on-the-mark' });
    const end = at(again.currentEndAt);
    const due = at(again.checkDueAt);
    bench.server.clock.set(due + 40 * minute);
    const next = restarted();
    await next.sleeper.runDue();
    const now = await seen(bench, again.id);
    expect(now.stage).toBe('check-due');
    const alert = (await alertsOf(bench)).find((one) => one.kind === 'check-due' && one.chargeId === again.id)!;
    expect(alert.lateByS).toBeGreaterThan(37 * 60);
    expect(alert.lateByS).toBeLessThan(45 * 60);
    expect(alert.seen).toMatch(/Told (3[7-9]|4[0-5])\u00a0min late\.$/);
    const instants = Object.fromEntries(now.events.map((event) => [event.kind, at(event.at)]));
    expect(Math.abs(instants.resting! - end)).toBeLessThan(5 * minute);
    expect(Math.abs(instants['check-due']! - due)).toBeLessThan(5 * minute);
    expect(at(alert.raisedAt) - alert.lateByS * 1000).toBeCloseTo(instants['check-due']!, -4);
    expect(instants.tapering!).toBeLessThan(instants.resting!);
  });

  test('killed between the commit and the telling: the alert is in the database, once, and is not raised again', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    bench.server.clock.set(at(charge.currentEndAt) + minute);
    const dying = makeSleeper({
      ...bench.server.deps,
      hub: {
        ...makeRecordingHub(),
        toWorkshop: () => {
          throw new Error('the process is gone');
        },
      },
    });
    await dying.runDue();
    const next = restarted();
    await next.sleeper.runDue();
    expect(await openKinds()).toContain('charge-done');
    expect(await bench.server.deps.dataSource.manager.countBy(Alert, { kind: 'charge-done' })).toBe(1);
  });

  test('on a file, closed and opened anew: a charge goes on to its check', async () => {
    const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'bidewell-sleeper-'));
    try {
      const file = path.join(folder, 'bidewell.sqlite');
      const charge = await running(bench, { spareId: await bench.spare('S-1') });
      await bench.server.deps.dataSource.query(`VACUUM INTO '${file}'`);
      const clock = makeTestClock(at(charge.currentEndAt) + minute);
      for (let start = 0; start < 3; start += 1) {
        const dataSource = await makeDataSource(file).initialize();
        const sleeper = makeSleeper({ ...bench.server.deps, dataSource, clock, hub: makeRecordingHub() });
        await sleeper.runDue();
        await sleeper.stop();
        if (start === 2) {
          const row = await dataSource.manager.findOneByOrFail(Charge, { id: charge.id });
          expect(row.stage).toBe('check-due');
          expect(await dataSource.manager.countBy(Alert, { kind: 'check-due' })).toBe(1);
          expect(await dataSource.manager.countBy(Alert, { kind: 'charge-done' })).toBe(1);
        }
        await dataSource.destroy();
        clock.advance(40 * minute);
      }
    } finally {
      fs.rmSync(folder, { recursive: true, force: true });
    }
  });
});

describe('a clock that is set', () => {
  test('one hour ahead: what is due by it happens once', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(at(charge.currentEndAt) - bench.server.clock.now() - 30 * minute, 5 * minute);
    await bench.pass(hour);
    expect((await seen(bench, charge.id)).stage).toBe('resting');
    expect((await openKinds()).filter((kind) => kind === 'charge-done')).toHaveLength(1);
  });

  test('one hour back: no stage is undone, no alert comes twice, and everything goes on when the clock has caught up', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(at(charge.currentEndAt) - bench.server.clock.now() + 5 * minute, 5 * minute);
    expect((await seen(bench, charge.id)).stage).toBe('resting');
    await bench.pass(-hour);
    expect((await seen(bench, charge.id)).stage).toBe('resting');
    const logged = await bench
      .as('technician')
      .post(`/api/charges/${charge.id}/readings`, { celsius: '22' })
      .set('Idempotency-Key', key());
    expect(logged.status).toBe(200);
    expect((await seen(bench, charge.id)).stage).toBe('resting');
    await bench.live(3 * hour, 10 * minute);
    expect((await seen(bench, charge.id)).stage).toBe('check-due');
    for (const kind of ['charge-done', 'check-due'] as const)
      expect(await bench.server.deps.dataSource.manager.countBy(Alert, { kind })).toBe(1);
  });

  test.each([
    ['forward, 29 March 2026', '2026-03-29T00:30:00.000Z'],
    ['back, 25 October 2026', '2026-10-25T00:30:00.000Z'],
  ])('the change of summer time (%s) changes no duration', async (_, start) => {
    const night = await makeBench({ now: Date.parse(start) });
    try {
      const begun = async (one: Bench) => {
        const plan = await answered(one, await kept(one, { spareId: await one.spare('S-1') }));
        await sameSamples(one);
        return did(one, plan, 'start');
      };
      const charge = await begun(night);
      const day = await begun(bench);
      expect(at(charge.currentEndAt) - at(charge.startedAt)).toBe(at(day.currentEndAt) - at(day.startedAt));
      await night.live(at(charge.currentEndAt) - night.server.clock.now() + minute, 5 * minute);
      expect((await seen(night, charge.id)).stage).toBe('resting');
    } finally {
      await night.server.close();
    }
  });
});

describe('the loop', () => {
  test('wakes by itself at the due instant, with no client connected', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    vi.useFakeTimers({ now: bench.server.clock.now(), toFake: ['setTimeout', 'clearTimeout', 'Date'] });
    const sleeper = makeSleeper({ ...bench.server.deps, clock: { now: () => Date.now() } });
    await sleeper.start();
    await vi.advanceTimersByTimeAsync(at(charge.currentEndAt) - Date.now() + 5 * minute);
    // The wake's own work runs on real ticks.
    await vi.waitFor(async () => {
      const row = await bench.server.deps.dataSource.manager.findOneByOrFail(Charge, { id: charge.id });
      expect(row.stage).toBe('resting');
    });
    await sleeper.stop();
  });

  test('looks at the clock at least every 30 s, so that a clock set ahead is noticed', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    vi.useFakeTimers({ toFake: ['setTimeout', 'clearTimeout'] });
    const sleeper = makeSleeper(bench.server.deps);
    await sleeper.start();
    bench.server.clock.set(at(charge.currentEndAt) + 5 * minute);
    await vi.advanceTimersByTimeAsync(30_000);
    await vi.waitFor(async () => {
      const row = await bench.server.deps.dataSource.manager.findOneByOrFail(Charge, { id: charge.id });
      expect(row.stage).toBe('resting');
    });
    await sleeper.stop();
  });

  test('a charge that cannot be reckoned holds up no other', async () => {
    const broken = await running(bench, { spareId: await bench.spare('S-1') });
    const sound = await running(bench, { spareId: await bench.spare('S-2') }, { channel: 'B1' });
    await bench.server.deps.dataSource.query(`UPDATE charge SET frozen = '{}' WHERE id = ?`, [broken.id]);
    bench.server.clock.set(at(sound.currentEndAt) + 5 * minute);
    await bench.sleeper.runDue();
    const row = await bench.server.deps.dataSource.manager.findOneByOrFail(Charge, { id: sound.id });
    expect(row.stage).toBe('resting');
    // It is tried again later, and does not spin.
    expect(await bench.sleeper.runDue()).toBe(0);
  });

  test('looks once a minute, not without a pause, at a charge whose current still flows when it was to have ended', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(at(charge.currentEndAt) - bench.server.clock.now() - 30_000, 5 * minute);
    await bench.live(at((await seen(bench, charge.id)).currentEndAt) - bench.server.clock.now() - 1);
    await did(bench, charge, 'readings', { amps: '10' });
    const looks: number[] = [];
    for (let look = 0; look < 12; look += 1) {
      const row = await bench.server.deps.dataSource.manager.findOneByOrFail(Charge, { id: charge.id });
      if (row.stage !== 'charging') break;
      bench.server.clock.set(row.nextDueAt!);
      looks.push(row.nextDueAt!);
      await bench.sleeper.runDue();
    }
    const pauses = looks.slice(1).map((look, place) => look - looks[place]!);
    expect(pauses).toHaveLength(11);
    // The first look is at the end that was reckoned, a moment after the reading.
    for (const pause of pauses.slice(1)) expect(pause).toBe(minute);
  });

  test('does nothing where nothing is due', async () => {
    await running(bench, { spareId: await bench.spare('S-1') });
    const told = bench.server.hub.told.length;
    expect(await bench.sleeper.runDue()).toBe(0);
    expect(bench.server.hub.told).toHaveLength(told);
  });
});

test('an instant of the reckoning has come when its millisecond has: 20 000 odd ends of current are all over by then', () => {
  const random = seededRandom(3);
  for (let count = 0; count < 20_000; count += 1) {
    const charge = { startedAt: 1_780_000_000_000 + Math.floor(random() * 1e9) };
    const seconds = random() < 0.5 ? Math.round(random() * 2e7) / 1000 + 3600 : random() * 20_000 + random() / 3;
    const at = instantOf(charge, seconds);
    expect(secondsOf(charge, at)).toBeGreaterThanOrEqual(seconds);
    expect(at - charge.startedAt - seconds * 1000).toBeLessThan(1.1);
  }
});
