import type { EntityManager } from 'typeorm';
import { AlertTurn } from '../entities/alert-turn';

export async function insertTurn(manager: EntityManager, turn: AlertTurn): Promise<void> {
  await manager.insert(AlertTurn, turn);
}

/** Changes the turn of an alert by its number. */
export async function updateTurn(
  manager: EntityManager,
  workshopId: string,
  alertId: string,
  number: number,
  patch: Partial<AlertTurn>,
): Promise<void> {
  await manager.update(AlertTurn, { workshopId, alertId, number }, patch);
}

/** With whom an alert has been, first turn first. */
export const turnsOf = (manager: EntityManager, workshopId: string, alertId: string): Promise<AlertTurn[]> =>
  manager.find(AlertTurn, { where: { workshopId, alertId }, order: { number: 'ASC' } });
