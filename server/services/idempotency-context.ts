import { AsyncLocalStorage } from 'node:async_hooks';
import type { EntityManager } from 'typeorm';

/** A write that carries an Idempotency-Key, on its way through a service. */
export interface IdempotentWrite {
  /** Writes the key's row; called once, inside the first transaction of the request. */
  record: (manager: EntityManager) => Promise<void>;
  recorded: boolean;
}

/**
 * Carries the key from the route to the transaction, so that effect and key are committed together or not at all:
 * a server that dies in between neither forgets the write nor repeats it.
 */
export const idempotencyContext = new AsyncLocalStorage<IdempotentWrite>();

/** Writes the key of the request under way, if it has one that is not written yet. */
export async function recordIdempotencyKey(manager: EntityManager): Promise<void> {
  const write = idempotencyContext.getStore();
  if (!write || write.recorded) return;
  write.recorded = true;
  await write.record(manager);
}
