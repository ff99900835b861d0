import { In, type EntityManager } from 'typeorm';
import { Charge } from '../entities/charge';
import { ModuleType } from '../entities/module-type';
import { Spare } from '../entities/spare';

export const listModuleTypes = (manager: EntityManager, workshopId: string): Promise<ModuleType[]> =>
  manager.find(ModuleType, { where: { workshopId }, order: { name: 'ASC' } });

export const findModuleType = (manager: EntityManager, workshopId: string, id: string): Promise<ModuleType | null> =>
  manager.findOneBy(ModuleType, { workshopId, id });

export const findModuleTypes = (manager: EntityManager, workshopId: string, ids: string[]): Promise<ModuleType[]> =>
  manager.findBy(ModuleType, { workshopId, id: In(ids) });

export const findModuleTypeNamed = (
  manager: EntityManager,
  workshopId: string,
  name: string,
): Promise<ModuleType | null> => manager.findOneBy(ModuleType, { workshopId, name });

export const saveModuleType = (manager: EntityManager, type: ModuleType): Promise<ModuleType> =>
  manager.save(ModuleType, type);

export async function deleteModuleType(manager: EntityManager, workshopId: string, id: string): Promise<void> {
  await manager.delete(ModuleType, { workshopId, id });
}

export interface TypeUse {
  spares: number;
  charges: number;
}

/** How many spares and charges each type has; types without any are left out. */
export async function countTypeUse(manager: EntityManager, workshopId: string): Promise<Map<string, TypeUse>> {
  const count = (entity: typeof Spare | typeof Charge) =>
    manager
      .createQueryBuilder(entity, 'row')
      .select('row.moduleTypeId', 'typeId')
      .addSelect('COUNT(*)', 'count')
      .where('row.workshopId = :workshopId', { workshopId })
      .groupBy('row.moduleTypeId')
      .getRawMany<{ typeId: string; count: number | string }>();
  const uses = new Map<string, TypeUse>();
  const countsOf = (typeId: string): TypeUse => {
    const known = uses.get(typeId) ?? { spares: 0, charges: 0 };
    uses.set(typeId, known);
    return known;
  };
  for (const row of await count(Spare)) countsOf(row.typeId).spares = Number(row.count);
  for (const row of await count(Charge)) countsOf(row.typeId).charges = Number(row.count);
  return uses;
}
