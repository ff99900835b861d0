import { IsNull, type EntityManager } from 'typeorm';
import type { Role } from '@/shared/contract/roles';
import { Person } from '../entities/person';

/** By the address alone: who signs in has not said a workshop. An address belongs to one person. */
export const findPersonByEmail = (manager: EntityManager, email: string): Promise<Person | null> =>
  manager.findOneBy(Person, { email });

export const findPerson = (manager: EntityManager, workshopId: string, id: string): Promise<Person | null> =>
  manager.findOneBy(Person, { workshopId, id });

/** Everybody of the workshop, by name. */
export const listPeople = (manager: EntityManager, workshopId: string): Promise<Person[]> =>
  manager.find(Person, { where: { workshopId }, order: { name: 'ASC', id: 'ASC' }, take: 500 });

/** The first person of a role who is not disabled. */
export const findFirstOfRole = (manager: EntityManager, workshopId: string, role: Role): Promise<Person | null> =>
  manager.findOne(Person, {
    where: { workshopId, role, disabledAt: IsNull() },
    order: { createdAt: 'ASC', id: 'ASC' },
  });

export const countActiveManagers = (manager: EntityManager, workshopId: string): Promise<number> =>
  manager.countBy(Person, { workshopId, role: 'manager', disabledAt: IsNull() });

export const insertPerson = async (manager: EntityManager, person: Person): Promise<void> => {
  await manager.insert(Person, person);
};

export const updatePerson = async (
  manager: EntityManager,
  workshopId: string,
  id: string,
  change: Partial<Person>,
): Promise<void> => {
  await manager.update(Person, { workshopId, id }, change);
};
