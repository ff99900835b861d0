/** Wall-clock arithmetic in a workshop's IANA zone, by the browser's own zone tables. Instants are epoch milliseconds. */

export interface LocalTime {
  year: number;
  /** 1…12 */
  month: number;
  day: number;
  hour: number;
  minute: number;
  second: number;
}

const made = new Map<string, Intl.DateTimeFormat>();

function partsFormat(zone: string): Intl.DateTimeFormat {
  let format = made.get(zone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone: zone,
      year: 'numeric',
      month: 'numeric',
      day: 'numeric',
      hour: 'numeric',
      minute: 'numeric',
      second: 'numeric',
      hourCycle: 'h23',
    });
    made.set(zone, format);
  }
  return format;
}

/** What the clock and calendar of a zone show at an instant. Throws RangeError for an unknown zone. */
export function localTime(instant: number, zone: string): LocalTime {
  const found: Record<string, number> = {};
  for (const { type, value } of partsFormat(zone).formatToParts(instant)) found[type] = Number(value);
  const { year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0 } = found;
  return { year, month, day, hour, minute, second };
}

const asUtc = (t: LocalTime) => Date.UTC(t.year, t.month - 1, t.day, t.hour, t.minute, t.second);

/** How far the zone's clock is ahead of UTC at an instant, ms. */
const offsetAt = (instant: number, zone: string) => asUtc(localTime(instant, zone)) - Math.floor(instant / 1000) * 1000;

/**
 * The instant at which a zone's clock shows this time. A time that is skipped in spring moves on by the hour that is
 * missing; of a time that comes twice in autumn the first is meant.
 */
export function instantOf(local: LocalTime, zone: string): number {
  const wanted = asUtc(local);
  const before = wanted - offsetAt(wanted - 86_400_000, zone);
  if (asUtc(localTime(before, zone)) === wanted) return before;
  const after = wanted - offsetAt(wanted + 86_400_000, zone);
  return asUtc(localTime(after, zone)) === wanted ? after : before;
}

const two = (n: number) => String(n).padStart(2, '0');

/** The calendar day in a zone, '2026-06-09'. */
export function dayOf(instant: number, zone: string): string {
  const t = localTime(instant, zone);
  return `${String(t.year).padStart(4, '0')}-${two(t.month)}-${two(t.day)}`;
}

/** Whole calendar days from one 'YYYY-MM-DD' to another; negative backwards. */
export const daysBetween = (from: string, to: string): number =>
  Math.round((Date.parse(`${to}T00:00:00Z`) - Date.parse(`${from}T00:00:00Z`)) / 86_400_000);

/** The calendar day so many days later. */
export const addDays = (day: string, count: number): string =>
  new Date(Date.parse(`${day}T00:00:00Z`) + count * 86_400_000).toISOString().slice(0, 10);

/** The instant of 'YYYY-MM-DD' and minutes after midnight by the zone's clock. */
export function instantOfDay(day: string, minutes: number, zone: string): number {
  const [year = 1970, month = 1, dayOfMonth = 1] = day.split('-').map(Number);
  return instantOf(
    { year, month, day: dayOfMonth, hour: Math.floor(minutes / 60), minute: minutes % 60, second: 0 },
    zone,
  );
}
