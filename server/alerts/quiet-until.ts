import { DateTime } from 'luxon';
import type { QuietHours } from '@/shared/contract/alert-settings';
import { isQuiet, minuteOfDay, minutesOf } from '@/shared/contract/quiet-hours';

const MINUTE = 60_000;
const DAY_MINUTES = 24 * 60;

/**
 * When quiet hours that hold at `at` are over, epoch ms: the first minute at which the clock of the zone stands outside
 * them, however many hours the night has. A time that the clock jumps over is over with the jump.
 */
export function quietUntil(quiet: QuietHours, zone: string, at: number): number {
  const start = Math.floor(at / MINUTE) * MINUTE;
  const left = (minutesOf(quiet.to) - minuteOfDay(start, zone) + DAY_MINUTES) % DAY_MINUTES || DAY_MINUTES;
  const plain = start + left * MINUTE;
  const offset = (instant: number): number => DateTime.fromMillis(instant, { zone }).offset;
  // Between now and then the zone may have changed by an hour: as much more or less is to be waited.
  let end = plain - (offset(plain) - offset(start)) * MINUTE;
  while (isQuiet(quiet, zone, end)) end += MINUTE;
  return end;
}
