import { In, type EntityManager } from 'typeorm';
import { Workshop } from '../entities/workshop';

export const findWorkshop = (manager: EntityManager, workshopId: string): Promise<Workshop | null> =>
  manager.findOneBy(Workshop, { id: workshopId });

export const countWorkshops = (manager: EntityManager): Promise<number> => manager.count(Workshop);

/** The first workshop of the installation; only for what the sign-in page says of a single one. */
export const findFirstWorkshop = (manager: EntityManager): Promise<Workshop | null> =>
  manager.findOne(Workshop, { where: {}, order: { createdAt: 'ASC', id: 'ASC' } });

export const insertWorkshop = async (manager: EntityManager, workshop: Workshop): Promise<void> => {
  await manager.insert(Workshop, workshop);
};

export const updateWorkshop = async (
  manager: EntityManager,
  workshopId: string,
  change: Partial<Workshop>,
): Promise<void> => {
  await manager.update(Workshop, { id: workshopId }, change);
};

/** Board revisions by workshop id. */
export async function boardRevsOf(manager: EntityManager, workshopIds: string[]): Promise<Map<string, number>> {
  const rows = await manager.find(Workshop, { select: { id: true, boardRev: true }, where: { id: In(workshopIds) } });
  return new Map(rows.map((row) => [row.id, row.boardRev]));
}
