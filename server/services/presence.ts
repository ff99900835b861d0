/** When somebody is in the workshop: working hours by the workshop's clock, breaks and days off out. */
import { DateTime } from 'luxon';
import type { StaffingInput } from '@/shared/contract/staffing';
import type { DayHours } from '@/shared/contract/workshop';
import { instantOf } from './working-hours';

/** A stretch between two instants, epoch ms; it ends after it begins. */
export interface SpanMs {
  from: number;
  to: number;
}

type Hours = { zone: string; workingHours: DayHours[] };
/** Null: the workshop's hours, no break and no day off. */
export type StaffingHours = Pick<StaffingInput, 'hours' | 'breaks' | 'daysOff'> | null;

/**
 * The stretches within `[fromMs, toMs)` in which somebody works: ascending and apart from each other.
 * Times of the day are the wall clock's: on a day of 23 h a shift from 00:00 to 06:00 has five hours, on one of 25 h seven.
 */
export const presentSpans = (workshop: Hours, staffing: StaffingHours, fromMs: number, toMs: number): SpanMs[] =>
  daysOf(workshop.zone, fromMs, toMs).flatMap((day) => {
    const hours = hoursOn(workshop, staffing, day);
    if (hours === null) return [];
    return clipped(without(hours, breaksOn(staffing, day)), fromMs, toMs);
  });

/** The breaks within `[fromMs, toMs)`, as far as they lie within working hours; overlapping ones are one. */
export const breaksIn = (workshop: Hours, staffing: StaffingHours, fromMs: number, toMs: number): SpanMs[] =>
  daysOf(workshop.zone, fromMs, toMs).flatMap((day) => {
    const hours = hoursOn(workshop, staffing, day);
    if (hours === null) return [];
    return clipped(clipped(breaksOn(staffing, day), hours.from, hours.to), fromMs, toMs);
  });

/** The days off that lie in `[fromMs, toMs)`, one entry a day, closed days too. */
export const daysOffIn = (
  workshop: Pick<Hours, 'zone'>,
  staffing: StaffingHours,
  fromMs: number,
  toMs: number,
): { day: string; note: string | null }[] =>
  daysOf(workshop.zone, fromMs, toMs).flatMap((at) => {
    const day = at.toFormat('yyyy-MM-dd');
    const off = dayOffOn(staffing, day);
    return off ? [{ day, note: off.note }] : [];
  });

/** Noon of each day that has a moment within `[fromMs, toMs)`. Noon comes once on every day of every zone in use. */
function daysOf(zone: string, fromMs: number, toMs: number): DateTime[] {
  if (toMs <= fromMs) return [];
  const days: DateTime[] = [];
  const end = DateTime.fromMillis(toMs - 1, { zone }).endOf('day');
  for (let day = DateTime.fromMillis(fromMs, { zone }).set({ hour: 12 }); day <= end; day = day.plus({ days: 1 }))
    days.push(day);
  return days;
}

const dayOffOn = (staffing: StaffingHours, day: string) =>
  staffing?.daysOff.find((one) => one.from <= day && day <= one.to);

/** Working hours of a day; null: none, or none left by a jump of the clock. */
function hoursOn(workshop: Hours, staffing: StaffingHours, day: DateTime): SpanMs | null {
  if (dayOffOn(staffing, day.toFormat('yyyy-MM-dd'))) return null;
  const hours = (staffing?.hours ?? workshop.workingHours)[day.weekday - 1];
  return hours ? spanOn(day, hours) : null;
}

function spanOn(day: DateTime, times: { from: string; to: string }): SpanMs | null {
  const span = { from: instantOf(day, times.from), to: instantOf(day, times.to) };
  return span.to > span.from ? span : null;
}

/** Ascending and apart from each other. */
function breaksOn(staffing: StaffingHours, day: DateTime): SpanMs[] {
  const spans = (staffing?.breaks ?? []).flatMap((one) => spanOn(day, one) ?? []);
  const joined: SpanMs[] = [];
  for (const span of spans.sort((one, other) => one.from - other.from)) {
    const last = joined.at(-1);
    if (last && span.from <= last.to) last.to = Math.max(last.to, span.to);
    else joined.push({ ...span });
  }
  return joined;
}

/** What is left of a stretch; `gaps` are ascending and apart from each other. */
function without(span: SpanMs, gaps: readonly SpanMs[]): SpanMs[] {
  const left: SpanMs[] = [];
  let from = span.from;
  for (const gap of gaps) {
    if (gap.from > from) left.push({ from, to: Math.min(gap.from, span.to) });
    from = Math.max(from, gap.to);
  }
  left.push({ from, to: span.to });
  return left.filter((one) => one.to > one.from);
}

const clipped = (spans: readonly SpanMs[], from: number, to: number): SpanMs[] =>
  spans.map((one) => ({ from: Math.max(one.from, from), to: Math.min(one.to, to) })).filter((one) => one.to > one.from);
