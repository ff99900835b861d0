import { describe, expect, it } from 'vitest';
import { closesInSeconds, openingOf } from '@/server/services/working-hours';

const weekdays = { from: '08:00', to: '18:00' };
const berlin = {
  zone: 'Europe/Berlin',
  workingHours: [weekdays, weekdays, weekdays, weekdays, { from: '08:00', to: '16:00' }, null, null],
};
const at = (iso: string): number => Date.parse(iso);

describe('working hours in the workshop’s zone', () => {
  it('a Tuesday in June opens at 06:00 UTC and closes at 16:00 UTC', () => {
    expect(openingOf(berlin, at('2026-06-09T11:42:00Z'))).toEqual({
      from: at('2026-06-09T06:00:00Z'),
      to: at('2026-06-09T16:00:00Z'),
    });
  });

  it('the day is the workshop’s: 23:30 UTC on Tuesday is Wednesday in Berlin, and Tuesday in New York', () => {
    const late = at('2026-06-09T23:30:00Z');
    expect(openingOf(berlin, late)?.from).toBe(at('2026-06-10T06:00:00Z'));
    expect(openingOf({ ...berlin, zone: 'America/New_York' }, late)?.from).toBe(at('2026-06-09T12:00:00Z'));
  });

  it('is an hour off after the clocks change: 29 March 2026 is a Sunday, the Monday after opens at 06:00 UTC', () => {
    expect(openingOf(berlin, at('2026-03-27T10:00:00Z'))?.from).toBe(at('2026-03-27T07:00:00Z'));
    expect(openingOf(berlin, at('2026-03-29T10:00:00Z'))).toBeNull();
    expect(openingOf(berlin, at('2026-03-30T10:00:00Z'))?.from).toBe(at('2026-03-30T06:00:00Z'));
  });

  it('counts to closing on the day of the clip-on, and to the clip-on itself outside the hours', () => {
    const now = at('2026-06-09T11:42:00Z');
    expect(closesInSeconds(berlin, now, now)).toBe(4 * 3600 + 18 * 60);
    // Clipped on tomorrow at 10:00: closed at 18:00 tomorrow.
    expect(closesInSeconds(berlin, now, at('2026-06-10T08:00:00Z'))).toBe(28 * 3600 + 18 * 60);
    // Clipped on at 20:00 tonight: nobody from then on.
    expect(closesInSeconds(berlin, now, at('2026-06-09T18:00:00Z'))).toBe(6 * 3600 + 18 * 60);
    const sunday = at('2026-06-07T10:00:00Z');
    expect(closesInSeconds(berlin, sunday, sunday)).toBe(0);
  });
});
