import { combineFigures, type Figure } from '../learn/figure';
import { BALANCE_FADE, BALANCE_RELATIVE, SLOPE_RELATIVE } from '../parameters/pack';
import { inverseNormal } from '../statistics/inverse-normal';
import type { BalanceMoment } from './balance-moments';
import type { Likely } from './pack-reading';
import { slopeApart } from './spread-figure';

export type BalanceSource = 'bleed' | 'log' | 'both';

/** Ampere-hours that one balance charge takes off the spread. */
export interface BalanceRate extends Figure {
  bySource: BalanceSource;
}

/**
 * The rate from the bleed current, i·h, and from the log's own drops, weighed by their doubt. Where they disagree beyond three
 * standard deviations the log is right: it is what happened.
 *
 * @returns null: neither is there
 */
export function balanceRate(
  moments: readonly BalanceMoment[],
  bleedAmps: Likely | null,
  hoursPerCharge: number,
): BalanceRate | null {
  const byLog = rateOfLog(moments);
  const byBleed = bleedAmps && bleedAmps.high > 0 ? rateOfBleed(bleedAmps, hoursPerCharge) : null;
  if (byLog && byBleed) {
    const { mean, sd, agree } = combineFigures(byBleed, byLog);
    return agree ? { mean, sd, bySource: 'both' } : { ...byLog, bySource: 'log' };
  }
  if (byLog) return { ...byLog, bySource: 'log' };
  return byBleed && { ...byBleed, bySource: 'bleed' };
}

/** Low and high are the 10th and 90th percentile. What is to come off was worked out by the curve's slope, which may err. */
function rateOfBleed({ low, likely, high }: Likely, hours: number): Figure {
  const sd = (high - low) / (2 * inverseNormal(0.9));
  return { mean: likely * hours, sd: hours * Math.hypot(sd, SLOPE_RELATIVE * high) };
}

/**
 * Mean of the drops, each of less weight than the next, with the noise of the readings (each but the ends is in two drops, where
 * it partly cancels), the slopes between them, and how much charges scatter.
 */
function rateOfLog(moments: readonly BalanceMoment[]): Figure | null {
  if (moments.length < 2) return null;
  const pairs = moments.slice(1).map((after, at) => {
    const before = moments[at]!;
    const charges = after.count - before.count;
    return { charges, drop: before.ampHours - after.ampHours, slopes: slopeApart(before, after) };
  });
  const last = moments[moments.length - 1]!.count;
  const raw = pairs.map(({ charges }, at) => charges * BALANCE_FADE ** (last - moments[at + 1]!.count));
  const total = raw.reduce((sum, value) => sum + value, 0);
  // A drop over several charges is their sum: its weight is shared out over them.
  const share = pairs.map(({ charges }, at) => raw[at]! / total / charges);

  const mean = pairs.reduce((sum, { drop }, at) => sum + share[at]! * drop, 0);
  const noise = Math.hypot(...moments.map(({ noiseAh }, at) => ((share[at] ?? 0) - (share[at - 1] ?? 0)) * noiseAh));
  const slopes = Math.hypot(...pairs.map((pair, at) => share[at]! * pair.slopes));
  const scatter =
    BALANCE_RELATIVE * mean * Math.hypot(...pairs.map(({ charges }, at) => share[at]! * Math.sqrt(charges)));
  return { mean, sd: Math.hypot(noise, slopes, scatter) };
}
