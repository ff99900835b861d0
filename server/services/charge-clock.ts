/** A charge's own time: epoch milliseconds of the server against the seconds of the plan and of the reckoning. */
import type { Charge } from '../entities/charge';

/** A clock that is further back than this was wrong before, not now, ms. */
const BACKWARDS_MS = 2 * 3600_000;

/**
 * The instant a charge is reckoned for. It does not run backwards: where the server's clock was set back, the charge
 * stands still until the clock has caught up, so that no stage is undone and no alert comes twice. After a leap back of
 * over two hours the earlier time was the wrong one, and the clock is believed.
 */
export function chargeNow(charge: Pick<Charge, 'reckoning'>, now: number): number {
  const last = charge.reckoning?.at ?? now;
  return last - now > BACKWARDS_MS ? now : Math.max(now, last);
}

/** Keeps an instant clear of the last binary digit of its seconds, ms. */
const DIGIT_MS = 1e-3;

/**
 * Seconds of the reckoning (0 = first current) as an instant. Always a little after them, so that what is reckoned for
 * this instant has happened by it: what is due at it would else be found not due, and be left for later.
 */
export function instantOf(charge: Pick<Charge, 'startedAt'>, seconds: number): number {
  return (charge.startedAt ?? 0) + Math.ceil(seconds * 1000 + DIGIT_MS);
}

/** Instant as seconds of the reckoning. */
export function secondsOf(charge: Pick<Charge, 'startedAt'>, at: number): number {
  return (at - (charge.startedAt ?? at)) / 1000;
}

/** Instant of a reading by its seconds, to the millisecond: rounded up as what is to come is, it would lie after the reading. */
export function readingInstantOf(charge: Pick<Charge, 'startedAt'>, seconds: number): number {
  return (charge.startedAt ?? 0) + Math.round(seconds * 1000);
}

/** Instant of the option's own 0, on which its segments and steps stand: the clip-on, or what it was shifted to. */
export function optionZeroAt(charge: Pick<Charge, 'startedAt' | 'clipOnAt' | 'option'>): number {
  return charge.startedAt === null ? charge.clipOnAt : charge.startedAt - charge.option.currentStartS * 1000;
}
