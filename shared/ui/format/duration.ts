/** Stretches of time in words and numerals. Inputs in seconds. */
import type { Band } from '@/calc/plan-types';
import { EN_DASH, NBSP } from './marks';

const minute = 60;
const hour = 3600;
const day = 86_400;

/**
 * How finely a stretch is told. 'plan': to 5 min, under an hour to 1 (estimates and bands); 'minute': to the minute
 * (a countdown, a time that has passed).
 */
export type Precision = 'plan' | 'minute';

/** Minutes after rounding; the step follows `guide`, so that a band is told as finely as its likely value. */
function roundedMinutes(seconds: number, precision: Precision, guideSeconds = seconds): number {
  const step = precision === 'plan' && guideSeconds >= hour - minute / 2 ? 5 : 1;
  return Math.round(seconds / minute / step) * step;
}

const two = (n: number) => String(n).padStart(2, '0');
const hmm = (minutes: number) => `${Math.floor(minutes / 60)}:${two(minutes % 60)}`;

/** Days to the half: '2½', '1', '½' is never given (under a day hours are told). */
function halfDays(seconds: number): string {
  const halves = Math.round((seconds / day) * 2);
  return `${Math.floor(halves / 2)}${halves % 2 ? '½' : ''}`;
}

export type DurationParts =
  | { kind: 'minutes'; minutes: string }
  | { kind: 'hours'; hours: string; minutes: string }
  | { kind: 'days'; text: string };

/** The pieces of a stretch, for a numeral with a small unit. Negative stretches count as nothing. */
export function durationParts(seconds: number, precision: Precision = 'plan'): DurationParts {
  const s = Math.max(0, seconds);
  const minutes = roundedMinutes(s, precision);
  if (minutes < 60) return { kind: 'minutes', minutes: String(minutes) };
  if (minutes > 24 * 60) return { kind: 'days', text: `about ${halfDays(s)} ${halfDays(s) === '1' ? 'day' : 'days'}` };
  return { kind: 'hours', hours: String(Math.floor(minutes / 60)), minutes: two(minutes % 60) };
}

/** '3 h 40', under an hour '55 min', over a day 'about 2½ days'. */
export function duration(seconds: number, precision: Precision = 'plan'): string {
  const parts = durationParts(seconds, precision);
  if (parts.kind === 'days') return parts.text;
  if (parts.kind === 'minutes') return `${parts.minutes}${NBSP}min`;
  return `${parts.hours}${NBSP}h${NBSP}${parts.minutes}`;
}

/** For tables: '3:40', '0:55'. */
export const durationTable = (seconds: number, precision: Precision = 'plan'): string =>
  hmm(roundedMinutes(Math.max(0, seconds), precision));

/** The band alone, in brackets: '(3:15–4:25)', '(48–70 min)', '(2–3½ days)'. */
export function durationBand({ p10, p50, p90 }: Band): string {
  const [low, likely, high] = [p10, p50, p90].map((s) => Math.max(0, s)) as [number, number, number];
  const kind = durationParts(likely).kind;
  if (kind === 'days') return `(${halfDays(low)}${EN_DASH}${halfDays(high)}${NBSP}days)`;
  const [a, b] = [low, high].map((s) => roundedMinutes(s, 'plan', likely)) as [number, number];
  if (kind === 'minutes') return `(${a}${EN_DASH}${b}${NBSP}min)`;
  return `(${hmm(a)}${EN_DASH}${hmm(b)})`;
}

/** Likely and band: '3 h 40 (3:15–4:25)', '55 min (48–70 min)'. */
export const durationWithBand = (band: Band): string => `${duration(band.p50)} ${durationBand(band)}`;

/** A countdown that ran out: '22 min over'. */
export const overBy = (seconds: number): string => `${duration(seconds, 'minute')} over`;
