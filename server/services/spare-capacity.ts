import type { NumberSource } from '@/calc/plan-types';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';

/** Health of a module nobody has measured, as a share of the rated capacity. A guess for used modules. */
export const UNKNOWN_HEALTH = 0.92;

export interface UsedCapacity {
  /** Of one group, Ah. */
  capacityAh: number;
  source: NumberSource;
}

/**
 * The capacity that plans use: the typed ampere-hours, else rated times health, else rated times the usual health of a
 * used module, which is then a guess whatever source was chosen.
 */
export function usedCapacity(
  spare: Pick<Spare, 'capacityAh' | 'healthPercent' | 'capacitySource'>,
  type: Pick<ModuleType, 'ratedAh'>,
): UsedCapacity {
  if (spare.capacityAh !== null) return { capacityAh: spare.capacityAh, source: spare.capacitySource };
  if (spare.healthPercent !== null)
    return { capacityAh: (type.ratedAh * spare.healthPercent) / 100, source: spare.capacitySource };
  return { capacityAh: type.ratedAh * UNKNOWN_HEALTH, source: 'guessed' };
}
