import { afterEach, beforeEach, expect, test } from 'vitest';
import type { ChargeDto } from '@/shared/contract/charge';
import type { SpareDto } from '@/shared/contract/spare';
import { at, did, key, makeBench, minute, running, seen, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const spareOf = async (id: string): Promise<SpareDto> =>
  (await bench.as('technician').get(`/api/spares/${id}`).expect(200)).body as SpareDto;

/** 10 A that were read flow for a time, then it rests and is read: every group at `volts`. */
async function charged(spareId: string, hours: number, volts: number, read = true): Promise<ChargeDto> {
  const charge = await running(bench, { spareId });
  bench.server.clock.advance(30 * minute);
  if (read)
    await bench
      .as('technician')
      .post(`/api/charges/${charge.id}/readings`, { amps: '10' })
      .set('Idempotency-Key', key())
      .expect(200);
  await bench.live(hours * 60 * minute - 30 * minute, 10 * minute);
  const end = at(charge.startedAt) + hours * 60 * minute;
  const off = await did(bench, await seen(bench, charge.id), 'current-off', { at: new Date(end).toISOString() });
  await bench.live(at(off.checkDueAt) - bench.server.clock.now() + minute, 10 * minute);
  return did(bench, await seen(bench, charge.id), 'rest-check', {
    groupVolts: [volts, volts],
    celsius: 21,
    meterId: bench.meterId,
  });
}

// The published table has 26.97 % at 3.802 V and 58.26 % at 3.949 V: 31.29 % apart. 18 Ah counted are 57.5 Ah of capacity.
test('18 Ah between 3.802 and 3.949 V are 57.5 Ah; with the 60 Ah that were measured both count by their weight', async () => {
  const spareId = await bench.spare('S-0402');
  const before = await spareOf(spareId);
  expect(before).toMatchObject({ usedCapacityAh: 60, capacities: [{ source: 'typed', state: 'used', ampHours: 60 }] });
  expect(before.capacitySdAh).toBeCloseTo(1.8, 9);
  const judged = await charged(spareId, 1.8, 3.949);
  const after = await spareOf(spareId);
  const [found] = after.capacities;
  expect(found).toMatchObject({ source: 'two readings', state: 'used', chargeId: judged.id });
  expect(found!.ampHours).toBeCloseTo(18 / 0.3129, 0);
  const [a, b] = [1 / 1.8 ** 2, 1 / found!.sdAh ** 2];
  expect(after.usedCapacityAh).toBeCloseTo((60 * a + found!.ampHours * b) / (a + b), 6);
  expect(after.capacitySdAh).toBeCloseTo(Math.sqrt(1 / (a + b)), 6);
  expect(after.capacitySdAh).toBeLessThan(1.8);
  expect(after.capacitySource).toBe('measured');
  expect(after.rev).toBeGreaterThan(before.rev);
  expect(judged.events.find(({ kind }) => kind === 'capacity')!.text).toMatch(
    /^The readings before and after give 57\./,
  );
});

test('a capacity that disagrees with what was known changes nothing until a person takes it, once', async () => {
  const spareId = await bench.spare('S-0402');
  // 12 Ah where 18 Ah belong: 38 Ah, or a current that did not flow all the time.
  await charged(spareId, 1.2, 3.949);
  const before = await spareOf(spareId);
  const [found] = before.capacities;
  expect(found).toMatchObject({ state: 'found', source: 'two readings' });
  expect(found!.apart).toBeGreaterThan(3);
  expect(before.usedCapacityAh).toBe(60);
  const answer = (rev: number, what: string) =>
    bench
      .as('technician')
      .post(`/api/spares/${spareId}/capacities/${found!.id}`, { answer: what })
      .set('If-Match', `"${rev}"`);
  expect((await answer(before.rev - 1, 'take')).status).toBe(412);
  const taken = (await answer(before.rev, 'take').expect(200)).body as SpareDto;
  expect(taken.usedCapacityAh).toBeCloseTo(12 / 0.3129, 0);
  expect(taken.capacitySdAh).toBeCloseTo(found!.sdAh, 9);
  expect(taken.capacities[0]!.state).toBe('used');
  expect((await answer(taken.rev, 'leave')).status).toBe(409);
});

test('one that is left stays in the history, and the spare keeps its capacity', async () => {
  const spareId = await bench.spare('S-0402');
  await charged(spareId, 1.2, 3.949);
  const before = await spareOf(spareId);
  const left = (
    await bench
      .as('technician')
      .post(`/api/spares/${spareId}/capacities/${before.capacities[0]!.id}`, { answer: 'leave' })
      .set('If-Match', `"${before.rev}"`)
      .expect(200)
  ).body as SpareDto;
  expect(left).toMatchObject({ usedCapacityAh: 60, capacities: [{ state: 'left' }, { state: 'used' }] });
});

test('where nobody has read the current, nothing was counted and nothing is claimed', async () => {
  const spareId = await bench.spare('S-0402');
  await charged(spareId, 1.8, 3.949, false);
  expect((await spareOf(spareId)).capacities.map(({ source }) => source)).toEqual(['typed']);
});

test('the doubt that a charge has told narrows the next plan, and a typed capacity brings its own', async () => {
  const spareId = await bench.spare('S-0402');
  await charged(spareId, 1.8, 3.949);
  const told = await spareOf(spareId);
  const { id, ...rest } = told;
  const typed = await bench
    .as('technician')
    .patch(`/api/spares/${id}`, {
      label: rest.label,
      moduleTypeId: rest.moduleTypeId,
      shelfPlace: rest.shelfPlace,
      capacityAh: '50',
      healthPercent: null,
      capacitySource: 'label',
      condition: 'sound',
      note: null,
    })
    .set('If-Match', `"${told.rev}"`)
    .expect(200);
  expect(typed.body as SpareDto).toMatchObject({ usedCapacityAh: 50, capacitySdAh: 3 });
  expect((typed.body as SpareDto).capacities).toHaveLength(3);
});
