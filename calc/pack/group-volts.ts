import { CalcInputError } from '../errors';
import { MOST_GROUP_VOLTS, MOST_GROUPS } from '../parameters/pack';
import { requirePositive } from '../require';

/**
 * Refuses volts of a pack that cannot be: none, more than 400 groups, no numbers, or so large that they look like
 * millivolts. 0 and a little below are readings of a dead or reversed group, and stand.
 *
 * @throws CalcInputError naming the first that cannot be
 */
export function requireGroupVolts(field: string, volts: readonly number[]): void {
  if (!Array.isArray(volts) || volts.length === 0 || volts.length > MOST_GROUPS)
    throw new CalcInputError(field, volts, `a list of 1 to ${MOST_GROUPS}, one for each group`);
  volts.forEach((value, group) => requireVolts(`${field}[${group}]`, value));
}

/** The same of one reading. */
export function requireVolts(field: string, value: number): void {
  if (typeof value !== 'number' || !(Math.abs(value) <= MOST_GROUP_VOLTS))
    throw new CalcInputError(field, value, `volts, within ±${MOST_GROUP_VOLTS} (3.652, not 3652)`);
}

/** Refuses an index that names no group of the pack. */
export function requireGroup(field: string, group: number, groups: number): void {
  if (!Number.isInteger(group) || group < 0 || group >= groups)
    throw new CalcInputError(field, group, `a whole number from 0 to ${groups - 1}`);
}

/** Capacity of each group, Ah, from one for all or a list. */
export function capacities(capacityAh: number | readonly number[], groups: number): number[] {
  if (typeof capacityAh === 'number') return new Array<number>(groups).fill(requirePositive('capacityAh', capacityAh));
  if (!Array.isArray(capacityAh) || capacityAh.length !== groups)
    throw new CalcInputError('capacityAh', capacityAh, `a number, or a list of ${groups}, one for each group`);
  return capacityAh.map((value: number, group) => requirePositive(`capacityAh[${group}]`, value));
}
