import type { AlertLevel } from './alert';
import type { QuietHours } from './alert-settings';

const formats = new Map<string, Intl.DateTimeFormat>();

/** Minutes since midnight on the clock of a zone. */
export function minuteOfDay(at: number, zone: string): number {
  let format = formats.get(zone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', { timeZone: zone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' });
    formats.set(zone, format);
  }
  const [hour = 0, minute = 0] = format.format(at).split(':').map(Number);
  return hour * 60 + minute;
}

/** 'HH:MM' as minutes since midnight. */
export const minutesOf = (time: string): number => {
  const [hour = 0, minute = 0] = time.split(':').map(Number);
  return hour * 60 + minute;
};

/** Whether the clock of the zone stands within the quiet hours; they begin at `from` and are over at `to`. */
export function isQuiet(quiet: QuietHours, zone: string, at: number): boolean {
  const now = minuteOfDay(at, zone);
  const from = minutesOf(quiet.from);
  const to = minutesOf(quiet.to);
  return from < to ? now >= from && now < to : now >= from || now < to;
}

/** Whether an alert of a level makes no noise at `at` for somebody with these settings. */
export const isHeld = (
  settings: { quiet: QuietHours | null; alarmsBreakThrough: boolean },
  level: AlertLevel,
  zone: string,
  at: number,
): boolean =>
  settings.quiet !== null && !(level === 'alarm' && settings.alarmsBreakThrough) && isQuiet(settings.quiet, zone, at);
