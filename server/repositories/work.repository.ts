import { In, IsNull, LessThan, MoreThan, Not, type EntityManager } from 'typeorm';
import { Work } from '../entities/work';
import { WorkStint } from '../entities/work-stint';

/** In somebody's hands, or to be. */
const standing = ['taken', 'begun'] as const;

export const findWork = (manager: EntityManager, workshopId: string, id: string): Promise<Work | null> =>
  manager.findOneBy(Work, { workshopId, id });

/** Neither done nor dropped: open, taken or begun; the first that was added comes first. */
export const listOpenWork = (manager: EntityManager, workshopId: string): Promise<Work[]> =>
  manager.find(Work, { where: { workshopId, overAt: IsNull() }, order: { createdAt: 'ASC', id: 'ASC' } });

/** One page of the work that is done or dropped, the last to end first. */
export const listOverWork = (
  manager: EntityManager,
  workshopId: string,
  { repairId, skip, take }: { repairId?: string; skip: number; take: number },
): Promise<Work[]> =>
  manager.find(Work, {
    where: { workshopId, overAt: Not(IsNull()), ...(repairId === undefined ? {} : { repairId }) },
    order: { overAt: 'DESC', id: 'ASC' },
    skip,
    take,
  });

export const countOverWork = (manager: EntityManager, workshopId: string, repairId?: string): Promise<number> =>
  manager.countBy(Work, { workshopId, overAt: Not(IsNull()), ...(repairId === undefined ? {} : { repairId }) });

/** Open work that names a skill, a place or a repair. */
export const listOpenWorkOf = (
  manager: EntityManager,
  workshopId: string,
  named: { skillId: string } | { placeId: string } | { repairId: string },
): Promise<Work[]> => manager.find(Work, { where: { workshopId, overAt: IsNull(), ...named }, order: { id: 'ASC' } });

/** Work for a repair that is done or dropped. */
export const listOverWorkOf = (manager: EntityManager, workshopId: string, repairId: string): Promise<Work[]> =>
  manager.find(Work, { where: { workshopId, repairId, overAt: Not(IsNull()) }, order: { id: 'ASC' } });

/** All work for these repairs, in the order it was added. */
export const workOfRepairs = (
  manager: EntityManager,
  workshopId: string,
  repairIds: readonly string[],
): Promise<Work[]> =>
  manager.find(Work, {
    where: { workshopId, repairId: In([...repairIds]) },
    order: { createdAt: 'ASC', id: 'ASC' },
  });

export async function workById(
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, Work>> {
  if (ids.length === 0) return new Map();
  const rows = await manager.findBy(Work, { workshopId, id: In([...ids]) });
  return new Map(rows.map((row) => [row.id, row]));
}

/** Every number that was ever given. */
export async function workNumbers(manager: EntityManager, workshopId: string): Promise<string[]> {
  const rows = await manager.find(Work, { where: { workshopId }, select: { id: true, number: true } });
  return rows.map(({ number }) => number);
}

export async function insertWork(manager: EntityManager, work: Work): Promise<void> {
  await manager.insert(Work, work);
}
export async function updateWork(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<Work>,
): Promise<void> {
  await manager.update(Work, { workshopId, id }, patch);
}

/** By the work's id, in the order of time, those given back too. */
export async function stintsOfWork(
  manager: EntityManager,
  workshopId: string,
  workIds: readonly string[],
): Promise<Map<string, WorkStint[]>> {
  const grouped = new Map<string, WorkStint[]>();
  if (workIds.length === 0) return grouped;
  const rows = await manager.find(WorkStint, {
    where: { workshopId, workId: In([...workIds]) },
    order: { fromAt: 'ASC', id: 'ASC' },
  });
  for (const row of rows) grouped.set(row.workId, [...(grouped.get(row.workId) ?? []), row]);
  return grouped;
}

/**
 * Stints with a moment in `[from, to)`, epoch ms, of everybody, in the order of time; without those given back. One that
 * is begun lasts until somebody ends it, also past its planned end.
 */
export const listStints = (
  manager: EntityManager,
  workshopId: string,
  from: number,
  to: number,
): Promise<WorkStint[]> =>
  manager.find(WorkStint, {
    where: [
      { workshopId, state: Not('given-back'), fromAt: LessThan(to), toAt: MoreThan(from) },
      { workshopId, state: 'begun', fromAt: LessThan(to) },
    ],
    order: { fromAt: 'ASC', id: 'ASC' },
  });

/** Taken or begun, whenever they are planned: of one person, else of everybody. */
export const listStandingStints = (
  manager: EntityManager,
  workshopId: string,
  personId?: string,
): Promise<WorkStint[]> =>
  manager.find(WorkStint, {
    where: { workshopId, state: In([...standing]), ...(personId === undefined ? {} : { personId }) },
    order: { fromAt: 'ASC', id: 'ASC' },
  });

export async function insertStint(manager: EntityManager, stint: WorkStint): Promise<void> {
  await manager.insert(WorkStint, stint);
}
export async function updateStint(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<WorkStint>,
): Promise<void> {
  await manager.update(WorkStint, { workshopId, id }, patch);
}
