import type { EntityManager } from 'typeorm';
import type { NeighbourState } from '@/calc/plan-types';
import type { Meter } from '../entities/meter';
import type { ModuleType } from '../entities/module-type';
import type { Spare } from '../entities/spare';
import { lastMoves } from '../repositories/spare-moves.repository';
import { lastSpareReadings, listSpares, openChargesBySpare } from '../repositories/spares.repository';
import { correctedVolts } from './meter-trust';
import { usedCapacity } from './spare-capacity';

/** A neighbour's reading counts as known for this long, ms. A guess: on the shelf it moves by a millivolt a month. */
const NEIGHBOUR_READING_GOOD_MS = 30 * 86_400_000;

const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / values.length;

export interface Neighbour {
  spareId: string;
  state: NeighbourState;
}

/**
 * The module that a resistor could join to this spare: of the same type, sound, on the shelf, read in the last 30 days
 * and not moved by a charge since, and with every group beyond the target on the far side. Of several the one farthest away, which is the soonest.
 *
 * @returns null where the shelf has none
 */
export async function neighbourFor(
  manager: EntityManager,
  workshopId: string,
  wanted: { spare: Spare; type: ModuleType; spareVolts: readonly number[]; targetVolts: number },
  meters: ReadonlyMap<string, Meter>,
  now: number,
): Promise<Neighbour | null> {
  const { type, targetVolts } = wanted;
  const up = mean(wanted.spareVolts) < targetVolts;
  const readings = await lastSpareReadings(manager, workshopId);
  const charges = await openChargesBySpare(manager, workshopId);
  const moves = await lastMoves(manager, workshopId);
  let best: { distance: number; neighbour: Neighbour } | null = null;
  for (const spare of await listSpares(manager, workshopId)) {
    const reading = readings.get(spare.id);
    if (!reading || now - reading.at > NEIGHBOUR_READING_GOOD_MS) continue;
    if ((moves.get(spare.id)?.until ?? -Infinity) > reading.at) continue;
    if (spare.id === wanted.spare.id || spare.moduleTypeId !== type.id || charges.has(spare.id)) continue;
    if (spare.condition !== 'sound' || spare.quarantinedAt !== null || spare.fittedAt !== null) continue;
    const groupVolts = correctedVolts(reading.groupVolts, meters.get(reading.meterId ?? '') ?? null);
    if (groupVolts.length !== type.groupsInSeries) continue;
    if (!groupVolts.every((volts) => (up ? volts > targetVolts : volts < targetVolts))) continue;
    const distance = Math.abs(mean(groupVolts) - targetVolts);
    if (best === null || distance > best.distance)
      best = {
        distance,
        neighbour: {
          spareId: spare.id,
          state: { label: spare.label, groupVolts, capacityAh: usedCapacity(spare, type).capacityAh },
        },
      };
  }
  return best?.neighbour ?? null;
}
