import type { EntityManager } from 'typeorm';
import type { PersonRef } from '@/shared/contract/common';
import { Person } from '../entities/person';

/** Id and name of everybody of a workshop, the disabled too: what they did keeps their name. */
export async function personRefs(manager: EntityManager, workshopId: string): Promise<Map<string, PersonRef>> {
  const people = await manager.find(Person, { where: { workshopId }, select: { id: true, name: true } });
  return new Map(people.map(({ id, name }) => [id, { id, name }]));
}
