import { socOf } from '../plan/soc-of';
import type { LiveReading } from '../live-types';
import type { PlanModel } from '../plan/plan-model';
import type { ModuleState } from './module-state';

/** Two readings of a resting module this far apart in time that agree say that it has settled, s. */
const SETTLED_APART_S = 600;
/** Agree: within this, V. */
const SETTLED_VOLTS = 0.001;

export interface RestSeen {
  /** Rest voltage of each group as read, the rest of the over-voltage taken off, V; null: as reckoned. */
  restVolts: number[] | null;
  /** Moment from which readings show that it has settled, s; null: they do not. */
  settledAtS: number | null;
}

/**
 * What group voltages read after the last current say: they replace the reckoned ones where the over-voltage is nearly gone,
 * and two that agree to a millivolt ten minutes apart end the rest.
 *
 * @param stateAt module by the model at an instant of the rest
 */
export function restSeen(
  model: PlanModel,
  readings: readonly LiveReading[],
  currentEndS: number,
  nowS: number,
  stateAt: (s: number) => ModuleState,
): RestSeen {
  const own = readings.filter(
    (reading) =>
      reading.s > currentEndS &&
      reading.s <= nowS &&
      reading.groupVolts !== null &&
      reading.groupVolts.length === model.groups.length,
  );
  let seen: number[] | null = null;
  let settledAtS: number | null = null;
  own.forEach((reading, at) => {
    const over = stateAt(reading.s).over;
    const left = over.reduce((sum, volts) => sum + Math.abs(volts), 0);
    if (left <= model.settledVolts(model.groups.length))
      seen = reading.groupVolts!.map((volts, group) => volts - over[group]!);
    const earlier = own.slice(0, at).findLast((one) => reading.s - one.s >= SETTLED_APART_S);
    if (settledAtS === null && earlier && agree(earlier.groupVolts!, reading.groupVolts!)) settledAtS = reading.s;
  });
  return { restVolts: seen, settledAtS };
}

const agree = (one: readonly number[], other: readonly number[]): boolean =>
  one.every((volts, group) => Math.abs(volts - other[group]!) <= SETTLED_VOLTS + 1e-9);

/**
 * Rest voltages under current with the differences between groups as a reading of the groups has them: the mean stays as
 * reckoned from the charge.
 */
export function withSeenDifferences(
  restVolts: readonly number[],
  seen: { volts: readonly number[]; reckoned: readonly number[] } | null,
): number[] {
  if (seen === null) return [...restVolts];
  const off = seen.volts.map((volts, group) => volts - seen.reckoned[group]!);
  const mean = off.reduce((sum, value) => sum + value, 0) / off.length;
  return restVolts.map((volts, group) => volts + off[group]! - mean);
}

/** States of charge of rest voltages. */
export const socsOf = (model: PlanModel, restVolts: readonly number[]): number[] =>
  restVolts.map((volts) => socOf(model.curve, volts));
