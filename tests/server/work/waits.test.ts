import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { answered, at, did, hour, kept, makeBench, minute, running, type Bench } from '../charges/bench';
import { makeShop, taken as shopTaken, type Shop } from '../repairs/shop';
import { makeCrew, refused, spanOf, stintOf, taken, type Crew } from './crew';

let bench: Bench;
let crew: Crew;
let shop: Shop;
beforeEach(async () => {
  bench = await makeBench();
  crew = makeCrew(bench.server);
  shop = makeShop(bench);
});
afterEach(() => bench.server.close());

describe('the wait of a charge', () => {
  test('of one’s own is what a stint lies in; after it there is none', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-0417'), repairRef: 'Job 7' });
    const inIt = await crew.take(await crew.add());
    expect(stintOf(inIt).waitOf).toEqual({ chargeId: charge.id, title: 'Job 7' });
    expect(stintOf(await crew.take(await crew.add(), {}, 'manager')).waitOf).toBeNull();
    const ready = at(charge.ready!.likely);
    const half = new Date(ready - 40 * minute).toISOString();
    const over = new Date(ready - 10 * minute).toISOString();
    const most = await crew.take(await crew.add(), { from: half });
    expect(stintOf(most).waitOf?.chargeId).toBe(charge.id);
    await crew.acted(most, 'give-back');
    expect(stintOf(await crew.take(most, { from: over })).waitOf).toBeNull();
  });

  test('of a repair one works on counts as well, once it is queued too', async () => {
    const page = await shop.book({ personIds: ['own-technician', 'own-foreman'] });
    const charge = await shop.plan(page, await bench.spare('S-0417'));
    const from = { from: new Date(bench.server.clock.now() + hour).toISOString() };
    const early = await crew.take(await crew.add(), from, 'foreman');
    expect(stintOf(early).waitOf).toBeNull();
    await crew.acted(early, 'give-back', {}, 'foreman');
    await did(bench, await answered(bench, charge), 'queue', { clipOnAt: null });
    const mine = await crew.take(early, from, 'foreman');
    expect(stintOf(mine).waitOf).toEqual({ chargeId: charge.id, title: page.number });
  });

  test('is found anew when the stint begins', async () => {
    const work = await crew.take(await crew.add(), { from: crew.minutes(5) });
    expect(stintOf(work).waitOf).toBeNull();
    const charge = await running(bench, { spareId: await bench.spare('S-0417') });
    bench.server.clock.advance(minute);
    expect(stintOf(await crew.acted(work, 'begin')).waitOf?.chargeId).toBe(charge.id);
  });

  test('of a plan that is dropped goes, and what was taken in it stays', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-0417') });
    const queued = await did(bench, await answered(bench, charge), 'queue', { clipOnAt: null });
    const work = await crew.take(await crew.add());
    expect(stintOf(work).waitOf?.chargeId).toBe(charge.id);
    await bench.as('technician').delete(`/api/charges/${charge.id}`).set('If-Match', `"${queued.rev}"`).expect(204);
    expect(stintOf(await crew.seen(work.id))).toMatchObject({ state: 'taken', waitOf: null });
  });
});

test('a look-in at one’s charge takes 5 min, or what the workshop says, off the work it falls into', async () => {
  const charge = await running(bench, { spareId: await bench.spare('S-0417') });
  // One an hour after the clip-on, the next after two.
  const lookIns = charge.lookIns.map(({ dueAt }) => at(dueAt) - at(charge.startedAt));
  expect(lookIns.slice(0, 2)).toEqual([hour, 2 * hour]);
  const lastS = (work: Awaited<ReturnType<Crew['take']>>) => (at(stintOf(work).to) - at(stintOf(work).from)) / 1000;
  bench.server.clock.advance(minute);
  const one = await crew.take(await crew.add());
  expect(lastS(one)).toBe(65 * 60);
  await crew.acted(one, 'give-back');
  const settings = { lookInVisitMinutes: 8 };
  await bench.as('manager').patch('/api/workshop', settings).set('If-Match', '"1"').expect(200);
  const long = await crew.take(await crew.add({ likelyMinutes: 60, longMinutes: 115 }));
  expect(lastS(long)).toBe((115 + 2 * 8) * 60);
  expect(spanOf(stintOf(long))).toMatch(/^08:01–10:12$/);
});

describe('work for a repair', () => {
  const list = async () => (await bench.as('technician').get('/api/work?state=over').expect(200)).body.work;

  test('goes with the repair that is handed over; whoever is at it has done that much', async () => {
    const page = await shop.book();
    const begun = await crew.acted(await crew.take(await crew.add({ repairId: page.id })), 'begin');
    const planned = await crew.take(await crew.add({ repairId: page.id }), { from: crew.minutes(120) });
    const other = await crew.add();
    expect(begun.repair).toEqual({ id: page.id, number: page.number });
    bench.server.hub.told.length = 0;
    bench.server.clock.advance(30 * minute);
    await shopTaken(shop.send(`repairs/${page.id}/hand-over`, { note: 'Taken along.' }));
    expect(bench.server.hub.of('bench:changed')).toHaveLength(1);
    const over = await list();
    expect(over.map((one: { over: { reason: string } }) => one.over.reason)).toEqual(
      Array.from({ length: 2 }, () => `${page.number} was handed over.`),
    );
    expect((await crew.seen(begun.id)).stints).toMatchObject([{ state: 'done' }]);
    expect((await crew.seen(planned.id)).stints).toMatchObject([{ state: 'given-back' }]);
    expect((await crew.seen(other.id)).state).toBe('open');
    expect(await refused(crew.send(`work/${planned.id}/reopen`))).toEqual([
      409,
      'wrong_state',
      `${page.number}, which it is for, is over. Add new work instead.`,
    ]);
    expect((await refused(crew.send('work', { ...form, repairId: page.id })))[2]).toEqual({
      repairId: `${page.number} is over. Choose another, or none.`,
    });
  });

  test('of a deleted one comes back with it, but not what was dropped before', async () => {
    const page = await shop.book();
    const gone = await crew.take(await crew.add({ repairId: page.id }));
    const before = await crew.add({ repairId: page.id });
    await taken(crew.send(`work/${before.id}/drop`, { reason: 'Not wanted.' }));
    await shopTaken(shop.send(`repairs/${page.id}/delete`, { reason: 'Booked twice.' }, 'manager'));
    expect((await crew.seen(gone.id)).over?.reason).toBe(`${page.number} was deleted.`);
    await shopTaken(shop.send(`repairs/${page.id}/restore`, {}, 'manager'));
    expect(await crew.seen(gone.id)).toMatchObject({ state: 'open', leftLongMinutes: 60 });
    expect((await crew.seen(before.id)).state).toBe('dropped');
  });
});

const form = {
  ...{ title: 'Tyres', likelyMinutes: 20, longMinutes: null, skillId: null, placeId: null, priority: 'low' },
  ...{ dueAt: null, repairId: null, splittable: false, note: null },
};
