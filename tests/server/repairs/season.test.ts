import { afterEach, beforeEach, expect, it } from 'vitest';
import type { RepairSeasonDto } from '@/shared/contract/repair-season';
import { answered, did, makeBench, minute, seen, type Bench } from '../charges/bench';
import { arrival, chargedAndChecked, makeShop, type Shop } from './shop';

let bench: Bench;
let shop: Shop;
beforeEach(async () => {
  bench = await makeBench();
  shop = makeShop(bench);
});
afterEach(() => bench.server.close());

const season = async (id: string): Promise<RepairSeasonDto> =>
  (await bench.as('technician').get(`/api/repairs/${id}/season`).expect(200)).body as RepairSeasonDto;
const at = (text: string): number => Date.parse(text);

it('is the time of a repair without a gap: each part from the instant at which its own row begins', async () => {
  const { clock } = bench.server;
  let page = await shop.book();
  const bookedAt = clock.now();
  clock.advance(15 * minute);
  page = await shop.confirm(await shop.read(page.id, arrival));
  clock.advance(10 * minute);
  page = await shop.take(page);
  const targetAt = clock.now();
  clock.advance(20 * minute);
  const charge = await shop.plan(page, await bench.spare('S-0417'));
  clock.advance(5 * minute);
  const checked = await chargedAndChecked(bench, charge.id);
  clock.advance(30 * minute);

  const found = await season(page.id);
  expect(found).toMatchObject({ repairId: page.id, number: page.number, over: false });
  expect(at(found.to)).toBe(clock.now());
  const { stretches } = found;
  expect(stretches.map(({ part }) => part)).toEqual([
    ...['unread', 'deciding', 'unplanned', 'queue', 'charging', 'resting', 'check-due', 'unfitted'],
  ]);
  stretches.slice(1).forEach(({ from }, place) => expect(from).toBe(stretches[place]!.to));
  expect([stretches[0]!.from, stretches.at(-1)!.to]).toEqual([found.from, found.to]);
  const begin = Object.fromEntries(stretches.map(({ part, from }) => [part, at(from)]));
  expect(begin.unread).toBe(bookedAt);
  expect(begin.unplanned).toBe(targetAt);
  expect(begin).toMatchObject({
    charging: at(checked.startedAt!),
    resting: at(checked.currentEndAt!),
    unfitted: at(checked.readyAt!),
  });
  expect(stretches.filter(({ chargeId }) => chargeId === charge.id).map(({ part }) => part)).toEqual([
    ...['queue', 'charging', 'resting', 'check-due', 'unfitted'],
  ]);
  // Its parts are the whole of it, and the wait for the module is used and lost hours of working time at most.
  const all = found.totals.reduce((sum, { seconds }) => sum + seconds, 0);
  expect(all).toBeCloseTo((at(found.to) - at(found.from)) / 1000, 3);
  for (const { seconds, openSeconds } of found.totals) expect(openSeconds).toBeLessThanOrEqual(seconds);
  const [wait] = (await shop.seen(page.id)).wait;
  expect(found.usedS).toBe(0);
  expect(found.lostS).toBeGreaterThan(0);
  expect(found.lostS).toBeLessThanOrEqual((at(wait!.to!) - at(wait!.from)) / 1000);
});

it('of a module that was put back on the shelf goes back to having no charge', async () => {
  const page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
  const charge = await shop.plan(page, await bench.spare('S-0417'));
  const checked = await chargedAndChecked(bench, charge.id);
  bench.server.clock.advance(10 * minute);
  await did(bench, checked, 'shelve', { shelfPlace: 'D4' });
  bench.server.clock.advance(7 * minute);
  const { stretches } = await season(page.id);
  const [unfitted, unplanned] = stretches.slice(-2);
  expect(unfitted).toMatchObject({ part: 'unfitted', from: checked.readyAt, chargeId: charge.id });
  expect(unplanned).toMatchObject({ part: 'unplanned', chargeId: null });
  expect(at(unplanned!.to) - at(unplanned!.from)).toBe(7 * minute);
});

it('parts a hold from the current on both sides of it, and one that lasts stays a hold past the end that was reckoned', async () => {
  const page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
  const { id } = await shop.plan(page, await bench.spare('S-0417'));
  const { clock } = bench.server;
  const started = await did(bench, await answered(bench, await seen(bench, id)), 'start');
  await bench.live(12 * minute);
  await did(bench, await seen(bench, id), 'hold', { reason: 'A clip is warm' });
  const firstHeld = clock.now();
  await bench.live(25 * minute);
  await did(bench, await seen(bench, id), 'resume');
  const resumed = clock.now();
  await bench.live(8 * minute);
  await did(bench, await seen(bench, id), 'hold', { reason: 'The bench is needed' });
  const heldAgain = clock.now();
  // Far beyond its rest, had it gone on.
  await bench.live(600 * minute);
  const found = await season(page.id);
  const own = found.stretches.filter(({ chargeId }) => chargeId === id);
  expect(own.map(({ part }) => part)).toEqual(['queue', 'charging', 'held', 'charging', 'held']);
  expect(own.slice(1).map(({ from }) => at(from))).toEqual([
    ...[at(started.startedAt!), firstHeld, resumed, heldAgain],
  ]);
  const seconds = Object.fromEntries(found.totals.map((one) => [one.part, one.seconds]));
  expect(seconds.charging).toBeCloseTo(20 * 60, 1);
  expect(seconds.held).toBeCloseTo(625 * 60, 1);
  const all = found.totals.reduce((sum, one) => sum + one.seconds, 0);
  expect(all).toBeCloseTo((at(found.to) - at(found.from)) / 1000, 3);
});
