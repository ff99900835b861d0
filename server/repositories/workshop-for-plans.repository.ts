import type { EntityManager } from 'typeorm';
import { Workshop } from '../entities/workshop';
import { notFound } from '../errors/domain-error';

/** The workshop's own row, whose settings plans and statistics need. */
export async function workshopForPlans(manager: EntityManager, workshopId: string): Promise<Workshop> {
  const workshop = await manager.findOneBy(Workshop, { id: workshopId });
  if (!workshop) throw notFound('This workshop');
  return workshop;
}
