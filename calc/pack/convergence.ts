import { APART_SOC, CHANGE_SDS, NO_CHANGE_SDS, SLOPE_ALIKE_SOC, SLOPE_RELATIVE } from '../parameters/pack';
import type { BalanceMoment } from './balance-moments';
import { slopeApart } from './spread-figure';
import { neverRisingChiSquared, weightedLine } from './weighted-line';

export type DoesNotConverge = 'capacity-spread' | 'no-change' | 'grows';

/** Fewer readings than this say nothing of a course. */
const LEAST_READINGS = 3;
/** A line over the charge explains the spreads better than a course that never rises: by two standard deviations. */
const BETTER_CHI_SQUARED = 4;
/** And its slope is no chance. */
const SLOPE_SDS = 3;

/**
 * Whether the spread of three readings or more, in ampere-hours, looks like one that balancing will not close; null: it does
 * not, or too little is known.
 *
 * - 'capacity-spread': it goes with the state of charge at which it was read. A group of other capacity moves faster than the
 *   rest by ΔQ·(Q/Q_i − 1), so that what balancing takes off at one end comes back at the other.
 * - 'grows': it rises from charge to charge beyond the noise.
 * - 'no-change': the last two charges together, or all of them, took off less than one standard deviation.
 */
export function doesNotConverge(moments: readonly BalanceMoment[]): DoesNotConverge | null {
  if (moments.length < LEAST_READINGS) return null;
  const spreads = moments.map(({ ampHours }) => ampHours);
  const socs = moments.map(({ soc }) => soc);
  const range = Math.max(...socs) - Math.min(...socs);
  // Read at different charges the curve's slope errs on its own each time.
  const slopeShare = SLOPE_RELATIVE * (1 - Math.exp(-range / SLOPE_ALIKE_SOC));
  const sds = moments.map(({ ampHours, noiseAh }) => Math.hypot(noiseAh, slopeShare * ampHours));

  if (range >= APART_SOC) {
    const bySoc = weightedLine(socs, spreads, sds);
    const certain = Math.abs(bySoc.slope) > SLOPE_SDS * bySoc.slopeSd;
    if (certain && neverRisingChiSquared(spreads, sds) > bySoc.chiSquared + BETTER_CHI_SQUARED)
      return 'capacity-spread';
  }
  const byCount = weightedLine(
    moments.map(({ count }) => count),
    spreads,
    sds,
  );
  const first = moments[moments.length - LEAST_READINGS]!;
  const last = moments[moments.length - 1]!;
  const drop = first.ampHours - last.ampHours;
  const dropSd = Math.hypot(first.noiseAh, last.noiseAh, slopeApart(first, last));
  if (byCount.slope > CHANGE_SDS * byCount.slopeSd || drop < -CHANGE_SDS * dropSd) return 'grows';
  if (-byCount.slope < NO_CHANGE_SDS * byCount.slopeSd || drop < NO_CHANGE_SDS * dropSd) return 'no-change';
  return null;
}
