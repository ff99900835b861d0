import { describe, expect, it } from 'vitest';
import { addressOfLevers, leversOfAddress } from '@/shared/ui/waits/lever-address';
import { leverKeys, noLevers } from '@/shared/ui/waits/lever-form';
import { addressOf, mondayOf, readAddress } from '@/shared/ui/waits/wait-address';
import { againstPlan, usedShare } from '@/shared/ui/waits/wait-words';
import { weekBars } from '@/shared/ui/waits/week-bars';

/** A Tuesday. */
const today = '2026-06-09';

describe('the address of the waits', () => {
  it('without anything is eight weeks from a Monday on, this one the last, by module type and compared with nothing', () => {
    const read = readAddress({}, today);
    expect(read.query).toEqual({ from: '2026-04-20', to: today });
    expect(read).toMatchObject({ period: '8', by: 'module-type', show: 'wait', compare: 'none', compareDays: null });
  });

  it('gives the same page when it is written from what was read: seven filters, days, parting and comparison', () => {
    const params = {
      ...{ weeks: 'days', from: '2026-03-02', to: '2026-03-29', type: 't1', charger: 'c1', channel: 'a1' },
      ...{ technician: 'p2', way: 'paralleled', weekday: '2', stage: 'queue' },
      ...{ by: 'technician', show: 'plan', compare: 'before' },
    };
    const again = Object.fromEntries(new URLSearchParams(addressOf('/waits', params).split('?')[1]));
    expect(again).toEqual(params);
    const read = readAddress(again, today);
    expect(read.query).toEqual({
      ...{ from: '2026-03-02', to: '2026-03-29', moduleTypeId: 't1', chargerId: 'c1', channelId: 'a1' },
      ...{ technicianId: 'p2', way: 'paralleled', weekday: '2', stage: 'queue' },
    });
    expect(read.narrowed).toBe(7);
    // Days that are named are the same tomorrow.
    expect(readAddress(again, '2026-06-10').query).toEqual(read.query);
  });

  it('compares with as many whole weeks before, so that both begin and end on the same weekday', () => {
    for (const [weeks, back] of [
      ['4', 28],
      ['8', 56],
      ['13', 91],
    ] as const) {
      const { query, compareDays } = readAddress({ weeks, compare: 'before' }, today);
      expect((Date.parse(query.from) - Date.parse(compareDays!.from)) / 86_400_000).toBe(back);
      expect((Date.parse(query.to) - Date.parse(compareDays!.to)) / 86_400_000).toBe(back);
      expect(compareDays!.to < query.from).toBe(true);
    }
    expect(readAddress({ compare: 'year' }, today).compareDays).toEqual({ from: '2025-04-21', to: '2025-06-10' });
  });

  it('compares all time with nothing but days that are named, and with those only once both are there', () => {
    expect(readAddress({ weeks: 'all', compare: 'before' }, today).compareDays).toBeNull();
    expect(readAddress({ compare: 'days', cfrom: '2026-01-05' }, today).compareDays).toBeNull();
    expect(readAddress({ weeks: 'all', compare: 'days', cfrom: '2026-01-05', cto: '2026-02-01' }, today)).toMatchObject(
      {
        compareDays: { from: '2026-01-05', to: '2026-02-01' },
      },
    );
  });

  it('takes what it does not understand as not there, and never asks the server for it', () => {
    const bad = {
      ...{ weeks: '9', way: 'toString', weekday: '8', stage: 'fitted', by: 'colour', compare: 'x' },
      ...{ type: 'a b', from: '2026-06-31x', to: '2026-06-01', week: 'monday' },
    };
    expect(readAddress(bad, today)).toEqual(readAddress({}, today));
    // Turned days would be refused.
    expect(readAddress({ from: '2026-06-05', to: '2026-06-01' }, today).query.from).toBe('2026-04-20');
  });

  it('leaves out what is empty', () => {
    expect(addressOf('/waits', { weeks: '4', type: '', week: '' })).toBe('/waits?weeks=4');
    expect(addressOf('/waits', {})).toBe('/waits');
  });

  it('knows the Monday of each day of a week', () => {
    for (const day of ['2026-06-08', '2026-06-09', '2026-06-14']) expect(mondayOf(day)).toBe('2026-06-08');
    expect(mondayOf('2026-06-15')).toBe('2026-06-15');
  });
});

describe('the words of the waits', () => {
  it('give the plan a sign, minutes up to two hours, hours beyond', () => {
    expect([240, -720, 20, 7200, 7500, -36_060].map(againstPlan)).toEqual([
      '+4\u00a0min',
      '−12\u00a0min',
      '0\u00a0min',
      '+120\u00a0min',
      '+2\u00a0h\u00a005',
      '−10\u00a0h\u00a001',
    ]);
  });

  it('give no share of a wait that never fell into working hours', () => {
    expect(usedShare({ usedHours: 0, lostHours: 0 })).toBeNull();
    expect(usedShare({ usedHours: 58, lostHours: 42 })).toBeCloseTo(0.58, 9);
  });
});

describe('the bars of weeks', () => {
  const weeks = (count: number) =>
    Array.from({ length: count }, (_, at) => ({
      monday: new Date(Date.UTC(2026, 0, 5 + 7 * at)).toISOString().slice(0, 10),
      ...{ week: at + 2, charges: 3, few: true, waitHours: 9, medianS: 1, p90S: 1, usedHours: 2, lostHours: 4 },
    }));

  it('name each of eight weeks on a desk, and number them on a phone', () => {
    expect(weekBars(weeks(8), '2026-02-24', 560).map(({ label }) => label)).toEqual(
      [2, 3, 4, 5, 6, 7, 8, 9].map((week) => `wk ${week}`),
    );
    expect(weekBars(weeks(8), '2026-02-24', 320)[0]?.label).toBe('2');
  });

  it('of a year on a phone number so few that none stands in the next, and always the last', () => {
    const labels = weekBars(weeks(52), '2026-12-30', 320).map(({ label }) => label);
    expect(labels.at(-1)).toBe('53');
    const numbered = labels.flatMap((label, at) => (label === '' ? [] : [at]));
    numbered.slice(1).forEach((at, i) => expect((at - numbered[i]!) * (320 / 52)).toBeGreaterThanOrEqual(26));
  });
});

describe('the levers in the address', () => {
  const throughAddress = (params: Parameters<typeof addressOf>[1]) =>
    Object.fromEntries(new URLSearchParams(addressOf('/waits', params).split('?')[1]));

  it('come back from a link as they were ticked and typed: all seven, half a number and another tongue’s comma too', () => {
    const typed = {
      ...{ ticked: [...leverKeys], shelfTypeId: 't-1', shelfVolts: '3,88', ampsChannelId: 'a1', amps: '20.' },
      ...{ moreChannelId: 'c2', lookInMinutes: '90' },
    };
    expect(leversOfAddress(throughAddress({ weeks: '4', ...addressOfLevers(typed) }))).toEqual(typed);
  });

  it('leave nothing in it where none is ticked or typed, and are none where they are not understood', () => {
    expect(addressOf('/waits', addressOfLevers(noLevers))).toBe('/waits');
    expect(leversOfAddress({ levers: 'toString.startAtBooking.everything' })).toEqual({
      ...noLevers,
      ticked: ['startAtBooking'],
    });
  });
});
