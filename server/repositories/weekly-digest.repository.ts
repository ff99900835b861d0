import { LessThanOrEqual, type EntityManager } from 'typeorm';
import { DigestStop } from '../entities/digest-stop';
import { Person } from '../entities/person';
import { WeeklyDigest } from '../entities/weekly-digest';
import { Workshop } from '../entities/workshop';

export const listWorkshops = (manager: EntityManager): Promise<Workshop[]> => manager.find(Workshop);

/** Managers who are to hear of a week and have no row of it: active, here before `before`, and not without the digest. */
export async function managersWithoutDigest(
  manager: EntityManager,
  workshopId: string,
  monday: string,
  before: number,
): Promise<string[]> {
  const rows = await manager
    .createQueryBuilder(Person, 'person')
    .select('person.id', 'id')
    .where("person.workshopId = :workshopId AND person.role = 'manager' AND person.disabledAt IS NULL", { workshopId })
    .andWhere('person.createdAt < :before', { before })
    .andWhere((query) => {
      const had = query.subQuery().select('1').from(WeeklyDigest, 'digest');
      return `NOT EXISTS ${had.where('digest.personId = person.id AND digest.monday = :monday', { monday }).getQuery()}`;
    })
    .andWhere((query) => {
      const stop = query.subQuery().select('1').from(DigestStop, 'stop').where('stop.personId = person.id');
      return `NOT EXISTS ${stop.getQuery()}`;
    })
    .orderBy('person.id', 'ASC')
    .getRawMany<{ id: string }>();
  return rows.map(({ id }) => id);
}

export async function insertDigests(manager: EntityManager, rows: readonly WeeklyDigest[]): Promise<void> {
  await manager.insert(WeeklyDigest, [...rows]);
}

/** Those that are due, the oldest first. */
export const dueDigests = (manager: EntityManager, now: number, most: number): Promise<WeeklyDigest[]> =>
  manager.find(WeeklyDigest, {
    where: { state: 'waiting', dueAt: LessThanOrEqual(now) },
    order: { dueAt: 'ASC', id: 'ASC' },
    take: most,
  });

export async function earliestDigestDueAt(manager: EntityManager): Promise<number | null> {
  const [row] = await manager.find(WeeklyDigest, { where: { state: 'waiting' }, order: { dueAt: 'ASC' }, take: 1 });
  return row?.dueAt ?? null;
}

export async function settleDigest(manager: EntityManager, id: string, patch: Partial<WeeklyDigest>): Promise<void> {
  await manager.update(WeeklyDigest, { id, state: 'waiting' }, patch);
}

export const wantsDigest = async (manager: EntityManager, workshopId: string, personId: string): Promise<boolean> =>
  !(await manager.existsBy(DigestStop, { workshopId, personId }));

export async function stopDigest(
  manager: EntityManager,
  workshopId: string,
  personId: string,
  at: number,
): Promise<void> {
  await manager.upsert(DigestStop, { personId, workshopId, at }, ['personId']);
}

export async function resumeDigest(manager: EntityManager, workshopId: string, personId: string): Promise<void> {
  await manager.delete(DigestStop, { workshopId, personId });
}

/** Of whoever it is, for a link that needs no signing in. */
export const personById = (manager: EntityManager, id: string): Promise<Person | null> =>
  manager.findOneBy(Person, { id });

/** Of all letters that were written in a workshop. */
export const digestIds = async (manager: EntityManager, workshopId: string): Promise<string[]> =>
  (await manager.find(WeeklyDigest, { where: { workshopId }, select: { id: true } })).map(({ id }) => id);
