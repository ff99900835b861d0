import type { EntityManager } from 'typeorm';
import { PackType } from '../entities/pack-type';
import { Repair } from '../entities/repair';

export const listPackTypes = (manager: EntityManager, workshopId: string): Promise<PackType[]> =>
  manager.find(PackType, { where: { workshopId }, order: { name: 'ASC' } });

export const findPackType = (manager: EntityManager, workshopId: string, id: string): Promise<PackType | null> =>
  manager.findOneBy(PackType, { workshopId, id });

export const findPackTypeNamed = (manager: EntityManager, workshopId: string, name: string): Promise<PackType | null> =>
  manager.findOneBy(PackType, { workshopId, name });

export const savePackType = (manager: EntityManager, type: PackType): Promise<PackType> => manager.save(PackType, type);

/** Packs, of types and of repairs, that have modules of this type. */
export async function countPacksOfModuleType(
  manager: EntityManager,
  workshopId: string,
  moduleTypeId: string,
): Promise<number> {
  const types = await manager.countBy(PackType, { workshopId, moduleTypeId });
  return types + (await manager.countBy(Repair, { workshopId, moduleTypeId }));
}
