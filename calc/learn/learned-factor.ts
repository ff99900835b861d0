import { requirePositive } from '../require';
import type { TimeFactor } from '../plan-types';

/** Seconds of current of a closed charge. */
export interface ClosedCharge {
  predictedS: number;
  actualS: number;
}

export interface LearnedFactor extends TimeFactor {
  /** Charges that were left out, as they took more than twice or less than half of what was predicted. */
  leftOut: number;
}

/** Standard deviation of a type's and charger's own factor about 1, before any charge: a guess. */
const PRIOR_SD = 0.06;
/** Scatter of single charges about it, and the number of charges this is worth: a guess. */
const SCATTER_SD = 0.06;
const SCATTER_CHARGES = 4;
/** ln 2: beyond it something else happened than a charge as planned (a hold that nobody noted, a clip off). */
const MOST_LOG_RATIO = Math.LN2;

/**
 * By how much charges of one module type on one charger take longer than predicted: normal about 1 by the logarithm, pulled
 * towards 1 as long as few have been closed.
 *
 * `mean` multiplies the next prediction, `sd` is how far the next charge may be off it (what is not known of the factor, and
 * the scatter of single charges), `charges` is the number it was learned from. With none it is 1.
 *
 * @throws CalcInputError for seconds of 0 or less
 */
export function learnedFactor(closed: readonly ClosedCharge[]): LearnedFactor {
  const logs = closed.map(({ predictedS, actualS }, at) =>
    Math.log(
      requirePositive(`closed[${at}].actualS`, actualS) / requirePositive(`closed[${at}].predictedS`, predictedS),
    ),
  );
  const taken = logs.filter((log) => Math.abs(log) <= MOST_LOG_RATIO);
  const count = taken.length;
  const average = count === 0 ? 0 : taken.reduce((sum, log) => sum + log, 0) / count;
  const squares = taken.reduce((sum, log) => sum + (log - average) ** 2, 0);
  const scatter = (SCATTER_CHARGES * SCATTER_SD ** 2 + squares) / (SCATTER_CHARGES + Math.max(0, count - 1));
  const precision = 1 / PRIOR_SD ** 2 + count / scatter;
  const log = (count * average) / scatter / precision;
  return {
    mean: Math.exp(log),
    sd: Math.exp(log) * Math.sqrt(scatter + 1 / precision),
    charges: count,
    leftOut: logs.length - count,
  };
}
