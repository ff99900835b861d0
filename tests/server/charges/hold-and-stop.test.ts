import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { SpareDto } from '@/shared/contract/spare';
import {
  act,
  at,
  boardOf,
  capacityAh,
  did,
  high,
  low,
  makeBench,
  minute,
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

/** Ah ÷ A: the charge between two points of the published table, at the set current. */
const ampHours = capacityAh * (high.soc - low.soc);

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
    // In the picture nothing flows between the hold and now; what is to come begins now.
    const current = held.segments.filter((segment) => segment.kind === 'cc');
    expect(current).toHaveLength(2);
    expect(Math.abs(at(current[0]!.to) - at(held.heldAt))).toBeLessThan(10);
    expect(Math.abs(at(current[1]!.from) - bench.server.clock.now())).toBeLessThan(1000);
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

  test('a spare that was stopped on the way is not planned from the reading before: it would be charged twice', async () => {
    const spareId = await bench.spare('S-0398');
    const charge = await running(bench, { spareId, repairRef: 'R-2411' });
    await bench.live(30 * minute);
    await did(bench, await seen(bench, charge.id), 'stop', { reason: 'The channel is needed' });
    const plan = () => bench.as('technician').post('/api/plans', wishOf(bench, { spareId }));
    expect((await plan()).body).toMatchObject({
      code: 'invalid',
      fields: { spareId: 'S-0398 has been on R-2411 since its last reading. Read its groups first.' },
    });
    await bench
      .as('technician')
      .post(`/api/spares/${spareId}/readings`, { groupVolts: [3.85, 3.85], celsius: 21, meterId: bench.meterId });
    expect((await plan()).status).toBe(200);
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
