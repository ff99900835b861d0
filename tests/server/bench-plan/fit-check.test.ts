import { describe, expect, it } from 'vitest';
import { fitInto, type FreeTime, type PieceToFit } from '@/server/services/bench-plan/fit-check';
import { clock, timeOf } from './day';

const minute = 60_000;
const at = (time: string): number => Date.parse(clock(time));
const free = (from: string, to: string, lookIns: string[] = []): FreeTime => ({
  from: at(from),
  to: at(to),
  lookIns: lookIns.map(at),
});
const piece = (minutes: number, more: Partial<PieceToFit> = {}): PieceToFit => ({
  ...{ longMs: minutes * minute, splittable: false, dueAt: null, place: null, lacks: null },
  ...more,
});
const bay = (from: string, to: string): PieceToFit['place'] => ({
  name: 'Bay 1',
  taken: [{ from: at(from), to: at(to) }],
});
const fit = (time: FreeTime, one: PieceToFit) => {
  const found = fitInto(time, one, 5 * minute, 'Europe/Berlin', at('10:00'));
  return found.fits
    ? `${timeOf(new Date(found.from).toISOString())}–${timeOf(new Date(found.to).toISOString())} ${found.workedMs / minute}`
    : { over: found.overByMinutes, because: found.because };
};

describe('work beside a free stretch', () => {
  it('of 60 min fits 60 min to the minute, and of 61 is 1 min too long', () => {
    expect(fit(free('11:00', '12:00'), piece(60))).toBe('11:00–12:00 60');
    expect(fit(free('11:00', '12:00'), piece(61))).toEqual({ over: 1, because: '1\u00a0min too long' });
  });

  it('gives a look-in its 5 min: 60 min then fit 55 of work and not 56', () => {
    expect(fit(free('11:00', '12:00', ['11:30']), piece(55))).toBe('11:00–12:00 55');
    expect(fit(free('11:00', '12:00', ['11:30']), piece(56))).toEqual({ over: 1, because: '1\u00a0min too long' });
    expect(fit(free('11:00', '12:00', ['11:30']), piece(30))).toBe('11:00–11:30 30');
    expect(fit(free('11:00', '12:00', ['11:00']), piece(20))).toBe('11:05–11:25 20');
  });

  it('waits for its place, and where that is free too late says until when it is taken', () => {
    expect(fit(free('11:00', '13:00'), piece(60, { place: bay('10:30', '11:40') }))).toBe('11:40–12:40 60');
    expect(fit(free('11:00', '13:00'), piece(60, { place: bay('12:00', '14:00') }))).toBe('11:00–12:00 60');
    expect(fit(free('11:00', '13:00'), piece(60, { place: bay('10:30', '12:20') }))).toEqual({
      over: null,
      because: 'Bay 1 is taken until 12:20',
    });
  });

  it('that can be split takes what there is, but no part below 15 min', () => {
    expect(fit(free('11:00', '11:40'), piece(90, { splittable: true }))).toBe('11:00–11:40 40');
    expect(fit(free('11:00', '11:15'), piece(90, { splittable: true }))).toBe('11:00–11:15 15');
    expect(fit(free('11:00', '11:12'), piece(90, { splittable: true }))).toEqual({
      over: 3,
      because: '3\u00a0min too long',
    });
    // The last 10 min of a piece are no part: they are all that is left.
    expect(fit(free('11:00', '11:12'), piece(10, { splittable: true }))).toBe('11:00–11:10 10');
  });

  it('is over by its due time, or says that it cannot be', () => {
    expect(fit(free('11:00', '13:00'), piece(60, { dueAt: at('12:00') }))).toBe('11:00–12:00 60');
    expect(fit(free('11:00', '13:00'), piece(60, { dueAt: at('11:50') }))).toEqual({
      over: null,
      because: 'Due at 11:50, before it could be done',
    });
  });

  it('asks for a skill that is lacked by its name', () => {
    expect(fit(free('11:00', '13:00'), piece(60, { lacks: 'Brakes' }))).toEqual({
      over: null,
      because: 'It needs Brakes.',
    });
  });
});
