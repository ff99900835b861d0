import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import { benchOrder, onTheWall, wallOrder } from '@/server/services/board-order';
import { Wall } from '@/server/entities/wall';
import type { ChargeCardDto } from '@/shared/contract/charge';
import type { BoardDto } from '@/shared/contract/board';
import { at, boardOf, did, hour, kept, makeBench, minute, running, seen, type Bench } from '../charges/bench';

let bench: Bench;
beforeEach(async () => {
  bench = await makeBench();
});
afterEach(() => bench.server.close());

/** Tuesday 9 June, 13:42 in Berlin: the scene of the pictures wall-7 and phone-bench. */
const now = Date.parse('2026-06-09T11:42:00Z');
const clock = (text: string): string => new Date(Date.parse(`2026-06-09T${text}:00Z`) - 2 * hour).toISOString();
function card(number: string, stage: ChargeCardDto['stage'], more: Partial<ChargeCardDto> = {}, likely?: string) {
  const ready = likely ? { early: clock(likely), likely: clock(likely), late: clock(likely) } : null;
  return {
    number,
    stage,
    overdueSince: null,
    nextLookInAt: null,
    readyAt: null,
    checkDueAt: null,
    stoppedAt: null,
    ready,
    clipOnAt: clock('14:00'),
    ...more,
  } as ChargeCardDto;
}
const scene = [
  card('R-2418', 'queued', {}, '17:05'),
  card('R-2415', 'discharging', {}, '17:20'),
  card('R-2411', 'charging', { nextLookInAt: clock('13:50') }, '15:30'),
  card('R-2413', 'tapering', {}, '15:00'),
  card('R-2409', 'check-due', { checkDueAt: clock('13:30') }),
  card('R-2412', 'resting', {}, '14:25'),
  card('R-2406', 'tapering', { overdueSince: clock('13:20') }, '14:55'),
];

describe('the order', () => {
  test('on the wall as in the picture of seven: overdue, check due, then by likely finish', () => {
    expect(wallOrder(scene).map((one) => one.number)).toEqual([
      'R-2406',
      'R-2409',
      'R-2412',
      'R-2413',
      'R-2411',
      'R-2418',
      'R-2415',
    ]);
  });

  test('on the bench a look-in within 10 min comes before what runs, and queued after it', () => {
    expect(benchOrder(scene, now).map((one) => one.number)).toEqual([
      'R-2406',
      'R-2409',
      'R-2411',
      'R-2412',
      'R-2413',
      'R-2415',
      'R-2418',
    ]);
  });

  test('ready comes after check due; of two overdue the longer one first; it does not depend on the order they come in', () => {
    const more = [
      ...scene,
      card('R-2408', 'ready', { readyAt: clock('13:35') }),
      card('R-2400', 'charging', { overdueSince: clock('12:00') }, '16:00'),
    ];
    const expected = ['R-2400', 'R-2406', 'R-2409', 'R-2408', 'R-2412'];
    expect(
      wallOrder(more)
        .map((one) => one.number)
        .slice(0, 5),
    ).toEqual(expected);
    expect(
      wallOrder([...more].reverse())
        .map((one) => one.number)
        .slice(0, 5),
    ).toEqual(expected);
  });

  test('planned is not on the wall; ready is for 30 min', () => {
    expect(onTheWall(card('R-1', 'planned'), now)).toBe(false);
    expect(onTheWall(card('R-2', 'ready', { readyAt: clock('13:35') }), now)).toBe(true);
    expect(onTheWall(card('R-2', 'ready', { readyAt: clock('13:11') }), now)).toBe(false);
  });
});

describe('the board', () => {
  test('shows planned to people only; channels with who is on them; opening hours of the day', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1'), repairRef: 'R-1' });
    await kept(bench, { spareId: await bench.spare('S-2') }, { channel: 'B1' });
    const board = await boardOf(bench);
    expect(board.charges.map((one) => one.stage)).toEqual(['charging', 'planned']);
    expect(board.channels.map(({ name, chargeTitle }) => [name, chargeTitle])).toEqual([
      ['A1', 'R-1'],
      ['B1', null],
      ['C1', null],
    ]);
    expect(board.workshop.zone).toBe('Europe/Berlin');
    expect(at(board.openToday!.from)).toBeLessThan(at(board.openToday!.to));
    expect(board.charges[0]).toMatchObject({ id: charge.id, person: { id: 'own-technician' }, channelNames: ['A1'] });
  });

  test('every change counts its revision up by one and is told with it', async () => {
    const before = (await boardOf(bench)).rev;
    const charge = await kept(bench, { spareId: await bench.spare('S-1') });
    expect((await boardOf(bench)).rev).toBe(before + 1);
    const told = bench.server.hub.of('board:changed') as { rev: number; chargeId: string }[];
    expect(told.at(-1)).toMatchObject({ rev: before + 1, chargeId: charge.id });
  });

  test('a wall reads the board and nothing of another workshop, and no person reads the wall’s', async () => {
    await running(bench, { spareId: await bench.spare('S-1') });
    await kept(bench, { spareId: await bench.spare('S-2') }, { channel: 'B1' });
    await bench.as('technician').get('/api/wall/board').expect(401);
    const { wallBoard } = await import('@/server/services/board.service');
    const own = await wallBoard(bench.server.deps, bench.server.own.id, bench.server.clock.now());
    expect(own.charges.map((one) => one.stage)).toEqual(['charging']);
    const other = await wallBoard(bench.server.deps, bench.server.other.id, bench.server.clock.now());
    expect(other).toMatchObject({ charges: [], channels: [] } satisfies Partial<BoardDto>);
    expect(await bench.server.deps.dataSource.manager.count(Wall)).toBe(0);
  });

  test('levels move on though nobody reads anything: after an hour 10 Ah more are in the groups', async () => {
    const charge = await running(bench, { spareId: await bench.spare('S-1') });
    await bench.live(hour);
    const [one] = (await boardOf(bench)).charges;
    // A sixth of 60 Ah from 26.97 %: between the table's 3.869 V at 37.40 % and 3.909 V at 47.83 %.
    for (const group of one!.groups) {
      expect(group.volts).toBeGreaterThan(3.869);
      expect(group.volts).toBeLessThan(3.909);
      expect(group.fromVolts).toBeCloseTo(3.802, 3);
    }
    expect(charge.groups[0]!.volts).toBeLessThan(3.82);
  });

  test('a charge for a clip-on time that has passed moves with the clock', async () => {
    const charge = await kept(bench, { spareId: await bench.spare('S-1') });
    const clipOnAt = new Date(bench.server.clock.now() + hour).toISOString();
    const queued = await did(bench, charge, 'queue', { clipOnAt });
    bench.server.clock.advance(hour + 20 * minute);
    const late = await seen(bench, queued.id);
    expect(Math.abs(at(late.ready!.likely) - at(queued.ready!.likely) - 20 * minute)).toBeLessThan(10);
    expect(late.plannedReady).toEqual(queued.plannedReady);
  });
});

describe('the lists', () => {
  test('open ones and closed ones apart, the last to end first', async () => {
    const first = await running(bench, { spareId: await bench.spare('S-1') });
    await did(bench, first, 'stop', { reason: 'x' });
    bench.server.clock.advance(20 * minute);
    const second = await running(bench, { spareId: await bench.spare('S-2') });
    await did(bench, second, 'stop', { reason: 'x' });
    const third = await kept(bench, { spareId: await bench.spare('S-3') });
    bench.server.clock.advance(20 * minute);
    const list = async (query: string) =>
      ((await bench.as('technician').get(`/api/charges?${query}`)).body as ChargeCardDto[]).map((one) => one.id);
    expect(await list('closed=1')).toEqual([second.id, first.id]);
    expect(await list('closed=1&page=2')).toEqual([]);
    expect(await list('open=1')).toEqual([third.id]);
    const bad = await bench.as('technician').get('/api/charges?closed=1&page=-1');
    expect(bad.status).toBe(400);
    expect(bad.body).toMatchObject({ fields: { page: 'Pages are counted from 1.' } });
  });
});
