import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { Wall } from '@/server/entities/wall';
import type { AlertDto } from '@/shared/contract/alert';
import type { AlertKind } from '@/shared/contract/alert-kinds';
import type { ChargeDto } from '@/shared/contract/charge';
import { addWall } from '@/tests/support/furnished';
import { alertsOf, at, did, hour, kept, key, makeBench, minute, running, seen, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const now = () => bench.server.clock.now();
const until = (instant: number, step = 5 * minute) => bench.live(instant - now(), step);
const ofKind = async (kind: AlertKind): Promise<AlertDto[]> =>
  (await alertsOf(bench)).filter((alert) => alert.kind === kind);
const open = async (kind: AlertKind) => (await ofKind(kind)).filter(({ clearedAt }) => clearedAt === null);
async function logged(charge: Pick<ChargeDto, 'id'>, reading: object): Promise<void> {
  const answer = await bench
    .as('technician')
    .post(`/api/charges/${charge.id}/readings`, reading)
    .set('Idempotency-Key', key());
  expect(answer.status, JSON.stringify(answer.body)).toBe(200);
}
const berlin = (instant: number): string =>
  new Intl.DateTimeFormat('en-GB', { timeZone: 'Europe/Berlin', timeStyle: 'short' }).format(instant);

describe('too warm', () => {
  test('a reading over the type’s 45 °C is an alarm until it has cooled to 43 °C, and is told anew the next time', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-2406' });
    await bench.live(10 * minute);
    await logged(charge, { celsius: '45', amps: '10' });
    expect((await open('too-warm')).filter(({ seen: text }) => text.includes('may have'))).toEqual([]);
    await bench.live(minute);
    await logged(charge, { celsius: '46', amps: '10' });
    expect(await open('too-warm')).toMatchObject([
      {
        level: 'alarm',
        title: 'R-2406 at A1',
        seen: 'It has warmed to 46\u00a0°C. This type may have 45\u00a0°C.',
        checkFirst: 'Hold the charge, then where it is warmest, the clips there, and whether it still warms.',
      },
    ]);
    await bench.live(minute);
    await logged(charge, { celsius: '44', amps: '10' });
    expect((await open('too-warm')).map(({ seen: text }) => text)).toEqual([
      'It has warmed to 46\u00a0°C. This type may have 45\u00a0°C.',
    ]);
    await bench.live(minute);
    await logged(charge, { celsius: '43', amps: '10' });
    expect((await open('too-warm')).filter(({ seen: text }) => text.includes('may have'))).toEqual([]);
    await bench.live(minute);
    await logged(charge, { celsius: '47', amps: '10' });
    const told = (await ofKind('too-warm')).filter(({ seen: text }) => text.includes('may have'));
    expect(told).toHaveLength(2);
  });
});

describe('over the voltage limit', () => {
  test('of 4.200 V: 4.210 V is not yet, 4.215 V of group 2 is an alarm, until every group is at the limit or under', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-2406' });
    await bench.live(10 * minute);
    await logged(charge, { groupVolts: ['4.190', '4.210'] });
    expect(await open('over-voltage')).toEqual([]);
    await bench.live(minute);
    await logged(charge, { groupVolts: ['4.190', '4.215'] });
    expect(await open('over-voltage')).toMatchObject([
      {
        level: 'alarm',
        seen: 'Group 2 reads 4.215\u00a0V, over the limit of 4.200\u00a0V.',
        checkFirst: 'Switch A1 off, then the group with a second meter, then what the channel is set to.',
      },
    ]);
    await bench.live(minute);
    await logged(charge, { groupVolts: ['4.190', '4.205'] });
    expect(await open('over-voltage')).toHaveLength(1);
    await bench.live(minute);
    await logged(charge, { groupVolts: ['4.190', '4.200'] });
    expect(await open('over-voltage')).toEqual([]);
  });

  test('at the clips of a module of two groups: 8.43 V at the module is an alarm, at the supply the leads explain it', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(10 * minute);
    await logged(charge, { terminalVolts: '8.43', amps: '10', takenAt: 'supply' });
    expect(await open('over-voltage')).toEqual([]);
    await bench.live(minute);
    await logged(charge, { terminalVolts: '8.43', amps: '10', takenAt: 'module' });
    expect((await open('over-voltage')).map(({ seen: text }) => text)).toEqual([
      'The clips read 8.43\u00a0V, over the limit of 8.40\u00a0V.',
    ]);
  });
});

describe('no reading', () => {
  // At 5 A the charge takes four hours.
  beforeEach(async () => {
    await bench.server.close();
    bench = await makeBench({ channels: [{ name: 'A1', maxAmps: 5 }] });
  });

  test('for two look-in intervals and 10 min is told once, from the last reading or the begin, and a reading settles it', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    const begun = at(charge.startedAt);
    await until(begun + 129 * minute);
    expect(await ofKind('no-reading')).toEqual([]);
    await until(begun + 131 * minute, minute);
    expect(await open('no-reading')).toMatchObject([
      { level: 'amber', seen: `No reading from A1 since ${berlin(begun)}. Look in.` },
    ]);
    await logged(charge, { amps: '5' });
    expect(await open('no-reading')).toEqual([]);
    expect(await ofKind('no-reading')).toHaveLength(1);
  });

  test('is not missed while the charge is held, and counts anew from the resumption', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(hour, 10 * minute);
    const held = await did(bench, await seen(bench, charge.id), 'hold', { reason: 'no air' });
    await bench.live(3 * hour, 10 * minute);
    await did(bench, await seen(bench, held.id), 'resume');
    await bench.live(2 * hour, 10 * minute);
    expect(await ofKind('no-reading')).toEqual([]);
  });
});

describe('the latest start', () => {
  test('missed by a charge that only stands in the plan: told once, at the instant, and settled by clipping on', async () => {
    const probe = await kept(bench, { spareId: await bench.spare('S-1') });
    const needs = at(probe.plannedReady.late) - now();
    await bench.as('technician').delete(`/api/charges/${probe.id}`).set('If-Match', `"${probe.rev}"`).expect(204);
    const readyBy = now() + needs + hour;
    const charge = await kept(bench, { spareId: await bench.spare('S-2'), readyBy: new Date(readyBy).toISOString() });
    // An hour is to spare, but for the minutes that the two plans differ by.
    await bench.live(55 * minute);
    expect(await ofKind('latest-start-missed')).toEqual([]);
    await bench.live(10 * minute);
    const [alert] = await open('latest-start-missed');
    expect(alert).toMatchObject({ level: 'amber', title: `${charge.title} at A1` });
    expect(alert!.seen).toMatch(
      new RegExp(`^It had to be clipped on by \\d\\d:\\d\\d to be ready by ${berlin(readyBy)}\\.$`),
    );
    await bench.live(hour, 10 * minute);
    expect(await ofKind('latest-start-missed')).toHaveLength(1);
    await bench.as('technician').delete(`/api/charges/${charge.id}`).set('If-Match', `"${charge.rev}"`);
  });

  test('that was past when it was planned is not told: the plan has said it', async () => {
    const soon = new Date(now() + 30 * minute).toISOString();
    await kept(bench, { spareId: await bench.spare('S-1'), readyBy: soon });
    await bench.live(hour, 10 * minute);
    expect(await ofKind('latest-start-missed')).toEqual([]);
  });
});

describe('the taper', () => {
  test('is told to who has asked for it, and to nobody else', async () => {
    const onTheMark = { finish: 'on-the-mark', channel: 'B1' } as const;
    const silent = await running(bench, { spareId: await bench.spare('S-1') }, onTheMark);
    await until(at(silent.currentEndAt) - minute, 5 * minute);
    expect(await ofKind('taper-begun')).toEqual([]);
    await did(bench, await seen(bench, silent.id), 'stop', { reason: 'enough' });
    const asked = { ways: [{ kind: 'taper-begun', level: 'tell', ways: ['app'] }] };
    await bench.as('technician').patch('/api/me/alert-settings', asked).expect(200);
    const charge = await running(bench, { spareId: await bench.spare('S-2') }, onTheMark);
    await until(at(charge.currentEndAt) - minute, minute);
    expect((await seen(bench, charge.id)).stage).toBe('tapering');
    const [alert] = await ofKind('taper-begun');
    expect(alert!.level).toBe('tell');
    expect(alert!.seen).toMatch(/^The current tapers, \d+\.\d\u00a0A are expected now\. Ready at about \d\d:\d\d\.$/);
    expect(await ofKind('taper-begun')).toHaveLength(1);
  });
});

describe('a wall', () => {
  // 10:00 in Berlin on a Tuesday; the workshop works from 8 to 17.
  const wallOf = async (): Promise<string> => (await addWall(bench.server, bench.as('foreman'), 'Hall')).wallId;
  const heard = (id: string) => bench.server.deps.dataSource.manager.update(Wall, { id }, { lastHeardAt: now() });

  test('that is silent for 10 min in the working hours is told to the foremen, once, until it is heard of again', async () => {
    const id = await wallOf();
    await heard(id);
    const last = now();
    await bench.live(9 * minute);
    expect(await ofKind('wall-unseen')).toEqual([]);
    await bench.live(2 * minute);
    expect(await open('wall-unseen')).toMatchObject([
      {
        level: 'tell',
        chargeId: null,
        title: 'Wall of Hall',
        forRole: 'foreman',
        seen: `It was last heard of at ${berlin(last)}. What it shows is old.`,
      },
    ]);
    await bench.live(hour, 10 * minute);
    expect(await ofKind('wall-unseen')).toHaveLength(1);
    await heard(id);
    await bench.live(minute);
    expect(await open('wall-unseen')).toEqual([]);
  });

  test('that is off by night is told 10 min after the opening, not before', async () => {
    const id = await wallOf();
    bench.server.clock.set(Date.parse('2026-06-09T14:58:00Z'));
    await heard(id);
    await bench.live(16 * hour - 28 * minute, 10 * minute);
    expect(berlin(now())).toBe('08:30');
    const [alert] = await ofKind('wall-unseen');
    expect(berlin(Date.parse(alert!.raisedAt))).toMatch(/^08:1\d$/);
    expect(await ofKind('wall-unseen')).toHaveLength(1);
  });

  test('can be taken and passed on like any other; revoked, it is nobody’s any more', async () => {
    const id = await wallOf();
    await heard(id);
    await bench.live(11 * minute);
    const [alert] = await open('wall-unseen');
    await bench.as('foreman').post(`/api/alerts/${alert!.id}/take`).expect(200);
    await bench.as('foreman').post(`/api/alerts/${alert!.id}/pass`, { personId: 'own-technician' }).expect(200);
    await bench.as('foreman').delete(`/api/walls/${id}`).expect(204);
    await bench.live(minute);
    expect(await open('wall-unseen')).toEqual([]);
  });
});
