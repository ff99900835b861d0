import { afterEach, beforeEach, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { PlanDto } from '@/shared/contract/plan';
import type { SpareDto, SpareHistoryDto } from '@/shared/contract/spare';
import {
  act,
  answered,
  at,
  did,
  hour,
  kept,
  key,
  low,
  makeBench,
  minute,
  running,
  seen,
  wishOf,
  type Bench,
} from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const spareNow = async (id: string): Promise<SpareDto> =>
  (await bench.as('technician').get(`/api/spares/${id}`).expect(200)).body as SpareDto;
/** What every way to read a spare says of its last reading. */
async function movedBy(id: string): Promise<string | null> {
  const list = (await bench.as('technician').get('/api/spares').expect(200)).body as SpareDto[];
  const history = (await bench.as('technician').get(`/api/spares/${id}/history`).expect(200)).body as SpareHistoryDto;
  const said = [(await spareNow(id)).reading, list.find((spare) => spare.id === id)?.reading, history.readings[0]].map(
    (reading) => reading?.movedBy?.title ?? null,
  );
  expect(new Set(said).size, JSON.stringify(said)).toBe(1);
  return said[0] ?? null;
}
const read = (id: string, groupVolts: number[]) =>
  bench
    .as('technician')
    .post(`/api/spares/${id}/readings`, { groupVolts, celsius: 21, meterId: bench.meterId, note: null });
const plan = (spareId: string, targetVolts?: number) =>
  bench
    .as('technician')
    .post('/api/plans', wishOf(bench, targetVolts === undefined ? { spareId } : { spareId, targetVolts }));

test('a reading is of before the charge that was begun after it, until the spare is read again', async () => {
  const spareId = await bench.spare('S-0001');
  expect(await movedBy(spareId)).toBeNull();
  const charge = await running(bench, { spareId, repairRef: 'R-1' });
  expect(await movedBy(spareId)).toBe('R-1');
  bench.server.clock.advance(20 * minute);
  await did(bench, charge, 'stop', { reason: 'The channel is needed' });
  expect(await movedBy(spareId)).toBe('R-1');
  const refused = await plan(spareId).expect(400);
  expect(refused.body.fields).toEqual({
    spareId: 'S-0001 has been on R-1 since its last reading. Read its groups first.',
  });
  bench.server.clock.advance(hour);
  await read(spareId, [3.84, 3.84]).expect(201);
  expect(await movedBy(spareId)).toBeNull();
  await plan(spareId).expect(200);
});

test('a reading told as of the middle of a charge is no reading at rest either', async () => {
  const spareId = await bench.spare('S-0001');
  const charge = await running(bench, { spareId, repairRef: 'R-1' });
  bench.server.clock.advance(20 * minute);
  await did(bench, charge, 'stop', { reason: 'The channel is needed' });
  bench.server.clock.advance(minute);
  const during = new Date(at(charge.startedAt) + 10 * minute).toISOString();
  await bench
    .as('technician')
    .post(`/api/spares/${spareId}/readings`, { groupVolts: [3.84, 3.84], celsius: 21, meterId: null, at: during })
    .expect(201);
  expect(await movedBy(spareId)).toBe('R-1');
});

test('the check after the rest is a reading of after: a top-up is planned from it', async () => {
  const spareId = await bench.spare('S-0001');
  const charge = await running(bench, { spareId, repairRef: 'R-1' });
  await bench.live(at(charge.checkDueAt) - bench.server.clock.now() + 2 * minute);
  const due = await seen(bench, charge.id);
  await did(bench, due, 'rest-check', { groupVolts: [3.94, 3.94], celsius: 21, meterId: bench.meterId });
  expect(await movedBy(spareId)).toBeNull();
  await plan(spareId).expect(200);
});

test('a plan that was never begun moves nothing', async () => {
  const spareId = await bench.spare('S-0001');
  await kept(bench, { spareId });
  expect(await movedBy(spareId)).toBeNull();
});

/** Two spares joined by a resistor, the fuller one on the shelf: 3.995 V is 74.8 % on the published table. */
async function joined(): Promise<{ spareId: string; neighbourId: string; charge: ChargeDto }> {
  const manager = bench.as('manager');
  await manager.post('/api/resistors', { name: 'Load 1', ohm: '0.1', maxWatts: '500' }).expect(201);
  const spareId = await bench.spare('S-0001');
  const neighbourId = await bench.spare('S-0002', [3.995, 3.995]);
  const wish = { spareId, targetVolts: 3.86, repairRef: 'R-1' };
  const found = (await plan(spareId, wish.targetVolts).expect(200)).body as PlanDto;
  const option = found.plan.options.find(({ way }) => way === 'resistor');
  expect(option, JSON.stringify(found.plan.ruledOut)).toBeDefined();
  const answer = await bench
    .as('technician')
    .post('/api/charges', { ...wishOf(bench, wish), optionId: option!.id })
    .set('Idempotency-Key', key());
  expect(answer.status, JSON.stringify(answer.body)).toBe(201);
  bench.server.clock.advance(minute);
  return { spareId, neighbourId, charge: await answered(bench, answer.body as ChargeDto) };
}

test('the neighbour that a resistor joins is moved too: its reading is old, and no plan takes it before it is read', async () => {
  const { neighbourId, charge } = await joined();
  expect(await movedBy(neighbourId)).toBeNull();
  const begun = await did(bench, charge, 'start');
  expect(await movedBy(neighbourId)).toBe('R-1');
  const early = await read(neighbourId, [3.99, 3.99]).expect(409);
  expect(early.body.detail).toBe('S-0002 is joined to another spare for R-1. Read it when the resistor is off.');
  await bench.live(at(begun.checkDueAt) - bench.server.clock.now() + 2 * minute);
  const refused = await plan(neighbourId, 3.86).expect(400);
  expect(refused.body.fields.spareId).toBe(
    'S-0002 has been joined to another spare for R-1 since its last reading. Read its groups first.',
  );
  // Nor is it offered as a neighbour with what it read before.
  const third = await bench.spare('S-0003', [low.volts, low.volts]);
  const { plan: other } = (await plan(third, 3.86).expect(200)).body as PlanDto;
  expect(other.options.filter(({ way }) => way === 'resistor')).toEqual([]);
  await read(neighbourId, [3.95, 3.95]).expect(201);
  expect(await movedBy(neighbourId)).toBeNull();
  await plan(neighbourId, 3.86).expect(200);
});

test('a resistor is not put on where its neighbour is no longer what it was planned with', async () => {
  const { neighbourId, charge } = await joined();
  const own = await running(bench, { spareId: neighbourId, targetVolts: 4.05, repairRef: 'R-2' });
  const taken = await act(bench, charge, 'start');
  expect(taken.status).toBe(409);
  expect(taken.body).toMatchObject({ code: 'neighbour_gone', detail: 'S-0002 is on R-2 itself. Plan another way.' });
  expect((await seen(bench, charge.id)).startBlockedBy).toBe('S-0002 is on R-2 itself. Plan another way.');
  await did(bench, own, 'stop', { reason: 'Planned anew' });
  const moved = await act(bench, charge, 'start');
  expect(moved.body).toMatchObject({
    detail: 'S-0002 has been moved by R-2 since this was planned. Plan another way.',
  });
  const { rev } = await spareNow(neighbourId);
  await bench
    .as('technician')
    .post(`/api/spares/${neighbourId}/quarantine`, { reason: 'Dented' })
    .set('If-Match', `"${rev}"`)
    .expect(200);
  expect((await act(bench, charge, 'start')).body).toMatchObject({ detail: 'S-0002 is set aside. Plan another way.' });
});

test('nor where its neighbour was read since and has moved by more than ±5 mV', async () => {
  const { neighbourId, charge } = await joined();
  await read(neighbourId, [3.991, 3.999]).expect(201);
  expect((await seen(bench, charge.id)).startBlockedBy).toBeNull();
  bench.server.clock.advance(minute);
  await read(neighbourId, [3.995, 3.86]).expect(201);
  const refused = await act(bench, charge, 'start');
  expect(refused.status).toBe(409);
  expect(refused.body).toMatchObject({
    code: 'neighbour_gone',
    detail: 'S-0002, group 2, reads 3.860\u00a0V now. Plan it again.',
  });
});
