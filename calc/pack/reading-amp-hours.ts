import type { OcvTable } from '../types';
import { quantile } from '../statistics/quantile';
import { capacities, requireGroupVolts } from './group-volts';
import { groupsBeyond, restSoc } from './rest-soc';

export interface ReadingAmpHoursInput {
  /** Of each group at rest, V. */
  volts: number[];
  curve: OcvTable;
  /** Ah of a group; one for all, or one for each. */
  capacityAh: number | number[];
}

export interface ReadingAmpHours {
  /** What has to come off a group (+) or go in (−) until it rests with the median, Ah. */
  ampHours: number[];
  /** Highest minus lowest of them. */
  spreadAh: number;
  /** State of charge at the median of the voltages. */
  medianSoc: number;
  /** Mean state of charge of the groups. */
  meanSoc: number;
  /** Groups beyond the ends of the curve: their ampere-hours are an extension, and end 5 % beyond empty and full. */
  beyondCurve: number[];
}

/**
 * A pack's reading in ampere-hours: Q_i·(z(U_i) − z(median U)). Millivolts at different states of charge do not compare,
 * ampere-hours do.
 *
 * @throws CalcInputError for volts or capacities that cannot be
 * @example readingAmpHours({ volts: [3.5, 3.5, 3.6], curve: { soc: [0, 1], volts: [3, 4] }, capacityAh: 50 }).ampHours[0] === 0
 */
export function readingAmpHours(input: ReadingAmpHoursInput): ReadingAmpHours {
  const { volts, curve } = input;
  requireGroupVolts('volts', volts);
  const capacityAh = capacities(input.capacityAh, volts.length);
  const medianSoc = restSoc(curve, quantile(volts, 0.5));
  const soc = volts.map((value) => restSoc(curve, value));
  const ampHours = soc.map((z, group) => capacityAh[group]! * (z - medianSoc));
  return {
    ampHours,
    spreadAh: Math.max(...ampHours) - Math.min(...ampHours),
    medianSoc,
    meanSoc: soc.reduce((sum, z) => sum + z, 0) / soc.length,
    beyondCurve: groupsBeyond(curve, volts),
  };
}
