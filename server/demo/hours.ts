import { DateTime } from 'luxon';
import type { DayHours } from '@/shared/contract/workshop';

const weekday = { from: '07:30', to: '18:00' };

/** The demo is at home where its machine stands; a machine without a place is put beside the harbour. */
export function demoZone(zone = Intl.DateTimeFormat().resolvedOptions().timeZone): string {
  return !zone || zone === 'UTC' || zone.startsWith('Etc/') ? 'Europe/Amsterdam' : zone;
}

/**
 * Monday to Saturday. On the day of the seeding the hours are widened where needed, so that the charges of the demo are
 * looked after also by somebody who tries it out at night: a late shift.
 */
export function demoHours(now: number, zone: string): DayHours[] {
  const hours: DayHours[] = [weekday, weekday, weekday, weekday, weekday, { from: '08:00', to: '14:00' }, null];
  const local = DateTime.fromMillis(now, { zone });
  const day = local.weekday - 1;
  const from = DateTime.max(local.minus({ hours: 6 }), local.startOf('day')).toFormat('HH:mm');
  const to = DateTime.min(local.plus({ hours: 6 }), local.endOf('day')).toFormat('HH:mm');
  const usual = hours[day] ?? null;
  hours[day] = usual === null ? { from, to } : { from: least(usual.from, from), to: most(usual.to, to) };
  return hours;
}

const least = (one: string, other: string): string => (one < other ? one : other);
const most = (one: string, other: string): string => (one > other ? one : other);
