import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { workForm } from '@/tests/support/benched';
import { makeTestServer, type TestServer } from '@/tests/support/server';
import { key, minute } from '../charges/bench';
import { makeCrew, refused, spanOf, stintOf, taken, type Crew } from './crew';

let server: TestServer;
let crew: Crew;
beforeEach(async () => {
  server = await makeTestServer();
  crew = makeCrew(server);
});
afterEach(() => server.close());

const take = (id: string, body: object = {}, role: 'technician' | 'foreman' | 'manager' = 'technician') =>
  crew.send(`work/${id}/take`, body, role);

describe('work', () => {
  test('is numbered from W-0001, dropped ones counted too; long is half as long again where it is left out', async () => {
    const first = await crew.add({ likelyMinutes: 25, longMinutes: null });
    expect(first).toMatchObject({ number: 'W-0001', longMinutes: 38, leftMinutes: 25, leftLongMinutes: 38 });
    expect(first).toMatchObject({ state: 'open', stints: [], over: null, createdBy: { name: 'Technician of own' } });
    await taken(crew.send(`work/${first.id}/drop`, { reason: 'Sold.' }));
    expect((await crew.add()).number).toBe('W-0002');
  });

  test('of the same key is added once', async () => {
    const once = key();
    const add = () => server.agentFor('technician').post('/api/work', workForm()).set('Idempotency-Key', once);
    const [one, other] = [await add(), await add()];
    expect([other.status, other.body.id]).toEqual([201, one.body.id]);
    const list = (await server.agentFor('technician').get('/api/work')).body;
    expect(list.counts).toEqual({ open: 1, taken: 0, begun: 0, over: 0 });
  });

  test('is refused with the field: long under likely, due in the past, for a repair that is over', async () => {
    const add = (change: object) => refused(crew.send('work', workForm(change)));
    expect((await add({ likelyMinutes: 40, longMinutes: 30 }))[2]).toEqual({
      longMinutes: 'Long is shorter than likely. Type the longer one here.',
    });
    expect((await add({ dueAt: crew.minutes(-1) }))[2]).toEqual({
      dueAt: '09:59 is over. Type a time that is still to come, or none.',
    });
    expect((await add({ repairId: 'nobodys' }))[2]).toHaveProperty('repairId');
  });

  test('is listed by what its minutes are worth, then by when it is due; what is over last ended first', async () => {
    const low = await crew.add({ title: 'Low', priority: 'low' });
    const later = await crew.add({ title: 'Later', priority: 'high', dueAt: crew.minutes(300) });
    const sooner = await crew.add({ title: 'Sooner', priority: 'high', dueAt: crew.minutes(200) });
    const whenever = await crew.add({ title: 'Whenever', priority: 'high' });
    const urgent = await crew.add({ title: 'Urgent', priority: 'urgent' });
    const titles = async (query = '') =>
      (await server.agentFor('technician').get(`/api/work${query}`).expect(200)).body.work.map(
        (one: { title: string }) => one.title,
      );
    expect(await titles()).toEqual(['Urgent', 'Sooner', 'Later', 'Whenever', 'Low']);
    for (const one of [low, urgent]) {
      server.clock.advance(minute);
      await taken(crew.send(`work/${one.id}/drop`, { reason: 'Sold.' }));
    }
    expect(await titles('?state=over')).toEqual(['Urgent', 'Low']);
    expect(await titles()).toEqual([sooner, later, whenever].map(({ title }) => title));
  });

  test('changes with its revision only, and the estimate of what is left with it', async () => {
    const work = await crew.add({ splittable: true });
    await crew.take(work, { minutes: 15 });
    const change = (body: object, rev: number) =>
      server.agentFor('technician').patch(`/api/work/${work.id}`, workForm(body)).set('If-Match', `"${rev}"`);
    expect((await change({}, 1)).status).toBe(412);
    // Of 40 and 60 min, 10 and 15 are taken.
    const longer = (await change({ splittable: true, likelyMinutes: 50, longMinutes: 80 }, 2).expect(200)).body;
    expect([longer.leftMinutes, longer.leftLongMinutes, longer.rev]).toEqual([40, 65, 3]);
    expect(await refused(change({ splittable: true, likelyMinutes: 10, longMinutes: 15 }, 3))).toEqual([
      400,
      'invalid',
      {
        likelyMinutes: '10\u00a0min of it are done or in hand. Type more than that.',
        longMinutes: '15\u00a0min of it are done or in hand. Type more than that.',
      },
    ]);
    const bay = await crew.place('Bay 1');
    expect((await refused(change({ splittable: true, placeId: bay.id }, 3)))[2]).toEqual({
      placeId: 'Technician of own has it in hand. Give it back first, then change the place.',
    });
  });
});

describe('taking', () => {
  test('begins now and lasts the long estimate; nothing of it is left, and screens hear of it once', async () => {
    const work = await crew.add();
    server.hub.told.length = 0;
    const mine = await crew.take(work);
    expect(mine).toMatchObject({ state: 'taken', leftMinutes: 0, leftLongMinutes: 0 });
    expect(spanOf(stintOf(mine))).toBe('08:00–09:00');
    expect(stintOf(mine)).toMatchObject({ person: { id: 'own-technician' }, givenBy: null, waitOf: null });
    expect(server.hub.of('bench:changed')).toHaveLength(1);
    expect(await refused(take(work.id, {}, 'manager'))).toEqual([
      409,
      'nothing_left',
      'Technician of own has it from 10:00. Nothing of it is left.',
    ]);
  });

  test('twice with one key takes it once', async () => {
    const work = await crew.add({ splittable: true, likelyMinutes: 60, longMinutes: 90 });
    const once = key();
    const send = () =>
      server.agentFor('technician').post(`/api/work/${work.id}/take`, { minutes: 30 }).set('Idempotency-Key', once);
    const [one, other] = [await send(), await send()];
    expect([one.status, other.status, other.body.stints.length]).toEqual([200, 200, 1]);
    expect((await crew.seen(work.id)).leftLongMinutes).toBe(60);
  });

  test('goes around the break and over the night: 60 min from 11:40 end at 13:10, 600 min from 16:00 on Wednesday', async () => {
    await crew.staff('technician', { breaks: [{ from: '12:00', to: '12:30' }] });
    const short = await crew.take(await crew.add(), { from: crew.minutes(100) });
    expect(spanOf(stintOf(short))).toBe('09:40–11:10');
    const long = await crew.take(await crew.add({ likelyMinutes: 400, longMinutes: 600 }), {
      from: crew.minutes(360),
    });
    // An hour until 17:00, then 08:00 to 12:00 and 12:30 to 17:00, then half an hour on Thursday.
    expect(stintOf(long)).toMatchObject({ from: '2026-06-09T14:00:00.000Z', to: '2026-06-11T06:30:00.000Z' });
  });

  test('outside one’s hours goes by the clock', async () => {
    const mine = await crew.take(await crew.add(), { from: crew.minutes(8 * 60) });
    expect(spanOf(stintOf(mine))).toBe('16:00–17:00');
  });

  test('a beginning up to 5 min ago is now; further back it is refused at its field', async () => {
    const work = await crew.add();
    expect(await refused(take(work.id, { from: crew.minutes(-6) }))).toEqual([
      400,
      'invalid',
      { from: '09:54 is over. Take a time that is still to come.' },
    ]);
    expect(spanOf(stintOf(await crew.take(work, { from: crew.minutes(-4) })))).toBe('08:00–09:00');
  });

  test('for others needs the foreman’s role: 403 for a technician; who is given it is told by whom', async () => {
    const work = await crew.add();
    const personId = 'own-technician';
    const [status, code, told] = await refused(take(work.id, { personId: 'own-foreman' }));
    expect([status, code]).toEqual([403, 'forbidden']);
    expect(told).toContain('needs the role foreman. You are signed in as technician.');
    const given = await crew.take(work, { personId }, 'foreman');
    expect(stintOf(given)).toMatchObject({ person: { id: personId }, givenBy: { id: 'own-foreman' } });
    expect((await refused(take(work.id, { personId: 'other-technician' }, 'foreman')))[2]).toEqual({
      personId: 'This person is not on the list. Choose another.',
    });
  });

  test('is given to nobody who is not there: a day off, a break, the evening', async () => {
    await crew.staff('technician', {
      breaks: [{ from: '12:00', to: '12:30' }],
      daysOff: [{ from: '2026-06-10', to: '2026-06-10', note: null }],
    });
    const work = await crew.add();
    const give = (from: string) => refused(take(work.id, { personId: 'own-technician', from }, 'foreman'));
    expect(await give(crew.minutes(130))).toEqual([
      409,
      'away',
      'Technician of own is not there at 12:10. The next time is 12:30.',
    ]);
    expect((await give(crew.minutes(24 * 60)))[2]).toBe(
      'Technician of own is not there at Wed 10:00. The next time is Thu 08:00.',
    );
  });

  test('needs the skill: 409 names who has it', async () => {
    const skill = await crew.skill('High voltage');
    const work = await crew.add({ skillId: skill.id });
    expect(await refused(take(work.id))).toEqual([
      409,
      'no_skill',
      'This needs the skill High voltage, which Technician of own does not have. Nobody has it yet: a manager writes it down for them.',
    ]);
    await crew.staff('manager', { skillIds: [skill.id] });
    await crew.staff('foreman', { skillIds: [skill.id] });
    expect((await refused(take(work.id)))[2]).toContain('Foreman of own and Manager of own have it.');
    await crew.staff('technician', { skillIds: [skill.id] });
    expect((await crew.take(work)).state).toBe('taken');
  });

  test('needs the place: 409 says by whom and until when; from then on it is free', async () => {
    const bay = await crew.place('Bay 1');
    const first = await crew.add({ placeId: bay.id });
    const second = await crew.add({ placeId: bay.id, title: 'Tyres' });
    await crew.take(first);
    expect(await refused(take(second.id, { from: crew.minutes(59) }, 'manager'))).toEqual([
      409,
      'place_taken',
      'Bay 1 is taken until 11:00 by Technician of own: Brake bleed W-0001.',
    ]);
    expect((await crew.take(second, { from: crew.minutes(60) }, 'manager')).state).toBe('taken');
  });

  test('has nobody in two places: 409 says what else one has then', async () => {
    await crew.take(await crew.add(), { from: crew.minutes(30) });
    const other = await crew.add({ title: 'Tyres' });
    expect(await refused(take(other.id))).toEqual([
      409,
      'elsewhere',
      'Technician of own has Brake bleed W-0001 from 10:30 to 11:30. Take another time, or give that back.',
    ]);
    expect((await crew.take(other, {}, 'manager')).state).toBe('taken');
  });

  test('of work that is over is 409', async () => {
    const work = await crew.add();
    await taken(crew.send(`work/${work.id}/drop`, { reason: 'Sold.' }));
    expect(await refused(take(work.id))).toEqual([
      409,
      'wrong_state',
      'Brake bleed W-0001 was dropped at 10:00. Bring it back first.',
    ]);
  });
});

describe('a part', () => {
  test('takes its share of the likely estimate: 30 of 90 min take 20 of 60; the rest stays open', async () => {
    const work = await crew.add({ splittable: true, likelyMinutes: 60, longMinutes: 90 });
    const part = await crew.take(work, { minutes: 30 });
    expect(part).toMatchObject({ state: 'open', leftMinutes: 40, leftLongMinutes: 60 });
    const rest = await crew.take(work, {}, 'manager');
    expect(rest).toMatchObject({ state: 'taken', leftMinutes: 0, leftLongMinutes: 0 });
    expect(rest.stints.map(spanOf).sort()).toEqual(['08:00–08:30', '08:00–09:00']);
  });

  test('is at least 15 min and no more than is left; the last rest is taken whole however short it is', async () => {
    const work = await crew.add({ splittable: true, likelyMinutes: 30, longMinutes: 40 });
    expect((await refused(take(work.id, { minutes: 14 })))[2]).toEqual({
      minutes: 'A part is at least 15\u00a0min. Type more, or take all of it.',
    });
    expect((await refused(take(work.id, { minutes: 41 })))[2]).toEqual({
      minutes: 'Only 40\u00a0min of it are left. Type fewer.',
    });
    await crew.take(work, { minutes: 30 });
    expect((await crew.take(work, {}, 'manager')).leftLongMinutes).toBe(0);
  });

  test('of what is done in one go is refused', async () => {
    const work = await crew.add();
    expect((await refused(take(work.id, { minutes: 30 })))[2]).toEqual({
      minutes: 'This is done in one go: 60\u00a0min. Leave the minutes empty.',
    });
    expect((await crew.take(work, { minutes: 60 })).state).toBe('taken');
  });
});
