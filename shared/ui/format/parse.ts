/** What people type, understood. Nothing here changes the text itself; it is kept as typed until the field is left. */
import { MINUS } from './marks';

export type Parsed = { ok: true; value: number } | { ok: false; reason: 'empty' | 'not-a-number' | 'two-marks' };

const spaces = /[\s\u00a0\u202f\u2009']/g;

/**
 * A number as typed or pasted: comma or point, spaces and a pasted unit dropped ('3,957 V' is 3.957).
 *
 * Both marks in one number ('1.234,5') could mean two things and are not guessed.
 */
export function parseNumber(text: string): Parsed {
  const bare = text.replace(spaces, '').replaceAll(MINUS, '-').replace('±', '');
  if (bare === '') return { ok: false, reason: 'empty' };
  const match = /^([+-]?[\d.,]*\d[\d.,]*)(?:[a-zµμΩ°%][a-zµμΩ°%/]*)?$/i.exec(bare);
  const digits = match?.[1];
  if (!digits) return { ok: false, reason: 'not-a-number' };
  const marks = digits.match(/[.,]/g)?.length ?? 0;
  if (marks > 1) return { ok: false, reason: 'two-marks' };
  const value = Number(digits.replace(',', '.'));
  return Number.isFinite(value) ? { ok: true, value } : { ok: false, reason: 'not-a-number' };
}

/** How many decimals were typed: '3,957' has 3. */
export const typedDecimals = (text: string): number => /[.,](\d*)/.exec(text.replace(spaces, ''))?.[1]?.length ?? 0;

/** A group voltage that can only be millivolts ('3957'): ask 'mV?' instead of refusing. */
export const looksLikeMillivolts = (value: number): boolean => value >= 1000 && value <= 5000;

/** Minutes after midnight of '1815', '18:15', '6.15 pm', '9'; null where it is no time of day. */
export function parseTimeOfDay(text: string): number | null {
  const match = /^(\d{1,2})(?:[:.h]?(\d{2}))?(am|pm)?$/i.exec(text.replace(spaces, ''));
  if (!match?.[1]) return null;
  const half = match[3]?.toLowerCase();
  let hour = Number(match[1]);
  const minute = Number(match[2] ?? 0);
  if (half && (hour < 1 || hour > 12)) return null;
  if (half) hour = (hour % 12) + (half === 'pm' ? 12 : 0);
  return hour < 24 && minute < 60 ? hour * 60 + minute : null;
}

/** '18:15' of minutes after midnight. */
export const timeOfDayText = (minutes: number): string =>
  `${String(Math.floor(minutes / 60)).padStart(2, '0')}:${String(minutes % 60).padStart(2, '0')}`;
