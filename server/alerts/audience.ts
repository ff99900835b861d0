/** Whom a turn of an alert is for. */
import type { EntityManager } from 'typeorm';
import type { Person } from '../entities/person';
import type { AlertTurn } from '../entities/alert-turn';
import { listPeople } from '../repositories/people.repository';

export type Audience = AlertTurn['audience'];

/** The people a turn is for; those who are disabled hear nothing. */
export async function audiencePeople(
  manager: EntityManager,
  workshopId: string,
  turn: Pick<AlertTurn, 'audience' | 'personId'>,
): Promise<Person[]> {
  const people = (await listPeople(manager, workshopId)).filter((person) => person.disabledAt === null);
  return people.filter((person) => belongs(person, turn));
}

function belongs(person: Person, { audience, personId }: Pick<AlertTurn, 'audience' | 'personId'>): boolean {
  switch (audience) {
    case 'everybody':
      return true;
    case 'person':
      return person.id === personId;
    case 'foremen':
      return person.role === 'foreman';
    case 'managers':
      return person.role === 'manager';
  }
}
