/** Instants (epoch ms) as the workshop's clock and calendar say them. */
import type { Band } from '@/calc/plan-types';
import { EN_DASH, NBSP, pointMarks, type LocaleMarks } from './marks';
import { dayOf, daysBetween, localTime } from './zone';

const weekdays = ['Sunday', 'Monday', 'Tuesday', 'Wednesday', 'Thursday', 'Friday', 'Saturday'];
const months = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];
const two = (n: number) => String(n).padStart(2, '0');
const weekdayOf = (day: string) => weekdays[new Date(`${day}T00:00:00Z`).getUTCDay()] ?? '';

function clockOf(hour: number, minute: number, marks: LocaleMarks): string {
  if (!marks.hour12) return `${two(hour)}:${two(minute)}`;
  return `${hour % 12 || 12}:${two(minute)}${NBSP}${hour < 12 ? 'am' : 'pm'}`;
}

/** '13:42' in the zone; '1:42 pm' only where the locale counts to 12. */
export function clock(instant: number, zone: string, marks = pointMarks): string {
  const t = localTime(instant, zone);
  return clockOf(t.hour, t.minute, marks);
}

/** '13:42:07' */
export function clockWithSeconds(instant: number, zone: string): string {
  const t = localTime(instant, zone);
  return `${two(t.hour)}:${two(t.minute)}:${two(t.second)}`;
}

/** 'Tue 9 June'; the year only where it is not the one of `now`. */
export function date(instant: number, zone: string, now?: number): string {
  const t = localTime(instant, zone);
  const year = now !== undefined && localTime(now, zone).year !== t.year ? ` ${t.year}` : '';
  return `${weekdayOf(dayOf(instant, zone)).slice(0, 3)}${NBSP}${t.day}${NBSP}${months[t.month - 1] ?? ''}${year}`;
}

/** 'Tuesday 9 June' */
export function dateLong(instant: number, zone: string): string {
  const t = localTime(instant, zone);
  return `${weekdayOf(dayOf(instant, zone))} ${t.day}${NBSP}${months[t.month - 1] ?? ''}`;
}

/**
 * An instant beside now: today '10:00', within six days 'Wed 10:00', further off '9 June 10:00', in another year with
 * the year.
 */
export function moment(instant: number, zone: string, now: number, marks = pointMarks): string {
  const [day, today] = [dayOf(instant, zone), dayOf(now, zone)];
  const at = clock(instant, zone, marks);
  if (day === today) return at;
  if (Math.abs(daysBetween(today, day)) <= 6) return `${weekdayOf(day).slice(0, 3)}${NBSP}${at}`;
  const t = localTime(instant, zone);
  const year = localTime(now, zone).year === t.year ? '' : `${NBSP}${t.year}`;
  return `${t.day}${NBSP}${months[t.month - 1] ?? ''}${year}${NBSP}${at}`;
}

/** 'today', 'yesterday', '12 days'; for 'YYYY-MM-DD' or an instant in the past. */
export function age(instant: number, zone: string, now: number): string {
  const days = daysBetween(dayOf(instant, zone), dayOf(now, zone));
  if (days <= 0) return 'today';
  return days === 1 ? 'yesterday' : `${days}${NBSP}days`;
}

/** For tables: 'today', '12 d'. */
export function ageShort(instant: number, zone: string, now: number): string {
  const days = daysBetween(dayOf(instant, zone), dayOf(now, zone));
  return days <= 0 ? 'today' : `${days}${NBSP}d`;
}

/** 'today', 'tomorrow', 'Wed 10 June': the day a time field speaks of. */
export function dayName(day: string, today: string): string {
  const ahead = daysBetween(today, day);
  if (ahead === 0) return 'today';
  if (ahead === 1) return 'tomorrow';
  if (ahead === -1) return 'yesterday';
  const [, month = 1, dayOfMonth = 1] = day.split('-').map(Number);
  return `${weekdayOf(day).slice(0, 3)}${NBSP}${dayOfMonth}${NBSP}${months[month - 1] ?? ''}`;
}

/** To how many minutes an estimated instant is told: to 5, within an hour of now to 1. */
const toldMinutes = (likely: number, now: number): 5 | 1 => (likely - now >= 3_570_000 ? 5 : 1);

/** Moves an estimated instant to the minutes that are told. */
export function told(instant: number, likely: number, now: number): number {
  const step = toldMinutes(likely, now) * 60_000;
  return Math.round(instant / step) * step;
}

/** The instants of a band, epoch ms. */
export type InstantBand = Band;

/** The likely finish: '17:05', another day 'Wed 10:00'. */
export const readyAt = (band: InstantBand, zone: string, now: number, marks = pointMarks): string =>
  moment(told(band.p50, band.p50, now), zone, now, marks);

/**
 * Its band: '16:40–18:05'; a bound on another day than the likely one says its weekday. Where only a timer is left to run
 * both ends are one minute: 'to the minute'; farther off than an hour, where 5 min are told: 'to 5 min'.
 */
export function readyBounds(band: InstantBand, zone: string, now: number, marks = pointMarks): string {
  const likelyDay = dayOf(told(band.p50, band.p50, now), zone);
  const bound = (instant: number) => {
    const at = told(instant, band.p50, now);
    const day = dayOf(at, zone);
    const text = clock(at, zone, marks);
    return day === likelyDay ? text : `${weekdayOf(day).slice(0, 3)}${NBSP}${text}`;
  };
  const [early, late] = [bound(band.p10), bound(band.p90)];
  if (early === late) return toldMinutes(band.p50, now) === 1 ? 'to the minute' : `to 5${NBSP}min`;
  return `${early}${EN_DASH}${late}`;
}

/** 'ready 17:05 (16:40–18:05)' */
export const readyWithBand = (band: InstantBand, zone: string, now: number, marks = pointMarks): string =>
  `ready ${readyAt(band, zone, now, marks)} (${readyBounds(band, zone, now, marks)})`;
