import { DateTime } from 'luxon';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dayOptions, nearestQuarter, quarterHours } from '@/shared/ui/format/choices';
import { looksLikeMillivolts, parseNumber, parseTimeOfDay, typedDecimals } from '@/shared/ui/format/parse';
import { addDays, dayOf, daysBetween, instantOfDay, localTime } from '@/shared/ui/format/zone';

describe('zone arithmetic', () => {
  it('agrees with luxon on 300 days and times in five zones, the gap of spring aside', () => {
    fc.assert(
      fc.property(
        fc.constantFrom('Europe/Berlin', 'America/New_York', 'Asia/Kathmandu', 'Australia/Lord_Howe', 'UTC'),
        fc.integer({ min: 0, max: 3650 }),
        fc.integer({ min: 0, max: 1439 }),
        (zone, days, minute) => {
          const day = addDays('2024-01-01', days);
          const other = DateTime.fromISO(day, { zone }).set({ hour: Math.floor(minute / 60), minute: minute % 60 });
          // Luxon moves a time that is skipped as well, so such a one shows another minute of the day.
          fc.pre(other.hour * 60 + other.minute === minute);
          const instant = instantOfDay(day, minute, zone);
          const shown = localTime(instant, zone);
          expect([dayOf(instant, zone), shown.hour * 60 + shown.minute]).toEqual([day, minute]);
          // Of an hour that comes twice either is right; we mean the first.
          expect(other.toMillis() - instant === 0 || other.getPossibleOffsets().length === 2).toBe(true);
        },
      ),
      { numRuns: 300, seed: 906 },
    );
  });

  it('takes the first of an hour that comes twice', () => {
    // 25 October 2026, Berlin: 02:30 comes at 00:30 UTC (summer time) and at 01:30 UTC (tz database).
    expect(instantOfDay('2026-10-25', 150, 'Europe/Berlin')).toBe(Date.UTC(2026, 9, 25, 0, 30));
  });

  it('moves a skipped time on by the missing hour', () => {
    // 29 March 2026, Berlin: 02:00 becomes 03:00 at 01:00 UTC.
    expect(instantOfDay('2026-03-29', 150, 'Europe/Berlin')).toBe(Date.UTC(2026, 2, 29, 1, 30));
  });

  it('counts 23-hour days as whole days', () => {
    expect(daysBetween('2026-03-28', '2026-03-30')).toBe(2);
    expect(addDays('2026-03-28', 2)).toBe('2026-03-30');
  });
});

describe('numbers as typed', () => {
  const value = (text: string) => {
    const parsed = parseNumber(text);
    return parsed.ok ? parsed.value : parsed.reason;
  };

  it.each([
    ['3,957 V', 3.957],
    ['3.957', 3.957],
    [' 3 957 mV', 3957],
    ['\u22127', -7],
    ['±5 mV', 5],
    ["1'200", 1200],
    ['.5', 0.5],
    ['12,', 12],
    ['21 °C', 21],
    ['1.5 mΩ', 1.5],
  ])('reads %s as %s', (text, expected) => {
    expect(value(text)).toBe(expected);
  });

  it.each([
    ['', 'empty'],
    ['   ', 'empty'],
    ['V', 'not-a-number'],
    ['3.9a5', 'not-a-number'],
    ['1.234,5', 'two-marks'],
    ['3..9', 'two-marks'],
    ['.', 'not-a-number'],
    ['-', 'not-a-number'],
    ['1e5', 'not-a-number'],
  ])('refuses %j: %s', (text, reason) => {
    expect(value(text)).toBe(reason);
  });

  it('counts typed decimals, so that two can be told from three', () => {
    expect(['3,96', '3.957 V', '3', '3.'].map(typedDecimals)).toEqual([2, 3, 0, 0]);
  });

  it('suspects millivolts in 3957 and not in 39.57', () => {
    expect([3957, 39.57, 3.957, 12_000].map(looksLikeMillivolts)).toEqual([true, false, false, false]);
  });
});

describe('time of day as typed', () => {
  it.each([
    ['1815', 1095],
    ['18:15', 1095],
    ['18.15', 1095],
    ['6:15 pm', 1095],
    ['815', 495],
    ['9', 540],
    ['12 am', 0],
    ['12:30pm', 750],
    ['00:00', 0],
  ])('reads %s as minute %s', (text, minute) => {
    expect(parseTimeOfDay(text)).toBe(minute);
  });

  it.each(['24:00', '1860', '18:5', '13 pm', 'noon', ''])('refuses %j', (text) => {
    expect(parseTimeOfDay(text)).toBeNull();
  });

  it('offers 96 quarter hours and starts at the nearest', () => {
    expect(quarterHours).toHaveLength(96);
    expect(quarterHours[73]).toBe('18:15');
    expect(['1809', '18:07', '23:59', 'x'].map(nearestQuarter)).toEqual(['18:15', '18:00', '00:00', '12:00']);
  });

  it('offers days around today, two before and one after', () => {
    expect(
      dayOptions('2026-06-09', -2, 1).map(({ value, label }) => `${value} ${label.replaceAll('\u00a0', ' ')}`),
    ).toEqual(['2026-06-07 Sun 7 June', '2026-06-08 yesterday', '2026-06-09 today', '2026-06-10 tomorrow']);
  });
});
