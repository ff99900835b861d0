import type { EntityManager } from 'typeorm';
import { SpareCapacity } from '../entities/spare-capacity';

export async function insertSpareCapacity(manager: EntityManager, capacity: SpareCapacity): Promise<void> {
  await manager.insert(SpareCapacity, capacity);
}

export const findSpareCapacity = (
  manager: EntityManager,
  workshopId: string,
  spareId: string,
  id: string,
): Promise<SpareCapacity | null> => manager.findOneBy(SpareCapacity, { workshopId, spareId, id });

/** What a charge has found. */
export const capacityOfCharge = (
  manager: EntityManager,
  workshopId: string,
  chargeId: string,
): Promise<SpareCapacity | null> => manager.findOneBy(SpareCapacity, { workshopId, chargeId });

/** Of one spare, newest first. */
export const listSpareCapacities = (
  manager: EntityManager,
  workshopId: string,
  spareId: string,
): Promise<SpareCapacity[]> =>
  manager.find(SpareCapacity, { where: { workshopId, spareId }, order: { at: 'DESC', id: 'ASC' } });

/** Of every spare that has any, by the spare's id, newest first. */
export async function capacitiesBySpare(
  manager: EntityManager,
  workshopId: string,
): Promise<Map<string, SpareCapacity[]>> {
  const bySpare = new Map<string, SpareCapacity[]>();
  for (const row of await manager.find(SpareCapacity, { where: { workshopId }, order: { at: 'DESC', id: 'ASC' } }))
    bySpare.set(row.spareId, [...(bySpare.get(row.spareId) ?? []), row]);
  return bySpare;
}

export async function updateSpareCapacity(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<SpareCapacity>,
): Promise<void> {
  await manager.update(SpareCapacity, { workshopId, id }, patch);
}

export async function deleteSpareCapacity(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(SpareCapacity, { workshopId, id });
}
