import { CAPACITY_RELATIVE_SD } from '@/calc/plan/default-spreads';
import type { NumberSource } from '@/calc/plan-types';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';

/** Health of a module nobody has measured, as a share of the rated capacity. A guess for used modules. */
export const UNKNOWN_HEALTH = 0.92;

export interface UsedCapacity {
  /** Of one group, Ah. */
  capacityAh: number;
  source: NumberSource;
  /** Standard deviation: told by a charge, else what the source is good for, Ah. */
  sdAh: number;
}

/**
 * The capacity that plans use: the typed ampere-hours, else rated times health, else rated times the usual health of a
 * used module, which is then a guess whatever source was chosen.
 */
export function usedCapacity(
  spare: Pick<Spare, 'capacityAh' | 'healthPercent' | 'capacitySource' | 'capacitySdAh'>,
  type: Pick<ModuleType, 'ratedAh'>,
): UsedCapacity {
  const by = (capacityAh: number, source: NumberSource): UsedCapacity => ({
    capacityAh,
    source,
    sdAh: capacityAh * CAPACITY_RELATIVE_SD[source],
  });
  if (spare.capacityAh !== null) {
    const typed = by(spare.capacityAh, spare.capacitySource);
    return { ...typed, sdAh: spare.capacitySdAh ?? typed.sdAh };
  }
  if (spare.healthPercent !== null) return by((type.ratedAh * spare.healthPercent) / 100, spare.capacitySource);
  return by(type.ratedAh * UNKNOWN_HEALTH, 'guessed');
}
