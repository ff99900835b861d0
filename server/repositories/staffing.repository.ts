import type { EntityManager } from 'typeorm';
import { Staffing } from '../entities/staffing';

export const findStaffing = (manager: EntityManager, workshopId: string, personId: string): Promise<Staffing | null> =>
  manager.findOneBy(Staffing, { workshopId, personId });

/** By the person's id; who has none has the workshop's hours and no skill. */
export async function staffingByPerson(manager: EntityManager, workshopId: string): Promise<Map<string, Staffing>> {
  const rows = await manager.findBy(Staffing, { workshopId });
  return new Map(rows.map((row) => [row.personId, row]));
}

export const saveStaffing = (manager: EntityManager, staffing: Staffing): Promise<Staffing> =>
  manager.save(Staffing, staffing);
