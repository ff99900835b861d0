/** Whether a piece of work still fits its free stretch, some time after the server reckoned it. Pure; epoch ms. */
import type { FitDto, FreeStretchDto } from '@/shared/contract/bench-plan';
import { leastPartMinutes } from '@/shared/contract/work-terms';
import { duration } from '../format/duration';

export type FitNow =
  | { fits: true; from: number; to: number; minutes: number }
  /** By how many minutes it is too long; null: it is not time that it lacks. */
  | { fits: false; overByMinutes: number | null; because: string };

const MINUTE = 60_000;

/**
 * A stretch that has begun grows shorter with the clock: work that was to begin by now begins later, of what can be split
 * less is done, and what no longer ends in time says by how many minutes.
 */
export function fitNow(fit: FitDto, stretch: Pick<FreeStretchDto, 'to'>, now: number): FitNow {
  if (fit.span === null)
    return { fits: false, overByMinutes: fit.overByMinutes, because: fit.because ?? 'It does not fit' };
  const planned = { from: Date.parse(fit.span.from), to: Date.parse(fit.span.to) };
  const moved = Math.max(0, now - planned.from);
  const span = { from: planned.from + moved, to: planned.to + moved };
  const overMs = span.to - Date.parse(stretch.to);
  if (overMs <= 0) return { fits: true, ...span, minutes: fit.minutes };
  const over = Math.ceil(overMs / MINUTE);
  const rest = fit.minutes - over;
  if (fit.work.splittable && rest >= leastPartMinutes)
    return { fits: true, from: span.from, to: Date.parse(stretch.to), minutes: rest };
  const short = fit.work.splittable ? Math.max(1, leastPartMinutes - rest) : over;
  return { fits: false, overByMinutes: short, because: `${duration(short * 60, 'minute')} too long` };
}
