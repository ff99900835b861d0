import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto } from '@/shared/contract/plan';
import {
  act,
  answered,
  at,
  did,
  hour,
  kept,
  key,
  makeBench,
  minute,
  planned,
  running,
  seen,
  wishOf,
  type Bench,
} from './bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const keep = (spareId: string, optionId: string, more: object = {}) =>
  bench
    .as('technician')
    .post('/api/charges', { ...wishOf(bench, { spareId }), optionId, ...more })
    .set('Idempotency-Key', key());

describe('keeping a plan', () => {
  test('the charge carries the option and its band, and numbers count up from C-0001', async () => {
    const first = await bench.spare('S-0001');
    const option = await planned(bench, { spareId: first });
    const charge = await kept(bench, { spareId: first, repairRef: 'R-2418' });
    expect(charge).toMatchObject({ number: 'C-0001', title: 'R-2418', stage: 'planned', way: 'terminals' });
    expect(charge.option.id).toBe(option.id);
    expect(at(charge.plannedReady.likely) - at(charge.clipOnAt)).toBeCloseTo(option.totalS.p50 * 1000, -1);
    expect(at(charge.plannedReady.early)).toBeLessThanOrEqual(at(charge.plannedReady.likely));
    expect(at(charge.plannedReady.likely)).toBeLessThanOrEqual(at(charge.plannedReady.late));
    expect(charge.events.map((event) => event.kind)).toEqual(['planned']);
    expect(charge.person?.id).toBe('own-technician');

    const second = await kept(bench, { spareId: await bench.spare('S-0002') });
    expect(second).toMatchObject({ number: 'C-0002', title: 'C-0002' });
  });

  test('numbers of another workshop count apart', async () => {
    await kept(bench, { spareId: await bench.spare('S-0001') });
    const otherBoard = await bench.server.agentFor('technician', bench.server.other).get('/api/board');
    expect((otherBoard.body as { charges: unknown[] }).charges).toEqual([]);
  });

  test('an option that the bench no longer offers is answered 409 with the plan as it is now, and nothing is kept', async () => {
    const spareId = await bench.spare('S-0001');
    const answer = await keep(spareId, 'terminals/over-and-settle/gone');
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'option_gone' });
    expect((answer.body as { present: PlanDto }).present.plan.options.length).toBeGreaterThan(0);
    const list = await bench.as('technician').get('/api/charges?open=1');
    expect(list.body).toEqual([]);
  });

  test('a spare has one open charge: the second keep is answered 409 with who has it', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await kept(bench, { spareId, repairRef: 'R-2418' });
    const answer = await keep(spareId, charge.option.id);
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({
      code: 'spare_taken',
      present: { chargeId: charge.id, title: 'R-2418', stage: 'planned' },
    });
    expect((answer.body as { detail: string }).detail).toContain('R-2418');
  });

  test('of 50 that keep the same spare at once exactly one is kept', async () => {
    const spareId = await bench.spare('S-0001');
    const option = await planned(bench, { spareId });
    const answers = await Promise.all(Array.from({ length: 50 }, () => keep(spareId, option.id)));
    expect(answers.filter((answer) => answer.status === 201)).toHaveLength(1);
    expect(answers.filter((answer) => answer.status === 409)).toHaveLength(49);
  });

  test('the same key gives the same charge again, another body under it is refused', async () => {
    const spareId = await bench.spare('S-0001');
    const option = await planned(bench, { spareId });
    const send = (more: object) =>
      bench
        .as('technician')
        .post('/api/charges', { ...wishOf(bench, { spareId }), optionId: option.id, ...more })
        .set('Idempotency-Key', 'once-and-for-all');
    const first = await send({});
    const again = await send({});
    expect(again.status).toBe(201);
    expect((again.body as ChargeDto).id).toBe((first.body as ChargeDto).id);
    expect((await send({ repairRef: 'R-1' })).status).toBe(422);
  });

  test('a spare that the numbers rule out is refused with the reason', async () => {
    const spareId = await bench.spare('S-0391', [2.41, 2.894]);
    const answer = await keep(spareId, `terminals/over-and-settle/${bench.channels.A1}`);
    expect(answer.status).toBe(422);
    expect(answer.body).toMatchObject({ code: 'ruled_out' });
    expect((answer.body as { detail: string }).detail).toContain('2.410');
  });

  test('a later reading within ±5 mV does not touch a charge that exists', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await answered(bench, await kept(bench, { spareId }));
    await read(spareId, [3.807, 3.797]);
    const now = await seen(bench, charge.id);
    expect(now.option).toEqual(charge.option);
    expect(now.groups.map((group) => group.volts)).toEqual([3.802, 3.802]);
    expect(now).toMatchObject({ startBlockedBy: null, planAgain: false });
    expect((await did(bench, now, 'start')).stage).toBe('charging');
  });
});

const read = async (spareId: string, groupVolts: number[]) => {
  bench.server.clock.advance(minute);
  await bench
    .as('technician')
    .post(`/api/spares/${spareId}/readings`, { groupVolts, celsius: 21, meterId: bench.meterId })
    .expect(201);
};

describe('a spare that reads something else than it was planned with', () => {
  test('3.900 V in place of 3.802 V: the timer is not started, and the meter is asked for 7.800 V', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await answered(bench, await kept(bench, { spareId }));
    expect(charge.startBlockedBy).toBeNull();
    await read(spareId, [3.9, 3.9]);
    const moved = await seen(bench, charge.id);
    expect(moved).toMatchObject({ startBlockedBy: 'It reads 3.900\u00a0V now. Plan it again.', planAgain: true });
    expect(moved.checks.find((item) => item.code === 'polarity')!.yes).toBe('Red on plus, 7.800\u00a0V');
    const refused = await act(bench, moved, 'start');
    expect(refused.status).toBe(422);
    expect(refused.body).toMatchObject({ code: 'spare_moved', detail: 'It reads 3.900\u00a0V now. Plan it again.' });
    expect((await seen(bench, charge.id)).stage).toBe('planned');
  });

  test('one group by 6 mV is enough, and is named; said before anything has to be answered', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await kept(bench, { spareId });
    await read(spareId, [3.802, 3.808]);
    expect((await seen(bench, charge.id)).startBlockedBy).toBe('Group 2 reads 3.808\u00a0V now. Plan it again.');
  });

  test('read back to what it was, it may start', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await answered(bench, await kept(bench, { spareId }));
    await read(spareId, [3.9, 3.9]);
    await read(spareId, [3.803, 3.802]);
    expect(await seen(bench, charge.id)).toMatchObject({ startBlockedBy: null, planAgain: false });
  });

  test('it is planned again in place of the old plan, which is dropped, from the 3.900 V', async () => {
    const spareId = await bench.spare('S-0001');
    const old = await kept(bench, { spareId });
    await read(spareId, [3.9, 3.9]);
    const option = await planned(bench, { spareId });
    expect((await keep(spareId, option.id)).body).toMatchObject({ code: 'spare_taken' });
    const answer = await keep(spareId, option.id, { insteadOf: old.id });
    expect(answer.status, JSON.stringify(answer.body)).toBe(201);
    const charge = answer.body as ChargeDto;
    expect(charge.groups.map((group) => group.volts)).toEqual([3.9, 3.9]);
    expect(charge.option.ampHours).toBeLessThan(old.option.ampHours);
    expect(charge.events[0]!.text).toMatch(/ In place of C-0001\.$/);
    await bench.as('technician').get(`/api/charges/${old.id}`).expect(404);
    expect((await did(bench, await answered(bench, charge), 'start')).stage).toBe('charging');
  });

  test('a plan that was begun meanwhile is not replaced, nor one of another spare', async () => {
    const spareId = await bench.spare('S-0001');
    const other = await bench.spare('S-0002');
    const option = await planned(bench, { spareId });
    const begun = await running(bench, { spareId });
    const refused = await keep(spareId, option.id, { insteadOf: begun.id });
    expect(refused.status).toBe(409);
    expect(refused.body).toMatchObject({ code: 'wrong_stage', present: { stage: 'charging' } });
    const wrong = await keep(other, option.id, { insteadOf: begun.id });
    expect(wrong.status).toBe(400);
    expect((await seen(bench, begun.id)).stage).toBe('charging');
  });
});

describe('queueing and dropping', () => {
  test('a clip-on time moves the whole band with it', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0001') });
    const clipOnAt = new Date(bench.server.clock.now() + 2 * hour).toISOString();
    const queued = await did(bench, charge, 'queue', { clipOnAt });
    expect(queued.stage).toBe('queued');
    expect(queued.clipOnAt).toBe(clipOnAt);
    const shift = at(queued.plannedReady.likely) - at(charge.plannedReady.likely);
    expect(shift).toBe(2 * hour);
  });

  test('a time that has passed is refused at its field', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0001') });
    const clipOnAt = new Date(bench.server.clock.now() - hour).toISOString();
    const answer = await act(bench, charge, 'queue', { clipOnAt });
    expect(answer.status).toBe(400);
    expect(answer.body).toMatchObject({ fields: { clipOnAt: 'This time has passed. Type a later one.' } });
  });

  test('a wait for the channel gets shorter by as much as the clip-on gets later', async () => {
    const first = await running(bench, { spareId: await bench.spare('S-0001') });
    const second = await kept(bench, { spareId: await bench.spare('S-0002') });
    const waitS = second.option.queueS;
    expect(waitS).toBeGreaterThan(600);
    const clipOnAt = new Date(bench.server.clock.now() + 10 * minute).toISOString();
    const queued = await did(bench, second, 'queue', { clipOnAt });
    expect(queued.option.queueS).toBeCloseTo(waitS - 600, 0);
    expect(at(queued.plannedReady.likely)).toBeCloseTo(at(second.plannedReady.likely), -3);
    expect(first.stage).toBe('charging');
  });

  test('a planned charge is dropped and its spare is free again; a running one is not dropped', async () => {
    const spareId = await bench.spare('S-0001');
    const charge = await kept(bench, { spareId });
    const drop = (one: ChargeDto) =>
      bench.as('technician').delete(`/api/charges/${one.id}`).set('If-Match', `"${one.rev}"`);
    await drop(charge).expect(204);
    await bench.as('technician').get(`/api/charges/${charge.id}`).expect(404);
    const again = await did(bench, await answered(bench, await kept(bench, { spareId })), 'start');
    const answer = await drop(again);
    expect(answer.status).toBe(409);
    expect(answer.body).toMatchObject({ code: 'wrong_stage' });
  });
});
