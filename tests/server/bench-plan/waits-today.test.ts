/** The waiting of a day that can be added up by hand: Tuesday 9 June 2026, from 10:00 in Berlin, open until 17:00. */
import { afterEach, beforeEach, expect, it } from 'vitest';
import { makeBench, minute, type Bench } from '../charges/bench';
import { arrival, makeShop } from '../repairs/shop';
import { makeCrew } from '../work/crew';
import { clock, planOf } from './day';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

const minutes = async () => {
  const { usedS, lostS } = (await planOf(bench)).waitsToday;
  return { used: usedS / 60, lost: lostS / 60 };
};

it('loses each minute of a repair’s wait but those in which its technician does other work, and none after hours', async () => {
  const shop = makeShop(bench);
  const crew = makeCrew(bench.server);
  const page = await shop.take(await shop.confirm(await shop.read((await shop.book()).id, arrival)));
  const [wait] = (await shop.seen(page.id)).wait;
  await shop.plan(page, await bench.spare('S-0417'));
  const at = (instant: number) => bench.server.clock.advance(instant - bench.server.clock.now());
  const asked = Date.parse(wait!.from);

  at(asked + 20 * minute);
  expect(await minutes()).toEqual({ used: 0, lost: 20 });

  const work = await crew.take(await crew.add());
  await crew.acted(work, 'begin');
  const begun = Date.parse((await crew.seen(work.id)).stints[0]!.begunAt!);
  at(begun + 7 * minute);
  await crew.acted(await crew.seen(work.id), 'done');
  at(asked + 60 * minute);
  expect(await minutes()).toEqual({ used: 7, lost: 53 });
  // The repair's own account says the same.
  const { body } = await bench.as('foreman').get(`/api/repairs/${page.id}/season`).expect(200);
  expect(body).toMatchObject({ usedS: 7 * 60, lostS: 53 * 60 });

  at(Date.parse(clock('19:00')));
  const untilClosing = (Date.parse(clock('17:00')) - asked) / minute;
  const evening = await minutes();
  expect(evening.used).toBe(7);
  expect(evening.lost).toBeCloseTo(untilClosing - 7, 1);
});
