import type { Band } from '../plan-types';
import { requireFinite, requireNotNegative, requirePositive } from '../require';
import { binned, type RestPoint } from './binned';
import { mixtureBelow, mixtureQuantile, type Part } from './normal';
import { linearFit, project, type Posterior } from './linear-fit';
import { OVER_CORRELATION, OVER_SCALES_VOLTS, RELATIVE_SCALES, sharesLeft, TIME_CONSTANTS_S } from './relaxation';

/** A voltage read at rest: of one group, or of the module with a tolerance of the module. */
export interface RestReading {
  /** Since the end of current, s. */
  s: number;
  volts: number;
}

export interface RestOptions {
  /** Scatter of a single reading, V; default 0.3 mV. */
  noiseVolts?: number;
  /** Last digit of the meter, V; default 1 mV. */
  stepVolts?: number;
  /** Moment that is asked for, s since the end of current; default the last reading. */
  nowS?: number;
}

export interface RestForecast {
  /** Where it will settle, V. */
  settledVolts: Band;
  /** What is still to come at `nowS`: settled minus now, V. */
  driftVolts: Band;
  /** That this drift, up or down, is below a tenth of the tolerance: 0…1. */
  chance: number;
  /** The chance is 90 % or more. */
  restedEnough: boolean;
  /** When that is expected, s since the end of current; null: not within a day. */
  enoughAtS: number | null;
  /** Readings it stands on. */
  readings: number;
}

/** Share of the tolerance that may still come. */
const DRIFT_SHARE = 0.1;
const CHANCE_WANTED = 0.9;
const NOISE_VOLTS = 0.0003;
const STEP_VOLTS = 0.001;
/** Of the settled voltage about the last reading before anything is known, V: as good as unknown. */
const SETTLED_SD_VOLTS = 0.5;
const LEAST_POINTS = 3;
const DAY_S = 86_400;

/**
 * Where a rest will settle, from the readings so far, and whether it has rested enough.
 *
 * V(t) = V∞ + Σ a_k·e^(−t/τ_k) over time constants of 10 s to nearly 3 h (relaxation.ts): the a_k and V∞ are normal, so
 * that their distribution after the readings is exact, for each scale of over-voltage that is thought of; what comes out is
 * the mixture of the scales, weighed by how well each explains the readings. Few readings, or early ones, cannot tell a slow
 * relaxation from none: the band is wide then and nothing is claimed. Volts, seconds.
 *
 * @param toleranceVolts of what was read: a group's for a group, the module's for the module
 * @returns null where the readings are too few or too close in time to say anything
 * @throws CalcInputError for numbers that cannot be
 */
export function predictRest(
  readings: readonly RestReading[],
  toleranceVolts: number,
  options: RestOptions = {},
): RestForecast | null {
  requirePositive('toleranceVolts', toleranceVolts);
  readings.forEach(({ s, volts }, at) => {
    requireFinite(`readings[${at}].s`, s);
    requireFinite(`readings[${at}].volts`, volts);
  });
  const noise = requirePositive('noiseVolts', options.noiseVolts ?? NOISE_VOLTS);
  // Rounding spreads a reading evenly over a step: its standard deviation is a step over √12.
  const rounding = requireNotNegative('stepVolts', options.stepVolts ?? STEP_VOLTS) / Math.sqrt(12);
  const points = binned(readings, noise, rounding);
  if (points.length < LEAST_POINTS) return null;
  const lastVolts = points[points.length - 1]!.volts;
  const nowS = options.nowS ?? Math.max(...readings.map(({ s }) => s));
  const fits = weighed(points, lastVolts);
  const drift = (s: number): Part[] => parts(fits, [0, ...sharesLeft(s).map((share) => -share)], 0);
  const chanceAt = (s: number): number => {
    const own = drift(s);
    const most = DRIFT_SHARE * toleranceVolts;
    return mixtureBelow(own, most) - mixtureBelow(own, -most);
  };
  const chance = chanceAt(nowS);
  const restedEnough = chance >= CHANCE_WANTED;
  return {
    settledVolts: bandOf(parts(fits, [1, ...TIME_CONSTANTS_S.map(() => 0)], lastVolts)),
    driftVolts: bandOf(drift(nowS)),
    chance,
    restedEnough,
    enoughAtS: restedEnough ? nowS : firstEnough(chanceAt, nowS),
    readings: readings.length,
  };
}

type Fit = Posterior & { weight: number };

/** One fit for each scale of over-voltage, the weights summing to 1. */
function weighed(points: readonly RestPoint[], lastVolts: number): Fit[] {
  const data = points.map(({ s, volts, sd }) => ({ row: [1, ...sharesLeft(s)], value: volts - lastVolts, sd }));
  const fits = OVER_SCALES_VOLTS.map((scale) => {
    const prior = priorPrecision(scale);
    return linearFit(data, prior.precision, prior.logDeterminant);
  });
  const best = Math.max(...fits.map((one) => one.logEvidence));
  const total = fits.reduce((sum, one) => sum + Math.exp(one.logEvidence - best), 0);
  return fits.map((one) => ({ ...one, weight: Math.exp(one.logEvidence - best) / total }));
}

/** Of V∞ and the over-voltages: the inverse of scale²·((1 − ρ)·1 + ρ·all) in relative scales, by Sherman and Morrison. */
function priorPrecision(scale: number): { precision: number[][]; logDeterminant: number } {
  const count = TIME_CONSTANTS_S.length;
  const rho = OVER_CORRELATION;
  const own = 1 / (scale * scale * (1 - rho));
  const shared = (own * rho) / (1 - rho + count * rho);
  const precision = [0, ...TIME_CONSTANTS_S].map((_, i) =>
    [0, ...TIME_CONSTANTS_S].map((__, j) => {
      if (i === 0 || j === 0) return i === j ? 1 / SETTLED_SD_VOLTS ** 2 : 0;
      return ((i === j ? own : 0) - shared) / (RELATIVE_SCALES[i - 1]! * RELATIVE_SCALES[j - 1]!);
    }),
  );
  return {
    precision,
    logDeterminant:
      -2 * Math.log(SETTLED_SD_VOLTS) +
      count * Math.log(own) -
      Math.log((1 - rho + count * rho) / (1 - rho)) -
      2 * RELATIVE_SCALES.reduce((sum, scale) => sum + Math.log(scale), 0),
  };
}

const parts = (fits: readonly Fit[], row: readonly number[], offset: number): Part[] =>
  fits.map((fit) => {
    const { mean, sd } = project(fit, row);
    return { weight: fit.weight, mean: offset + mean, sd };
  });

function firstEnough(chanceAt: (s: number) => number, nowS: number): number | null {
  if (chanceAt(DAY_S) < CHANCE_WANTED) return null;
  let low = nowS;
  let high = DAY_S;
  while (high - low > 1) {
    const middle = (low + high) / 2;
    if (chanceAt(middle) >= CHANCE_WANTED) high = middle;
    else low = middle;
  }
  return high;
}

const bandOf = (own: readonly Part[]): Band => ({
  p10: mixtureQuantile(own, 0.1),
  p50: mixtureQuantile(own, 0.5),
  p90: mixtureQuantile(own, 0.9),
});
