import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { makeTestServer, type TestServer } from '@/tests/support/server';
import { hour, minute } from '../charges/bench';
import { makeCrew, refused, spanOf, stintOf, taken, type Crew } from './crew';

let server: TestServer;
let crew: Crew;
beforeEach(async () => {
  server = await makeTestServer();
  crew = makeCrew(server);
});
afterEach(() => server.close());

describe('beginning', () => {
  test('earlier or later than planned moves the stint to now, as long as it was', async () => {
    const early = await crew.take(await crew.add(), { from: crew.minutes(120) });
    server.clock.advance(90 * minute);
    const begun = await crew.acted(early, 'begin');
    expect([begun.state, spanOf(stintOf(begun))]).toEqual(['begun', '09:30–10:30']);
    expect(stintOf(begun).begunAt).toBe(crew.minutes(90));
    await crew.acted(begun, 'give-back');
    const late = await crew.take(await crew.add());
    server.clock.advance(20 * minute);
    expect(spanOf(stintOf(await crew.acted(late, 'begin')))).toBe('09:50–10:50');
  });

  test('twice is as good as once', async () => {
    const work = await crew.take(await crew.add());
    const once = await crew.acted(work, 'begin');
    server.clock.advance(minute);
    expect(stintOf(await crew.acted(work, 'begin'))).toEqual(stintOf(once));
  });

  test('a second piece while one is begun is 409 with what is begun', async () => {
    const first = await crew.acted(await crew.take(await crew.add()), 'begin');
    const second = await crew.take(await crew.add({ title: 'Tyres' }), { from: crew.minutes(60) });
    server.clock.advance(minute);
    expect(await refused(crew.act(second, 'begin'))).toEqual([
      409,
      'at_work',
      'Brake bleed W-0001 is begun since 10:00. End it first, or give it back.',
    ]);
    await crew.acted(first, 'done');
    expect((await crew.acted(second, 'begin')).state).toBe('begun');
  });

  test('moves what else one has taken behind it, one after the other, around the break', async () => {
    await crew.staff('technician', { breaks: [{ from: '12:00', to: '12:30' }] });
    const early = await crew.take(await crew.add({ title: 'Early' }), { from: crew.minutes(0) });
    const next = await crew.take(await crew.add({ title: 'Next' }), { from: crew.minutes(60) });
    const last = await crew.take(await crew.add({ title: 'Last' }), { from: crew.minutes(180) });
    server.clock.advance(75 * minute);
    // 11:15 to 12:45, for the break lies in it; the next then to 13:45, the last from there.
    expect(spanOf(stintOf(await crew.acted(early, 'begin')))).toBe('09:15–10:45');
    expect(spanOf(stintOf(await crew.seen(next.id)))).toBe('10:45–11:45');
    expect(spanOf(stintOf(await crew.seen(last.id)))).toBe('11:45–12:45');
  });

  test('gives back what finds its place taken behind it', async () => {
    const bay = await crew.place('Bay 1');
    const mine = await crew.take(await crew.add({ title: 'Mine' }));
    const inBay = await crew.take(await crew.add({ title: 'Lift', placeId: bay.id }), { from: crew.minutes(60) });
    await crew.take(await crew.add({ title: 'Theirs', placeId: bay.id }), { from: crew.minutes(120) }, 'manager');
    server.clock.advance(30 * minute);
    await crew.acted(mine, 'begin');
    expect(await crew.seen(inBay.id)).toMatchObject({
      state: 'open',
      leftLongMinutes: 60,
      stints: [{ state: 'given-back' }],
    });
  });

  test('where somebody is still at work in the place is 409, also past the planned end', async () => {
    const bay = await crew.place('Bay 1');
    const theirs = await crew.take(await crew.add({ placeId: bay.id }), {}, 'manager');
    await crew.acted(theirs, 'begin', {}, 'manager');
    const mine = await crew.take(await crew.add({ title: 'Lift', placeId: bay.id }), { from: crew.minutes(60) });
    server.clock.advance(30 * minute);
    expect((await refused(crew.act(mine, 'begin')))[2]).toBe(
      'Bay 1 is taken until 11:00 by Manager of own: Brake bleed W-0001.',
    );
    server.clock.advance(40 * minute);
    expect(await refused(crew.act(mine, 'begin'))).toEqual([
      409,
      'place_taken',
      'Bay 1 is still taken by Manager of own: Brake bleed W-0001.',
    ]);
  });

  test('another’s stint is for who plans the bench: 403 for a technician', async () => {
    const theirs = await crew.take(await crew.add(), {}, 'manager');
    for (const what of ['begin', 'done', 'give-back']) expect((await refused(crew.act(theirs, what)))[0]).toBe(403);
    expect((await crew.acted(theirs, 'begin', {}, 'foreman')).state).toBe('begun');
  });
});

describe('ending', () => {
  test('with nothing left is the end of the work, at that instant and by that person', async () => {
    const begun = await crew.acted(await crew.take(await crew.add()), 'begin');
    server.clock.advance(35 * minute);
    const done = await crew.acted(begun, 'done');
    expect(done).toMatchObject({ state: 'done', leftMinutes: 0 });
    expect(done.over).toEqual({
      at: crew.minutes(35),
      by: { id: 'own-technician', name: 'Technician of own' },
      reason: null,
    });
    expect(spanOf(stintOf(done))).toBe('08:00–08:35');
    expect(await refused(crew.act(done, 'done'))).toMatchObject([409, 'wrong_state', expect.any(String)]);
  });

  test('with minutes left opens them again, long in proportion: of 40 and 60 min 10 left are 15 at the longest', async () => {
    const begun = await crew.acted(await crew.take(await crew.add()), 'begin');
    server.clock.advance(35 * minute);
    const part = await crew.acted(begun, 'done', { minutesLeft: '10' });
    expect(part).toMatchObject({ state: 'open', over: null, leftMinutes: 10, leftLongMinutes: 15 });
    server.clock.advance(2 * hour);
    const again = await crew.take(part, {}, 'manager');
    expect(spanOf(stintOf(again))).toBe('10:35–10:50');
    expect((await crew.acted(again, 'done', {}, 'manager')).state).toBe('done');
  });

  test('a part is done while others have theirs: the work is over with the last', async () => {
    const work = await crew.add({ splittable: true, likelyMinutes: 60, longMinutes: 90 });
    const mine = await crew.take(work, { minutes: 30 });
    const theirs = await crew.take(work, {}, 'manager');
    const other = theirs.stints.find(({ person }) => person.id === 'own-manager')!;
    server.clock.advance(20 * minute);
    expect((await crew.acted(mine, 'done')).state).toBe('taken');
    const over = await taken(crew.send(`work/${work.id}/stints/${other.id}/done`, {}, 'manager'));
    expect(over.state).toBe('done');
  });

  test('what was never begun is done from its planned beginning; what is still to come is not ended', async () => {
    const work = await crew.take(await crew.add(), { from: crew.minutes(60) });
    expect(await refused(crew.act(work, 'done'))).toEqual([
      409,
      'wrong_state',
      'It is planned for 11:00 and not begun. Begin it first, or give it back.',
    ]);
    server.clock.advance(95 * minute);
    const done = stintOf(await crew.acted(work, 'done'));
    expect([spanOf(done), done.begunAt, done.endedAt]).toEqual(['09:00–09:35', crew.minutes(60), crew.minutes(95)]);
  });

  test('late moves what one has taken next to where it can begin', async () => {
    const first = await crew.acted(await crew.take(await crew.add()), 'begin');
    const next = await crew.take(await crew.add({ title: 'Next' }), { from: crew.minutes(60) });
    server.clock.advance(80 * minute);
    await crew.acted(first, 'done');
    expect(spanOf(stintOf(await crew.seen(next.id)))).toBe('09:20–10:20');
  });
});

describe('giving back', () => {
  test('opens what was taken; taking it again undoes it', async () => {
    const work = await crew.add({ splittable: true, likelyMinutes: 60, longMinutes: 90 });
    const part = await crew.take(work, { minutes: 30, from: crew.minutes(30) });
    const back = await crew.acted(part, 'give-back');
    expect(back).toMatchObject({ state: 'open', leftMinutes: 60, leftLongMinutes: 90 });
    expect((await crew.acted(part, 'give-back')).leftLongMinutes).toBe(90);
    const again = await crew.take(work, { minutes: 30, from: crew.minutes(30) });
    expect([again.leftLongMinutes, spanOf(stintOf(again))]).toEqual([60, spanOf(stintOf(part))]);
  });

  test('what is done is 409', async () => {
    const work = await crew.add({ splittable: true, likelyMinutes: 60, longMinutes: 90 });
    const part = await crew.take(work, { minutes: 30 });
    await crew.acted(part, 'done');
    expect(await refused(crew.act(part, 'give-back'))).toEqual([409, 'wrong_state', 'It was done at 10:00.']);
  });
});

describe('work that is over', () => {
  test('was dropped with a reason, and taken from whoever had it; not while somebody is at it', async () => {
    const work = await crew.take(await crew.add());
    expect((await refused(crew.send(`work/${work.id}/drop`, { reason: ' ' })))[2]).toEqual({
      reason: 'The reason is missing.',
    });
    const begun = await crew.acted(work, 'begin');
    expect(await refused(crew.send(`work/${work.id}/drop`, { reason: 'Sold.' }, 'manager'))).toEqual([
      409,
      'at_work',
      'Technician of own is at it since 10:00. End that first, or give it back.',
    ]);
    await crew.acted(begun, 'give-back');
    await crew.take(work, {}, 'manager');
    const dropped = await taken(crew.send(`work/${work.id}/drop`, { reason: 'Sold.' }));
    expect(dropped).toMatchObject({ state: 'dropped', over: { reason: 'Sold.' } });
    expect(dropped.stints.map(({ state }) => state)).toEqual(['given-back', 'given-back']);
  });

  test('comes back with what it had left; done work with what its last stint took', async () => {
    const dropped = await crew.add();
    await taken(crew.send(`work/${dropped.id}/drop`, { reason: 'Sold.' }));
    const back = await taken(crew.send(`work/${dropped.id}/reopen`));
    expect(back).toMatchObject({ state: 'open', leftMinutes: 40, leftLongMinutes: 60, over: null });
    expect(await refused(crew.send(`work/${dropped.id}/reopen`))).toEqual([
      409,
      'wrong_state',
      'Brake bleed W-0001 is not over yet.',
    ]);
    const split = await crew.add({ splittable: true, likelyMinutes: 60, longMinutes: 90 });
    await crew.acted(await crew.take(split, { minutes: 30 }), 'done');
    server.clock.advance(minute);
    const rest = await crew.take(split);
    server.clock.advance(minute);
    const done = await crew.acted(rest, 'done');
    expect(done.state).toBe('done');
    for (let times = 0; times < 2; times += 1) {
      const open = await taken(crew.send(`work/${split.id}/reopen`));
      expect(open).toMatchObject({ state: 'open', leftMinutes: 40, leftLongMinutes: 60 });
      server.clock.advance(minute);
      await crew.acted(await crew.take(open), 'done');
    }
  });
});

test('somebody who is switched off has nothing in hand any more, and comes back with nothing', async () => {
  const begun = await crew.acted(await crew.take(await crew.add({ splittable: true }), { minutes: 30 }), 'begin');
  await crew.take(begun, { from: crew.minutes(300) });
  const other = await crew.take(await crew.add({ title: 'Tyres' }), { from: crew.minutes(120) });
  server.hub.told.length = 0;
  const disable = (disabled: boolean, rev: number) =>
    server
      .agentFor('manager')
      .patch('/api/people/own-technician', { disabled })
      .set('If-Match', `"${rev}"`)
      .expect(200);
  await disable(true, 1);
  expect(server.hub.of('bench:changed')).toHaveLength(1);
  const list = (await server.agentFor('manager').get('/api/work').expect(200)).body;
  expect(list.counts).toEqual({ open: 2, taken: 0, begun: 0, over: 0 });
  for (const [work, long] of [
    [list.work.find(({ id }: { id: string }) => id === begun.id), 60],
    [list.work.find(({ id }: { id: string }) => id === other.id), 60],
  ])
    expect(work.leftLongMinutes).toBe(long);
  await disable(false, 2);
  expect((await server.agentFor('manager').get('/api/work')).body.counts.open).toBe(2);
});
