import type { Reckoning } from '../live-types';
import type { LiveRound } from './live-rounds';
import type { AheadClock } from './live-segments';

/** Current was read after the reckoned end. */
export const isOverrun = (round: LiveRound): boolean => round.open && round.pasts.some((one) => one.overrun);

/** When a voltage limit begins to rule, or began, s; null: never. */
export function taperOf(
  current: LiveRound,
  running: AheadClock['rounds'][number] | undefined,
  isResting: boolean,
): number | null {
  const past = current.pasts.map((one) => one.taperAtS);
  if (past.every((one) => one !== null)) return Math.max(...past.map((one) => one!));
  if (isResting || current.endedAtS !== null) return null;
  return running?.taperS ?? null;
}

export function stageOf(at: {
  isResting: boolean;
  waits: boolean;
  tapering: boolean;
  nowS: number;
  restEndS: number;
}): Reckoning['stage'] {
  if (at.isResting) return at.nowS >= at.restEndS ? 'check-due' : 'resting';
  return at.tapering ? 'tapering' : 'charging';
}
