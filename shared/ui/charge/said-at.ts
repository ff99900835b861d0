/** Times of day that people say of what was done at the bench: always in the past. */
import { parseTimeOfDay } from '../format/parse';
import { addDays, dayOf, instantOfDay } from '../format/zone';

/** The server lets a device's clock be this far ahead, ms. */
const slackMs = 60_000;

/**
 * The latest instant that a typed time of day can mean: today's, or yesterday's where today's is still to come.
 * @returns epoch ms; null where it is no time of day
 */
export function latestInstant(text: string, zone: string, now: number): number | null {
  const minutes = parseTimeOfDay(text);
  if (minutes === null) return null;
  const today = dayOf(now, zone);
  const at = instantOfDay(today, minutes, zone);
  return at <= now + slackMs ? at : instantOfDay(addDays(today, -1), minutes, zone);
}

/** What to change about a time that is none. */
export const noTimeSentence = 'This is no time. Type it like 14:05.';
