import { DateTime } from 'luxon';
import type { WaitsQuery } from '@/shared/contract/waits';
import { invalid } from '../../errors/domain-error';

/** Whole weeks before the present one that are shown when nobody asks for others. */
const DEFAULT_WEEKS = 8;
const DAY = 'yyyy-MM-dd';

export interface DayPeriod {
  /** First and last day, both counted, in the workshop's zone. */
  from: string;
  to: string;
  fromAt: number;
  /** Midnight after the last day, epoch ms. */
  toAt: number;
  /** Mondays of the weeks that the period touches. */
  mondays: string[];
}

/**
 * The days that were asked for as instants of the workshop's zone.
 * Left out: from the Monday eight weeks before this week's, until today.
 * @throws DomainError 400 with the field at fault
 */
export function waitPeriod(query: WaitsQuery, zone: string, now: number): DayPeriod {
  const today = DateTime.fromMillis(now, { zone }).startOf('day');
  const to = query.to === undefined ? today : dayOf('to', query.to, zone);
  const from =
    query.from === undefined ? to.startOf('week').minus({ weeks: DEFAULT_WEEKS }) : dayOf('from', query.from, zone);
  if (from > to) throw invalid({ to: 'The last day lies before the first. Type a later one.' });
  const mondays: string[] = [];
  // Days without a clock: two years of them in a zone would take longer than the statements that follow.
  const { year, month, day } = from.startOf('week');
  const last = DateTime.utc(to.year, to.month, to.day);
  for (let monday = DateTime.utc(year, month, day); monday <= last; monday = monday.plus({ weeks: 1 }))
    mondays.push(monday.toFormat(DAY));
  return {
    from: from.toFormat(DAY),
    to: to.toFormat(DAY),
    fromAt: from.toMillis(),
    toAt: to.plus({ days: 1 }).toMillis(),
    mondays,
  };
}

/** Monday (yyyy-MM-dd) of the week of an instant in the workshop's zone. */
export const mondayOf = (at: number, zone: string): string =>
  DateTime.fromMillis(at, { zone }).startOf('week').toFormat(DAY);

/** ISO number of the week that begins on this Monday. */
export const weekNumberOf = (monday: string): number => DateTime.fromISO(monday, { zone: 'utc' }).weekNumber;

function dayOf(field: 'from' | 'to', day: string, zone: string): DateTime {
  const parsed = DateTime.fromISO(day, { zone });
  if (!parsed.isValid) throw invalid({ [field]: `There is no ${day}. Type the day like 2026-06-09.` });
  return parsed;
}
