import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { PlanDto } from '@/shared/contract/plan';
import type { CandidateDto, RepairPageDto } from '@/shared/contract/repair';
import { high, kept, low, makeBench, planned, wishOf, type Bench } from '../charges/bench';
import { arrival, makeShop, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
let page: RepairPageDto;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
});
afterEach(() => bench.server.close());

const candidates = async (): Promise<CandidateDto[]> =>
  (await bench.as('technician').get(`/api/repairs/${page.id}/candidates`).expect(200)).body as CandidateDto[];
const reserve = (spareId: string, id = page.id) => shop.send(`repairs/${id}/spare`, { spareId });

describe('a reservation', () => {
  test('keeps a spare from every other repair and charge, with who has it', async () => {
    const spareId = await bench.spare('S-0417');
    page = await taken(reserve(spareId));
    const other = await shop.book();
    const refused = await reserve(spareId, other.id);
    expect([refused.status, refused.body.present]).toEqual([409, { repairId: page.id, number: 'R-1' }]);
    expect(refused.body.detail).toBe('S-0417 is reserved for R-1. Take another spare, or free it there.');
    // Nor does a plan for nobody take it; one that names the repair's number does.
    const option = await planned(bench, { spareId });
    const keep = (repairRef: string | null) =>
      shop.send('charges', { ...wishOf(bench, { spareId, repairRef }), optionId: option.id });
    expect((await keep(null)).body.code).toBe('spare_reserved');
    expect((await keep('R-1')).status).toBe(201);
    expect((await shop.seen(page.id)).charge).toMatchObject({ spare: { id: spareId } });
  });

  test('of a spare on another charge, in quarantine or of another workshop is refused', async () => {
    const onCharge = await bench.spare('S-0001');
    await kept(bench, { spareId: onCharge, repairRef: 'R-900' });
    expect((await reserve(onCharge)).body).toMatchObject({
      status: 409,
      code: 'spare_taken',
      detail: 'S-0001 is on R-900. Take another spare.',
    });
    const aside = await bench.spare('S-0002');
    await bench
      .as('technician')
      .post(`/api/spares/${aside}/quarantine`, { reason: 'Dented', charge: null })
      .set('If-Match', '"1"')
      .expect(200);
    expect((await reserve(aside)).body).toMatchObject({ status: 409, code: 'quarantined' });
    expect((await reserve('nobody-has-this')).status).toBe(400);
  });

  test('is given back with the revision that was seen, but not from under its charge', async () => {
    const spareId = await bench.spare('S-0417');
    page = await taken(reserve(spareId));
    const free = (rev: number) =>
      bench.as('technician').delete(`/api/repairs/${page.id}/spare`).set('If-Match', `"${rev}"`);
    expect((await free(page.rev - 1)).status).toBe(412);
    const charge = await shop.plan(page, spareId);
    page = await shop.seen(page.id);
    expect((await free(page.rev)).status).toBe(409);
    await bench.as('technician').delete(`/api/charges/${charge.id}`).set('If-Match', `"${charge.rev}"`).expect(204);
    page = await shop.seen(page.id);
    bench.server.clock.advance(1);
    const freed = (await free(page.rev).expect(200)).body as RepairPageDto;
    expect([freed.spare, freed.events[0]!.text]).toEqual([null, 'gave S-0417 back']);
    expect((await free(freed.rev)).status).toBe(409);
  });
});

describe('the candidates', () => {
  test('stand by their time to the target, which is that of the whole plan within a fifth; what is ruled out last', async () => {
    const near = await bench.spare('S-near', [3.94, 3.94]);
    const far = await bench.spare('S-far', [low.volts, low.volts]);
    const swollen = await bench.spare('S-swollen', [low.volts, low.volts], { condition: 'swollen' });
    const within = await bench.spare('S-within', [high.volts, high.volts]);
    const onCharge = await bench.spare('S-charge');
    await kept(bench, { spareId: onCharge, repairRef: 'R-900' }, { channel: 'C1', way: 'group-by-group' });
    const reserved = await bench.spare('S-reserved');
    await taken(reserve(reserved, (await shop.book()).id));

    const found = await candidates();
    expect(found.map(({ spareId }) => spareId)).toEqual([within, near, far, onCharge, reserved, swollen]);
    expect(found.map(({ ruledOut }) => ruledOut)).toEqual([false, false, false, true, true, true]);
    expect(found[0]).toMatchObject({
      seconds: { p10: 0, p50: 0, p90: 0 },
      usedCapacityAh: 60,
      capacitySource: 'measured',
    });
    expect(found[3]!.problems).toEqual(['It is on R-900.']);
    expect(found[4]).toMatchObject({ problems: ['Reserved for R-901.'], reservedFor: { number: 'R-901' } });
    expect(found[5]!.problems[0]).toContain('swollen');

    const { plan } = (
      await bench.as('technician').post('/api/plans', wishOf(bench, { spareId: far, targetVolts: 3.949 }))
    ).body as PlanDto;
    const best = plan.options.filter(({ way }) => way === 'terminals')[0]!;
    expect(found[2]!.seconds!.p50 / best.totalS.p50).toBeGreaterThan(0.8);
    expect(found[2]!.seconds!.p50 / best.totalS.p50).toBeLessThan(1.2);
    expect(found[2]!.channelName).toBe('B1');
  });

  test('tell how a spare of other capacity drifts: none where it has the pack’s', async () => {
    await bench.spare('S-0417');
    // A group of the pack is taken for 66 Ah × 92 % = 60.72 Ah; the spare has 60 Ah.
    const [one] = await candidates();
    expect(Math.abs(one!.agreement!.fullMillivolts)).toBeLessThan(10);
    expect(one!.agreement!.bestMatchPercent).toBeGreaterThan(0);
    await bench.server.deps.dataSource.query('UPDATE spare SET capacity_ah = 60.72');
    const [same] = await candidates();
    expect(same!.agreement).toMatchObject({ fullMillivolts: 0, lowMillivolts: 0 });
    await bench.server.deps.dataSource.query('UPDATE spare SET capacity_ah = 40');
    const [small] = await candidates();
    expect(Math.abs(small!.agreement!.lowMillivolts)).toBeGreaterThan(Math.abs(one!.agreement!.lowMillivolts));
  });

  test('of a pack that is not read have no time; of one without a module type there are none to tell', async () => {
    await bench.spare('S-0417');
    page = await shop.book();
    expect(await candidates()).toMatchObject([{ seconds: null, ruledOut: false, agreement: null }]);
    const bare = await shop.book({
      pack: { moduleTypeId: null, groupCount: 8, groupsPerModule: 2, positionOfGroup: null },
    });
    const answer = await bench.as('technician').get(`/api/repairs/${bare.id}/candidates`);
    expect([answer.status, answer.body.code]).toEqual([409, 'no_type']);
  });
});
