import { describe, expect, it } from 'vitest';
import { breaksIn, daysOffIn, presentSpans, type SpanMs, type StaffingHours } from '@/server/services/presence';

const day = { from: '08:00', to: '17:00' };
/** The clocks of Berlin: on 29 March 2026 at 01:00 UTC from 02:00 to 03:00, on 25 October at 01:00 UTC from 03:00 to 02:00. */
const berlin = { zone: 'Europe/Berlin', workingHours: [day, day, day, day, day, null, null] };
const night = { from: '00:00', to: '06:00' };
const always = Array.from({ length: 7 }, () => night);
const at = (iso: string): number => Date.parse(iso);
const hours = (spans: SpanMs[]): number => spans.reduce((sum, { from, to }) => sum + (to - from), 0) / 3_600_000;
const iso = (spans: SpanMs[]): string[] =>
  spans.map(
    ({ from, to }) => `${new Date(from).toISOString().slice(5, 16)}–${new Date(to).toISOString().slice(5, 16)}`,
  );
const ownHours = (changes: Partial<NonNullable<StaffingHours>>): StaffingHours => ({
  hours: null,
  breaks: [],
  daysOff: [],
  ...changes,
});

describe('when somebody is there', () => {
  it('without hours of their own it is the workshop’s: five days of nine hours in a week, none at the weekend', () => {
    const spans = presentSpans(berlin, null, at('2026-06-07T22:00:00Z'), at('2026-06-14T22:00:00Z'));
    expect(hours(spans)).toBe(45);
    expect(iso(spans)[0]).toBe('06-08T06:00–06-08T15:00');
    expect(spans).toHaveLength(5);
  });

  it('takes breaks out of the hours, one that overlaps another once, and what lies outside the hours not at all', () => {
    const staffing = ownHours({
      breaks: [
        { from: '12:00', to: '12:30' },
        { from: '12:15', to: '12:45' },
        { from: '07:30', to: '08:10' },
        { from: '19:00', to: '19:30' },
      ],
    });
    const [from, to] = [at('2026-06-08T22:00:00Z'), at('2026-06-09T22:00:00Z')];
    expect(iso(presentSpans(berlin, staffing, from, to))).toEqual([
      '06-09T06:10–06-09T10:00',
      '06-09T10:45–06-09T15:00',
    ]);
    expect(iso(breaksIn(berlin, staffing, from, to))).toEqual(['06-09T06:00–06-09T06:10', '06-09T10:00–06-09T10:45']);
  });

  it('gives only what lies between the two instants, which are no days of the workshop', () => {
    const spans = presentSpans(berlin, null, at('2026-06-09T14:00:00Z'), at('2026-06-10T07:00:00Z'));
    expect(iso(spans)).toEqual(['06-09T14:00–06-09T15:00', '06-10T06:00–06-10T07:00']);
    expect(presentSpans(berlin, null, at('2026-06-09T15:00:00Z'), at('2026-06-10T06:00:00Z'))).toEqual([]);
    expect(presentSpans(berlin, null, at('2026-06-09T12:00:00Z'), at('2026-06-09T12:00:00Z'))).toEqual([]);
  });

  it('a day off from Thursday to Monday leaves Tuesday and Wednesday, and has five entries', () => {
    const staffing = ownHours({ daysOff: [{ from: '2026-06-11', to: '2026-06-15', note: 'Course' }] });
    const [from, to] = [at('2026-06-08T22:00:00Z'), at('2026-06-15T22:00:00Z')];
    expect(hours(presentSpans(berlin, staffing, from, to))).toBe(18);
    const off = daysOffIn(berlin, staffing, from, to);
    expect(off.map((one) => one.day)).toEqual(['2026-06-11', '2026-06-12', '2026-06-13', '2026-06-14', '2026-06-15']);
    expect(off[0]?.note).toBe('Course');
    expect(
      breaksIn(berlin, ownHours({ ...staffing, breaks: [{ from: '12:00', to: '12:30' }] }), from, to),
    ).toHaveLength(2);
  });

  it('a shift from 00:00 to 06:00 has five hours on the day of 23 h and seven on the day of 25 h', () => {
    const staffing = ownHours({ hours: always });
    expect(hours(presentSpans(berlin, staffing, at('2026-03-28T23:00:00Z'), at('2026-03-29T22:00:00Z')))).toBe(5);
    expect(hours(presentSpans(berlin, staffing, at('2026-10-24T22:00:00Z'), at('2026-10-25T23:00:00Z')))).toBe(7);
    expect(hours(presentSpans(berlin, staffing, at('2026-06-08T22:00:00Z'), at('2026-06-09T22:00:00Z')))).toBe(6);
  });

  it('opens at 08:00 by the wall on the days before and after both changes: seven or six o’clock UTC', () => {
    const open = (from: string, to: string) =>
      presentSpans({ ...berlin, workingHours: Array.from({ length: 7 }, () => day) }, null, at(from), at(to)).map(
        (span) => new Date(span.from).toISOString().slice(8, 16),
      );
    expect(open('2026-03-27T23:00:00Z', '2026-03-29T22:00:00Z')).toEqual(['28T07:00', '29T06:00']);
    expect(open('2026-10-23T22:00:00Z', '2026-10-25T23:00:00Z')).toEqual(['24T06:00', '25T07:00']);
  });

  it('a break that the clock jumps over does not take place, one that it jumps into loses what is jumped over', () => {
    const [from, to] = [at('2026-03-28T23:00:00Z'), at('2026-03-29T22:00:00Z')];
    const pausing = (first: string, last: string) => ownHours({ hours: always, breaks: [{ from: first, to: last }] });
    expect(breaksIn(berlin, pausing('02:10', '02:40'), from, to)).toEqual([]);
    expect(hours(presentSpans(berlin, pausing('02:10', '02:40'), from, to))).toBe(5);
    expect(iso(breaksIn(berlin, pausing('02:30', '03:15'), from, to))).toEqual(['03-29T01:00–03-29T01:15']);
    expect(iso(breaksIn(berlin, pausing('01:45', '02:30'), from, to))).toEqual(['03-29T00:45–03-29T01:00']);
  });

  it('a break at a time that comes twice is taken once, the first time', () => {
    const staffing = ownHours({ hours: always, breaks: [{ from: '02:00', to: '02:30' }] });
    const [from, to] = [at('2026-10-24T22:00:00Z'), at('2026-10-25T23:00:00Z')];
    expect(iso(breaksIn(berlin, staffing, from, to))).toEqual(['10-25T00:00–10-25T00:30']);
    expect(hours(presentSpans(berlin, staffing, from, to))).toBe(6.5);
  });

  it('holds where midnight itself is jumped over: Santiago on 6 September 2026 begins at 01:00', () => {
    const santiago = { zone: 'America/Santiago', workingHours: always };
    const spans = presentSpans(santiago, null, at('2026-09-06T04:00:00Z'), at('2026-09-07T03:00:00Z'));
    expect(iso(spans)).toEqual(['09-06T04:00–09-06T09:00']);
  });
});
