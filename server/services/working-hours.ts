import { DateTime } from 'luxon';
import type { DayHours } from '@/shared/contract/workshop';

const DAY_MS = 86_400_000;

/** Opening and closing (epoch ms) of the day in which `at` lies in the workshop's zone; null: closed that day. */
export function openingOf(
  workshop: { zone: string; workingHours: DayHours[] },
  at: number,
): { from: number; to: number } | null {
  const day = DateTime.fromMillis(at, { zone: workshop.zone });
  const hours = workshop.workingHours[day.weekday - 1];
  if (!hours) return null;
  return { from: instantOf(day, hours.from), to: instantOf(day, hours.to) };
}

/**
 * Seconds from `now` after which nobody is there any more on the day of the clip-on.
 * A clip-on outside the hours has nobody from its first moment.
 */
export function closesInSeconds(
  workshop: { zone: string; workingHours: DayHours[] },
  now: number,
  clipOnAt: number,
): number {
  const opening = openingOf(workshop, clipOnAt);
  const inside = opening !== null && clipOnAt >= opening.from && clipOnAt < opening.to;
  return Math.max(0, ((inside ? opening.to : clipOnAt) - now) / 1000);
}

/**
 * 'HH:MM' of a day as an instant, epoch ms. A time that the clock jumps over becomes the moment of the jump, one that
 * comes twice its first coming: so a stretch of the day keeps its order, and is as long as it is on the wall.
 */
export function instantOf(day: DateTime, time: string): number {
  const [hour = 0, minute = 0] = time.split(':').map(Number);
  const midnight = day.toMillis() - ((day.hour * 60 + day.minute) * 60 + day.second) * 1000 - day.millisecond;
  // A day whose clock does not change, and that is nearly every one, needs no looking for jumps: two years of them add up.
  if ([midnight, midnight + DAY_MS].every((at) => day.zone.offset(at) === day.offset))
    return midnight + (hour * 60 + minute) * 60_000;
  const found = day.set({ hour, minute, second: 0, millisecond: 0 });
  if (found.hour !== hour || found.minute !== minute) return jumpBefore(found);
  return Math.min(...found.getPossibleOffsets().map((one) => one.toMillis()));
}

/** The instant at which the clock last changed within the three hours before a time that stands behind a jump. */
function jumpBefore(after: DateTime): number {
  let before = after.minus({ hours: 3 }).toMillis();
  let since = after.toMillis();
  while (since - before > 1) {
    const middle = Math.floor((before + since) / 2);
    if (DateTime.fromMillis(middle, { zone: after.zone }).offset === after.offset) since = middle;
    else before = middle;
  }
  return since;
}
