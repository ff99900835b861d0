import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { StartNowDto } from '@/shared/contract/bench-plan';
import { Repair } from '@/server/entities/repair';
import { packForm } from '@/tests/support/repaired';
import { usualArrival } from '@/server/services/bench-plan/usual-arrival';
import { high, low, makeBench, planned, type Bench } from '../charges/bench';
import { arrival, makeShop, type Shop } from '../repairs/shop';
import { onlyTwoWork } from './day';

const hour = 3600;

describe('a start before the pack is read', () => {
  let bench: Bench;
  let shop: Shop;
  beforeEach(async () => {
    bench = await makeBench({ channels: [{ name: 'A1', canDischarge: true, dischargeAmps: 10 }] });
    shop = makeShop(bench);
    await onlyTwoWork(bench);
  });
  afterEach(() => bench.server.close());

  const offered = async (): Promise<StartNowDto[]> =>
    (await bench.as('technician').get('/api/bench-plan/start-now').expect(200)).body as StartNowDto[];
  const packType = async (usualArrivalVolts: number | null): Promise<string> => {
    const form = { name: 'Van pack', pack: packForm(bench.typeId), note: null, usualArrivalVolts };
    return ((await bench.as('manager').post('/api/pack-types', form).expect(201)).body as { id: string }).id;
  };
  /** A repair of before, whose pack arrived with these volts. */
  const arrived = async (number: string, volts: number): Promise<void> => {
    const page = await shop.book();
    const { manager } = bench.server.deps.dataSource;
    const target = {
      volts,
      readingId: 'none',
      toleranceMillivolts: 5,
      typed: true,
      reason: null,
      at: 1,
      personId: 'own-technician',
    };
    await manager.update(Repair, { id: page.id }, { number, target: target as never, handedOverAt: 1 });
  };

  it('is offered with a typed voltage: the whole charge now, a trim of under two hours later, and the rest saved', async () => {
    const repair = await shop.book({ packTypeId: await packType(high.volts) });
    const spareId = await bench.spare('S-1');
    const whole = await planned(bench, { spareId });
    const [found, ...others] = await offered();
    expect(others).toEqual([]);
    expect(found).toMatchObject({
      repairId: repair.id,
      number: repair.number,
      usualVolts: high.volts,
      aimVolts: high.volts,
      arrivals: 0,
      spare: { id: spareId, label: 'S-1', shelfPlace: 'D3' },
      channelName: 'A1',
    });
    // The same charge as the plan's: 18.77 Ah at 10 A, an hour of rest, two times five minutes of hands.
    expect(Math.abs(found!.takes.p50S - whole.totalS.p50)).toBeLessThan(120);
    expect(found!.takes.p50S).toBeGreaterThan(3 * hour);
    // Of seven likely arrivals one is where it is; to the others there are at most 30 mV, with rest and hands 1 h 10 and up.
    expect(found!.thenS).toBeGreaterThan(0.8 * hour);
    expect(found!.thenS).toBeLessThan(1.8 * hour);
    expect(Math.abs(found!.savesS - (whole.totalS.p50 - found!.thenS))).toBeLessThan(0.25 * hour);
  });

  it('aims at the lowest likely arrival where no channel takes a module down again', async () => {
    await bench.server.close();
    bench = await makeBench({ channels: [{ name: 'A1' }] });
    shop = makeShop(bench);
    await shop.book({ packTypeId: await packType(high.volts) });
    await bench.spare('S-1');
    const [found] = await offered();
    // 1.465 standard deviations of 20 mV below 3.949 V.
    expect(found).toMatchObject({ usualVolts: high.volts, aimVolts: 3.9197 });
    expect(found!.takes.p50S).toBeLessThan(3 * hour);
  });

  it('goes by the median of three arrivals, and by nothing with two', async () => {
    await bench.spare('S-1');
    await arrived('R-0001', 3.949);
    await arrived('R-0002', 3.951);
    await shop.book();
    expect(await offered()).toEqual([]);
    await arrived('R-0003', 3.94);
    const [found] = await offered();
    expect(found).toMatchObject({ usualVolts: 3.949, arrivals: 3 });
  });

  it('is not offered for a pack that was read, nor with a spare that rests there already', async () => {
    const packTypeId = await packType(high.volts);
    const repair = await shop.book({ packTypeId });
    await bench.spare('S-1');
    expect(await offered()).toHaveLength(1);
    await shop.read(repair.id, arrival);
    expect(await offered()).toEqual([]);
    await shop.book({ packTypeId });
    expect(await offered()).toHaveLength(1);
    // One on the shelf is close already: nobody waits less for another.
    await bench.spare('S-2', [high.volts, high.volts]);
    expect(await offered()).toEqual([]);
  });

  it('gives two repairs two spares, and none that a third has reserved', async () => {
    const packTypeId = await packType(high.volts);
    for (const label of ['S-1', 'S-2', 'S-3']) await bench.spare(label);
    const third = await shop.book({ packTypeId });
    const reserved = ((await bench.as('technician').get('/api/spares')).body as { id: string; label: string }[]).find(
      ({ label }) => label === 'S-1',
    )!;
    await shop.send(`repairs/${third.id}/spare`, { spareId: reserved.id });
    await shop.book({ packTypeId });
    await shop.book({ packTypeId });
    const found = await offered();
    expect(found.map(({ spare }) => spare.label).sort()).toEqual(['S-1', 'S-2', 'S-3']);
    expect(found.find(({ repairId }) => repairId === third.id)!.spare.label).toBe('S-1');
  });

  it('shows a workshop nothing of another', async () => {
    await shop.book({ packTypeId: await packType(high.volts) });
    await bench.spare('S-1', [low.volts, low.volts]);
    const other = bench.server.agentFor('technician', bench.server.other);
    expect((await other.get('/api/bench-plan/start-now').expect(200)).body).toEqual([]);
  });
});

describe('how packs usually arrive', () => {
  const repair = { packTypeId: 'van', moduleTypeId: 'module' };
  const past = (volts: number[], packTypeId: string | null) =>
    volts.map((one, place) => ({
      ...{ id: `${packTypeId}-${place}`, packTypeId, moduleTypeId: 'module' },
      target: { volts: one } as never,
    }));
  const typed = (usualArrivalVolts: number | null) => ({ usualArrivalVolts }) as never;

  it('is the median of the same type of pack before that of packs with the same modules', () => {
    const rows = [...past([3.9, 3.95, 3.91], 'van'), ...past([3.7, 3.71, 3.72, 3.73], 'bus')];
    expect(usualArrival(repair, null, rows)).toMatchObject({ volts: 3.91, arrivals: 3 });
    expect(usualArrival({ ...repair, packTypeId: null }, null, rows)).toMatchObject({ volts: 3.73, arrivals: 7 });
    expect(usualArrival(repair, typed(3.85), rows)).toEqual({ volts: 3.85, arrivals: 0, likely: [3.9, 3.95, 3.91] });
    expect(usualArrival(repair, null, past([3.9, 3.95], 'van'))).toBeNull();
  });

  it('around a typed voltage scatters by 20 mV: seven likely ones, the middle one the voltage itself', () => {
    const { likely } = usualArrival(repair, typed(3.85), [])!;
    // Quantiles 1/14, 3/14 … of the normal curve, from its table: 1.465, 0.792 and 0.366 of 20 mV.
    expect(likely).toEqual([3.8207, 3.8342, 3.8427, 3.85, 3.8573, 3.8658, 3.8793]);
  });
});
