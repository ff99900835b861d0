import { CalcInputError } from './errors';
import { CHEMISTRIES, type ChemistryParameters } from './parameters/chemistries';
import type { ChemistryId } from './plan-types';

/**
 * What is known of a chemistry.
 *
 * @throws CalcInputError for an unknown one
 * @example chemistryParameters('lfp').hysteresisVolts === 0.025
 */
export function chemistryParameters(id: ChemistryId): ChemistryParameters {
  const known = Object.hasOwn(CHEMISTRIES, id) ? CHEMISTRIES[id] : undefined;
  if (!known) throw new CalcInputError('chemistry', id, `one of ${Object.keys(CHEMISTRIES).join(', ')}`);
  return known;
}

/** The chemistry's guess of a group's long resistance at 25 °C, R0 + R1, ohm: it goes down as the capacity goes up. */
export function guessedLongResistance(id: ChemistryId, capacityAh: number): number {
  return chemistryParameters(id).resistanceOhmAh / capacityAh;
}
