import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { SpareDto } from '@/shared/contract/spare';
import {
  act,
  alertsOf,
  at,
  boardOf,
  capacityAh,
  did,
  high,
  hour,
  low,
  makeBench,
  minute,
  running,
  seen,
  type Bench,
  key,
} from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

/** Ah ÷ A: the charge between two points of the published table, at the set current. */
const ampHours = capacityAh * (high.soc - low.soc);
const secondsAt = (amps: number): number => (ampHours / amps) * 3600;
const kinds = (charge: ChargeDto): string[] => charge.events.map((event) => event.kind);
const openKinds = async (): Promise<string[]> =>
  (await alertsOf(bench)).filter((alert) => alert.clearedAt === null).map((alert) => alert.kind);

describe('from the shelf into the pack', () => {
  test('over and settle at 10 A: 18.8 Ah take 1 h 53 within 1 %, then rest, check, ready, fitted', async () => {
    const spareId = await bench.spare('S-0417');
    let charge = await running(bench, { spareId, repairRef: 'R-2418' });
    expect(charge.stage).toBe('charging');
    expect((at(charge.currentEndAt) - at(charge.startedAt)) / 1000 / secondsAt(10)).toBeCloseTo(1, 2);
    expect(charge.plannedAh / ampHours).toBeCloseTo(1, 2);

    await bench.live(secondsAt(10) * 500);
    charge = await seen(bench, charge.id);
    expect(charge.stage).toBe('charging');
    expect(charge.amps).toBeCloseTo(10, 1);
    expect(charge.deliveredAh / (ampHours / 2)).toBeCloseTo(1, 1);
    expect(charge.groups.every((group) => group.reckoned && group.clipVolts! > group.volts)).toBe(true);

    await bench.live(secondsAt(10) * 500 + 2 * minute);
    charge = await seen(bench, charge.id);
    expect(charge.stage).toBe('resting');
    expect(charge.nextHand).toBe('Switch A1 off');
    expect(await openKinds()).toContain('charge-done');
    const done = (await alertsOf(bench)).find((alert) => alert.kind === 'charge-done')!;
    expect(done.seen).toMatch(/^Switch A1 off: 18\.[678]\u00a0Ah are in\. It does not stop by itself\.$/);
    expect(done.level).toBe('amber');

    charge = await did(bench, charge, 'current-off');
    expect(await openKinds()).not.toContain('charge-done');
    const restS = (at(charge.checkDueAt) - at(charge.currentEndAt)) / 1000;
    expect(restS).toBeGreaterThanOrEqual(3600 - 1);

    await bench.live(restS * 1000 + minute);
    charge = await seen(bench, charge.id);
    expect(charge.stage).toBe('check-due');
    expect(await openKinds()).toEqual(['check-due']);

    charge = await did(bench, charge, 'rest-check', {
      groupVolts: ['3.950', '3,948'],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(charge.stage).toBe('ready');
    expect(charge.restChecks[0]!.verdict.groups.map((group) => Math.round(group.deviationVolts * 1000))).toEqual([
      1, -1,
    ]);
    expect(await openKinds()).toEqual([]);
    expect(charge.groups).toMatchObject([
      { volts: 3.95, reckoned: false },
      { volts: 3.948, reckoned: false },
    ]);

    charge = await did(bench, charge, 'fit', { note: null });
    expect(charge.stage).toBe('fitted');
    const spare = (await bench.as('technician').get(`/api/spares/${spareId}`)).body as SpareDto;
    expect(spare.where).toBe('fitted');
    // Nobody made the look-ins: that they went on to the foreman stands between.
    expect(kinds(charge).filter((kind) => kind !== 'check' && kind !== 'alert')).toEqual([
      'planned',
      'started',
      'resting',
      'current-off',
      'check-due',
      'ready',
      'fitted',
    ]);
    expect((await boardOf(bench)).charges).toEqual([]);
    // Lists of spares and chargers are told as well: the spare has moved, the channel was taken and freed.
    expect(bench.server.hub.of('stock:changed').length).toBeGreaterThanOrEqual(5);
    expect(bench.server.hub.of('equipment:changed').length).toBeGreaterThanOrEqual(3);
  });

  test('on the mark: the current tapers, and the stage says so before it ends', async () => {
    let charge = await running(
      bench,
      { spareId: await bench.spare('S-0417') },
      { finish: 'on-the-mark', channel: 'B1' },
    );
    const taper = at(charge.taperAt);
    const end = at(charge.currentEndAt);
    expect(taper).toBeGreaterThan(at(charge.startedAt));
    expect(end).toBeGreaterThan(taper);
    // Constant current alone would need Ah ÷ A; the taper makes it longer.
    expect(end - at(charge.startedAt)).toBeGreaterThan(secondsAt(20) * 1000);
    await bench.live(taper - bench.server.clock.now() + minute);
    charge = await seen(bench, charge.id);
    expect(charge.stage).toBe('tapering');
    expect(charge.amps!).toBeLessThan(20);
    // The instants shown before are the likely ones; the reckoned run may end a little beside them.
    await bench.live(end - bench.server.clock.now() + (end - taper) / 5);
    charge = await seen(bench, charge.id);
    expect(charge.stage).toBe('resting');
    expect(Math.abs(at(charge.currentEndAt) - end)).toBeLessThan((end - taper) / 5);
    expect(kinds(charge).filter((kind) => ['tapering', 'resting'].includes(kind))).toEqual(['tapering', 'resting']);
    expect((await alertsOf(bench)).find((alert) => alert.kind === 'charge-done')!.level).toBe('tell');
  });

  test('a discharge goes down, its stage says so, and its amps are counted out', async () => {
    const spareId = await bench.spare('S-0388', [high.volts, high.volts]);
    let charge = await running(bench, { spareId, targetVolts: low.volts }, { channel: 'C1' }).catch(() => null);
    // C1 takes one group only: the discharge runs group by group there.
    charge ??= await running(bench, { spareId, targetVolts: low.volts }, { channel: 'C1', way: 'group-by-group' });
    expect(charge.direction).toBe('discharge');
    expect(charge.stage).toBe('discharging');
    expect(charge.amps!).toBeLessThan(0);
    const reading = await bench
      .as('technician')
      .post(`/api/charges/${charge.id}/readings`, { amps: '10.0', terminalVolts: null, celsius: null })
      .set('Idempotency-Key', 'discharge-reading');
    expect((reading.body as ChargeDto).readings[0]!.amps).toBe(-10);
  });
});

describe('whose it is', () => {
  test('a technician hands over what is theirs, a foreman anything; the alerts go with it', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0398') });
    const foremans = await did(bench, charge, 'hand-over', { personId: 'own-foreman' });
    expect(foremans.person?.id).toBe('own-foreman');
    const answer = await act(bench, foremans, 'hand-over', { personId: 'own-technician' });
    expect(answer.status).toBe(403);
    const back = await did(bench, foremans, 'hand-over', { personId: 'own-technician' }, 'foreman');
    expect(back.person?.id).toBe('own-technician');
    expect(back.events.at(-1)!.text).toBe('From Foreman of own to Technician of own.');
  });

  test('nobody of another workshop can have it, nor see it', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0398') });
    expect((await act(bench, charge, 'hand-over', { personId: 'other-technician' })).status).toBe(404);
    const stranger = bench.server.agentFor('manager', bench.server.other);
    await stranger.get(`/api/charges/${charge.id}`).expect(404);
    await stranger
      .post(`/api/charges/${charge.id}/stop`, { reason: 'x' })
      .set('If-Match', `"${charge.rev}"`)
      .set('Idempotency-Key', key())
      .expect(404);
    expect((await seen(bench, charge.id)).stage).toBe('charging');
  });
});

test('the picture of time: hands, current, rest and check follow one another to the likely finish', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0398') });
  await bench.live(hour);
  const card = (await boardOf(bench)).charges[0]!;
  expect(card.id).toBe(charge.id);
  const order = card.segments.map((segment) => segment.kind);
  expect(order.at(-1)).toBe('check');
  expect(order).toContain('cc');
  expect(order).toContain('rest');
  for (const [index, segment] of card.segments.entries()) {
    expect(at(segment.to)).toBeGreaterThan(at(segment.from));
    if (index > 0) expect(Math.abs(at(segment.from) - at(card.segments[index - 1]!.to))).toBeLessThan(1500);
  }
});
