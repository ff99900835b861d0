import { DateTime } from 'luxon';
import { invalid } from '../../errors/domain-error';

export interface Days {
  /** First day, 'YYYY-MM-DD' in the workshop's zone. */
  day: string;
  days: number;
  /** Midnight before the first day and after the last, epoch ms. */
  from: number;
  to: number;
}

/** Midnight before an instant in the workshop's zone, epoch ms. */
export const startOfDay = (zone: string, at: number): number =>
  DateTime.fromMillis(at, { zone }).startOf('day').toMillis();

/**
 * Days of the workshop.
 * @param day left out: today
 * @throws DomainError 400 for a day that is in no calendar
 */
export function daysOf(zone: string, day: string | undefined, days: number, now: number): Days {
  const first = day === undefined ? DateTime.fromMillis(now, { zone }) : DateTime.fromISO(day, { zone });
  if (!first.isValid) throw invalid({ day: `There is no ${day}. Type the day like 2026-06-09.` });
  const from = first.startOf('day');
  return {
    day: from.toFormat('yyyy-MM-dd'),
    days,
    from: from.toMillis(),
    to: from.plus({ days }).toMillis(),
  };
}
