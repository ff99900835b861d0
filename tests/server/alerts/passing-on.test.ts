import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { AlertTurn } from '@/server/entities/alert-turn';
import { Person } from '@/server/entities/person';
import type { AlertDto } from '@/shared/contract/alert';
import type { ChargeDto } from '@/shared/contract/charge';
import { alertsOf, at, did, hour, minute, running, seen } from '../charges/bench';
import { checkDue, makePost, withBrowser, type Post } from './post';

let post: Post;
beforeEach(async () => {
  post = await makePost();
});
afterEach(() => post.close());

const turns = async (alertId: string) =>
  (
    await post.bench.server.deps.dataSource.manager.find(AlertTurn, { where: { alertId }, order: { number: 'ASC' } })
  ).map(({ audience, personId, fromAt, takenById, endedBy }) => ({ audience, personId, fromAt, takenById, endedBy }));
const alertOf = async (id: string): Promise<AlertDto> => (await alertsOf(post.bench)).find((one) => one.id === id)!;
const taken = (alertId: string) =>
  post.push.taken.filter(({ notice }) => notice.id === alertId).map(({ browser, notice }) => [browser, notice.turn]);

describe('an alert that nobody takes', () => {
  test('goes to the foremen after 10 min and to the managers after 10 more, and stays there; who had it is kept', async () => {
    for (const role of ['technician', 'foreman', 'manager'] as const) await withBrowser(post, role);
    const { alert } = await checkDue(post);
    const due = Date.parse(alert.raisedAt);
    await post.live(9 * minute);
    expect(taken(alert.id)).toEqual([['technician', 0]]);
    await post.live(minute);
    expect(taken(alert.id)).toEqual([
      ['technician', 0],
      ['foreman', 1],
    ]);
    expect(await alertOf(alert.id)).toMatchObject({
      for: { id: 'own-technician' },
      forRole: 'foreman',
      passedAt: new Date(due + 10 * minute).toISOString(),
    });
    await post.live(10 * minute);
    await post.live(3 * hour, 10 * minute);
    expect(taken(alert.id)).toEqual([
      ['technician', 0],
      ['foreman', 1],
      ['manager', 2],
    ]);
    expect(await turns(alert.id)).toEqual([
      { audience: 'person', personId: 'own-technician', fromAt: due, takenById: null, endedBy: 'not-taken' },
      { audience: 'foremen', personId: null, fromAt: due + 10 * minute, takenById: null, endedBy: 'not-taken' },
      { audience: 'managers', personId: null, fromAt: due + 20 * minute, takenById: null, endedBy: null },
    ]);
    const { events } = await seen(post.bench, alert.chargeId!);
    expect(events.filter(({ kind }) => kind === 'alert').map(({ text }) => text)).toContain(
      'Nobody took it for 10\u00a0min, it went on to Foreman of own: rested 1\u00a0h\u00a000.',
    );
  });

  test('is heard at once by those it goes on to', async () => {
    const { alert } = await checkDue(post);
    await post.live(10 * minute);
    const told = post.bench.server.hub.told.filter(
      ({ event, personId, payload }) =>
        event === 'alert:raised' && personId !== undefined && (payload as AlertDto).id === alert.id,
    );
    expect(told.map(({ personId, payload }) => [personId, (payload as AlertDto).forRole])).toEqual([
      ['own-foreman', 'foreman'],
    ]);
  });

  test('that is an alarm goes on after 5 min; what only tells never does', async () => {
    const charge = await running(post.bench, { spareId: await post.bench.spare('S-90'), repairRef: 'R-1' });
    await post.live(at(charge.startedAt) + 61 * minute - post.bench.server.clock.now(), 5 * minute);
    const look = (await alertsOf(post.bench)).find(({ kind }) => kind === 'look-in-due')!;
    await post.live(25 * minute);
    expect((await alertOf(look.id)).forRole).toBeNull();
    await did(post.bench, await seen(post.bench, charge.id), 'hold', { reason: 'no air' });
    await post.live(at(charge.plannedReady.late) - post.bench.server.clock.now(), 10 * minute);
    await post.live(minute);
    const alarm = (await alertsOf(post.bench)).find(({ kind }) => kind === 'overdue')!;
    expect(alarm.forRole).toBeNull();
    await post.live(5 * minute);
    expect((await alertOf(alarm.id)).forRole).toBe('foreman');
  });

  test('by other minutes where the workshop has set them, and never where they are 0', async () => {
    const { body } = await post.bench.as('manager').get('/api/workshop').expect(200);
    const change = { passOnAmberMinutes: 3, passOnAlarmMinutes: 0 };
    await post.bench.as('manager').patch('/api/workshop', change).set('If-Match', `"${body.rev}"`).expect(200);
    const { alert } = await checkDue(post);
    await post.live(3 * minute);
    expect((await alertOf(alert.id)).forRole).toBe('foreman');
    await post.live(40 * minute, 5 * minute);
    const alarm = (await alertsOf(post.bench)).find(({ kind }) => kind === 'overdue')!;
    expect(alarm.forRole).toBeNull();
  });

  test('leaves out a step that reaches nobody new: the only foreman’s own alert goes to the managers', async () => {
    const { alert } = await checkDue(post);
    await post.bench.as('technician').post(`/api/alerts/${alert.id}/pass`, { personId: 'own-foreman' }).expect(200);
    await post.live(10 * minute);
    expect((await alertOf(alert.id)).forRole).toBe('manager');
    expect((await turns(alert.id)).map(({ audience }) => audience)).toEqual(['person', 'person', 'managers']);
  });

  test('stays where nobody is left to go to', async () => {
    const { manager } = post.bench.server.deps.dataSource;
    for (const id of ['own-foreman', 'own-manager']) await manager.update(Person, { id }, { disabledAt: 1 });
    const { alert } = await checkDue(post);
    await post.live(hour, 10 * minute);
    expect(await alertOf(alert.id)).toMatchObject({ forRole: null, passedAt: null });
    expect(await turns(alert.id)).toHaveLength(1);
  });
});

describe('an alert that somebody takes', () => {
  test('goes on to nobody, and nothing more is sent for it by any way', async () => {
    for (const role of ['technician', 'foreman', 'manager'] as const) await withBrowser(post, role);
    const { alert } = await checkDue(post);
    await post.live(4 * minute);
    await post.bench.as('technician').post(`/api/alerts/${alert.id}/take`).expect(200);
    await post.live(2 * hour, 10 * minute);
    expect(taken(alert.id)).toEqual([['technician', 0]]);
    expect(await turns(alert.id)).toMatchObject([{ takenById: 'own-technician', endedBy: null }]);
    const { manager } = post.bench.server.deps.dataSource;
    const [turn] = await manager.findBy(AlertTurn, { alertId: alert.id });
    expect(turn!.takenAt).toBe(Date.parse((await alertOf(alert.id)).takenAt!));
  });

  test('and passes on is the other’s turn, who is told by push; the time runs anew', async () => {
    await withBrowser(post, 'foreman');
    const { alert } = await checkDue(post);
    await post.live(4 * minute);
    await post.bench.as('technician').post(`/api/alerts/${alert.id}/take`).expect(200);
    await post.bench.as('technician').post(`/api/alerts/${alert.id}/pass`, { personId: 'own-foreman' }).expect(200);
    await post.live(9 * minute);
    expect(taken(alert.id)).toEqual([['foreman', 1]]);
    expect((await alertOf(alert.id)).forRole).toBeNull();
    await post.bench.as('foreman').post(`/api/alerts/${alert.id}/take`).expect(200);
    expect(await turns(alert.id)).toMatchObject([
      { personId: 'own-technician', takenById: 'own-technician', endedBy: 'passed' },
      { personId: 'own-foreman', takenById: 'own-foreman', endedBy: null },
    ]);
  });

  test('after it went on to the foremen: it is theirs who took it, and the managers hear nothing', async () => {
    await withBrowser(post, 'manager');
    const { alert } = await checkDue(post);
    await post.live(12 * minute);
    await post.bench.as('foreman').post(`/api/alerts/${alert.id}/take`).expect(200);
    await post.live(hour, 10 * minute);
    expect(taken(alert.id)).toEqual([]);
    expect((await alertOf(alert.id)).takenBy).toMatchObject({ id: 'own-foreman' });
  });

  test('settled, it goes on to nobody', async () => {
    const { alert, charge } = await checkDue(post);
    await did(post.bench, charge as ChargeDto, 'rest-check', {
      groupVolts: [3.949, 3.949],
      celsius: 21,
      meterId: null,
    });
    await post.live(hour, 10 * minute);
    expect((await alertOf(alert.id)).forRole).toBeNull();
    expect(await turns(alert.id)).toMatchObject([{ endedBy: 'cleared' }]);
  });
});

describe('a server that was off', () => {
  test('over both steps: at the start it goes to the foremen, and 10 min later to the managers', async () => {
    for (const role of ['foreman', 'manager'] as const) await withBrowser(post, role);
    const { alert } = await checkDue(post);
    post.bench.server.clock.advance(3 * hour);
    post.restart();
    await post.bench.sleeper.runDue();
    await post.dispatcher.start();
    expect(taken(alert.id)).toEqual([['foreman', 1]]);
    await post.live(9 * minute);
    expect(taken(alert.id)).toEqual([['foreman', 1]]);
    await post.live(minute);
    expect(taken(alert.id)).toEqual([
      ['foreman', 1],
      ['manager', 2],
    ]);
  });

  test('restarted before each minute, it passes on once', async () => {
    await withBrowser(post, 'foreman');
    const { alert } = await checkDue(post);
    for (let turn = 0; turn < 15; turn += 1) {
      post.restart();
      await post.live(minute);
    }
    expect(taken(alert.id)).toEqual([['foreman', 1]]);
  });
});

test('a clock that is set back an hour makes it wait no longer than its 10 min from then', async () => {
  const { alert } = await checkDue(post);
  await post.live(5 * minute);
  post.bench.server.clock.advance(-hour);
  await post.live(11 * minute);
  expect((await alertOf(alert.id)).forRole).toBe('foreman');
});
