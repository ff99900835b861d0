import { describe, expect, it } from 'vitest';
import { benchOrder, leftS, readyOf } from '@/shared/ui/charge/card-model';
import { cardRibbon, columnGroups, columnScale, oddGroup } from '@/shared/ui/charge/card-drawings';
import { at, card, iso, now } from './charges';

const clock = (time = now, asOf = now) => ({ now: time, asOf });
const minute = 60_000;

describe('the order of the bench', () => {
  it('is overdue, check due, a hand, look-in within 10 min, running by likely finish, held, queued, planned, ready', () => {
    const cards = [
      card('ready', 'ready', null, { readyAt: iso('13:35') }),
      card('planned', 'planned', ['15:00', '15:10', '15:20'], { startedAt: null }),
      card('queued', 'queued', ['17:00', '17:05', '18:05'], { startedAt: null, clipOnAt: iso('14:00') }),
      card('held', 'held', ['14:00', '14:05', '14:10'], { heldAt: iso('13:30'), heldFrom: 'charging' }),
      card('later', 'charging', ['15:15', '15:30', '15:55'], { nextLookInAt: iso('13:53') }),
      card('sooner', 'resting', ['14:18', '14:25', '14:50']),
      card('look-in', 'charging', ['19:00', '19:30', '20:00'], { nextLookInAt: iso('13:52') }),
      card('hand', 'charging', ['19:00', '19:30', '20:00'], { nextHand: 'Swap to group 2' }),
      card('check', 'check-due', null, { checkDueAt: iso('13:30') }),
      card('late', 'tapering', ['14:45', '14:55', '15:30'], { overdueSince: iso('13:20') }),
    ];
    expect(benchOrder(cards, clock()).map(({ title }) => title)).toEqual([
      'late',
      'check',
      'hand',
      'look-in',
      'sooner',
      'later',
      'held',
      'queued',
      'planned',
      'ready',
    ]);
  });
});

describe('what waits moves with the clock', () => {
  const held = card('R-2417', 'held', ['16:25', '16:40', '17:40'], { heldAt: iso('13:30'), heldFrom: 'charging' });

  it('a held charge told at 13:42 is 20 min later at 14:02, not the 32 min since its hold', () => {
    expect(readyOf(held, clock(at('14:02')))?.p50).toBe(at('17:00'));
    expect(leftS(held, clock(at('14:02')))).toBe(178 * 60);
  });

  it('a plan whose clip-on time has passed ends as much later as it is late, and its length stays', () => {
    const late = card('R-2423', 'planned', ['16:00', '16:10', '16:30'], { clipOnAt: iso('13:12'), startedAt: null });
    expect(readyOf(late, clock())?.p50).toBe(at('16:10') + 30 * minute);
    expect(leftS(late, clock())).toBe(178 * 60);
  });

  it('a queued one moves only from its clip-on time, and only by what the server has not moved yet', () => {
    const queued = card('R-2418', 'queued', ['16:40', '17:05', '18:05'], { clipOnAt: iso('14:00'), startedAt: null });
    expect(readyOf(queued, clock(at('13:55')))?.p50).toBe(at('17:05'));
    expect(readyOf(queued, clock(at('14:10')))?.p50).toBe(at('17:15'));
    expect(readyOf(queued, clock(at('14:10'), at('14:04')))?.p50).toBe(at('17:11'));
  });

  it('a running one keeps its finish while the clock goes on', () => {
    const runs = card('R-2411', 'charging', ['15:15', '15:30', '15:55']);
    expect(readyOf(runs, clock(at('14:42')))?.p50).toBe(at('15:30'));
    expect(leftS(runs, clock(at('14:42')))).toBe(48 * 60);
  });
});

describe('the ribbon of a card', () => {
  it('leaves what was done before the hold in its place and moves the rest, band included', () => {
    const held = card('R-2417', 'held', ['15:15', '15:30', '15:55'], {
      heldAt: iso('13:30'),
      heldFrom: 'charging',
      segments: [
        { kind: 'cc', from: iso('11:50'), to: iso('13:30') },
        { kind: 'cc', from: iso('13:42'), to: iso('14:04') },
        { kind: 'rest', from: iso('14:04'), to: iso('15:04') },
      ],
    });
    const ribbon = cardRibbon(held, clock(at('13:52')), at('11:50'));
    const clockOf = (s: number) => new Date(at('11:50') + s * 1000 + 2 * 3_600_000).toISOString().slice(11, 16);
    expect(ribbon.segments.map(({ fromS, toS }) => [clockOf(fromS), clockOf(toS)])).toEqual([
      ['11:50', '13:30'],
      ['13:52', '14:14'],
      ['14:14', '15:14'],
    ]);
    expect(clockOf(ribbon.band!.p50)).toBe('15:40');
    expect(clockOf(ribbon.heldFromS!)).toBe('13:30');
  });

  it('of a ready charge is all done, has no mark of now and no look-in to come', () => {
    const ready = card('R-2408', 'ready', null, {
      readyAt: iso('15:30'),
      lookIns: [
        { id: 'a', dueAt: iso('12:50'), doneAt: iso('12:52'), by: null },
        { id: 'b', dueAt: iso('13:50'), doneAt: null, by: null },
      ],
    });
    const ribbon = cardRibbon(ready, clock(at('17:00')), at('11:50'));
    expect(ribbon.showsNow).toBe(false);
    expect(ribbon.band).toBeNull();
    expect(ribbon.lookIns.map(({ state }) => state)).toEqual(['done']);
    expect(Math.min(...ribbon.segments.map(({ toS }) => ribbon.nowS! - toS))).toBe(0);
  });

  it('has no now before it is clipped on', () => {
    expect(
      cardRibbon(card('R-2418', 'queued', ['16:40', '17:05', '18:05'], { startedAt: null }), clock(), now).nowS,
    ).toBeNull();
  });
});

describe('the columns of a card', () => {
  const lagging = (lagVolts: number) =>
    card('R-2406', 'tapering', ['14:45', '14:55', '15:30'], {
      laggingGroup: 1,
      lagVolts,
      groups: [
        { volts: 3.95, reckoned: true, fromVolts: 3.65, clipVolts: 3.97 },
        { volts: 3.95 - lagVolts, reckoned: true, fromVolts: 3.65, clipVolts: 3.97 },
      ],
    });

  it('a group that lags by less than the limit is not drawn odd; beyond 20 mV, or the workshop’s own 5 mV, it is', () => {
    expect(oddGroup(lagging(0.012))).toBeNull();
    expect(oddGroup(lagging(0.021))).toBe(1);
    expect(oddGroup(lagging(0.012), 0.005)).toBe(1);
    expect(columnGroups(lagging(0.037)).map(({ odd }) => odd)).toEqual([false, true]);
  });

  it('change to the near scale once every healthy group is within 40 mV, and keep the window in a list before', () => {
    expect(columnScale(lagging(0.012), 'list').kind).toBe('near');
    // 3.96 V is the target: a healthy group at 3.913 V is 47 mV away.
    const away = { ...lagging(0.012), groups: [{ volts: 3.913, reckoned: true, fromVolts: 3.65, clipVolts: null }] };
    expect(columnScale(away, 'list').kind).toBe('window');
    expect(columnScale(away, 'live')).toEqual({ kind: 'reach', lowVolts: 3.6, highVolts: 4.01 });
  });
});
