import { CalcInputError } from '../errors';
import { requirePositive } from '../require';
import type { OcvTable } from '../types';
import { requireVolts } from './group-volts';
import { restSoc } from './rest-soc';

export interface BleedHoursInput {
  /** Rest voltage of the group before and after, V. */
  fromVolts: number;
  toVolts: number;
  capacityAh: number;
  curve: OcvTable;
  /** Current of the bleed resistor, A. */
  bleedAmps: number;
}

/**
 * Hours that a bleed resistor takes to bring a group down: Q·Δz / i, Δz from the curve. Source: the worked example in
 * Electronics World, Nov. 2025, p. 28: 5 % of a 4 Ah cell at 200 mA, about 1 h.
 *
 * @throws CalcInputError for numbers that cannot be, and where the group would have to go up
 * @example bleedHours({ fromVolts: 3.5, toVolts: 3.25, capacityAh: 4, curve: { soc: [0, 1], volts: [3, 4] }, bleedAmps: 0.5 }) === 2
 */
export function bleedHours(input: BleedHoursInput): number {
  const { fromVolts, toVolts, curve } = input;
  requireVolts('fromVolts', fromVolts);
  requireVolts('toVolts', toVolts);
  if (toVolts > fromVolts)
    throw new CalcInputError('toVolts', toVolts, `at most fromVolts, ${fromVolts}: bleeding takes charge off`);
  const moved = restSoc(curve, fromVolts) - restSoc(curve, toVolts);
  return (requirePositive('capacityAh', input.capacityAh) * moved) / requirePositive('bleedAmps', input.bleedAmps);
}
