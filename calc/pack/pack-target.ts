import { slopeAtSoc } from '../curve/ocv';
import { CalcInputError } from '../errors';
import type { TemperatureCoefficient } from '../parameters/chemistries';
import { MEDIAN_PER_MEAN_ERROR, READING_VOLTS } from '../parameters/pack';
import { temperatureVolts } from '../parameters/temperature-coefficient';
import { isGiven, requireFinite, requireNotNegative, requirePositive, requirePositiveOrNull } from '../require';
import type { OcvTable } from '../types';
import { requireGroup, requireGroupVolts } from './group-volts';
import { restSoc } from './rest-soc';
import { robust } from './robust';
import { targetTrust, type TargetReason, type TargetTrust } from './target-trust';

export interface PackTargetInput {
  /** Of each group of the pack at rest, V. */
  volts: number[];
  /** 0-based indexes of the groups that do not count: odd ones, and all of the module that goes out. */
  odd: number[];
  curve: OcvTable;
  /** Least scatter of a healthy group, V; default 1 mV, the last digit of a reading. */
  sigmaFloorVolts?: number;
  /** Offset of the instrument, one standard deviation, V: it does not average out. */
  meterSdVolts: number;
  /** Age of the reading, s. */
  ageS: number;
  /** Temperature of the pack when it was read, °C; null: nobody noted it. */
  celsius: number | null;
  /** Temperature of the curve; default 25 °C. */
  curveCelsius?: number;
  /** dU/dT of the chemistry, where known. */
  temperatureCoefficient?: TemperatureCoefficient | null;
  /** Time since the last load, s; null: nobody noted it, which costs trust; left out: not judged. */
  restS?: number | null;
  /** Half width of the chemistry's hysteresis, V; default 0. */
  hysteresisVolts?: number;
  /** Ah of a group of the pack. */
  capacityAh?: number | null;
}

export interface PackTarget {
  /** Median of the healthy groups. */
  volts: number;
  standardErrorVolts: number;
  soc: number;
  slopeVoltsPerSoc: number;
  /** What one millivolt is worth in a group; left out where the capacity is. */
  ampHoursPerMillivolt?: number;
  /** Groups that count. */
  healthy: number;
  trust: TargetTrust;
  /** What costs trust, the weightiest first. */
  reasons: TargetReason[];
}

/**
 * The voltage that a spare has to rest at: the median of the pack's healthy groups, with its standard error
 * √((1.2533·σ/√n)² + meter²), σ = 1.4826·MAD of them or the floor, the state of charge and the slope of the curve there (at
 * the temperature of the reading), and how far it can be trusted.
 *
 * @throws CalcInputError for numbers that cannot be, or where no healthy group is left
 */
export function packTarget(input: PackTargetInput): PackTarget {
  const { volts, odd, curve } = input;
  requireGroupVolts('volts', volts);
  odd.forEach((group, at) => requireGroup(`odd[${at}]`, group, volts.length));
  const floor = requirePositive('sigmaFloorVolts', input.sigmaFloorVolts ?? READING_VOLTS);
  const meterSd = requireNotNegative('meterSdVolts', input.meterSdVolts);
  requireNotNegative('ageS', input.ageS);
  const hysteresisVolts = requireNotNegative('hysteresisVolts', input.hysteresisVolts ?? 0);
  if (isGiven(input.restS)) requireNotNegative('restS', input.restS);
  requirePositiveOrNull('capacityAh', input.capacityAh);
  const curveCelsius = requireFinite('curveCelsius', input.curveCelsius ?? 25);
  const celsius = input.celsius === null ? curveCelsius : requireFinite('celsius', input.celsius);

  const left = new Set(odd);
  const healthyVolts = volts.filter((_, group) => !left.has(group));
  if (healthyVolts.length === 0)
    throw new CalcInputError('odd', odd, `such that a healthy group is left of ${volts.length}`);
  const { median, sigma } = robust(healthyVolts, floor);
  if (median <= 0) throw new CalcInputError('volts', median, 'above 0 in the middle of the healthy groups');

  const soc = socAtTemperature(curve, median, input.temperatureCoefficient ?? null, celsius, curveCelsius);
  const slope = slopeAtSoc(curve, soc);
  const judged = targetTrust({
    groups: volts.length,
    healthy: healthyVolts.length,
    spreadVolts: Math.max(...healthyVolts) - Math.min(...healthyVolts),
    soc,
    slopeVoltsPerSoc: slope,
    hysteresisVolts,
    ageS: input.ageS,
    restS: input.restS,
    celsius,
    curveCelsius,
  });
  return {
    volts: median,
    standardErrorVolts: Math.hypot((MEDIAN_PER_MEAN_ERROR * sigma) / Math.sqrt(healthyVolts.length), meterSd),
    soc,
    slopeVoltsPerSoc: slope,
    ...(isGiven(input.capacityAh) && slope > 0 ? { ampHoursPerMillivolt: (0.001 * input.capacityAh) / slope } : {}),
    healthy: healthyVolts.length,
    ...judged,
  };
}

/** The temperature term depends on the charge that is looked for: a few rounds settle it, it is millivolts. */
function socAtTemperature(
  curve: OcvTable,
  volts: number,
  coefficient: TemperatureCoefficient | null,
  celsius: number,
  curveCelsius: number,
): number {
  let soc = restSoc(curve, volts);
  for (let round = 0; coefficient && round < 8; round++) {
    const term = temperatureVolts(coefficient, soc, celsius) - temperatureVolts(coefficient, soc, curveCelsius);
    soc = restSoc(curve, volts - term);
  }
  return soc;
}
