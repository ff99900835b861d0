import { In, IsNull, LessThanOrEqual, MoreThan, Not, type EntityManager } from 'typeorm';
import { Alert } from '../entities/alert';

export const findAlert = (manager: EntityManager, workshopId: string, id: string): Promise<Alert | null> =>
  manager.findOneBy(Alert, { workshopId, id });

/** The open alerts, and those that ended after `clearedSince` (epoch ms), newest first. */
export const listAlerts = (manager: EntityManager, workshopId: string, clearedSince: number): Promise<Alert[]> =>
  manager.find(Alert, {
    where: [
      { workshopId, clearedAt: IsNull() },
      { workshopId, clearedAt: MoreThan(clearedSince) },
    ],
    order: { raisedAt: 'DESC', id: 'ASC' },
  });

/** Every alert that a charge has ever raised, in the order of time. */
export const alertsOfCharge = (manager: EntityManager, workshopId: string, chargeId: string): Promise<Alert[]> =>
  manager.find(Alert, { where: { workshopId, chargeId }, order: { raisedAt: 'ASC', id: 'ASC' } });

export async function insertAlert(manager: EntityManager, alert: Alert): Promise<void> {
  await manager.insert(Alert, alert);
}

export async function updateAlert(
  manager: EntityManager,
  workshopId: string,
  id: string,
  patch: Partial<Alert>,
): Promise<void> {
  await manager.update(Alert, { workshopId, id }, patch);
}

/** What nobody has taken in time, of all workshops: asked by the sleeper alone. */
export const listAlertsToPass = (
  manager: EntityManager,
  now: number,
  limit: number,
): Promise<Pick<Alert, 'id' | 'workshopId'>[]> =>
  manager.find(Alert, {
    where: { passDueAt: LessThanOrEqual(now) },
    select: { id: true, workshopId: true },
    order: { passDueAt: 'ASC', id: 'ASC' },
    take: limit,
  });

/** What is to go on after `now`, of all workshops. */
export const listAlertsToPassAfter = (
  manager: EntityManager,
  now: number,
): Promise<Pick<Alert, 'id' | 'workshopId' | 'level' | 'passDueAt'>[]> =>
  manager.find(Alert, {
    where: { passDueAt: MoreThan(now) },
    select: { id: true, workshopId: true, level: true, passDueAt: true },
  });

/** When the first alert goes on, epoch ms, of all workshops; null: none does. */
export async function earliestPassDueAt(manager: EntityManager): Promise<number | null> {
  const row = await manager.findOne(Alert, {
    where: { passDueAt: Not(IsNull()) },
    select: { id: true, passDueAt: true },
    order: { passDueAt: 'ASC' },
  });
  return row?.passDueAt ?? null;
}

/** Open alerts about walls, of all workshops. */
export const listOpenWallAlerts = (manager: EntityManager): Promise<Alert[]> =>
  manager.findBy(Alert, { wallId: Not(IsNull()), clearedAt: IsNull() });

/** Which of these causes have been told already. */
export async function toldCauses(manager: EntityManager, causes: readonly string[]): Promise<Set<string>> {
  if (causes.length === 0) return new Set();
  const rows = await manager.find(Alert, { where: { cause: In([...causes]) }, select: { id: true, cause: true } });
  return new Set(rows.map(({ cause }) => cause));
}

export const alertsById = async (
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Map<string, Alert>> => {
  if (ids.length === 0) return new Map();
  const rows = await manager.findBy(Alert, { workshopId, id: In([...ids]) });
  return new Map(rows.map((row) => [row.id, row]));
};
