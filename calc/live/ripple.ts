import { LIVE_SPREADS } from './live-spreads';
import { isFull } from './looks';
import type { Observation } from './observations';

/** Two readings of a full current further apart than this, as a share of it, are a step of the current and no ripple. */
const STEP_SHARE = 0.08;

/**
 * How far a current that is set goes to and fro between two looks, as the readings of the charge so far show: half the mean
 * square of the steps from one to the next, as a share of the current, less what its meter flickers by. The reading itself
 * counts, so that the first swing is not held against it. A variance, for each reading that has one.
 */
export function rippleOf(observations: readonly Observation[]): Map<Observation, number> {
  const found = new Map<Observation, number>();
  let before: number | null = null;
  let squares = 0;
  let count = 0;
  for (const at of observations) {
    const { circuit, kept } = at;
    const full = circuit?.fullAmps ?? null;
    if (circuit === null || full === null || kept.amps === null || !isFull(circuit, kept.amps)) continue;
    const share = kept.amps / full;
    if (before !== null && Math.abs(share - before) <= STEP_SHARE) {
      squares += (share - before) ** 2;
      count += 1;
    }
    before = share;
    if (count > 0) found.set(at, Math.max(0, squares / (2 * count) - (LIVE_SPREADS.ammeterAmps / full) ** 2));
  }
  return found;
}
