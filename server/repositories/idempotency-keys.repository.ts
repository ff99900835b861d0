import type { EntityManager, QueryDeepPartialEntity } from 'typeorm';
import { IdempotencyKey } from '../entities/idempotency-key';

export const findKey = (
  manager: EntityManager,
  workshopId: string,
  personId: string,
  route: string,
  key: string,
): Promise<IdempotencyKey | null> => manager.findOneBy(IdempotencyKey, { workshopId, personId, route, key });

export const insertKey = async (manager: EntityManager, row: IdempotencyKey): Promise<void> => {
  await manager.insert(IdempotencyKey, row as QueryDeepPartialEntity<IdempotencyKey>);
};

export const storeAnswer = async (
  manager: EntityManager,
  workshopId: string,
  id: string,
  status: number,
  response: unknown,
): Promise<void> => {
  await manager.update(IdempotencyKey, { workshopId, id }, {
    status,
    response,
  } as QueryDeepPartialEntity<IdempotencyKey>);
};

/** Empties answers that nobody waits for any more; the key keeps saying that its write was done. */
export const dropAnswersBefore = async (manager: EntityManager, before: number, without: number): Promise<void> => {
  await manager
    .createQueryBuilder()
    .update(IdempotencyKey)
    .set({ status: without, response: { body: null } } as QueryDeepPartialEntity<IdempotencyKey>)
    .where('created_at < :before AND status <> :without', { before, without })
    .execute();
};

export const deleteKeysBefore = async (manager: EntityManager, before: number): Promise<void> => {
  await manager.createQueryBuilder().delete().from(IdempotencyKey).where('created_at < :before', { before }).execute();
};
