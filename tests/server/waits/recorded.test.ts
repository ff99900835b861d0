/** What keeps the rows of the statistics at what has happened, lived through over the API. */
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { WaitChargesDto, WaitRowDto } from '@/shared/contract/waits';
import { key, makeBench, minute, type Bench } from '../charges/bench';
import { arrival, chargedAndChecked, makeShop, type Shop } from '../repairs/shop';
import { makeCrew, type Crew } from '../work/crew';

let bench: Bench;
let shop: Shop;
let crew: Crew;
let page: RepairPageDto;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
  crew = makeCrew(bench.server);
  page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
});
afterEach(() => bench.server.close());

const rows = async (): Promise<WaitRowDto[]> =>
  ((await bench.as('manager').get('/api/waits/charges').expect(200)).body as WaitChargesDto).rows;
const only = async (): Promise<WaitRowDto> => {
  const found = await rows();
  expect(found).toHaveLength(1);
  return found[0]!;
};

describe('a charge that becomes ready', () => {
  it('is written down with the wait of its repair, from its target on; before that there is nothing', async () => {
    bench.server.clock.advance(20 * minute);
    const charge = await shop.plan(page, await bench.spare('S-0417'));
    expect(await rows()).toEqual([]);
    const checked = await chargedAndChecked(bench, charge.id);
    const [wait] = (await shop.seen(page.id)).wait;
    const row = await only();
    expect(row).toMatchObject({ chargeId: charge.id, askedAt: wait!.from, readyAt: checked.readyAt, usedS: 0 });
    expect(row.waitS).toBe((Date.parse(wait!.to!) - Date.parse(wait!.from)) / 1000);
    expect(row.waitS).toBeGreaterThan(20 * 60);
    expect(row.lostS).toBeGreaterThan(0);
  });

  it('has used the minutes of other work that its technician did in them, also where that is put right later', async () => {
    const charge = await shop.plan(page, await bench.spare('S-0417'));
    const work = await crew.take(await crew.add());
    await crew.acted(work, 'begin');
    bench.server.clock.advance(7 * minute);
    await crew.acted(await crew.seen(work.id), 'done');
    await chargedAndChecked(bench, charge.id);
    const [wait] = (await shop.seen(page.id)).wait;
    const before = await only();
    expect(before.usedS).toBe(7 * 60);
    // The wait was known to begin 3 min into the work: 4 min of it are within.
    const begun = Date.parse((await crew.seen(work.id)).stints[0]!.begunAt!);
    const corrected = { from: new Date(begun + 3 * minute).toISOString(), to: wait!.to, reason: 'Taken too early.' };
    const { rev } = await shop.seen(page.id);
    await bench
      .as('foreman')
      .patch(`/api/repairs/${page.id}/wait/${wait!.id}`, corrected)
      .set('If-Match', `"${rev}"`)
      .set('Idempotency-Key', key())
      .expect(200);
    const after = await only();
    expect(after).toMatchObject({ askedAt: corrected.from, usedS: 4 * 60 });
    expect(after.waitS).toBe(before.waitS - (Date.parse(corrected.from) - Date.parse(wait!.from)) / 1000);
  });
});
