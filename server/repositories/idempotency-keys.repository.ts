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

export const deleteKeysBefore = async (manager: EntityManager, before: number): Promise<void> => {
  await manager.createQueryBuilder().delete().from(IdempotencyKey).where('created_at < :before', { before }).execute();
};
