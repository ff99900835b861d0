import { afterEach, beforeEach, expect, test } from 'vitest';
import { did, hour, makeBench, minute, type Bench } from '../charges/bench';
import { arrival, chargedAndChecked, levelled, makeShop, stripOf, strip, taken, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
});
afterEach(() => bench.server.close());

test('the seven steps follow from what was done, and the wait goes from the target to the ready module', async () => {
  const spareId = await bench.spare('S-0417');
  let page = await shop.book({ personIds: ['own-technician'] });
  expect(page.number).toBe('R-1');
  expect(stripOf(page)).toEqual(strip(0));
  expect(page).toMatchObject({ state: 'open', step: 'read', failing: null, target: null, charge: null, rev: 1 });

  page = await shop.read(page.id, arrival);
  expect(stripOf(page)).toEqual(strip(1));
  expect(page).toMatchObject({ step: 'second-source', failing: '2', spreadMillivolts: 99 });
  expect(page.computed).toMatchObject({ volts: 3.949, healthy: 6, readingId: page.readings[0]!.id });

  page = await shop.confirm(page);
  expect(page.sources[0]).toMatchObject({ agrees: true, differs: [], offsetMillivolts: 1 });
  expect(stripOf(page)).toEqual(strip(2));
  expect(page.waits).toBe(false);

  page = await shop.take(page);
  const targetAt = bench.server.clock.now();
  expect(page.target).toMatchObject({ volts: 3.949, typed: false, toleranceMillivolts: 5 });
  expect(stripOf(page)).toEqual(strip(3));
  expect(page.wait).toEqual([
    {
      id: expect.any(String) as string,
      from: new Date(targetAt).toISOString(),
      to: null,
      modulePosition: '2',
      corrected: null,
    },
  ]);

  page = await taken(shop.send(`repairs/${page.id}/spare`, { spareId }));
  expect(stripOf(page)).toEqual(strip(4));
  expect(page.spare).toMatchObject({ label: 'S-0417' });

  const charge = await shop.plan(page, spareId);
  expect(charge).toMatchObject({ repairRef: 'R-1', modulePosition: '2', person: { id: 'own-technician' } });
  page = await shop.seen(page.id);
  expect(page).toMatchObject({ step: 'charge', charge: { id: charge.id } });
  expect(stripOf(page)).toEqual(strip(4));

  const checked = await chargedAndChecked(bench, charge.id);
  page = await shop.seen(page.id);
  expect(stripOf(page)).toEqual(strip(5));
  expect(page.steps[4]).toMatchObject({ at: checked.readyAt, by: { id: 'own-technician' } });
  // It ends when the module was found ready, by the charge's own instant.
  expect(page.wait).toMatchObject([{ to: checked.readyAt }]);
  expect(page.waits).toBe(false);
  // Six healthy groups between 3.948 and 3.951 V, and the spare's two as checked: 3.950 and 3.948 V.
  expect(page.expectedAfterFit!.likely).toBeCloseTo(3, 6);

  await did(bench, checked, 'fit', { note: null }, 'foreman');
  page = await shop.seen(page.id);
  expect(stripOf(page)).toEqual(strip(6));
  expect(page.steps[5]!.by).toEqual({ id: 'own-foreman', name: 'Foreman of own' });

  bench.server.clock.advance(hour);
  page = await shop.read(page.id, levelled(38), { stage: 'after-fit' });
  expect(stripOf(page)).toEqual(strip(6));
  expect(page.readings[0]!.change).toEqual({ kind: 'exchange', ampHours: null });
  expect(page.forecast).toMatchObject({ aimMillivolts: 10, doesNotConverge: null });
  expect(page.forecast!.charges!.p50).toBeGreaterThanOrEqual(1);

  bench.server.clock.advance(12 * hour);
  page = await shop.read(page.id, levelled(10), { stage: 'after-balance', balanceCount: 1 });
  expect(page.readings[0]).toMatchObject({ spreadMillivolts: 10, change: { kind: 'balanced' } });
  expect(page.readings[0]!.change!.ampHours!.likely).toBeGreaterThan(0);
  // 10 mV are at the aim: 3.95 − 3.94 is no more than 10 mV.
  expect(stripOf(page)).toEqual(strip(7));
  expect(page).toMatchObject({ step: 'prove', state: 'open' });

  page = await taken(shop.send(`repairs/${page.id}/hand-over`, { note: '' }));
  expect(page).toMatchObject({ state: 'handed-over', step: null, handedOver: { note: null } });
  expect(stripOf(page)).toEqual(strip(7));
  expect(page.events.map(({ text }) => text).reverse()).toEqual([
    'booked Grey van',
    'pack read at arrival, 8 groups, by upload',
    'second source: 3.853\u00a0V at G3, bench 2: agrees',
    'took 3.949\u00a0V as the target',
    'reserved S-0417, D3',
    expect.stringMatching(/^planned S-0417: Terminals, over and settle, A1/) as string,
    'clipped S-0417 on',
    'S-0417 has rested: its check is due',
    'checked S-0417: ready',
    'fitted S-0417 as module 2',
    'pack read after the fit, 8 groups, by upload',
    'pack read after balance charge 1, 8 groups, by upload',
    'handed over',
  ]);
});

test('a repair hears of its charge in the same breath: repair:changed with its revision, beside the board', async () => {
  const spareId = await bench.spare('S-0417');
  const page = await shop.take(await shop.read((await shop.book()).id, arrival));
  const told = bench.server.hub.told.length;
  await shop.plan(page, spareId);
  const events = bench.server.hub.told.slice(told);
  const now = await shop.seen(page.id);
  expect(events.filter(({ event }) => event === 'repair:changed').map(({ payload }) => payload)).toEqual([
    { id: page.id, rev: now.rev, at: new Date(bench.server.clock.now()).toISOString() },
  ]);
  expect(now.rev).toBe(page.rev + 1);
  expect(events.map(({ event }) => event)).toContain('board:changed');
  // The spare that is planned for it is kept back for it too.
  expect(now.spare).toMatchObject({ id: spareId });
});

test('a plan that is dropped is told, the wait goes on; a ready module put back begins a second wait', async () => {
  const spareId = await bench.spare('S-0417');
  let page = await shop.take(await shop.read((await shop.book()).id, arrival));
  const dropped = await shop.plan(page, spareId);
  bench.server.clock.advance(1);
  await bench.as('technician').delete(`/api/charges/${dropped.id}`).set('If-Match', `"${dropped.rev}"`).expect(204);
  page = await shop.seen(page.id);
  expect(page.events[0]!.text).toBe('dropped the plan of S-0417');
  expect([page.charge, page.waits, page.wait.length]).toEqual([null, true, 1]);

  const checked = await chargedAndChecked(bench, (await shop.plan(page, spareId)).id);
  expect((await shop.seen(page.id)).waits).toBe(false);
  bench.server.clock.advance(10 * minute);
  await did(bench, checked, 'shelve', { shelfPlace: 'D4' });
  page = await shop.seen(page.id);
  expect(page.waits).toBe(true);
  expect(page.wait.map(({ to }) => to === null)).toEqual([true, false]);
  expect(page.steps.find(({ step }) => step === 'charge')!.state).toBe('to-come');
});

test('a charge that only names the number of an open repair is its own, planned before the booking or after', async () => {
  const early = await shop.plan({ id: null as unknown as string }, await bench.spare('S-0001'), { repairRef: 'R-77' });
  const page = await shop.book({ number: 'R-77' });
  expect(page.charge).toMatchObject({ id: early.id });
  await bench.as('technician').delete(`/api/charges/${early.id}`).set('If-Match', `"${early.rev}"`).expect(204);
  const late = await shop.plan({ id: null as unknown as string }, await bench.spare('S-0002'), { repairRef: 'R-77' });
  expect((await shop.seen(page.id)).charge).toMatchObject({ id: late.id, spare: { label: 'S-0002' } });
  const none = await shop.plan({ id: null as unknown as string }, await bench.spare('S-0003'), { repairRef: 'R-78' });
  expect(none.repairRef).toBe('R-78');
  expect((await shop.seen(page.id)).charges).toHaveLength(1);
});
