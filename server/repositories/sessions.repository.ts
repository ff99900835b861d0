import { In, IsNull, MoreThan, Not, type EntityManager } from 'typeorm';
import { Person } from '../entities/person';
import { Session } from '../entities/session';

/** A session that is not ended, with its person; null where there is none. Says nothing of time or of a disabled person. */
export async function findSessionWithPerson(
  manager: EntityManager,
  workshopId: string,
  sessionId: string,
): Promise<{ session: Session; person: Person } | null> {
  const session = await manager.findOneBy(Session, { workshopId, id: sessionId, endedAt: IsNull() });
  if (!session) return null;
  const person = await manager.findOneBy(Person, { workshopId, id: session.personId });
  return person ? { session, person } : null;
}

/** Sessions of all workshops that are not ended, with their persons, by their ids. Those of no person are left out. */
export async function sessionsWithPersons(
  manager: EntityManager,
  sessionIds: readonly string[],
): Promise<Map<string, { session: Session; person: Person }>> {
  if (sessionIds.length === 0) return new Map();
  const sessions = await manager.findBy(Session, { id: In([...new Set(sessionIds)]), endedAt: IsNull() });
  const persons = await manager.findBy(Person, { id: In([...new Set(sessions.map(({ personId }) => personId))]) });
  const byId = new Map(persons.map((person) => [person.id, person]));
  return new Map(
    sessions.flatMap((session) => {
      const person = byId.get(session.personId);
      return person?.workshopId === session.workshopId ? [[session.id, { session, person }] as const] : [];
    }),
  );
}

/** A session by its id alone, ended or not: the refresh token says no workshop. */
export const findSessionById = (manager: EntityManager, sessionId: string): Promise<Session | null> =>
  manager.findOneBy(Session, { id: sessionId });

export const insertSession = async (manager: EntityManager, session: Session): Promise<void> => {
  await manager.insert(Session, session);
};

export const updateSession = async (
  manager: EntityManager,
  workshopId: string,
  sessionId: string,
  change: Partial<Session>,
): Promise<void> => {
  await manager.update(Session, { workshopId, id: sessionId }, change);
};

/** Open sessions of a person, latest used first. */
export const listOpenSessions = (
  manager: EntityManager,
  workshopId: string,
  personId: string,
  now: number,
  usedAfter: number,
): Promise<Session[]> =>
  manager.find(Session, {
    where: { workshopId, personId, endedAt: IsNull(), expiresAt: MoreThan(now), lastUsedAt: MoreThan(usedAfter) },
    order: { lastUsedAt: 'DESC' },
    take: 100,
  });

/** Ends the open sessions of a person, or all but one; gives the ids of those ended. */
export async function endSessionsOf(
  manager: EntityManager,
  workshopId: string,
  personId: string,
  now: number,
  reason: string,
  exceptId?: string,
): Promise<string[]> {
  const where = { workshopId, personId, endedAt: IsNull(), ...(exceptId ? { id: Not(exceptId) } : {}) };
  const open = await manager.find(Session, { select: { id: true }, where });
  await manager.update(Session, where, { endedAt: now, endReason: reason, successor: null });
  return open.map((session) => session.id);
}

/** Sessions that ended or ran out before `before` are of no use to anybody. */
export const deleteOldSessions = async (manager: EntityManager, before: number): Promise<void> => {
  await manager.createQueryBuilder().delete().from(Session).where('expires_at < :before', { before }).execute();
};
