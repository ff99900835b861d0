import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { PackTypeDto } from '@/shared/contract/pack';
import { packForm, repairForm } from '@/tests/support/repaired';
import { hour, key, makeBench, type Bench } from '../charges/bench';
import { arrival, levelled, makeShop, strip, stripOf, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
});
afterEach(() => bench.server.close());

/** A repair of a pack with these numbers, read at arrival and after the fit. */
async function fitted(pack: object, millivolts: number) {
  const { id } = await shop.book({ pack: packForm(bench.typeId, pack) });
  await shop.read(id, arrival);
  bench.server.clock.advance(hour);
  return shop.read(id, levelled(millivolts), { stage: 'after-fit' });
}

describe('what a pack balances with', () => {
  test.each([0.05, 0.2, 1])(
    '%s A take one charge of 10 h for every ten hours of them that the spread holds',
    async (amps) => {
      const page = await fitted({ bleedAmps: String(amps).replace('.', ',') }, 38);
      expect(page.pack).toMatchObject({ bleedAmps: amps, aimMillivolts: 10 });
      const { forecast, readings } = page;
      expect(forecast).toMatchObject({ from: 'bleed', hoursPerCharge: 10, aimMillivolts: 10 });
      // 28 of the 38 mV have to go; on so short a piece of the curve their share of the Ah is about the same.
      const hours = (readings[0]!.spreadAmpHours! * 28) / 38 / amps;
      expect(Math.abs(forecast!.charges!.p50 - hours / 10)).toBeLessThanOrEqual(1 + 0.15 * (hours / 10));
      const { charges, expectedMillivolts } = forecast!;
      expect(expectedMillivolts).toHaveLength(charges!.p90);
      expect(expectedMillivolts[charges!.p50 - 1]!.p50).toBeLessThanOrEqual(10.5);
      // A meter never shows level groups as 0 mV apart.
      expect(Math.min(...expectedMillivolts.map(({ p10 }) => p10))).toBeGreaterThan(0);
      expect(expectedMillivolts.map(({ p50 }) => p50)).toEqual(
        expectedMillivolts.map(({ p50 }) => p50).sort((one, other) => other - one),
      );
    },
  );

  test('0 A: it does not balance by itself, and nothing is forecast without a log', async () => {
    const page = await fitted({ bleedAmps: '0' }, 38);
    expect(page.forecast).toMatchObject({ charges: null, expectedMillivolts: [] });
  });
});

describe('the aim of a pack', () => {
  test('of 20 mV is what 18 mV prove and 21 mV do not; without its own, 10 mV count', async () => {
    const proven = async (pack: object, millivolts: number) => (await fitted(pack, millivolts)).steps[6]!.state;
    expect(await proven({ aimMillivolts: '20' }, 18)).toBe('done');
    expect(await proven({ aimMillivolts: '20' }, 21)).not.toBe('done');
    expect(await proven({ aimMillivolts: '' }, 18)).not.toBe('done');
    expect(await proven({}, 10)).toBe('done');
  });

  test('of 500 mV, or a bleed current of −1 A, is refused at its field', async () => {
    const answer = await shop.send('repairs', {
      ...repairForm(bench.typeId),
      pack: packForm(bench.typeId, { aimMillivolts: '500', bleedAmps: '-1' }),
    });
    expect(answer.status).toBe(400);
    expect(Object.keys(answer.body.fields as object).sort()).toEqual(['pack.aimMillivolts', 'pack.bleedAmps']);
  });
});

test('a pack type keeps both; a repair keeps its own when the type changes', async () => {
  const manager = bench.as('manager');
  const pack = packForm(bench.typeId, { bleedAmps: '0.12', aimMillivolts: '15' });
  const made = await manager.post('/api/pack-types', { name: 'Van', pack, note: null }).set('Idempotency-Key', key());
  const type = made.body as PackTypeDto;
  expect(type.pack).toMatchObject({ bleedAmps: 0.12, aimMillivolts: 15 });
  const booked = await shop.book({ packTypeId: type.id, pack });
  const changed = await manager
    .patch(`/api/pack-types/${type.id}`, { name: 'Van', pack: packForm(bench.typeId), note: null })
    .set('If-Match', '"1"');
  expect((changed.body as PackTypeDto).pack).toMatchObject({ bleedAmps: null, aimMillivolts: 10 });
  const seen = await shop.seen(booked.id);
  expect(seen.pack).toMatchObject({ bleedAmps: 0.12, aimMillivolts: 15 });
  expect(stripOf(seen)).toEqual(strip(0));
});
