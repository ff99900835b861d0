import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { SpareDto } from '@/shared/contract/spare';
import {
  act,
  alertsOf,
  answered,
  at,
  boardOf,
  capacityAh,
  did,
  high,
  hour,
  kept,
  low,
  makeBench,
  minute,
  running,
  seen,
  type Bench,
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
    expect(kinds(charge).filter((kind) => kind !== 'check')).toEqual([
      'planned',
      'started',
      'resting',
      'current-off',
      'check-due',
      'ready',
      'fitted',
    ]);
    expect((await boardOf(bench)).charges).toEqual([]);
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
    await bench.live(end - bench.server.clock.now() + minute);
    charge = await seen(bench, charge.id);
    expect(charge.stage).toBe('resting');
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

describe('the check', () => {
  async function due(): Promise<ChargeDto> {
    const charge = await running(bench, { spareId: await bench.spare('S-0402') });
    await bench.live(at(charge.checkDueAt) - bench.server.clock.now() + minute, 5 * minute);
    return seen(bench, charge.id);
  }

  test('7 mV below is outside: it stays check due with what the group needs', async () => {
    const charge = await due();
    const judged = await did(bench, charge, 'rest-check', {
      groupVolts: [3.951, 3.942],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(judged.stage).toBe('check-due');
    const [, second] = judged.restChecks[0]!.verdict.groups;
    expect(second!.within).toBe(false);
    // The table rises 42.6 mV over 10.43 % about there; 7 mV of 60 Ah are about 1.1 Ah by straight lines.
    expect(second!.ampHoursToGo).toBeGreaterThan(0.8);
    expect(second!.ampHoursToGo).toBeLessThan(1.4);
    expect(judged.events.at(-1)!.text).toMatch(
      /^Group 2 is 7\u00a0mV below, outside\. It needs [\d.]+\u00a0Ah more\.$/,
    );
    expect(await openKinds()).not.toContain('check-due');
  });

  test('the known offset of the meter is taken off before the verdict', async () => {
    const charge = await due();
    const meter = await bench
      .as('manager')
      .post('/api/meters', { name: 'hand 4', offsetMillivolts: 6, checkedAt: null });
    const judged = await did(bench, charge, 'rest-check', {
      groupVolts: [3.955, 3.955],
      celsius: 21,
      meterId: (meter.body as { id: string }).id,
    });
    expect(judged.stage).toBe('ready');
    expect(judged.restChecks[0]!.groupVolts).toEqual([3.955, 3.955]);
    expect(judged.restChecks[0]!.verdict.groups[0]!.volts).toBeCloseTo(3.949, 6);
  });

  test('before the rest is over it counts, and the log says that it was early', async () => {
    const running1 = await running(bench, { spareId: await bench.spare('S-0402') });
    await bench.live(at(running1.currentEndAt) - bench.server.clock.now() + 20 * minute, 5 * minute);
    const judged = await did(bench, await seen(bench, running1.id), 'rest-check', {
      groupVolts: [3.949, 3.949],
      celsius: 21,
      meterId: bench.meterId,
    });
    expect(judged.stage).toBe('ready');
    expect(judged.events.at(-1)!.text).toContain('Checked early, ');
  });

  test('while current flows there is nothing to check', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0402') });
    const answer = await act(bench, charge, 'rest-check', { groupVolts: [3.9, 3.9], celsius: null, meterId: null });
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'wrong_stage', present: { stage: 'charging' } });
  });

  test.each([
    [['3968', '3.968'], 'groupVolts.0', /In millivolts\? Then it is 3\.968/],
    [['39.68', '3.968'], 'groupVolts.0', /A point in the wrong place\?/],
    [['3.968'], 'groupVolts', /This type has 2 groups; 1 voltage was typed\./],
    [['3.9', '3.9', '3.9', '3.9'], 'groupVolts', /This type has 2 groups; 4 voltages were typed\./],
    [['3.968', 'abc'], 'groupVolts.1', /“abc” is no number\. Type it like 3\.968\./],
    [['3.968', ''], 'groupVolts.1', /The voltage is missing\./],
    [['3.968', '-3.9'], 'groupVolts.1', /too little/],
  ])('%j is refused at %s', async (groupVolts, field, sentence) => {
    const charge = await due();
    const answer = await act(bench, charge, 'rest-check', { groupVolts, celsius: null, meterId: null });
    expect(answer.status).toBe(400);
    expect((answer.body as { fields: Record<string, string> }).fields[field]).toMatch(sentence);
    expect((await seen(bench, charge.id)).restChecks).toEqual([]);
  });

  test('a top-up goes on with the same spare from the voltages of the check, and closes the old charge', async () => {
    const charge = await due();
    const outside = await did(bench, charge, 'rest-check', {
      groupVolts: [3.9, 3.899],
      celsius: 21,
      meterId: bench.meterId,
    });
    const topUp = await kept(bench, {
      spareId: outside.spare.id,
      targetVolts: outside.targetTypedVolts,
      meterId: outside.meterId,
      topUpOf: outside.id,
    });
    expect(topUp.topUpOf).toEqual({ id: outside.id, number: outside.number });
    expect(topUp.groups.map((group) => group.volts)).toEqual([3.9, 3.899]);
    // 49 mV to go from 3.900 V are a good third of the first move, so it takes less than half its time.
    expect(topUp.option.ampHours).toBeLessThan(outside.option.ampHours / 2);
    const old = await seen(bench, outside.id);
    expect(old.stage).toBe('shelved');
    expect(old.wentOnAs).toEqual({ id: topUp.id, number: topUp.number });
    expect(old.events.at(-1)!.text).toBe(`Went on as ${topUp.number}.`);
    await did(bench, await answered(bench, topUp), 'start');
  });

  test('a top-up of a charge that nobody has checked is refused', async () => {
    const charge = await due();
    const answer = await bench
      .as('technician')
      .post('/api/charges', {
        spareId: charge.spare.id,
        targetVolts: 3.949,
        toleranceMillivolts: 5,
        meterId: null,
        packCelsius: null,
        readyBy: null,
        clipOnAt: null,
        repairRef: null,
        modulePosition: null,
        optionId: charge.option.id,
        topUpOf: charge.id,
      })
      .set('Idempotency-Key', 'top-up-unchecked');
    expect(answer.status).toBe(409);
    expect((await seen(bench, charge.id)).stage).toBe('check-due');
  });

  test('a spare out of tolerance goes back on the shelf with its place and the voltages of the check', async () => {
    const charge = await due();
    const judged = await did(bench, charge, 'rest-check', { groupVolts: [3.9, 3.9], celsius: 21, meterId: null });
    const shelved = await did(bench, judged, 'shelve', { shelfPlace: 'H2', note: 'channel needed' });
    expect(shelved.stage).toBe('shelved');
    const spare = (await bench.as('technician').get(`/api/spares/${charge.spare.id}`)).body as SpareDto;
    expect(spare).toMatchObject({ where: 'shelf', shelfPlace: 'H2', reading: { groupVolts: [3.9, 3.9] } });
  });
});

describe('hold, resume, stop', () => {
  test('a hold of 30 min moves the end by 30 min, within 1 min', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0388') });
    const end = at(charge.currentEndAt);
    await bench.live(40 * minute);
    let held = await did(bench, await seen(bench, charge.id), 'hold', { reason: 'no room air flow' });
    expect(held).toMatchObject({ stage: 'held', heldFrom: 'charging' });
    const ready = at(held.ready!.likely);
    await bench.live(30 * minute);
    held = await seen(bench, charge.id);
    expect(held.stage).toBe('held');
    // The comb moves with the clock.
    expect(Math.abs(at(held.ready!.likely) - ready - 30 * minute)).toBeLessThan(minute);
    const resumed = await did(bench, held, 'resume');
    expect(resumed.stage).toBe('charging');
    expect(Math.abs(at(resumed.currentEndAt) - end - 30 * minute)).toBeLessThan(minute);
    expect(resumed.events.map((event) => event.text)).toEqual(
      expect.arrayContaining(['Held: no room air flow.', 'Resumed after 30\u00a0min.']),
    );
    await bench.live(at(resumed.currentEndAt) - bench.server.clock.now() + minute);
    expect((await seen(bench, charge.id)).stage).toBe('resting');
  });

  test('a held charge keeps its channel', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0388') });
    await did(bench, charge, 'hold', { reason: 'fan off' });
    const board = await boardOf(bench);
    expect(board.channels.find((channel) => channel.name === 'A1')!.chargeTitle).toBe(charge.title);
  });

  test('what rests is not held', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0388') });
    await bench.live(at(charge.currentEndAt) - bench.server.clock.now() + minute);
    const resting = await seen(bench, charge.id);
    const answer = await act(bench, resting, 'hold', { reason: 'x' });
    expect(answer.status).toBe(409);
    expect((answer.body as { detail: string }).detail).toBe(
      `${charge.title} is resting. Nothing flows that could be held.`,
    );
  });

  test('a hold needs its reason', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0388') });
    const answer = await act(bench, charge, 'hold', { reason: '  ' });
    expect(answer.status).toBe(400);
    expect(answer.body).toMatchObject({ fields: { reason: 'The reason is missing.' } });
  });

  test('stopping frees channel and spare, keeps no reckoned voltage as a reading, and may quarantine', async () => {
    const spareId = await bench.spare('S-0398');
    const charge = await running(bench, { spareId });
    await bench.live(30 * minute);
    const stopped = await did(bench, await seen(bench, charge.id), 'stop', {
      reason: 'Warm, smells, or swollen',
      quarantine: true,
    });
    expect(stopped.stage).toBe('stopped');
    // Half an hour at 10 A.
    expect(stopped.deliveredAh).toBeCloseTo(5, 1);
    expect(stopped.events.at(-1)!.text).toMatch(
      /^Stopped: Warm, smells, or swollen\. 5\.0 of 18\.\d\u00a0Ah in, about 3\.8\d\u00a0V a group by reckoning\. S-0398 is in quarantine\./,
    );
    const spare = (await bench.as('technician').get(`/api/spares/${spareId}`)).body as SpareDto;
    expect(spare.where).toBe('quarantine');
    expect(spare.reading!.groupVolts).toEqual([low.volts, low.volts]);
    const board = await boardOf(bench);
    expect(board.channels.find((channel) => channel.name === 'A1')!.chargeTitle).toBeNull();
    expect(board.charges.map((card) => card.stage)).toEqual(['stopped']);
    await bench.pass(10 * minute + 1000);
    expect((await boardOf(bench)).charges).toEqual([]);
  });

  test('the current was off 20 min earlier than reckoned: the rest counts from then', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0398') });
    await bench.live(at(charge.currentEndAt) - bench.server.clock.now() + 5 * minute);
    const resting = await seen(bench, charge.id);
    const offAt = at(resting.currentEndAt) - 20 * minute;
    const off = await did(bench, resting, 'current-off', { at: new Date(offAt).toISOString() });
    expect(at(off.currentEndAt)).toBe(offAt);
    expect(off.deliveredAh).toBeCloseTo(ampHours - 10 / 3, 1);
    expect(Math.abs(at(off.checkDueAt) - at(resting.checkDueAt) + 20 * minute)).toBeLessThan(2 * minute);
  });

  test.each([
    ['hold', { reason: 'x', at: '2026-06-09T23:00:00.000Z' }, 'is still to come'],
    ['hold', { reason: 'x', at: '2026-06-09T07:00:00.000Z' }, 'lies before the start at 10:00'],
    ['current-off', { at: '2026-06-09T07:00:00.000Z' }, 'lies before the start at 10:00'],
  ])('%s at a time that cannot be is refused at its field', async (what, body, sentence) => {
    const charge = await running(bench, { spareId: await bench.spare('S-0398') });
    bench.server.clock.advance(10 * minute);
    const answer = await act(bench, charge, what, body);
    expect(answer.status).toBe(400);
    expect((answer.body as { fields: { at: string } }).fields.at).toContain(sentence);
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
