import { voltsAtSoc } from '../curve/ocv';
import { CalcInputError } from '../errors';
import { BALANCE_RELATIVE, FORECAST_RUNS, READING_VOLTS } from '../parameters/pack';
import type { Band } from '../plan-types';
import { requireNotNegative, requirePositive } from '../require';
import { inverseNormal } from '../statistics/inverse-normal';
import { latinHypercubeNormal } from '../statistics/latin-hypercube';
import { quantile } from '../statistics/quantile';
import type { OcvTable } from '../types';
import { balanceMoments } from './balance-moments';
import { balanceRate, type BalanceRate, type BalanceSource } from './balance-rate';
import { doesNotConverge, type DoesNotConverge } from './convergence';
import { capacities } from './group-volts';
import type { Likely, PackReading } from './pack-reading';
import { restSoc } from './rest-soc';

export interface BalanceForecastOptions {
  /** The spread to get down to, V; 0.01 for example. */
  aimVolts: number;
  /** Ah of a group; one for all, or one for each. */
  capacityAh: number | number[];
  curve: OcvTable;
  /** Current of the pack's bleed resistors, A, with the 10th and 90th percentile; null: nobody knows it. */
  bleedAmps: Likely | null;
  /** Hours that they bleed in one balance charge. */
  hoursPerCharge: number;
  /** More balance charges than this are not forecast; 1 to 100. */
  maxCharges: number;
  /** Scatter of a single reading, one standard deviation, V; default 1 mV. */
  noiseVolts?: number;
  seed?: number;
}

export interface BalanceForecast {
  /** Balance charges still to come, whole; 0 where the aim is reached; null: it cannot be said, or never. */
  charges: Band | null;
  /** What they were reckoned from; null: there is neither a bleed current nor two readings. */
  bySource: BalanceSource | null;
  doesNotConverge: DoesNotConverge | null;
  /** More than `maxCharges` are likely. */
  moreThanMost: boolean;
  /** What has to come off the spread as read last, Ah; 0 where the aim is reached. */
  remainingAh: number;
  ampHoursPerCharge: Likely | null;
  /** The spread after each of the next charges, V, at the state of charge of the last reading; empty without a forecast. */
  expectedVolts: Band[];
}

/**
 * Balance charges that a pack still needs: what is left of the spread in ampere-hours, over what one charge takes off, by
 * the bleed current and by the log's own drops since the fit. 400 seeded runs draw the spread as read, the rate and the scatter of
 * each charge; the same input gives the same forecast to the last digit.
 *
 * @param log readings in their order, one or more; those of the arrival do not count once a module was fitted
 * @throws CalcInputError for readings or numbers that cannot be
 */
export function balanceForecast(log: readonly PackReading[], options: BalanceForecastOptions): BalanceForecast {
  const { curve, bleedAmps, maxCharges } = options;
  const aimVolts = requirePositive('aimVolts', options.aimVolts);
  const noiseVolts = requirePositive('noiseVolts', options.noiseVolts ?? READING_VOLTS);
  requirePositive('hoursPerCharge', options.hoursPerCharge);
  if (bleedAmps) requireBleed(bleedAmps);
  if (!Number.isInteger(maxCharges) || maxCharges < 1 || maxCharges > 100)
    throw new CalcInputError('maxCharges', maxCharges, 'a whole number from 1 to 100');
  if (log.length === 0) throw new CalcInputError('log', log, 'a list of one or more readings');

  const moments = balanceMoments(log, curve, options.capacityAh, noiseVolts);
  const last = moments[moments.length - 1]!;
  const rate = balanceRate(moments, bleedAmps, options.hoursPerCharge);
  const low = lowestGroup(log[log.length - 1]!.volts, options);
  const aimAh = low.capacityAh * (restSoc(curve, low.volts + aimVolts) - low.soc);
  const remainingAh = last.spreadVolts <= aimVolts ? 0 : Math.max(0, last.ampHours - aimAh);
  const flag = remainingAh === 0 ? null : doesNotConverge(moments);
  const found: BalanceForecast = {
    charges: remainingAh === 0 ? { p10: 0, p50: 0, p90: 0 } : null,
    bySource: rate?.bySource ?? null,
    doesNotConverge: flag,
    moreThanMost: false,
    remainingAh,
    ampHoursPerCharge: rate && likely(rate),
    expectedVolts: [],
  };
  // A rate that may as well be none at all foretells nothing.
  if (remainingAh === 0 || flag || !rate || rate.mean <= rate.sd) return found;

  const runs = latinHypercubeNormal(FORECAST_RUNS, 2 + maxCharges, options.seed ?? 1).map(([read, drawn, ...each]) => {
    const perCharge = Math.max(0, rate.mean + rate.sd * drawn!);
    let left = Math.max(0, last.ampHours + last.noiseAh * read!);
    return each.map((scatter) => (left = Math.max(0, left - perCharge * Math.max(0, 1 + BALANCE_RELATIVE * scatter))));
  });
  const counts = runs.map(
    (run) => 1 + (run.some((left) => left <= aimAh) ? run.findIndex((left) => left <= aimAh) : maxCharges),
  );
  const band = bandOf(counts);
  if (band.p50 > maxCharges) return { ...found, moreThanMost: true };
  const charges = {
    p10: Math.floor(band.p10),
    p50: Math.ceil(band.p50),
    p90: Math.min(maxCharges, Math.ceil(band.p90)),
  };
  const spreadOf = (left: number): number => voltsAtSoc(curve, low.soc + left / low.capacityAh) - low.volts;
  const expectedVolts = Array.from({ length: charges.p90 }, (_, at) => bandOf(runs.map((run) => spreadOf(run[at]!))));
  return { ...found, charges, expectedVolts };
}

/** The group that balancing brings the others down to. */
function lowestGroup(volts: readonly number[], options: BalanceForecastOptions) {
  const group = volts.indexOf(Math.min(...volts));
  const soc = restSoc(options.curve, volts[group]!);
  const capacityAh = capacities(options.capacityAh, volts.length)[group]!;
  return { soc, capacityAh, volts: voltsAtSoc(options.curve, soc) };
}

const bandOf = (values: readonly number[]): Band => ({
  p10: quantile(values, 0.1),
  p50: quantile(values, 0.5),
  p90: quantile(values, 0.9),
});

function likely({ mean, sd }: BalanceRate): Likely {
  const half = inverseNormal(0.9) * sd;
  return { low: Math.max(0, mean - half), likely: Math.max(0, mean), high: Math.max(0, mean + half) };
}

function requireBleed({ low, likely: middle, high }: Likely): void {
  requireNotNegative('bleedAmps.low', low);
  if (requireNotNegative('bleedAmps.likely', middle) < low)
    throw new CalcInputError('bleedAmps.likely', middle, `${low} or more`);
  if (requireNotNegative('bleedAmps.high', high) < middle)
    throw new CalcInputError('bleedAmps.high', high, `${middle} or more`);
}
