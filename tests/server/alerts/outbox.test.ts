import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { UndeliveredDto } from '@/shared/contract/alert-settings';
import { did, hour, minute, seen } from '../charges/bench';
import { checkDue, makePost, withBrowser, withPhone, wish, type Post } from './post';

let post: Post;
beforeEach(async () => {
  post = await makePost();
});
afterEach(() => post.close());

const clock = () => post.bench.server.clock;
const everyWay = {
  ways: [{ kind: 'check-due', level: 'amber', ways: ['browser-push', 'phone-push', 'e-mail'] }],
} as const;
const wanted = () => ({ ways: everyWay.ways.map((cause) => ({ ...cause, ways: [...cause.ways] })) });

describe('one alert by three ways', () => {
  test('is written with the alert, one row a way, and each comes once under the id of the alert', async () => {
    await withBrowser(post, 'technician');
    await withPhone(post, 'technician');
    await wish(post, 'technician', wanted());
    const { alert } = await checkDue(post);
    const before = (await post.entries()).filter((entry) => entry.alertId === alert.id);
    expect(before.map(({ way, state, turn }) => [way, state, turn])).toEqual([
      ['browser-push', 'waiting', 0],
      ['e-mail', 'waiting', 0],
      ['phone-push', 'waiting', 0],
    ]);
    await post.dispatcher.runDue();
    await post.dispatcher.runDue();
    expect(post.push.taken.map(({ notice }) => notice.tag)).toEqual([alert.id]);
    expect(post.phones.taken.map(({ data }) => data.id)).toEqual([alert.id]);
    expect(post.mail.caught.map(({ headers }) => headers['message-id'])).toEqual([`<${alert.id}.0@bench.example.com>`]);
    expect((await post.entries()).filter((entry) => entry.alertId === alert.id).map(({ state }) => state)).toEqual([
      'sent',
      'sent',
      'sent',
    ]);
  });

  test('goes nowhere without a device, and by the ways that its person has chosen alone', async () => {
    await withBrowser(post, 'technician');
    await wish(post, 'technician', { ways: [{ kind: 'check-due', level: 'amber', ways: ['app', 'phone-push'] }] });
    const { alert } = await checkDue(post);
    await post.dispatcher.runDue();
    expect((await post.entries()).filter((entry) => entry.alertId === alert.id)).toEqual([]);
    expect(post.push.taken).toEqual([]);
  });

  test('a row is there once for an alert, a turn, a person and a way: a second is refused by the database', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    const { manager } = post.bench.server.deps.dataSource;
    const [row] = (await post.entries()).filter((entry) => entry.alertId === alert.id);
    await expect(manager.insert('outbox_entry', { ...row, id: 'another' })).rejects.toThrow(/UNIQUE/);
  });
});

describe('a process that ends', () => {
  test('between the commit and the sending: the next one sends it, once, and says how late', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    clock().advance(40 * minute);
    post.restart();
    await post.dispatcher.start();
    await post.dispatcher.runDue();
    const own = post.push.taken.filter(({ notice }) => notice.id === alert.id);
    expect(own).toHaveLength(1);
    expect(own[0]!.notice.body).toMatch(/Sent 40\u00a0min late, from \d\d:\d\d\.$/);
  });

  test('between the sending and the mark: it is sent again under the same id, and is one to the receiver', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    // The process dies before it can write down what came of it: the lease stands.
    const { dataSource } = post.bench.server.deps;
    await post.dispatcher.runDue();
    await dataSource.query("UPDATE outbox_entry SET state = 'waiting', leased_until = ?, tries = 0, reached = '[]'", [
      clock().now() + 5 * minute,
    ]);
    await post.dispatcher.runDue();
    expect(post.push.taken).toHaveLength(1);
    post.restart();
    await post.dispatcher.start();
    expect(post.push.taken.map(({ notice }) => notice.tag)).toEqual([alert.id, alert.id]);
    expect(new Set(post.push.taken.map(({ headers }) => headers.topic)).size).toBe(1);
  });

  test('with a lease, without a restart: after 5 min the lease is over and it goes out', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    await post.bench.server.deps.dataSource.query('UPDATE outbox_entry SET leased_until = ?', [
      clock().now() + 5 * minute,
    ]);
    await post.live(4 * minute);
    expect(post.push.taken).toEqual([]);
    await post.live(2 * minute);
    expect(post.push.taken.map(({ notice }) => notice.tag)).toEqual([alert.id]);
  });

  test('a transaction that fails leaves neither the alert nor anything to send', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    const count = (await post.entries()).length;
    await post.bench.server.deps.dataSource.query(
      "CREATE TRIGGER no_turns BEFORE INSERT ON alert_turn BEGIN SELECT RAISE(ABORT, 'disk'); END",
    );
    const answer = await post.bench.as('technician').post(`/api/alerts/${alert.id}/pass`, { personId: 'own-foreman' });
    expect(answer.status).toBe(500);
    expect((await post.entries()).length).toBe(count);
  });
});

describe('what is not needed any more is not sent', () => {
  test('taken before it went out', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    await post.bench.as('foreman').post(`/api/alerts/${alert.id}/take`).expect(200);
    await post.live(hour, 10 * minute);
    expect(post.push.taken.filter(({ notice }) => notice.id === alert.id)).toEqual([]);
    const rows = (await post.entries()).filter((entry) => entry.alertId === alert.id);
    expect(rows.map(({ state, reason }) => [state, reason])).toEqual([['dropped', 'Somebody has it.']]);
  });

  test('settled between two tries', async () => {
    await withBrowser(post, 'technician');
    const { alert, charge } = await checkDue(post);
    post.push.answers.push({ status: 503 });
    await post.dispatcher.runDue();
    await did(post.bench, await seen(post.bench, charge.id), 'rest-check', {
      groupVolts: [3.949, 3.949],
      celsius: 21,
      meterId: null,
    });
    await post.live(hour, 10 * minute);
    expect(post.push.taken.filter(({ notice }) => notice.id === alert.id)).toEqual([]);
  });

  test('its person was disabled', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    await post.bench.server.deps.dataSource.query("UPDATE person SET disabled_at = 1 WHERE id = 'own-technician'");
    await post.dispatcher.runDue();
    expect(post.push.taken.filter(({ notice }) => notice.id === alert.id)).toEqual([]);
  });

  test('the device was signed out', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    await post.bench.server.deps.dataSource.query(
      "UPDATE session SET ended_at = 1, end_reason = 'sign-out' WHERE id = 'session-own-technician'",
    );
    await post.dispatcher.runDue();
    expect(post.push.taken.filter(({ notice }) => notice.id === alert.id)).toEqual([]);
  });
});

describe('a service that fails', () => {
  const undelivered = async (): Promise<UndeliveredDto[]> =>
    (await post.bench.as('manager').get('/api/alerts/undelivered').expect(200)).body as UndeliveredDto[];

  test('is tried again after 2.5–5 s, then up to twice as long each time, and one that recovers gets it once', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    post.push.answers.push({ status: 503 }, { status: 500 }, { status: 429 });
    const waits: number[] = [];
    for (let round = 0; round < 3; round += 1) {
      await post.dispatcher.runDue();
      const [row] = (await post.entries()).filter((entry) => entry.alertId === alert.id);
      waits.push(row!.dueAt - clock().now());
      clock().set(row!.dueAt);
    }
    for (const [round, wait] of waits.entries()) {
      expect(wait).toBeGreaterThanOrEqual(2500 * 2 ** round);
      expect(wait).toBeLessThanOrEqual(5000 * 2 ** round);
    }
    await post.dispatcher.runDue();
    expect(post.push.taken).toHaveLength(1);
    expect(await undelivered()).toEqual([]);
  });

  test('is not asked before the time it has named', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    post.push.answers.push({ status: 429, retryAfterS: 90 });
    await post.dispatcher.runDue();
    const [row] = (await post.entries()).filter((entry) => entry.alertId === alert.id);
    expect(row!.dueAt - clock().now()).toBe(90_000);
  });

  test('12 times over is given up, the manager sees it and sends it again', async () => {
    await withBrowser(post, 'technician');
    // What comes of it when nobody checks would go by the same way.
    await wish(post, 'technician', { ways: [{ kind: 'overdue', level: 'alarm', ways: [] }] });
    const { alert } = await checkDue(post);
    post.push.answers.push(...Array.from({ length: 12 }, () => ({ status: 503 })));
    await post.live(2 * hour, minute);
    const dead = (await undelivered()).filter((one) => one.alert.id === alert.id && one.person.id === 'own-technician');
    expect(dead).toMatchObject([
      {
        alert: { kind: 'check-due', level: 'amber', title: 'R-2409 at A1' },
        way: 'browser-push',
        tries: 12,
        reason: 'The push service said 503: not now.',
        open: true,
      },
    ]);
    expect(post.push.answers).toEqual([]);
    await post.live(hour, 10 * minute);
    expect(post.push.taken.filter(({ notice }) => notice.id === alert.id)).toEqual([]);
    await post.bench.as('manager').post(`/api/alerts/undelivered/${dead[0]!.id}/again`).expect(204);
    await post.dispatcher.runDue();
    expect(post.push.taken.filter(({ notice }) => notice.id === alert.id)).toHaveLength(1);
    expect(await undelivered()).toEqual([]);
  });

  test('for good is given up at once; the manager drops it, and what is settled is not sent again', async () => {
    await withBrowser(post, 'technician');
    const { alert } = await checkDue(post);
    post.push.answers.push({ status: 403 });
    await post.dispatcher.runDue();
    const [dead] = await undelivered();
    expect(dead).toMatchObject({ tries: 1, reason: 'The push service said 403: not now.' });
    await post.bench.as('foreman').post(`/api/alerts/${alert.id}/take`).expect(200);
    expect((await undelivered())[0]!.open).toBe(false);
    const again = await post.bench.as('manager').post(`/api/alerts/undelivered/${dead!.id}/again`);
    expect(again.status).toBe(409);
    await post.bench.as('manager').post(`/api/alerts/undelivered/${dead!.id}/drop`).expect(204);
    expect(await undelivered()).toEqual([]);
  });

  test('on one of two devices is tried on that one alone', async () => {
    await withBrowser(post, 'technician', 'desk');
    // A second browser of the same person has a session of its own.
    const { manager } = post.bench.server.deps.dataSource;
    const { endpoint, keys } = post.push.subscribe('hall');
    const [session] = (await manager.query("SELECT * FROM session WHERE id = 'session-own-technician'")) as object[];
    await manager.insert('session', { ...camel(session!), id: 'second', tokenHash: 'second' });
    await manager.insert('push_device', {
      ...{ id: 'hall', workshopId: 'workshop-own', personId: 'own-technician', sessionId: 'second' },
      ...{ kind: 'browser', address: endpoint, ...keys, name: 'Hall', createdAt: clock().now() + 1 },
    });
    await checkDue(post);
    post.push.answers.push(undefined, { status: 500 });
    await post.dispatcher.runDue();
    await post.live(minute);
    expect(post.push.taken.map(({ browser }) => browser)).toEqual(['desk', 'hall']);
  });
});

const camel = (row: object): Record<string, unknown> =>
  Object.fromEntries(
    Object.entries(row).map(([name, value]) => [
      name.replace(/_(\w)/g, (_, letter: string) => letter.toUpperCase()),
      value,
    ]),
  );

test('a clock that is set back an hour neither stops what waits nor doubles what was sent', async () => {
  await withBrowser(post, 'technician');
  const { alert } = await checkDue(post);
  post.push.answers.push({ status: 503 });
  await post.dispatcher.runDue();
  clock().advance(-hour);
  await post.dispatcher.runDue();
  await post.dispatcher.runDue();
  expect(post.push.taken.map(({ notice }) => notice.tag)).toEqual([alert.id]);
});
