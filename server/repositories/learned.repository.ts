import { In, IsNull, Not, type EntityManager } from 'typeorm';
import { Charge } from '../entities/charge';

/**
 * Ids of the last charges of a type that were judged within the tolerance and are over, newest first. Only those whose end
 * of current a person has said: the end that was merely reckoned teaches nothing about the reckoning.
 */
export async function taughtChargeIds(
  manager: EntityManager,
  workshopId: string,
  moduleTypeId: string,
  limit: number,
): Promise<string[]> {
  const rows: Pick<Charge, 'id'>[] = await manager.find(Charge, {
    where: {
      workshopId,
      moduleTypeId,
      stage: In(['fitted', 'shelved']),
      readyAt: Not(IsNull()),
      currentOffSaid: true,
    },
    select: { id: true },
    order: { readyAt: 'DESC', id: 'ASC' },
    take: limit,
  });
  return rows.map(({ id }) => id);
}

/** The way each of these charges was planned. */
export const optionsOfCharges = (
  manager: EntityManager,
  workshopId: string,
  ids: readonly string[],
): Promise<Pick<Charge, 'id' | 'option'>[]> =>
  ids.length === 0
    ? Promise.resolve([])
    : manager.find(Charge, { where: { workshopId, id: In([...ids]) }, select: { id: true, option: true } });
