import { DateTime } from 'luxon';
import { numberIn } from './log-cells';

/** The instant of a line, epoch ms, or the words why it has none. */
export type TimeOrWhy = number | string;
const NO_TIME = 'The time cannot be read.';
const SKIPPED = 'This time did not exist: the clocks were put forward over it.';

const perUnit: Record<string, number> = { s: 1000, ms: 1, min: 60_000, h: 3_600_000 };
const DAY_MS = 86_400_000;
const QUARTER_MS = 900_000;

interface LocalDay {
  year: number;
  month: number;
  day: number;
}

export interface LogTimes {
  unit: string;
  /** Unit of the column with the day; null: there is none. */
  dateUnit: string | null;
  decimal: '.' | ',';
  zone: string;
  /** From when elapsed times count, epoch ms. */
  zeroAt: number;
  /** Start of the charge, epoch ms: a time of day alone is on that day or after. */
  startedAt: number;
}

/**
 * Reads the times of a log line by line, in the zone of the workshop unless a cell names its offset. Of an hour that
 * comes twice, the first is taken that is not before the line before; a time of day that runs back is the next day's.
 */
export function makeTimeReader(rule: LogTimes): (time: string, date: string | null) => TimeOrWhy {
  const local = makeLocal(rule.zone);
  let before = rule.startedAt;
  let day = DateTime.fromMillis(rule.startedAt, { zone: rule.zone }).startOf('day');
  let lastMs: number | null = null;
  const instantOn = (on: LocalDay, ms: number): TimeOrWhy => {
    const at = local(on, ms, before);
    if (typeof at === 'number') before = at;
    return at;
  };
  return (time, date) => {
    const text = time.trim();
    if (rule.unit in perUnit || rule.unit.startsWith('epoch')) {
      const value = numberIn(text, rule.decimal);
      if (value === null || value === undefined) return NO_TIME;
      if (rule.unit === 'epoch-s') return whole(value * 1000);
      if (rule.unit === 'epoch-ms') return whole(value);
      return whole(rule.zeroAt + value * perUnit[rule.unit]!);
    }
    if (rule.unit === 'span') {
      const ms = clockMs(text, Infinity);
      return ms === null ? NO_TIME : whole(rule.zeroAt + ms);
    }
    if (rule.unit === 'clock') {
      const ms = clockMs(text, 24);
      if (ms === null) return NO_TIME;
      if (rule.dateUnit !== null) {
        const on = dayIn(date ?? '', rule.dateUnit);
        return on === null ? 'The day cannot be read.' : instantOn(on, ms);
      }
      if (lastMs !== null && lastMs - ms > DAY_MS / 2) day = day.plus({ days: 1 });
      lastMs = ms;
      return instantOn(day, ms);
    }
    return stamp(text, rule.unit, instantOn);
  };
}

const whole = (ms: number): TimeOrWhy => (Math.abs(ms) < 8e15 ? Math.round(ms) : NO_TIME);

const STAMP =
  /^(\d{1,4}[./-]\d{1,2}[./-]\d{1,4})(?:\s*,\s*|T|\s+)(\d{1,2}:\d\d(?::\d\d(?:[.,]\d+)?)?)\s*([ap]m)?\s*(Z|[+-]\d\d:?\d\d)?$/i;

function stamp(text: string, unit: string, instantOn: (on: LocalDay, ms: number) => TimeOrWhy): TimeOrWhy {
  const found = STAMP.exec(text);
  if (found === null) return NO_TIME;
  const [, dayText, clock, half, offset] = found;
  const on = dayIn(dayText!, unit);
  const ms = clockMs(`${clock}${half ? ` ${half}` : ''}`, 24);
  if (on === null || ms === null) return NO_TIME;
  if (offset === undefined) return instantOn(on, ms);
  const minutes = /^z$/i.test(offset) ? 0 : signed(offset);
  return Date.UTC(on.year, on.month - 1, on.day) + ms - minutes * 60_000;
}

const signed = (offset: string): number => {
  const digits = offset.replace(/\D/g, '');
  return (offset.startsWith('-') ? -1 : 1) * (Number(digits.slice(0, 2)) * 60 + Number(digits.slice(2)));
};

/** '13:05', '1:05:07.250 pm' as ms since midnight, or since the start. */
export function clockMs(text: string, mostHours: number): number | null {
  const found = /^(\d{1,5}):(\d\d)(?::(\d\d)(?:[.,](\d{1,9}))?)?\s*([ap]m)?$/i.exec(text.trim());
  if (found === null) return null;
  const [, hourText, minute, second = '0', part = '', half] = found;
  let hour = Number(hourText);
  if (half) {
    if (hour < 1 || hour > 12) return null;
    hour = (hour % 12) + (half.toLowerCase() === 'pm' ? 12 : 0);
  }
  if (hour >= mostHours || Number(minute) > 59 || Number(second) > 59) return null;
  return Math.round(((hour * 60 + Number(minute)) * 60 + Number(second) + Number(`0.${part || '0'}`)) * 1000);
}

/** A calendar day that exists. */
export function dayIn(text: string, unit: string): LocalDay | null {
  const found = /^(\d{1,4})[./-](\d{1,2})[./-](\d{1,4})$/.exec(text.trim());
  if (found === null) return null;
  const [a, b, c] = found.slice(1).map(Number) as [number, number, number];
  const [year, month, day] = unit === 'ymd' ? [a, b, c] : unit === 'dmy' ? [c, b, a] : [c, a, b];
  const full = year < 100 ? 2000 + year : year;
  if (full < 1970 || full > 9999) return null;
  const at = new Date(Date.UTC(full, month - 1, day));
  return at.getUTCMonth() === month - 1 && at.getUTCDate() === day ? { year: full, month, day } : null;
}

/** Local times as instants; offsets are asked for once a quarter of an hour, since all changes fall on one. */
function makeLocal(zone: string): (on: LocalDay, ms: number, before: number) => TimeOrWhy {
  let known = NaN;
  let offsets: number[] = [];
  return ({ year, month, day }, ms, before) => {
    const wall = Date.UTC(year, month - 1, day) + ms;
    const quarter = Math.floor(wall / QUARTER_MS) * QUARTER_MS;
    if (quarter !== known) {
      known = quarter;
      offsets = offsetsAt(quarter, zone);
    }
    if (offsets.length === 0) return SKIPPED;
    const instants = offsets.map((offset) => wall - offset * 60_000);
    return instants.find((at) => at >= before) ?? instants.at(-1)!;
  };
}

/** Offsets, min, that a local time may have; earlier instants first, none where it was skipped. */
function offsetsAt(wall: number, zone: string): number[] {
  const fits = (offset: number): boolean => DateTime.fromMillis(wall - offset * 60_000, { zone }).offset === offset;
  const around = [-1, 1].map((side) => DateTime.fromMillis(wall + side * DAY_MS, { zone }).offset);
  return [...new Set(around)].filter(fits).sort((one, other) => other - one);
}
