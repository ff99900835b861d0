import { IsNull, MoreThan, type EntityManager } from 'typeorm';
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
